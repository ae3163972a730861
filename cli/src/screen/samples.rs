//! Answers made by hand for the snapshots of the screens.

use stook_sampler::answer::{
    Answer, Criteria, GroupRow, GroupTable, Interval, Scale, Seconds, Source, Sources,
};
use stook_sampler::draws::{Draws, Scalar, ScalarKind};
use stook_sampler::summary::criteria::{Dic, Waic};
use stook_sampler::summary::{Diagnosis, Rule, converged};

use crate::ladder::{Fitted, Shared};

fn interval(mean: f64, half: f64) -> Interval {
    Interval { mean, mcse: half / 100.0, low: mean - half, high: mean + half }
}

fn diagnosis(mean: f64, sd: f64, rhat: f64, worth: f64) -> Diagnosis {
    let mcse = sd / worth.sqrt();
    Diagnosis {
        chains: 4,
        draws: 2500,
        mean,
        mean_mcse: Some(mcse),
        sd: Some(sd),
        sd_mcse: Some(mcse),
        q2_5: mean - 1.96 * sd,
        q25: mean - 0.67 * sd,
        q50: mean,
        q75: mean + 0.67 * sd,
        q97_5: mean + 1.96 * sd,
        quantile_mcse: Some([2.67 * mcse, 1.4 * mcse, 1.3 * mcse, 1.4 * mcse, 2.67 * mcse]),
        split_rhat: Some(rhat),
        bulk_ess: Some(worth),
        tail_ess: Some(worth * 0.9),
    }
}

fn source(name: &str, over: Option<&str>, sd: f64, share: f64, p_largest: f64) -> Source {
    Source {
        name: name.into(),
        over: over.map(str::to_string),
        sd: Interval { mean: sd, mcse: sd / 150.0, low: 0.6 * sd, high: 1.7 * sd },
        share: Interval { mean: share, mcse: share / 150.0, low: 0.6 * share, high: (1.4 * share).min(0.95) },
        finite_sd: 0.94 * sd,
        p_largest,
    }
}

fn group(group: &str, labels: usize) -> GroupTable {
    let row = |at: usize| GroupRow {
        label: if group == "hive" { format!("Heath/{}", at + 1) } else { format!("{}", 2012 + at) },
        readings: 12 + (7 * at) % 11,
        mean: interval(24.6 + ((at * 5) % 9) as f64 - 4.0, 2.3),
        reading: interval(24.6 + ((at * 5) % 9) as f64 - 4.0, 9.7),
    };
    GroupTable {
        response: "honey".into(),
        unit: Some("kg".into()),
        group: group.into(),
        rows: (0..labels).map(row).collect(),
    }
}

fn criteria(dic: f64, waic: f64) -> Criteria {
    let pointwise: Vec<f64> = (0..246).map(|at| waic / 246.0 + ((at * 37) % 19) as f64 / 9.0 - 1.0).collect();
    let se = Some(21.4);
    Criteria { dic: Dic { dic, p_dic: 18.3 }, waic: Waic { waic, p_waic: 16.9, se, doubtful: 2, pointwise } }
}

/// A fit of two crossed groupings with the R-hat of one unknown moved off.
fn fit(rhat: f64, worth: f64, labels: usize) -> Answer {
    let scalar = |quantity: &str, labels: &[&str], kind| Scalar {
        quantity: quantity.into(),
        labels: labels.iter().map(|label| label.to_string()).collect(),
        unit: Some("kg".into()),
        kind,
    };
    let mut scalars =
        vec![scalar("grand", &[], ScalarKind::Unknown), scalar("residual", &[], ScalarKind::Unknown)];
    let mut summary = vec![diagnosis(24.6123, 3.81, 1.0012, 3210.0), diagnosis(4.3218, 0.2, 1.0004, 8120.0)];
    scalars.push(scalar("season_dev.sd", &[], ScalarKind::Unknown));
    summary.push(diagnosis(6.234, 1.6, rhat, worth));
    for at in 0..labels {
        scalars.push(scalar("season_dev", &[&(2012 + at).to_string()], ScalarKind::Unknown));
        summary.push(diagnosis(((at * 5) % 9) as f64 - 4.0, 1.1, 1.001, 5400.0));
    }
    scalars.push(scalar("best_gap", &[], ScalarKind::Derived));
    summary.push(diagnosis(15.81, 2.2, 1.0009, 6010.0));
    for row in [17, 40, 113] {
        scalars.push(scalar("honey", &[&row.to_string()], ScalarKind::Missing));
        summary.push(diagnosis(20.0 + row as f64 / 20.0, 4.4, 1.0002, 9400.0));
    }
    let verdict = converged(&summary, &Rule::default());
    Answer {
        draws: Draws { scalars, chains: 4, draws: 2500, values: vec![] },
        summary,
        verdict,
        sources: vec![Sources {
            response: "honey".into(),
            unit: Some("kg".into()),
            scale: Scale::Response,
            sources: vec![
                source("season_dev", Some("season"), 6.234, 0.58, 0.93),
                source("apiary_dev", Some("apiary"), 3.1, 0.16, 0.02),
                source("rain_part", None, 0.21, 0.004, 0.0),
                source("residual", None, 4.32, 0.26, 0.05),
            ],
        }],
        groups: vec![group("season", 8), group("hive", 35)],
        criteria: criteria(1480.25, 1478.61),
        seconds: vec![("warmup", Seconds::default())],
    }
}

/// A fit that has converged; `more` labels than eight.
pub(super) fn answer(more: usize) -> Answer {
    fit(1.0031, 1204.0, 8 + more)
}

/// A fit that has not.
pub(super) fn unconverged() -> Answer {
    fit(1.0834, 212.0, 8)
}

/// The rungs of a climb.
pub(super) fn ladder() -> Vec<Fitted> {
    let terms = |names: &[&str]| names.iter().map(|name| name.to_string()).collect::<Vec<String>>();
    let rung = |name: &str, all: &[&str], residual: f64, waic: f64| {
        let mut sources: Vec<Source> = all
            .iter()
            .enumerate()
            .map(|(at, term)| {
                source(term, Some(&term.replace("_dev", "")), 6.2 - at as f64, 0.58 / (at + 1) as f64, 0.4)
            })
            .collect();
        sources.push(source("residual", None, residual, 0.2, 0.1));
        let shared = |name: &str, mean: f64, half: f64| Shared {
            name: name.into(),
            unit: Some("kg".into()),
            interval: interval(mean, half),
        };
        let mut unknowns =
            vec![shared("grand", 24.6, 0.8 + 3.0 * all.len() as f64), shared("residual", residual, 0.6)];
        unknowns.extend(all.iter().map(|term| shared(&format!("{term}.sd"), 5.5, 2.5)));
        Fitted {
            name: name.into(),
            terms: terms(all),
            converged: true,
            criteria: criteria(waic + 2.0, waic),
            unknowns,
            sources: vec![Sources {
                response: "honey".into(),
                unit: Some("kg".into()),
                scale: Scale::Response,
                sources,
            }],
        }
    };
    vec![
        rung("plain", &[], 8.31, 1742.3),
        rung("seasons", &["season_dev"], 5.22, 1561.7),
        rung("apiaries", &["apiary_dev"], 7.75, 1710.2),
        rung("both", &["season_dev", "apiary_dev"], 4.32, 1478.6),
        rung("hives", &["season_dev", "apiary_dev", "hive_dev"], 4.18, 1476.9),
        rung("rain", &["season_dev", "apiary_dev", "hive_dev", "rain_part"], 4.17, 1477.5),
    ]
}
