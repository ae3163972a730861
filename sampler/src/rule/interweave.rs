//! Interweaving of centred and non-centred forms (Yu and Meng 2011): two moves along which the data say much and the
//! priors little, or the other way round, so that single updates creep.
//!
//! `RescaleRule` holds the standardised effects and moves their scale: effects follow it. `ShiftRule` holds the sums of a
//! global coefficient and its effects, and moves the coefficient: the likelihood does not change.

use super::rows::Part;
use super::slice::{Line, Width};
use super::support::Transform;
use super::{Chain, Trouble};
use crate::program::{Elements, OwnElements, Program};

/// Moves a scale with its effects standardised.
#[derive(Clone, Debug)]
pub struct RescaleRule {
    /// The scale.
    pub scale: OwnElements,
    /// Its unconstrained scale.
    pub transform: Transform,
    /// The effects' sds are in proportion to the scale to this power.
    pub power: f64,
    /// The effects.
    pub effects: Vec<OwnElements>,
    /// The factors that depend on the effects, with their rows where those are summed once.
    pub children: Vec<(usize, Option<Part>)>,
    /// Whether their log density is quadratic along a line of effects.
    pub quadratic: bool,
    /// The width of the first interval.
    pub width: Width,
    /// The effects' centres and deviations at the start of the move.
    pub centres: Vec<f64>,
    /// See `centres`.
    pub deviations: Vec<f64>,
}

impl RescaleRule {
    /// Moves the scale once.
    pub fn update(&mut self, program: &Program, chain: &mut Chain, warming: bool) -> Result<(), Trouble> {
        let place = self.scale.place(0);
        let before = chain.state.values[place];
        self.remember(program, chain);
        let curve = if self.quadratic { Some(self.curve(program, chain)) } else { None };
        let start = self.transform.real(before, 0.0);
        let mut width = self.width;
        let found = {
            let mut density = |z: f64, chain: &mut Chain| self.ln_density(program, chain, before, z, curve);
            Line { start, width: width.width() }.draw(chain, &mut density)
        };
        let Some(found) = found else {
            self.set(program, chain, before, before);
            return Err(Trouble { place, value: before, what: "the log density" });
        };
        let after = if found == start { before } else { self.transform.scalar(found) };
        self.set(program, chain, before, after);
        if warming {
            width.adapt((found - start).abs());
            self.width = width;
        }
        Ok(())
    }

    /// Notes the effects' centres and their deviations from them.
    pub fn remember(&mut self, program: &Program, chain: &mut Chain) {
        self.centres.clear();
        self.deviations.clear();
        for effect in &self.effects {
            let factor = &program.factors[effect.factor];
            for chunk in Elements::Range(0, effect.len()).chunks() {
                factor.run(&chain.state, chunk, &mut chain.scratch);
                chunk.for_each(|at, element| {
                    let centre = factor.parameters(&chain.scratch, at)[0];
                    self.centres.push(centre);
                    self.deviations.push(chain.state.values[effect.place(element)] - centre);
                });
            }
        }
    }

    /// Sets the scale, and the effects in proportion.
    fn set(&self, program: &Program, chain: &mut Chain, before: f64, after: f64) {
        chain.state.values[self.scale.place(0)] = after;
        let ratio =
            if after == before { 1.0 } else { crate::program::scalar::power(after / before, self.power) };
        self.stretch(program, chain, ratio);
        program.refresh(self.scale.quantity, chain);
    }

    /// Sets the effects to their centres plus a multiple of the deviations.
    fn stretch(&self, program: &Program, chain: &mut Chain, ratio: f64) {
        let mut at = 0;
        for effect in &self.effects {
            for element in 0..effect.len() {
                chain.state.values[effect.place(element)] = self.centres[at] + ratio * self.deviations[at];
                at += 1;
            }
            program.refresh(effect.quantity, chain);
        }
    }

    /// The children's log density along the line of effects as a quadratic in the ratio: from three points of it, all from
    /// sums made once or all from the rows, because the two leave out different constants.
    pub fn curve(&self, program: &Program, chain: &mut Chain) -> [f64; 2] {
        let summed = [-1.0, 0.0, 1.0].map(|ratio| {
            self.stretch(program, chain, ratio);
            self.summed_density(program, chain)
        });
        let [minus, zero, plus] = match summed {
            [Some(minus), Some(zero), Some(plus)] => [minus, zero, plus],
            _ => [-1.0, 0.0, 1.0].map(|ratio| {
                self.stretch(program, chain, ratio);
                self.children_density(program, chain)
            }),
        };
        [0.5 * (plus - minus), 0.5 * (plus + minus) - zero]
    }

    fn children_density(&self, program: &Program, chain: &mut Chain) -> f64 {
        self.children.iter().map(|(child, _)| row_density(program, chain, *child)).sum()
    }

    /// The children's log density up to a constant, from sums made once where there are; `None` where such sums have lost
    /// too many digits.
    fn summed_density(&self, program: &Program, chain: &mut Chain) -> Option<f64> {
        let mut total = 0.0;
        for (child, part) in &self.children {
            total += match part {
                Some(part) if part.has_squares() => part.ln_density(chain)?,
                _ => row_density(program, chain, *child),
            };
        }
        Some(total)
    }

    /// The log density of the scale with the standardised effects held, on the unconstrained scale, up to a constant.
    pub fn ln_density(
        &self,
        program: &Program,
        chain: &mut Chain,
        before: f64,
        z: f64,
        curve: Option<[f64; 2]>,
    ) -> f64 {
        let after = self.transform.scalar(z);
        let children = match curve {
            Some([linear, square]) => {
                chain.state.values[self.scale.place(0)] = after;
                let ratio = crate::program::scalar::power(after / before, self.power);
                (linear + square * ratio) * ratio
            }
            None => {
                self.set(program, chain, before, after);
                self.children_density(program, chain)
            }
        };
        let total = self.transform.ln_jacobian(z) + self.scale.ln_density(program, chain, 0) + children;
        if total.is_nan() { f64::NEG_INFINITY } else { total }
    }
}

fn row_density(program: &Program, chain: &mut Chain, factor: usize) -> f64 {
    let factor = &program.factors[factor];
    factor.log_density(&chain.state, factor.elements(), &mut chain.scratch)
}

/// Moves a scalar against its effects, their sums held.
#[derive(Clone, Debug)]
pub struct ShiftRule {
    /// The scalar.
    pub scalar: OwnElements,
    /// The effects.
    pub effect: OwnElements,
    /// The width of the first interval.
    pub width: Width,
}

impl ShiftRule {
    /// Moves once.
    pub fn update(&mut self, program: &Program, chain: &mut Chain, warming: bool) -> Result<(), Trouble> {
        let place = self.scalar.place(0);
        let before = chain.state.values[place];
        let effects: Vec<f64> =
            (0..self.effect.len()).map(|at| chain.state.values[self.effect.place(at)]).collect();
        let found = {
            let mut density = |by: f64, chain: &mut Chain| {
                self.set(program, chain, before, &effects, by);
                self.ln_priors(program, chain)
            };
            Line { start: 0.0, width: self.width.width() }.draw(chain, &mut density)
        };
        let Some(found) = found else {
            self.set(program, chain, before, &effects, 0.0);
            return Err(Trouble { place, value: before, what: "the log density" });
        };
        self.set(program, chain, before, &effects, found);
        if warming {
            self.width.adapt(found.abs());
        }
        Ok(())
    }

    fn set(&self, program: &Program, chain: &mut Chain, scalar: f64, effects: &[f64], by: f64) {
        chain.state.values[self.scalar.place(0)] = scalar + by;
        for (at, effect) in effects.iter().enumerate() {
            chain.state.values[self.effect.place(at)] = effect - by;
        }
        program.refresh(self.scalar.quantity, chain);
        program.refresh(self.effect.quantity, chain);
    }

    /// The log density of the scalar and the effects under their priors.
    pub fn ln_priors(&self, program: &Program, chain: &mut Chain) -> f64 {
        let effects = &program.factors[self.effect.factor];
        self.scalar.ln_density(program, chain, 0)
            + effects.log_density(&chain.state, effects.elements(), &mut chain.scratch)
    }
}
