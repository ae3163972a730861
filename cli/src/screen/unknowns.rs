//! The unknowns, what is worked out from them, and the missing cells: each with its interval and its precision.

use stook_sampler::answer::Answer;
use stook_sampler::draws::{Scalar, ScalarKind};
use stook_sampler::summary::Diagnosis;
use stook_sampler::summary::format::rounded;

use super::Screen;
use super::grid::{Cell, Grid, Side, Tone};
use super::text::{counted, thousands, wrap};

/// More elements than this are folded into one line.
const SHOWN_ELEMENTS: usize = 3;

/// The elements of one quantity.
struct Quantity<'a> {
    name: &'a str,
    unit: Option<&'a str>,
    elements: Vec<(&'a Scalar, &'a Diagnosis)>,
}

/// The tables of unknowns, derived quantities and missing cells.
pub(super) fn unknowns(screen: &Screen, answer: &Answer) -> String {
    let mut out = String::new();
    let kinds = [
        (ScalarKind::Unknown, "Unknowns"),
        (ScalarKind::Derived, "Worked out from them"),
        (ScalarKind::Missing, "Missing readings, estimated"),
    ];
    let mut grid =
        Grid::new(vec![Side::Left, Side::Right, Side::Right, Side::Right, Side::Right, Side::Right]);
    let mut shown = 0;
    for (kind, title) in kinds {
        let quantities = quantities(answer, kind);
        if quantities.is_empty() {
            continue;
        }
        if shown > 0 {
            grid.row(vec![]);
        }
        if shown == 0 {
            let interval = Cell::new("95 % credible interval").over(3).side(Side::Right).tone(Tone::Faint);
            let precision = Cell::new("precision").over(2).side(Side::Right).tone(Tone::Faint);
            grid.row(vec![Cell::new(title).tone(Tone::Strong), interval, precision]);
            let titles = ["", "from", "mean", "to", "worth", "R-hat"];
            grid.row(titles.map(|title| Cell::new(title).tone(Tone::Faint)).into_iter().collect());
        } else {
            grid.row(vec![Cell::new(title).tone(Tone::Strong).free()]);
        }
        for quantity in &quantities {
            rows(&mut grid, quantity, answer);
        }
        shown += 1;
    }
    out.push('\n');
    out.push_str(&grid.render(screen.width, screen.style));
    out.push_str(&screen.style.faint(&wrap(
        "Each number has the digits that its Monte Carlo error bears; \"worth\" is how many independent draws the kept ones \
         are worth.",
        screen.width,
        2,
    )));
    out
}

fn quantities(answer: &Answer, kind: ScalarKind) -> Vec<Quantity<'_>> {
    let mut found: Vec<Quantity<'_>> = vec![];
    for (scalar, diagnosis) in answer.draws.scalars.iter().zip(&answer.summary) {
        if scalar.kind != kind {
            continue;
        }
        match found.last_mut().filter(|quantity| quantity.name == scalar.quantity) {
            Some(quantity) => quantity.elements.push((scalar, diagnosis)),
            None => found.push(Quantity {
                name: &scalar.quantity,
                unit: scalar.unit.as_deref(),
                elements: vec![(scalar, diagnosis)],
            }),
        }
    }
    found
}

fn rows(grid: &mut Grid, quantity: &Quantity<'_>, answer: &Answer) {
    let folded = quantity.elements.len() > SHOWN_ELEMENTS
        || quantity.elements.iter().any(|(scalar, _)| scalar.kind == ScalarKind::Missing);
    if !folded {
        for (scalar, diagnosis) in &quantity.elements {
            let [from, to] = ends(diagnosis);
            let mut row = vec![
                Cell::new(titled(&scalar.title(), quantity.unit)),
                Cell::new(from),
                Cell::new(rounded(diagnosis.mean, error(diagnosis.mean_mcse))).tone(Tone::Strong),
                Cell::new(to),
            ];
            row.extend(precision(&[diagnosis], answer));
            grid.row(row);
        }
        return;
    }
    let extreme = |worse: fn(f64, f64) -> bool| {
        let means = quantity.elements.iter().map(|(_, diagnosis)| diagnosis);
        means.reduce(|a, b| if worse(b.mean, a.mean) { b } else { a })
    };
    let text = |found: Option<&&Diagnosis>| {
        found.map_or(String::new(), |found| rounded(found.mean, error(found.mean_mcse)))
    };
    let (least, most) = (text(extreme(|a, b| a < b)), text(extreme(|a, b| a > b)));
    let what = match quantity.elements.first().map(|(scalar, _)| scalar.kind) {
        Some(ScalarKind::Missing) => counted(quantity.elements.len(), "cell", "cells"),
        _ => counted(quantity.elements.len(), "element", "elements"),
    };
    let folded = format!("{what}, means {least} to {most}");
    let mut row = vec![
        Cell::new(titled(quantity.name, quantity.unit)),
        Cell::new(folded).over(3).side(Side::Right).tone(Tone::Faint),
    ];
    let diagnoses: Vec<&Diagnosis> = quantity.elements.iter().map(|(_, diagnosis)| *diagnosis).collect();
    row.extend(precision(&diagnoses, answer));
    grid.row(row);
}

fn titled(name: &str, unit: Option<&str>) -> String {
    match unit {
        Some(unit) => format!("{name} ({unit})"),
        None => name.to_string(),
    }
}

/// The two ends of the central 95 % interval.
fn ends(diagnosis: &Diagnosis) -> [String; 2] {
    let errors = diagnosis.quantile_mcse.map_or([f64::NAN; 2], |errors| [errors[0], errors[4]]);
    [rounded(diagnosis.q2_5, errors[0]), rounded(diagnosis.q97_5, errors[1])]
}

fn error(mcse: Option<f64>) -> f64 {
    mcse.unwrap_or(f64::NAN)
}

/// The smallest effective size and the largest R-hat.
fn precision(diagnoses: &[&Diagnosis], answer: &Answer) -> [Cell; 2] {
    let sizes = diagnoses.iter().flat_map(|found| [found.bulk_ess, found.tail_ess]).flatten();
    let size = sizes.reduce(f64::min);
    let rhat = diagnoses.iter().filter_map(|found| found.split_rhat).reduce(f64::max);
    let rule = &answer.verdict.rule;
    let chains = answer.draws.chains as f64;
    let few = size.is_some_and(|size| size < chains * rule.bulk_ess_per_chain.max(rule.tail_ess_per_chain));
    let apart = rhat.is_some_and(|rhat| rhat > rule.split_rhat);
    let tone = |bad: bool| if bad { Tone::Alarm } else { Tone::Plain };
    [
        Cell::new(size.map_or("-".into(), thousands)).tone(tone(few)),
        Cell::new(rhat.map_or("-".into(), |rhat| format!("{rhat:.3}"))).tone(tone(apart)),
    ]
}
