//! Text to a checked model.

pub mod arena;
pub mod check;
pub mod distribution;
pub mod model;
pub mod nearest;
pub mod problem;
pub mod span;
pub mod syntax;
