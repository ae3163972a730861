//! Reductions over groups and tables.

use crate::arena::Id;
use crate::model::{Expression, Index};
use crate::nearest::nearest;
use crate::problem::{NameKind, NameProblem, Wanted};
use crate::syntax::tree::{self, Name};

use super::access::{Asker, RoleForm};
use super::checker::{Checker, Scope};
use super::names::{REDUCERS, reducer};

impl<'t> Checker<'t> {
    /// `sum(body over G per H)`.
    pub(super) fn reduction(
        &mut self,
        name: &Name,
        body: Id<tree::Expression>,
        over: &Name,
        per: &[Name],
        scope: &mut Scope,
    ) -> Option<Expression> {
        let reducer = reducer(&name.text);
        if reducer.is_none() {
            self.report_reducer(name);
        }
        let over = self.index(over)?;
        scope.variables.push(over);
        let body = self.expression(body, scope);
        let mut inner = Vec::with_capacity(per.len());
        let mut groups = Vec::with_capacity(per.len());
        for group in per {
            let index = self.index(group);
            groups.push(index);
            inner.push(index.and_then(|index| self.reach_alone(scope, index, group)));
        }
        scope.variables.pop();
        let mut matching = Vec::with_capacity(per.len());
        let mut whole = true;
        for ((group, index), inner) in per.iter().zip(groups).zip(inner) {
            let outer = index.and_then(|index| {
                let asker = Asker {
                    span: group.span,
                    name: &group.text,
                    declared: self.index_span(index),
                    form: RoleForm::Test,
                };
                self.reach(scope, index, &asker)
            });
            match inner.zip(outer) {
                Some(pair) => matching.push(pair),
                None => whole = false,
            }
        }
        let (reducer, body) = reducer.zip(body)?;
        whole.then_some(Expression::Reduce { reducer, over, body, matching })
    }

    /// The way from the reduction's own variable, which is the scope's last.
    fn reach_alone(&mut self, scope: &Scope, target: Index, group: &Name) -> Option<crate::model::Access> {
        let own = scope.variables.len() - 1;
        // Only the innermost variable is asked: a `per` that it does not tell would match everything or nothing.
        let asker = Asker {
            span: group.span,
            name: &group.text,
            declared: self.index_span(target),
            form: RoleForm::Test,
        };
        let alone = Scope {
            variables: scope.variables[own..].to_vec(),
            base: 0,
            owner: scope.owner,
            derived: scope.derived,
        };
        let mut access = self.reach(&alone, target, &asker)?;
        if let crate::model::Place::Variable(variable) = &mut access.place {
            variable.0 = own as u32;
        }
        Some(access)
    }

    fn report_reducer(&mut self, name: &Name) {
        let near = nearest(&name.text, REDUCERS.iter().map(|(word, _)| *word));
        let nearest = near.map(|near| (near.to_string(), NameKind::Reducer, None));
        let (span, name) = (name.span, name.text.clone());
        self.problems.add(NameProblem::Unknown { span, name, wanted: Wanted::Reducer, nearest });
    }
}
