//! The ladder: names of terms and rungs.

use std::collections::HashMap;

use crate::arena::Id;
use crate::model::{Named, NamedRole, Rung};
use crate::nearest::nearest;
use crate::problem::{LadderProblem, NameKind, NameProblem, Wanted};
use crate::span::Span;
use crate::syntax::tree::{DeclarationKind, Name, RungSyntax};

use super::checker::{Checker, Entity};

impl<'t> Checker<'t> {
    /// Reads the ladder; a second one is reported, and its rungs are not looked at.
    pub(super) fn read_ladder(&mut self) {
        let tree = self.tree;
        let mut first: Option<Span> = None;
        for declaration in &tree.declarations {
            let DeclarationKind::Ladder(item) = &declaration.kind else { continue };
            if let Some(first) = first {
                self.problems.add(NameProblem::SecondLadder { span: declaration.span, first });
                continue;
            }
            first = Some(declaration.span);
            let names: HashMap<&str, Span> =
                item.rungs.iter().rev().map(|rung| (rung.name.text.as_str(), rung.name.span)).collect();
            let mut above: HashMap<&str, Id<Rung>> = HashMap::new();
            for rung in &item.rungs {
                self.read_rung(rung, &names, &mut above);
            }
        }
    }

    fn read_rung(
        &mut self,
        item: &'t RungSyntax,
        names: &HashMap<&str, Span>,
        above: &mut HashMap<&'t str, Id<Rung>>,
    ) {
        let from = item.from.as_ref().and_then(|from| self.start(from, names, above));
        let mut terms = from.map_or_else(Vec::new, |from| self.ladder[from].terms.clone());
        let mut adds: Vec<(Id<Named>, Span)> = Vec::new();
        for name in &item.adds {
            let Some(term) = self.term(name) else { continue };
            if terms.contains(&term) {
                let earlier = adds.iter().find(|(other, _)| *other == term).map(|(_, span)| *span);
                let first = earlier.or(from.map(|from| self.ladder[from].span)).unwrap_or(name.span);
                let (span, term, rung) = (name.span, name.text.clone(), item.name.text.clone());
                self.problems.add(LadderProblem::AddsTwice { span, term, rung, first });
                continue;
            }
            adds.push((term, name.span));
            terms.push(term);
        }
        if from.is_some() && item.adds.is_empty() {
            self.problems.add(LadderProblem::AddsNothing { span: item.span, name: item.name.text.clone() });
        }
        let adds = adds.into_iter().map(|(term, _)| term).collect();
        let id =
            self.ladder.add(Rung { name: item.name.text.clone(), span: item.name.span, from, adds, terms });
        if let Some(first) = above.get(item.name.text.as_str()) {
            let (span, name, first) = (item.name.span, item.name.text.clone(), self.ladder[*first].span);
            self.problems.add(LadderProblem::RungTwice { span, name, first });
        } else {
            above.insert(&item.name.text, id);
        }
    }

    fn start(
        &mut self,
        from: &Name,
        names: &HashMap<&str, Span>,
        above: &HashMap<&str, Id<Rung>>,
    ) -> Option<Id<Rung>> {
        if let Some(id) = above.get(from.text.as_str()) {
            return Some(*id);
        }
        let (span, name) = (from.span, from.text.clone());
        if let Some(declared) = names.get(from.text.as_str()) {
            self.problems.add(NameProblem::LaterRung { span, name, declared: *declared });
            return None;
        }
        let mut candidates: Vec<&str> = above.keys().copied().collect();
        candidates.sort_unstable();
        let near = nearest(&from.text, candidates.iter().copied());
        let nearest = near.map(|near| (near.to_string(), NameKind::Rung, names.get(near).copied()));
        self.problems.add(NameProblem::Unknown { span, name, wanted: Wanted::Rung, nearest });
        None
    }

    fn term(&mut self, name: &Name) -> Option<Id<Named>> {
        let Some(declared) = self.entity(&name.text) else {
            self.report_unknown(name, Wanted::Term);
            return None;
        };
        match declared.entity {
            Entity::Named(id) if self.named[id.position()].role == NamedRole::Term => return Some(id),
            Entity::Broken => {}
            entity => {
                let kind = self.entity_kind(entity);
                let (span, name, declared) = (name.span, name.text.clone(), declared.span);
                self.problems.add(NameProblem::NotATerm { span, name, kind, declared });
            }
        }
        None
    }
}
