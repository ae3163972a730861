use super::{generator, normal};
use crate::summary::criteria::{CriteriaError, Pointwise, Waic, dic, difference};

#[test]
fn dic_adds_the_parameters_twice() {
    let dic = dic(110.0, 107.0);
    assert_eq!((dic.p_dic, dic.dic), (3.0, 113.0));
}

const OBSERVATIONS: [f64; 8] = [0.3, -1.1, 0.8, 2.4, -0.2, 0.5, 1.9, -0.7];

/// Log densities of `OBSERVATIONS` under Normal(mean, 1), the mean drawn from its exact posterior under a
/// flat prior: Normal(mean of the observations, 1 / n).
fn log_densities(draws: usize, seed: u64) -> Vec<Vec<f64>> {
    let mut random = generator(seed);
    let n = OBSERVATIONS.len() as f64;
    let centre = OBSERVATIONS.iter().sum::<f64>() / n;
    let constant = -0.5 * (2.0 * std::f64::consts::PI).ln();
    let draw = |_| {
        let mean = centre + normal(&mut random) / n.sqrt();
        OBSERVATIONS.iter().map(|y| constant - 0.5 * (y - mean).powi(2)).collect()
    };
    (0..draws).map(draw).collect()
}

fn gathered(densities: &[Vec<f64>]) -> Pointwise {
    let mut points = Pointwise::new(OBSERVATIONS.len());
    for draw in densities {
        points.add(draw).unwrap();
    }
    points
}

fn waic(densities: &[Vec<f64>]) -> Waic {
    gathered(densities).waic().unwrap()
}

/// With d = y - centre and v = 1 / n: the predictive density is Normal(y; centre, 1 + v), and the log density
/// c - (d - z sqrt(v))^2 / 2 has variance v d^2 + v^2 / 2.
fn limits() -> (Vec<f64>, Vec<f64>) {
    let n = OBSERVATIONS.len() as f64;
    let centre = OBSERVATIONS.iter().sum::<f64>() / n;
    let v = 1.0 / n;
    let predictive = |d: f64| -0.5 * (2.0 * std::f64::consts::PI * (1.0 + v)).ln() - 0.5 * d * d / (1.0 + v);
    let variances: Vec<f64> = OBSERVATIONS.iter().map(|y| v * (y - centre).powi(2) + 0.5 * v * v).collect();
    let points =
        OBSERVATIONS.iter().zip(&variances).map(|(y, var)| -2.0 * (predictive(y - centre) - var)).collect();
    (points, variances)
}

/// 200 replications of 1,000 draws give the Monte Carlo error of the mean criterion; four of these, and 0.002
/// for the bias of the log of a mean (about half its relative variance, which is below 0.001 at 1,000 draws):
/// false alarms about 6 in 100,000.
#[test]
fn waic_of_a_normal_mean_reaches_its_closed_form() {
    let (points, variances) = limits();
    let runs: Vec<Waic> = (0..200).map(|run| waic(&log_densities(1000, 100 + run))).collect();
    let agrees = |name: &str, of: &dyn Fn(&Waic) -> f64, limit: f64| {
        let values: Vec<f64> = runs.iter().map(of).collect();
        let mean = values.iter().sum::<f64>() / 200.0;
        let error = (values.iter().map(|x| (x - mean).powi(2)).sum::<f64>() / 199.0 / 200.0).sqrt();
        assert!((mean - limit).abs() < 4.0 * error + 0.002, "{name}: {mean} against {limit}, error {error}");
    };
    agrees("waic", &|waic| waic.waic, points.iter().sum());
    agrees("p_waic", &|waic| waic.p_waic, variances.iter().sum());
    for i in 0..points.len() {
        agrees("pointwise", &|waic| waic.pointwise[i], points[i]);
    }
    let n = points.len() as f64;
    let mean = points.iter().sum::<f64>() / n;
    let se = (n * points.iter().map(|x| (x - mean).powi(2)).sum::<f64>() / (n - 1.0)).sqrt();
    agrees("se", &|waic| waic.se.unwrap(), se);
    // The observation 2.4 lies 1.9125 from the centre: 0.125 x 3.6577 + 0.0078 = 0.465; no other variance
    // exceeds 0.4.
    assert_eq!(variances.iter().filter(|v| **v > 0.4).count(), 1);
    let long: Vec<Vec<f64>> = (0..20).flat_map(|run| log_densities(1000, 100 + run)).collect();
    assert_eq!(waic(&long).doubtful, 1);
}

#[test]
fn streaming_agrees_with_the_sums_as_written() {
    let densities = log_densities(500, 7);
    let waic = waic(&densities);
    let count = densities.len() as f64;
    for i in 0..OBSERVATIONS.len() {
        let column: Vec<f64> = densities.iter().map(|draw| draw[i]).collect();
        let mean = column.iter().sum::<f64>() / count;
        let variance = column.iter().map(|x| (x - mean).powi(2)).sum::<f64>() / (count - 1.0);
        let predictive = (column.iter().map(|x| x.exp()).sum::<f64>() / count).ln();
        assert!((waic.pointwise[i] + 2.0 * (predictive - variance)).abs() < 1e-12);
    }
}

#[test]
fn merged_chains_agree_with_one_long_chain() {
    let densities = log_densities(900, 8);
    let whole = waic(&densities);
    let mut merged = Pointwise::new(OBSERVATIONS.len());
    for chain in densities.chunks(300) {
        merged.merge(&gathered(chain)).unwrap();
    }
    assert_eq!(merged.draws(), 900);
    let merged = merged.waic().unwrap();
    assert!((merged.waic - whole.waic).abs() < 1e-12 && (merged.p_waic - whole.p_waic).abs() < 1e-12);
}

#[test]
fn merging_with_nothing_changes_no_bit() {
    let chain = gathered(&log_densities(50, 9));
    let mut onto_nothing = Pointwise::new(OBSERVATIONS.len());
    onto_nothing.merge(&chain).unwrap();
    assert_eq!(onto_nothing, chain);
    onto_nothing.merge(&Pointwise::new(OBSERVATIONS.len())).unwrap();
    assert_eq!(onto_nothing, chain);
}

#[test]
fn densities_far_below_the_smallest_number_are_averaged() {
    let mut points = Pointwise::new(1);
    for x in [-1e5, -1e5 - 1.0, -1e5 + 1.0] {
        points.add(&[x]).unwrap();
    }
    let waic = points.waic().unwrap();
    let predictive = -1e5 + ((1.0 + (-1.0_f64).exp() + 1.0_f64.exp()) / 3.0).ln();
    assert!((waic.waic + 2.0 * (predictive - 1.0)).abs() < 1e-9);
    assert_eq!((waic.se, waic.doubtful), (None, 1));
}

#[test]
fn a_difference_is_surer_than_its_parts() {
    let near = waic(&log_densities(2000, 10));
    let shifted: Vec<Vec<f64>> =
        log_densities(2000, 11).iter().map(|draw| draw.iter().map(|x| x - 0.5).collect()).collect();
    let far = waic(&shifted);
    let result = difference(&far, &near).unwrap();
    assert!((result.difference - 8.0).abs() < 0.5, "{result:?}");
    assert!(result.se.unwrap() < 0.2 * near.se.unwrap());
    assert_eq!(difference(&near, &near).unwrap().difference, 0.0);
}

#[test]
fn what_cannot_be_judged_is_refused() {
    let mut points = Pointwise::new(2);
    assert_eq!(points.waic(), Err(CriteriaError::TooFewDraws));
    assert_eq!(points.add(&[1.0]), Err(CriteriaError::WrongLength { observations: 2, given: 1 }));
    let infinite = CriteriaError::NonFinite { observation: 1, value: f64::NEG_INFINITY };
    assert_eq!(points.add(&[1.0, f64::NEG_INFINITY]), Err(infinite));
    assert_eq!(points, Pointwise::new(2));
    assert!(points.merge(&Pointwise::new(3)).is_err());
    let mut nothing = Pointwise::new(0);
    nothing.add(&[]).unwrap();
    nothing.add(&[]).unwrap();
    assert_eq!(nothing.waic(), Err(CriteriaError::NoObservations));
}
