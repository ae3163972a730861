//! Outside checks: the posterior that the program draws against references that owe nothing to it.
//!
//! Each folder of `tests/outside` holds a model, its data, `reference.py` (closed forms and quadrature) and the `expected.json` that it wrote. A case
//! is fitted with a fixed seed; each mean, sd and quantile must lie within 4 Monte Carlo standard errors of the reference.
//!
//! Under a right program and normal errors one comparison fails by chance once in 15,800 (2 * normal_cdf(-4) = 6.3e-5). There are
//! about 490 comparisons, so that a change of the draws fails somewhere by chance about 3 times in 100; with the draws
//! unchanged the outcome is always the same. The draws are 4 chains of 5,000; each quantity must have at least 400 effective ones, so that no
//! comparison passes for want of precision.

#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use serde_json::Value;
use std::path::Path;
use stook_tests::{Row, crate_folder, read_table, stook};

const CHAINS: &str = "4";
const WARMUP: &str = "1000";
const DRAWS: &str = "5000";
const ALL_DRAWS: f64 = 20_000.0;
/// How many Monte Carlo standard errors a comparison may be off.
const LIMIT: f64 = 4.0;
const LEAST_ESS: f64 = 400.0;

/// One test for each case, and the list of all of them.
macro_rules! cases {
    (fit: $($fit:ident)*; climb: $($climb:ident)*) => {
        const CASES: &[&str] = &[$(stringify!($fit),)* $(stringify!($climb),)*];
        $(#[test] fn $fit() { check_fit(stringify!($fit)); })*
        $(#[test] fn $climb() { check_climb(stringify!($climb)); })*
    };
}

cases! {
    fit:
        anova_offset
        anova_resistivity
        beta_binomial
        beta_shares
        cauchy_nickel
        crossed_assays
        exponential_gamma
        failures_ships
        gamma_airplane
        gamma_poisson
        laplace_darwin
        logistic_shuttle
        lognormal_airplane
        meta_vaccine
        negative_binomial_mites
        negative_binomial_size
        nested_casks
        normal_inverse_gamma
        normal_known_sd
        one_way_resistivity
        one_way_turnip
        poisson_trend
        probit_menarche
        regression_norris
        student_t_darwin
        truncated_normal
        weibull_bearings;
    climb:
        criteria_one_mean
}

#[test]
fn every_folder_is_a_case() {
    let mut folders: Vec<String> = std::fs::read_dir(crate_folder().join("outside"))
        .unwrap()
        .map(|entry| entry.unwrap())
        .filter(|entry| entry.path().join("model.stook").is_file())
        .map(|entry| entry.file_name().into_string().unwrap())
        .collect();
    folders.sort();
    let mut cases = CASES.to_vec();
    cases.sort_unstable();
    assert_eq!(folders, cases);
}

fn check_fit(case: &str) {
    let (expected, run) = run_case(case, "fit");
    let rows = read_table(&run.path().join("summary.csv")).unwrap();
    let entries = list(&expected["expected"]);
    assert!(!entries.is_empty());
    let found: Vec<String> = entries.iter().flat_map(|entry| judge(entry, row_of(&rows, entry))).collect();
    assert!(found.is_empty(), "{case}: {}\n{}", expected["source"], found.join("\n"));
}

fn check_climb(case: &str) {
    let (expected, run) = run_case(case, "climb");
    let ladder = read_table(&run.path().join("ladder.csv")).unwrap();
    let mut found = Vec::new();
    for rung in list(&expected["ladder"]) {
        let name = rung["rung"].as_str().unwrap();
        let row =
            ladder.iter().find(|row| row["rung"] == name).unwrap_or_else(|| panic!("{case}: no rung {name}"));
        let ess = smallest_ess(&read_table(&run.path().join(name).join("summary.csv")).unwrap());
        for criterion in ["dic", "p_dic", "waic", "p_waic"] {
            // The reference's error is that of independent draws.
            let error = number(&rung[criterion]["mcse"]) * (ALL_DRAWS / ess).sqrt();
            let off = (cell(row, criterion) - number(&rung[criterion]["value"])) / error;
            note(&mut found, &format!("{name} {criterion}"), off);
        }
    }
    assert!(found.is_empty(), "{case}: {}\n{}", expected["source"], found.join("\n"));
}

/// Runs the program on a case and gives the reference and the run folder.
fn run_case(case: &str, command: &str) -> (Value, tempfile::TempDir) {
    let folder = crate_folder().join("outside").join(case);
    let expected =
        serde_json::from_str(&std::fs::read_to_string(folder.join("expected.json")).unwrap()).unwrap();
    let run = tempfile::tempdir().unwrap();
    let output = stook()
        .unwrap()
        .arg(command)
        .arg(folder.join("model.stook"))
        .arg("--out")
        .arg(run.path())
        .args(["--seed", "1", "--chains", CHAINS, "--warmup", WARMUP, "--draws", DRAWS, "--quiet"])
        .output()
        .unwrap();
    let said = String::from_utf8_lossy(&output.stderr);
    assert_eq!(output.status.code(), Some(0), "{case}: the exit status; the program said:\n{said}");
    (expected, run)
}

/// What is wrong with a row of the summary, one line for each comparison that is off.
fn judge(expected: &Value, row: &Row) -> Vec<String> {
    let mut found = Vec::new();
    let what = format!("{}[{}]", row["quantity"], row["labels"]);
    let sd = number(&expected["sd"]);
    let ess = cell(row, "bulk_ess").min(cell(row, "tail_ess")).min(ALL_DRAWS);
    if !(ess >= LEAST_ESS && cell(row, "split_rhat") < 1.02) {
        found.push(format!("{what}: only {ess} effective draws, R-hat {}", row["split_rhat"]));
    }
    // The program's own error of the mean, but no larger than its effective draws allow.
    let mean_error = cell(row, "mean_mcse").min(1.5 * sd / ess.sqrt());
    note(&mut found, &format!("{what} mean"), (cell(row, "mean") - number(&expected["mean"])) / mean_error);
    // The delta method on the sample variance, whose variance is (kurtosis - 1) sd^4 / n.
    let sd_error = sd * ((number(&expected["kurtosis"]) - 1.0) / (4.0 * ess)).sqrt();
    note(&mut found, &format!("{what} sd"), (cell(row, "sd") - sd) / sd_error);
    for (quantile, heading) in list(&expected["quantiles"]).iter().zip(["q2_5", "q25", "q50", "q75", "q97_5"])
    {
        let p = number(&quantile["p"]);
        // On the probability scale, to second order, because far out the density changes within a few errors.
        let step = cell(row, heading) - number(&quantile["value"]);
        let moved = number(&quantile["density"]) * step + 0.5 * number(&quantile["slope"]) * step * step;
        let moved = if moved * step < 0.0 { number(&quantile["density"]) * step } else { moved };
        note(&mut found, &format!("{what} {heading}"), moved / (p * (1.0 - p) / ess).sqrt());
    }
    found
}

/// Adds a line where a comparison is off by more than the limit, or is no number.
fn note(found: &mut Vec<String>, what: &str, off: f64) {
    // `!(..)` so that NaN counts as off.
    let right = off.abs() <= LIMIT;
    if !right {
        found.push(format!("{what}: off by {off:.2} Monte Carlo standard errors"));
    }
}

fn row_of<'a>(rows: &'a [Row], entry: &Value) -> &'a Row {
    let (quantity, labels) = (entry["quantity"].as_str().unwrap(), entry["labels"].as_str().unwrap());
    rows.iter()
        .find(|row| row["quantity"] == quantity && row["labels"] == labels)
        .unwrap_or_else(|| panic!("the summary has no row for {quantity}[{labels}]"))
}

fn smallest_ess(rows: &[Row]) -> f64 {
    rows.iter().map(|row| cell(row, "bulk_ess").min(cell(row, "tail_ess"))).fold(ALL_DRAWS, f64::min)
}

fn cell(row: &Row, heading: &str) -> f64 {
    row[heading]
        .parse()
        .unwrap_or_else(|_| panic!("{heading} of {} is no number: {}", row["quantity"], row[heading]))
}

fn number(value: &Value) -> f64 {
    value.as_f64().unwrap()
}

fn list(value: &Value) -> &[Value] {
    value.as_array().map(Vec::as_slice).unwrap_or_default()
}

/// The judge itself: a summary that is the reference passes, and each column that is moved by 5 errors is found.
#[test]
fn the_judge_finds_what_is_moved() {
    let path = crate_folder().join("outside/normal_known_sd/expected.json");
    assert!(Path::new(&path).is_file());
    let expected: Value = serde_json::from_str(&std::fs::read_to_string(path).unwrap()).unwrap();
    let entry = &expected["expected"][0];
    let exact = exact_row(entry);
    assert_eq!(judge(entry, &exact), Vec::<String>::new());

    let sd = number(&entry["sd"]);
    let error = sd / ALL_DRAWS.sqrt();
    // In units of sd / sqrt(draws): the standard errors of a normal's mean, sd and quantiles.
    let columns = [
        ("mean", 1.0),
        ("sd", std::f64::consts::FRAC_1_SQRT_2),
        ("q2_5", 2.6713),
        ("q25", 1.3626),
        ("q50", 1.2533),
        ("q75", 1.3626),
        ("q97_5", 2.6713),
    ];
    for (heading, unit) in columns {
        for (errors, wrong) in [(3.0, 0), (-3.0, 0), (5.0, 1), (-5.0, 1)] {
            let mut row = exact.clone();
            row.insert(heading.to_owned(), (cell(&exact, heading) + errors * unit * error).to_string());
            assert_eq!(judge(entry, &row).len(), wrong, "{heading} moved by {errors} errors");
        }
        let mut row = exact.clone();
        row.insert(heading.to_owned(), "NaN".to_owned());
        assert_eq!(judge(entry, &row).len(), 1, "{heading} is NaN");
    }
}

/// The row that a perfect run of independent draws would give.
fn exact_row(entry: &Value) -> Row {
    let sd = number(&entry["sd"]);
    let mut row: Row = [
        ("quantity", "earth"),
        ("labels", ""),
        ("split_rhat", "1"),
        ("bulk_ess", "20000"),
        ("tail_ess", "20000"),
    ]
    .map(|(heading, text)| (heading.to_owned(), text.to_owned()))
    .into();
    row.insert("mean".to_owned(), entry["mean"].to_string());
    row.insert("sd".to_owned(), entry["sd"].to_string());
    row.insert("mean_mcse".to_owned(), (sd / ALL_DRAWS.sqrt()).to_string());
    for (quantile, heading) in list(&entry["quantiles"]).iter().zip(["q2_5", "q25", "q50", "q75", "q97_5"]) {
        row.insert(heading.to_owned(), quantile["value"].to_string());
    }
    row
}
