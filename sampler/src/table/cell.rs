//! Single cells.

/// The cell without blanks around it.
pub(super) fn trimmed(cell: &[u8]) -> &[u8] {
    cell.trim_ascii()
}

const POWERS: [f64; 23] = [
    1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18,
    1e19, 1e20, 1e21, 1e22,
];

/// A decimal number: sign, digits with a point, exponent. Short ones exactly by one division (Clinger 1990), the rest by
/// the standard library; both give the nearest double. `None` for anything else, for infinities and for NaN.
pub(super) fn number(cell: &[u8]) -> Option<f64> {
    let (negative, digits) = match cell {
        [b'-', rest @ ..] => (true, rest),
        [b'+', rest @ ..] => (false, rest),
        _ => (false, cell),
    };
    let mut mantissa: u64 = 0;
    let mut places = 0usize;
    let mut point = false;
    let mut count = 0usize;
    for byte in digits {
        match byte {
            b'0'..=b'9' if count < 18 => {
                mantissa = mantissa * 10 + u64::from(byte - b'0');
                count += 1;
                places += usize::from(point);
            }
            b'.' if !point => point = true,
            _ => return general(cell),
        }
    }
    if count == 0 {
        return None;
    }
    if mantissa <= 1 << 53 && places < POWERS.len() {
        let value = mantissa as f64 / POWERS[places];
        return Some(if negative { -value } else { value });
    }
    general(cell)
}

fn general(cell: &[u8]) -> Option<f64> {
    let allowed = |byte: &u8| matches!(byte, b'0'..=b'9' | b'+' | b'-' | b'.' | b'e' | b'E');
    if !cell.iter().all(allowed) {
        return None;
    }
    std::str::from_utf8(cell).ok()?.parse::<f64>().ok().filter(|value| value.is_finite())
}

/// 1 for yes, true and 1; 0 for no, false and 0.
pub(super) fn yes_no(cell: &[u8]) -> Option<f64> {
    let is = |word: &str| cell.eq_ignore_ascii_case(word.as_bytes());
    if is("yes") || is("true") || is("1") {
        Some(1.0)
    } else if is("no") || is("false") || is("0") {
        Some(0.0)
    } else {
        None
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_are_those_of_the_standard_library_to_the_bit() {
        for text in [
            "0",
            "-0",
            "1",
            "+1.5",
            "-2.25",
            "3.14159265358979",
            "123456789012345678",
            "0.1",
            "1e-3",
            "5E22",
            "9007199254740993",
            ".5",
            "7.",
            "0.000000000000000000000001",
            "179769313486231570000000000000",
        ] {
            let wanted: f64 = text.parse().unwrap_or(f64::NAN);
            assert_eq!(number(text.as_bytes()).map(f64::to_bits), Some(wanted.to_bits()), "{text}");
        }
    }

    #[test]
    fn what_is_no_decimal_number_is_refused() {
        for text in ["", "-", ".", "1,5", "inf", "NaN", "1e400", "0x10", "1 2", "12a", "1.2.3", "e5"] {
            assert_eq!(number(text.as_bytes()), None, "{text}");
        }
    }
}
