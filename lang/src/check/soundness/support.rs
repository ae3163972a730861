//! Types against distributions: priors of unknowns, responses of columns.

use std::collections::HashSet;

use super::is_built;
use super::range::{Range, of_law, of_support};
use crate::arena::Id;
use crate::distribution::Law;
use crate::model::{ColumnKind, Distribution, Model, Support, Unknown};
use crate::problem::{Problems, SupportProblem};

/// Every prior against the type of its unknown.
pub(super) fn priors(model: &Model, untyped: &HashSet<Id<Unknown>>, problems: &mut Problems) {
    let built = model.unknowns.iter().filter(|(_, unknown)| is_built(&unknown.prior));
    for (_, unknown) in built.filter(|(id, _)| !untyped.contains(id)) {
        let law = &unknown.prior;
        truncation(model, law, problems);
        let (wanted, found) = (of_support(model, unknown.support), of_law(model, law));
        let kind = described(model, unknown.support);
        if wanted.whole != found.whole {
            problems.add(SupportProblem::PriorKind {
                span: law.span,
                name: unknown.name.clone(),
                kind,
                law: law.name,
                declared: unknown.span,
            });
        } else if !found.within(wanted) {
            problems.add(SupportProblem::PriorSupport {
                span: law.span,
                name: unknown.name.clone(),
                law: law.name,
                declared: unknown.span,
                mends: mends(wanted, found, unknown.support),
                kind,
            });
        }
    }
    for response in &model.responses {
        truncation(model, &response.distribution, problems);
    }
}

fn mends(wanted: Range, found: Range, support: Support) -> String {
    let truncation = match (found.low < wanted.low, found.high > wanted.high) {
        (true, true) => format!("between {} and {}", wanted.low, wanted.high),
        (true, false) => format!("above {}", wanted.low),
        _ => format!("below {}", wanted.high),
    };
    let other = match support {
        Support::Positive => ", take a prior for positive quantities such as half_normal or gamma",
        Support::Fraction => ", take a beta or a uniform",
        _ => "",
    };
    format!("truncate the prior with `{truncation}`{other}, or declare the unknown `real`")
}

/// The type in words, with its bounds.
fn described(model: &Model, support: Support) -> String {
    let range = of_support(model, support);
    match support {
        Support::Real { low: None, high: None } => "real".to_string(),
        Support::Real { low: Some(_), high: None } => format!("real above {}", range.low),
        Support::Real { low: None, high: Some(_) } => format!("real below {}", range.high),
        Support::Real { .. } => format!("real between {} and {}", range.low, range.high),
        other => other.words().to_string(),
    }
}

fn truncation(model: &Model, law: &Distribution, problems: &mut Problems) {
    let found = of_law(model, law);
    if (law.low.is_some() || law.high.is_some()) && found.low >= found.high {
        problems.add(SupportProblem::Truncation { span: law.span, law: law.name });
    }
}

/// Every response against the type of its column.
pub(super) fn responses(model: &Model, problems: &mut Problems) {
    for response in &model.responses {
        let column = &model.columns[response.column];
        let ColumnKind::Values { support, .. } = &column.kind else { continue };
        let law = &response.distribution;
        if let Some(instead) = misfit(law.law, *support, of_support(model, *support)) {
            problems.add(SupportProblem::ResponseKind {
                span: law.span,
                name: column.name.clone(),
                law: law.name,
                kind: described(model, *support),
                declared: column.span,
                instead: instead.to_string(),
            });
        }
    }
}

/// What to do instead where a law does not fit a column. A law on the whole real line fits any column: common practice.
fn misfit(law: Law, support: Support, column: Range) -> Option<&'static str> {
    let within = |low: f64, high: f64| column.low >= low && column.high <= high;
    match law {
        Law::Normal | Law::StudentT | Law::Laplace | Law::Cauchy | Law::Uniform => None,
        Law::Bernoulli | Law::BernoulliLogOdds | Law::BernoulliProbit => (support != Support::YesNo)
            .then_some("declare the column `yesno`, or take a binomial or a poisson for counts"),
        Law::Binomial
        | Law::BinomialLogOdds
        | Law::BinomialProbit
        | Law::Poisson
        | Law::PoissonLog
        | Law::NegativeBinomial
        | Law::NegativeBinomialLog => (!column.whole).then_some(
            "declare the column `count`, or take a distribution for measurements, such as normal or gamma",
        ),
        Law::Beta => (!within(0.0, 1.0) || column.whole)
            .then_some("declare the column `fraction`, or take a distribution for its range"),
        Law::Lognormal
        | Law::Gamma
        | Law::InverseGamma
        | Law::Exponential
        | Law::Weibull
        | Law::HalfNormal
        | Law::HalfCauchy
        | Law::HalfStudentT => (!within(0.0, f64::INFINITY) || column.whole).then_some(
            "declare the column `positive`, or take a distribution on the whole line, such as normal",
        ),
    }
}
