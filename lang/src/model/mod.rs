//! The checked model: what the text means.
//!
//! Groups, tables, settings, unknowns, named expressions and responses, with every path from a place to a group found,
//! every distribution in canonical parameters, and a span behind everything that a later message may have to name.

mod expression;
mod function;
mod rung;
mod structure;
mod support;

pub use expression::{
    Access, BinaryOperator, Expression, Expressions, Place, Reducer, Step, UnaryOperator, Variable,
};
pub use function::Function;
pub use rung::Pruned;
pub use structure::{
    Column, ColumnKind, Demand, Distribution, Given, Group, Index, Labels, Model, Named, NamedRole, Response,
    Rule, Rung, Table, Unknown,
};
pub use support::Support;
