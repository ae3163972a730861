//! Every rule against the joint density: at random states, the log density of an update's full conditional differs between
//! two points by what the log joint density differs by (test 1 of the engine's design).
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod common;

use common::cases::CASES;
use common::{drawn, from_priors};
use stook_sampler::numeric::stream::Stream;
use stook_sampler::program::Program;
use stook_sampler::rule::{Chain, Move};

/// Agreement of two differences of log densities: rounding grows with the numbers that were subtracted.
fn agree(name: &str, found: f64, wanted: f64, size: f64) {
    let tolerance = 1e-9 * (1.0 + size.abs());
    assert!((found - wanted).abs() < tolerance, "{name}: {found} against {wanted}");
}

#[test]
fn every_case_is_updated_by_the_rule_that_it_is_meant_for() {
    for case in CASES {
        let (_, plan) = drawn(case.text, case.rows, 1);
        let step = plan.steps.iter().find(|step| step.names.iter().any(|name| name == "x")).unwrap();
        assert_eq!(step.update.name(), case.rule, "{}", case.name);
    }
}

#[test]
fn full_conditionals_are_in_proportion_to_the_joint_density() {
    for case in CASES {
        let (bound, plan) = drawn(case.text, case.rows, 2);
        let program = Program::new(&bound, &plan);
        for seed in 0..5 {
            let mut chain = from_priors(&program, Stream::new(100 + seed, 0));
            for step in &program.moves {
                let mut step = step.clone();
                check(case.name, &program, &mut step, &mut chain);
            }
        }
    }
}

fn check(name: &str, program: &Program, step: &mut Move, chain: &mut Chain) {
    match step {
        Move::Conjugate(rule) => {
            rule.gatherer.gather(program, chain);
            for element in 0..rule.own.len() {
                let place = rule.own.place(element);
                let conditional = rule.conditional(program, chain, element);
                let (a, joint_a) = (chain.state.values[place], program.ln_joint(chain));
                // Another point of the support: a draw of the update itself.
                let before = chain.state.values.clone();
                rule.update(program, chain).unwrap();
                let b = chain.state.values[place];
                chain.state.values = before;
                chain.state.values[place] = b;
                program.refresh_all(chain);
                let joint_b = program.ln_joint(chain);
                let found = conditional.ln_density(b) - conditional.ln_density(a);
                agree(name, found, joint_b - joint_a, joint_a);
                rule.gatherer.gather(program, chain);
            }
        }
        Move::Joint(rule) => {
            let a = rule.ln_density(program, chain).unwrap();
            let joint_a = program.ln_joint(chain);
            for place in rule.places() {
                chain.state.values[*place] += chain.stream.normal();
            }
            program.refresh_all(chain);
            let b = rule.ln_density(program, chain).unwrap();
            let joint_b = program.ln_joint(chain);
            agree(name, b - a, joint_b - joint_a, joint_a);
        }
        Move::Slice(rule) => {
            if let Some(closed) = &mut rule.closed {
                closed.gather(program, chain);
            }
            for element in 0..rule.own.len() {
                let place = rule.own.place(element);
                let before = chain.state.values[place];
                let z = rule.transform.real(before, 0.5);
                let a = rule.ln_density(program, chain, element, z) - rule.transform.ln_jacobian(z);
                let joint_a = program.ln_joint(chain);
                let z = z + 0.3;
                let b = rule.ln_density(program, chain, element, z) - rule.transform.ln_jacobian(z);
                let joint_b = program.ln_joint(chain);
                if a.is_finite() && b.is_finite() {
                    agree(name, b - a, joint_b - joint_a, joint_a);
                } else {
                    assert!(joint_b == f64::NEG_INFINITY, "{name}: a density outside the support");
                }
                rule.ln_density(program, chain, element, rule.transform.real(before, 0.5));
            }
        }
        Move::Enumerate(rule) => {
            for element in 0..rule.own().len() {
                let a = rule.ln_density(program, chain, element, 0.0);
                let joint_a = program.ln_joint(chain);
                let b = rule.ln_density(program, chain, element, 1.0);
                agree(name, b - a, program.ln_joint(chain) - joint_a, joint_a);
            }
        }
        Move::Rescale(rule) => {
            let place = rule.scale.place(0);
            let before = chain.state.values[place];
            rule.remember(program, chain);
            let effects: usize = rule.effects.iter().map(|effect| effect.len()).sum();
            let z = rule.transform.real(before, 0.0);
            let curve = rule.quadratic.then(|| rule.curve(program, chain));
            let by_curve = |z: f64, chain: &mut Chain| rule.ln_density(program, chain, before, z, curve);
            let found = by_curve(z + 0.4, chain) - by_curve(z, chain);
            let mut joint = |z: f64| {
                // Sets the state as well; the effects' Jacobian is the scale's power, once for each.
                rule.ln_density(program, chain, before, z, None);
                program.ln_joint(chain) + rule.transform.ln_jacobian(z)
            };
            let (b, a) = (joint(z + 0.4), joint(z));
            agree(name, found, b - a + 0.4 * rule.power * effects as f64, 1e3 * (1.0 + a.abs()));
        }
        Move::Shift(rule) => {
            let a = program.ln_joint(chain);
            let found_a = rule.ln_priors(program, chain);
            rule.update(program, chain, false).unwrap();
            agree(name, rule.ln_priors(program, chain) - found_a, program.ln_joint(chain) - a, a);
        }
        Move::Forward(_) => {}
    }
}
