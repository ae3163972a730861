//! Full conditionals over a finite support: every value's weight, then one draw.

use super::{Chain, Trouble};
use crate::distribution;
use crate::program::{OwnElements, Program, Touched};

/// The enumeration of one quantity, element by element.
#[derive(Clone, Debug)]
pub struct EnumerateRule {
    own: OwnElements,
    children: Vec<(usize, Touched)>,
    reduced: bool,
    weights: Vec<f64>,
}

impl EnumerateRule {
    /// The rule of a quantity whose law has a finite support.
    pub fn new(own: OwnElements, children: Vec<(usize, Touched)>, reduced: bool) -> EnumerateRule {
        EnumerateRule { own, children, reduced, weights: vec![] }
    }

    /// The quantity's own law.
    pub fn own(&self) -> &OwnElements {
        &self.own
    }

    /// Draws every element from its full conditional.
    pub fn update(&mut self, program: &Program, chain: &mut Chain) -> Result<(), Trouble> {
        for element in 0..self.own.len() {
            let place = self.own.place(element);
            let before = chain.state.values[place];
            let trouble = Trouble { place, value: before, what: "the log density" };
            let Some((low, high)) = self.ends(program, chain, element) else {
                return Err(trouble);
            };
            self.weights.clear();
            for value in low..=high {
                let weight = self.ln_density(program, chain, element, value as f64);
                self.weights.push(weight);
            }
            let value = match choose(&mut self.weights, chain.stream.uniform()) {
                Some(chosen) => (low + chosen as i64) as f64,
                None => {
                    self.set(program, chain, place, before);
                    return Err(trouble);
                }
            };
            self.set(program, chain, place, value);
        }
        Ok(())
    }

    /// The first and last value that an element may have.
    fn ends(&self, program: &Program, chain: &mut Chain, element: usize) -> Option<(i64, i64)> {
        let (law, parameters, (low, high)) = self.own.law(program, chain, element);
        let (first, last) = distribution::support(law, &parameters[..law.arity()]);
        let (first, last) = (first.max(low).ceil(), last.min(high).floor());
        (first.is_finite() && last.is_finite() && first <= last).then_some((first as i64, last as i64))
    }

    fn set(&self, program: &Program, chain: &mut Chain, place: usize, value: f64) {
        chain.state.values[place] = value;
        if self.reduced {
            program.refresh(self.own.quantity, chain);
        }
    }

    /// The log of the full conditional of an element, up to a constant. Leaves the state at the trial value.
    pub fn ln_density(&self, program: &Program, chain: &mut Chain, element: usize, value: f64) -> f64 {
        self.set(program, chain, self.own.place(element), value);
        let mut total = self.own.ln_density(program, chain, element);
        for (factor, touched) in &self.children {
            if total == f64::NEG_INFINITY {
                break;
            }
            let factor = &program.factors[*factor];
            total += factor.log_density(&chain.state, touched.of(factor, element), &mut chain.scratch);
        }
        if total.is_nan() { f64::NEG_INFINITY } else { total }
    }
}

/// The position chosen by a uniform number in proportion to the exponentials; `None` where none is positive.
fn choose(log_weights: &mut [f64], uniform: f64) -> Option<usize> {
    let largest = log_weights.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    if !largest.is_finite() {
        return None;
    }
    let mut total = 0.0;
    for weight in log_weights.iter_mut() {
        total += libm::exp(*weight - largest);
        *weight = total;
    }
    let wanted = uniform * total;
    let found = log_weights.iter().position(|cumulated| *cumulated >= wanted);
    found.or(Some(log_weights.len() - 1))
}
