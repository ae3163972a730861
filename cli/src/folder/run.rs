//! `run.json`: what was run, on what, how it went, and how long it took.

use std::io::Write;
use std::path::Path;

use serde::Serialize;
use serde_json::{Value, json};
use stook_sampler::answer::{Answer, Seconds};
use stook_sampler::run::Options;

use super::write_file;
use crate::report::Failure;

/// A file that was read.
#[derive(Clone, Debug, Serialize)]
pub(crate) struct DataFile {
    /// The table that it holds; empty for the model.
    #[serde(skip_serializing_if = "String::is_empty")]
    pub(crate) table: String,
    /// Its path.
    pub(crate) file: String,
    /// The SHA-256 of its bytes, hexadecimal.
    pub(crate) sha256: String,
}

/// Where results come from.
#[derive(Clone, Debug)]
pub(crate) struct Origin {
    /// The command.
    pub(crate) command: &'static str,
    /// The model file.
    pub(crate) model: DataFile,
    /// The rung, if one was asked for.
    pub(crate) rung: Option<String>,
    /// The tables' files.
    pub(crate) data: Vec<DataFile>,
    /// The value of every setting.
    pub(crate) settings: Vec<(String, f64)>,
    /// The cell texts that mean a missing cell.
    pub(crate) gaps: Vec<String>,
    /// How the chains were run.
    pub(crate) options: Options,
}

/// Seconds of the phases before the sampler's own.
#[derive(Clone, Copy, Debug, Default)]
pub(crate) struct Phases {
    /// Reading model and tables.
    pub(crate) read: Seconds,
    /// Binding them.
    pub(crate) bind: Seconds,
    /// Choosing the updates.
    pub(crate) plan: Seconds,
}

pub(super) fn write(path: &Path, answer: &Answer, origin: &Origin, phases: &Phases) -> Result<(), Failure> {
    let mut seconds = serde_json::Map::new();
    let before = [("read", phases.read), ("bind", phases.bind), ("plan", phases.plan)];
    for (phase, spent) in before.into_iter().chain(answer.seconds.iter().copied()) {
        seconds.insert(phase.into(), json!(spent));
    }
    let mut value = head(origin);
    value["options"] = json!({
        "chains": origin.options.chains,
        "warmup": origin.options.warmup,
        "draws": origin.options.draws,
        "threads": origin.options.threads,
        "gaps": origin.gaps,
    });
    value["convergence"] = convergence(answer);
    value["criteria"] = json!({
        "dic": answer.criteria.dic.dic,
        "p_dic": answer.criteria.dic.p_dic,
        "waic": answer.criteria.waic.waic,
        "p_waic": answer.criteria.waic.p_waic,
        "waic_se": answer.criteria.waic.se,
        "waic_doubtful_observations": answer.criteria.waic.doubtful,
        "observations": answer.criteria.waic.pointwise.len(),
    });
    value["seconds"] = Value::Object(seconds);
    write_value(path, &value)
}

pub(super) fn write_simulated(path: &Path, files: &[String], origin: &Origin) -> Result<(), Failure> {
    let mut value = head(origin);
    value["tables_written"] = json!(files);
    write_value(path, &value)
}

fn head(origin: &Origin) -> Value {
    let settings: serde_json::Map<String, Value> =
        origin.settings.iter().map(|(name, value)| (name.clone(), json!(value))).collect();
    json!({
        "command": origin.command,
        "versions": {
            "stook": env!("CARGO_PKG_VERSION"),
            "system": std::env::consts::OS,
            "processor": std::env::consts::ARCH,
        },
        "model": origin.model,
        "rung": origin.rung,
        "data": origin.data,
        "settings": settings,
        "seed": origin.options.seed,
    })
}

fn convergence(answer: &Answer) -> Value {
    let verdict = &answer.verdict;
    let failures: Vec<Value> = verdict
        .failures
        .iter()
        .map(|failure| {
            let scalar = &answer.draws.scalars[failure.scalar];
            json!({
                "quantity": scalar.quantity,
                "labels": scalar.labels.join("/"),
                "split_rhat": failure.split_rhat,
                "bulk_ess": failure.bulk_ess,
                "tail_ess": failure.tail_ess,
                "too_few_draws": failure.too_few_draws,
            })
        })
        .collect();
    json!({
        "converged": verdict.converged(),
        "rule": verdict.rule,
        "judged": verdict.judged,
        "constant": verdict.constant,
        "failures": failures,
    })
}

fn write_value(path: &Path, value: &Value) -> Result<(), Failure> {
    write_file(path, |file| {
        serde_json::to_writer_pretty(&mut *file, value)?;
        file.write_all(b"\n")
    })
}
