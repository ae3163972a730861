//! The additive pieces of a response's mean: the sources of its variation.

use std::collections::BTreeSet;

use stook_lang::arena::Id;
use stook_lang::distribution::Law;
use stook_lang::model::{
    BinaryOperator, Distribution, Expression, Function, Model, NamedRole, UnaryOperator, Unknown,
};

use super::graph::Sym;
use super::system::{Scope, Writer};

/// The scale on which a response's pieces add up.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Link {
    /// The response's own.
    Identity,
    /// The logarithm of its mean, or of itself.
    Log,
    /// The log-odds of its probability.
    LogOdds,
    /// The probit of its probability.
    Probit,
}

/// An additive piece.
#[derive(Clone, Debug)]
pub struct Piece {
    /// The name of the term or unknown; for an expression without a name the names of its unknowns.
    pub name: String,
    /// The piece over the rows of the response.
    pub value: Sym,
    /// The unknown that the piece is an element of, where it is just that; else a covariate's part or the like.
    pub unknown: Option<Id<Unknown>>,
}

/// The pieces of a response's location, with the scale on which they add up.
#[derive(Clone, Debug)]
pub struct Pieces {
    /// The scale.
    pub link: Link,
    /// The location itself.
    pub location: Sym,
    /// The pieces in the order of the text. Pieces without an unknown are left out.
    pub pieces: Vec<Piece>,
}

/// The position of the parameter that pieces add up in, and the scale; `None` for laws whose mean is no parameter.
fn location(law: Law) -> Option<(usize, Link)> {
    match law {
        Law::Normal | Law::Laplace | Law::Cauchy => Some((0, Link::Identity)),
        Law::StudentT => Some((1, Link::Identity)),
        Law::Lognormal | Law::PoissonLog | Law::NegativeBinomialLog => Some((0, Link::Log)),
        Law::Poisson | Law::NegativeBinomial | Law::Bernoulli => Some((0, Link::Identity)),
        Law::BernoulliLogOdds => Some((0, Link::LogOdds)),
        Law::BernoulliProbit => Some((0, Link::Probit)),
        Law::Binomial => Some((1, Link::Identity)),
        Law::BinomialLogOdds => Some((1, Link::LogOdds)),
        Law::BinomialProbit => Some((1, Link::Probit)),
        Law::Gamma
        | Law::InverseGamma
        | Law::Exponential
        | Law::Weibull
        | Law::Beta
        | Law::Uniform
        | Law::HalfNormal
        | Law::HalfCauchy
        | Law::HalfStudentT => None,
    }
}

/// The position of the parameter that an effect varies around, for laws that have one.
pub fn prior_centre(law: Law) -> Option<usize> {
    match law {
        Law::Normal | Law::Laplace | Law::Cauchy => Some(0),
        Law::StudentT => Some(1),
        _ => None,
    }
}

impl Writer<'_> {
    /// The pieces of a response's location.
    pub(super) fn pieces(&mut self, law: &Distribution, scope: &Scope) -> Option<Pieces> {
        let (position, link) = location(law.law)?;
        let mut root = law.parameters[position];
        let mut link = link;
        // A count's `mean: exp(...)` and a share's `p: logistic(...)` add up inside the function.
        if let Expression::Call(function, arguments) = &self.model.expressions[root] {
            match (function, law.law) {
                (Function::Exp, Law::Poisson | Law::NegativeBinomial) => {
                    (root, link) = (arguments[0], Link::Log)
                }
                (Function::Logistic, Law::Bernoulli | Law::Binomial) => {
                    (root, link) = (arguments[0], Link::LogOdds)
                }
                _ => {}
            }
        }
        let location = self.write(root, scope);
        let mut pieces = vec![];
        self.split(root, scope, None, &mut pieces);
        Some(Pieces { link, location, pieces })
    }

    fn split(&mut self, id: Id<Expression>, scope: &Scope, name: Option<&str>, pieces: &mut Vec<Piece>) {
        let model = self.model;
        match &model.expressions[id] {
            Expression::Binary(BinaryOperator::Add | BinaryOperator::Subtract, a, b) if name.is_none() => {
                self.split(*a, scope, None, pieces);
                self.split(*b, scope, None, pieces);
            }
            Expression::Unary(UnaryOperator::Negate, a) if name.is_none() => {
                self.split(*a, scope, None, pieces)
            }
            Expression::Named(named, accesses) => {
                let item = &model.named[*named];
                let inner = Scope {
                    variables: accesses.iter().map(|access| scope.access(access)).collect(),
                    depth: scope.depth,
                };
                let name = match item.role {
                    NamedRole::Term => name.or(Some(&item.name)),
                    NamedRole::Let | NamedRole::Derive => name,
                };
                self.split(item.value, &inner, name, pieces);
            }
            expression => {
                let value = self.write(id, scope);
                let names = unknown_names(model, id);
                if self.graph.depends(value).is_empty() {
                    return;
                }
                let name = name.map_or_else(|| names.join(" and "), str::to_string);
                let Expression::Unknown(unknown, accesses) = expression else {
                    pieces.push(Piece { name, value, unknown: None });
                    return;
                };
                pieces.push(Piece { name, value, unknown: Some(*unknown) });
                // An effect around a mean that is itself unknown (`follows normal(mean: apiary_mean, sd: s)`) varies by
                // what its mean is made of as well.
                let prior = &model.unknowns[*unknown].prior;
                if let Some(centre) = prior_centre(prior.law).map(|at| prior.parameters[at]) {
                    let variables = accesses.iter().map(|access| scope.access(access)).collect();
                    let inner = Scope { variables, depth: scope.depth };
                    if !model.unknowns[*unknown].dimensions.is_empty() {
                        self.split(centre, &inner, None, pieces);
                    }
                }
            }
        }
    }
}

/// The unknowns that an expression names itself, directly or through names.
fn unknown_names(model: &Model, root: Id<Expression>) -> Vec<String> {
    let mut names = BTreeSet::new();
    let mut stack = vec![root];
    while let Some(id) = stack.pop() {
        match &model.expressions[id] {
            Expression::Unknown(unknown, _) => {
                names.insert(model.unknowns[*unknown].name.clone());
            }
            Expression::Named(named, _) => stack.push(model.named[*named].value),
            _ => model.expressions.children(id, |child| stack.push(child)),
        }
    }
    names.into_iter().collect()
}
