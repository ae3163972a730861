//! Closed-form full conditionals, element by element (Gelman et al., Bayesian Data Analysis, 3rd ed. 2013, chapters 2, 3).
//!
//! The elements of the quantity are independent given the rest, because each row of a child refers to one of them.

use stook_lang::distribution::Law;

use super::gather::{Gathered, Gatherer};
use super::{Chain, Trouble};
use crate::distribution;
use crate::plan::ConjugateKind;
use crate::program::{OwnElements, Program};

/// The closed-form update of one quantity.
#[derive(Clone, Debug)]
pub struct ConjugateRule {
    /// The family of prior and posterior.
    pub kind: ConjugateKind,
    /// The children's messages.
    pub gatherer: Gatherer,
    /// The quantity's own law.
    pub own: OwnElements,
}

/// A full conditional in closed form: a law, its parameters and its ends.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Conditional {
    /// The law.
    pub law: Law,
    /// Its canonical parameters.
    pub parameters: [f64; 2],
    /// The lower end.
    pub low: f64,
    /// The upper end.
    pub high: f64,
}

impl ConjugateRule {
    /// Draws every element from its full conditional.
    pub fn update(&mut self, program: &Program, chain: &mut Chain) -> Result<(), Trouble> {
        self.gatherer.gather(program, chain);
        for element in 0..self.own.len() {
            let conditional = self.conditional(program, chain, element);
            let place = self.own.place(element);
            let value = if conditional.is_finite() { conditional.draw(chain) } else { f64::NAN };
            if !value.is_finite() {
                let before = chain.state.values[place];
                return Err(Trouble { place, value: before, what: "the full conditional" });
            }
            chain.state.values[place] = value;
        }
        program.refresh(self.own.quantity, chain);
        Ok(())
    }

    /// The full conditional of an element; the messages must have been gathered at this state.
    pub fn conditional(&self, program: &Program, chain: &mut Chain, element: usize) -> Conditional {
        let (prior, parameters, (low, high)) = self.own.law(program, chain, element);
        let Gathered { a, b } = self.gatherer.sums[element];
        let (law, parameters, low, high) = match self.kind {
            ConjugateKind::Normal => {
                let (mean, precision, low, high) = normal_prior(prior, parameters, low, high);
                let total = precision + b;
                if total == 0.0 {
                    (Law::Uniform, [low, high], low, high)
                } else {
                    (Law::Normal, [(precision * mean + a) / total, 1.0 / total.sqrt()], low, high)
                }
            }
            ConjugateKind::Gamma => {
                let (shape, rate) = match prior {
                    Law::Exponential => (1.0, parameters[0]),
                    _ => (parameters[0], parameters[1]),
                };
                (Law::Gamma, [shape + a, rate + b], low, high)
            }
            ConjugateKind::InverseGamma => {
                (Law::InverseGamma, [parameters[0] + a, parameters[1] + b], low, high)
            }
            ConjugateKind::Beta => match prior {
                Law::Uniform => {
                    (Law::Beta, [1.0 + a, 1.0 + b], low.max(parameters[0]), high.min(parameters[1]))
                }
                _ => (Law::Beta, [parameters[0] + a, parameters[1] + b], low, high),
            },
        };
        Conditional { law, parameters, low, high }
    }
}

/// A prior of the normal family as mean, precision and ends.
fn normal_prior(prior: Law, parameters: [f64; 3], low: f64, high: f64) -> (f64, f64, f64, f64) {
    match prior {
        Law::HalfNormal => (0.0, 1.0 / (parameters[0] * parameters[0]), low.max(0.0), high),
        Law::Uniform => (0.0, 0.0, low.max(parameters[0]), high.min(parameters[1])),
        _ => (parameters[0], 1.0 / (parameters[1] * parameters[1]), low, high),
    }
}

impl Conditional {
    fn is_finite(&self) -> bool {
        self.parameters.iter().all(|parameter| parameter.is_finite()) && self.low <= self.high
    }

    fn draw(&self, chain: &mut Chain) -> f64 {
        let (low, high) = distribution::support(self.law, &self.parameters);
        if self.low <= low && self.high >= high {
            distribution::draw(self.law, &mut chain.stream, &self.parameters)
        } else {
            distribution::draw_between(self.law, &mut chain.stream, self.low, self.high, &self.parameters)
        }
    }

    /// The log density at a point, for checks.
    pub fn ln_density(&self, x: f64) -> f64 {
        if x < self.low || x > self.high {
            return f64::NEG_INFINITY;
        }
        distribution::ln_density(self.law, x, &self.parameters)
            - distribution::ln_interval(self.law, self.low, self.high, &self.parameters)
    }
}
