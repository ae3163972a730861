//! Numbers with the digits that their Monte Carlo error bears.

/// Significant digits of a constant; a whole number shows all its digits.
const DIGITS_OF_CONSTANT: i32 = 6;

/// Significant digits of a number whose Monte Carlo error is not known.
const DIGITS_OF_UNKNOWN: i32 = 3;

/// The most significant digits that a double bears.
const MOST_DIGITS: i32 = 15;

/// The value, rounded so that its last digit is of the order of its Monte Carlo standard error.
///
/// The last digit's unit is the power of ten with the error between half a unit and five units: the last
/// digit is uncertain, the one before it is not, and rounding never moves the value by more than one standard
/// error. So 23.4567 with an error of 0.03 is `23.46`, with 0.06 `23.5`, and 1234.5 with an error of 30 is
/// `1230`.
///
/// An error of 0 marks a constant: 6 significant digits, without closing zeros. An error that is negative,
/// infinite or not a number is not known: 3 significant digits. Powers of ten (`1.235e7`) stand only for
/// values from 1e7 up or below 1e-4.
pub fn rounded(value: f64, mcse: f64) -> String {
    if !value.is_finite() {
        return if value.is_nan() { "-".to_owned() } else { format!("{value}") };
    }
    let first = exponent(value);
    let last = match mcse {
        0.0 => (first + 1 - DIGITS_OF_CONSTANT).min(0).max(first + 1 - MOST_DIGITS),
        _ if is_error(mcse) => unit_exponent(mcse).max(first + 1 - MOST_DIGITS),
        _ => first + 1 - DIGITS_OF_UNKNOWN,
    };
    let text = to_unit(value, last);
    if mcse == 0.0 { without_closing_zeros(text) } else { text }
}

/// The cells of a column, each rounded as by [`rounded`] from its value and error, padded so that the decimal
/// points stand under each other and all cells are equally wide.
pub fn column(cells: &[(f64, f64)]) -> Vec<String> {
    let texts: Vec<String> = cells.iter().map(|(value, mcse)| rounded(*value, *mcse)).collect();
    let whole = |text: &str| text.find(['.', 'e']).unwrap_or(text.len());
    let left = texts.iter().map(|text| whole(text)).max().unwrap_or(0);
    let right = texts.iter().map(|text| text.len() - whole(text)).max().unwrap_or(0);
    let padded = |text: &String| {
        let (before, after) = text.split_at(whole(text));
        format!("{before:>left$}{after:<right$}")
    };
    texts.iter().map(padded).collect()
}

fn is_error(mcse: f64) -> bool {
    mcse > 0.0 && mcse.is_finite()
}

/// The exponent of the leading digit.
fn exponent(value: f64) -> i32 {
    // Printing finds it exactly, where a logarithm may be off next to a power of ten.
    let text = format!("{value:e}");
    text.rsplit('e').next().and_then(|digits| digits.parse().ok()).unwrap_or(0)
}

/// The exponent of the power of ten u with 0.5 u <= mcse < 5 u.
fn unit_exponent(mcse: f64) -> i32 {
    exponent(2.0 * mcse)
}

/// The value rounded to a multiple of ten to the power of `last`.
fn to_unit(value: f64, last: i32) -> String {
    let unit = libm::exp10(f64::from(last));
    let size = value.abs();
    if size < 0.5 * unit {
        return format!("{:.*}", last.clamp(-4, 0).unsigned_abs() as usize, 0.0);
    }
    // Printing rounds to digits after the point; only a unit of tens and up has to be rounded to before.
    let value = if last > 0 { (value / unit).round() * unit } else { value };
    if (1e-4..1e7).contains(&size) {
        format!("{value:.*}", (-last).max(0) as usize)
    } else {
        format!("{value:.*e}", (exponent(value) - last).max(0) as usize)
    }
}

fn without_closing_zeros(text: String) -> String {
    let (digits, power) = text.split_at(text.find('e').unwrap_or(text.len()));
    if !digits.contains('.') {
        return text;
    }
    format!("{}{power}", digits.trim_end_matches('0').trim_end_matches('.'))
}
