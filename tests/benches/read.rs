//! How fast a table of 10 million rows (two label columns and a number, 158 MB) is read, and in what memory.
//!
//! `cargo bench -p stook-tests --bench read [FILE]`; with a FILE the table is written there and kept, so
//! that another reader can be timed on it. `benches/read.sh` does both and prints the ratio.

use std::error::Error;
use std::fs::{self, File};
use std::io::{BufWriter, Write};
use std::path::Path;
use std::time::Instant;

use stook_sampler::table::{Column, Format, Kind, Request, Table, read};

const ROWS: u32 = 10_000_000;

fn requests() -> Vec<Request> {
    let request = |heading: &str, kind| Request { heading: heading.to_string(), kind };
    vec![request("apiary", Kind::Labels), request("hive", Kind::Labels), request("honey", Kind::Numbers)]
}

fn main() -> Result<(), Box<dyn Error>> {
    let folder = tempfile::tempdir()?;
    // Cargo hands `--bench` to every benchmark.
    let given = std::env::args().skip(1).find(|argument| !argument.starts_with('-'));
    let path = given.map_or_else(|| folder.path().join("harvest.csv"), Into::into);
    if !path.exists() {
        write_table(&path)?;
    }
    let bytes = fs::metadata(&path)?.len();
    println!("{ROWS} rows, {:.1} MB", bytes as f64 / 1e6);
    for threads in [1, 2] {
        let seconds = best_of_three(&path, threads)?;
        println!(
            "stook {threads} threads: {seconds:.3} s, {:.1} million rows/s",
            f64::from(ROWS) / seconds / 1e6
        );
    }
    println!("peak memory: {:.0} MB", peak_memory()? / 1e6);
    Ok(())
}

/// Writes the table: 50 apiaries, 1,000 hives and honey with three decimals, all invented.
fn write_table(path: &Path) -> Result<(), Box<dyn Error>> {
    let mut out = BufWriter::with_capacity(1 << 20, File::create(path)?);
    writeln!(out, "apiary,hive,honey")?;
    let mut state = 20_260_501_u64;
    for _ in 0..ROWS {
        // The multiplier and increment of Knuth, MMIX (TAOCP 2, 3.3.4, table 1).
        state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        let (apiary, hive, grams) = ((state >> 58) % 50, (state >> 40) % 1000, (state >> 20) % 80_000);
        writeln!(out, "a{apiary:02},h{hive:03},{}.{:03}", grams / 1000, grams % 1000)?;
    }
    Ok(out.flush()?)
}

fn best_of_three(path: &Path, threads: usize) -> Result<f64, Box<dyn Error>> {
    let mut best = f64::INFINITY;
    for _ in 0..3 {
        let start = Instant::now();
        let table = read_once(path, threads)?;
        best = best.min(start.elapsed().as_secs_f64());
        check(&table)?;
    }
    Ok(best)
}

fn read_once(path: &Path, threads: usize) -> Result<Table, Box<dyn Error>> {
    let format = Format { threads, ..Format::default() };
    let told = |problems: Vec<stook_sampler::table::TableProblem>| {
        problems.iter().map(|problem| problem.report().message).collect::<Vec<_>>().join("\n").into()
    };
    read(File::open(path)?, "harvest.csv", &requests(), &format).map_err(told)
}

/// What was timed must be the whole table.
fn check(table: &Table) -> Result<(), Box<dyn Error>> {
    match table.columns.as_slice() {
        [
            Column::Labels { labels: apiaries, .. },
            Column::Labels { labels: hives, .. },
            Column::Numbers { values },
        ] if values.len() == ROWS as usize && apiaries.len() == 50 && hives.len() == 1000 => Ok(()),
        _ => Err("the table was not read as it was written".into()),
    }
}

/// The largest resident size of this process so far, in bytes (Linux).
fn peak_memory() -> Result<f64, Box<dyn Error>> {
    let status = fs::read_to_string("/proc/self/status")?;
    let line = status.lines().find_map(|line| line.strip_prefix("VmHWM:")).ok_or("no VmHWM")?;
    let kilobytes: f64 = line.trim().trim_end_matches("kB").trim().parse()?;
    Ok(kilobytes * 1024.0)
}
