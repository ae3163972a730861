use crate::summary::format::{column, rounded};

#[test]
fn digits_end_where_the_error_begins() {
    assert_eq!(rounded(23.4567, 0.03), "23.46");
    assert_eq!(rounded(23.4567, 0.06), "23.5");
    assert_eq!(rounded(23.4567, 0.004), "23.457");
    assert_eq!(rounded(-23.4567, 0.4), "-23.5");
    assert_eq!(rounded(23.4567, 3.0), "23");
    assert_eq!(rounded(1234.5, 30.0), "1230");
    assert_eq!(rounded(9.999, 0.03), "10.00");
}

#[test]
fn rounding_never_moves_a_value_by_more_than_its_error() {
    for step in 0..200 {
        let mcse = 1e-3 * 1.05_f64.powi(step);
        let value = 4_321.987_654_321;
        let shown: f64 = rounded(value, mcse).parse().unwrap();
        assert!((shown - value).abs() <= mcse, "{shown} for an error of {mcse}");
    }
}

#[test]
fn a_value_lost_in_its_error_is_zero_without_a_sign() {
    assert_eq!(rounded(-0.004, 0.03), "0.00");
    assert_eq!(rounded(0.0, 0.03), "0.00");
    assert_eq!(rounded(3.0, 90.0), "0");
    assert_eq!(rounded(2e-7, 1e-6), "0.0000");
}

#[test]
fn powers_of_ten_stand_for_very_large_and_very_small_values_only() {
    assert_eq!(rounded(0.000_123_4, 0.000_003), "0.000123");
    assert_eq!(rounded(0.000_012_34, 0.000_000_3), "1.23e-5");
    assert_eq!(rounded(9_876_543.2, 0.8), "9876543");
    assert_eq!(rounded(12_345_678.0, 3e4), "1.235e7");
    assert_eq!(rounded(6e7, 1e8), "1e8");
}

#[test]
fn constants_show_their_digits_without_closing_zeros() {
    assert_eq!(rounded(2.5, 0.0), "2.5");
    assert_eq!(rounded(100.0, 0.0), "100");
    assert_eq!(rounded(1_234_567.0, 0.0), "1234567");
    assert_eq!(rounded(1.0 / 3.0, 0.0), "0.333333");
    assert_eq!(rounded(0.0, 0.0), "0");
    assert_eq!(rounded(1.5e-9, 0.0), "1.5e-9");
}

#[test]
fn without_a_known_error_three_digits_are_shown() {
    assert_eq!(rounded(23.4567, f64::NAN), "23.5");
    assert_eq!(rounded(0.012_345, f64::INFINITY), "0.0123");
    assert_eq!(rounded(0.0, f64::NAN), "0.00");
}

#[test]
fn numbers_that_are_none_are_said_so() {
    assert_eq!(rounded(f64::NAN, 1.0), "-");
    assert_eq!(rounded(f64::INFINITY, 1.0), "inf");
    assert_eq!(rounded(f64::NEG_INFINITY, 0.0), "-inf");
}

#[test]
fn extreme_values_and_errors_are_printed() {
    for value in [f64::MAX, f64::MIN_POSITIVE, 5e-324, -f64::MAX] {
        for mcse in [f64::MAX, 5e-324, 1.0, 0.0, -1.0] {
            assert!(rounded(value, mcse).len() < 25, "{value} {mcse}");
        }
    }
}

#[test]
fn decimal_points_stand_under_each_other() {
    let cells = column(&[(23.4567, 0.03), (-1.2, 0.4), (150.0, 0.0), (1.5e9, 2e7)]);
    assert_eq!(cells, [" 23.46  ", " -1.2   ", "150     ", "  1.50e9"]);
}
