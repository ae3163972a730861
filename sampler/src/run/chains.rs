//! Chains: warm-up, then draws that are kept.

use super::options::{Options, Phase, Progress, Watch};
use super::problem::RunProblem;
use super::start::start;
use super::threads::share;
use crate::answer::{Seconds, clock};
use crate::bind::Bound;
use crate::draws::{Draws, Scalar, ScalarKind};
use crate::program::{Elements, Program};
use crate::rule::{Chain, Move, Trouble};
use crate::symbolic::Quantity;

/// A chain with its own moves.
struct Runner<'a> {
    bound: &'a Bound,
    program: &'a Program,
    chain: Chain,
    moves: Vec<Move>,
    number: usize,
    sweeps: usize,
}

/// Runs all chains: the draws, and the seconds of warm-up and draws.
pub(super) fn run(
    bound: &Bound,
    program: &Program,
    options: &Options,
    watch: &dyn Watch,
) -> Result<(Draws, [Seconds; 2]), RunProblem> {
    let recorder = Recorder::new(bound, program);
    let (runners, warmup) = clock::timed(|| {
        share((0..options.chains).collect(), options.threads, |_, number| {
            let mut runner = Runner::new(bound, program, options.seed, number)?;
            runner.warm_up(options, watch)?;
            Ok(runner)
        })
    });
    let runners = runners.into_iter().collect::<Result<Vec<Runner<'_>>, RunProblem>>()?;
    let (columns, draws) = clock::timed(|| {
        share(runners, options.threads, |_, mut runner| runner.keep(options, &recorder, watch))
    });
    let chains = columns.into_iter().collect::<Result<Vec<Vec<Vec<f64>>>, RunProblem>>()?;
    let mut values: Vec<Vec<f64>> = recorder.scalars.iter().map(|_| vec![]).collect();
    for chain in chains {
        for (all, one) in values.iter_mut().zip(chain) {
            all.extend(one);
        }
    }
    let draws_made =
        Draws { scalars: recorder.scalars, chains: options.chains, draws: options.draws, values };
    Ok((draws_made, [warmup, draws]))
}

impl<'a> Runner<'a> {
    fn new(
        bound: &'a Bound,
        program: &'a Program,
        seed: u64,
        number: usize,
    ) -> Result<Runner<'a>, RunProblem> {
        let chain = start(bound, program, seed, number)?;
        Ok(Runner { bound, program, chain, moves: program.moves.clone(), number, sweeps: 0 })
    }

    fn warm_up(&mut self, options: &Options, watch: &dyn Watch) -> Result<(), RunProblem> {
        let mut reporter = Reporter::new(watch, self.number, Phase::Warmup, options.warmup);
        for done in 1..=options.warmup {
            self.sweep(true)?;
            reporter.report(done);
        }
        Ok(())
    }

    fn keep(
        &mut self,
        options: &Options,
        recorder: &Recorder,
        watch: &dyn Watch,
    ) -> Result<Vec<Vec<f64>>, RunProblem> {
        let mut columns: Vec<Vec<f64>> =
            recorder.scalars.iter().map(|_| Vec::with_capacity(options.draws)).collect();
        let mut reporter = Reporter::new(watch, self.number, Phase::Draws, options.draws);
        for done in 1..=options.draws {
            self.sweep(false)?;
            self.predict()?;
            recorder.record(self.program, &mut self.chain, &mut columns);
            reporter.report(done);
        }
        Ok(columns)
    }

    fn sweep(&mut self, warming: bool) -> Result<(), RunProblem> {
        self.sweeps += 1;
        for step in &mut self.moves {
            if let Err(trouble) = step.update(self.program, &mut self.chain, warming) {
                return Err(self.stopped(trouble));
            }
        }
        Ok(())
    }

    /// Draws the missing cells that nothing depends on.
    fn predict(&mut self) -> Result<(), RunProblem> {
        for own in &self.program.predicted {
            for element in 0..own.len() {
                let value = own.draw(self.program, &mut self.chain, element);
                let place = own.place(element);
                if !value.is_finite() {
                    let trouble = Trouble { place, value, what: "a draw of a missing value" };
                    return Err(self.stopped(trouble));
                }
                self.chain.state.values[place] = value;
            }
            self.program.refresh(own.quantity, &mut self.chain);
        }
        Ok(())
    }

    fn stopped(&self, trouble: Trouble) -> RunProblem {
        let titles = titles(self.bound, self.program);
        let scalars = self.program.quantities.iter().filter(|own| own.len() == 1).map(|own| own.place(0));
        let state =
            scalars.take(8).map(|place| (titles[place].title(), self.chain.state.values[place])).collect();
        RunProblem::NotFinite {
            unknown: titles[trouble.place].title(),
            value: trouble.value,
            what: trouble.what,
            chain: self.number + 1,
            sweep: self.sweeps,
            state,
        }
    }
}

/// Tells the watch some times in a phase.
struct Reporter<'a> {
    watch: &'a dyn Watch,
    chain: usize,
    phase: Phase,
    of: usize,
    every: usize,
}

impl<'a> Reporter<'a> {
    fn new(watch: &'a dyn Watch, chain: usize, phase: Phase, of: usize) -> Reporter<'a> {
        Reporter { watch, chain, phase, of, every: (of / 100).max(1) }
    }

    fn report(&mut self, done: usize) {
        if done.is_multiple_of(self.every) || done == self.of {
            self.watch.progress(Progress { chain: self.chain, phase: self.phase, done, of: self.of });
        }
    }
}

/// What is kept of each draw.
struct Recorder {
    scalars: Vec<Scalar>,
    /// The places of the unknowns' scalars, in the order of the model.
    unknowns: Vec<usize>,
    /// The places of the missing cells.
    missing: Vec<usize>,
}

impl Recorder {
    fn new(bound: &Bound, program: &Program) -> Recorder {
        let titles = titles(bound, program);
        let of =
            |kind: ScalarKind| (0..titles.len()).filter(|at| titles[*at].kind == kind).collect::<Vec<_>>();
        let (unknowns, missing) = (of(ScalarKind::Unknown), of(ScalarKind::Missing));
        let mut scalars: Vec<Scalar> = unknowns.iter().map(|at| titles[*at].clone()).collect();
        for derived in &program.derived {
            for element in 0..derived.domain.len() {
                scalars.push(Scalar {
                    quantity: derived.name.clone(),
                    labels: derived.domain.titles(bound, element),
                    unit: None,
                    kind: ScalarKind::Derived,
                });
            }
        }
        scalars.extend(missing.iter().map(|at| titles[*at].clone()));
        Recorder { scalars, unknowns, missing }
    }

    fn record(&self, program: &Program, chain: &mut Chain, columns: &mut [Vec<f64>]) {
        let mut columns = columns.iter_mut();
        for (place, column) in self.unknowns.iter().zip(columns.by_ref()) {
            column.push(chain.state.values[*place]);
        }
        for derived in &program.derived {
            for chunk in Elements::Range(0, derived.domain.len()).chunks() {
                derived.kernel.run(&chain.state, chunk, &mut chain.scratch);
                let values = chain.scratch.output(&derived.kernel, 0, chunk.len());
                for (value, column) in values.iter().zip(columns.by_ref()) {
                    column.push(*value);
                }
            }
        }
        for (place, column) in self.missing.iter().zip(columns) {
            column.push(chain.state.values[*place]);
        }
    }
}

/// Every scalar of the state by its place.
pub(crate) fn titles(bound: &Bound, program: &Program) -> Vec<Scalar> {
    let mut titles: Vec<Option<Scalar>> = vec![None; program.layout.len()];
    for own in &program.quantities {
        let domain = &program.factors[own.factor].domain;
        for element in 0..own.len() {
            let labels = domain.titles(bound, own.row(element) as usize);
            let (quantity, unit, kind) = match own.quantity {
                Quantity::Unknown(unknown) => {
                    let unknown = &bound.model.unknowns[unknown];
                    (unknown.name.clone(), unknown.unit.clone(), ScalarKind::Unknown)
                }
                Quantity::Cells(column) => {
                    let column = &bound.model.columns[column];
                    let unit = match &column.kind {
                        stook_lang::model::ColumnKind::Values { unit, .. } => unit.clone(),
                        stook_lang::model::ColumnKind::Labels { .. } => None,
                    };
                    (column.name.clone(), unit, ScalarKind::Missing)
                }
            };
            titles[own.place(element)] = Some(Scalar { quantity, labels, unit, kind });
        }
    }
    titles.into_iter().flatten().collect()
}
