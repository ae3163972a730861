//! A rung as a model of its own: the terms that it leaves out held at zero, and what then touches no response dropped.

use std::collections::HashSet;

use super::{Column, Expression, Model, Named, Rung, Unknown};
use crate::arena::{Arena, Id};

/// What became of the unknowns when a rung was applied.
#[derive(Clone, Debug, Default)]
pub struct Pruned {
    /// Unknowns of the whole model that this rung leaves out.
    pub unknowns: Vec<String>,
    /// Derived quantities that this rung leaves out because they are made of such unknowns.
    pub derived: Vec<String>,
}

impl Model {
    /// The model of one rung: every term of the ladder that the rung does not have is zero, and the unknowns that
    /// touched a response only through such terms leave the model, with the quantities derived from them.
    pub fn at_rung(&self, rung: Id<Rung>) -> (Model, Pruned) {
        let off = self.off_at(rung);
        let mut model = self.clone();
        for term in &off {
            let span = self.expressions.span(self.named[*term].value);
            model.named[*term].value = model.expressions.add(Expression::Number(0.0), span);
        }
        let before = self.reaching_a_response();
        let after = model.reaching_a_response();
        let dropped: HashSet<Id<Unknown>> = before.difference(&after).copied().collect();
        let pruned = model.drop_unknowns(&dropped);
        (model, pruned)
    }

    /// The unknowns that a response depends on, directly or through other priors.
    pub fn reaching_a_response(&self) -> HashSet<Id<Unknown>> {
        let mut seen = Seen::default();
        for response in &self.responses {
            for root in response.distribution.roots() {
                seen.expression(self, root);
            }
        }
        seen.unknowns
    }

    /// The unknowns that a response depends on at a rung.
    pub fn reaching_at(&self, rung: Id<Rung>) -> HashSet<Id<Unknown>> {
        // Terms that are off count as seen, so that nothing is looked for behind them.
        let mut seen = Seen { named: self.off_at(rung), ..Seen::default() };
        for root in self.responses.iter().flat_map(|response| response.distribution.roots()) {
            seen.expression(self, root);
        }
        seen.unknowns
    }

    /// The terms of the ladder that a rung leaves out.
    fn off_at(&self, rung: Id<Rung>) -> HashSet<Id<Named>> {
        let kept: HashSet<Id<Named>> = self.ladder[rung].terms.iter().copied().collect();
        let all = self.ladder.iter().flat_map(|(_, rung)| &rung.terms);
        all.filter(|term| !kept.contains(term)).copied().collect()
    }

    /// The unknowns that an expression depends on, directly or through names and priors.
    pub fn ancestors(&self, root: Id<Expression>) -> HashSet<Id<Unknown>> {
        let mut seen = Seen::default();
        seen.expression(self, root);
        seen.unknowns
    }

    fn drop_unknowns(&mut self, dropped: &HashSet<Id<Unknown>>) -> Pruned {
        let mut pruned = Pruned::default();
        let gone: HashSet<Id<Named>> = self
            .named
            .iter()
            .filter(|(_, named)| !self.ancestors(named.value).is_disjoint(dropped))
            .map(|(id, _)| id)
            .collect();
        for id in &gone {
            if self.named[*id].role == super::NamedRole::Derive {
                pruned.derived.push(self.named[*id].name.clone());
            }
        }
        pruned.derived.sort();
        // Ids are positions, so the arenas are rebuilt and every reference is renumbered.
        let mut unknown_ids = vec![None; self.unknowns.len()];
        let mut unknowns = Arena::default();
        for (id, unknown) in self.unknowns.iter() {
            if dropped.contains(&id) {
                pruned.unknowns.push(unknown.name.clone());
            } else {
                unknown_ids[id.position()] = Some(unknowns.add(unknown.clone()));
            }
        }
        let mut named_ids = vec![None; self.named.len()];
        let mut named = Arena::default();
        for (id, item) in self.named.iter() {
            if !gone.contains(&id) {
                named_ids[id.position()] = Some(named.add(item.clone()));
            }
        }
        self.unknowns = unknowns;
        self.named = named;
        self.expressions.renumber(&unknown_ids, &named_ids);
        self.ladder = Arena::default();
        pruned
    }
}

#[derive(Default)]
struct Seen {
    unknowns: HashSet<Id<Unknown>>,
    named: HashSet<Id<Named>>,
    columns: HashSet<Id<Column>>,
}

impl Seen {
    fn expression(&mut self, model: &Model, root: Id<Expression>) {
        let mut stack = vec![root];
        while let Some(id) = stack.pop() {
            match &model.expressions[id] {
                Expression::Unknown(unknown, _) if self.unknowns.insert(*unknown) => {
                    stack.extend(model.unknowns[*unknown].prior.roots());
                }
                Expression::Named(named, _) if self.named.insert(*named) => {
                    stack.push(model.named[*named].value)
                }
                // A covariate with gaps carries the unknowns of its own response.
                Expression::Column(column, _) if model.has_gaps(*column) && self.columns.insert(*column) => {
                    stack.extend(model.response_of(*column).into_iter().flat_map(|r| r.distribution.roots()));
                }
                _ => model.expressions.children(id, |child| stack.push(child)),
            }
        }
    }
}
