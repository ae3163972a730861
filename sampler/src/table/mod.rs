//! Delimited tables: text to typed columns, in memory that follows the columns and not the text.

mod block;
mod cell;
mod problem;
mod read;

pub use problem::{TableProblem, pages};
pub use read::read;

/// What is asked of a file: a column by its heading.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Request {
    /// The heading, matched after blanks around it are taken off.
    pub heading: String,
    /// What the column holds.
    pub kind: Kind,
}

/// What a column holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// Labels: any text.
    Labels,
    /// Numbers with a decimal point.
    Numbers,
    /// yes or no, true or false, 1 or 0, in any case of letters.
    YesNo,
}

/// How a file is written.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Format {
    /// The delimiter; `None` takes the most frequent of tab, comma and semicolon in the first line.
    pub delimiter: Option<u8>,
    /// The texts of cells that mean a missing one.
    pub gaps: Vec<String>,
    /// Threads that share the work.
    pub threads: usize,
}

impl Default for Format {
    fn default() -> Format {
        Format { delimiter: None, gaps: vec![String::new(), "NA".to_string()], threads: 2 }
    }
}

/// A file that was read: the columns that were asked for, in the order of the requests.
#[derive(Clone, Debug, PartialEq)]
pub struct Table {
    /// The name of the file, for messages.
    pub file: String,
    /// How many rows.
    pub rows: usize,
    /// The columns.
    pub columns: Vec<Column>,
    /// Rows that do not stand in the line after the row before: `(row, line)`, ascending.
    lines: Vec<(usize, usize)>,
}

/// A typed column.
#[derive(Clone, Debug, PartialEq)]
pub enum Column {
    /// Labels.
    Labels {
        /// The distinct ones, in the order in which they first appear.
        labels: Vec<String>,
        /// For each row its label; `u32::MAX` where it has none.
        codes: Vec<u32>,
    },
    /// Numbers.
    Numbers {
        /// For each row its number; NaN where it has none, and for no other reason.
        values: Vec<f64>,
    },
}

impl Table {
    /// A table that was made and not read.
    pub fn made(file: String, rows: usize, columns: Vec<Column>) -> Table {
        Table { file, rows, columns, lines: vec![] }
    }

    /// The line of a row in its file, both counted as people do: the first row from 0, lines from 1.
    pub fn line(&self, row: usize) -> usize {
        match self.lines.partition_point(|(first, _)| *first <= row).checked_sub(1) {
            Some(at) => self.lines[at].1 + (row - self.lines[at].0),
            None => row + 2,
        }
    }
}
