use statrs::distribution::{Beta, ContinuousCDF, Normal};

use crate::summary::special::{beta_quantile, normal_quantile};

#[test]
fn the_normal_quantile_inverts_the_reference_probability() {
    let normal = Normal::standard();
    for p in [1e-12, 1e-8, 1e-4, 0.02, 0.074, 0.076, 0.3, 0.5, 0.7, 0.93, 0.999, 1.0 - 1e-9] {
        let back = normal.cdf(normal_quantile(p));
        assert!((back / p - 1.0).abs() < 1e-9, "{p}: {back}");
    }
    // Abramowitz and Stegun (1964), table 26.5 (from memory): 1.95996 39845 at 0.975.
    assert!((normal_quantile(0.975) - 1.959_963_984_540_054).abs() < 1e-14);
}

#[test]
fn the_beta_quantile_inverts_the_reference_probability() {
    for size in [0.0, 1.0, 7.5, 400.0, 10_000.0, 40_000.0, 1e6] {
        for share in [0.025, 0.25, 0.5, 0.75, 0.975] {
            let (a, b) = (size * share + 1.0, size * (1.0 - share) + 1.0);
            for p in [0.158_655_253_931_457, 0.841_344_746_068_543] {
                let back = Beta::new(a, b).unwrap().cdf(beta_quantile(p, a, b));
                assert!((back - p).abs() < 1e-7, "Beta({a}, {b}) at {p}: {back}");
            }
        }
    }
}
