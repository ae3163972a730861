//! Poisson and binomial probabilities whose large terms cancel on paper and not in the arithmetic (Loader 2000, "Fast and
//! accurate computation of binomial probabilities", sections 3 and 4).

use super::special::HALF_LN_2PI;

/// lgamma(x + 1) - [(x + 1/2) log x - x + log(2 pi) / 2] for x > 0: what Stirling's formula leaves (Abramowitz and Stegun
/// 1964, 6.1.41), seven terms from 10 on.
pub fn stirling_rest(x: f64) -> f64 {
    if x < 10.0 {
        return libm::lgamma(x + 1.0) - ((x + 0.5) * libm::log(x) - x + HALF_LN_2PI);
    }
    let inverse = 1.0 / (x * x);
    let terms = [
        1.0 / 156.0,
        -691.0 / 360_360.0,
        1.0 / 1188.0,
        -1.0 / 1680.0,
        1.0 / 1260.0,
        -1.0 / 360.0,
        1.0 / 12.0,
    ];
    terms.iter().fold(0.0, |sum, term| sum * inverse + term) / x
}

/// x log(x / mean) + mean - x: half the deviance of a Poisson count, by its series where x is near the mean. The gap is
/// x - mean, with the digits that the caller has.
fn half_deviance(x: f64, mean: f64, gap: f64) -> f64 {
    if gap.abs() >= 0.1 * (x + mean) {
        return x * libm::log(x / mean) - gap;
    }
    let v = gap / (x + mean);
    let mut sum = gap * v;
    let mut term = 2.0 * x * v;
    for j in 1..1000 {
        term *= v * v;
        let next = sum + term / f64::from(2 * j + 1);
        if next == sum {
            break;
        }
        sum = next;
    }
    sum
}

/// log(mean^x exp(-mean) / gamma(x + 1)) for x > 0, which need not be whole, and a finite mean > 0.
pub fn ln_poisson(x: f64, mean: f64) -> f64 {
    -stirling_rest(x) - half_deviance(x, mean, x - mean) - 0.5 * libm::log(x) - HALF_LN_2PI
}

/// log(C(a + b, a) p^a q^b) for a, b > 0, which need not be whole; q is 1 - p, with its own digits.
pub fn ln_binomial(a: f64, b: f64, p: f64, q: f64) -> f64 {
    let n = a + b;
    // a - n p is n q - b: from the smaller of the two, which has the digits.
    let gap = if a > b { n * q - b } else { a - n * p };
    stirling_rest(n)
        - stirling_rest(a)
        - stirling_rest(b)
        - half_deviance(a, n * p, gap)
        - half_deviance(b, n * q, -gap)
        - 0.5 * libm::log(a * (b / n))
        - HALF_LN_2PI
}
