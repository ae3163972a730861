//! Problems: what can be wrong with a model, as data.
//!
//! A problem carries what went wrong and where; its prose is made in [`Problem::report`], at the edge, so that the
//! terminal, the editor and the tests are served by the same value. Each family of problems is one file that holds its
//! data, its prose and its pages for `explain`.

mod distribution;
mod explain;
mod identity;
mod ladder;
mod name;
mod page;
mod path;
mod render;
mod report;
mod shape;
mod structure;
mod support;
mod syntax;
mod unsupported;

pub use distribution::DistributionProblem;
pub use identity::IdentityProblem;
pub use ladder::LadderProblem;
pub use name::{NameKind, NameProblem, Wanted};
pub use page::{Page, page, pages};
pub use path::PathProblem;
pub use render::{count, json_line, render};
pub use report::{Label, Report, Severity};
pub use shape::ShapeProblem;
pub use structure::{ConstantPlace, StructureProblem};
pub use support::SupportProblem;
pub use syntax::SyntaxProblem;
pub use unsupported::{Feature, Unsupported};

pub(crate) use path::varies_over;

use crate::span::Span;

/// The code of a problem, such as `Y001`: one letter for the family and three digits.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Code(pub &'static str);

/// Something wrong with a model text.
#[derive(Clone, Debug)]
pub enum Problem {
    /// The text does not follow the grammar.
    Syntax(SyntaxProblem),
    /// A distribution is not written as it can be.
    Distribution(DistributionProblem),
    /// The data cannot tell what is asked.
    Identity(IdentityProblem),
    /// The ladder has a mistake.
    Ladder(LadderProblem),
    /// A name is wrong.
    Name(NameProblem),
    /// A call, a type, a prior or a response is put together wrongly.
    Shape(ShapeProblem),
    /// A group, a table or a setting is declared wrongly.
    Structure(StructureProblem),
    /// A use finds no element of a quantity, or more than one.
    Path(PathProblem),
    /// A type and a distribution do not fit.
    Support(SupportProblem),
    /// The notation has it, this version not yet.
    Unsupported(Unsupported),
}

impl Problem {
    /// The problem as prose with its places.
    pub fn report(&self) -> Report {
        match self {
            Problem::Syntax(problem) => problem.report(),
            Problem::Distribution(problem) => problem.report(),
            Problem::Identity(problem) => problem.report(),
            Problem::Ladder(problem) => problem.report(),
            Problem::Name(problem) => problem.report(),
            Problem::Shape(problem) => problem.report(),
            Problem::Structure(problem) => problem.report(),
            Problem::Path(problem) => problem.report(),
            Problem::Support(problem) => problem.report(),
            Problem::Unsupported(problem) => problem.report(),
        }
    }

    /// The main place.
    pub fn span(&self) -> Span {
        self.report().labels[0].span
    }
}

/// The problems of one run, in the order in which they were found.
#[derive(Clone, Debug, Default)]
pub struct Problems {
    list: Vec<Problem>,
}

impl Problems {
    /// Adds one.
    pub fn add(&mut self, problem: impl Into<Problem>) {
        self.list.push(problem.into());
    }

    /// Adds all of another list.
    pub fn extend(&mut self, other: Problems) {
        self.list.extend(other.list);
    }

    /// The reports sorted by place, then code; the same report is given once.
    pub fn reports(&self) -> Vec<Report> {
        let mut reports: Vec<Report> = self.list.iter().map(Problem::report).collect();
        reports.sort_by(|a, b| (a.labels[0].span, a.code).cmp(&(b.labels[0].span, b.code)));
        reports.dedup();
        reports
    }

    /// Whether one of them is an error (and not a warning).
    pub fn has_errors(&self) -> bool {
        self.list.iter().any(|problem| problem.report().severity == Severity::Error)
    }

    /// How many there are.
    pub fn len(&self) -> usize {
        self.list.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.list.is_empty()
    }
}
