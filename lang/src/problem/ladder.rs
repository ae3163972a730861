//! Problems of the ladder (codes L...).

use super::{Code, Label, Page, Problem, Report, Severity};
use crate::span::Span;

/// Problems of the ladder.
#[derive(Clone, Debug)]
#[allow(missing_docs, reason = "the fields are what the variant's sentence names")]
pub enum LadderProblem {
    /// Two rungs of one name.
    RungTwice { span: Span, name: String, first: Span },
    /// A rung with the same terms as another.
    Repeats { span: Span, name: String, other: String, first: Span },
    /// A rung that adds a term that it already has.
    AddsTwice { span: Span, term: String, rung: String, first: Span },
    /// A rung that leaves nothing to estimate.
    Nothing { span: Span, name: String },
    /// A rung that starts from another and adds nothing.
    AddsNothing { span: Span, name: String },
    /// A term that touches no response.
    Ineffective { span: Span, term: String, declared: Span },
}

impl From<LadderProblem> for Problem {
    fn from(problem: LadderProblem) -> Problem {
        Problem::Ladder(problem)
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

impl LadderProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        match self {
            LadderProblem::RungTwice { span, name, first } => {
                let labels = vec![(*span, "again here".to_string()), (*first, "first here".to_string())];
                report(
                    "L001",
                    Severity::Error,
                    format!("two rungs are named `{name}`"),
                    labels,
                    "give one of them another name".to_string(),
                )
            }
            LadderProblem::Repeats { span, name, other, first } => {
                let labels = vec![
                    (*span, "this rung has the same terms".to_string()),
                    (*first, "as this one".to_string()),
                ];
                report(
                    "L002",
                    Severity::Error,
                    format!("the rungs `{name}` and `{other}` are the same model"),
                    labels,
                    "leave one out, or let it add another term".to_string(),
                )
            }
            LadderProblem::AddsTwice { span, term, rung, first } => {
                let labels = vec![
                    (*span, "added again here".to_string()),
                    (*first, "it has it from here".to_string()),
                ];
                report(
                    "L003",
                    Severity::Error,
                    format!("`{rung}` already has `{term}`"),
                    labels,
                    "leave it out here".to_string(),
                )
            }
            LadderProblem::Nothing { span, name } => {
                let labels = vec![(*span, "without its terms no unknown reaches a response".to_string())];
                report(
                    "L004",
                    Severity::Error,
                    format!("the rung `{name}` leaves nothing to estimate"),
                    labels,
                    "keep at least one unknown outside the terms of the ladder, such as the grand mean"
                        .to_string(),
                )
            }
            LadderProblem::AddsNothing { span, name } => {
                let labels = vec![(*span, "it starts from another rung and stays there".to_string())];
                report(
                    "L005",
                    Severity::Error,
                    format!("the rung `{name}` adds nothing"),
                    labels,
                    "let it add a term: `adds season_dev`".to_string(),
                )
            }
            LadderProblem::Ineffective { span, term, declared } => {
                let labels =
                    vec![(*span, "added here".to_string()), (*declared, "declared here".to_string())];
                report(
                    "L006",
                    Severity::Error,
                    format!("adding `{term}` changes nothing: it reaches no response"),
                    labels,
                    "use it in the mean of a response, or leave it out of the ladder".to_string(),
                )
            }
        }
    }
}

/// The pages of this family.
pub(super) const PAGES: &[Page] = &[
    Page {
        code: Code("L001"),
        title: "two rungs of one name",
        text: "Each rung has a name of its own: folders and tables are named after it.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung plain\n    rung plain adds season_dev\n}\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung plain\n    rung seasons adds season_dev\n}\n",
    },
    Page {
        code: Code("L002"),
        title: "a rung that repeats another",
        text: "Two rungs with the same terms are one model.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung plain\n    rung seasons adds season_dev\n    rung again adds season_dev\n}\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung plain\n    rung seasons adds season_dev\n}\n",
    },
    Page {
        code: Code("L003"),
        title: "a term added twice",
        text: "A rung has the terms of the rung that it starts from.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung seasons adds season_dev\n    rung more from seasons adds season_dev\n}\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung plain\n    rung seasons from plain adds season_dev\n}\n",
    },
    Page {
        code: Code("L004"),
        title: "a rung that leaves nothing to estimate",
        text: "A rung holds the terms that it does not have at zero. What is left must have an unknown that reaches a response.",
        wrong: "group season\ntable harvest { season, honey : real }\nunknown effect : real per season follows normal(mean: 0, sd: 5)\nterm season_dev = effect\nresponse honey follows normal(mean: season_dev, sd: 1)\nladder {\n    rung plain\n    rung seasons adds season_dev\n}\n",
        right: "group season\ntable harvest { season, honey : real }\nunknown effect : real per season follows normal(mean: 0, sd: 5)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = effect\nresponse honey follows normal(mean: season_dev, sd: noise)\nladder {\n    rung plain\n    rung seasons adds season_dev\n}\n",
    },
    Page {
        code: Code("L005"),
        title: "a rung that adds nothing",
        text: "Only the first rung may have no terms: the model without any term of the ladder.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung seasons adds season_dev\n    rung same from seasons\n}\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung plain\n    rung seasons adds season_dev\n}\n",
    },
    Page {
        code: Code("L006"),
        title: "a term that changes nothing",
        text: "A term of a ladder must be part of what a response depends on.",
        wrong: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nresponse honey follows normal(mean: grand + season_effect, sd: noise)\nterm season_dev = season_effect\nladder {\n    rung plain\n    rung seasons adds season_dev\n}\n",
        right: "group season\ngroup apiary\ntable harvest {\n    season, apiary\n    honey : real\n}\nunknown grand : real follows normal(mean: 0, sd: 10)\nunknown season_effect : real per season follows normal(mean: 0, sd: spread)\nunknown spread : positive follows half_normal(sd: 3)\nunknown noise : positive follows half_normal(sd: 1)\nterm season_dev = season_effect\nresponse honey follows normal(mean: grand + season_dev, sd: noise)\nladder {\n    rung plain\n    rung seasons adds season_dev\n}\n",
    },
];
