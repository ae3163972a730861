//! Quantiles of the normal and the beta distribution, in portable arithmetic.

use libm::{exp, lgamma, log, log1p, sqrt};

/// The standard normal quantile of a probability above 0 and below 1, to 1e-15 relative: algorithm AS 241,
/// PPND16 (Wichura 1988).
pub(super) fn normal_quantile(p: f64) -> f64 {
    let q = p - 0.5;
    if q.abs() <= 0.425 {
        let r = 0.180_625 - q * q;
        return q * ratio(r, &CENTRE);
    }
    let r = sqrt(-log(if q < 0.0 { p } else { 1.0 - p }));
    let size = if r <= 5.0 { ratio(r - 1.6, &MIDDLE) } else { ratio(r - 5.0, &FAR) };
    size.copysign(q)
}

/// The ratio of two polynomials, coefficients of numerator and denominator from the highest power down.
fn ratio(x: f64, [numerator, denominator]: &[[f64; 8]; 2]) -> f64 {
    let at = |coefficients: &[f64; 8]| coefficients.iter().fold(0.0, |sum, c| sum * x + c);
    at(numerator) / at(denominator)
}

#[allow(clippy::excessive_precision, reason = "as published")]
const CENTRE: [[f64; 8]; 2] = [
    [
        2.509_080_928_730_122_672_7e3,
        3.343_057_558_358_812_810_5e4,
        6.726_577_092_700_870_085_3e4,
        4.592_195_393_154_987_145_7e4,
        1.373_169_376_550_946_112_5e4,
        1.971_590_950_306_551_442_7e3,
        1.331_416_678_917_843_774_5e2,
        3.387_132_872_796_366_608,
    ],
    [
        5.226_495_278_852_854_561e3,
        2.872_908_573_572_194_267_4e4,
        3.930_789_580_009_271_061e4,
        2.121_379_430_158_659_586_7e4,
        5.394_196_021_424_751_107_7e3,
        6.871_870_074_920_579_083e2,
        4.231_333_070_160_091_125_2e1,
        1.0,
    ],
];

#[allow(clippy::excessive_precision, reason = "as published")]
const MIDDLE: [[f64; 8]; 2] = [
    [
        7.745_450_142_783_414_076_4e-4,
        2.272_384_498_926_918_458_33e-2,
        2.417_807_251_774_506_117_7e-1,
        1.270_458_252_452_368_382_58,
        3.647_848_324_763_204_605_04,
        5.769_497_221_460_691_405_5,
        4.630_337_846_156_545_295_9,
        1.423_437_110_749_683_577_34,
    ],
    [
        1.050_750_071_644_416_843_24e-9,
        5.475_938_084_995_344_946e-4,
        1.519_866_656_361_645_719_66e-2,
        1.481_039_764_274_800_745_9e-1,
        6.897_673_349_851_000_045_5e-1,
        1.676_384_830_183_803_849_4,
        2.053_191_626_637_758_821_87,
        1.0,
    ],
];

#[allow(clippy::excessive_precision, reason = "as published")]
const FAR: [[f64; 8]; 2] = [
    [
        2.010_334_399_292_288_132_65e-7,
        2.711_555_568_743_487_578_15e-5,
        1.242_660_947_388_078_438_6e-3,
        2.653_218_952_657_612_309_3e-2,
        2.965_605_718_285_048_912_3e-1,
        1.784_826_539_917_291_335_8,
        5.463_784_911_164_114_369_9,
        6.657_904_643_501_103_777_2,
    ],
    [
        2.044_263_103_389_939_785_64e-15,
        1.421_511_758_316_445_888_7e-7,
        1.846_318_317_510_054_681_8e-5,
        7.868_691_311_456_132_591e-4,
        1.487_536_129_085_061_485_25e-2,
        1.369_298_809_227_358_053_1e-1,
        5.998_322_065_558_879_376_9e-1,
        1.0,
    ],
];

/// The beta quantile of a probability, for shapes of at least 1, to about 1e-10 relative.
///
/// Newton's steps from the normal approximation, halving the bracket where a step leaves it.
pub(super) fn beta_quantile(p: f64, a: f64, b: f64) -> f64 {
    let log_constant = lgamma(a + b) - lgamma(a) - lgamma(b);
    let total = a + b;
    let spread = sqrt(a * b / (total + 1.0)) / total;
    let (mut low, mut high) = (0.0, 1.0);
    let mut x = (a / total + spread * normal_quantile(p)).clamp(1e-9, 1.0 - 1e-9);
    for _ in 0..100 {
        let excess = beta_probability(x, a, b, log_constant) - p;
        if excess > 0.0 {
            high = x;
        } else {
            low = x;
        }
        let density = exp(log_constant + (a - 1.0) * log(x) + (b - 1.0) * log1p(-x));
        let step = excess / density;
        if step.abs() <= 1e-11 * x {
            break;
        }
        let next = x - step;
        x = if next > low && next < high { next } else { 0.5 * (low + high) };
    }
    x
}

/// The regularised incomplete beta function for x inside (0, 1), by its continued fraction on the side where
/// that converges fast (NIST Digital Library of Mathematical Functions, 8.17.22 and 8.17.4).
fn beta_probability(x: f64, a: f64, b: f64, log_constant: f64) -> f64 {
    let front = exp(log_constant + a * log(x) + b * log1p(-x));
    if x <= (a + 1.0) / (a + b + 2.0) {
        front * beta_fraction(x, a, b) / a
    } else {
        1.0 - front * beta_fraction(1.0 - x, b, a) / b
    }
}

/// 1 / (1 + d_1 / (1 + d_2 / (1 + ...))), evaluated from the front (Lentz 1976). It takes of the order of
/// sqrt(max(a, b)) terms.
fn beta_fraction(x: f64, a: f64, b: f64) -> f64 {
    const TINY: f64 = 1e-300;
    let away_from_zero = |v: f64| if v.abs() < TINY { TINY } else { v };
    let (mut c, mut d, mut value) = (1.0, 0.0, 1.0);
    for k in 1..100_000_u32 {
        let m = f64::from(k / 2);
        let base = a + 2.0 * m;
        let term = if k % 2 == 0 {
            m * (b - m) * x / ((base - 1.0) * base)
        } else {
            -(a + m) * (a + b + m) * x / (base * (base + 1.0))
        };
        d = 1.0 / away_from_zero(1.0 + term * d);
        c = away_from_zero(1.0 + term / c);
        value *= c * d;
        if (c * d - 1.0).abs() < 1e-14 {
            break;
        }
    }
    1.0 / value
}
