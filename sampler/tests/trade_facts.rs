//! What teachers of mixed models show in a lecture room, on simulated crossed data (common practice, no single source).
//!
//! Readings y = grand + season + apiary + noise with true sds 2, 1.5 and 1: 8 seasons by 8 apiaries, 4 readings each, all
//! invented here by a fixed seed. As the real effects are added (plain, one factor, both): the grand mean hardly moves and
//! its interval widens, the residual sd shrinks to its truth, DIC falls. An interval for a new reading is wider than the one
//! for a mean, and the variance by source comes near what was simulated.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::sync::OnceLock;

use stook_lang::check::check_text;
use stook_sampler::answer::{Answer, Interval, Source};
use stook_sampler::bind;
use stook_sampler::numeric::stream::Stream;
use stook_sampler::run::{Options, Progress, Watch, fit};
use stook_sampler::table::{self, Format};

const MODEL: &str = "group season
group apiary
table harvest { season, apiary, honey : real }
unknown grand : real follows normal(mean: 20, sd: 20)
unknown season_sd : positive follows half_normal(sd: 5)
unknown apiary_sd : positive follows half_normal(sd: 5)
unknown noise : positive follows half_normal(sd: 5)
unknown season_part : real per season follows normal(mean: 0, sd: season_sd)
unknown apiary_part : real per apiary follows normal(mean: 0, sd: apiary_sd)
term season_dev = season_part
term apiary_dev = apiary_part
response honey follows normal(mean: grand + season_dev + apiary_dev, sd: noise)
ladder {
    rung plain
    rung seasons adds season_dev
    rung both adds season_dev, apiary_dev
}
";

const LABELS: usize = 8;
const READINGS: usize = 4;
const GRAND: f64 = 20.0;
const TRUTH: [f64; 3] = [2.0, 1.5, 1.0];

struct Silent;

impl Watch for Silent {
    fn progress(&self, _: Progress) {}
}

fn sd(values: &[f64]) -> f64 {
    let mean = values.iter().sum::<f64>() / values.len() as f64;
    (values.iter().map(|x| (x - mean) * (x - mean)).sum::<f64>() / (values.len() - 1) as f64).sqrt()
}

/// The table, and the sds among the simulated seasons, apiaries and errors.
fn simulated() -> (String, [f64; 3]) {
    let mut stream = Stream::new(2024, 0);
    let mut effects = |sd: f64| -> Vec<f64> { (0..LABELS).map(|_| sd * stream.normal()).collect() };
    let (seasons, apiaries) = (effects(TRUTH[0]), effects(TRUTH[1]));
    let mut text = "season,apiary,honey\n".to_string();
    let mut errors = vec![];
    for (season, season_part) in seasons.iter().enumerate() {
        for (apiary, apiary_part) in apiaries.iter().enumerate() {
            for _ in 0..READINGS {
                let error = TRUTH[2] * stream.normal();
                errors.push(error);
                text +=
                    &format!("{},a{apiary},{}\n", 2011 + season, GRAND + season_part + apiary_part + error);
            }
        }
    }
    (text, [sd(&seasons), sd(&apiaries), sd(&errors)])
}

/// The fits of the rungs plain, seasons and both.
fn fits() -> &'static [Answer] {
    static FITS: OnceLock<Vec<Answer>> = OnceLock::new();
    FITS.get_or_init(|| {
        let (model, problems) = check_text(MODEL);
        let model = model.unwrap_or_else(|| panic!("{:#?}", problems.reports()));
        let (text, _) = simulated();
        let climb = model.ladder.ids().map(|rung| {
            let (model, _) = model.at_rung(rung);
            let id = model.tables.ids().next().unwrap();
            let table =
                table::read(text.as_bytes(), "harvest.csv", &bind::requests(&model, id), &Format::default())
                    .unwrap();
            let bound = bind::bind(model, vec![table], &[]).unwrap();
            let options = Options { seed: 5, chains: 4, warmup: 500, draws: 1500, threads: 2 };
            let answer = fit(&bound, &options, &Silent).unwrap();
            assert!(answer.verdict.converged(), "{:?}", answer.verdict);
            answer
        });
        climb.collect()
    })
}

/// Mean, sd and 95 % width of a scalar.
fn scalar(answer: &Answer, name: &str) -> (f64, f64, f64) {
    let at = answer.draws.scalars.iter().position(|scalar| scalar.title() == name).unwrap();
    let found = &answer.summary[at];
    (found.mean, found.sd.unwrap(), found.q97_5 - found.q2_5)
}

fn source<'a>(answer: &'a Answer, name: &str) -> &'a Source {
    let sources = &answer.sources[0].sources;
    sources
        .iter()
        .find(|source| source.name == name)
        .unwrap_or_else(|| panic!("{:?}", sources.iter().map(|source| &source.name).collect::<Vec<_>>()))
}

fn width(interval: &Interval) -> f64 {
    interval.high - interval.low
}

/// Balanced data: the mean of all readings is the estimate at every rung. The prior, and effects shrunk towards it, move it
/// by less than half of the sd that the last rung gives it.
#[test]
fn the_grand_mean_hardly_moves_and_its_interval_widens() {
    let found: Vec<(f64, f64, f64)> = fits().iter().map(|answer| scalar(answer, "grand")).collect();
    let sd = found[2].1;
    for (mean, ..) in &found {
        assert!((mean - found[0].0).abs() < 0.5 * sd, "{found:?}");
    }
    // 8 seasons instead of 256 readings: the first step is large. The second is small; its sds have Monte Carlo errors of
    // about 1.2 % each (common rule: 1 / sqrt(2 ESS), ESS about 4,000), and the sd grows by a tenth.
    assert!(found[1].2 > 3.0 * found[0].2, "{found:?}");
    assert!(found[2].2 > found[1].2 && found[2].1 > 1.03 * found[1].1, "{found:?}");
    assert!((found[2].0 - GRAND).abs() < 3.0 * sd, "{found:?}");
}

/// The plain residual holds all three sources: sqrt(4 + 2.25 + 1) is 2.7 in the truth.
#[test]
fn the_residual_sd_shrinks_to_its_truth() {
    let found: Vec<(f64, f64, f64)> = fits().iter().map(|answer| scalar(answer, "noise")).collect();
    assert!(found[1].0 < 0.9 * found[0].0 && found[2].0 < 0.9 * found[1].0, "{found:?}");
    // Within 4 posterior sds: a false-alarm rate of about 6e-5 over seeds.
    assert!((found[2].0 - TRUTH[2]).abs() < 4.0 * found[2].1, "{found:?}");
}

/// By more than 10 at each step, the common rule for a difference that counts.
#[test]
fn the_information_criteria_fall() {
    let dic: Vec<f64> = fits().iter().map(|answer| answer.criteria.dic.dic).collect();
    let waic: Vec<f64> = fits().iter().map(|answer| answer.criteria.waic.waic).collect();
    for found in [&dic, &waic] {
        assert!(found[0] - found[1] > 10.0 && found[1] - found[2] > 10.0, "{dic:?} {waic:?}");
    }
    // Effective parameters: 2 in the plain model, and near 2 + 7 + 7 in the last.
    let effective = |at: usize| fits()[at].criteria.dic.p_dic;
    assert!((effective(0) - 2.0).abs() < 0.3, "{}", effective(0));
    assert!((effective(2) - 16.0).abs() < 1.5, "{}", effective(2));
}

#[test]
fn a_new_reading_is_less_certain_than_a_mean() {
    for answer in &fits()[1..] {
        for row in answer.groups.iter().flat_map(|table| &table.rows) {
            assert_eq!(row.readings, LABELS * READINGS);
            assert!(width(&row.reading) > 2.0 * width(&row.mean), "{row:?}");
            // About the same centre: within 6 Monte Carlo standard errors of the reading.
            assert!((row.reading.mean - row.mean.mean).abs() < 6.0 * row.reading.mcse.max(0.05), "{row:?}");
            // A reading scatters by at least the noise: 3.92 times its sd, less a tenth.
            assert!(width(&row.reading) > 0.9 * 3.92 * TRUTH[2], "{row:?}");
        }
    }
}

/// The sds among the labels at hand are known well: 32 readings each, so an error of about 1 / sqrt(32) = 0.18, of which
/// an sd among 8 labels keeps about 0.18 / sqrt(14) = 0.05: 0.2 is four of them.
#[test]
fn finite_population_sds_are_the_simulated_ones() {
    let (_, truth) = simulated();
    let names = ["season_dev", "apiary_dev", "residual"];
    for (name, truth) in names.iter().zip(truth) {
        let found = source(&fits()[2], name);
        assert!((found.finite_sd - truth).abs() < 0.2, "{name}: {} for {truth}", found.finite_sd);
        // The superpopulation's sd is less certain than that of the labels at hand.
        assert!(found.sd.low < truth && truth < found.sd.high, "{name}: {:?} for {truth}", found.sd);
    }
}

#[test]
fn variance_shares_add_up_and_hold_the_truth() {
    let total: f64 = TRUTH.iter().map(|sd| sd * sd).sum();
    let mut sum = 0.0;
    for (name, sd) in ["season_dev", "apiary_dev", "residual"].iter().zip(TRUTH) {
        let share = source(&fits()[2], name).share;
        sum += share.mean;
        assert!(share.low < sd * sd / total && sd * sd / total < share.high, "{name}: {share:?}");
    }
    assert!((sum - 1.0).abs() < 1e-9);
    let largest: f64 = fits()[2].sources[0].sources.iter().map(|source| source.p_largest).sum();
    assert!((largest - 1.0).abs() < 1e-9);
}
