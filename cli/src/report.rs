//! Problems on their way out: for people to standard error, for programs as JSON lines to standard output.

use serde_json::{Value, json};
use stook_lang::problem::{self, Report};
use stook_lang::span::Sources;
use stook_sampler::report::{DataPlace, DataReport};

use crate::arguments::{MessageArguments, MessageFormat};
use crate::outcome::Outcome;
use crate::screen::text::Style;
use crate::terminal;

/// A problem that lies neither in the model's text nor in a cell.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Failure {
    /// What is wrong.
    pub(crate) message: String,
    /// One way to mend it; empty if there is none to name.
    pub(crate) help: String,
}

impl Failure {
    /// A failure with its mend.
    pub(crate) fn new(message: impl Into<String>, help: impl Into<String>) -> Failure {
        Failure { message: message.into(), help: help.into() }
    }

    /// From a text whose mend stands behind `help:` in a line of its own.
    pub(crate) fn from_text(text: &str) -> Failure {
        match text.split_once("help:") {
            Some((message, help)) => Failure::new(message.trim_end(), help.trim()),
            None => Failure::new(text.trim_end(), ""),
        }
    }
}

/// Writes problems out.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Reporter {
    format: MessageFormat,
    quiet: bool,
}

impl Reporter {
    /// As the command line asks for.
    pub(crate) fn new(messages: MessageArguments) -> Reporter {
        Reporter { format: messages.message_format, quiet: messages.quiet }
    }

    /// For people, with screens.
    pub(crate) fn for_people() -> Reporter {
        Reporter { format: MessageFormat::Human, quiet: false }
    }

    /// Whether screens are to be shown.
    pub(crate) fn shows_screens(&self) -> bool {
        !self.quiet && self.format == MessageFormat::Human
    }

    /// Shows a screen, unless the command line forbids it.
    pub(crate) fn screen(&self, text: &str) -> Result<(), Failure> {
        if !self.shows_screens() {
            return Ok(());
        }
        terminal::print(text)
            .map_err(|error| Failure::new(format!("standard output cannot be written: {error}"), ""))
    }

    /// Shows the last screen of a command that has done its work.
    pub(crate) fn end(&self, text: String) -> Outcome {
        match self.screen(&text) {
            Ok(()) => Outcome::Done,
            Err(failure) => self.mistake(&failure),
        }
    }

    /// Reports a failure that ends the command.
    pub(crate) fn mistake(&self, failure: &Failure) -> Outcome {
        self.failure(failure);
        Outcome::Mistake
    }

    /// Problems of the model's text.
    pub(crate) fn model(&self, reports: &[Report], sources: &Sources) {
        if reports.is_empty() {
            return;
        }
        match self.format {
            MessageFormat::Human => {
                terminal::complain(&problem::render(reports, sources, terminal::stderr_colour()));
            }
            MessageFormat::Json => {
                self.lines(
                    reports.iter().map(|report| problem::json_line(report, sources).trim_end().to_string()),
                );
            }
        }
    }

    /// Problems of the data.
    pub(crate) fn data(&self, reports: &[DataReport], sources: &Sources) {
        match self.format {
            MessageFormat::Human => {
                let style = Style { colour: terminal::stderr_colour() };
                for report in reports {
                    terminal::complain(&data_text(report, sources, style));
                }
            }
            MessageFormat::Json => {
                self.lines(reports.iter().map(|report| data_json(report, sources).to_string()))
            }
        }
    }

    /// Any other problem.
    pub(crate) fn failure(&self, failure: &Failure) {
        match self.format {
            MessageFormat::Human => {
                let style = Style { colour: terminal::stderr_colour() };
                let mut text = format!("{} {}\n", style.alarm("error:"), failure.message);
                if !failure.help.is_empty() {
                    text.push_str(&format!("  help: {}\n", failure.help));
                }
                terminal::complain(&text);
            }
            MessageFormat::Json => self.lines(std::iter::once(
                json!({
                    "code": Value::Null,
                    "severity": "error",
                    "message": failure.message,
                    "help": failure.help,
                    "labels": [],
                })
                .to_string(),
            )),
        }
    }

    fn lines(&self, lines: impl Iterator<Item = String>) {
        // A full disk behind standard output leaves nowhere better to say so than standard error.
        for line in lines {
            if let Err(error) = terminal::print(&format!("{line}\n")) {
                terminal::complain(&format!("error: standard output cannot be written: {error}\n"));
                return;
            }
        }
    }
}

/// A data problem for people.
fn data_text(report: &DataReport, sources: &Sources, style: Style) -> String {
    let mut text = format!("{} {}\n", style.alarm(&format!("error[{}]:", report.code.0)), report.message);
    if let Some(span) = report.span {
        let source = sources.get(span.file);
        let place = source.position(span.start);
        text.push_str(&format!("  {}, line {}, column {}\n", source.name, place.line, place.column));
    }
    for place in &report.places {
        text.push_str(&format!("  {}\n", place_text(place)));
    }
    if report.more > 0 {
        text.push_str(&format!("  ... and {} more\n", report.more));
    }
    text.push_str(&format!("  help: {}\n", report.help));
    text
}

fn place_text(place: &DataPlace) -> String {
    let line = if place.line > 0 { format!(", line {}", place.line) } else { String::new() };
    if place.heading.is_empty() {
        return format!("{}{line}: {}", place.file, place.text);
    }
    let cell = if place.text.is_empty() { "empty".to_string() } else { format!("\"{}\"", place.text) };
    format!("{}{line}, column \"{}\": {cell}", place.file, place.heading)
}

/// A data problem for programs. A cell's place is its row; `heading` names its column.
fn data_json(report: &DataReport, sources: &Sources) -> Value {
    let mut labels = vec![];
    if let Some(span) = report.span {
        let source = sources.get(span.file);
        let (start, end) = (source.position(span.start), source.position(span.end));
        labels.push(json!({
            "file": source.name,
            "line": start.line,
            "column": start.column,
            "end_line": end.line,
            "end_column": end.column,
            "text": "named here",
        }));
    }
    labels.extend(report.places.iter().map(|place| {
        let line = place.line.max(1);
        json!({
            "file": place.file,
            "line": line,
            "column": 1,
            "end_line": line,
            "end_column": 1,
            "heading": place.heading,
            "text": place.text,
        })
    }));
    json!({
        "code": report.code.0,
        "severity": "error",
        "message": report.message,
        "help": report.help,
        "labels": labels,
        "more": report.more,
    })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use stook_lang::problem::Code;

    fn report() -> DataReport {
        DataReport {
            code: Code("B005"),
            message: "7 values in `honey` outside its type".into(),
            places: vec![DataPlace {
                file: "harvest.csv".into(),
                line: 12,
                heading: "Honey (kg)".into(),
                text: "-3".into(),
            }],
            more: 6,
            span: None,
            help: "each must be above 0".into(),
        }
    }

    #[test]
    fn a_data_problem_names_file_line_column_and_counts_the_rest() {
        let text = data_text(&report(), &Sources::default(), Style { colour: false });
        insta::assert_snapshot!(text, @r#"
        error[B005]: 7 values in `honey` outside its type
          harvest.csv, line 12, column "Honey (kg)": "-3"
          ... and 6 more
          help: each must be above 0
        "#);
    }

    #[test]
    fn a_data_problem_as_json_has_the_keys_of_every_problem() {
        let value = data_json(&report(), &Sources::default());
        for key in ["code", "severity", "message", "help", "labels"] {
            assert!(value.get(key).is_some(), "{key}");
        }
        for key in ["file", "line", "column", "end_line", "end_column", "text"] {
            assert!(value["labels"][0].get(key).is_some(), "{key}");
        }
    }

    #[test]
    fn help_is_taken_out_of_a_text() {
        let failure = Failure::from_text("chain 1 stopped\n  state: a = 1\n  help: narrow the prior");
        assert_eq!(failure, Failure::new("chain 1 stopped\n  state: a = 1", "narrow the prior"));
    }
}
