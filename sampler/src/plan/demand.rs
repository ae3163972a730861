//! What to say of a demand that cannot be met: the pair that stands there and the nearest one that would do.

use stook_lang::distribution::Law;
use stook_lang::model::{Demand, Rule};

use super::choose::Chooser;
use super::{PlanProblem, Refusal};
use crate::symbolic::Quantity;

/// The problem of a refused demand.
pub(super) fn refused(
    chooser: &Chooser<'_>,
    quantity: Quantity,
    demand: Demand,
    refusal: Refusal,
) -> PlanProblem {
    let system = &chooser.system;
    let own = system.statements.iter().find(|statement| statement.quantity() == quantity);
    let standing = &system.statements[refusal.statement];
    let is_child = standing.quantity() != quantity;
    let position = (0..standing.parameters.len())
        .find(|at| system.graph.depends_on(standing.parameters[*at], quantity))
        .filter(|_| is_child);
    PlanProblem {
        unknown: chooser.name(quantity),
        rule: rule_name(demand.rule),
        demand: demand.span,
        statement: standing.span,
        pair: (
            own.map_or(String::new(), |statement| statement.name.to_string()),
            is_child.then(|| standing.name.to_string()),
        ),
        reason: refusal.reason,
        instead: instead(demand.rule, position.map(|at| (standing.law, at))),
    }
}

fn rule_name(rule: Rule) -> &'static str {
    match rule {
        Rule::Conjugate => "conjugate",
        Rule::Slice => "slice",
        Rule::Joint => "joint",
        Rule::Enumerate => "enumerate",
    }
}

/// The nearest pair that would do, for a child law and the position of the argument that the unknown stands in.
fn instead(rule: Rule, child: Option<(Law, usize)>) -> String {
    let pair = match (rule, child) {
        (Rule::Conjugate, Some((Law::Normal | Law::Lognormal, 0))) => {
            "a normal prior, with the mean linear in the unknown, would be"
        }
        (Rule::Conjugate, Some((Law::Normal | Law::Lognormal, 1) | (Law::HalfNormal, 0))) => {
            "an unknown precision with a gamma prior, or an unknown variance with an inverse_gamma prior, would be"
        }
        (Rule::Conjugate, Some((Law::Laplace, 1))) => "an inverse_gamma prior on the scale itself would be",
        (Rule::Conjugate, Some((Law::Exponential | Law::Poisson, 0))) => {
            "a gamma prior on the rate (for poisson: the mean) itself would be"
        }
        (Rule::Conjugate, Some((Law::Gamma | Law::InverseGamma, 1))) => {
            "a gamma prior on the rate (for inverse_gamma: the scale) itself would be"
        }
        (Rule::Conjugate, Some((Law::Bernoulli, 0) | (Law::Binomial, 1))) => {
            "a beta prior on the probability itself would be"
        }
        (Rule::Conjugate, _) => {
            "pairs such as normal with normal, gamma with poisson and beta with binomial are"
        }
        (Rule::Joint, _) => "normal priors on unknowns that the means of normal laws are linear in are",
        (Rule::Enumerate, _) => {
            "bernoulli and binomial unknowns, and counts with an upper end (`below`), are"
        }
        (Rule::Slice, _) => "any unknown is",
    };
    let rule = rule_name(rule);
    format!("leave out `by {rule}` and let the compiler choose; {pair} open to `by {rule}`")
}
