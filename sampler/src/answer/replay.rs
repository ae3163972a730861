//! Kept draws replayed: the state of a chain as it was at a draw.

use crate::draws::{Draws, ScalarKind};
use crate::numeric::stream::Stream;
use crate::program::{Program, Scratch, State};
use crate::rule::Chain;

/// Puts kept draws back into a chain.
pub(super) struct Replay<'a> {
    program: &'a Program,
    draws: &'a Draws,
    /// For each place of the state the scalar that holds its draws.
    scalars: Vec<usize>,
}

impl<'a> Replay<'a> {
    /// The draws of a program. Their scalars are the unknowns by their places, derived ones, missing cells by theirs.
    pub(super) fn new(program: &'a Program, draws: &'a Draws) -> Replay<'a> {
        let of =
            |kind: ScalarKind| (0..draws.scalars.len()).filter(move |at| draws.scalars[*at].kind == kind);
        let scalars = of(ScalarKind::Unknown).chain(of(ScalarKind::Missing)).collect();
        Replay { program, draws, scalars }
    }

    /// A chain whose state has not been set; its stream is for what is drawn anew from the kept draws.
    pub(super) fn chain(&self, stream: Stream) -> Chain {
        let state = State {
            values: vec![0.0; self.program.layout.len()],
            nodes: vec![vec![]; self.program.nodes.len()],
        };
        Chain { state, stream, scratch: Scratch::default() }
    }

    /// Sets the state to a kept draw (counted through all chains).
    pub(super) fn set(&self, chain: &mut Chain, draw: usize) {
        for (value, scalar) in chain.state.values.iter_mut().zip(&self.scalars) {
            *value = self.draws.values[*scalar][draw];
        }
        self.program.refresh_all(chain);
    }

    /// Sets the state to the posterior mean of every scalar, as declared.
    pub(super) fn set_to_means(&self, chain: &mut Chain, means: &[f64]) {
        for (value, scalar) in chain.state.values.iter_mut().zip(&self.scalars) {
            *value = means[*scalar];
        }
        self.program.refresh_all(chain);
    }
}

/// The draws that row by row work is done for: all of them, or evenly spaced ones where that would take too many
/// evaluations.
pub(super) fn spaced(draws: usize, rows: usize) -> Vec<usize> {
    const EVALUATIONS: usize = 40_000_000;
    const FEWEST: usize = 100;
    let affordable = (EVALUATIONS / rows.max(1)).max(FEWEST);
    let every = draws.div_ceil(affordable).max(1);
    (0..draws).step_by(every).collect()
}
