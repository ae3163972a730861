//! The screen after a climb: the rungs side by side, what each changed, and which is best.

use std::ops::Range;

use stook_sampler::answer::Interval;
use stook_sampler::summary::format::rounded;

use super::fit::{CONDITIONAL, DECISIONS, tenths};
use super::grid::{Cell, Grid, Side, Tone};
use super::sources::{largest, percent};
use super::text::{columns, hang, wrap};
use super::{ERROR_OF_ENDS, Screen};
use crate::ladder::{Fitted, best, simpler};

/// Why a climb ended before the last rung that was asked for.
#[derive(Clone, Debug)]
pub(crate) struct Stop {
    /// The rung at which it ended.
    pub(crate) rung: String,
    /// What that rung adds.
    pub(crate) adds: Vec<String>,
    /// What went wrong there.
    pub(crate) why: String,
    /// What to do.
    pub(crate) advice: String,
    /// The rungs that were not tried.
    pub(crate) untried: Vec<String>,
}

/// The screen after a climb.
pub(crate) fn climb(screen: &Screen, model: &str, rungs: &[Fitted], stop: Option<&Stop>) -> String {
    let mut out = String::new();
    if let Some(stop) = stop {
        out.push_str(&stopped(screen, stop));
        out.push('\n');
    }
    if rungs.is_empty() {
        return out;
    }
    let readings = rungs[0].criteria.waic.pointwise.len();
    out.push_str(&format!(
        "{}{}\n",
        screen.style.strong(&format!("{model}, rung by rung: ")),
        screen.style.faint(&format!("{readings} readings; mean and 95 % credible interval"))
    ));
    let rows = rows(rungs);
    for block in blocks(screen, &rows, rungs) {
        out.push('\n');
        out.push_str(&side_by_side(screen, rungs, &rows, block));
    }
    out.push_str(&screen.heading("What each rung changed", ""));
    for at in 0..rungs.len() {
        for sentence in changes(&rungs[..at], &rungs[at]) {
            out.push_str(&hang(&sentence, screen.width, 2, 4));
        }
    }
    out.push_str(&wrap(&preferred(rungs), screen.width, 2));
    for (best, sources) in
        best(rungs).iter().flat_map(|best| best.sources.iter().map(move |sources| (best, sources)))
    {
        let of =
            if rungs[0].sources.len() > 1 { format!(", for {}", sources.response) } else { String::new() };
        out.push_str(&wrap(&format!("In {}{of}: {}", best.name, lower(&largest(sources))), screen.width, 2));
    }
    let text = format!(
        "Checked: that the chains of each rung agree. Not checked: whether the models fit the data, and how much the \
         priors weigh. {CONDITIONAL} {DECISIONS}"
    );
    out.push_str(&format!("\n{}", screen.style.faint(&wrap(&text, screen.width, 0))));
    out
}

fn stopped(screen: &Screen, stop: &Stop) -> String {
    let mut out = format!("{}\n", screen.style.alarm(&format!("STOPPED AT RUNG {}", stop.rung)));
    let added = match stop.adds.len() {
        0 => "It adds no term.".to_string(),
        _ => format!("It adds {}.", joined(&stop.adds)),
    };
    out.push_str(&wrap(&format!("{added} {}", stop.why), screen.width, 2));
    if !stop.advice.is_empty() {
        out.push_str(&wrap(&format!("What to do: {}", stop.advice), screen.width, 2));
    }
    if !stop.untried.is_empty() {
        out.push_str(&wrap(&format!("Not tried: {}.", stop.untried.join(", ")), screen.width, 2));
    }
    out
}

/// A row of the comparison: under a heading, a cell for each rung of one or two lines.
struct Row {
    label: String,
    cells: Vec<Option<[String; 2]>>,
    heading: bool,
}

impl Row {
    fn heading(label: &str) -> Row {
        Row { label: label.into(), cells: vec![], heading: true }
    }

    fn one(label: impl Into<String>, cells: impl Iterator<Item = Option<String>>) -> Row {
        let cells = cells.map(|cell| cell.map(|text| [text, String::new()])).collect();
        Row { label: label.into(), cells, heading: false }
    }
}

fn rows(rungs: &[Fitted]) -> Vec<Row> {
    let mut rows = vec![Row::heading("Unknowns that rungs share")];
    let mut names: Vec<(&str, Option<&str>)> = vec![];
    for unknown in rungs.iter().flat_map(|rung| &rung.unknowns) {
        let having =
            rungs.iter().filter(|rung| rung.unknowns.iter().any(|own| own.name == unknown.name)).count();
        if having >= rungs.len().min(2) && !names.iter().any(|(name, _)| *name == unknown.name) {
            names.push((&unknown.name, unknown.unit.as_deref()));
        }
    }
    for (name, unit) in names {
        let label = unit.map_or(name.to_string(), |unit| format!("{name} ({unit})"));
        let cells = rungs.iter().map(|rung| {
            let found = rung.unknowns.iter().find(|unknown| unknown.name == name)?;
            Some(interval(&found.interval, rounded(found.interval.mean, found.interval.mcse)))
        });
        rows.push(Row { label, cells: cells.collect(), heading: false });
    }
    source_rows(rungs, &mut rows);
    criteria_rows(rungs, &mut rows);
    rows
}

fn source_rows(rungs: &[Fitted], rows: &mut Vec<Row>) {
    let mut responses: Vec<&str> = vec![];
    for sources in rungs.iter().flat_map(|rung| &rung.sources) {
        if !responses.contains(&sources.response.as_str()) {
            responses.push(&sources.response);
        }
    }
    for response in responses {
        rows.push(Row::heading(&format!("Variation of {response}: sd, and share of the total")));
        let all = rungs.iter().flat_map(|rung| &rung.sources).filter(|sources| sources.response == response);
        let mut names: Vec<&str> = vec![];
        for source in all.flat_map(|sources| &sources.sources) {
            if !names.contains(&source.name.as_str()) {
                names.push(&source.name);
            }
        }
        // The residual closes the list, whichever rung brought in a source last.
        names.sort_by_key(|name| *name == "residual");
        for name in names {
            let cells = rungs.iter().map(|rung| {
                let sources = rung.sources.iter().find(|sources| sources.response == response)?;
                let source = sources.sources.iter().find(|source| source.name == name)?;
                let first =
                    format!("{}  {:>4}", rounded(source.sd.mean, source.sd.mcse), percent(source.share.mean));
                Some(interval(&source.sd, first))
            });
            rows.push(Row { label: name.into(), cells: cells.collect(), heading: false });
        }
    }
}

fn criteria_rows(rungs: &[Fitted], rows: &mut Vec<Row>) {
    let best = best(rungs);
    rows.push(Row::heading("Criteria: lower is better; p counts the parameters in effect"));
    let all =
        |cell: &dyn Fn(&Fitted) -> Option<String>| rungs.iter().map(cell).collect::<Vec<_>>().into_iter();
    rows.push(Row::one("DIC", all(&|rung| Some(tenths(rung.criteria.dic.dic)))));
    rows.push(Row::one("  p_DIC", all(&|rung| Some(tenths(rung.criteria.dic.p_dic)))));
    rows.push(Row::one("WAIC", all(&|rung| Some(tenths(rung.criteria.waic.waic)))));
    rows.push(Row::one("  std. error", all(&|rung| rung.criteria.waic.se.map(tenths))));
    rows.push(Row::one("  p_WAIC", all(&|rung| Some(tenths(rung.criteria.waic.p_waic)))));
    let above = |rung: &Fitted| {
        let best = best?;
        if best.name == rung.name {
            return Some("best".to_string());
        }
        rung.above(best).map(|found| {
            format!("{}{}", if found.difference >= 0.0 { "+" } else { "" }, tenths(found.difference))
        })
    };
    rows.push(Row::one("  above best", all(&above)));
    let error = |rung: &Fitted| {
        let best = best?;
        if best.name == rung.name { None } else { rung.above(best)?.se.map(tenths) }
    };
    rows.push(Row::one("  std. error", all(&error)));
    rows.push(Row::one("converged", all(&|rung| Some(if rung.converged { "yes" } else { "NO" }.into()))));
}

fn interval(found: &Interval, first: String) -> [String; 2] {
    if found.low == found.high {
        return [first, "fixed".into()];
    }
    let ends = ERROR_OF_ENDS * found.mcse;
    [first, format!("{}..{}", rounded(found.low, ends), rounded(found.high, ends))]
}

/// As many rungs beside each other as the screen has room for, in blocks of even size.
fn blocks(screen: &Screen, rows: &[Row], rungs: &[Fitted]) -> Vec<Range<usize>> {
    const GAP: usize = 2;
    let labels =
        rows.iter().filter(|row| !row.heading).map(|row| columns(&row.label) + GAP).max().unwrap_or(0);
    let cells = rows.iter().flat_map(|row| row.cells.iter().flatten().flatten()).map(|text| columns(text));
    let names = rungs.iter().map(|rung| columns(&rung.name));
    let cell = cells.chain(names).max().unwrap_or(0);
    let room = (screen.width.saturating_sub(labels + GAP) / (cell + GAP)).max(1);
    let count = rungs.len().div_ceil(room);
    let size = rungs.len().div_ceil(count.max(1));
    (0..rungs.len()).step_by(size.max(1)).map(|first| first..(first + size).min(rungs.len())).collect()
}

fn side_by_side(screen: &Screen, rungs: &[Fitted], rows: &[Row], block: Range<usize>) -> String {
    let mut sides = vec![Side::Left];
    sides.extend(block.clone().map(|_| Side::Right));
    let mut grid = Grid::new(sides);
    let mut names = vec![Cell::new("rung").tone(Tone::Faint)];
    names.extend(rungs[block.clone()].iter().map(|rung| Cell::new(rung.name.clone()).tone(Tone::Strong)));
    grid.row(names);
    for row in rows {
        if row.heading {
            grid.row(vec![]);
            grid.row(vec![Cell::new(row.label.clone()).tone(Tone::Strong).free()]);
            continue;
        }
        if row.cells[block.clone()].iter().all(Option::is_none) {
            continue;
        }
        for line in 0..2 {
            let texts: Vec<&str> = block
                .clone()
                .map(|at| row.cells[at].as_ref().map_or("", |cell| cell[line].as_str()))
                .collect();
            if line == 1 && texts.iter().all(|text| text.is_empty()) {
                continue;
            }
            let label = if line == 0 { format!("  {}", row.label) } else { String::new() };
            let mut cells = vec![Cell::new(label)];
            cells.extend(texts.iter().map(|text| {
                let tone = match (line, *text) {
                    (_, "NO") => Tone::Alarm,
                    (0, _) => Tone::Plain,
                    _ => Tone::Faint,
                };
                Cell::new(*text).tone(tone)
            }));
            grid.row(cells);
        }
    }
    grid.render(screen.width, screen.style)
}

/// What a rung changed against each simpler one next to it.
fn changes(before: &[Fitted], rung: &Fitted) -> Vec<String> {
    let bases = simpler(before, rung);
    if !rung.converged {
        let numbers = "its chains do not agree, so its numbers are not to be relied on";
        return vec![format!("{}: {numbers}.", rung.name)];
    }
    if bases.is_empty() {
        return vec![format!("{} is where the climb begins.", rung.name)];
    }
    bases.iter().map(|base| change(base, rung)).collect()
}

fn change(base: &Fitted, rung: &Fitted) -> String {
    let added: Vec<String> = rung.terms.iter().filter(|term| !base.terms.contains(term)).cloned().collect();
    let mut parts = vec![];
    for sources in rung.sources.iter().filter(|sources| base.differs(rung, &sources.response)) {
        let response = &sources.response;
        let of = if rung.sources.len() > 1 { format!(" of {response}") } else { String::new() };
        if let (Some(old), Some(new)) = (base.sd(response, "residual"), rung.sd(response, "residual")) {
            let (old, new) = (rounded(old.mean, old.mcse), rounded(new.mean, new.mcse));
            parts.push(format!("residual sd{of} {old} -> {new}"));
        }
    }
    if let Some(found) = rung.above(base) {
        let way = if found.difference < 0.0 { "falls" } else { "rises" };
        let se = found.se.map(|se| format!(" (standard error {})", tenths(se))).unwrap_or_default();
        let unclear = found.se.is_some_and(|se| found.difference.abs() < 2.0 * se);
        let judged = if unclear { ", which is within two standard errors" } else { "" };
        parts.push(format!("WAIC {way} by {}{se}{judged}", tenths(found.difference.abs())));
    }
    format!("{}: adding {} to {}: {}.", rung.name, joined(&added), base.name, parts.join(", "))
}

/// Which rung has the lowest WAIC, and the simplest one that is as good as it.
fn preferred(rungs: &[Fitted]) -> String {
    let Some(best) = best(rungs) else {
        return "No rung has converged, so none is best.".into();
    };
    let as_good = |rung: &&Fitted| {
        rung.converged
            && rung.terms.len() < best.terms.len()
            && rung.above(best).is_some_and(|found| found.se.is_some_and(|se| found.difference < 2.0 * se))
    };
    match rungs.iter().filter(as_good).min_by_key(|rung| rung.terms.len()) {
        Some(simple) => format!(
            "{} has the lowest WAIC; {} is simpler and within two standard errors of it.",
            best.name, simple.name
        ),
        None => format!(
            "{} has the lowest WAIC, and no simpler rung comes within two standard errors of it.",
            best.name
        ),
    }
}

/// A sentence as the part behind a colon.
fn lower(sentence: &str) -> String {
    let mut characters = sentence.chars();
    characters.next().map_or(String::new(), |first| first.to_lowercase().chain(characters).collect())
}

/// `a`, `a and b`, `a, b and c`.
pub(crate) fn joined(names: &[String]) -> String {
    match names {
        [] => "nothing".into(),
        [one] => one.clone(),
        [some @ .., last] => format!("{} and {last}", some.join(", ")),
    }
}

#[cfg(test)]
mod tests {
    use super::super::samples::ladder;
    use super::super::text::Style;
    use super::*;

    fn at(width: usize, stop: Option<&Stop>, rungs: &[Fitted]) -> String {
        let screen = Screen { width, style: Style { colour: false } };
        let text = climb(&screen, "honey.stook", rungs, stop);
        for line in text.lines() {
            assert!(columns(line) <= width, "{} columns: {line}", columns(line));
        }
        text
    }

    #[test]
    fn a_climb_at_80_columns() {
        insta::assert_snapshot!(at(80, None, &ladder()));
    }

    #[test]
    fn a_climb_at_140_columns() {
        insta::assert_snapshot!(at(140, None, &ladder()));
    }

    #[test]
    fn a_climb_that_stopped_names_what_the_rung_added() {
        let mut rungs = ladder();
        rungs.truncate(3);
        rungs[2].converged = false;
        let stop = Stop {
            rung: "apiaries".into(),
            adds: vec!["apiary_dev".into()],
            why: "The chains do not bear out 3 of 43 quantities: the numbers are not to be relied on.".into(),
            advice: "run longer.".into(),
            untried: vec!["both".into(), "hives".into()],
        };
        let text = at(80, Some(&stop), &rungs);
        assert!(text.contains("apiary_dev"));
        insta::assert_snapshot!(text);
    }
}
