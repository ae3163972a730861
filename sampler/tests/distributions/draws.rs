//! Draws, whole and truncated, against the distribution function.
//!
//! Continuous laws by Kolmogorov and Smirnov: with n = 20,000 draws the largest distance exceeds D with a probability of
//! about 2 exp(-2 n D^2) (Massey 1951), so D = sqrt(log(2 / 1e-6) / (2 n)) has a false-alarm rate of 1e-6. Discrete laws by
//! chi-square over cells of at least 10 expected draws, with the quantile 1 - 1e-6 of statrs. Seeds are fixed.

use statrs::distribution::{ChiSquared, ContinuousCDF};
use stook_lang::distribution::Law;
use stook_sampler::distribution::{cdf, draw, draw_between, ln_density, mean, sf, support, variance};
use stook_sampler::numeric::stream::Stream;

const N: usize = 20_000;
const FALSE_ALARM: f64 = 1e-6;

/// The largest distance between the empirical distribution function and the law's probabilities `u` of its draws.
fn kolmogorov(mut u: Vec<f64>) -> f64 {
    u.sort_by(f64::total_cmp);
    let n = u.len() as f64;
    let step = |(at, u): (usize, &f64)| (u - at as f64 / n).max((at as f64 + 1.0) / n - u);
    u.iter().enumerate().map(step).fold(0.0, f64::max)
}

fn continuous(what: &str, u: Vec<f64>) {
    let limit = ((2.0 / FALSE_ALARM).ln() / (2.0 * u.len() as f64)).sqrt();
    let found = kolmogorov(u);
    assert!(found < limit, "{what}: distance {found} above {limit}");
}

/// The chi-square test of whole numbers between two ends against probabilities that are proportional to the law's.
fn discrete(what: &str, draws: &[f64], law: Law, p: &[f64], low: f64, high: f64) {
    let first = draws.iter().copied().fold(f64::INFINITY, f64::min);
    let last = draws.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    assert!(first >= low && last <= high, "{what}: {first} to {last}");
    let from = low.max(first - 1000.0).ceil();
    let to = high.min(last + 1000.0).floor();
    let values = || (0..).map(|k| from + f64::from(k)).take_while(|x| *x <= to);
    let total: f64 = values().map(|x| ln_density(law, x, p).exp()).sum();
    let mut sorted = draws.to_vec();
    sorted.sort_by(f64::total_cmp);
    let count = |x: f64| sorted.partition_point(|y| *y <= x) as f64;
    let (mut expected, mut before, mut statistic, mut cells) = (0.0, 0.0, 0.0, 0);
    let mut left = N as f64;
    for x in values() {
        let own = N as f64 * ln_density(law, x, p).exp() / total;
        expected += own;
        left -= own;
        // The last cell takes what is left.
        if (expected >= 10.0 && left >= 10.0) || x == to {
            let observed = count(x) - before;
            statistic += (observed - expected) * (observed - expected) / expected;
            before = count(x);
            expected = 0.0;
            cells += 1;
        }
    }
    if cells < 2 {
        return;
    }
    let limit = ChiSquared::new(f64::from(cells - 1)).unwrap().inverse_cdf(1.0 - FALSE_ALARM);
    assert!(statistic < limit, "{what}: chi-square {statistic} above {limit}, {cells} cells");
}

const WHOLE: &[(Law, &[f64])] = &[
    (Law::Normal, &[-2.0, 3.0]),
    (Law::StudentT, &[0.7, 1.0, 2.0]),
    (Law::StudentT, &[12.0, 0.0, 1.0]),
    (Law::Laplace, &[1.0, 0.5]),
    (Law::Cauchy, &[1.0, 3.0]),
    (Law::Lognormal, &[0.5, 1.5]),
    (Law::Gamma, &[0.1, 2.0]),
    (Law::Gamma, &[7.5, 0.3]),
    (Law::Gamma, &[5000.0, 10.0]),
    (Law::InverseGamma, &[0.4, 2.0]),
    (Law::InverseGamma, &[6.0, 2.0]),
    (Law::Exponential, &[0.2]),
    (Law::Weibull, &[0.6, 2.0]),
    (Law::Weibull, &[4.0, 0.1]),
    (Law::Beta, &[0.2, 0.3]),
    (Law::Beta, &[30.0, 4.0]),
    (Law::Uniform, &[-4.0, 9.0]),
    (Law::HalfNormal, &[2.5]),
    (Law::HalfCauchy, &[2.5]),
    (Law::HalfStudentT, &[3.0, 2.5]),
    (Law::Bernoulli, &[0.3]),
    (Law::BernoulliLogOdds, &[1.2]),
    (Law::BernoulliProbit, &[-0.6]),
    (Law::Binomial, &[12.0, 0.2]),
    (Law::Binomial, &[300.0, 0.7]),
    (Law::BinomialLogOdds, &[40.0, -1.0]),
    (Law::BinomialProbit, &[40.0, 0.5]),
    (Law::Poisson, &[0.4]),
    (Law::Poisson, &[9.9]),
    (Law::Poisson, &[10.1]),
    (Law::Poisson, &[2500.0]),
    (Law::PoissonLog, &[3.1]),
    (Law::NegativeBinomial, &[4.0, 0.6]),
    (Law::NegativeBinomial, &[60.0, 15.0]),
    (Law::NegativeBinomialLog, &[1.5, 2.0]),
];

#[test]
fn draws_have_their_law() {
    for (seed, (law, p)) in WHOLE.iter().enumerate() {
        let mut stream = Stream::new(seed as u64 + 1, 0);
        let draws: Vec<f64> = (0..N).map(|_| draw(*law, &mut stream, p)).collect();
        let what = format!("{law:?} {p:?}");
        if law.is_discrete() {
            let (low, high) = support(*law, p);
            discrete(&what, &draws, *law, p, low, high);
        } else {
            continuous(&what, draws.iter().map(|x| cdf(*law, *x, p)).collect());
        }
    }
    assert!(Law::ALL.iter().all(|law| WHOLE.iter().any(|(shown, _)| shown == law)));
}

/// Laws with their parameters and two ends, most of them in a far tail.
const CUT: &[(Law, &[f64], f64, f64)] = &[
    (Law::Normal, &[1.0, 2.0], -1.0, 2.5),
    (Law::Normal, &[0.0, 1.0], 12.0, f64::INFINITY),
    (Law::Normal, &[0.0, 1.0], -30.0, -29.9),
    (Law::HalfNormal, &[1.0], 8.0, f64::INFINITY),
    (Law::Lognormal, &[0.0, 0.5], 20.0, 90.0),
    (Law::StudentT, &[3.0, 0.0, 1.0], -1e6, -50.0),
    (Law::StudentT, &[3.0, 0.0, 1.0], -1.0, 40.0),
    (Law::HalfStudentT, &[3.0, 1.0], 30.0, f64::INFINITY),
    (Law::Cauchy, &[0.0, 1.0], 1e4, f64::INFINITY),
    (Law::HalfCauchy, &[1.0], 0.5, 3.0),
    (Law::Laplace, &[0.0, 1.0], 90.0, 95.0),
    (Law::Laplace, &[0.0, 1.0], -200.0, -50.0),
    (Law::Gamma, &[2.5, 1.0], 60.0, f64::INFINITY),
    (Law::Gamma, &[2.5, 1.0], 0.0, 1e-5),
    (Law::InverseGamma, &[3.0, 2.0], 0.0, 0.02),
    (Law::InverseGamma, &[3.0, 2.0], 1e4, f64::INFINITY),
    (Law::Exponential, &[2.0], 150.0, f64::INFINITY),
    (Law::Weibull, &[2.0, 1.0], 8.0, 8.1),
    (Law::Beta, &[2.0, 60.0], 0.6, 1.0),
    (Law::Beta, &[2.0, 3.0], 0.1, 0.3),
    (Law::Uniform, &[0.0, 1.0], 0.999, 5.0),
    (Law::Bernoulli, &[0.3], 0.0, 1.0),
    (Law::BernoulliLogOdds, &[0.3], -0.5, 1.5),
    (Law::BernoulliProbit, &[0.3], 0.0, f64::INFINITY),
    (Law::Binomial, &[40.0, 0.2], 30.0, 40.0),
    (Law::BinomialLogOdds, &[40.0, 3.0], 0.0, 12.0),
    (Law::BinomialProbit, &[40.0, 0.0], 10.5, 22.5),
    (Law::Poisson, &[3.0], 1.0, f64::INFINITY),
    (Law::Poisson, &[3.0], 40.0, f64::INFINITY),
    (Law::Poisson, &[400.0], 0.0, 220.0),
    (Law::PoissonLog, &[1.0], 2.0, 5.0),
    (Law::NegativeBinomial, &[3.0, 0.7], 100.0, 140.0),
    (Law::NegativeBinomialLog, &[1.0, 2.0], 1.0, f64::INFINITY),
];

#[test]
fn truncated_draws_have_their_law() {
    for (seed, (law, p, low, high)) in CUT.iter().enumerate() {
        let mut stream = Stream::new(seed as u64 + 501, 0);
        let draws: Vec<f64> = (0..N).map(|_| draw_between(*law, &mut stream, *low, *high, p)).collect();
        let what = format!("{law:?} {p:?} between {low} and {high}");
        assert!(draws.iter().all(|x| x >= low && x <= high), "{what}: a draw outside");
        if law.is_discrete() {
            let (first, last) = support(*law, p);
            discrete(&what, &draws, *law, p, low.max(first), high.min(last));
            continue;
        }
        // The tail that is small keeps its digits.
        let part: Box<dyn Fn(f64) -> f64> = if sf(*law, *low, p) < 0.5 {
            let (all, none) = (sf(*law, *low, p), sf(*law, *high, p));
            Box::new(move |x| (all - sf(*law, x, p)) / (all - none))
        } else {
            let (none, all) = (cdf(*law, *low, p), cdf(*law, *high, p));
            Box::new(move |x| (cdf(*law, x, p) - none) / (all - none))
        };
        continuous(&what, draws.iter().map(|x| part(*x)).collect());
    }
    assert!(Law::ALL.iter().all(|law| CUT.iter().any(|(shown, ..)| shown == law)));
}

#[test]
fn an_interval_without_mass_gives_no_draw() {
    let mut stream = Stream::new(1, 0);
    assert!(draw_between(Law::Beta, &mut stream, 2.0, 3.0, &[2.0, 2.0]).is_nan());
    assert!(draw_between(Law::Poisson, &mut stream, 2.2, 2.8, &[2.0]).is_nan());
}

/// Means within 5 standard errors of their draws (false-alarm rate 6e-7 each), where the law has a variance.
#[test]
fn means_are_those_of_the_draws() {
    for (seed, (law, p)) in WHOLE.iter().enumerate() {
        let (centre, spread) = (mean(*law, p), variance(*law, p));
        // Squares of a heavy tail are no guide to its error.
        let is_heavy =
            matches!((law, p), (Law::StudentT | Law::InverseGamma | Law::HalfStudentT, p) if p[0] < 5.0);
        if !spread.is_finite() || is_heavy {
            continue;
        }
        let mut stream = Stream::new(seed as u64 + 901, 0);
        let found = (0..N).map(|_| draw(*law, &mut stream, p)).sum::<f64>() / N as f64;
        let error = (spread / N as f64).sqrt();
        assert!((found - centre).abs() < 5.0 * error, "{law:?} {p:?}: mean {found} for {centre}");
    }
}
