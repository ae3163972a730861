//! The declarations of a checked model.

use super::{Expression, Expressions, Support};
use crate::arena::{Arena, Id};
use crate::distribution::Law;
use crate::span::Span;

/// A checked model.
///
/// Arenas are in the order of the text, so that reports follow it; `named` and `unknowns` may refer to each other in any
/// order, but never in a cycle.
#[derive(Clone, Debug, Default)]
pub struct Model {
    /// The index sets.
    pub groups: Arena<Group>,
    /// The tables.
    pub tables: Arena<Table>,
    /// The columns of all tables.
    pub columns: Arena<Column>,
    /// The settings.
    pub givens: Arena<Given>,
    /// The quantities to estimate.
    pub unknowns: Arena<Unknown>,
    /// Lets, terms and derived quantities.
    pub named: Arena<Named>,
    /// The responses.
    pub responses: Vec<Response>,
    /// The rungs of the ladder, in order; empty without a ladder.
    pub ladder: Arena<Rung>,
    /// All expressions.
    pub expressions: Expressions,
}

/// An index set: a group's labels or a table's rows.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Index {
    /// The labels of a group.
    Group(Id<Group>),
    /// The rows of a table.
    Table(Id<Table>),
}

/// An index set of labels.
#[derive(Clone, Debug)]
pub struct Group {
    /// Its name.
    pub name: String,
    /// Where it is declared.
    pub span: Span,
    /// The `##` comment.
    pub documentation: Option<String>,
    /// The group that it is nested in: its labels are read inside the parent's.
    pub parent: Option<Id<Group>>,
    /// Whether its labels have an order.
    pub ordered: bool,
    /// Which labels it may have.
    pub labels: Labels,
}

/// Which labels a group may have.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Labels {
    /// Those that the data hold.
    Open,
    /// The whole numbers of a range, both ends included.
    Range(i64, i64),
    /// These and no others, in this order.
    Closed(Vec<String>),
}

/// The rows of a file.
#[derive(Clone, Debug)]
pub struct Table {
    /// Its name.
    pub name: String,
    /// Where it is declared.
    pub span: Span,
    /// The `##` comment.
    pub documentation: Option<String>,
    /// `per`: one row for each label of this group. The file has a key column for it (and for each of its ancestors).
    pub per: Option<Id<Group>>,
    /// The default file.
    pub file: Option<String>,
    /// Its columns in order: those written, and behind them the key columns that `per` asks for and that are not written.
    pub columns: Vec<Id<Column>>,
}

/// A column of a table.
#[derive(Clone, Debug)]
pub struct Column {
    /// Its name in the model.
    pub name: String,
    /// Where it is declared (for a key column that `per` implies: the table's `per`).
    pub span: Span,
    /// Its table.
    pub table: Id<Table>,
    /// Its heading in the file.
    pub heading: String,
    /// Labels or values.
    pub kind: ColumnKind,
}

/// What a column holds.
#[derive(Clone, Debug)]
pub enum ColumnKind {
    /// Labels of a group. For a nested group the labels are read inside those of the parent's column in the same row.
    Labels {
        /// The group.
        group: Id<Group>,
        /// Where the group is nested: the column of the same table that holds the parent's label.
        parent: Option<Id<Column>>,
    },
    /// Numbers.
    Values {
        /// Where they lie.
        support: Support,
        /// Their unit.
        unit: Option<String>,
        /// Whether cells may be missing.
        gaps: bool,
        /// `between`: checked when the data are read. Numbers and givens only.
        between: Option<(Id<Expression>, Id<Expression>)>,
    },
}

/// A setting.
#[derive(Clone, Debug)]
pub struct Given {
    /// Its name.
    pub name: String,
    /// Where it is declared.
    pub span: Span,
    /// The `##` comment.
    pub documentation: Option<String>,
    /// Where it may lie.
    pub support: Support,
    /// Its unit.
    pub unit: Option<String>,
    /// Its default: numbers and earlier givens only.
    pub default: Id<Expression>,
}

/// A quantity to estimate.
#[derive(Clone, Debug)]
pub struct Unknown {
    /// Its name.
    pub name: String,
    /// Where it is declared.
    pub span: Span,
    /// The `##` comment.
    pub documentation: Option<String>,
    /// Where it lies.
    pub support: Support,
    /// One element for each combination of the labels (rows) of these.
    pub dimensions: Vec<Index>,
    /// Its unit.
    pub unit: Option<String>,
    /// Its prior; the scope is `dimensions`.
    pub prior: Distribution,
    /// The update that the text demands.
    pub demand: Option<Demand>,
}

/// `by RULE`.
#[derive(Clone, Copy, Debug)]
pub struct Demand {
    /// The rule.
    pub rule: Rule,
    /// Where it is demanded.
    pub span: Span,
}

/// The update rules that a text can demand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Rule {
    /// Closed-form full conditional.
    Conjugate,
    /// Univariate slice sampling.
    Slice,
    /// The joint Gaussian block.
    Joint,
    /// Full conditional over a finite support.
    Enumerate,
}

/// A distribution in canonical parameters, with its truncation.
#[derive(Clone, Debug)]
pub struct Distribution {
    /// The canonical law.
    pub law: Law,
    /// The name that the text uses.
    pub name: &'static str,
    /// The canonical parameters, as many as the law has.
    pub parameters: Vec<Id<Expression>>,
    /// `above` or `between`: the truncation's lower end.
    pub low: Option<Id<Expression>>,
    /// `below` or `between`: the truncation's upper end.
    pub high: Option<Id<Expression>>,
    /// Where it stands.
    pub span: Span,
}

impl Distribution {
    /// The expressions that it is made of: parameters, then truncation.
    pub fn roots(&self) -> impl Iterator<Item = Id<Expression>> + '_ {
        self.parameters.iter().copied().chain(self.low).chain(self.high)
    }
}

/// A name for an expression.
#[derive(Clone, Debug)]
pub struct Named {
    /// Its name.
    pub name: String,
    /// Where it is declared.
    pub span: Span,
    /// The `##` comment.
    pub documentation: Option<String>,
    /// Let, term or derived.
    pub role: NamedRole,
    /// The index sets that it varies over: the scope of its value.
    pub dimensions: Vec<Index>,
    /// What it stands for.
    pub value: Id<Expression>,
}

/// What a name for an expression is for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NamedRole {
    /// `let`.
    Let,
    /// `term`: a ladder can leave it out.
    Term,
    /// `derive`: worked out for the report.
    Derive,
}

/// How a column arises.
#[derive(Clone, Debug)]
pub struct Response {
    /// The column.
    pub column: Id<Column>,
    /// How it arises; the scope is one row of the column's table.
    pub distribution: Distribution,
    /// The declaration.
    pub span: Span,
}

/// A rung of the ladder.
#[derive(Clone, Debug)]
pub struct Rung {
    /// Its name.
    pub name: String,
    /// Where it is declared.
    pub span: Span,
    /// The rung that it starts from.
    pub from: Option<Id<Rung>>,
    /// The terms that it names itself.
    pub adds: Vec<Id<Named>>,
    /// All its terms: those of `from` and its own.
    pub terms: Vec<Id<Named>>,
}

impl Model {
    /// The name of an index set.
    pub fn index_name(&self, index: Index) -> &str {
        match index {
            Index::Group(group) => &self.groups[group].name,
            Index::Table(table) => &self.tables[table].name,
        }
    }

    /// Whether a column's cells may be missing.
    pub fn has_gaps(&self, column: Id<Column>) -> bool {
        matches!(self.columns[column].kind, ColumnKind::Values { gaps: true, .. })
    }

    /// The response that a column is, if it is one.
    pub fn response_of(&self, column: Id<Column>) -> Option<&Response> {
        self.responses.iter().find(|response| response.column == column)
    }
}
