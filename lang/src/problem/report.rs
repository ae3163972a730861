//! A problem as prose with its places.

use super::Code;
use crate::span::Span;

/// How bad it is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Severity {
    /// The model cannot be fitted.
    Error,
    /// The model can be fitted, but may not say what was meant.
    Warning,
}

/// A place with what is to be said of it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Label {
    /// The place.
    pub span: Span,
    /// What stands there or is wrong with it.
    pub text: String,
}

/// A problem in prose: what is wrong, where, and one way to mend it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Report {
    /// The problem's code.
    pub code: Code,
    /// How bad it is.
    pub severity: Severity,
    /// What is wrong, in one sentence without a full stop.
    pub message: String,
    /// Every place involved; the first is the main one. Never empty.
    pub labels: Vec<Label>,
    /// One way to mend it.
    pub help: String,
}
