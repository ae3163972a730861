//! Where interweaving applies: scales of effects, and locations that effects share with a global coefficient.

use std::collections::BTreeSet;

use stook_lang::distribution::Law;

use super::gaussian::squared_rows;
use super::message::{Form, messages};
use super::{Rescale, Shift};
use crate::symbolic::{Linear, Quantity, Statement, System, Target, linear, prior_centre};

/// The effects whose spread a quantity is, where it is nothing else: every child is the prior of an unknown that has
/// children of its own, with an sd in proportion to the same power of the quantity.
pub(super) fn rescale(
    system: &mut System,
    scale: Quantity,
    in_block: &BTreeSet<Quantity>,
) -> Option<Rescale> {
    let found = messages(system, scale).ok()?;
    let mut effects = vec![];
    let mut powers = BTreeSet::new();
    for message in &found {
        let statement = &system.statements[message.statement];
        let (Target::Unknown(_), Law::Normal, Form::Power { exponent, .. }) =
            (statement.target, statement.law, &message.form)
        else {
            return None;
        };
        // The message is in the precision: the sd is in proportion to x^(-exponent / 2).
        powers.insert((-exponent / 2.0).to_bits());
        effects.push((statement.quantity(), message.statement));
    }
    let moved: BTreeSet<Quantity> = effects.iter().map(|(effect, _)| *effect).collect();
    let power = match powers.iter().collect::<Vec<_>>()[..] {
        [power] => f64::from_bits(*power),
        _ => return None,
    };
    let centre_moves = |statement: &Statement| {
        system.graph.depends(statement.parameters[0]).iter().any(|quantity| moved.contains(quantity))
    };
    if effects.iter().any(|(_, prior)| centre_moves(&system.statements[*prior])) {
        return None;
    }
    let children: BTreeSet<usize> = moved.iter().flat_map(|effect| system.children(*effect)).collect();
    if children.is_empty() {
        return None;
    }
    let quadratic = children.iter().all(|child| is_quadratic(system, *child, &moved));
    let children = children.into_iter().map(|child| (child, squared_rows(system, child, in_block))).collect();
    Some(Rescale { power, effects, children, quadratic })
}

/// Whether a statement's log density is quadratic along a line of the moved quantities.
fn is_quadratic(system: &mut System, child: usize, moved: &BTreeSet<Quantity>) -> bool {
    let statement = system.statements[child].clone();
    let depends = |at: usize| {
        system.graph.depends(statement.parameters[at]).iter().any(|quantity| moved.contains(quantity))
    };
    matches!(statement.law, Law::Normal | Law::Lognormal)
        && !statement.is_truncated()
        && !depends(1)
        && linear(&mut system.graph, statement.parameters[0], &|quantity| moved.contains(&quantity)).is_some()
}

/// The effects that a scalar can be exchanged with: they stand beside it, with the same coefficient, in everything that
/// depends on either, so that what is added to the one can be taken from the other.
pub(super) fn shifts(system: &mut System, scalar: Quantity) -> Vec<Shift> {
    let Some(own) = location_prior(system, scalar).filter(|own| system.statements[*own].scope.is_empty())
    else {
        return vec![];
    };
    let effects: Vec<Quantity> = system
        .statements
        .iter()
        .filter(|statement| matches!(statement.target, Target::Unknown(_)) && statement.scope.len() == 1)
        .map(Statement::quantity)
        .collect();
    effects
        .into_iter()
        .filter_map(|effect| {
            let prior = location_prior(system, effect)?;
            exchangeable(system, scalar, effect)
                .then_some(Shift { scalar: (scalar, own), effect: (effect, prior) })
        })
        .collect()
}

/// The prior of a quantity, where it is an untruncated law on the real line with a centre.
fn location_prior(system: &System, quantity: Quantity) -> Option<usize> {
    let prior = system.law_of(quantity)?;
    let statement = &system.statements[prior];
    (matches!(statement.target, Target::Unknown(_))
        && prior_centre(statement.law).is_some()
        && !statement.is_truncated())
    .then_some(prior)
}

fn exchangeable(system: &mut System, scalar: Quantity, effect: Quantity) -> bool {
    let children: BTreeSet<usize> =
        system.children(scalar).into_iter().chain(system.children(effect)).collect();
    !children.is_empty() && children.iter().all(|child| stands_beside(system, *child, scalar, effect))
}

fn stands_beside(system: &mut System, child: usize, scalar: Quantity, effect: Quantity) -> bool {
    let statement = system.statements[child].clone();
    let either = |quantity: Quantity| quantity == scalar || quantity == effect;
    statement.roots().all(|root| {
        let Some(Linear { terms, .. }) = linear(&mut system.graph, root, &either) else {
            return false;
        };
        match &terms[..] {
            [] => true,
            [(a, first), (b, second)] => a.quantity != b.quantity && first == second,
            _ => false,
        }
    })
}
