//! Text for screens: styles, widths in terminal columns, wrapping, bars.

use unicode_width::UnicodeWidthStr;

/// Whether text is coloured.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Style {
    /// With colours and weights, or plain.
    pub(crate) colour: bool,
}

impl Style {
    fn paint(self, code: &str, text: &str) -> String {
        if self.colour && !text.is_empty() {
            format!("\u{1b}[{code}m{text}\u{1b}[0m")
        } else {
            text.to_string()
        }
    }

    /// A heading or what matters most.
    pub(crate) fn strong(self, text: &str) -> String {
        self.paint("1", text)
    }

    /// What matters less.
    pub(crate) fn faint(self, text: &str) -> String {
        self.paint("2", text)
    }

    /// What is wrong.
    pub(crate) fn alarm(self, text: &str) -> String {
        self.paint("1;31", text)
    }

    /// What is drawn.
    pub(crate) fn drawn(self, text: &str) -> String {
        self.paint("36", text)
    }
}

/// Terminal columns of a text without styles.
pub(crate) fn columns(text: &str) -> usize {
    text.width()
}

/// The text filled up with spaces behind it.
pub(crate) fn left(text: &str, width: usize) -> String {
    format!("{text}{}", " ".repeat(width.saturating_sub(columns(text))))
}

/// The text filled up with spaces before it.
pub(crate) fn right(text: &str, width: usize) -> String {
    format!("{}{text}", " ".repeat(width.saturating_sub(columns(text))))
}

/// The text, cut with an ellipsis where it is wider.
pub(crate) fn cut(text: &str, width: usize) -> String {
    if columns(text) <= width {
        return text.to_string();
    }
    let mut kept = String::new();
    for character in text.chars() {
        kept.push(character);
        if columns(&kept) + 1 > width {
            kept.pop();
            break;
        }
    }
    kept.push('…');
    kept
}

/// The text in lines of at most `width` columns, each after `indent` spaces, with a line end behind each.
pub(crate) fn wrap(text: &str, width: usize, indent: usize) -> String {
    hang(text, width, indent, indent)
}

/// As [`wrap`], with another indent from the second line on.
pub(crate) fn hang(text: &str, width: usize, first: usize, rest: usize) -> String {
    let mut out = String::new();
    let mut line = " ".repeat(first);
    let mut empty = true;
    for word in text.split_whitespace() {
        if !empty && columns(&line) + 1 + columns(word) > width {
            out.push_str(&line);
            out.push('\n');
            line = " ".repeat(rest);
            empty = true;
        }
        if !empty {
            line.push(' ');
        }
        line.push_str(word);
        empty = false;
    }
    if !empty {
        out.push_str(&line);
        out.push('\n');
    }
    out
}

/// A share between 0 and 1 as a bar of at most `width` columns, to an eighth of a column.
pub(crate) fn bar(share: f64, width: usize) -> String {
    const PARTS: [&str; 8] = ["", "▏", "▎", "▍", "▌", "▋", "▊", "▉"];
    let eighths = (share.clamp(0.0, 1.0) * width as f64 * 8.0).round() as usize;
    format!("{}{}", "█".repeat(eighths / 8), PARTS[eighths % 8])
}

/// A whole number with its thousands apart.
pub(crate) fn thousands(number: f64) -> String {
    let digits = format!("{:.0}", number.abs());
    let mut out = String::new();
    for (at, digit) in digits.chars().enumerate() {
        if at > 0 && (digits.len() - at) % 3 == 0 {
            out.push(',');
        }
        out.push(digit);
    }
    if number < 0.0 && out != "0" { format!("-{out}") } else { out }
}

/// `1 label`, `8 labels`.
pub(crate) fn counted(number: usize, one: &str, several: &str) -> String {
    match number {
        1 => format!("1 {one}"),
        _ => format!("{} {several}", thousands(number as f64)),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn wrapping_keeps_the_width_and_every_word() {
        let text = "the apiary on the heath gave less than the one in the limes";
        let wrapped = wrap(text, 20, 2);
        assert!(wrapped.lines().all(|line| columns(line) <= 20 && line.starts_with("  ")));
        assert_eq!(wrapped.split_whitespace().collect::<Vec<_>>().join(" "), text);
    }

    #[test]
    fn cutting_counts_terminal_columns() {
        assert_eq!(cut("heather", 7), "heather");
        assert_eq!(cut("heather", 5), "heat…");
        assert_eq!(columns(&cut("蜂蜜蜂蜜", 5)), 5);
    }

    #[test]
    fn bars_are_as_long_as_their_share() {
        assert_eq!(bar(0.5, 10), "█████");
        assert_eq!(bar(0.0, 10), "");
        assert_eq!(columns(&bar(1.0, 10)), 10);
        assert_eq!(bar(0.55, 10), "█████▌");
    }

    #[test]
    fn thousands_are_set_apart() {
        assert_eq!(thousands(999.0), "999");
        assert_eq!(thousands(1234567.0), "1,234,567");
        assert_eq!(thousands(-1200.4), "-1,200");
    }
}
