//! Rows of cells set under each other.

use super::text::{Style, columns, cut, left, right};

/// On which side the cells of a column are flush.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Side {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// How a cell looks.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Tone {
    /// As it is.
    Plain,
    /// What matters most.
    Strong,
    /// What matters less.
    Faint,
    /// What is wrong.
    Alarm,
    /// A bar or a strip.
    Drawn,
}

/// A cell; it may reach over several columns.
#[derive(Clone, Debug)]
pub(crate) struct Cell {
    text: String,
    tone: Tone,
    span: usize,
    side: Option<Side>,
}

impl Cell {
    /// A cell of one column.
    pub(crate) fn new(text: impl Into<String>) -> Cell {
        Cell { text: text.into(), tone: Tone::Plain, span: 1, side: None }
    }

    /// The same in another tone.
    pub(crate) fn tone(mut self, tone: Tone) -> Cell {
        self.tone = tone;
        self
    }

    /// The same over several columns.
    pub(crate) fn over(mut self, span: usize) -> Cell {
        self.span = span.max(1);
        self
    }

    /// The same as the only one of its row, as wide as it needs to be.
    pub(crate) fn free(mut self) -> Cell {
        self.span = usize::MAX;
        self
    }

    /// The same flush on another side than its column.
    pub(crate) fn side(mut self, side: Side) -> Cell {
        self.side = Some(side);
        self
    }
}

impl<T: Into<String>> From<T> for Cell {
    fn from(text: T) -> Cell {
        Cell::new(text)
    }
}

/// Rows of cells.
#[derive(Clone, Debug)]
pub(crate) struct Grid {
    sides: Vec<Side>,
    rows: Vec<Vec<Cell>>,
    indent: usize,
    gap: usize,
}

impl Grid {
    /// No rows yet; a side for each column.
    pub(crate) fn new(sides: Vec<Side>) -> Grid {
        Grid { sides, rows: vec![], indent: 2, gap: 2 }
    }

    /// Adds a row.
    pub(crate) fn row(&mut self, cells: Vec<Cell>) {
        self.rows.push(cells);
    }

    /// The rows as text. The first column is cut where a row would be wider than `width`.
    pub(crate) fn render(&self, width: usize, style: Style) -> String {
        let widths = self.widths(width);
        let mut out = String::new();
        for row in &self.rows {
            if let [Cell { text, tone, span: usize::MAX, .. }] = &row[..] {
                let text = cut(text, width.saturating_sub(self.indent));
                out.push_str(&format!("{}{}\n", " ".repeat(self.indent), toned(&text, *tone, style)));
                continue;
            }
            let mut line = String::new();
            let mut at = 0;
            for cell in row {
                let last = (at + cell.span).min(widths.len());
                let room = widths[at..last].iter().sum::<usize>() + self.gap * (last - at).saturating_sub(1);
                let text = cut(&cell.text, room);
                let side = cell.side.unwrap_or(self.sides[at]);
                let filled = match side {
                    Side::Left => left(&text, room),
                    Side::Right => right(&text, room),
                };
                line.push_str(&" ".repeat(if at == 0 { self.indent } else { self.gap }));
                line.push_str(&toned(&filled, cell.tone, style));
                at = last;
            }
            out.push_str(line.trim_end());
            out.push('\n');
        }
        out
    }

    fn widths(&self, width: usize) -> Vec<usize> {
        let mut widths = vec![0; self.sides.len()];
        self.each(|at, cell| {
            if cell.span == 1 {
                widths[at] = columns(&cell.text).max(widths[at]);
            }
        });
        // What reaches over several columns widens the last of them where it needs to.
        self.each(|at, cell| {
            let last = (at + cell.span).min(widths.len());
            let room = widths[at..last].iter().sum::<usize>() + self.gap * (last - at).saturating_sub(1);
            if cell.span > 1 && columns(&cell.text) > room {
                widths[last - 1] += columns(&cell.text) - room;
            }
        });
        let total = widths.iter().sum::<usize>() + self.indent + self.gap * widths.len().saturating_sub(1);
        if let Some(first) = widths.first_mut() {
            *first -= total.saturating_sub(width).min(first.saturating_sub(8));
        }
        widths
    }

    fn each(&self, mut visit: impl FnMut(usize, &Cell)) {
        for row in &self.rows {
            let mut at = 0;
            for cell in row.iter().filter(|cell| cell.span != usize::MAX) {
                if at < self.sides.len() {
                    visit(at, cell);
                }
                at += cell.span;
            }
        }
    }
}

/// Styles the words of a cell and not the spaces around them.
fn toned(filled: &str, tone: Tone, style: Style) -> String {
    let text = filled.trim();
    let Some(start) = filled.find(text).filter(|_| !text.is_empty()) else { return filled.to_string() };
    let styled = match tone {
        Tone::Plain => text.to_string(),
        Tone::Strong => style.strong(text),
        Tone::Faint => style.faint(text),
        Tone::Alarm => style.alarm(text),
        Tone::Drawn => style.drawn(text),
    };
    format!("{}{styled}{}", &filled[..start], &filled[start + text.len()..])
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cells_stand_under_each_other_and_spans_widen_their_last_column() {
        let mut grid = Grid::new(vec![Side::Left, Side::Right, Side::Right]);
        grid.row(vec!["".into(), Cell::new("95 % interval").over(2)]);
        grid.row(vec!["grand".into(), "17".into(), "32".into()]);
        grid.row(vec!["residual".into(), "3.9".into(), "4.8".into()]);
        insta::assert_snapshot!(grid.render(80, Style { colour: false }), @r"
                    95 % interval
          grand      17        32
          residual  3.9       4.8
        ");
    }

    #[test]
    fn a_long_name_is_cut_before_numbers_are() {
        let mut grid = Grid::new(vec![Side::Left, Side::Right]);
        grid.row(vec!["a name that is much too long for this".into(), "1.25".into()]);
        assert_eq!(grid.render(20, Style { colour: false }), "  a name that…  1.25\n");
    }
}
