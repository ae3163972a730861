//! What an update costs a sweep: a formula in rows and labels, and its value where the data are known.

use stook_lang::model::{Index, Model};

use super::choose::quantity_size;
use super::{Conjugate, Joint, Update};
use crate::bind::Bound;
use crate::symbolic::{Quantity, System};

/// The cost of an update, in elementary steps a sweep.
#[derive(Clone, Debug, PartialEq)]
pub struct Cost {
    /// In rows and labels, by the names of groups and tables.
    pub formula: String,
    /// Its value for the data at hand.
    pub steps: Option<f64>,
}

/// Density evaluations that a slice update takes on average, measured on half-normal and logistic conditionals.
const SLICE_EVALUATIONS: f64 = 7.0;

impl Cost {
    /// A Gaussian block: its rows are summed, the fringe of `n` scalars is eliminated and the core of `p` factored.
    pub(super) fn joint(model: &Model, bound: Option<&Bound>, system: &System, joint: &Joint) -> Cost {
        let mut parts = vec![];
        let mut once = vec![];
        let mut steps = bound.map(|_| 0.0);
        for row in &joint.rows {
            let statement = &system.statements[row.statement];
            let size = size_name(model, &statement.scope);
            if row.is_summed_once(system) {
                once.push(size);
                continue;
            }
            let squares = row.terms.len().pow(2);
            parts.push(format!(" + {squares} x {size}"));
            if let (Some(steps), Some(bound)) = (&mut steps, bound) {
                let count: usize = statement.scope.iter().map(|index| bound.size(*index)).product();
                *steps += (count * squares) as f64;
            }
        }
        let rows = parts.concat();
        let once = if once.is_empty() {
            String::new()
        } else {
            format!(" + the pairs of labels that meet ({} summed once)", once.join(", "))
        };
        let Some(bound) = bound else {
            let fringe = if joint.fringe.is_some() { "n p^2 / 2 + " } else { "" };
            return Cost { formula: format!("{fringe}p^3 / 6{rows}{once}"), steps: None };
        };
        let size = |q: &Quantity| quantity_size(model, bound, *q);
        let (core, fringe): (usize, usize) =
            (joint.core.iter().map(size).sum(), joint.fringe.iter().map(size).sum());
        let (p, n) = (core as f64, fringe as f64);
        let eliminated = if fringe > 0 { format!("{fringe} x {core}^2 / 2 + ") } else { String::new() };
        Cost {
            formula: format!("{eliminated}{core}^3 / 6{rows}{once}"),
            steps: steps.map(|steps| steps + n * p * p / 2.0 + p * p * p / 6.0),
        }
    }

    /// An update element by element: the rows of its children, times the evaluations of the rule.
    pub(super) fn single(
        model: &Model,
        bound: Option<&Bound>,
        system: &System,
        quantity: Quantity,
        update: &Update,
    ) -> Cost {
        let children = match update {
            Update::Rescale(rescale) => rescale.children.iter().map(|(child, _)| *child).collect(),
            Update::Shift(shift) => vec![shift.effect.1],
            _ => system.children(quantity),
        };
        let times = match update {
            Update::Conjugate(_) | Update::Joint(_) | Update::Forward | Update::Shift(_) => 1.0,
            Update::Rescale(rescale) if rescale.quadratic => 3.0,
            Update::Rescale(_) => SLICE_EVALUATIONS,
            Update::Slice(Some(messages)) if !messages.is_empty() => 1.0,
            Update::Slice(_) => SLICE_EVALUATIONS,
            Update::Enumerate => 2.0,
        };
        // Children whose squares come from sums made once cost what the pairs of labels cost, whatever their rows.
        let once: Vec<usize> = match update {
            Update::Conjugate(Conjugate { messages, .. }) | Update::Slice(Some(messages)) => messages
                .iter()
                .filter(|message| message.rows.is_some())
                .map(|message| message.statement)
                .collect(),
            Update::Rescale(rescale) => {
                rescale.children.iter().filter(|(_, rows)| rows.is_some()).map(|(child, _)| *child).collect()
            }
            _ => vec![],
        };
        let summed = if once.is_empty() { "" } else { "the pairs of labels that meet, its rows summed once" };
        let children: Vec<usize> = children.into_iter().filter(|child| !once.contains(child)).collect();
        let rows: Vec<String> =
            children.iter().map(|child| size_name(model, &system.statements[*child].scope)).collect();
        let rows = match (rows.is_empty(), summed.is_empty()) {
            (true, true) => "its labels".to_string(),
            (true, false) => summed.to_string(),
            (false, true) => rows.join(" + "),
            (false, false) => format!("{} + {summed}", rows.join(" + ")),
        };
        let formula = if times == 1.0 { rows } else { format!("about {times} x ({rows})") };
        let steps = bound.map(|bound| {
            let own = quantity_size(model, bound, quantity) as f64;
            let size = |child: &usize| {
                system.statements[*child].scope.iter().map(|index| bound.size(*index)).product::<usize>()
                    as f64
            };
            times * (own + children.iter().map(size).sum::<f64>())
        });
        Cost { formula, steps }
    }
}

/// `rows of harvest`, `labels of season x labels of apiary`, `1`.
fn size_name(model: &Model, scope: &[Index]) -> String {
    let name = |index: &Index| match index {
        Index::Table(_) => format!("rows of {}", model.index_name(*index)),
        Index::Group(_) => format!("labels of {}", model.index_name(*index)),
    };
    match scope {
        [] => "1".into(),
        _ => scope.iter().map(name).collect::<Vec<_>>().join(" x "),
    }
}
