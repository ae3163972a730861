//! Problems of calls, types, priors and responses (codes H...).

use super::{Code, ConstantPlace, Label, Problem, Report, Severity};
use crate::span::Span;

/// A declaration or an expression is put together wrongly.
#[derive(Clone, Debug)]
pub enum ShapeProblem {
    /// An unknown without a prior.
    PriorMissing {
        /// The unknown's name.
        span: Span,
        /// The name.
        name: String,
        /// Three priors that fit its type.
        fitting: [&'static str; 3],
    },
    /// A response without a distribution.
    LawMissing {
        /// The column's name where the response is declared.
        span: Span,
        /// The name.
        name: String,
    },
    /// A function with too few or too many arguments.
    Arity {
        /// The call.
        span: Span,
        /// The function.
        name: String,
        /// How many it takes.
        takes: usize,
        /// How many there are.
        found: usize,
    },
    /// An argument with a name, or `per`, in a call of a function.
    NamedArgument {
        /// The argument.
        span: Span,
        /// The function.
        function: String,
    },
    /// A reduction that does not say over what.
    WithoutOver {
        /// The call.
        span: Span,
        /// `sum`, `mean`, ...
        name: String,
    },
    /// Something else than a distribution behind `follows`.
    NotADistribution {
        /// What stands there.
        span: Span,
        /// The value in words for the help line, where a fixed value was meant.
        declared: String,
    },
    /// Two lower or two upper ends of a truncation.
    TruncatedTwice {
        /// The second.
        span: Span,
        /// The first.
        first: Span,
        /// `lower` or `upper`.
        end: &'static str,
    },
    /// Bounds behind a type other than `real`.
    BoundedType {
        /// The type.
        span: Span,
        /// The word.
        word: String,
        /// The bounds in words, such as `between 0 and 5`.
        bounds: String,
        /// Whether the type is a column's.
        place: ConstantPlace,
    },
    /// A column that arises twice.
    ResponseTwice {
        /// The second response.
        span: Span,
        /// The first.
        first: Span,
        /// The column.
        name: String,
    },
    /// Something per label or drawn together where it cannot be.
    GivenPer {
        /// The clause.
        span: Span,
        /// The given.
        name: String,
    },
    /// A positional argument or `per` where a distribution's names are wanted.
    ArgumentPer {
        /// The place.
        span: Span,
        /// The distribution.
        name: String,
    },
}

impl From<ShapeProblem> for Problem {
    fn from(problem: ShapeProblem) -> Problem {
        Problem::Shape(problem)
    }
}

fn label(span: Span, text: impl Into<String>) -> Label {
    Label { span, text: text.into() }
}

impl ShapeProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        let (code, message, labels, help) = match self {
            ShapeProblem::PriorMissing { span, name, fitting: [a, b, c] } => (
                "H001",
                format!("the unknown `{name}` has no prior"),
                vec![label(*span, "`follows` is missing behind its type")],
                format!(
                    "say what was plausible before the data: `follows {a}`, `follows {b}` or `follows {c}`"
                ),
            ),
            ShapeProblem::LawMissing { span, name } => (
                "H002",
                format!("the response `{name}` does not say how it arises"),
                vec![label(*span, "`follows` is missing behind the column's name")],
                format!("add its distribution, such as `response {name} follows normal(mean: ..., sd: ...)`"),
            ),
            ShapeProblem::Arity { span, name, takes, found } => (
                "H003",
                format!("`{name}` takes {takes} {}, and {found} stand here", plural(*takes)),
                vec![label(*span, format!("{found} {}", plural(*found)))],
                match takes {
                    1 => format!("write `{name}(x)`"),
                    _ => format!(
                        "write `{name}(x, y)`; for more values nest the calls, `{name}(x, {name}(y, z))`"
                    ),
                },
            ),
            ShapeProblem::NamedArgument { span, function } => (
                "H004",
                format!("the arguments of the function `{function}` have no names"),
                vec![label(*span, "a plain expression is wanted here")],
                format!("write `{function}(x)`; names belong to the arguments of distributions"),
            ),
            ShapeProblem::WithoutOver { span, name } => (
                "H005",
                format!("`{name}` does not say over what"),
                vec![label(*span, "a group or a table is wanted")],
                format!("write `{name}(x over GROUP)` or `{name}(x over TABLE)`"),
            ),
            ShapeProblem::NotADistribution { span, declared } => (
                "H006",
                "a distribution is wanted behind `follows`".into(),
                vec![label(*span, "is not a distribution")],
                format!(
                    "write a distribution with its arguments, such as `normal(mean: 0, sd: 1)`; a quantity that is worked \
                     out is a `let {declared} = ...`"
                ),
            ),
            ShapeProblem::TruncatedTwice { span, first, end } => (
                "H007",
                format!("the {end} end of this distribution is set twice"),
                vec![label(*span, format!("the {end} end again")), label(*first, format!("the {end} end"))],
                "keep one of the two".into(),
            ),
            ShapeProblem::BoundedType { span, word, bounds, place } => (
                "H008",
                format!("the type `{word}` takes no bounds"),
                vec![label(*span, "only `real` takes bounds")],
                match place {
                    ConstantPlace::Column => {
                        format!("write both ends, which are then checked: `{word} {bounds}`")
                    }
                    ConstantPlace::Support | ConstantPlace::Default => {
                        format!(
                            "leave the bounds out here and cut the prior: `follows DISTRIBUTION(...) {bounds}`"
                        )
                    }
                },
            ),
            ShapeProblem::ResponseTwice { span, first, name } => (
                "H009",
                format!("the column `{name}` is a response twice"),
                vec![label(*span, "a second time"), label(*first, "the first time")],
                "keep one; two sources of the same reading are added up in one mean".into(),
            ),
            ShapeProblem::GivenPer { span, name } => (
                "H010",
                format!("the given `{name}` is a single number"),
                vec![label(*span, "`per` and `over` cannot stand here")],
                "for a known value of each label declare a table `per` the group with a column for it".into(),
            ),
            ShapeProblem::ArgumentPer { span, name } => (
                "H011",
                format!("the distribution `{name}` takes no `per`"),
                vec![label(*span, "a named argument is wanted here")],
                "`per` belongs to the type of an unknown: `unknown x : real per GROUP follows ...`".into(),
            ),
        };
        Report { code: Code(code), severity: Severity::Error, message, labels, help }
    }
}

fn plural(count: usize) -> &'static str {
    if count == 1 { "argument" } else { "arguments" }
}
