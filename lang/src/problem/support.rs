//! Problems of types against distributions (codes S...).

use super::{Code, Label, Page, Problem, Report, Severity};
use crate::span::Span;

/// Problems of types against distributions.
#[derive(Clone, Debug)]
#[allow(missing_docs, reason = "the fields are what the variant's sentence names")]
pub enum SupportProblem {
    /// A prior that reaches outside the type.
    PriorSupport { span: Span, name: String, kind: String, law: &'static str, declared: Span, mends: String },
    /// A discrete prior of a continuous unknown, or the reverse.
    PriorKind { span: Span, name: String, kind: String, law: &'static str, declared: Span },
    /// A truncation that leaves nothing.
    Truncation { span: Span, law: &'static str },
    /// A response whose law does not fit its column.
    ResponseKind {
        span: Span,
        name: String,
        law: &'static str,
        kind: String,
        declared: Span,
        instead: String,
    },
}

impl From<SupportProblem> for Problem {
    fn from(problem: SupportProblem) -> Problem {
        Problem::Support(problem)
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

impl SupportProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        match self {
            SupportProblem::PriorSupport { span, name, kind, law, declared, mends } => {
                let labels = vec![
                    (*span, format!("`{law}` gives values that are not {kind}")),
                    (*declared, format!("declared {kind} here")),
                ];
                report(
                    "S001",
                    Severity::Error,
                    format!("the prior of `{name}` reaches outside its type"),
                    labels,
                    mends.clone(),
                )
            }
            SupportProblem::PriorKind { span, name, kind, law, declared } => {
                let labels = vec![
                    (*span, format!("`{law}` gives other values")),
                    (*declared, format!("declared {kind} here")),
                ];
                report(
                    "S002",
                    Severity::Error,
                    format!("`{name}` is {kind}, and its prior is not"),
                    labels,
                    if kind == "count" || kind == "yesno" {
                        "take a prior that gives whole numbers: bernoulli, binomial, poisson or negative_binomial; or declare it `real` or `positive`".to_string()
                    } else {
                        "declare it `count` (or `yesno`), or take a prior that is not for whole numbers"
                            .to_string()
                    },
                )
            }
            SupportProblem::Truncation { span, law } => {
                let labels = vec![(*span, "no value lies between these ends".to_string())];
                report(
                    "S003",
                    Severity::Error,
                    format!("this truncation of `{law}` leaves nothing"),
                    labels,
                    "mend the ends: the lower one first, and within what the distribution gives".to_string(),
                )
            }
            SupportProblem::ResponseKind { span, name, law, kind, declared, instead } => {
                let labels = vec![
                    (*span, "this distribution".to_string()),
                    (*declared, format!("declared {kind} here")),
                ];
                report(
                    "S004",
                    Severity::Error,
                    format!("`{law}` does not fit the column `{name}`, which is {kind}"),
                    labels,
                    instead.clone(),
                )
            }
        }
    }
}

/// The pages of this family.
pub(super) const PAGES: &[Page] = &[
    Page {
        code: Code("S001"),
        title: "a prior that reaches outside the type",
        text: "A positive unknown with a normal prior would be negative half of the time. Either truncate the prior (`above 0`), or change the type.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows normal(mean: 0, sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows normal(mean: 0, sd: 1) above 0\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("S002"),
        title: "whole numbers against others",
        text: "Counts and yesnos have priors of whole numbers, other types have not.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows poisson(mean: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("S003"),
        title: "a truncation that leaves nothing",
        text: "`between a and b` must hold some of what the distribution can give.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1) below -1\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1) below 1\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\n",
    },
    Page {
        code: Code("S004"),
        title: "a distribution that does not fit its column",
        text: "A poisson gives counts, a bernoulli yes or no, a gamma positive values, a beta fractions. The column is declared so.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nresponse honey follows poisson(log_mean: grand + season_effect)\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : count\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nresponse honey follows poisson(log_mean: grand + season_effect)\n",
    },
];
