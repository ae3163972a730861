//! Effects: the pieces of a response's location that vary by label, ready to be worked out at a state.

use stook_lang::distribution::Law;
use stook_lang::model::Index;

use crate::bind::Bound;
use crate::distribution;
use crate::program::{CompiledPiece, Elements, Factor, Program, Route};
use crate::rule::Chain;
use crate::symbolic::{Link, Quantity, System, prior_centre};

/// An effect: an unknown with an element for each label, around its prior's centre.
#[derive(Debug)]
pub(super) struct Effect {
    pub(super) name: String,
    pub(super) dimensions: Vec<Index>,
    /// The place in the state of the element that each row refers to.
    pub(super) places: Route,
    factor: usize,
    pub(super) first: usize,
    size: usize,
    /// Whether the spread of its prior is estimated.
    estimated: bool,
    /// Whether its prior's centre is not made of unknowns, and so belongs to what is common.
    fixed_centre: bool,
}

/// An effect at a state.
#[derive(Clone, Debug, Default)]
pub(super) struct EffectState {
    /// Each label's deviation from its prior's centre.
    pub(super) deviations: Vec<f64>,
    /// The sd of the distribution that the labels are drawn from; where that is not estimated, the sd among them.
    pub(super) sd: f64,
    /// The sd among the labels at hand.
    pub(super) finite_sd: f64,
    /// The prior's centre, where it belongs to what is common to all.
    pub(super) centre: f64,
}

impl Effect {
    /// The effect that a piece is, if it is one.
    pub(super) fn of(
        piece: &CompiledPiece,
        bound: &Bound,
        program: &Program,
        system: &System,
    ) -> Option<Effect> {
        let unknown = piece.unknown?;
        let places = piece.places.clone()?;
        let declared = &bound.model.unknowns[unknown];
        if declared.dimensions.is_empty() {
            return None;
        }
        let quantity = Quantity::Unknown(unknown);
        let factor = system.law_of(quantity)?;
        let statement = &system.statements[factor];
        let centre = prior_centre(statement.law);
        let depends = |at: usize| !system.graph.depends(statement.parameters[at]).is_empty();
        Some(Effect {
            name: piece.name.clone(),
            dimensions: declared.dimensions.clone(),
            places,
            factor,
            first: program.layout.range(quantity).start,
            size: declared.dimensions.iter().map(|index| bound.size(*index)).product(),
            estimated: (0..statement.parameters.len()).filter(|at| Some(*at) != centre).any(depends),
            fixed_centre: centre.is_none_or(|at| !depends(at)),
        })
    }

    /// Works the effect out at the chain's state.
    pub(super) fn at(&self, program: &Program, chain: &mut Chain) -> EffectState {
        let factor: &Factor = &program.factors[self.factor];
        let mut found = EffectState::default();
        let mut variance = 0.0;
        for chunk in Elements::Range(0, self.size).chunks() {
            factor.run(&chain.state, chunk, &mut chain.scratch);
            chunk.for_each(|at, element| {
                let parameters = factor.parameters(&chain.scratch, at);
                let centre = prior_centre(factor.law).map_or(0.0, |which| parameters[which]);
                found.deviations.push(chain.state.values[self.first + element] - centre);
                variance += spread(factor.law, &parameters[..factor.law.arity()]) / self.size as f64;
                if self.fixed_centre {
                    found.centre += centre / self.size as f64;
                }
            });
        }
        found.finite_sd = sd(&found.deviations);
        found.sd = if self.estimated { variance.sqrt() } else { found.finite_sd };
        found
    }
}

/// The variance of a law; for a law without one the square of its scale.
fn spread(law: Law, parameters: &[f64]) -> f64 {
    let variance = distribution::variance(law, parameters);
    if variance.is_finite() {
        return variance;
    }
    let scale = parameters[parameters.len() - 1];
    scale * scale
}

/// The variance of a response around its location, on the scale on which the pieces add up.
///
/// For the log-odds and probit scales that of the latent logistic and normal variable; for counts on the log scale the
/// lognormal approximation log(1 + 1 / mean + 1 / size) (Nakagawa, Johnson and Schielzeth 2017, table 2).
pub(super) fn residual_variance(law: Law, link: Link, parameters: &[f64]) -> f64 {
    match (law, link) {
        (Law::Lognormal, _) => parameters[1] * parameters[1],
        (Law::PoissonLog, _) => libm::log1p(libm::exp(-parameters[0])),
        (Law::NegativeBinomialLog, _) => libm::log1p(libm::exp(-parameters[0]) + 1.0 / parameters[1]),
        (Law::Poisson, Link::Log) => libm::log1p(1.0 / parameters[0]),
        (Law::NegativeBinomial, Link::Log) => libm::log1p(1.0 / parameters[0] + 1.0 / parameters[1]),
        (_, Link::LogOdds) => std::f64::consts::PI * std::f64::consts::PI / 3.0,
        (_, Link::Probit) => 1.0,
        (Law::Binomial, Link::Identity) => parameters[1] * (1.0 - parameters[1]),
        _ => spread(law, parameters),
    }
}

/// The sample standard deviation; 0 for fewer than two.
pub(super) fn sd(values: &[f64]) -> f64 {
    if values.len() < 2 {
        return 0.0;
    }
    let n = values.len() as f64;
    let mean = values.iter().sum::<f64>() / n;
    (values.iter().map(|value| (value - mean) * (value - mean)).sum::<f64>() / (n - 1.0)).sqrt()
}
