//! A factor: one statement compiled, the sum of its elements' log densities.

use std::sync::Arc;

use stook_lang::distribution::Law;

use super::compile::Compiler;
use super::kernel::{Elements, Kernel, OBSERVED, Scratch};
use super::layout::{Layout, State};
use super::route::Domain;
use crate::bind::Bound;
use crate::distribution;
use crate::symbolic::{Statement, System, Target};

/// Where the values of a statement's target are.
#[derive(Clone, Debug)]
pub enum Values {
    /// In the state, behind an offset.
    State(usize),
    /// In the data; a missing cell's value is in the state where the map has a place.
    Data(Arc<[f64]>, Arc<[u32]>),
    /// In the data, all observed.
    Observed(Arc<[f64]>),
}

/// A statement over all its elements.
#[derive(Clone, Debug)]
pub struct Factor {
    /// What it is about.
    pub target: Target,
    /// Its law.
    pub law: Law,
    /// Its elements.
    pub domain: Domain,
    /// The parameters, then the truncation's ends where there are.
    pub kernel: Kernel,
    /// The target's values.
    pub values: Values,
    /// Whether there is a lower and an upper end of truncation.
    truncated: (bool, bool),
    /// The elements that count, where not all do: the observed rows of a response whose missing cells nothing depends on.
    /// Those cells are integrated out of every update and drawn when a draw is kept.
    active: Option<Arc<[u32]>>,
}

impl Factor {
    /// Compiles a statement.
    pub fn new(
        compiler: &mut Compiler<'_>,
        bound: &Bound,
        layout: &Layout,
        system: &System,
        statement: &Statement,
    ) -> Factor {
        let domain = Domain::of_scope(bound, &statement.scope);
        let roots: Vec<_> = statement.roots().collect();
        let kernel = compiler.kernel(&domain, &roots);
        let first = layout.range(statement.quantity()).start;
        let mut active = None;
        let values = match statement.target {
            Target::Unknown(_) => Values::State(first),
            Target::Response(column) => {
                let (values, missing) = bound.values(column);
                if missing.is_empty() {
                    Values::Observed(values)
                } else {
                    if system.children(statement.quantity()).is_empty() {
                        let observed = |row: &u32| missing.binary_search(row).is_err();
                        active = Some((0..values.len() as u32).filter(observed).collect());
                    }
                    let place =
                        |row: u32| missing.binary_search(&row).map_or(OBSERVED, |at| (first + at) as u32);
                    let places = (0..values.len() as u32).map(place).collect();
                    Values::Data(values, places)
                }
            }
        };
        Factor {
            target: statement.target,
            law: statement.law,
            domain,
            kernel,
            values,
            truncated: (statement.low.is_some(), statement.high.is_some()),
            active,
        }
    }

    /// The elements that count.
    pub fn elements(&self) -> Elements<'_> {
        match &self.active {
            Some(list) => Elements::List(list),
            None => Elements::Range(0, self.domain.len()),
        }
    }

    /// Whether an element counts.
    pub fn is_active(&self, element: u32) -> bool {
        self.active.as_ref().is_none_or(|list| list.binary_search(&element).is_ok())
    }

    /// Whether the law is truncated.
    pub fn is_truncated(&self) -> bool {
        self.truncated.0 || self.truncated.1
    }

    /// The target's value at an element.
    #[inline]
    pub fn value(&self, state: &State, element: usize) -> f64 {
        match &self.values {
            Values::State(first) => state.values[first + element],
            Values::Observed(values) => values[element],
            Values::Data(values, places) => {
                let place = places[element];
                if place == OBSERVED { values[element] } else { state.values[place as usize] }
            }
        }
    }

    /// Evaluates the parameters for a chunk.
    pub fn run(&self, state: &State, chunk: Elements<'_>, scratch: &mut Scratch) {
        self.kernel.run(state, chunk, scratch);
    }

    /// The canonical parameters at one position of the chunk that was run last.
    pub fn parameters(&self, scratch: &Scratch, at: usize) -> [f64; 3] {
        let mut parameters = [0.0; 3];
        for (index, parameter) in parameters.iter_mut().enumerate().take(self.law.arity()) {
            *parameter = scratch.register(&self.kernel, index)[at];
        }
        parameters
    }

    /// The truncation's ends at one position of the chunk that was run last (infinite where there are none).
    pub fn ends(&self, scratch: &Scratch, at: usize) -> (f64, f64) {
        let arity = self.law.arity();
        let low =
            if self.truncated.0 { scratch.register(&self.kernel, arity)[at] } else { f64::NEG_INFINITY };
        let behind = arity + usize::from(self.truncated.0);
        let high = if self.truncated.1 { scratch.register(&self.kernel, behind)[at] } else { f64::INFINITY };
        (low, high)
    }

    /// The sum of the log densities of some elements.
    pub fn log_density(&self, state: &State, elements: Elements<'_>, scratch: &mut Scratch) -> f64 {
        let mut total = 0.0;
        for chunk in elements.chunks() {
            self.pointwise(state, chunk, scratch);
            total += scratch.column[..chunk.len()].iter().sum::<f64>();
        }
        total
    }

    /// The log density of each element of a chunk, into the scratch column.
    pub fn pointwise(&self, state: &State, chunk: Elements<'_>, scratch: &mut Scratch) {
        let len = chunk.len();
        self.run(state, chunk, scratch);
        let mut x = std::mem::take(&mut scratch.values);
        let mut column = std::mem::take(&mut scratch.column);
        x.resize(len, 0.0);
        column.resize(len, 0.0);
        chunk.for_each(|at, element| x[at] = self.value(state, element));
        {
            let mut parameters: [&[f64]; 3] = [&[]; 3];
            for (index, parameter) in parameters.iter_mut().enumerate().take(self.law.arity()) {
                *parameter = scratch.output(&self.kernel, index, len);
            }
            distribution::ln_density_columns(self.law, &x, parameters, &mut column);
        }
        if self.is_truncated() {
            for at in 0..len {
                let (low, high) = self.ends(scratch, at);
                let parameters = self.parameters(scratch, at);
                column[at] = if x[at] < low || x[at] > high {
                    f64::NEG_INFINITY
                } else {
                    column[at]
                        - distribution::ln_interval(self.law, low, high, &parameters[..self.law.arity()])
                };
            }
        }
        scratch.values = x;
        scratch.column = column;
    }
}
