//! Screens: pure functions from what was found to text for a terminal of some width.

pub(crate) mod check;
pub(crate) mod climb;
pub(crate) mod explain;
pub(crate) mod fit;
mod grid;
mod groups;
pub(crate) mod plan;
#[cfg(test)]
mod samples;
mod sources;
pub(crate) mod text;
mod unknowns;
pub(crate) mod verdict;

use text::Style;

/// The terminal that a screen is laid out for.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Screen {
    /// Its columns.
    pub(crate) width: usize,
    /// Colours or none.
    pub(crate) style: Style,
}

impl Screen {
    /// Standard output.
    pub(crate) fn stdout() -> Screen {
        Screen { width: crate::terminal::width(), style: Style { colour: crate::terminal::stdout_colour() } }
    }

    /// A heading with a remark behind it, after an empty line.
    fn heading(&self, title: &str, remark: &str) -> String {
        let gap = if remark.is_empty() { "" } else { "  " };
        format!("\n{}{gap}{}\n", self.style.strong(title), self.style.faint(remark))
    }
}

/// `, in kg`, or nothing.
fn in_unit(unit: Option<&str>) -> String {
    unit.map(|unit| format!(", in {unit}")).unwrap_or_default()
}

/// The Monte Carlo error of the ends of a central 95 % interval from that of the mean: the error of a quantile is
/// sqrt(p (1 - p)) / density, which for a normal at p = 0.025 is 2.67 sds, where the mean has 1.
const ERROR_OF_ENDS: f64 = 2.67;
