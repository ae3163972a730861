//! Problems of distributions (codes D...).

use super::{Code, Label, Page, Problem, Report, Severity};
use crate::span::Span;

/// Problems of distributions.
#[derive(Clone, Debug)]
#[allow(missing_docs, reason = "the fields are what the variant's sentence names")]
pub enum DistributionProblem {
    /// An argument without a name.
    Positional { span: Span, family: &'static str, ways: String },
    /// An argument that the distribution does not have.
    UnknownArgument {
        span: Span,
        family: &'static str,
        name: String,
        nearest: Option<&'static str>,
        ways: String,
    },
    /// An argument given twice.
    ArgumentTwice { span: Span, name: String, first: Span },
    /// Two parameterisations mixed.
    Mixed { span: Span, family: &'static str, first: Span, ways: String },
    /// An argument missing.
    Missing { span: Span, family: &'static str, names: String, ways: String },
    /// A constant argument outside its domain.
    Impossible { span: Span, family: &'static str, value: String, must_be: &'static str },
    /// An argument that may leave its domain.
    MayLeave { span: Span, family: &'static str, must_be: &'static str, instead: String },
    /// An argument that perhaps leaves its domain.
    MightLeave { span: Span, family: &'static str, must_be: &'static str },
}

impl From<DistributionProblem> for Problem {
    fn from(problem: DistributionProblem) -> Problem {
        Problem::Distribution(problem)
    }
}

fn report(
    code: &'static str,
    severity: Severity,
    message: String,
    labels: Vec<(Span, String)>,
    help: String,
) -> Report {
    let labels = labels.into_iter().map(|(span, text)| Label { span, text }).collect();
    Report { code: Code(code), severity, message, labels, help }
}

impl DistributionProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        match self {
            DistributionProblem::Positional { span, family, ways } => {
                let labels = vec![(*span, "which argument is this?".to_string())];
                report(
                    "D001",
                    Severity::Error,
                    format!("every argument of `{family}` has a name"),
                    labels,
                    format!("write {ways}"),
                )
            }
            DistributionProblem::UnknownArgument { span, family, name, nearest, ways } => {
                let labels = vec![(*span, "this argument".to_string())];
                report(
                    "D002",
                    Severity::Error,
                    format!("`{family}` has no argument `{name}`"),
                    labels,
                    match nearest {
                        Some(nearest) => format!("write `{nearest}`; {family} is written {ways}"),
                        None => format!("write {ways}"),
                    },
                )
            }
            DistributionProblem::ArgumentTwice { span, name, first } => {
                let labels = vec![(*span, "again here".to_string()), (*first, "first here".to_string())];
                report(
                    "D003",
                    Severity::Error,
                    format!("`{name}` is given twice"),
                    labels,
                    "leave one out".to_string(),
                )
            }
            DistributionProblem::Mixed { span, family, first, ways } => {
                let labels = vec![(*span, "this one".to_string()), (*first, "and this one".to_string())];
                report(
                    "D004",
                    Severity::Error,
                    format!("these arguments of `{family}` belong to two ways of writing it"),
                    labels,
                    format!("write {ways}"),
                )
            }
            DistributionProblem::Missing { span, family, names, ways } => {
                let labels = vec![(*span, "here".to_string())];
                report(
                    "D005",
                    Severity::Error,
                    format!("`{family}` lacks {names}"),
                    labels,
                    format!("write {ways}"),
                )
            }
            DistributionProblem::Impossible { span, family, value, must_be } => {
                let labels = vec![(*span, "outside its domain".to_string())];
                report(
                    "D006",
                    Severity::Error,
                    format!("an argument of `{family}` is {value}, and it must be {must_be}"),
                    labels,
                    format!("give a value that is {must_be}"),
                )
            }
            DistributionProblem::MayLeave { span, family, must_be, instead } => {
                let labels = vec![(*span, "this may be outside".to_string())];
                report(
                    "D007",
                    Severity::Error,
                    format!("this argument of `{family}` must be {must_be}, and nothing keeps it there"),
                    labels,
                    instead.clone(),
                )
            }
            DistributionProblem::MightLeave { span, family, must_be } => {
                let labels = vec![(*span, "where this is outside, the density is zero".to_string())];
                report("D008", Severity::Warning, format!("this argument of `{family}` must be {must_be}, and that cannot be told from its parts"), labels, "write it so that it cannot leave: `exp(...)`, `logistic(...)`, `abs(...)`, or a log argument".to_string())
            }
        }
    }
}

/// The pages of this family.
pub(super) const PAGES: &[Page] = &[
    Page {
        code: Code("D001"),
        title: "an argument without a name",
        text: "Nothing tells whether `normal(m, s)` means a standard deviation, a variance or a precision. So every argument has a name.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("D002"),
        title: "an argument that the distribution does not have",
        text: "The message lists the ways to write the distribution.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(std: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("D003"),
        title: "an argument given twice",
        text: "Each argument is given once.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1, sd: 2)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("D004"),
        title: "two parameterisations mixed",
        text: "A distribution may be written in several ways, each with arguments of its own. They do not mix.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10, precision: 0.01)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("D005"),
        title: "an argument missing",
        text: "Every argument must be given, except an exposure, which is 1 where it is left out.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("D006"),
        title: "an argument outside its domain",
        text: "A standard deviation is above 0, a probability between 0 and 1, the lower end of a uniform below the upper one.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: -1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("D007"),
        title: "an argument that may leave its domain",
        text: "The type of an expression follows from those of its parts. A mean of a poisson made of real effects may fall below 0: then write its logarithm.",
        wrong: "group season\ntable t { season, n : count }\nunknown base : real follows normal(mean: 0, sd: 1)\nresponse n follows poisson(mean: base)\n",
        right: "group season\ntable t { season, n : count }\nunknown base : real follows normal(mean: 0, sd: 1)\nresponse n follows poisson(log_mean: base)\n",
    },
    Page {
        code: Code("D008"),
        title: "an argument that perhaps leaves its domain",
        text: "A difference of positive quantities may be negative. The fit gives such values no probability.",
        wrong: "table t { n : count, more : positive }\nunknown base : positive follows half_normal(sd: 10)\nresponse n follows poisson(mean: base - more)\n",
        right: "table t { n : count, more : positive }\nunknown base : positive follows half_normal(sd: 10)\nresponse n follows poisson(mean: base + more)\n",
    },
];
