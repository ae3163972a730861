//! What the notation has and this version cannot do yet (codes U...): refused, never accepted and ignored.

use super::{Code, Label, Problem, Report, Severity};
use crate::span::Span;

/// A feature of the notation that this version does not have.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Feature {
    /// `part` and calls of parts.
    Part,
    /// `use`.
    Use,
    /// `shares`, `covariance`, `correlation`.
    MatrixType,
    /// `one of G`.
    LatentClass,
    /// `over G` behind a type or a response.
    DrawnTogether,
    /// `previous`, `next`, `starting`.
    Recursion,
    /// `holding`.
    Holding,
    /// `censored`, `known between`.
    Censoring,
    /// `mixture`, `zero_inflated`, `hurdle`.
    Mixture,
    /// A table per several groups.
    TablePerSeveral,
    /// `e.name`.
    Member,
    /// Distributions of vectors, matrices and classes.
    MatrixDistribution,
    /// Comparing two groups with each other.
    GroupComparison,
}

impl Feature {
    /// Every feature.
    pub const ALL: [Feature; 13] = [
        Feature::Part,
        Feature::Use,
        Feature::MatrixType,
        Feature::LatentClass,
        Feature::DrawnTogether,
        Feature::Recursion,
        Feature::Holding,
        Feature::Censoring,
        Feature::Mixture,
        Feature::TablePerSeveral,
        Feature::Member,
        Feature::MatrixDistribution,
        Feature::GroupComparison,
    ];

    /// Code, what is not supported, and what to write instead.
    fn text(self) -> (&'static str, &'static str, &'static str) {
        match self {
            Feature::Part => (
                "U001",
                "parts",
                "write the part out: an unknown for its sd, an unknown per group, and a `term` for their use",
            ),
            Feature::Use => ("U002", "using another model file", "copy its declarations into this file"),
            Feature::MatrixType => (
                "U003",
                "unknown shares, covariances and correlations",
                "declare independent unknowns, one for each value",
            ),
            Feature::LatentClass => {
                ("U004", "unknown labels", "if there are two classes, write `yesno` and choose with `if`")
            }
            Feature::DrawnTogether => (
                "U005",
                "quantities whose labels are drawn together",
                "declare one unknown or response for each label; they are then independent",
            ),
            Feature::Recursion => (
                "U006",
                "quantities that follow their own neighbour along a group",
                "declare independent effects: `unknown x : real per GROUP follows normal(mean: 0, sd: s)`",
            ),
            Feature::Holding => (
                "U007",
                "holding a label at a value",
                "give the effects a prior with mean 0; its spread then sets how far they go apart",
            ),
            Feature::Censoring => (
                "U008",
                "readings that a limit cut",
                "declare the column `with gaps` and leave the cut readings empty, and say so where you report the fit",
            ),
            Feature::Mixture => (
                "U009",
                "mixtures",
                "take one distribution with wider tails, such as student_t or negative_binomial",
            ),
            Feature::TablePerSeveral => (
                "U010",
                "tables per several groups",
                "declare a plain table with a column for each of the groups",
            ),
            Feature::Member => {
                ("U011", "reaching into a part", "declare the unknown in the model itself and use its name")
            }
            Feature::MatrixDistribution => (
                "U012",
                "distributions of vectors, matrices and classes",
                "take a distribution of single numbers for each value",
            ),
            Feature::GroupComparison => (
                "U013",
                "comparing the labels of two columns",
                "make a `yesno` column in the table that says whether the two are the same",
            ),
        }
    }
}

/// A feature is used that this version does not have.
#[derive(Clone, Copy, Debug)]
pub struct Unsupported {
    /// Which.
    pub feature: Feature,
    /// Where.
    pub span: Span,
}

impl From<Unsupported> for Problem {
    fn from(problem: Unsupported) -> Problem {
        Problem::Unsupported(problem)
    }
}

impl Unsupported {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        let (code, what, help) = self.feature.text();
        Report {
            code: Code(code),
            severity: Severity::Error,
            message: format!("{what}: not supported yet"),
            labels: vec![Label { span: self.span, text: "this version cannot do this".into() }],
            help: help.into(),
        }
    }
}
