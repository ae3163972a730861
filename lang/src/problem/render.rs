//! Reports as text for the terminal, and as JSON for editors.

use ariadne::{CharSet, Color, Config, IndexType, Label as Mark, Report as Drawing, ReportKind};
use serde_json::json;

use super::{Report, Severity};
use crate::span::{FileId, Sources, Span};

/// Reports as text: each with its place in the source, its help, and a line that counts them at the end.
pub fn render(reports: &[Report], sources: &Sources, colour: bool) -> String {
    let mut text = String::new();
    for report in reports {
        text.push_str(&drawn(report, sources, colour));
        text.push('\n');
    }
    if let Some(count) = count(reports) {
        text.push_str(&count);
        text.push('\n');
    }
    text
}

/// `2 errors, 1 warning`; `None` where there is nothing to count.
pub fn count(reports: &[Report]) -> Option<String> {
    let of = |severity: Severity| reports.iter().filter(|report| report.severity == severity).count();
    let words = |count: usize, word: &str| match count {
        0 => None,
        1 => Some(format!("1 {word}")),
        _ => Some(format!("{count} {word}s")),
    };
    let parts: Vec<String> = [words(of(Severity::Error), "error"), words(of(Severity::Warning), "warning")]
        .into_iter()
        .flatten()
        .collect();
    (!parts.is_empty()).then(|| parts.join(", "))
}

fn drawn(report: &Report, sources: &Sources, colour: bool) -> String {
    let (word, main) = match report.severity {
        Severity::Error => ("error", Color::Red),
        Severity::Warning => ("warning", Color::Yellow),
    };
    let place = |span: Span| {
        let source = sources.get(span.file);
        // An empty place (the end of the text) is drawn as the last character.
        let end = (span.end as usize).min(source.text.len());
        let start = (span.start as usize).min(end);
        if start < end {
            (span.file, start..end)
        } else {
            (span.file, last_character(&source.text, start)..end)
        }
    };
    let config =
        Config::new().with_color(colour).with_index_type(IndexType::Byte).with_char_set(CharSet::Unicode);
    let mut drawing = Drawing::build(ReportKind::Custom(word, main), place(report.labels[0].span))
        .with_config(config)
        .with_code(report.code.0)
        .with_message(&report.message)
        .with_help(wrapped(&report.help));
    // In the order of the text, so that the lines are drawn once; the main place has its own colour and stands above.
    let mut labels: Vec<_> = report.labels.iter().enumerate().collect();
    labels.sort_by_key(|(_, label)| label.span);
    for (at, label) in labels {
        let colour = if at == 0 { main } else { Color::Cyan };
        drawing =
            drawing.with_label(Mark::new(place(label.span)).with_message(&label.text).with_color(colour));
    }
    let mut bytes = vec![];
    let cache = Texts::new(sources);
    match drawing.finish().write(cache, &mut bytes) {
        Ok(()) => {
            // The colour of a custom kind is not subject to `with_color`: without colours it is taken off again.
            let mut text = String::from_utf8_lossy(&bytes).into_owned();
            if !colour {
                for escape in ["\u{1b}[31m", "\u{1b}[33m", "\u{1b}[0m"] {
                    text = text.replacen(escape, "", 1);
                }
            }
            text.lines().map(|line| format!("{}\n", line.trim_end())).collect()
        }
        Err(problem) => format!("{word} {}: {} ({problem})\n", report.code.0, report.message),
    }
}

/// Breaks a text into lines that fit a narrow terminal, at blanks.
fn wrapped(text: &str) -> String {
    const WIDTH: usize = 68;
    let mut lines: Vec<String> = vec![String::new()];
    for word in text.split(' ') {
        let line = lines.len() - 1;
        if !lines[line].is_empty() && lines[line].chars().count() + word.chars().count() >= WIDTH {
            lines.push(word.to_string());
        } else {
            if !lines[line].is_empty() {
                lines[line].push(' ');
            }
            lines[line].push_str(word);
        }
    }
    lines.join("\n")
}

fn last_character(text: &str, before: usize) -> usize {
    text[..before].char_indices().next_back().map_or(0, |(at, _)| at)
}

/// The sources as the drawing asks for them.
struct Texts<'a> {
    sources: &'a Sources,
    drawn: Vec<ariadne::Source<&'a str>>,
}

impl<'a> Texts<'a> {
    fn new(sources: &'a Sources) -> Texts<'a> {
        let drawn = sources.iter().map(|(_, source)| ariadne::Source::from(source.text.as_str())).collect();
        Texts { sources, drawn }
    }
}

impl<'a> ariadne::Cache<FileId> for Texts<'a> {
    type Storage = &'a str;

    fn fetch(&mut self, id: &FileId) -> Result<&ariadne::Source<&'a str>, impl std::fmt::Debug> {
        Ok::<_, std::convert::Infallible>(&self.drawn[id.0 as usize])
    }

    fn display<'b>(&self, id: &'b FileId) -> Option<impl std::fmt::Display + 'b> {
        Some(self.sources.get(*id).name.clone())
    }
}

/// A report as one JSON object: `code`, `severity`, `message`, `help` and `labels`, the main place first. Lines and columns
/// count from 1, columns in characters; the end is the place behind the last character.
pub fn json_line(report: &Report, sources: &Sources) -> String {
    let labels: Vec<_> = report
        .labels
        .iter()
        .map(|label| {
            let source = sources.get(label.span.file);
            let (start, end) = (source.position(label.span.start), source.position(label.span.end));
            json!({
                "file": source.name,
                "line": start.line,
                "column": start.column,
                "end_line": end.line,
                "end_column": end.column,
                "text": label.text,
            })
        })
        .collect();
    let severity = match report.severity {
        Severity::Error => "error",
        Severity::Warning => "warning",
    };
    json!({
        "code": report.code.0,
        "severity": severity,
        "message": report.message,
        "help": report.help,
        "labels": labels,
    })
    .to_string()
}
