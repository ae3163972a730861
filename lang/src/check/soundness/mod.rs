//! What makes a model sound beyond its names and shapes: types against distributions, arguments against their domains, the
//! rungs of the ladder, and what the data can tell.

mod argument;
mod identity;
mod ladder;
mod range;
mod support;

use std::collections::HashSet;

use super::WrittenArgument;
use crate::arena::Id;
use crate::model::{Distribution, Model, Unknown};
use crate::problem::Problems;
use crate::span::FileId;

/// What earlier passes know.
pub(super) struct Known<'a> {
    /// The arguments of distributions as written.
    pub(super) arguments: &'a [WrittenArgument],
    /// Unknowns whose type has a mistake.
    pub(super) untyped: &'a HashSet<Id<Unknown>>,
    /// Whether declarations could not be read.
    pub(super) lost: bool,
}

/// Checks what a model says. Where it has mistakes already (or declarations were lost), only what stands in one declaration
/// is checked: types, arguments, priors.
pub(super) fn soundness(model: &Model, file: FileId, known: &Known<'_>, problems: &mut Problems) {
    let whole = !problems.has_errors() && !known.lost;
    argument::arguments(model, known.arguments, problems);
    support::priors(model, known.untyped, problems);
    support::responses(model, problems);
    if whole && !problems.has_errors() {
        identity::identity(model, file, problems);
        ladder::ladder(model, problems);
    }
}

/// Whether a distribution could be built; one that could not stands as a placeholder without parameters.
fn is_built(law: &Distribution) -> bool {
    law.parameters.len() == law.law.arity()
}
