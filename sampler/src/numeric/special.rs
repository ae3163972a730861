//! Special functions on `libm`, with the same bits on every machine.

use std::f64::consts::{FRAC_1_SQRT_2, LN_2, PI};

use super::saddle::{ln_binomial, ln_poisson, stirling_rest};

/// log(2 pi) / 2.
pub const HALF_LN_2PI: f64 = 0.918_938_533_204_672_7;

/// log of the gamma function of x > 0.
pub fn ln_gamma(x: f64) -> f64 {
    libm::lgamma(x)
}

/// log of the beta function. Large terms cancel on paper: only what Stirling's formula leaves is subtracted.
pub fn ln_beta(a: f64, b: f64) -> f64 {
    let (small, large) = if a < b { (a, b) } else { (b, a) };
    if large < 10.0 {
        return ln_gamma(small) + ln_gamma(large) - ln_gamma(small + large);
    }
    if small < 10.0 {
        return ln_gamma(small) - ln_gamma_ratio(large, small);
    }
    let rest = stirling_rest(small) + stirling_rest(large) - stirling_rest(small + large);
    let ratio = small / large;
    rest + HALF_LN_2PI
        - small * libm::log1p(large / small)
        - large * libm::log1p(ratio)
        - 0.5 * (libm::log(small) - libm::log1p(ratio))
}

/// log(gamma(x + a) / gamma(x)) for x > 0 and a >= 0, by Stirling's formula where x is large.
pub fn ln_gamma_ratio(x: f64, a: f64) -> f64 {
    if x < 10.0 {
        return ln_gamma(x + a) - ln_gamma(x);
    }
    (x + a - 0.5) * libm::log1p(a / x) + a * (libm::log(x) - 1.0) + stirling_rest(x + a) - stirling_rest(x)
}

/// log of the number of ways to choose k of n.
pub fn ln_choose(n: f64, k: f64) -> f64 {
    -libm::log1p(n) - ln_beta(n - k + 1.0, k + 1.0)
}

/// log(1 + exp(x)).
pub fn log1p_exp(x: f64) -> f64 {
    if x > 0.0 { x + libm::log1p(libm::exp(-x)) } else { libm::log1p(libm::exp(x)) }
}

/// log(1 - exp(x)) for x < 0 (Maechler 2012).
pub fn log1m_exp(x: f64) -> f64 {
    if x > -LN_2 { libm::log(-libm::expm1(x)) } else { libm::log1p(-libm::exp(x)) }
}

/// 1 / (1 + exp(-x)).
pub fn logistic(x: f64) -> f64 {
    if x >= 0.0 {
        1.0 / (1.0 + libm::exp(-x))
    } else {
        let e = libm::exp(x);
        e / (1.0 + e)
    }
}

/// log(p / (1 - p)).
pub fn logit(p: f64) -> f64 {
    libm::log(p) - libm::log1p(-p)
}

/// The standard normal distribution function.
pub fn normal_cdf(z: f64) -> f64 {
    0.5 * libm::erfc(-z * FRAC_1_SQRT_2)
}

/// log of the standard normal distribution function, accurate in both tails.
pub fn ln_normal_cdf(z: f64) -> f64 {
    if z > 0.0 {
        libm::log1p(-normal_cdf(-z))
    } else if z > -20.0 {
        libm::log(normal_cdf(z))
    } else {
        // The asymptotic series of Mills' ratio (Abramowitz and Stegun 1964, 26.2.12); eight terms are exact to double
        // precision from 20 on.
        let inverse = 1.0 / (z * z);
        let mut term = 1.0;
        let mut sum = 1.0;
        for k in 1..=8 {
            term *= -f64::from(2 * k - 1) * inverse;
            sum += term;
        }
        -0.5 * z * z - libm::log(-z) - HALF_LN_2PI + libm::log(sum)
    }
}

/// The standard normal quantile of a probability: the rational function of Abramowitz and Stegun (1964, 26.2.23), refined
/// by Newton's steps on the logarithm of the distribution function.
pub fn normal_quantile(p: f64) -> f64 {
    if p.is_nan() || !(0.0..=1.0).contains(&p) {
        return f64::NAN;
    }
    if p == 0.5 {
        return 0.0;
    }
    if p > 0.5 {
        return -lower_quantile(1.0 - p);
    }
    lower_quantile(p)
}

fn lower_quantile(p: f64) -> f64 {
    if p == 0.0 {
        return f64::NEG_INFINITY;
    }
    let target = libm::log(p);
    let t = libm::sqrt(-2.0 * target);
    let mut z = -(t
        - (2.515_517 + t * (0.802_853 + t * 0.010_328))
            / (1.0 + t * (1.432_788 + t * (0.189_269 + t * 0.001_308))));
    // Newton on the logarithm, which is nearly quadratic in the tail and so converges from anywhere.
    for _ in 0..4 {
        let log_cdf = ln_normal_cdf(z);
        let slope = libm::exp(-0.5 * z * z - HALF_LN_2PI - log_cdf);
        let step = (log_cdf - target) / slope;
        z -= step;
        if step.abs() < 1e-16 * z.abs() {
            break;
        }
    }
    z
}

/// The regularised incomplete gamma functions (P, Q) of shape a > 0 at x >= 0: series below a + 1, continued fraction
/// (Lentz) above (Press et al. 2007, section 6.2).
pub fn incomplete_gamma(a: f64, x: f64) -> (f64, f64) {
    if x <= 0.0 {
        return (0.0, 1.0);
    }
    if x == f64::INFINITY {
        return (1.0, 0.0);
    }
    // x^a exp(-x) / gamma(a).
    let front = a * libm::exp(ln_poisson(a, x));
    if x < a + 1.0 {
        let (mut sum, mut term, mut n) = (1.0 / a, 1.0 / a, a);
        for _ in 0..100_000 {
            n += 1.0;
            term *= x / n;
            sum += term;
            if term.abs() < sum.abs() * 1e-17 {
                break;
            }
        }
        let p = (front * sum).min(1.0);
        return (p, 1.0 - p);
    }
    let tiny = 1e-300;
    let mut b = x + 1.0 - a;
    let mut c = 1.0 / tiny;
    let mut d = 1.0 / b;
    let mut h = d;
    for i in 1..100_000 {
        let i = f64::from(i);
        let an = -i * (i - a);
        b += 2.0;
        d = an * d + b;
        d = if d.abs() < tiny { tiny } else { d };
        c = b + an / c;
        c = if c.abs() < tiny { tiny } else { c };
        d = 1.0 / d;
        let delta = d * c;
        h *= delta;
        if (delta - 1.0).abs() < 1e-16 {
            break;
        }
    }
    let q = (front * h).min(1.0);
    (1.0 - q, q)
}

/// The regularised incomplete beta function of x and its complement.
pub fn incomplete_beta(a: f64, b: f64, x: f64) -> (f64, f64) {
    incomplete_beta_between(a, b, x, 1.0 - x)
}

/// The regularised incomplete beta function and its complement at x, with y = 1 - x given so that it keeps its digits:
/// a continued fraction on the side where it converges.
pub fn incomplete_beta_between(a: f64, b: f64, x: f64, y: f64) -> (f64, f64) {
    if x <= 0.0 {
        return (0.0, 1.0);
    }
    if y <= 0.0 {
        return (1.0, 0.0);
    }
    // x^a y^b / B(a, b).
    let front = a * (b / (a + b)) * libm::exp(ln_binomial(a, b, x, y));
    if x < (a + 1.0) / (a + b + 2.0) {
        let low = (front * beta_fraction(a, b, x, y)).min(1.0);
        (low, 1.0 - low)
    } else {
        let high = (front * beta_fraction(b, a, y, x)).min(1.0);
        (1.0 - high, high)
    }
}

/// The continued fraction of I_x(a, b) B(a, b) / (x^a y^b) (Didonato and Morris 1992, from memory; the even part of Abramowitz and
/// Stegun 1964, 26.5.8), by Lentz: its terms need a - (a + b) x only as a whole, which has its digits from the smaller of x
/// and y.
fn beta_fraction(a: f64, b: f64, x: f64, y: f64) -> f64 {
    let tiny = 1e-300;
    let guard = |value: f64| if value.abs() < tiny { tiny } else { value };
    let lead = if x > y { (a + b) * y - b } else { a - (a + b) * x };
    let mut f = guard(a / (a + 1.0) * (lead + 1.0));
    let (mut c, mut d) = (f, 0.0);
    for n in 1..100_000 {
        let n = f64::from(n);
        let middle = a + 2.0 * n - 1.0;
        let over = (a + n - 1.0) / middle * ((a + b + n - 1.0) / middle) * n * (b - n) * x * x;
        let under = n + n * (b - n) * x / middle + (a + n) / (middle + 2.0) * (lead + 1.0 + n * (1.0 + y));
        d = 1.0 / guard(under + over * d);
        c = guard(under + over / c);
        let delta = c * d;
        f *= delta;
        if (delta - 1.0).abs() < 1e-16 {
            break;
        }
    }
    1.0 / f
}

/// log(exp(a) - exp(b)) for a >= b.
pub fn log_difference(a: f64, b: f64) -> f64 {
    if b == f64::NEG_INFINITY { a } else { a + log1m_exp(b - a) }
}

/// pi, for formulas.
pub const LN_PI: f64 = 1.144_729_885_849_400_2;

/// log(1 + x^2) without overflow.
pub fn log1p_square(x: f64) -> f64 {
    if x.abs() > 1e8 { 2.0 * libm::log(x.abs()) } else { libm::log1p(x * x) }
}

/// tan(pi (u - 1/2)): the standard Cauchy quantile.
pub fn cauchy_quantile(u: f64) -> f64 {
    if u < 0.25 {
        -1.0 / libm::tan(PI * u)
    } else if u > 0.75 {
        1.0 / libm::tan(PI * (1.0 - u))
    } else {
        libm::tan(PI * (u - 0.5))
    }
}

/// tan(pi u / 2): the standard half-Cauchy quantile.
pub fn half_cauchy_quantile(u: f64) -> f64 {
    if u < 0.5 { libm::tan(0.5 * PI * u) } else { 1.0 / libm::tan(0.5 * PI * (1.0 - u)) }
}
