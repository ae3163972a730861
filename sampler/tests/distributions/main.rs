//! Densities, distribution functions, quantiles and special functions against outside values.
//!
//! Two sources: `reference/laws.csv` and `reference/special.csv` (mpmath 1.4.1, 50 digits, by `make_reference.py` beside
//! them), and the crate statrs 0.19 for every way in which the language writes a distribution.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]
// Constants stand as mpmath prints them.
#![allow(clippy::excessive_precision)]

mod draws;
mod ways;

use stook_lang::distribution::Law;
use stook_sampler::distribution::{
    cdf, check_params, ln_density, ln_density_columns, ln_interval, quantile, sf, support,
};
use stook_sampler::numeric::special;

/// A row of laws.csv.
struct Point {
    law: Law,
    x: f64,
    p: Vec<f64>,
    ln_density: f64,
    cdf: f64,
    sf: f64,
}

fn points() -> Vec<Point> {
    let named = |name: &str| *Law::ALL.iter().find(|law| format!("{law:?}") == name).unwrap();
    let row = |line: &str| {
        let cells: Vec<&str> = line.split(',').collect();
        let number = |at: usize| cells[at].parse::<f64>().unwrap();
        let law = named(cells[0]);
        let p = (0..law.arity()).map(|at| number(2 + at)).collect();
        Point { law, x: number(1), p, ln_density: number(5), cdf: number(6), sf: number(7) }
    };
    include_str!("../reference/laws.csv").lines().skip(1).map(row).collect()
}

/// Collects what is off instead of stopping at the first.
#[derive(Default)]
struct Off(Vec<String>);

impl Off {
    fn near(&mut self, what: impl FnOnce() -> String, found: f64, wanted: f64, relative: f64, absolute: f64) {
        // An infinite or missing number is never near a finite one.
        let good = found == wanted || (found - wanted).abs() <= absolute.max(relative * wanted.abs());
        if !good {
            self.0.push(format!("{}: {found:e} for {wanted:e}", what()));
        }
    }

    fn none(self) {
        assert!(self.0.is_empty(), "{} off:\n{}", self.0.len(), self.0.join("\n"));
    }
}

/// 1e-11 relative, or 1e-12 absolute near zero, for every law.
#[test]
fn log_densities_are_those_of_mpmath() {
    let mut off = Off::default();
    for Point { law, x, p, ln_density: wanted, .. } in points() {
        off.near(|| format!("{law:?} {p:?} at {x}"), ln_density(law, x, &p), wanted, 1e-11, 1e-12);
    }
    off.none();
}

/// 1e-10 relative in both tails, down to 1e-290: a tail of exp(-600) has 600 times the relative error of its exponent.
#[test]
fn both_tails_are_those_of_mpmath() {
    let mut off = Off::default();
    for Point { law, x, p, cdf: lower, sf: upper, .. } in points() {
        off.near(|| format!("cdf {law:?} {p:?} at {x}"), cdf(law, x, &p), lower, 1e-10, 1e-290);
        off.near(|| format!("sf {law:?} {p:?} at {x}"), sf(law, x, &p), upper, 1e-10, 1e-290);
    }
    off.none();
}

#[test]
fn every_law_is_in_the_reference() {
    for law in Law::ALL {
        assert!(points().iter().any(|point| point.law == law), "{law:?}");
    }
}

#[test]
fn columns_agree_with_single_values_to_the_bit() {
    for law in Law::ALL {
        let of: Vec<Point> = points().into_iter().filter(|point| point.law == law).collect();
        let x: Vec<f64> = of.iter().map(|point| point.x).collect();
        let column =
            |at: usize| -> Vec<f64> { of.iter().filter_map(|point| point.p.get(at).copied()).collect() };
        let (a, b, c) = (column(0), column(1), column(2));
        let mut out = vec![0.0; x.len()];
        ln_density_columns(law, &x, [&a, &b, &c], &mut out);
        for (point, found) in of.iter().zip(out) {
            assert_eq!(
                found.to_bits(),
                ln_density(law, point.x, &point.p).to_bits(),
                "{law:?} at {}",
                point.x
            );
        }
    }
}

#[test]
fn outside_the_support_the_density_is_nothing() {
    for Point { law, p, .. } in points() {
        let (low, high) = support(law, &p);
        let mut outside = vec![f64::INFINITY, f64::NEG_INFINITY];
        if low.is_finite() {
            outside.extend([low - 1.0, low - 1e-9]);
        }
        if high.is_finite() {
            outside.extend([high + 1.0, high + 1e-9 * high.abs().max(1.0)]);
        }
        if law.is_discrete() {
            outside.extend([0.5, 2.000_001]);
        }
        for x in outside {
            assert_eq!(ln_density(law, x, &p), f64::NEG_INFINITY, "{law:?} {p:?} at {x}");
        }
        assert_eq!(cdf(law, low - 1.0, &p), 0.0, "{law:?} {p:?} below {low}");
        assert_eq!(sf(law, high + 1.0, &p), 0.0, "{law:?} {p:?} above {high}");
    }
}

#[test]
fn parameters_outside_their_domain_are_refused() {
    for law in Law::ALL {
        let p = points().into_iter().find(|point| point.law == law).unwrap().p;
        assert!(check_params(law, &p).is_ok());
        for at in 0..p.len() {
            let mut wrong = p.clone();
            wrong[at] = f64::NAN;
            assert_eq!(check_params(law, &wrong).unwrap_err().parameter, at, "{law:?}");
            assert_eq!(ln_density(law, 1.0, &wrong), f64::NEG_INFINITY);
        }
    }
}

/// The error of x is at most that of its probability over the density: 1e-14 there, and 1e-10 relative. Points whose lower
/// tail is nearly 1 say nothing about x.
#[test]
fn quantiles_undo_the_distribution_function() {
    let mut off = Off::default();
    for Point { law, x, p, ln_density: ln, cdf: lower, .. } in points() {
        if !(1e-290..0.999).contains(&lower) {
            continue;
        }
        if law.is_discrete() {
            // Just below the step, so that the rounding of the step itself does not matter.
            let found = quantile(law, cdf(law, x, &p) * (1.0 - 1e-9), &p);
            let below = cdf(law, x - 1.0, &p);
            if below < lower * (1.0 - 1e-8) {
                off.near(|| format!("{law:?} {p:?}"), found, x, 0.0, 0.0);
            }
        } else {
            let found = quantile(law, cdf(law, x, &p), &p);
            let absolute = 1e-14 * lower / ln.exp() + 1e-10 * lower / ln.exp();
            off.near(|| format!("{law:?} {p:?} quantile of {lower:e}"), found, x, 1e-10, absolute);
        }
    }
    off.none();
}

#[test]
fn special_functions_are_those_of_mpmath() {
    let mut off = Off::default();
    for line in include_str!("../reference/special.csv").lines().skip(1) {
        let cells: Vec<&str> = line.split(',').collect();
        let number = |at: usize| cells[at].parse::<f64>().unwrap_or(f64::NAN);
        let (a, b, c) = (number(1), number(2), number(3));
        let found = match cells[0] {
            "ln_gamma" => special::ln_gamma(a),
            "ln_beta" => special::ln_beta(a, b),
            "ln_choose" => special::ln_choose(a, b),
            "gamma_p" => special::incomplete_gamma(a, b).0,
            "gamma_q" => special::incomplete_gamma(a, b).1,
            "beta_low" => special::incomplete_beta(a, b, c).0,
            "beta_high" => special::incomplete_beta(a, b, c).1,
            "normal_cdf" => special::normal_cdf(a),
            "ln_normal_cdf" => special::ln_normal_cdf(a),
            "normal_quantile" => special::normal_quantile(a),
            "log1m_exp" => special::log1m_exp(a),
            "log1p_exp" => special::log1p_exp(a),
            "half_cauchy_quantile" => special::half_cauchy_quantile(a),
            "log1p_square" => special::log1p_square(a),
            other => panic!("{other}"),
        };
        // Probabilities of exp(-700) have 700 times the relative error of their exponent.
        off.near(|| line.to_string(), found, number(4), 2e-12, 0.0);
    }
    off.none();
}

/// The mass of an interval: mpmath, 50 digits (`erfc` differences).
#[test]
fn masses_of_intervals_keep_their_digits() {
    let mut off = Off::default();
    let unit = [0.0, 1.0];
    for (low, high, wanted) in INTERVALS {
        off.near(
            || format!("{low} to {high}"),
            ln_interval(Law::Normal, low, high, &unit),
            wanted,
            1e-12,
            0.0,
        );
    }
    off.none();
    for point in points() {
        let all = support(point.law, &point.p);
        assert_eq!(ln_interval(point.law, f64::NEG_INFINITY, f64::INFINITY, &point.p), 0.0);
        assert!(ln_interval(point.law, all.0, all.1, &point.p).abs() < 1e-12, "{:?}", point.law);
        assert_eq!(ln_interval(point.law, all.1, all.0 - 1.0, &point.p), f64::NEG_INFINITY);
    }
}

#[allow(clippy::excessive_precision, reason = "the digits as mpmath gives them")]
const INTERVALS: [(f64, f64, f64); 5] = [
    (-1.0, 2.0, -0.200_166_294_324_462_58),
    (8.0, 8.5, -35.028_792_508_579_747_8),
    (-40.0, -39.0, -765.083156564377544),
    (3.0, 3.000_000_1, -21.537_034_335_799_569_1),
    (-0.25, -0.2499, -10.160_516_406_821_601),
];
