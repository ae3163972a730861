//! Problems of the grammar (codes Y...).

use super::{Code, Label, Page, Problem, Report, Severity};
use crate::span::Span;

/// The text does not follow the grammar.
#[derive(Clone, Debug)]
#[allow(missing_docs, reason = "the fields are what the variant's sentence names")]
pub enum SyntaxProblem {
    /// A character that begins nothing in the notation.
    StrayCharacter { span: Span, character: char },
    /// A quoted text that is not closed on its line.
    UnclosedText { span: Span },
    /// A reserved word where a name belongs.
    ReservedWord { span: Span, word: String, context: &'static str },
    /// `~` or `<-`.
    NotFollows { span: Span },
    /// `;`.
    Semicolon { span: Span },
    /// Something else than what may stand here.
    Unexpected { span: Span, found: String, wanted: &'static str, context: &'static str, after: Span },
    /// An expression nested too deeply.
    TooDeep { span: Span, deepest: usize },
    /// `a < b < c`.
    ChainedComparison { first: Span, second: Span },
    /// A number beyond the largest double.
    NumberTooLarge { span: Span },
    /// A closing token that is missing.
    Unclosed { open: Span, close: &'static str, span: Span, found: String },
    /// `x[1]`.
    NumericIndex { span: Span, text: String },
    /// `f(x = 1)`.
    EqualInCall { span: Span },
    /// `for ...`.
    Loop { span: Span },
    /// Something that begins no declaration.
    NoDeclaration { span: Span, found: String, nearest: Option<&'static str> },
    /// A closing token without an opening one.
    StrayClose { span: Span },
    /// Something behind a complete declaration.
    LeftOver { span: Span, found: String, nearest: Option<&'static str> },
    /// `1,5`.
    DecimalComma { span: Span },
    /// `==` for `=`.
    EqualEqual { span: Span },
}

impl From<SyntaxProblem> for Problem {
    fn from(problem: SyntaxProblem) -> Problem {
        Problem::Syntax(problem)
    }
}

fn report(code: &'static str, message: String, labels: Vec<(Span, &str)>, help: &str) -> Report {
    let label = |(span, text): (Span, &str)| Label { span, text: text.to_string() };
    let labels = labels.into_iter().map(label).collect();
    Report { code: Code(code), severity: Severity::Error, message, labels, help: help.to_string() }
}

impl SyntaxProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        match self {
            SyntaxProblem::StrayCharacter { span, character } => report(
                "Y001",
                format!("the character `{character}` begins nothing here"),
                vec![(*span, "this character")],
                "remove it, or put it between quotes if it belongs to a label or a heading",
            ),
            SyntaxProblem::UnclosedText { span } => report(
                "Y002",
                "this quoted text is not closed".into(),
                vec![(*span, "the quote that opens it")],
                "close it with `\"` on the same line",
            ),
            SyntaxProblem::ReservedWord { span, word, context } => report(
                "Y003",
                format!("`{word}` is a word of the notation and cannot be a name"),
                vec![(*span, &format!("here, {context}, a name is needed"))],
                "take another name; a column keeps its heading with `from \"...\"`",
            ),
            SyntaxProblem::NotFollows { span } => report(
                "Y004",
                "`follows` belongs here".into(),
                vec![(*span, "not this sign")],
                "write `follows`: `unknown grand : real follows normal(mean: 0, sd: 10)`",
            ),
            SyntaxProblem::Semicolon { span } => report(
                "Y005",
                "a semicolon separates nothing here".into(),
                vec![(*span, "this semicolon")],
                "remove it: a declaration ends where the next begins; arguments are separated by commas",
            ),
            SyntaxProblem::Unexpected { span, found, wanted, context, after } => {
                let message = match wanted.chars().next() {
                    Some('`') | Some('a') if wanted.contains(' ') || wanted.starts_with('`') => {
                        format!("{wanted} is needed {context}, not {found}")
                    }
                    _ => format!("`{wanted}` is needed {context}, not {found}"),
                };
                let labels = vec![(*span, "this stands there"), (*after, "behind this")];
                let labels = if after == span { labels[..1].to_vec() } else { labels };
                report("Y006", message, labels, &format!("put {} here", quoted_word(wanted)))
            }
            SyntaxProblem::TooDeep { span, deepest } => report(
                "Y007",
                format!("this expression is nested more than {deepest} deep"),
                vec![(*span, "the innermost part that was read")],
                "give names to its inner parts with `let`",
            ),
            SyntaxProblem::ChainedComparison { first, second } => report(
                "Y008",
                "comparisons do not chain".into(),
                vec![(*second, "this compares the result"), (*first, "of this comparison")],
                "join two comparisons with `and`: `a < b and b < c`",
            ),
            SyntaxProblem::NumberTooLarge { span } => report(
                "Y009",
                "this number is too large".into(),
                vec![(*span, "beyond 1.8e308")],
                "take a smaller number, or other units",
            ),
            SyntaxProblem::Unclosed { open, close, span, found } => {
                let decimal = found == "`,`";
                let help = if decimal {
                    format!("close it with {close}; a decimal number is written with a point")
                } else {
                    format!("close it with {close}")
                };
                report(
                    "Y010",
                    format!("{close} is missing: {found} stands where it may be"),
                    vec![(*open, "what is opened here is not closed"), (*span, "read up to here")],
                    &help,
                )
            }
            SyntaxProblem::NumericIndex { span, text } => report(
                "Y011",
                "a number is no index: groups are types, and there are no numeric indices".into(),
                vec![(*span, "this number")],
                &format!("leave the brackets out for the row's own label, or name one label in quotes: `[\"{text}\"]`"),
            ),
            SyntaxProblem::EqualInCall { span } => report(
                "Y012",
                "an argument's name is followed by a colon".into(),
                vec![(*span, "not by `=`")],
                "write `mean: 0`",
            ),
            SyntaxProblem::Loop { span } => report(
                "Y013",
                "there are no loops in a model".into(),
                vec![(*span, "a loop begins here")],
                "declare the quantity `per` its group: it then has a value for each label, and a response for each row",
            ),
            SyntaxProblem::NoDeclaration { span, found, nearest } => report(
                "Y014",
                format!("`{found}` begins no declaration"),
                vec![(*span, "a declaration must begin here")],
                &match nearest {
                    Some(nearest) => format!("write `{nearest}`"),
                    None => "begin with group, table, given, unknown, term, let, response, derive, part, ladder or use".into(),
                },
            ),
            SyntaxProblem::StrayClose { span } => report(
                "Y015",
                "nothing is open that this could close".into(),
                vec![(*span, "this closes nothing")],
                "remove it, or look for the opening one that is missing",
            ),
            SyntaxProblem::LeftOver { span, found, nearest } => report(
                "Y016",
                format!("`{found}` does not belong here"),
                vec![(*span, "the declaration is complete before this")],
                &match nearest {
                    Some(nearest) => format!("write `{nearest}` if a new declaration begins here"),
                    None => "remove it, or begin a new declaration".into(),
                },
            ),
            SyntaxProblem::DecimalComma { span } => report(
                "Y017",
                "a decimal number is written with a point".into(),
                vec![(*span, "this comma")],
                "write `1.5`, not `1,5`",
            ),
            SyntaxProblem::EqualEqual { span } => report(
                "Y018",
                "`==` compares; a name is given with `=`".into(),
                vec![(*span, "this compares")],
                "write `=`",
            ),
        }
    }
}

/// A word of the notation between ticks; a description as it is.
fn quoted_word(wanted: &str) -> String {
    if wanted.contains(' ') || wanted.starts_with('`') { wanted.to_string() } else { format!("`{wanted}`") }
}

/// The pages of this family.
pub(super) const PAGES: &[Page] = &[
    Page {
        code: Code("Y001"),
        title: "a character that begins nothing",
        text: "Names are made of letters, digits and underscores. Anything else belongs between quotes.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10$)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y002"),
        title: "a quoted text that is not closed",
        text: "A text between quotes ends on its line.",
        wrong: r#"table harvest {
    honey : real from "Honey (kg)

}
unknown grand : real follows normal(mean: 0, sd: 10)
unknown noise : positive follows half_normal(sd: 1)
response honey follows normal(mean: grand, sd: noise)
"#,
        right: r#"table harvest {
    honey : real from "Honey (kg)"
}
unknown grand : real follows normal(mean: 0, sd: 10)
unknown noise : positive follows half_normal(sd: 1)
response honey follows normal(mean: grand, sd: noise)
"#,
    },
    Page {
        code: Code("Y003"),
        title: "a reserved word used as a name",
        text: "The words of the notation cannot be names. A column can have another name than its heading in the file.",
        wrong: "table harvest {\n    between : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse between follows normal(mean: grand, sd: noise)\n",
        right: r#"table harvest {
    gap : real from "between"
}
unknown grand : real follows normal(mean: 0, sd: 10)
unknown noise : positive follows half_normal(sd: 1)
response gap follows normal(mean: grand, sd: noise)
"#,
    },
    Page {
        code: Code("Y004"),
        title: "another sign where `follows` belongs",
        text: "What an unknown or a response is drawn from stands behind the word `follows`.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real ~ normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y005"),
        title: "a semicolon",
        text: "Declarations begin with a word of their own, so nothing separates them; arguments are separated by commas.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10);\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y006"),
        title: "something else than what may stand here",
        text: "The message says what stands here and what may stand here.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y007"),
        title: "an expression nested too deeply",
        text: "Expressions may be nested 200 deep. Name the inner parts with `let`.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: (((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((((0))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))))), sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y008"),
        title: "comparisons in a chain",
        text: "`a < b < c` would compare the truth of `a < b` with c.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: if 0 < grand < 5 then grand else 0, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: if 0 < grand and grand < 5 then grand else 0, sd: noise)\n",
    },
    Page {
        code: Code("Y009"),
        title: "a number that is too large",
        text: "Numbers go up to about 1.8e308.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 1e999)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y010"),
        title: "a bracket, brace or parenthesis that is not closed",
        text: "The message shows the opening one.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y011"),
        title: "a number as an index",
        text: "Groups are types: a quantity `per season`, used in a row, is the one of that row's season. One label is written in quotes.",
        wrong: "group season\ntable harvest {\n    season\n    honey : real\n}\nunknown effect : real per season follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: effect[1], sd: noise)\n",
        right: r#"group season
table harvest {
    season
    honey : real
}
unknown effect : real per season follows normal(mean: 0, sd: 10)
unknown noise : positive follows half_normal(sd: 1)
response honey follows normal(mean: effect["1"], sd: noise)
"#,
    },
    Page {
        code: Code("Y012"),
        title: "`=` in an argument",
        text: "An argument's name and its value are separated by a colon.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean = 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y013"),
        title: "a loop",
        text: "There are no loops: a quantity `per season` has a value for each season, and a response arises in each row of its table.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\nfor i in harvest\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y014"),
        title: "a word that begins no declaration",
        text: "Every declaration begins with one of group, table, given, unknown, term, let, response, derive, part, ladder and use.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunkown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y015"),
        title: "a closing bracket, brace or parenthesis without an opening one",
        text: "One too many, or the opening one was forgotten.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise))\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y016"),
        title: "something left over behind a declaration",
        text: "The declaration is complete before this place: a word is missing, or the rest does not belong here.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10) kg\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\n",
    },
    Page {
        code: Code("Y017"),
        title: "a decimal comma",
        text: "Numbers are written with a decimal point: 1.5.",
        wrong: "table harvest {\n    honey : real\n}\nlet half = 1,5\nunknown grand : real follows normal(mean: 0, sd: half)\nresponse honey follows normal(mean: grand, sd: 1)\n",
        right: "table harvest {\n    honey : real\n}\nlet half = 1.5\nunknown grand : real follows normal(mean: 0, sd: half)\nresponse honey follows normal(mean: grand, sd: 1)\n",
    },
    Page {
        code: Code("Y018"),
        title: "`==` where `=` belongs",
        text: "`=` gives a name to an expression; `==` compares.",
        wrong: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\nderive double == 2 * grand\n",
        right: "table harvest {\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand, sd: noise)\nderive double = 2 * grand\n",
    },
];
