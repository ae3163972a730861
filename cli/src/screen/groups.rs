//! The groups: for each label the interval of its mean and that of a new reading, side by side.

use stook_sampler::answer::{GroupRow, GroupTable, Interval};
use stook_sampler::summary::format::{column, rounded};

use super::grid::{Cell, Grid, Side, Tone};
use super::{ERROR_OF_ENDS, Screen, in_unit};

/// Rows that are shown of a group.
const SHOWN_LABELS: usize = 12;
/// From this width on the intervals are drawn, too.
const WIDE: usize = 110;

/// The table of one group.
pub(super) fn group(screen: &Screen, found: &GroupTable) -> String {
    let rows = &found.rows[..found.rows.len().min(SHOWN_LABELS)];
    // A reading that is yes or no is told by its probability, and that is the label's mean.
    let both = rows.iter().any(|row| row.mean != row.reading);
    let remark = match (screen.width >= WIDE, both) {
        (true, true) => "95 % intervals: ━━●━━ its mean, ····· a new reading",
        (true, false) => "95 % intervals: ━━●━━ its mean",
        (false, _) => "95 % intervals",
    };
    let title = format!("{} by {}{}", found.response, found.group, in_unit(found.unit.as_deref()));
    let mut out = screen.heading(&title, remark);
    out.push_str(&table(screen, &found.group, rows, both));
    let more = found.rows.len() - rows.len();
    if more > 0 {
        out.push_str(&format!("  {}\n", screen.style.faint(&format!("... and {more} more in groups.csv"))));
    }
    out
}

fn table(screen: &Screen, group: &str, rows: &[GroupRow], both: bool) -> String {
    let mut blocks = vec![("its mean", intervals(rows.iter().map(|row| &row.mean)))];
    if both {
        blocks.push(("a new reading", intervals(rows.iter().map(|row| &row.reading))));
    }
    let strip = (screen.width >= WIDE).then(|| Strip::new(rows, screen.width - 90));
    let faint = |text: &str| Cell::new(text).tone(Tone::Faint);
    let mut sides = vec![Side::Left, Side::Right];
    let mut titles = vec![faint(""), faint("")];
    let mut heads = vec![faint(group), faint("readings")];
    for (title, _) in &blocks {
        sides.extend([Side::Right; 3]);
        titles.push(faint(title).over(3).side(Side::Right));
        heads.extend(["from", "mean", "to"].map(faint));
    }
    sides.push(Side::Left);
    titles.push(faint(&strip.as_ref().map_or(String::new(), Strip::scale)));
    let mut grid = Grid::new(sides);
    grid.row(titles);
    grid.row(heads);
    for (at, row) in rows.iter().enumerate() {
        let mut cells = vec![Cell::new(&row.label), faint(&row.readings.to_string())];
        for (_, numbers) in &blocks {
            let tones = [Tone::Plain, Tone::Strong, Tone::Plain];
            cells.extend(numbers.iter().zip(tones).map(|(column, tone)| Cell::new(&column[at]).tone(tone)));
        }
        cells.extend(strip.as_ref().map(|strip| Cell::new(strip.draw(row)).tone(Tone::Drawn)));
        grid.row(cells);
    }
    grid.render(screen.width, screen.style)
}

/// The columns of lower ends, means and upper ends.
fn intervals<'a>(found: impl Iterator<Item = &'a Interval> + Clone) -> [Vec<String>; 3] {
    let cells = |number: fn(&Interval) -> (f64, f64)| column(&found.clone().map(number).collect::<Vec<_>>());
    [
        cells(|interval| (interval.low, ERROR_OF_ENDS * interval.mcse)),
        cells(|interval| (interval.mean, interval.mcse)),
        cells(|interval| (interval.high, ERROR_OF_ENDS * interval.mcse)),
    ]
}

/// Intervals drawn on one scale: `···━━●━━·····`, a new reading with dots and the mean with a bar inside it.
struct Strip {
    low: f64,
    high: f64,
    width: usize,
}

impl Strip {
    fn new(rows: &[GroupRow], width: usize) -> Strip {
        let ends =
            rows.iter().flat_map(|row| [row.mean.low, row.mean.high, row.reading.low, row.reading.high]);
        let (low, high) = ends
            .filter(|end| end.is_finite())
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), end| (low.min(end), high.max(end)));
        Strip { low, high, width: width.clamp(20, 60) }
    }

    /// The two ends of the scale.
    fn scale(&self) -> String {
        let size = self.high - self.low;
        if !size.is_finite() || size <= 0.0 {
            return String::new();
        }
        let (low, high) = (rounded(self.low, size / 100.0), rounded(self.high, size / 100.0));
        let gap = self.width.saturating_sub(low.len() + high.len());
        format!("{low}{}{high}", " ".repeat(gap))
    }

    fn draw(&self, row: &GroupRow) -> String {
        let size = self.high - self.low;
        if !size.is_finite() || size <= 0.0 {
            return String::new();
        }
        let place = |value: f64| {
            let at = (value - self.low) / size * (self.width - 1) as f64;
            if at.is_finite() { at.round().clamp(0.0, (self.width - 1) as f64) as usize } else { 0 }
        };
        let mut marks = vec![' '; self.width];
        marks[place(row.reading.low)..=place(row.reading.high)].fill('·');
        marks[place(row.mean.low)..=place(row.mean.high)].fill('━');
        marks[place(row.mean.mean)] = '●';
        marks.into_iter().collect()
    }
}
