//! A problem with data in prose: what is wrong, in which cells, and one way to mend it.

use stook_lang::problem::Code;
use stook_lang::span::Span;

/// A cell in a file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct DataPlace {
    /// The file.
    pub file: String,
    /// The line, from 1.
    pub line: usize,
    /// The column's heading.
    pub heading: String,
    /// What stands there.
    pub text: String,
}

/// A data problem in prose.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct DataReport {
    /// Its code.
    pub code: Code,
    /// What is wrong, in one sentence without a full stop.
    pub message: String,
    /// The first few cells.
    pub places: Vec<DataPlace>,
    /// How many cells there are beyond those.
    pub more: usize,
    /// The place in the model's text that is involved, if one is.
    pub span: Option<Span>,
    /// One way to mend it.
    pub help: String,
}
