//! The pages that `explain` prints, one file for each family: each with a wrong and a right model, which the tests check.

pub(super) mod name;
pub(super) mod path;
pub(super) mod shape;
pub(super) mod structure;
pub(super) mod unsupported;
