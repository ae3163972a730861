//! The program: statements compiled to columns, with every index map and buffer in place.

mod assemble;
mod compile;
mod factor;
mod kernel;
mod layout;
mod own;
mod route;
pub(crate) mod scalar;
mod touch;

pub use compile::{Compiler, NodeProgram};
pub use factor::{Factor, Values};
pub use kernel::{CHUNK, Elements, Kernel, OBSERVED, Op, Scratch};
pub use layout::{Layout, State};
pub use own::OwnElements;
pub use route::{Domain, DomainVariable, Route};
pub use touch::{Touched, touched};

use stook_lang::arena::Id;
use stook_lang::model::Unknown;

use crate::bind::Bound;
use crate::plan::Plan;
use crate::rule::{Chain, Move};
use crate::symbolic::{Link, Quantity};

/// A plan with its statements compiled and its moves ready.
#[derive(Debug)]
pub struct Program {
    /// Where the state holds what.
    pub layout: Layout,
    /// The statements, in the order of the system.
    pub factors: Vec<Factor>,
    /// The reductions that depend on the state, in the order in which they are worked out.
    pub nodes: Vec<NodeProgram>,
    /// The moves of a sweep; each chain takes a copy.
    pub moves: Vec<Move>,
    /// Every quantity with its elements, in an order in which each comes after those that its law depends on.
    pub quantities: Vec<OwnElements>,
    /// The missing cells that nothing depends on: drawn when a draw is kept.
    pub predicted: Vec<OwnElements>,
    /// The derived quantities.
    pub derived: Vec<Derived>,
    /// The additive pieces of the responses' locations, for those whose law has one.
    pub responses: Vec<ResponsePieces>,
}

/// The pieces of one response's location, compiled over its rows.
#[derive(Clone, Debug)]
pub struct ResponsePieces {
    /// The response's factor.
    pub factor: usize,
    /// The scale on which the pieces add up.
    pub link: Link,
    /// The location.
    pub location: Kernel,
    /// The pieces in the order of the text.
    pub pieces: Vec<CompiledPiece>,
}

/// One piece, compiled.
#[derive(Clone, Debug)]
pub struct CompiledPiece {
    /// Its name.
    pub name: String,
    /// The unknown that it is an element of, where it is just that.
    pub unknown: Option<Id<Unknown>>,
    /// Its value.
    pub kernel: Kernel,
    /// Whether it is the same for all rows.
    pub uniform: bool,
    /// For an element of an unknown: its place in the state at each row.
    pub places: Option<Route>,
}

/// A derived quantity, compiled.
#[derive(Clone, Debug)]
pub struct Derived {
    /// Its position among the model's names.
    pub name: String,
    /// Its elements.
    pub domain: Domain,
    /// Its value.
    pub kernel: Kernel,
}

impl Program {
    /// Compiles a plan over its data.
    pub fn new(bound: &Bound, plan: &Plan) -> Program {
        assemble::program(bound, plan)
    }

    /// Works out again the reductions that depend on a quantity that has moved.
    pub fn refresh(&self, quantity: Quantity, chain: &mut Chain) {
        for (at, node) in self.nodes.iter().enumerate() {
            if node.depends.contains(&quantity) {
                self.work_out(at, chain);
            }
        }
    }

    /// Works out every reduction.
    pub fn refresh_all(&self, chain: &mut Chain) {
        for at in 0..self.nodes.len() {
            self.work_out(at, chain);
        }
    }

    fn work_out(&self, node: usize, chain: &mut Chain) {
        let mut values = std::mem::take(&mut chain.state.nodes[node]);
        self.nodes[node].work_out(&chain.state, &mut chain.scratch, &mut values);
        chain.state.nodes[node] = values;
    }

    /// The log of the joint density at the chain's state: every prior and every response.
    pub fn ln_joint(&self, chain: &mut Chain) -> f64 {
        self.factors
            .iter()
            .map(|factor| factor.log_density(&chain.state, factor.elements(), &mut chain.scratch))
            .sum()
    }
}
