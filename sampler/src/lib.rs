//! A checked model and its data to draws and summaries.

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
