//! The mean and a new reading of each label of a group.

use stook_lang::arena::Id;
use stook_lang::distribution::Law;
use stook_lang::model::{Group, Index};

use super::effect::{Effect, EffectState};
use super::{GroupRow, Interval};
use crate::bind::Bound;
use crate::distribution;
use crate::numeric::special;
use crate::program::{Elements, Factor};
use crate::rule::Chain;
use crate::run::RunProblem;
use crate::symbolic::Link;

/// Groups with more labels than this have no table: their effects are in the summary.
const MOST_LABELS: usize = 1000;

/// One group's table in the making.
#[derive(Debug)]
pub(super) struct GroupWork {
    group: Id<Group>,
    /// For each effect that counts for a label of the group, the element of each label.
    parts: Vec<(usize, Vec<u32>)>,
    /// A row of each label, for what else its law needs.
    examples: Vec<u32>,
    readings: Vec<usize>,
    means: Vec<Vec<f64>>,
    new: Vec<Vec<f64>>,
}

/// What is known at a draw.
pub(super) struct Setting<'a> {
    /// The location without the effects.
    pub(super) common: f64,
    /// The effects.
    pub(super) states: &'a [EffectState],
    /// The response.
    pub(super) factor: &'a Factor,
    /// The scale of the location.
    pub(super) link: Link,
}

impl GroupWork {
    /// The tables of every group that an effect has one element for each label of.
    pub(super) fn all(bound: &Bound, effects: &[Effect], rows: &[u32]) -> Vec<GroupWork> {
        let mut found: Vec<GroupWork> = vec![];
        for effect in effects {
            let Some(group) = single_group(effect) else { continue };
            let labels = bound.group(group).titles.len();
            if found.iter().all(|work| work.group != group) && labels <= MOST_LABELS && !rows.is_empty() {
                found.push(GroupWork::new(bound, group, effects, effect, rows));
            }
        }
        found
    }

    fn new(bound: &Bound, group: Id<Group>, effects: &[Effect], own: &Effect, rows: &[u32]) -> GroupWork {
        let labels = bound.group(group).titles.len();
        let parts = effects.iter().enumerate().filter_map(|(at, effect)| {
            let wanted = single_group(effect)?;
            Some((at, ancestors(bound, group, wanted)?))
        });
        let mut examples = vec![rows[0]; labels];
        let mut readings = vec![0; labels];
        for row in rows.iter().rev() {
            let label = own.places.at(*row as usize) as usize - own.first;
            examples[label] = *row;
            readings[label] += 1;
        }
        GroupWork {
            group,
            parts: parts.collect(),
            examples,
            readings,
            means: vec![vec![]; labels],
            new: vec![vec![]; labels],
        }
    }

    /// Adds a draw.
    pub(super) fn add(&mut self, setting: &Setting<'_>, chain: &mut Chain) {
        for label in 0..self.means.len() {
            let mut location = setting.common;
            for (effect, elements) in &self.parts {
                location += setting.states[*effect].deviations[elements[label] as usize];
            }
            let mut anew = location;
            for (at, state) in setting.states.iter().enumerate() {
                if self.parts.iter().all(|(effect, _)| *effect != at) {
                    anew += state.sd * chain.stream.normal();
                }
            }
            self.means[label].push(natural(setting, location));
            let reading = reading(setting, anew, self.examples[label], chain);
            self.new[label].push(reading);
        }
    }

    /// The finished table.
    pub(super) fn finish(self, bound: &Bound) -> Result<(String, Vec<GroupRow>), RunProblem> {
        let titles = &bound.group(self.group).titles;
        let rows = titles.iter().zip(self.means.iter().zip(&self.new)).zip(self.readings);
        let rows = rows.map(|((title, (mean, new)), readings)| {
            Ok(GroupRow {
                label: title.clone(),
                readings,
                mean: Interval::of(mean)?,
                reading: Interval::of(new)?,
            })
        });
        Ok((bound.model.groups[self.group].name.clone(), rows.collect::<Result<_, RunProblem>>()?))
    }
}

/// The group that an effect has one element for each label of, if it is one group.
fn single_group(effect: &Effect) -> Option<Id<Group>> {
    match effect.dimensions[..] {
        [Index::Group(group)] => Some(group),
        _ => None,
    }
}

/// For each label of a group the label of `wanted` that it is or lies in; `None` where `wanted` is another grouping.
fn ancestors(bound: &Bound, group: Id<Group>, wanted: Id<Group>) -> Option<Vec<u32>> {
    let mut at = group;
    let mut labels: Vec<u32> = (0..bound.group(group).titles.len() as u32).collect();
    while at != wanted {
        let parent = bound.model.groups[at].parent?;
        let parents = &bound.group(at).parents;
        labels.iter_mut().for_each(|label| *label = parents[*label as usize]);
        at = parent;
    }
    Some(labels)
}

/// The mean of a reading at a location, on the response's own scale.
fn natural(setting: &Setting<'_>, location: f64) -> f64 {
    match setting.link {
        Link::Identity => location,
        Link::Log => libm::exp(location),
        Link::LogOdds => special::logistic(location),
        Link::Probit => special::normal_cdf(location),
    }
}

/// A new reading at a location; for a response that is a share of trials its probability. Counts are for an exposure of 1.
fn reading(setting: &Setting<'_>, location: f64, row: u32, chain: &mut Chain) -> f64 {
    let factor = setting.factor;
    factor.run(&chain.state, Elements::List(&[row]), &mut chain.scratch);
    let mut parameters = factor.parameters(&chain.scratch, 0);
    let (low, high) = factor.ends(&chain.scratch, 0);
    let at = match factor.law {
        Law::StudentT => 1,
        Law::Binomial
        | Law::BinomialLogOdds
        | Law::BinomialProbit
        | Law::Bernoulli
        | Law::BernoulliLogOdds
        | Law::BernoulliProbit => return natural(setting, location),
        _ => 0,
    };
    parameters[at] = match factor.law {
        Law::Poisson | Law::NegativeBinomial => natural(setting, location),
        _ => location,
    };
    let parameters = &parameters[..factor.law.arity()];
    if factor.is_truncated() {
        distribution::draw_between(factor.law, &mut chain.stream, low, high, parameters)
    } else {
        distribution::draw(factor.law, &mut chain.stream, parameters)
    }
}
