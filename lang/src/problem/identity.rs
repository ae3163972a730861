//! Problems of what the data can tell (codes I...).

use super::{Code, Label, Page, Problem, Report, Severity};
use crate::span::Span;

/// Problems of what the data can tell.
#[derive(Clone, Debug)]
#[allow(missing_docs, reason = "the fields are what the variant's sentence names")]
pub enum IdentityProblem {
    /// A model without a response.
    NoResponse { span: Span },
    /// An unknown that reaches no response.
    Unreached { span: Span, name: String },
    /// Two unknowns that only their sum is known of.
    Alike { span: Span, name: String, other: String, first: Span, response: Span },
    /// An effect of each row beside a free residual.
    RowEffect { span: Span, name: String, response: Span },
    /// Levels with a fixed spread beside an intercept.
    FixedLevels { span: Span, name: String, intercept: String, first: Span },
}

impl From<IdentityProblem> for Problem {
    fn from(problem: IdentityProblem) -> Problem {
        Problem::Identity(problem)
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

impl IdentityProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        match self {
            IdentityProblem::NoResponse { span } => {
                let labels = vec![(*span, "a response is needed".to_string())];
                report(
                    "I001",
                    Severity::Error,
                    "the model has no response: nothing is learnt from data".to_string(),
                    labels,
                    "say how a column arises: `response honey follows normal(mean: ..., sd: ...)`"
                        .to_string(),
                )
            }
            IdentityProblem::Unreached { span, name } => {
                let labels = vec![(*span, "nothing that is measured depends on it".to_string())];
                report(
                    "I002",
                    Severity::Warning,
                    format!("`{name}` reaches no response: its posterior is its prior"),
                    labels,
                    "use it in the law of a response, or leave it out".to_string(),
                )
            }
            IdentityProblem::Alike { span, name, other, first, response } => {
                let labels = vec![
                    (*span, "this one".to_string()),
                    (*first, "and this one".to_string()),
                    (*response, "stand side by side here".to_string()),
                ];
                report("I003", Severity::Warning, format!("`{name}` and `{other}` cannot be told apart: the data know their sum only"), labels, "leave one of them out, or let something measured stand between them (a covariate, another group)".to_string())
            }
            IdentityProblem::RowEffect { span, name, response } => {
                let labels = vec![
                    (*span, "one for each row".to_string()),
                    (*response, "beside this residual".to_string()),
                ];
                report(
                    "I004",
                    Severity::Warning,
                    format!(
                        "`{name}` has a value for each row, beside a residual that is estimated: they cannot be told apart"
                    ),
                    labels,
                    "leave it out: the residual is what each row has of its own; or fix the residual's sd"
                        .to_string(),
                )
            }
            IdentityProblem::FixedLevels { span, name, intercept, first } => {
                let labels =
                    vec![(*span, "its spread is fixed".to_string()), (*first, "beside this".to_string())];
                report(
                    "I005",
                    Severity::Warning,
                    format!("the levels of `{name}` and `{intercept}` are told apart by their priors only"),
                    labels,
                    format!(
                        "give `{name}` a spread that is estimated (`sd: {name}_sd`), or leave `{intercept}` out"
                    ),
                )
            }
        }
    }
}

/// The pages of this family.
pub(super) const PAGES: &[Page] = &[
    Page {
        code: Code("I001"),
        title: "a model without a response",
        text: "A model says how at least one column of a table arises.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("I002"),
        title: "an unknown that reaches no response",
        text: "Data say something of an unknown only where the law of a response depends on it.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\nunknown spare : real follows normal(mean: 0, sd: 1)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("I003"),
        title: "terms that cannot be told apart",
        text: "Two unknowns over the same labels that are only ever added together share what the data say; only their priors tell them apart.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown other : real follows normal(mean: 0, sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + other + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("I004"),
        title: "an effect of each row beside a residual",
        text: "Where each row has an effect of its own and a residual of its own, the data know only their sum.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown own : real per harvest follows normal(mean: 0, sd: spread)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect + own, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("I005"),
        title: "fixed levels beside an intercept",
        text: "A level for each label, with a prior whose spread is fixed, and an intercept: what is added to the one can be taken from the others.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: 100)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
];
