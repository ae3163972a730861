use super::{autoregressions, generator, judged};

const RUNS: usize = 400;

/// Over 400 independent runs the sd of each estimate is what the runs report (root mean square): the ratio
/// has a relative standard error of 1 / sqrt(2 x 399) = 3.5 %, so 16 % are four of these and 2 % for the bias
/// of the errors: with 28 ratios about 2 false alarms in 1,000 seeds. The errors of quantiles are rounded
/// outwards to whole order statistics, which in the tails, some 50 draws from the end, makes them up to 20 %
/// too large: the lower bound allows that besides.
#[test]
fn reported_errors_are_the_spread_of_the_estimates() {
    let mut random = generator(21);
    for phi in [0.0, 0.5, 0.9, -0.5] {
        let mut estimates = vec![Vec::new(); 7];
        let mut errors = [0.0; 7];
        for _ in 0..RUNS {
            let result = judged(&autoregressions(&mut random, 4, 500, phi));
            let quantile_errors = result.quantile_mcse.unwrap();
            let mut note = |i: usize, estimate: f64, error: f64| {
                estimates[i].push(estimate);
                errors[i] += error * error / RUNS as f64;
            };
            note(0, result.mean, result.mean_mcse.unwrap());
            note(1, result.sd.unwrap(), result.sd_mcse.unwrap());
            for (i, quantile) in result.quantiles().into_iter().enumerate() {
                note(2 + i, quantile, quantile_errors[i]);
            }
        }
        for (i, estimates) in estimates.iter().enumerate() {
            let mean = estimates.iter().sum::<f64>() / RUNS as f64;
            let variance = estimates.iter().map(|x| (x - mean).powi(2)).sum::<f64>() / (RUNS as f64 - 1.0);
            let ratio = (variance / errors[i]).sqrt();
            let least = if i < 2 { 0.84 } else { 0.7 };
            assert!(ratio > least && ratio < 1.16, "phi {phi}, estimate {i}: {ratio}");
        }
    }
}
