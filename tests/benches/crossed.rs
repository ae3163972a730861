//! Effective draws a CPU second on a crossed normal model, against a single-site Gibbs sampler written by hand.
//!
//! y = mu + a[i] + b[j] + e, 10 x 5 labels, 250 rows; mu ~ normal(0, 10), the three sds half-normal(1); simulated with mu 2
//! and sds 0.8, 0.5, 0.7. Both samplers run in this process, one chain each; before a ratio is printed their means must
//! agree within 4 Monte Carlo standard errors.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::time::Instant;

use stook_lang::check::check_text;
use stook_sampler::bind;
use stook_sampler::numeric::stream::Stream;
use stook_sampler::run::{Options, Progress, Watch, fit};
use stook_sampler::summary::{Diagnosis, diagnose};
use stook_sampler::table::{self, Format};

const A: usize = 10;
const B: usize = 5;
const ROWS: usize = 250;
const MODEL: &str = "
group a
group b
table t { a, b, y : real }
unknown mu : real follows normal(mean: 0, sd: 10)
unknown sa : positive follows half_normal(sd: 1)
unknown sb : positive follows half_normal(sd: 1)
unknown se : positive follows half_normal(sd: 1)
unknown ea : real per a follows normal(mean: 0, sd: sa)
unknown eb : real per b follows normal(mean: 0, sd: sb)
response y follows normal(mean: mu + ea + eb, sd: se)
";

struct Row {
    a: usize,
    b: usize,
    y: f64,
}

fn data() -> Vec<Row> {
    let mut stream = Stream::new(2026, 0);
    let ea: Vec<f64> = (0..A).map(|_| 0.8 * stream.normal()).collect();
    let eb: Vec<f64> = (0..B).map(|_| 0.5 * stream.normal()).collect();
    (0..ROWS)
        .map(|row| {
            let (a, b) = (row % A, row / A % B);
            Row { a, b, y: 2.0 + ea[a] + eb[b] + 0.7 * stream.normal() }
        })
        .collect()
}

/// The scalars that are compared: mu, the three sds, one effect of each factor.
type Draws = [Vec<f64>; 6];

/// One at a time, looping over the rows; the log sds by slice.
fn textbook(rows: &[Row], sweeps: usize, warmup: usize) -> Draws {
    let mut stream = Stream::new(7, 0);
    let mut mu: f64;
    let (mut ea, mut eb) = ([0.0; A], [0.0; B]);
    let (mut sa, mut sb, mut se) = (1.0f64, 1.0f64, 1.0f64);
    let mut draws: Draws = Default::default();
    for sweep in 0..warmup + sweeps {
        let weight = 1.0 / (se * se);
        let sum: f64 = rows.iter().map(|row| row.y - ea[row.a] - eb[row.b]).sum();
        let precision = 0.01 + weight * ROWS as f64;
        mu = weight * sum / precision + stream.normal() / precision.sqrt();
        let (mut sums, mut counts) = ([0.0; A], [0.0; A]);
        for row in rows {
            sums[row.a] += row.y - mu - eb[row.b];
            counts[row.a] += 1.0;
        }
        for at in 0..A {
            let precision = 1.0 / (sa * sa) + weight * counts[at];
            ea[at] = weight * sums[at] / precision + stream.normal() / precision.sqrt();
        }
        let (mut sums, mut counts) = ([0.0; B], [0.0; B]);
        for row in rows {
            sums[row.b] += row.y - mu - ea[row.a];
            counts[row.b] += 1.0;
        }
        for at in 0..B {
            let precision = 1.0 / (sb * sb) + weight * counts[at];
            eb[at] = weight * sums[at] / precision + stream.normal() / precision.sqrt();
        }
        let squares: f64 = rows.iter().map(|row| (row.y - mu - ea[row.a] - eb[row.b]).powi(2)).sum();
        se = log_slice(se, ROWS as f64, squares, &mut stream);
        sa = log_slice(sa, A as f64, ea.iter().map(|e| e * e).sum(), &mut stream);
        sb = log_slice(sb, B as f64, eb.iter().map(|e| e * e).sum(), &mut stream);
        if sweep >= warmup {
            for (column, value) in draws.iter_mut().zip([mu, sa, sb, se, ea[0], eb[0]]) {
                column.push(value);
            }
        }
    }
    draws
}

/// A slice update of log s under a half-normal(1) prior, given `n` normals of sd s with this sum of squares.
fn log_slice(s: f64, n: f64, squares: f64, stream: &mut Stream) -> f64 {
    let density = |z: f64| {
        let s = z.exp();
        -0.5 * s * s + z - n * z - 0.5 * squares / (s * s)
    };
    let z = s.ln();
    let level = density(z) - stream.exponential();
    let mut low = z - 0.5 * stream.uniform();
    let mut high = low + 0.5;
    while density(low) > level {
        low -= 0.5;
    }
    while density(high) > level {
        high += 0.5;
    }
    loop {
        let trial = low + (high - low) * stream.uniform();
        if density(trial) > level {
            return trial.exp();
        }
        if trial < z {
            low = trial;
        } else {
            high = trial;
        }
    }
}

struct Silent;

impl Watch for Silent {
    fn progress(&self, _: Progress) {}
}

/// The same model by stook: its draws, and the CPU seconds of warm-up and draws.
fn stook(rows: &[Row], draws: usize, warmup: usize) -> (Draws, f64) {
    let model = check_text(MODEL).0.unwrap();
    let mut text = "a,b,y\n".to_string();
    for row in rows {
        text.push_str(&format!("{},{},{}\n", row.a, row.b, row.y));
    }
    let id = model.tables.ids().next().unwrap();
    let table =
        table::read(text.as_bytes(), "t.csv", &bind::requests(&model, id), &Format::default()).unwrap();
    let bound = bind::bind(model, vec![table], &[]).unwrap();
    let options = Options { seed: 3, chains: 1, warmup, draws, threads: 1 };
    let answer = fit(&bound, &options, &Silent).unwrap();
    let wanted = ["mu", "sa", "sb", "se", "ea[0]", "eb[0]"];
    let column = |name: &str| {
        let at = answer.draws.scalars.iter().position(|scalar| scalar.title() == name).unwrap();
        answer.draws.values[at].clone()
    };
    let seconds = answer.seconds.iter().filter(|(phase, _)| *phase != "summary").map(|(_, s)| s.cpu).sum();
    (wanted.map(column), seconds)
}

fn diagnoses(draws: &Draws) -> Vec<Diagnosis> {
    draws.iter().map(|column| diagnose(&[column]).unwrap()).collect()
}

fn smallest(diagnoses: &[Diagnosis]) -> f64 {
    diagnoses.iter().filter_map(|d| d.bulk_ess).fold(f64::INFINITY, f64::min)
}

fn main() {
    let rows = data();
    let (sweeps, kept, warmup) = (400_000, 40_000, 1_000);
    let start = Instant::now();
    let by_hand = textbook(&rows, sweeps, warmup);
    let hand_seconds = start.elapsed().as_secs_f64();
    let (by_stook, stook_seconds) = stook(&rows, kept, warmup);
    let (hand, ours) = (diagnoses(&by_hand), diagnoses(&by_stook));
    for (at, (a, b)) in hand.iter().zip(&ours).enumerate() {
        let error = a.mean_mcse.unwrap().hypot(b.mean_mcse.unwrap());
        assert!(
            (a.mean - b.mean).abs() < 4.0 * error,
            "scalar {at}: {} by hand, {} by stook",
            a.mean,
            b.mean
        );
    }
    println!("crossed normal, {A} x {B} labels, {ROWS} rows; the samplers agree on all means");
    println!("{:<12}{:>20}{:>18}{:>22}", "", "microseconds a sweep", "ESS a draw", "ESS a CPU second");
    let line = |name: &str, sweeps: usize, seconds: f64, ess: f64| {
        let each = 1e6 * seconds / (sweeps + warmup) as f64;
        println!("{name:<12}{each:>20.2}{:>18.4}{:>22.0}", ess / sweeps as f64, ess / seconds);
    };
    line("textbook", sweeps, hand_seconds, smallest(&hand));
    line("stook", kept, stook_seconds, smallest(&ours));
    let ratio = smallest(&ours) / stook_seconds / (smallest(&hand) / hand_seconds);
    println!("stook gives {ratio:.0} times as many effective draws a CPU second");
}
