//! Text to a checked model.
//!
//! ```
//! use stook_lang::check::check_text;
//! let (model, problems) = check_text(
//!     "table t { y : real }
//!      unknown m : real follows normal(mean: 0, sd: 10)
//!      response y follows normal(mean: m, sd: 1)",
//! );
//! assert!(problems.is_empty());
//! assert_eq!(model.map(|model| model.unknowns.len()), Some(1));
//! ```

pub mod arena;
pub mod check;
pub mod distribution;
pub mod model;
pub mod nearest;
pub mod problem;
pub mod span;
pub mod syntax;
