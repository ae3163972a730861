//! Demands that cannot be met (codes P...).

use stook_lang::problem::{Code, Label, Page, Report, Severity};
use stook_lang::span::Span;

/// A demanded update that cannot be had.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct PlanProblem {
    /// The unknown.
    pub unknown: String,
    /// The rule that is demanded.
    pub rule: &'static str,
    /// Where it is demanded.
    pub demand: Span,
    /// The statement that stands in the way.
    pub statement: Span,
    /// The distribution of the unknown and the distribution that stands in the way, where they are two.
    pub pair: (String, Option<String>),
    /// Why.
    pub reason: String,
    /// What would do instead.
    pub instead: String,
}

impl PlanProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        let (prior, child) = &self.pair;
        let (what, place) = match child {
            Some(child) => (
                format!(
                    "`{}` has a {prior} prior and stands in a {child}: that pair has no update `by {}`",
                    self.unknown, self.rule
                ),
                format!("this {child}: {}", self.reason),
            ),
            None => (format!("`{}` cannot be updated `by {}`", self.unknown, self.rule), self.reason.clone()),
        };
        Report {
            code: Code("P001"),
            severity: Severity::Error,
            message: what,
            labels: vec![
                Label { span: self.demand, text: "demanded here".into() },
                Label { span: self.statement, text: place },
            ],
            help: self.instead.clone(),
        }
    }
}

/// The pages of this family.
pub fn pages() -> &'static [Page] {
    &[Page {
        code: Code("P001"),
        title: "an update that is demanded and cannot be had",
        text: "`by conjugate`, `by joint` and `by enumerate` ask for an exact update that exists only for some pairs of a \
               prior and what stands below it. Without a demand the compiler chooses, and `plan` says what it chose.",
        wrong: "table readings {\n    level : real\n}\nunknown centre : real follows normal(mean: 0, sd: 10)\nunknown spread : positive follows half_normal(sd: 1) by conjugate\nresponse level follows normal(mean: centre, sd: spread)\n",
        right: "table readings {\n    level : real\n}\nunknown centre : real follows normal(mean: 0, sd: 10)\nunknown exactness : positive follows gamma(shape: 2, rate: 1) by conjugate\nresponse level follows normal(mean: centre, precision: exactness)\n",
    }]
}
