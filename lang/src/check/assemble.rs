//! Values, priors and responses, and the model put together from what is whole.

use std::collections::HashSet;

use crate::arena::Id;
use crate::distribution::Law;
use crate::model::{
    Column, Distribution, Expression, Index, Model, Named, NamedRole, Response, Support, Unknown,
};
use crate::problem::{Feature, Problems, ShapeProblem, Wanted};
use crate::syntax::tree::Name;

use super::WrittenArgument;
use super::checker::{Checker, Entity, NamedDraft, ResponseDraft, Scope, UnknownDraft};

impl<'t> Checker<'t> {
    /// Works out every let, term and derived quantity.
    pub(super) fn work_out_named(&mut self) {
        for at in 0..self.named.len() {
            let draft = &self.named[at];
            let item = draft.declaration;
            let mut scope = Scope::new(&draft.dimensions, item.name.span);
            scope.derived = draft.role == NamedRole::Derive;
            self.named[at].value = self.expression(item.value, &mut scope);
        }
    }

    /// Works out every prior.
    pub(super) fn work_out_priors(&mut self) {
        for at in 0..self.unknowns.len() {
            let item = self.unknowns[at].declaration;
            if let Some(holding) = &item.holding {
                self.refuse(Feature::Holding, holding.span);
            }
            if let Some(starting) = &item.starting
                && !item.prior.as_ref().is_some_and(|prior| self.has_recursion(prior))
            {
                self.refuse(Feature::Recursion, starting.span);
            }
            // The prior of a type that this version does not have can be right, and yet nothing here could read it.
            if self.unknowns[at].refused {
                continue;
            }
            let Some(prior) = &item.prior else {
                let (span, name) = (item.name.span, item.name.text.clone());
                let fitting = fitting_priors(self.unknowns[at].support);
                self.problems.add(ShapeProblem::PriorMissing { span, name, fitting });
                continue;
            };
            let mut scope = Scope::new(&self.unknowns[at].dimensions, item.name.span);
            self.unknowns[at].prior = self.distribution(prior, &item.name.text, &mut scope);
        }
    }

    /// Works out how every response arises.
    pub(super) fn work_out_responses(&mut self) {
        for at in 0..self.responses.len() {
            let item = self.responses[at].declaration;
            let name = &item.column;
            if let Some(over) = &item.over {
                self.refuse(Feature::DrawnTogether, over.span);
                continue;
            }
            let Some(law) = &item.law else {
                self.problems.add(ShapeProblem::LawMissing { span: name.span, name: name.text.clone() });
                continue;
            };
            // Without its table nothing can be said of the row.
            let Some(column) = self.responses[at].column else { continue };
            let row = Index::Table(self.model.columns[column].table);
            let mut scope = Scope::new(&[row], name.span);
            self.responses[at].distribution = self.distribution(law, &name.text, &mut scope);
        }
    }

    /// The value column that a response names.
    pub(super) fn response_column(&mut self, name: &Name) -> Option<Id<Column>> {
        match self.entity(&name.text).map(|declared| declared.entity) {
            Some(Entity::Column(column)) => Some(column),
            _ => {
                self.report_name(name, Wanted::Column);
                None
            }
        }
    }

    /// The model. Where something in it is wrong, placeholders stand for it, so that the checks behind this one can still
    /// look at the rest; such a model is never handed out.
    pub(super) fn assemble(mut self) -> Assembled {
        let untyped = self.unknowns.iter().enumerate().filter(|(_, draft)| draft.untyped);
        let untyped = untyped.map(|(at, _)| Id::new(at)).collect();
        let mut model = std::mem::take(&mut self.model);
        for draft in self.unknowns {
            model.unknowns.add(unknown(draft));
        }
        for draft in self.named {
            let named = named(draft, &mut model);
            model.named.add(named);
        }
        model.responses.extend(self.responses.into_iter().filter_map(response));
        model.ladder = self.ladder;
        Assembled { model, untyped, arguments: self.written_arguments, problems: self.problems }
    }
}

/// What the checker hands on.
pub(super) struct Assembled {
    pub(super) model: Model,
    /// Unknowns whose type is wrong.
    pub(super) untyped: HashSet<Id<Unknown>>,
    pub(super) arguments: Vec<WrittenArgument>,
    pub(super) problems: Problems,
}

fn unknown(draft: UnknownDraft) -> Unknown {
    let item = draft.declaration;
    let span = item.name.span;
    // A distribution without its parameters: the sign that it could not be built.
    let unbuilt =
        || Distribution { law: Law::Normal, name: "", parameters: Vec::new(), low: None, high: None, span };
    Unknown {
        name: item.name.text.clone(),
        span,
        documentation: draft.documentation.cloned(),
        support: draft.support,
        dimensions: draft.dimensions,
        unit: item.kind.unit.as_ref().map(|unit| unit.text.clone()),
        prior: draft.prior.unwrap_or_else(unbuilt),
        demand: super::types::demand(item.demand.as_ref()),
    }
}

fn named(draft: NamedDraft, model: &mut Model) -> Named {
    let item = draft.declaration;
    // A half fits wherever a quantity may stand, so nothing follows from the mistake.
    let value = draft.value.unwrap_or_else(|| model.expressions.add(Expression::Number(0.5), item.name.span));
    Named {
        name: item.name.text.clone(),
        span: item.name.span,
        documentation: draft.documentation.cloned(),
        role: draft.role,
        dimensions: draft.dimensions,
        value,
    }
}

fn response(draft: ResponseDraft) -> Option<Response> {
    Some(Response { column: draft.column?, distribution: draft.distribution?, span: draft.span })
}

/// Three priors that fit a type.
fn fitting_priors(support: Support) -> [&'static str; 3] {
    match support {
        Support::Real { low: None, high: None } => [
            "normal(mean: 0, sd: 10)",
            "student_t(df: 4, centre: 0, scale: 10)",
            "laplace(centre: 0, scale: 10)",
        ],
        Support::Real { low: Some(_), high: None } => [
            "normal(mean: 0, sd: 10) above a",
            "student_t(df: 4, centre: 0, scale: 10) above a",
            "laplace(centre: 0, scale: 10) above a",
        ],
        Support::Real { low: None, high: Some(_) } => [
            "normal(mean: 0, sd: 10) below b",
            "student_t(df: 4, centre: 0, scale: 10) below b",
            "laplace(centre: 0, scale: 10) below b",
        ],
        Support::Real { low: Some(_), high: Some(_) } => [
            "uniform(low: a, high: b)",
            "normal(mean: 0, sd: 10) between a and b",
            "student_t(df: 4, centre: 0, scale: 10) between a and b",
        ],
        Support::Positive => {
            ["half_normal(sd: 10)", "gamma(shape: 2, rate: 0.1)", "lognormal(median: 10, log_sd: 1)"]
        }
        Support::Fraction => ["beta(a: 1, b: 1)", "beta(mean: 0.5, size: 4)", "uniform(low: 0, high: 1)"],
        Support::Count => {
            ["poisson(mean: 5)", "negative_binomial(mean: 5, size: 2)", "binomial(trials: 10, p: 0.5)"]
        }
        Support::YesNo => ["bernoulli(p: 0.5)", "bernoulli(log_odds: 0)", "bernoulli(probit: 0)"],
    }
}
