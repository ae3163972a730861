//! The plan: what will update each unknown, and why.

mod choose;
mod cost;
mod demand;
pub mod gaussian;
mod interweave;
mod message;
mod problem;

pub use choose::plan;
pub use cost::Cost;
pub use message::{Form, Message, Refusal, messages, note_rows};
pub use problem::{PlanProblem, pages};

use crate::symbolic::{Quantity, System};
use gaussian::Rows;

/// An ordered list of updates: one sweep carries out all of them.
#[derive(Debug)]
pub struct Plan {
    /// The model written out.
    pub system: System,
    /// The updates in order.
    pub steps: Vec<Step>,
}

/// One update.
#[derive(Clone, Debug)]
pub struct Step {
    /// What it moves.
    pub quantities: Vec<Quantity>,
    /// The names of what it moves.
    pub names: Vec<String>,
    /// How.
    pub update: Update,
    /// Why it was chosen.
    pub reason: String,
    /// The rules that came before it in the table and do not apply, each with the reason.
    pub rejected: Vec<String>,
    /// What it costs a sweep.
    pub cost: Cost,
}

/// An update rule with what it needs to know.
#[derive(Clone, Debug)]
pub enum Update {
    /// Closed-form full conditional, element by element.
    Conjugate(Conjugate),
    /// One draw of a whole Gaussian block.
    Joint(Joint),
    /// Full conditional over a finite support.
    Enumerate,
    /// Univariate slice; where every child has a closed form, on the sum of the children's messages.
    Slice(Option<Vec<Message>>),
    /// A draw from its own law: nothing depends on it.
    Forward,
    /// A scale, its effects standardised.
    Rescale(Rescale),
    /// A scalar against its effects, their sums held.
    Shift(Shift),
}

impl Update {
    /// The rule's name, as in `by NAME`.
    pub fn name(&self) -> &'static str {
        match self {
            Update::Conjugate(_) => "conjugate",
            Update::Joint(_) => "joint",
            Update::Enumerate => "enumerate",
            Update::Slice(_) => "slice",
            Update::Forward => "forward",
            Update::Rescale(_) | Update::Shift(_) => "interweave",
        }
    }
}

/// A Gaussian block.
#[derive(Clone, Debug)]
pub struct Joint {
    /// The unknowns that are drawn through a dense factor.
    pub core: Vec<Quantity>,
    /// The unknown whose elements are independent given the core, if there is one: it is eliminated.
    pub fringe: Option<Quantity>,
    /// The rows that touch the block.
    pub rows: Vec<Rows>,
}

/// A move of a scale that its effects follow.
#[derive(Clone, Debug)]
pub struct Rescale {
    /// The effects' sds are in proportion to the scale to this power.
    pub power: f64,
    /// The effects with their priors.
    pub effects: Vec<(Quantity, usize)>,
    /// The statements that depend on the effects, with their rows where those are summed once.
    pub children: Vec<(usize, Option<Rows>)>,
    /// Whether their log density is quadratic along a line of effects.
    pub quadratic: bool,
}

/// A move of a scalar against its effects.
#[derive(Clone, Debug)]
pub struct Shift {
    /// The scalar and its prior.
    pub scalar: (Quantity, usize),
    /// The effects and their prior.
    pub effect: (Quantity, usize),
}

/// A closed-form full conditional.
#[derive(Clone, Debug)]
pub struct Conjugate {
    /// The family of prior and posterior.
    pub kind: ConjugateKind,
    /// The children's messages.
    pub messages: Vec<Message>,
}

/// The families of closed-form full conditionals.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum ConjugateKind {
    /// Normal prior (or half-normal, or uniform), normal children linear in the quantity.
    Normal,
    /// Gamma (or exponential) prior, children that are gamma in the quantity.
    Gamma,
    /// Inverse-gamma prior, children that are gamma in its inverse.
    InverseGamma,
    /// Beta (or uniform) prior, Bernoulli and binomial children.
    Beta,
}
