//! A checked model and its data to draws and summaries.
//!
//! ```
//! use stook_sampler::run::{Options, Progress, Watch, fit};
//! use stook_sampler::{bind, table};
//!
//! struct Silent;
//! impl Watch for Silent {
//!     fn progress(&self, _: Progress) {}
//! }
//!
//! let text = "table t { y : real }
//!             unknown m : real follows normal(mean: 0, sd: 10)
//!             response y follows normal(mean: m, sd: 1)";
//! let model = stook_lang::check::check_text(text).0.expect("no mistakes");
//! let requests = model.tables.ids().map(|id| bind::requests(&model, id)).next().unwrap_or_default();
//! let read = table::read(&b"y\n1.5\n2.5\n"[..], "t.csv", &requests, &table::Format::default()).expect("a table");
//! let bound = bind::bind(model, vec![read], &[]).expect("data that fit the model");
//! let answer = fit(&bound, &Options { draws: 500, ..Options::default() }, &Silent).expect("draws");
//! assert!((answer.summary[0].mean - 2.0).abs() < 0.2);
//! ```

pub mod answer;
pub mod bind;
pub mod distribution;
pub mod draws;
pub mod numeric;
pub mod plan;
pub mod program;
pub mod report;
pub mod rule;
pub mod run;
pub mod simulate;
pub mod summary;
pub mod symbolic;
pub mod table;
