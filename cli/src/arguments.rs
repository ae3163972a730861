//! What can be said on the command line.

use std::path::PathBuf;
use std::str::FromStr;

use clap::{Args, Parser, Subcommand, ValueEnum};

/// How much of the variation belongs to each grouping: fits a model file to tables of grouped measurements.
#[derive(Debug, Parser)]
#[command(name = "stook", version, after_help = EXIT_STATUS)]
pub(crate) struct Arguments {
    /// What is to be done.
    #[command(subcommand)]
    pub(crate) command: Command,
}

const EXIT_STATUS: &str = "\
Exit status: 0 done (and converged), 1 a mistake in the model or the data, or a file that cannot be read or written, \
2 a mistake on the command line, 3 not converged.

Problems are written to standard error, everything else to standard output. With --message-format json, problems are \
written to standard output, one JSON object a line, and nothing else is.";

/// The commands.
#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Find the mistakes in a model file
    Check(CheckArguments),
    /// Show what will update each unknown, and why
    Plan(PlanArguments),
    /// Fit a model (or one rung of its ladder) to its tables
    Fit(FitArguments),
    /// Fit the rungs of a model's ladder one after the other and set them side by side
    Climb(ClimbArguments),
    /// Explain the code of a problem
    Explain(ExplainArguments),
    /// Draw data from a model and write them as tables
    Simulate(SimulateArguments),
}

/// The model file and how its problems are told.
#[derive(Args, Debug)]
pub(crate) struct ModelArguments {
    /// The model file
    #[arg(value_name = "MODEL")]
    pub(crate) model: PathBuf,
    #[command(flatten)]
    pub(crate) messages: MessageArguments,
}

/// How problems are told.
#[derive(Args, Clone, Copy, Debug)]
pub(crate) struct MessageArguments {
    /// Show problems only, and the verdict where a fit has not converged
    #[arg(long, short)]
    pub(crate) quiet: bool,
    /// How problems are written: for people to standard error, or as one JSON object a line to standard output
    #[arg(long, value_name = "FORMAT", value_enum, default_value_t = MessageFormat::Human)]
    pub(crate) message_format: MessageFormat,
}

/// How problems are written.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(crate) enum MessageFormat {
    /// For people.
    Human,
    /// One JSON object a line.
    Json,
}

/// Where the data come from.
#[derive(Args, Clone, Debug, Default)]
pub(crate) struct DataArguments {
    /// The file of a table (CSV or TSV, from the working folder) [default: the file that the model names, from the model
    /// file's folder]
    #[arg(long = "table", value_name = "NAME=FILE")]
    pub(crate) tables: Vec<Setting<PathBuf>>,
    /// The value of a setting that the model declares with `given`
    #[arg(long = "set", value_name = "GIVEN=VALUE", value_parser = finite)]
    pub(crate) settings: Vec<Setting<f64>>,
    /// A cell text that means a missing cell, as an empty one always does; can be repeated [default: NA]
    #[arg(long = "gap", value_name = "TEXT")]
    pub(crate) gaps: Vec<String>,
}

/// How chains are run.
#[derive(Args, Clone, Debug)]
pub(crate) struct ChainArguments {
    /// The seed: the same seed gives the same draws, with any number of threads
    #[arg(long, value_name = "NUMBER", default_value_t = 1)]
    pub(crate) seed: u64,
    /// How many chains
    #[arg(long, value_name = "NUMBER", default_value_t = 4, value_parser = chains)]
    pub(crate) chains: usize,
    /// Sweeps of each chain before draws are kept
    #[arg(long, value_name = "NUMBER", default_value_t = 1000, value_parser = sweeps)]
    pub(crate) warmup: usize,
    /// Draws that each chain keeps
    #[arg(long, value_name = "NUMBER", default_value_t = 2500, value_parser = draws)]
    pub(crate) draws: usize,
    /// Threads that the chains are shared among [default: the processor's cores, at most one for each chain]
    #[arg(long, value_name = "NUMBER", value_parser = chains)]
    pub(crate) threads: Option<usize>,
}

/// `stook check`.
#[derive(Args, Debug)]
pub(crate) struct CheckArguments {
    #[command(flatten)]
    pub(crate) model: ModelArguments,
    /// Check that the ladder has this rung
    #[arg(long, value_name = "NAME")]
    pub(crate) rung: Option<String>,
    #[command(flatten)]
    pub(crate) data: DataArguments,
}

/// `stook plan`.
#[derive(Args, Debug)]
pub(crate) struct PlanArguments {
    #[command(flatten)]
    pub(crate) model: ModelArguments,
    /// The rung of the ladder [default: the whole model]
    #[arg(long, value_name = "NAME")]
    pub(crate) rung: Option<String>,
    #[command(flatten)]
    pub(crate) data: DataArguments,
}

/// `stook fit`.
#[derive(Args, Debug)]
pub(crate) struct FitArguments {
    #[command(flatten)]
    pub(crate) model: ModelArguments,
    /// The rung of the ladder to fit [default: the whole model]
    #[arg(long, value_name = "NAME")]
    pub(crate) rung: Option<String>,
    #[command(flatten)]
    pub(crate) data: DataArguments,
    #[command(flatten)]
    pub(crate) chains: ChainArguments,
    /// The folder for the results [default: MODEL-fit in the working folder]; an earlier one of stook's is replaced
    #[arg(long, value_name = "FOLDER")]
    pub(crate) out: Option<PathBuf>,
}

/// `stook climb`.
#[derive(Args, Debug)]
pub(crate) struct ClimbArguments {
    #[command(flatten)]
    pub(crate) model: ModelArguments,
    /// The rung to climb to [default: the last]
    #[arg(long, value_name = "NAME")]
    pub(crate) rung: Option<String>,
    #[command(flatten)]
    pub(crate) data: DataArguments,
    #[command(flatten)]
    pub(crate) chains: ChainArguments,
    /// The folder for the results [default: MODEL-climb in the working folder]; an earlier one of stook's is replaced
    #[arg(long, value_name = "FOLDER")]
    pub(crate) out: Option<PathBuf>,
}

/// `stook explain`.
#[derive(Args, Debug)]
pub(crate) struct ExplainArguments {
    /// The code, such as Y001; without it all codes are listed
    #[arg(value_name = "CODE")]
    pub(crate) code: Option<String>,
}

/// `stook simulate`.
#[derive(Args, Debug)]
pub(crate) struct SimulateArguments {
    #[command(flatten)]
    pub(crate) model: ModelArguments,
    /// The rung of the ladder to draw from [default: the whole model]
    #[arg(long, value_name = "NAME")]
    pub(crate) rung: Option<String>,
    #[command(flatten)]
    pub(crate) data: DataArguments,
    /// How many labels a group gets (inside each parent, where it is nested); tables with a column of its labels are then
    /// laid out with every combination of their labels, unless their file is named with --table
    #[arg(long = "labels", value_name = "GROUP=NUMBER")]
    pub(crate) labels: Vec<Setting<usize>>,
    /// How many rows each combination of labels gets in a table that is laid out [default: 1]
    #[arg(long = "rows", value_name = "TABLE=NUMBER")]
    pub(crate) rows: Vec<Setting<usize>>,
    /// The seed: the same seed draws the same data
    #[arg(long, value_name = "NUMBER", default_value_t = 1)]
    pub(crate) seed: u64,
    /// The folder for the tables [default: MODEL-simulated in the working folder]; an earlier one of stook's is replaced
    #[arg(long, value_name = "FOLDER")]
    pub(crate) out: Option<PathBuf>,
}

/// `NAME=VALUE`.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Setting<T> {
    /// The name.
    pub(crate) name: String,
    /// The value.
    pub(crate) value: T,
}

impl<T: FromStr> FromStr for Setting<T>
where
    T::Err: std::fmt::Display,
{
    type Err = String;

    fn from_str(text: &str) -> Result<Setting<T>, String> {
        let (name, value) = text.split_once('=').ok_or("there is no `=` between a name and a value")?;
        if name.trim().is_empty() {
            return Err("there is no name before the `=`".into());
        }
        if value.trim().is_empty() {
            return Err("there is no value behind the `=`".into());
        }
        let value = value.trim().parse().map_err(|problem| format!("`{}`: {problem}", value.trim()))?;
        Ok(Setting { name: name.trim().to_string(), value })
    }
}

/// More sweeps than this are a slip of the finger: their draws would not fit into memory.
const MOST_SWEEPS: usize = 10_000_000;
/// The same for chains and threads.
const MOST_CHAINS: usize = 1000;

fn sweeps(text: &str) -> Result<usize, String> {
    at_most(text, MOST_SWEEPS)
}

fn draws(text: &str) -> Result<usize, String> {
    at_least_one(sweeps(text)?)
}

fn chains(text: &str) -> Result<usize, String> {
    at_least_one(at_most(text, MOST_CHAINS)?)
}

fn at_most(text: &str, most: usize) -> Result<usize, String> {
    match text.parse() {
        Ok(number) if number > most => Err(format!("at most {most} can be asked for")),
        Ok(number) => Ok(number),
        Err(_) => Err("a whole number is needed".into()),
    }
}

fn at_least_one(number: usize) -> Result<usize, String> {
    if number == 0 { Err("at least 1 is needed".into()) } else { Ok(number) }
}

fn finite(text: &str) -> Result<Setting<f64>, String> {
    let setting: Setting<f64> = text.parse()?;
    if setting.value.is_finite() { Ok(setting) } else { Err("the value must be a finite number".into()) }
}

impl DataArguments {
    /// Whether the command line says anything of data.
    pub(crate) fn is_said(&self) -> bool {
        !(self.tables.is_empty() && self.settings.is_empty() && self.gaps.is_empty())
    }

    /// The settings by name.
    pub(crate) fn settings(&self) -> Vec<(String, f64)> {
        self.settings.iter().map(|setting| (setting.name.clone(), setting.value)).collect()
    }
}

impl ChainArguments {
    /// The options of a run.
    pub(crate) fn options(&self) -> stook_sampler::run::Options {
        let cores = std::thread::available_parallelism().map_or(1, |cores| cores.get());
        stook_sampler::run::Options {
            seed: self.seed,
            chains: self.chains,
            warmup: self.warmup,
            draws: self.draws,
            threads: self.threads.unwrap_or(cores).min(self.chains),
        }
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use clap::CommandFactory;

    #[test]
    fn the_definition_is_sound() {
        Arguments::command().debug_assert();
    }

    #[test]
    fn a_setting_is_split_at_the_first_equals_sign() {
        let setting: Setting<String> = "harvest=a=b.csv".parse().unwrap();
        assert_eq!(setting, Setting { name: "harvest".into(), value: "a=b.csv".into() });
    }

    #[test]
    fn a_setting_needs_a_name_and_a_number() {
        for text in ["typical", "=3", "typical=", "typical=many"] {
            assert!(text.parse::<Setting<f64>>().is_err(), "{text}");
        }
    }
}
