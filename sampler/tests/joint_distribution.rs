//! The joint-distribution test (Geweke 2004): unknowns and data simulated in turn have the distribution of unknowns
//! simulated from the prior (test 2 of the engine's design).
//!
//! For each scalar the means of x and of x squared are compared. The error of the turn-by-turn mean comes from the
//! effective size of its draws. A difference above 5 standard errors fails: with about 400 comparisons of nearly normal
//! statistics the false-alarm rate of the whole test is below 400 x 6e-7, which is 3e-4, for a new seed; the seeds are
//! fixed.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod common;

use common::cases::CASES;
use common::{drawn, from_priors, redraw, replace};
use stook_sampler::bind::Bound;
use stook_sampler::numeric::stream::Stream;
use stook_sampler::plan::Plan;
use stook_sampler::program::Program;
use stook_sampler::rule::Chain;
use stook_sampler::summary;
use stook_sampler::symbolic::{Quantity, Target};

/// Turns of the slow profile; the quick one takes a tenth.
const TURNS: usize = 40_000;

fn turns() -> usize {
    if std::env::var_os("STOOK_SLOW").is_some() { TURNS } else { TURNS / 10 }
}

/// Draws the responses anew from their law at the chain's unknowns.
fn redraw_data(bound: &mut Bound, program: &Program, chain: &mut Chain) {
    for factor in &program.factors {
        let Target::Response(column) = factor.target else { continue };
        let own = stook_sampler::program::OwnElements::new(
            Quantity::Cells(column),
            program.factors.iter().position(|other| other.target == factor.target).unwrap(),
            0..factor.domain.len(),
            None,
        );
        let values = (0..own.len()).map(|row| own.draw(program, chain, row)).collect();
        replace(bound, column, values);
    }
}

fn turn_by_turn(mut bound: Bound, plan: &Plan, seed: u64) -> Vec<Vec<f64>> {
    let mut program = Program::new(&bound, plan);
    let mut chain = from_priors(&program, Stream::new(seed, 0));
    let mut moves = program.moves.clone();
    let mut draws: Vec<Vec<f64>> = vec![vec![]; chain.state.values.len()];
    for _ in 0..turns() {
        redraw_data(&mut bound, &program, &mut chain);
        let fresh = Program::new(&bound, plan);
        // The slice widths stay: they are fixed numbers, as after warm-up.
        moves = fresh.moves.clone();
        for step in &mut moves {
            step.update(&fresh, &mut chain, false).unwrap();
        }
        for (column, value) in draws.iter_mut().zip(&chain.state.values) {
            column.push(*value);
        }
        program = fresh;
    }
    drop(moves);
    draws
}

fn from_prior(bound: &Bound, plan: &Plan, seed: u64) -> Vec<Vec<f64>> {
    let program = Program::new(bound, plan);
    let mut chain = from_priors(&program, Stream::new(seed, 1));
    let mut draws: Vec<Vec<f64>> = vec![vec![]; chain.state.values.len()];
    for _ in 0..turns() {
        redraw(&program, &mut chain);
        for (column, value) in draws.iter_mut().zip(&chain.state.values) {
            column.push(*value);
        }
    }
    draws
}

/// The mean of a function of the draws and its standard error.
fn mean(draws: &[f64], f: impl Fn(f64) -> f64) -> (f64, f64) {
    let column: Vec<f64> = draws.iter().map(|x| f(*x)).collect();
    let found = summary::diagnose(&[&column]).unwrap();
    (found.mean, found.mean_mcse.unwrap_or(0.0))
}

#[test]
fn unknowns_and_data_in_turn_have_the_prior() {
    for case in CASES {
        let (bound, plan) = drawn(case.text, case.rows, 3);
        let direct = from_prior(&bound, &plan, 11);
        let turned = turn_by_turn(bound, &plan, 12);
        for (scalar, (direct, turned)) in direct.iter().zip(&turned).enumerate() {
            for (power, f) in [(1, (|x| x) as fn(f64) -> f64), (2, |x| x * x)] {
                let ((a, error_a), (b, error_b)) = (mean(direct, f), mean(turned, f));
                let error = (error_a * error_a + error_b * error_b).sqrt();
                assert!(
                    (a - b).abs() <= 5.0 * error,
                    "{}: scalar {scalar}, power {power}: {a} from the prior, {b} in turn, standard error {error}",
                    case.name
                );
            }
        }
    }
}
