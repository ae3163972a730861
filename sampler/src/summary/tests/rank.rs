use statrs::distribution::{ContinuousCDF, Normal};

use super::{generator, judged, normal};

/// Average ranks by counting, to normal scores by the reference quantile.
fn scores(values: &[f64]) -> Vec<f64> {
    let count = values.len() as f64;
    let rank = |x: &f64| {
        let below = values.iter().filter(|y| *y < x).count() as f64;
        let equal = values.iter().filter(|y| *y == x).count() as f64;
        below + 0.5 * (equal + 1.0)
    };
    values.iter().map(|x| Normal::standard().inverse_cdf((rank(x) - 0.375) / (count + 0.25))).collect()
}

/// sqrt(((n - 1) / n W + B / n) / W) of the half chains.
fn plain_rhat(values: &[f64], half: usize) -> f64 {
    let mean = |x: &[f64]| x.iter().sum::<f64>() / x.len() as f64;
    let variance = |x: &[f64]| {
        let centre = mean(x);
        x.iter().map(|v| (v - centre).powi(2)).sum::<f64>() / (x.len() as f64 - 1.0)
    };
    let parts: Vec<&[f64]> = values.chunks(half).collect();
    let within = mean(&parts.iter().map(|part| variance(part)).collect::<Vec<_>>());
    let between = variance(&parts.iter().map(|part| mean(part)).collect::<Vec<_>>());
    let n = half as f64;
    (((n - 1.0) / n * within + between) / within).sqrt()
}

#[test]
fn rhat_agrees_with_its_definition_with_and_without_ties() {
    let mut random = generator(51);
    for (widening, steps) in [(0.0, 1e9), (0.5, 1e9), (0.5, 2.0), (0.0, 1.0)] {
        let chain = |c: usize| -> Vec<f64> {
            let width = 1.0 + widening * c as f64;
            (0..100).map(|_| (normal(&mut random) * width * steps).round() / steps).collect()
        };
        let chains: Vec<Vec<f64>> = (0..3).map(chain).collect();
        let values = chains.concat();
        let mut ascending = values.clone();
        ascending.sort_by(f64::total_cmp);
        let median = 0.5 * (ascending[149] + ascending[150]);
        let folded: Vec<f64> = values.iter().map(|x| (x - median).abs()).collect();
        let expected = plain_rhat(&scores(&values), 50).max(plain_rhat(&scores(&folded), 50));
        let result = judged(&chains).split_rhat.unwrap();
        assert!((result - expected).abs() < 1e-7, "{result} {expected}");
    }
}
