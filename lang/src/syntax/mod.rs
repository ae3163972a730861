//! Text to a syntax tree.

mod parse;
mod token;
pub mod tree;

pub use parse::parse;
pub use tree::Tree;
