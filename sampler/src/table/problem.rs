//! What can be wrong with a file as a table (codes T...).

use stook_lang::problem::{Code, Page};

use crate::report::{DataPlace, DataReport};

/// A cell by its line, with what stands there.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Cell {
    /// The line, from 1.
    pub line: usize,
    /// What stands there.
    pub text: String,
}

/// Something wrong with a file.
#[derive(Clone, Debug, PartialEq, Eq)]
#[allow(missing_docs, reason = "the fields are what the variant's sentence names")]
pub enum TableProblem {
    /// A heading that the file does not have, with the nearest one and all.
    MissingColumn { file: String, heading: String, nearest: Option<String>, headings: Vec<String> },
    /// A heading that stands twice.
    DuplicateHeading { file: String, heading: String },
    /// Cells that are no numbers (or no yes or no): the first few and how many.
    NoNumber { file: String, heading: String, yes_no: bool, cells: Vec<Cell>, count: usize },
    /// Rows with another number of cells than there are headings: line and cells of the first few, and how many.
    Ragged { file: String, fields: usize, rows: Vec<(usize, usize)>, count: usize },
    /// A file without headings.
    Empty { file: String },
    /// Headings without rows.
    NoRows { file: String },
    /// A line that is not UTF-8.
    NotText { file: String, line: usize, byte: usize },
    /// What the system answered.
    Unreadable { file: String, cause: String },
    /// A binary file.
    NoTable { file: String },
    /// More rows than can be counted.
    TooManyRows { file: String, rows: usize },
}

impl TableProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> DataReport {
        match self {
            TableProblem::MissingColumn { file, heading, nearest, headings } => {
                let have = headings.join(", ");
                let help = match nearest {
                    Some(nearest) => format!(
                        "the nearest heading is `{nearest}`: write `from \"{nearest}\"`; the file has {have}"
                    ),
                    None => format!("say which heading is meant with `from \"...\"`; the file has {have}"),
                };
                simple("T001", format!("{file} has no column `{heading}`"), help)
            }
            TableProblem::DuplicateHeading { file, heading } => simple(
                "T002",
                format!("{file} has more than one column `{heading}`"),
                "rename one of them in the file".into(),
            ),
            TableProblem::NoNumber { file, heading, yes_no, cells, count } => {
                let wanted = if *yes_no { "yes or no" } else { "a number" };
                let comma = cells.iter().any(|cell| is_decimal_comma(&cell.text));
                let help = if comma {
                    "decimal numbers are written with a point: save the file with decimal points".to_string()
                } else if *yes_no {
                    "write yes or no, true or false, 1 or 0; other texts for missing cells are given with --gap".to_string()
                } else {
                    "mend the cells; other texts for missing cells than NA are given with --gap".to_string()
                };
                let places = cells.iter().map(|cell| DataPlace {
                    file: file.clone(),
                    line: cell.line,
                    heading: heading.clone(),
                    text: cell.text.clone(),
                });
                let cells_word = if *count == 1 { "cell is" } else { "cells are" };
                DataReport {
                    code: Code("T003"),
                    message: format!("{count} {cells_word} not {wanted} in `{heading}`"),
                    places: places.collect(),
                    more: count - cells.len(),
                    span: None,
                    help,
                }
            }
            TableProblem::Ragged { file, fields, rows, count } => {
                let places = rows.iter().map(|(line, found)| DataPlace {
                    file: file.clone(),
                    line: *line,
                    heading: String::new(),
                    text: format!("{found} cells"),
                });
                let rows_word = if *count == 1 { "row has" } else { "rows have" };
                DataReport {
                    code: Code("T004"),
                    message: format!(
                        "{count} {rows_word} another number of cells than the {fields} headings"
                    ),
                    places: places.collect(),
                    more: count - rows.len(),
                    span: None,
                    help:
                        "put cells that hold the delimiter between quotes, and fill rows up with empty cells"
                            .into(),
                }
            }
            TableProblem::Empty { file } => {
                simple("T005", format!("{file} is empty"), "the first line must hold the headings".into())
            }
            TableProblem::NoRows { file } => simple(
                "T006",
                format!("{file} has headings and no rows"),
                "add rows, or name another file with --table".into(),
            ),
            TableProblem::NotText { file, line, byte } => DataReport {
                places: vec![DataPlace {
                    file: file.clone(),
                    line: *line,
                    heading: String::new(),
                    text: format!("byte {byte} of its block"),
                }],
                ..simple(
                    "T007",
                    format!("{file} is not UTF-8"),
                    "save it as UTF-8 (in a spreadsheet: \"CSV UTF-8\")".into(),
                )
            },
            TableProblem::Unreadable { file, cause } => simple(
                "T008",
                format!("{file} cannot be read: {cause}"),
                "mend the path in the model (`from`), or give it with --table NAME=FILE".into(),
            ),
            TableProblem::NoTable { file } => simple(
                "T009",
                format!("{file} is no text but a binary file"),
                "save the table as CSV or TSV".into(),
            ),
            TableProblem::TooManyRows { file, rows } => simple(
                "T010",
                format!("{file} has {rows} rows"),
                "up to 4,294,967,294 rows can be read: leave some out".into(),
            ),
        }
    }
}

/// `12,5`: digits, one comma, digits.
fn is_decimal_comma(text: &str) -> bool {
    let digits = |part: &str| !part.is_empty() && part.bytes().all(|byte| byte.is_ascii_digit());
    text.trim_start_matches('-').split_once(',').is_some_and(|(whole, part)| digits(whole) && digits(part))
}

fn simple(code: &'static str, message: String, help: String) -> DataReport {
    DataReport { code: Code(code), message, places: vec![], more: 0, span: None, help }
}

/// The pages of this family. Their examples are a model and, behind a line `--- FILE`, the table that it is read with.
pub fn pages() -> &'static [Page] {
    PAGES
}

const PAGES: &[Page] = &[
    Page {
        code: Code("T001"),
        title: "a column that the file does not have",
        text: "A column is found by its heading: its name in the model, or the text behind `from`.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T002"),
        title: "a heading that stands twice",
        text: "A column that the model reads must have a heading of its own.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,plot,Yield (t/ha)
A,A,5.1
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T003"),
        title: "a cell that is no number",
        text: "Numbers are written with a decimal point, without a separator of thousands. Missing cells are empty or `NA`; `--gap` gives other texts for them.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9 t
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T004"),
        title: "a row with too few or too many cells",
        text: "Every row has as many cells as there are headings. A cell that holds the delimiter is put between quotes.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4,9
B,6.0
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T005"),
        title: "an empty file",
        text: "The first line of a table holds the headings.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T006"),
        title: "a table without rows",
        text: "There are headings, and no rows below them.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T007"),
        title: "a file that is not UTF-8",
        text: r#"Tables are read as UTF-8. A spreadsheet saves it as "CSV UTF-8". The example cannot show such a byte; it shows a file without rows."#,
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T008"),
        title: "a file that cannot be read",
        text: "The message says what the system answered: no such file, no permission. The example names a file that is not there.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T009"),
        title: "a file that is no table",
        text: "A table is delimited text. Workbooks and other binary files are saved as CSV first. The example cannot show such a file; it shows an empty one.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
    Page {
        code: Code("T010"),
        title: "more rows than can be counted",
        text: "A table may have up to 4,294,967,294 rows. The example cannot show so many; it shows a file without any.",
        wrong: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
"#,
        right: r#"group plot
table trial from "trial.csv" {
    plot
    yield : positive from "Yield (t/ha)"
}
unknown grand : real follows normal(mean: 5, sd: 3)
unknown noise : positive follows half_normal(sd: 3)
response yield follows normal(mean: grand, sd: noise)
--- trial.csv
plot,Yield (t/ha)
A,5.1
A,4.9
B,6.0
"#,
    },
];
