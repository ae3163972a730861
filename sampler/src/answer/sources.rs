//! The variance by source of a response, draw by draw (Gelman 2005), and its groups' means and new readings.

use stook_lang::distribution::Law;
use stook_lang::model::ColumnKind;

use super::effect::{Effect, EffectState, residual_variance, sd};
use super::groups::{GroupWork, Setting};
use super::replay::{Replay, spaced};
use super::{GroupRow, GroupTable, Interval, Scale, Source, Sources};
use crate::bind::Bound;
use crate::numeric::stream::Stream;
use crate::plan::Plan;
use crate::program::{CompiledPiece, Elements, Factor, Program, ResponsePieces};
use crate::rule::Chain;
use crate::run::RunProblem;
use crate::symbolic::{Link, Target};

/// What is asked of every response.
pub(super) struct Question<'a> {
    pub(super) bound: &'a Bound,
    pub(super) plan: &'a Plan,
    pub(super) program: &'a Program,
    pub(super) replay: &'a Replay<'a>,
    pub(super) draws: usize,
    pub(super) seed: u64,
    /// A stream that no chain has.
    pub(super) stream: u64,
}

impl Question<'_> {
    /// The sources and the groups of every response whose law has a location.
    pub(super) fn answer(&self) -> Result<(Vec<Sources>, Vec<GroupTable>), RunProblem> {
        let mut sources = vec![];
        let mut groups = vec![];
        for pieces in &self.program.responses {
            let Target::Response(column) = self.program.factors[pieces.factor].target else { continue };
            let declared = &self.bound.model.columns[column];
            let unit = match &declared.kind {
                ColumnKind::Values { unit, .. } => unit.clone(),
                ColumnKind::Labels { .. } => None,
            };
            let work = ResponseWork::new(self, pieces);
            let (found, tables) = work.run(self)?;
            let scale = match pieces.link {
                Link::Identity => Scale::Response,
                Link::Log => Scale::Log,
                Link::LogOdds => Scale::LogOdds,
                Link::Probit => Scale::Probit,
            };
            sources.push(Sources {
                response: declared.name.clone(),
                unit: unit.clone(),
                scale,
                sources: found,
            });
            groups.extend(tables.into_iter().map(|(group, rows)| GroupTable {
                response: declared.name.clone(),
                unit: unit.clone(),
                group,
                rows,
            }));
        }
        Ok((sources, groups))
    }
}

/// One response at work.
struct ResponseWork<'a> {
    factor: &'a Factor,
    pieces: &'a ResponsePieces,
    effects: Vec<Effect>,
    /// The pieces that are no effects: a covariate's part, or the same for all rows.
    others: Vec<&'a CompiledPiece>,
    rows: Vec<u32>,
    groups: Vec<GroupWork>,
}

/// The rows of a group's table, under the group's name.
type NamedRows = (String, Vec<GroupRow>);

impl<'a> ResponseWork<'a> {
    fn new(question: &Question<'a>, pieces: &'a ResponsePieces) -> ResponseWork<'a> {
        let (bound, program) = (question.bound, question.program);
        let factor = &program.factors[pieces.factor];
        let mut effects: Vec<Effect> = vec![];
        let mut others = vec![];
        for piece in &pieces.pieces {
            match Effect::of(piece, bound, program, &question.plan.system) {
                Some(effect) => effects.push(effect),
                None => others.push(piece),
            }
        }
        let rows = super::criteria::observed_rows(factor);
        let groups = GroupWork::all(bound, &effects, &rows);
        ResponseWork { factor, pieces, effects, others, rows, groups }
    }

    fn run(mut self, question: &Question<'_>) -> Result<(Vec<Source>, Vec<NamedRows>), RunProblem> {
        let used = spaced(question.draws, self.rows.len());
        let mut chain = question.replay.chain(Stream::new(question.seed, question.stream));
        let spread_others: Vec<usize> =
            (0..self.others.len()).filter(|at| !self.others[*at].uniform).collect();
        let count = self.effects.len() + spread_others.len() + 1;
        let mut sds = vec![Vec::with_capacity(used.len()); count];
        let mut finite = vec![0.0; count];
        for draw in &used {
            question.replay.set(&mut chain, *draw);
            let mut common = 0.0;
            let states: Vec<EffectState> =
                self.effects.iter().map(|effect| effect.at(question.program, &mut chain)).collect();
            let mut at = 0;
            for state in &states {
                common += state.centre;
                sds[at].push(state.sd);
                finite[at] += state.finite_sd;
                at += 1;
            }
            for other in &self.others {
                let (mean, spread) = self.over_rows(other, &mut chain);
                common += mean;
                if !other.uniform {
                    sds[at].push(spread);
                    finite[at] += spread;
                    at += 1;
                }
            }
            let (residual, realised) = self.residual(&mut chain);
            sds[at].push(residual);
            finite[at] += realised;
            let setting = Setting { common, states: &states, factor: self.factor, link: self.pieces.link };
            for group in &mut self.groups {
                group.add(&setting, &mut chain);
            }
        }
        let named = self.effects.iter().map(|effect| {
            let names: Vec<&str> =
                effect.dimensions.iter().map(|index| question.bound.model.index_name(*index)).collect();
            (effect.name.clone(), Some(names.join(" x ")))
        });
        let others = spread_others.iter().map(|at| (self.others[*at].name.clone(), None));
        let residual = std::iter::once(("residual".to_string(), None));
        let names: Vec<(String, Option<String>)> = named.chain(others).chain(residual).collect();
        let sources = table(names, &sds, &finite)?;
        let groups = self
            .groups
            .into_iter()
            .map(|group| group.finish(question.bound))
            .collect::<Result<Vec<_>, RunProblem>>()?;
        Ok((sources, groups))
    }

    /// The mean and the sd of a piece over the rows.
    fn over_rows(&self, other: &CompiledPiece, chain: &mut Chain) -> (f64, f64) {
        if other.uniform {
            other.kernel.run(&chain.state, Elements::Range(0, 1), &mut chain.scratch);
            return (chain.scratch.register(&other.kernel, 0)[0], 0.0);
        }
        let mut values = Vec::with_capacity(self.rows.len());
        for chunk in Elements::List(&self.rows).chunks() {
            other.kernel.run(&chain.state, chunk, &mut chain.scratch);
            values.extend_from_slice(chain.scratch.output(&other.kernel, 0, chunk.len()));
        }
        (values.iter().sum::<f64>() / values.len().max(1) as f64, sd(&values))
    }

    /// The residual sd of the law, averaged over the rows' variances, and that of the rows at hand.
    fn residual(&self, chain: &mut Chain) -> (f64, f64) {
        let law = self.factor.law;
        let mut variance = 0.0;
        let mut residuals = Vec::with_capacity(self.rows.len());
        let realised = matches!(
            (law, self.pieces.link),
            (Law::Normal | Law::StudentT | Law::Laplace | Law::Cauchy, Link::Identity) | (Law::Lognormal, _)
        );
        for chunk in Elements::List(&self.rows).chunks() {
            self.factor.run(&chain.state, chunk, &mut chain.scratch);
            chunk.for_each(|at, _| {
                let parameters = self.factor.parameters(&chain.scratch, at);
                variance += residual_variance(law, self.pieces.link, &parameters[..law.arity()]);
            });
            if realised {
                self.pieces.location.run(&chain.state, chunk, &mut chain.scratch);
                chunk.for_each(|at, row| {
                    let value = self.factor.value(&chain.state, row);
                    let value = if law == Law::Lognormal { libm::log(value) } else { value };
                    residuals.push(value - chain.scratch.register(&self.pieces.location, 0)[at]);
                });
            }
        }
        let residual = (variance / self.rows.len().max(1) as f64).sqrt();
        (residual, if realised { sd(&residuals) } else { residual })
    }
}

/// The sources from the sds of every draw.
fn table(
    names: Vec<(String, Option<String>)>,
    sds: &[Vec<f64>],
    finite: &[f64],
) -> Result<Vec<Source>, RunProblem> {
    let draws = sds[0].len();
    let mut shares = vec![Vec::with_capacity(draws); sds.len()];
    let mut largest = vec![0usize; sds.len()];
    for draw in 0..draws {
        let total: f64 = sds.iter().map(|sd| sd[draw] * sd[draw]).sum();
        let mut best = 0;
        for source in 0..sds.len() {
            let variance = sds[source][draw] * sds[source][draw];
            shares[source].push(if total > 0.0 { variance / total } else { 0.0 });
            if sds[source][draw] > sds[best][draw] {
                best = source;
            }
        }
        largest[best] += 1;
    }
    names
        .into_iter()
        .enumerate()
        .map(|(at, (name, over))| {
            Ok(Source {
                name,
                over,
                sd: Interval::of(&sds[at])?,
                share: Interval::of(&shares[at])?,
                finite_sd: finite[at] / draws as f64,
                p_largest: largest[at] as f64 / draws as f64,
            })
        })
        .collect()
}
