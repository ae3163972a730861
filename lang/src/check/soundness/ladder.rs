//! Each rung as a model of its own.

use std::collections::{BTreeSet, HashSet};

use crate::arena::Id;
use crate::model::{Expression, Model, Named};
use crate::problem::{LadderProblem, Problems};

/// Checks the rungs.
pub(super) fn ladder(model: &Model, problems: &mut Problems) {
    let rungs: Vec<_> = model.ladder.iter().collect();
    let reached = reached(model);
    for (at, (id, rung)) in rungs.iter().enumerate() {
        let terms: BTreeSet<_> = rung.terms.iter().collect();
        let same = rungs[..at].iter().find(|(_, other)| other.terms.iter().collect::<BTreeSet<_>>() == terms);
        if let Some((_, other)) = same
            && !rung.adds.is_empty()
        {
            problems.add(LadderProblem::Repeats {
                span: rung.span,
                name: rung.name.clone(),
                other: other.name.clone(),
                first: other.span,
            });
        } else if same.is_some() && rung.from.is_none() {
            problems.add(LadderProblem::AddsNothing { span: rung.span, name: rung.name.clone() });
        }
        if model.reaching_at(*id).is_empty() {
            problems.add(LadderProblem::Nothing { span: rung.span, name: rung.name.clone() });
        }
        for term in &rung.adds {
            if !reached.contains(term) {
                let declared = &model.named[*term];
                problems.add(LadderProblem::Ineffective {
                    span: rung.span,
                    term: declared.name.clone(),
                    declared: declared.span,
                });
            }
        }
    }
}

/// The named expressions that the laws of responses use, directly or through other names and priors.
fn reached(model: &Model) -> HashSet<Id<Named>> {
    let mut stack: Vec<_> =
        model.responses.iter().flat_map(|response| response.distribution.roots()).collect();
    let mut named = HashSet::new();
    let mut unknowns = HashSet::new();
    while let Some(id) = stack.pop() {
        match &model.expressions[id] {
            Expression::Named(item, _) => {
                if named.insert(*item) {
                    stack.push(model.named[*item].value);
                }
            }
            Expression::Unknown(unknown, _) => {
                if unknowns.insert(*unknown) {
                    stack.extend(model.unknowns[*unknown].prior.roots());
                }
            }
            _ => model.expressions.children(id, |child| stack.push(child)),
        }
    }
    named
}
