//! The model as a system of statements over one shared graph of expressions.
//!
//! Named expressions are written out where they are used, settings are numbers, equal expressions are one node. Analysis
//! (which mean is linear in what, which scale is a power of what) and compilation both read this form.

mod form;
mod graph;
mod pieces;
mod system;

pub use form::{Leaf, Linear, Monomial, linear, monomial};
pub use graph::{Graph, Node, Quantity, Sym};
pub use pieces::{Link, Piece, Pieces, prior_centre};
pub use system::{Statement, System, Target};
