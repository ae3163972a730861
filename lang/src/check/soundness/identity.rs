//! What the data can tell: unknowns that reach no response, terms that cannot be told apart.

use std::collections::HashMap;

use crate::arena::Id;
use crate::distribution::Law;
use crate::model::{
    Access, BinaryOperator, Expression, Index, Model, Place, Response, Step, UnaryOperator, Unknown,
};
use crate::problem::{IdentityProblem, Problems};
use crate::span::{FileId, Span};

/// An unknown that stands in a response's location by itself, at an element.
type Alone = (Id<Unknown>, Vec<Access>);

/// Checks what the data can tell.
pub(super) fn identity(model: &Model, file: FileId, problems: &mut Problems) {
    if model.responses.is_empty() {
        problems.add(IdentityProblem::NoResponse { span: Span::new(file, 0, 0) });
        return;
    }
    let reached = model.reaching_a_response();
    for (id, unknown) in model.unknowns.iter().filter(|(id, _)| !reached.contains(id)) {
        // What it is the prior of has been reported where that is unreached itself.
        let has_child = model.unknowns.iter().any(|(other, declared)| {
            other != id && declared.prior.roots().any(|root| model.ancestors(root).contains(&id))
        });
        if !has_child {
            problems.add(IdentityProblem::Unreached { span: unknown.span, name: unknown.name.clone() });
        }
    }
    let uses = uses(model);
    for response in &model.responses {
        let pieces = pieces(model, response);
        alike(model, response, &pieces, &uses, problems);
        row_effects(model, response, &pieces, problems);
        fixed_levels(model, &pieces, &uses, problems);
    }
}

/// How many expressions name each unknown.
fn uses(model: &Model) -> HashMap<Id<Unknown>, usize> {
    let mut found = HashMap::new();
    let mut roots: Vec<Id<Expression>> = vec![];
    roots.extend(model.unknowns.iter().flat_map(|(_, unknown)| unknown.prior.roots()));
    roots.extend(model.responses.iter().flat_map(|response| response.distribution.roots()));
    let used = model.named.iter().filter(|(_, named)| named.role != crate::model::NamedRole::Derive);
    roots.extend(used.map(|(_, named)| named.value));
    while let Some(id) = roots.pop() {
        if let Expression::Unknown(unknown, _) = &model.expressions[id] {
            *found.entry(*unknown).or_default() += 1;
        }
        model.expressions.children(id, |child| roots.push(child));
    }
    found
}

/// The unknowns that are added in a response's location, each by itself.
fn pieces(model: &Model, response: &Response) -> Vec<Alone> {
    let location = match response.distribution.law {
        Law::StudentT | Law::BinomialLogOdds | Law::BinomialProbit => 1,
        Law::Normal
        | Law::Laplace
        | Law::Cauchy
        | Law::Lognormal
        | Law::BernoulliLogOdds
        | Law::BernoulliProbit
        | Law::PoissonLog
        | Law::NegativeBinomialLog => 0,
        _ => return vec![],
    };
    let mut found = vec![];
    split(model, response.distribution.parameters[location], &[], &mut found);
    found
}

/// `scope` holds what the variables of the expression stand for in the row; none at the outermost level.
fn split(model: &Model, id: Id<Expression>, scope: &[Access], found: &mut Vec<Alone>) {
    let seen = |access: &Access| match (&access.place, scope.is_empty()) {
        (Place::Variable(variable), false) => {
            let mut outer = scope[variable.0 as usize].clone();
            outer.steps.extend(access.steps.iter().copied());
            outer
        }
        _ => access.clone(),
    };
    match &model.expressions[id] {
        Expression::Unknown(unknown, accesses) => found.push((*unknown, accesses.iter().map(seen).collect())),
        Expression::Named(named, accesses) => {
            let inner: Vec<Access> = accesses.iter().map(seen).collect();
            let whole = Access { place: Place::Variable(crate::model::Variable(0)), steps: vec![] };
            let inner = if inner.is_empty() { vec![whole] } else { inner };
            split(model, model.named[*named].value, &inner, found);
        }
        Expression::Binary(BinaryOperator::Add | BinaryOperator::Subtract, a, b) => {
            split(model, *a, scope, found);
            split(model, *b, scope, found);
        }
        Expression::Unary(UnaryOperator::Negate, a) => split(model, *a, scope, found),
        _ => {}
    }
}

fn alike(
    model: &Model,
    response: &Response,
    pieces: &[Alone],
    uses: &HashMap<Id<Unknown>, usize>,
    problems: &mut Problems,
) {
    for (at, (unknown, accesses)) in pieces.iter().enumerate() {
        let same = pieces[..at].iter().find(|(other, others)| other != unknown && others == accesses);
        if let Some((other, _)) = same
            && uses.get(unknown) == Some(&1)
            && uses.get(other) == Some(&1)
        {
            problems.add(IdentityProblem::Alike {
                span: model.unknowns[*unknown].span,
                name: model.unknowns[*unknown].name.clone(),
                other: model.unknowns[*other].name.clone(),
                first: model.unknowns[*other].span,
                response: response.span,
            });
        }
    }
}

fn row_effects(model: &Model, response: &Response, pieces: &[Alone], problems: &mut Problems) {
    let law = &response.distribution;
    let scale = match law.law {
        Law::Normal | Law::Lognormal | Law::Laplace | Law::Cauchy => 1,
        Law::StudentT => 2,
        _ => return,
    };
    if model.ancestors(law.parameters[scale]).is_empty() {
        return;
    }
    let own = Index::Table(model.columns[response.column].table);
    for (unknown, accesses) in pieces {
        let each_row = model.unknowns[*unknown].dimensions[..] == [own]
            && accesses.iter().all(|access| !access.steps.iter().any(|step| matches!(step, Step::Row(_))));
        if each_row {
            problems.add(IdentityProblem::RowEffect {
                span: model.unknowns[*unknown].span,
                name: model.unknowns[*unknown].name.clone(),
                response: response.span,
            });
        }
    }
}

fn fixed_levels(
    model: &Model,
    pieces: &[Alone],
    uses: &HashMap<Id<Unknown>, usize>,
    problems: &mut Problems,
) {
    let once = |unknown: &Id<Unknown>| uses.get(unknown) == Some(&1);
    let scalar = |unknown: &Id<Unknown>| model.unknowns[*unknown].dimensions.is_empty() && once(unknown);
    let Some((intercept, _)) = pieces.iter().find(|(unknown, _)| scalar(unknown)) else { return };
    for (unknown, _) in pieces {
        let declared = &model.unknowns[*unknown];
        let fixed = declared.prior.roots().all(|root| model.ancestors(root).is_empty());
        if declared.dimensions.len() == 1 && fixed && once(unknown) {
            problems.add(IdentityProblem::FixedLevels {
                span: declared.span,
                name: declared.name.clone(),
                intercept: model.unknowns[*intercept].name.clone(),
                first: model.unknowns[*intercept].span,
            });
        }
    }
}
