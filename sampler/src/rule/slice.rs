//! Univariate slice sampling by stepping out and shrinkage (Neal 2003, figures 3 and 5) on the unconstrained scale.

use super::gather::Gatherer;
use super::support::Transform;
use super::{Chain, Trouble};
use crate::program::{OwnElements, Program, Touched};

/// Steps out at most so often in all, so that a flat density cannot hold a sweep up.
const MOST_STEPS: u32 = 64;
/// Shrinks at most so often; a slice that shrinks further lies within rounding of the present point.
const MOST_SHRINKS: u32 = 200;

/// The slice update of one quantity, element by element.
#[derive(Clone, Debug)]
pub struct SliceRule {
    /// The quantity's own law.
    pub own: OwnElements,
    /// The children and what each element touches of them.
    pub children: Vec<(usize, Touched)>,
    /// The unconstrained scale.
    pub transform: Transform,
    /// Whether reductions depend on the quantity.
    pub reduced: bool,
    /// The children's messages in place of their rows, where all have a closed form.
    pub closed: Option<Closed>,
    /// The width of each element's first interval, adapted in warm-up.
    pub widths: Vec<Width>,
}

/// Children in closed form: for each exponent the sums of their messages.
#[derive(Clone, Debug)]
pub struct Closed {
    /// Gathers them.
    pub gatherer: Gatherer,
    /// The exponents that occur.
    pub exponents: Vec<f64>,
    /// For each exponent the sums of every element.
    pub sums: Vec<Vec<(f64, f64)>>,
}

/// An adapted width: a multiple of the mean distance moved so far.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Width {
    width: f64,
    moves: f64,
    distance: f64,
}

impl Default for Width {
    fn default() -> Width {
        Width { width: 1.0, moves: 0.0, distance: 0.0 }
    }
}

impl Width {
    /// The width of the first interval.
    pub fn width(&self) -> f64 {
        self.width
    }

    /// Takes note of a distance moved. For a normal density the mean distance between points of a slice update is about 0.9 sd, and a width of about
    /// three sds needs the fewest evaluations.
    pub(super) fn adapt(&mut self, distance: f64) {
        self.moves += 1.0;
        self.distance += distance;
        // The first moves lead from the start to where the posterior lies, and say little of its width.
        if self.moves == 50.0 || self.moves == 150.0 {
            (self.moves, self.distance) = (self.moves + 0.5, distance * (self.moves + 0.5));
        }
        if self.distance > 0.0 {
            self.width = 3.0 * self.distance / self.moves;
        }
    }
}

/// One slice update along a line.
#[derive(Clone, Copy, Debug)]
pub(super) struct Line {
    /// The present point.
    pub(super) start: f64,
    /// The width of the first interval.
    pub(super) width: f64,
}

impl Line {
    /// A point of the slice; `None` where the density at the present point is not finite.
    pub(super) fn draw(
        self,
        chain: &mut Chain,
        density: &mut impl FnMut(f64, &mut Chain) -> f64,
    ) -> Option<f64> {
        let here = density(self.start, chain);
        here.is_finite().then(|| self.draw_from(chain, here, density))
    }

    /// A point of the slice below the density `here` of the present point.
    pub(super) fn draw_from(
        self,
        chain: &mut Chain,
        here: f64,
        density: &mut impl FnMut(f64, &mut Chain) -> f64,
    ) -> f64 {
        let level = here - chain.stream.exponential();
        let mut low = self.start - self.width * chain.stream.uniform();
        let mut high = low + self.width;
        // Neal's limit on steps, shared at random between the two sides (his figure 3), keeps the update exact.
        let mut left = ((f64::from(MOST_STEPS) * chain.stream.uniform()) as u32).min(MOST_STEPS - 1);
        let mut right = MOST_STEPS - 1 - left;
        while left > 0 && density(low, chain) > level {
            low -= self.width;
            left -= 1;
        }
        while right > 0 && density(high, chain) > level {
            high += self.width;
            right -= 1;
        }
        for _ in 0..MOST_SHRINKS {
            let trial = low + (high - low) * chain.stream.uniform();
            if density(trial, chain) > level {
                return trial;
            }
            if trial < self.start {
                low = trial;
            } else {
                high = trial;
            }
        }
        self.start
    }
}

impl SliceRule {
    /// Moves every element once.
    pub fn update(&mut self, program: &Program, chain: &mut Chain, warming: bool) -> Result<(), Trouble> {
        if let Some(closed) = &mut self.closed {
            closed.gather(program, chain);
        }
        for element in 0..self.own.len() {
            self.element(program, chain, element, warming)?;
        }
        Ok(())
    }

    fn element(
        &mut self,
        program: &Program,
        chain: &mut Chain,
        element: usize,
        warming: bool,
    ) -> Result<(), Trouble> {
        let place = self.own.place(element);
        let before = chain.state.values[place];
        let within = if self.transform == Transform::Whole { chain.stream.uniform() } else { 0.0 };
        let start = self.transform.real(before, within);
        let here = self.ln_density(program, chain, element, start);
        if !here.is_finite() {
            self.set(program, chain, place, before);
            return Err(Trouble { place, value: before, what: "the log density" });
        }
        let width = match self.transform {
            Transform::Whole => self.widths[element].width.max(1.0),
            _ => self.widths[element].width,
        };
        let mut density = |z: f64, chain: &mut Chain| self.ln_density(program, chain, element, z);
        let found = Line { start, width }.draw_from(chain, here, &mut density);
        let after = if found == start { before } else { self.transform.scalar(found) };
        self.set(program, chain, place, after);
        if warming {
            self.widths[element].adapt((found - start).abs());
        }
        Ok(())
    }

    fn set(&self, program: &Program, chain: &mut Chain, place: usize, value: f64) {
        chain.state.values[place] = value;
        if self.reduced {
            program.refresh(self.own.quantity, chain);
        }
    }

    /// The log of the full conditional of an element on the unconstrained scale, up to a constant. Leaves the state at
    /// the trial value.
    pub fn ln_density(&self, program: &Program, chain: &mut Chain, element: usize, z: f64) -> f64 {
        let x = self.transform.scalar(z);
        let place = self.own.place(element);
        self.set(program, chain, place, x);
        let mut total = self.transform.ln_jacobian(z) + self.own.ln_density(program, chain, element);
        if total == f64::NEG_INFINITY {
            return total;
        }
        match &self.closed {
            Some(closed) => total += closed.ln_likelihood(element, x),
            None => {
                for (factor, touched) in &self.children {
                    let factor = &program.factors[*factor];
                    total +=
                        factor.log_density(&chain.state, touched.of(factor, element), &mut chain.scratch);
                    if total == f64::NEG_INFINITY {
                        return total;
                    }
                }
            }
        }
        if total.is_nan() { f64::NEG_INFINITY } else { total }
    }
}

impl Closed {
    /// Sums the children's messages at the chain's state.
    pub fn gather(&mut self, program: &Program, chain: &mut Chain) {
        for (exponent, sums) in self.exponents.iter().zip(&mut self.sums) {
            self.gatherer.gather_exponent(program, chain, *exponent);
            sums.clear();
            sums.extend(self.gatherer.sums.iter().map(|sum| (sum.a, sum.b)));
        }
    }

    /// The children's log likelihood of an element at `x`, up to a constant.
    fn ln_likelihood(&self, element: usize, x: f64) -> f64 {
        let mut total = 0.0;
        let log = libm::log(x);
        for (exponent, sums) in self.exponents.iter().zip(&self.sums) {
            let (a, b) = sums[element];
            total += a * exponent * log - b * crate::program::scalar::power(x, *exponent);
        }
        total
    }
}
