//! Update rules: each moves its quantities so that the posterior stays what it is.

mod arrow;
mod conjugate;
mod enumerate;
mod forward;
mod gather;
mod interweave;
mod joint;
mod rows;
mod slice;
mod support;

pub use conjugate::ConjugateRule;
pub use enumerate::EnumerateRule;
pub use forward::ForwardRule;
pub use gather::{Gathered, Gatherer};
pub use interweave::{RescaleRule, ShiftRule};
pub use joint::JointRule;
pub(crate) use rows::{Context, Part};
pub use slice::{Closed, SliceRule, Width};
pub use support::Transform;

use crate::numeric::stream::Stream;
use crate::program::{Program, Scratch, State};

/// What moves: a state, its random stream, and registers.
#[derive(Debug)]
pub struct Chain {
    /// The state.
    pub state: State,
    /// The chain's own random stream.
    pub stream: Stream,
    /// Registers.
    pub scratch: Scratch,
}

/// An update that met a number that is none.
#[derive(Clone, Debug, PartialEq)]
pub struct Trouble {
    /// The place in the state that was being moved.
    pub place: usize,
    /// Its value before the move.
    pub value: f64,
    /// What was not finite.
    pub what: &'static str,
}

/// A compiled update with its buffers. Each chain has its own copy; the large maps are shared.
#[derive(Clone, Debug)]
pub enum Move {
    /// Closed form.
    Conjugate(ConjugateRule),
    /// Gaussian block.
    Joint(JointRule),
    /// Finite support.
    Enumerate(EnumerateRule),
    /// Slice.
    Slice(SliceRule),
    /// From its own law.
    Forward(ForwardRule),
    /// A scale with its effects.
    Rescale(RescaleRule),
    /// A scalar against its effects.
    Shift(ShiftRule),
}

impl Move {
    /// Carries out the update once. Slice widths adapt while `warming` only.
    pub fn update(&mut self, program: &Program, chain: &mut Chain, warming: bool) -> Result<(), Trouble> {
        match self {
            Move::Conjugate(rule) => rule.update(program, chain),
            Move::Joint(rule) => rule.update(program, chain),
            Move::Enumerate(rule) => rule.update(program, chain),
            Move::Slice(rule) => rule.update(program, chain, warming),
            Move::Forward(rule) => rule.update(program, chain),
            Move::Rescale(rule) => rule.update(program, chain, warming),
            Move::Shift(rule) => rule.update(program, chain, warming),
        }
    }
}
