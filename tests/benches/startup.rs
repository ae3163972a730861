//! From process start to the first draw of examples/honey. Goal: less than 50 ms.
//!
//! The benchmark starts itself anew as a child, which goes the way of a fit (read, check, bind, plan, compile, start, first sweep) and says
//! when its first draw is kept; the parent's clock runs from before the child is started until it hears of it.
#![allow(clippy::unwrap_used, clippy::panic)]

mod common;

use std::fs::File;
use std::io::{BufRead, BufReader, Write};
use std::path::PathBuf;
use std::process::{Command, Stdio};
use std::sync::Once;
use std::time::Instant;

use stook_sampler::run::{self, Options, Progress, Watch};
use stook_sampler::{bind, plan, program, table};

const CHILD: &str = "STOOK_BENCH_CHILD";
const TIMES: usize = 20;

fn main() {
    if std::env::var_os(CHILD).is_some() {
        return child();
    }
    println!(
        "examples/honey, from process start to the first draw, {TIMES} processes; goal: less than 50 ms\n"
    );
    let mut seen: Vec<(f64, String)> = (0..TIMES).map(|_| process()).collect();
    seen.sort_by(|a, b| a.0.total_cmp(&b.0));
    println!("| | ms | of these in the child |\n| --- | --- | --- |");
    for (name, (ms, parts)) in
        [("fastest", &seen[0]), ("median", &seen[TIMES / 2]), ("slowest", &seen[TIMES - 1])]
    {
        println!("| {name} | {ms:.2} | {parts} |");
    }
}

/// Milliseconds until a child says that it has its first draw, and what it says.
fn process() -> (f64, String) {
    let start = Instant::now();
    let mut child = Command::new(std::env::current_exe().unwrap())
        .env(CHILD, "1")
        .stdout(Stdio::piped())
        .spawn()
        .unwrap();
    let mut line = String::new();
    BufReader::new(child.stdout.take().unwrap()).read_line(&mut line).unwrap();
    let ms = start.elapsed().as_secs_f64() * 1e3;
    assert!(child.wait().unwrap().success());
    (ms, line.trim().to_string())
}

fn child() {
    let start = Instant::now();
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../examples/honey");
    let model = common::model(&std::fs::read_to_string(folder.join("honey.stook")).unwrap());
    let checked = start.elapsed();
    let tables = model.tables.iter().map(|(id, declared)| {
        let name = declared.file.as_ref().unwrap();
        let file = File::open(folder.join(name)).unwrap();
        table::read(file, name, &bind::requests(&model, id), &table::Format::default()).unwrap()
    });
    let tables = tables.collect();
    let read = start.elapsed();
    let bound = bind::bind(model, tables, &[]).unwrap();
    let after_bind = start.elapsed();
    let planned = plan::plan(&bound.model, Some(&bound)).unwrap();
    let after_plan = start.elapsed();
    std::hint::black_box(program::Program::new(&bound, &planned));
    let compiled = start.elapsed();
    let parts = format!(
        "check {:.2}, read {:.2}, bind {:.2}, plan {:.2}, compile {:.2}",
        checked.as_secs_f64() * 1e3,
        (read - checked).as_secs_f64() * 1e3,
        (after_bind - read).as_secs_f64() * 1e3,
        (after_plan - after_bind).as_secs_f64() * 1e3,
        (compiled - after_plan).as_secs_f64() * 1e3,
    );
    // `fit` plans and compiles once more, as the command line does, so that the time is rather too long.
    let options = Options { chains: 1, threads: 1, warmup: 0, draws: 20, ..Options::default() };
    let first = First { start, parts, said: Once::new() };
    let _ = run::fit(&bound, &options, &first);
}

/// Says once that there is a draw.
struct First {
    start: Instant,
    parts: String,
    said: Once,
}

impl Watch for First {
    fn progress(&self, progress: Progress) {
        if progress.phase == run::Phase::Draws {
            self.said.call_once(|| {
                println!("{}, all {:.2}", self.parts, self.start.elapsed().as_secs_f64() * 1e3);
                let _ = std::io::stdout().flush();
            });
        }
    }
}
