//! Dispersed starts: draws from the prior, tamed to a finite density.

use stook_lang::distribution::Law;

use super::problem::RunProblem;
use crate::bind::Bound;
use crate::distribution;
use crate::numeric::stream::Stream;
use crate::program::{Elements, OwnElements, Program, Scratch, State};
use crate::rule::Chain;
use crate::symbolic::Target;

/// Tries before a start is given up.
const TRIES: u32 = 200;

/// A chain at its start. Every unknown is drawn from the middle part of its prior; with each try that has no finite
/// density the part is narrower.
pub(super) fn start(bound: &Bound, program: &Program, seed: u64, chain: usize) -> Result<Chain, RunProblem> {
    let state = State { values: vec![0.0; program.layout.len()], nodes: vec![vec![]; program.nodes.len()] };
    let mut chain = Chain { state, stream: Stream::new(seed, chain as u64), scratch: Scratch::default() };
    for attempt in 0..TRIES {
        let middle = 0.8 * 0.97f64.powi(attempt as i32);
        program.refresh_all(&mut chain);
        for own in &program.quantities {
            draw(program, &mut chain, own, middle);
            program.refresh(own.quantity, &mut chain);
        }
        if program.ln_joint(&mut chain).is_finite() {
            return Ok(chain);
        }
    }
    Err(no_start(bound, program, &mut chain))
}

fn draw(program: &Program, chain: &mut Chain, own: &OwnElements, middle: f64) {
    for element in 0..own.len() {
        let (law, parameters, (low, high)) = own.law(program, chain, element);
        let parameters = &parameters[..law.arity()];
        let value = if distribution::check_params(law, parameters).is_err() {
            f64::NAN
        } else if law.is_discrete() {
            own.draw(program, chain, element)
        } else {
            let uniform = 0.5 + middle * (chain.stream.uniform() - 0.5);
            between(law, parameters, low, high, uniform)
        };
        chain.state.values[own.place(element)] = value;
    }
}

/// The quantile of a law truncated to an interval.
fn between(law: Law, parameters: &[f64], low: f64, high: f64, uniform: f64) -> f64 {
    let (below, above) = (distribution::cdf(law, low, parameters), distribution::cdf(law, high, parameters));
    let found = distribution::quantile(law, below + uniform * (above - below), parameters);
    found.clamp(low, high)
}

/// Which statement had no finite density at the last try, and where.
fn no_start(bound: &Bound, program: &Program, chain: &mut Chain) -> RunProblem {
    for factor in &program.factors {
        for chunk in factor.elements().chunks() {
            factor.pointwise(&chain.state, chunk, &mut chain.scratch);
            let mut found = None;
            let column = &chain.scratch.column;
            chunk.for_each(|at, element| {
                if !column[at].is_finite() && found.is_none() {
                    found = Some(element);
                }
            });
            if let Some(element) = found {
                let value = factor.value(&chain.state, element);
                return RunProblem::NoStart { what: title(bound, factor.target), element, value };
            }
        }
    }
    RunProblem::NoStart { what: "the model".into(), element: 0, value: f64::NAN }
}

fn title(bound: &Bound, target: Target) -> String {
    match target {
        Target::Unknown(unknown) => format!("the prior of `{}`", bound.model.unknowns[unknown].name),
        Target::Response(column) => format!("the response `{}`", bound.model.columns[column].name),
    }
}

impl Program {
    /// The log density of every element of a response that is observed, into `out`.
    pub(crate) fn pointwise(&self, factor: usize, rows: &[u32], chain: &mut Chain, out: &mut Vec<f64>) {
        for chunk in Elements::List(rows).chunks() {
            self.factors[factor].pointwise(&chain.state, chunk, &mut chain.scratch);
            out.extend_from_slice(&chain.scratch.column[..chunk.len()]);
        }
    }
}
