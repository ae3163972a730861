//! Problems of names (codes N...).

use super::{Code, Label, Problem, Report, Severity};
use crate::span::Span;

/// What a name stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NameKind {
    /// A group.
    Group,
    /// A table.
    Table,
    /// A value column.
    Column,
    /// A label column under a name of its own.
    Role,
    /// A setting.
    Given,
    /// An unknown.
    Unknown,
    /// A let.
    Let,
    /// A term.
    Term,
    /// A derived quantity.
    Derive,
    /// A part.
    Part,
    /// A rung.
    Rung,
    /// A function.
    Function,
    /// What is done over a group or a table, such as `sum`.
    Reducer,
    /// A distribution.
    Distribution,
}

impl NameKind {
    /// With its article: `a group`.
    pub fn words(self) -> &'static str {
        match self {
            NameKind::Group => "a group",
            NameKind::Table => "a table",
            NameKind::Column => "a column",
            NameKind::Role => "a role",
            NameKind::Given => "a given",
            NameKind::Unknown => "an unknown",
            NameKind::Let => "a let",
            NameKind::Term => "a term",
            NameKind::Derive => "a derived quantity",
            NameKind::Part => "a part",
            NameKind::Rung => "a rung",
            NameKind::Function => "a function",
            NameKind::Reducer => "a reduction",
            NameKind::Distribution => "a distribution",
        }
    }
}

/// What would have fitted where a name stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Wanted {
    /// A group.
    Group,
    /// A group or a table.
    Index,
    /// A value: a given, an unknown, a let, a term, a value column.
    Quantity,
    /// A value column.
    Column,
    /// A role (a second label column over a group).
    Role,
    /// A term.
    Term,
    /// An earlier rung.
    Rung,
    /// A function.
    Function,
    /// What is done over a group or a table.
    Reducer,
    /// A distribution.
    Distribution,
    /// An update rule.
    Rule,
    /// A support type.
    Support,
}

impl Wanted {
    /// Without an article.
    pub fn words(self) -> &'static str {
        match self {
            Wanted::Group => "group",
            Wanted::Index => "group or table",
            Wanted::Quantity => "quantity",
            Wanted::Column => "value column",
            Wanted::Role => "role",
            Wanted::Term => "term",
            Wanted::Rung => "earlier rung",
            Wanted::Function => "function",
            Wanted::Reducer => "reduction",
            Wanted::Distribution => "distribution",
            Wanted::Rule => "update rule",
            Wanted::Support => "support type",
        }
    }

    /// How one is brought in where none has nearly this name.
    fn remedy(self, name: &str) -> String {
        match self {
            Wanted::Group => format!("declare it: `group {name}`"),
            Wanted::Index => format!("declare it: `group {name}`, or a `table {name} {{ ... }}`"),
            Wanted::Quantity => {
                format!("declare it, for example as `unknown {name} : real follows ...` or as a column of a table")
            }
            Wanted::Column => format!("add the column to its table: `{name} : real`"),
            Wanted::Role => format!("add a label column of this name to the table: `{name} : GROUP`"),
            Wanted::Term => format!("declare it: `term {name} = ...`"),
            Wanted::Rung => format!("write `rung {name}` above this one, or drop `from {name}`"),
            Wanted::Function => {
                "the functions are exp, log, log2, log10, sqrt, abs, logistic, logit, log1p, expm1, lgamma, floor, \
                 ceiling, round, sin, cos, tanh, normal_cdf, min and max"
                    .into()
            }
            Wanted::Reducer => "the reductions are sum, mean, sd, min, max and count".into(),
            Wanted::Distribution => {
                "normal, gamma, beta, poisson and binomial are some; the language page lists all".into()
            }
            Wanted::Rule => "the update rules are conjugate, slice, joint and enumerate; leave `by` out to let stook choose".into(),
            Wanted::Support => {
                "the support types are real, positive, fraction, count and yesno, and `real` with `above`, `below` or `between`"
                    .into()
            }
        }
    }
}

/// A name is wrong.
#[derive(Clone, Debug)]
pub enum NameProblem {
    /// Nothing has this name.
    Unknown {
        /// The use.
        span: Span,
        /// The name.
        name: String,
        /// What would fit.
        wanted: Wanted,
        /// The nearest name that would fit, what it is and where it is declared (nowhere for the notation's own words).
        nearest: Option<(String, NameKind, Option<Span>)>,
    },
    /// A name is declared twice.
    Twice {
        /// The later declaration.
        span: Span,
        /// The name.
        name: String,
        /// What the later one declares.
        kind: NameKind,
        /// The earlier declaration.
        first: Span,
        /// What the earlier one declares.
        first_kind: NameKind,
    },
    /// Two tables have a value column of the same name.
    ColumnInTwoTables {
        /// The later column.
        span: Span,
        /// The name.
        name: String,
        /// The later table.
        table: String,
        /// The heading of the later column.
        heading: String,
        /// The earlier column.
        first: Span,
        /// The earlier table.
        first_table: String,
    },
    /// A name of something that has no value stands where a value is wanted.
    NotAQuantity {
        /// The use.
        span: Span,
        /// The name.
        name: String,
        /// What it is.
        kind: NameKind,
        /// Where it is declared (nowhere for the notation's own words).
        declared: Option<Span>,
    },
    /// A label is written without quotes.
    Unquoted {
        /// The label.
        span: Span,
        /// The label as text.
        text: String,
        /// The group that it is a label of.
        group: String,
    },
    /// A name is declared as something else than its place wants.
    WrongKind {
        /// The use.
        span: Span,
        /// The name.
        name: String,
        /// What it is.
        kind: NameKind,
        /// Where it is declared.
        declared: Span,
        /// What the place wants.
        wanted: Wanted,
    },
    /// A quoted text stands where a value is wanted.
    TextAsQuantity {
        /// The text.
        span: Span,
        /// What it says.
        text: String,
    },
    /// A given's default uses a given that stands further down, or itself.
    LaterGiven {
        /// The use.
        span: Span,
        /// The later given.
        name: String,
        /// Its declaration.
        declared: Span,
    },
    /// A derived quantity is used by the fit.
    DerivedInFit {
        /// The use.
        span: Span,
        /// The derived quantity.
        name: String,
        /// Its declaration.
        declared: Span,
    },
    /// Names that need each other.
    Circle {
        /// Each step: where the first name uses the second.
        steps: Vec<(Span, String, String)>,
    },
    /// A second ladder.
    SecondLadder {
        /// The second one.
        span: Span,
        /// The first one.
        first: Span,
    },
    /// A rung adds something that is no term.
    NotATerm {
        /// Where the rung names it.
        span: Span,
        /// The name.
        name: String,
        /// What it is.
        kind: NameKind,
        /// Its declaration.
        declared: Span,
    },
    /// A rung starts from itself or from one that stands further down.
    LaterRung {
        /// The name behind `from`.
        span: Span,
        /// The rung's name.
        name: String,
        /// The rung's declaration.
        declared: Span,
    },
}

impl From<NameProblem> for Problem {
    fn from(problem: NameProblem) -> Problem {
        Problem::Name(problem)
    }
}

fn label(span: Span, text: impl Into<String>) -> Label {
    Label { span, text: text.into() }
}

impl NameProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        let (code, message, labels, help) = match self {
            NameProblem::Unknown { span, name, wanted, nearest } => {
                let mut labels = vec![label(*span, "nothing has this name")];
                let help = match nearest {
                    Some((near, kind, declared)) => {
                        if let Some(at) = declared {
                            labels.push(label(*at, format!("`{near}` is declared here")));
                        }
                        match wanted {
                            Wanted::Rule | Wanted::Support => format!("did you mean `{near}`?"),
                            _ => format!("did you mean `{near}`, {}?", kind.words()),
                        }
                    }
                    None => wanted.remedy(name),
                };
                ("N001", format!("there is no {} `{name}`", wanted.words()), labels, help)
            }
            NameProblem::Twice { span, name, kind, first, first_kind } => (
                "N002",
                format!("the name `{name}` is declared twice"),
                vec![
                    label(*span, format!("declared again as {}", kind.words())),
                    label(*first, format!("declared as {} here", first_kind.words())),
                ],
                "give one of the two another name".into(),
            ),
            NameProblem::ColumnInTwoTables { span, name, table, heading, first, first_table } => (
                "N003",
                format!("the tables `{first_table}` and `{table}` both have a column `{name}`"),
                vec![
                    label(*span, format!("`{name}` again, in `{table}`")),
                    label(*first, format!("`{name}` of `{first_table}`")),
                ],
                format!("rename one and keep its heading: `{table}_{name} : ... from \"{heading}\"`"),
            ),
            NameProblem::NotAQuantity { span, name, kind, declared } => {
                let mut labels = vec![label(*span, "a quantity is wanted here")];
                labels.extend(declared.map(|at| label(at, format!("`{name}` is declared as {} here", kind.words()))));
                let help = not_a_quantity_help(name, *kind);
                ("N004", format!("`{name}` is {}, not a quantity", kind.words()), labels, help)
            }
            NameProblem::Unquoted { span, text, group } => (
                "N005",
                format!("the label `{text}` is written without quotes"),
                vec![label(*span, format!("a label of `{group}` is wanted here"))],
                format!("put it between quotes: `\"{text}\"`"),
            ),
            NameProblem::WrongKind { span, name, kind, declared, wanted } => (
                "N006",
                format!("`{name}` is {}, and a {} is wanted here", kind.words(), wanted.words()),
                vec![
                    label(*span, format!("a {} is wanted here", wanted.words())),
                    label(*declared, format!("`{name}` is declared as {} here", kind.words())),
                ],
                wrong_kind_help(*kind, *wanted, name),
            ),
            NameProblem::TextAsQuantity { span, text } => (
                "N007",
                format!("the text \"{text}\" is not a quantity"),
                vec![label(*span, "a quantity is wanted here")],
                "a quoted text is a label: it stands in a comparison with a group, `group == \"label\"`, or between \
                 brackets, `x[\"label\"]`"
                    .into(),
            ),
            NameProblem::LaterGiven { span, name, declared } => (
                "N008",
                format!("the default of a given uses `{name}` before it is declared"),
                vec![label(*span, "used here"), label(*declared, format!("`{name}` is declared here"))],
                format!("move `given {name}` above this one, or write a number"),
            ),
            NameProblem::DerivedInFit { span, name, declared } => (
                "N009",
                format!("the derived quantity `{name}` is used by the fit"),
                vec![label(*span, "used here"), label(*declared, "worked out for the report only")],
                format!("write `let {name} = ...` instead of `derive`; a let can be used anywhere"),
            ),
            NameProblem::Circle { steps } => circle(steps),
            NameProblem::SecondLadder { span, first } => (
                "N011",
                "the model has two ladders".into(),
                vec![label(*span, "a second ladder"), label(*first, "the first ladder")],
                "put all rungs into one ladder; `rung b from a` starts a branch".into(),
            ),
            NameProblem::NotATerm { span, name, kind, declared } => (
                "N012",
                format!("a rung adds terms, and `{name}` is {}", kind.words()),
                vec![
                    label(*span, "a term is wanted here"),
                    label(*declared, format!("`{name}` is declared as {} here", kind.words())),
                ],
                not_a_term_help(name, *kind),
            ),
            NameProblem::LaterRung { span, name, declared } => (
                "N013",
                format!("the rung `{name}` is no earlier rung"),
                vec![label(*span, "starts from it here"), label(*declared, format!("`{name}` stands here"))],
                format!("move `rung {name}` above the rungs that start from it"),
            ),
        };
        Report { code: Code(code), severity: Severity::Error, message, labels, help }
    }
}

fn circle(steps: &[(Span, String, String)]) -> (&'static str, String, Vec<Label>, String) {
    let labels =
        steps.iter().map(|(span, from, to)| label(*span, format!("`{from}` uses `{to}` here"))).collect();
    let first = steps.first().map_or("", |(_, from, _)| from);
    let message = if steps.len() == 1 {
        format!("`{first}` is worked out from itself")
    } else {
        let way: Vec<String> = steps.iter().map(|(_, _, to)| format!("`{to}`")).collect();
        format!("`{first}` is worked out from itself, by way of {}", way.join(", then "))
    };
    ("N010", message, labels, "break the circle at one of these places".into())
}

fn not_a_quantity_help(name: &str, kind: NameKind) -> String {
    match kind {
        NameKind::Role => {
            format!(
                "choose by it between brackets, `x[{name}]`; a test of its label is `{name} == \"label\"`"
            )
        }
        NameKind::Group => format!(
            "an effect of it is an unknown: `unknown {name}_effect : real per {name} follows ...`; a test of its label is \
             `{name} == \"label\"`"
        ),
        NameKind::Table => format!("name a column of the table, or count its rows: `sum(1 over {name})`"),
        NameKind::Function => format!("call it: `{name}(x)`"),
        NameKind::Reducer => format!("say over what: `{name}(x over GROUP)`"),
        NameKind::Distribution => format!(
            "a distribution stands behind `follows`: `unknown x : real follows {name}(...)`, and `x` is then the quantity"
        ),
        NameKind::Part => format!("call it: `{name}(...)`"),
        _ => "name a quantity here".into(),
    }
}

fn wrong_kind_help(kind: NameKind, wanted: Wanted, name: &str) -> String {
    match (wanted, kind) {
        (Wanted::Function, _) => format!("write a product with `*`: `{name} * (...)`"),
        (Wanted::Column, NameKind::Group | NameKind::Role) => {
            "a response is a column of values; the labels of a group cannot be a response".into()
        }
        (Wanted::Column, _) => {
            format!(
                "a response is a column of a table; for a quantity that is not measured write `unknown {name}`"
            )
        }
        (Wanted::Group, NameKind::Table) => "name a group; rows have no labels".into(),
        (Wanted::Support, NameKind::Group) => {
            format!("write the type of the values first: `real per {name}`, or `positive per {name}`")
        }
        (_, _) => format!("name a {} here", wanted.words()),
    }
}

fn not_a_term_help(name: &str, kind: NameKind) -> String {
    match kind {
        NameKind::Let => format!("write `term {name} = ...` instead of `let {name} = ...`"),
        NameKind::Unknown => {
            format!("write `term {name}_part = {name}`, use `{name}_part` in the model, and add that")
        }
        _ => "a term is declared with `term NAME = ...` and used in the model".into(),
    }
}
