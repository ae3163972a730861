//! The choice of updates: for each unknown the first rule of the table that applies.

use std::collections::BTreeSet;

use stook_lang::arena::Id;
use stook_lang::distribution::Law;
use stook_lang::model::{Model, Rule, Unknown};

use super::gaussian;
use super::interweave;
use super::message::{Form, Message, Refusal, messages, note_rows};
use super::{Conjugate, ConjugateKind, Cost, Joint, Plan, PlanProblem, Step, Update};
use crate::bind::Bound;
use crate::symbolic::{Quantity, Statement, System, Target};

/// The largest Gaussian block, in scalars, that is drawn from one dense factorisation: its cost grows with the cube.
const DENSE_LIMIT: usize = 256;
/// The largest core of a block that is drawn in turns.
const TURN_LIMIT: usize = 64;
/// A smaller unknown is not worth eliminating.
const SMALLEST_FRINGE: usize = 4;

/// Plans the updates of a model. Without data the sizes are not known: the structure is planned as for small groups, and
/// costs are formulas only.
pub fn plan(model: &Model, bound: Option<&Bound>) -> Result<Plan, Vec<PlanProblem>> {
    let givens = match bound {
        Some(bound) => bound.givens.clone(),
        None => crate::bind::defaults(model),
    };
    let system = System::new(model, &givens);
    let mut chooser = Chooser { model, bound, system, problems: vec![] };
    let steps = chooser.steps();
    if chooser.problems.is_empty() {
        Ok(Plan { system: chooser.system, steps })
    } else {
        Err(chooser.problems)
    }
}

pub(super) struct Chooser<'a> {
    pub(super) model: &'a Model,
    bound: Option<&'a Bound>,
    pub(super) system: System,
    problems: Vec<PlanProblem>,
}

impl Chooser<'_> {
    fn steps(&mut self) -> Vec<Step> {
        let (blocks, in_block) = self.blocks();
        let turns = blocks.len();
        let mut steps: Vec<Step> = blocks.into_iter().map(|joint| self.joint(joint, turns)).collect();
        let quantities: Vec<Quantity> = self.system.statements.iter().map(Statement::quantity).collect();
        for quantity in quantities {
            // A candidate with another demand than `by joint` has not entered the block.
            if !in_block.contains(&quantity)
                && let Some(mut step) = self.single(quantity)
            {
                if let Update::Conjugate(Conjugate { messages, .. }) | Update::Slice(Some(messages)) =
                    &mut step.update
                {
                    note_rows(&mut self.system, messages, &in_block);
                    step.cost = Cost::single(self.model, self.bound, &self.system, quantity, &step.update);
                }
                steps.push(step);
            }
        }
        steps.extend(self.interweaving(&in_block));
        steps
    }

    /// The moves that join what the others take one by one: scales with their effects, scalars with theirs.
    fn interweaving(&mut self, in_block: &BTreeSet<Quantity>) -> Vec<Step> {
        let quantities: Vec<Quantity> = self.system.statements.iter().map(Statement::quantity).collect();
        let scalars: Vec<Quantity> =
            quantities.into_iter().filter(|quantity| self.is_scalar(*quantity)).collect();
        let mut steps = vec![];
        for quantity in scalars {
            if let Some(found) = interweave::rescale(&mut self.system, quantity, in_block) {
                let effects: Vec<String> =
                    found.effects.iter().map(|(effect, _)| self.name(*effect)).collect();
                let reason =
                    format!("the spread of {}: moved with the standardised effects held", effects.join(", "));
                steps.push(self.step(vec![quantity], Update::Rescale(found), reason));
            }
            for shift in interweave::shifts(&mut self.system, quantity) {
                let effect = shift.effect.0;
                // One draw of a joint block moves both already.
                if !(in_block.contains(&quantity) && in_block.contains(&effect)) {
                    let reason = format!("stands beside {}: moved against it", self.name(effect));
                    steps.push(self.step(vec![quantity, effect], Update::Shift(shift), reason));
                }
            }
        }
        steps
    }

    fn is_scalar(&self, quantity: Quantity) -> bool {
        match quantity {
            Quantity::Unknown(unknown) => self.model.unknowns[unknown].dimensions.is_empty(),
            Quantity::Cells(_) => false,
        }
    }

    fn step(&self, quantities: Vec<Quantity>, update: Update, reason: String) -> Step {
        let cost = Cost::single(self.model, self.bound, &self.system, quantities[0], &update);
        let names = quantities.iter().map(|quantity| self.name(*quantity)).collect();
        Step { quantities, names, update, reason, rejected: vec![], cost }
    }

    /// The demand of a quantity's declaration.
    fn demand(&self, quantity: Quantity) -> Option<stook_lang::model::Demand> {
        match quantity {
            Quantity::Unknown(unknown) => self.model.unknowns[unknown].demand,
            Quantity::Cells(_) => None,
        }
    }

    /// The unknowns that are jointly Gaussian given the rest. A single unknown whose elements are independent is left to
    /// the conjugate rule, unless a block is demanded.
    fn gaussian(&mut self) -> BTreeSet<Quantity> {
        let candidates: Vec<Quantity> = gaussian::candidates(&self.system)
            .into_iter()
            .filter(|q| self.demand(*q).is_none_or(|demand| demand.rule == Rule::Joint))
            .collect();
        let members = gaussian::grow(&mut self.system, &candidates);
        let demanded = members.iter().any(|q| self.demand(*q).is_some());
        if members.len() == 1 && !demanded {
            let rows = gaussian::all_rows(&mut self.system, &members);
            if members.iter().all(|q| gaussian::separable(&rows, *q)) {
                return BTreeSet::new();
            }
        }
        members
    }

    /// The blocks that the Gaussian unknowns are drawn in: one, or where that is too large for a dense factor, in turns
    /// the few small unknowns with each large one.
    fn blocks(&mut self) -> (Vec<Joint>, BTreeSet<Quantity>) {
        let members = self.gaussian();
        if members.is_empty() {
            return (vec![], members);
        }
        let rows = gaussian::all_rows(&mut self.system, &members);
        let size = |q: &Quantity| self.bound.map_or(1, |bound| quantity_size(self.model, bound, *q));
        let mut by_size: Vec<Quantity> = members.iter().copied().collect();
        by_size.sort_by_key(|q| (size(q), *q));
        let mut fringes: Vec<Quantity> = vec![];
        let largest =
            by_size.last().filter(|q| size(q) >= SMALLEST_FRINGE && gaussian::separable(&rows, **q));
        fringes.extend(largest);
        let core_size = |fringes: &[Quantity]| -> usize {
            by_size.iter().filter(|q| !fringes.contains(q)).map(size).sum()
        };
        if core_size(&fringes) > DENSE_LIMIT {
            for candidate in by_size.iter().rev() {
                if core_size(&fringes) <= TURN_LIMIT {
                    break;
                }
                if !fringes.contains(candidate) && gaussian::separable(&rows, *candidate) {
                    fringes.push(*candidate);
                }
            }
        }
        let core: Vec<Quantity> = members.iter().filter(|q| !fringes.contains(q)).copied().collect();
        let joint = |fringe: Option<Quantity>| Joint { core: core.clone(), fringe, rows: rows.clone() };
        let blocks = match fringes.is_empty() {
            true => vec![joint(None)],
            false => fringes.iter().map(|fringe| joint(Some(*fringe))).collect(),
        };
        (blocks, members)
    }

    fn joint(&mut self, joint: Joint, turns: usize) -> Step {
        let quantities: Vec<Quantity> = joint.core.iter().chain(&joint.fringe).copied().collect();
        let names: Vec<String> = quantities.iter().map(|q| self.name(*q)).collect();
        let mut reason = match names.len() {
            1 => "normal given the rest, its elements dependent: one draw of all of them".to_string(),
            n => format!("{n} unknowns that are jointly normal given the rest: one draw of all of them"),
        };
        if turns > 1 {
            reason.push_str(", in turns with the other large ones");
        }
        let cost = Cost::joint(self.model, self.bound, &self.system, &joint);
        Step { quantities, names, update: Update::Joint(joint), reason, rejected: vec![], cost }
    }

    fn single(&mut self, quantity: Quantity) -> Option<Step> {
        let own = self.system.law_of(quantity)?;
        let statement = self.system.statements[own].clone();
        let children = self.system.children(quantity);
        if matches!(statement.target, Target::Response(_)) && children.is_empty() {
            return None;
        }
        let demand = self.demand(quantity);
        let mut rejected = vec![];
        let (update, reason) = match demand {
            None => self.first_that_applies(quantity, &statement, children.is_empty(), &mut rejected),
            Some(demand) => match self.demanded(quantity, &statement, demand.rule) {
                Ok(chosen) => chosen,
                Err(refusal) => {
                    let problem = super::demand::refused(self, quantity, demand, refusal);
                    self.problems.push(problem);
                    return None;
                }
            },
        };
        Some(Step { rejected, ..self.step(vec![quantity], update, reason) })
    }

    fn first_that_applies(
        &mut self,
        quantity: Quantity,
        statement: &Statement,
        childless: bool,
        rejected: &mut Vec<String>,
    ) -> (Update, String) {
        if childless {
            return (Update::Forward, "nothing depends on it: drawn from its own law".into());
        }
        if is_finite(&self.system, statement) {
            return (Update::Enumerate, "a finite support: the full conditional over every value".into());
        }
        rejected.push("enumerate: its support is not finite".into());
        match self.conjugate(quantity, statement) {
            Ok(conjugate) => {
                let reason = self.pairs(statement, &conjugate.messages);
                return (Update::Conjugate(conjugate), reason);
            }
            Err(refusal) => rejected.push(format!("conjugate: {}", self.explain(&refusal))),
        }
        rejected.push("joint: it is not normal given the rest, or a mean is not linear in it".into());
        self.slice(quantity, statement)
    }

    fn slice(&mut self, quantity: Quantity, statement: &Statement) -> (Update, String) {
        let positive = !statement.law.is_discrete();
        let closed = messages(&mut self.system, quantity)
            .ok()
            .filter(|list| positive && list.iter().all(|message| matches!(message.form, Form::Power { .. })));
        let reason = match &closed {
            Some(_) => {
                "no closed form with this prior; its children's likelihood is summed once a sweep".into()
            }
            None => "a density without a closed form".into(),
        };
        (Update::Slice(closed), reason)
    }

    fn demanded(
        &mut self,
        quantity: Quantity,
        statement: &Statement,
        rule: Rule,
    ) -> Result<(Update, String), Refusal> {
        let reason = "demanded".to_string();
        match rule {
            Rule::Slice => Ok((self.slice(quantity, statement).0, reason)),
            Rule::Conjugate => Ok((Update::Conjugate(self.conjugate(quantity, statement)?), reason)),
            Rule::Enumerate if is_finite(&self.system, statement) => Ok((Update::Enumerate, reason)),
            Rule::Enumerate => Err(Refusal {
                statement: self.system.law_of(quantity).unwrap_or(0),
                reason: "its support is not finite".into(),
            }),
            Rule::Joint => Err(Refusal {
                statement: self.system.law_of(quantity).unwrap_or(0),
                reason: "it is not normal given the rest, or a mean is not linear in it".into(),
            }),
        }
    }

    /// The closed form of a quantity, or the first thing that stands in its way.
    fn conjugate(&mut self, quantity: Quantity, statement: &Statement) -> Result<Conjugate, Refusal> {
        let own = self.system.law_of(quantity).unwrap_or(0);
        let refuse = |reason: &str| Err(Refusal { statement: own, reason: reason.into() });
        let kinds = conjugate_kinds(statement.law);
        if kinds.is_empty() {
            return refuse("its prior has no conjugate likelihood");
        }
        let messages = messages(&mut self.system, quantity)?;
        let fits_all = |kind: &&ConjugateKind| messages.iter().all(|message| fits(**kind, &message.form));
        if let Some(kind) = kinds.iter().find(fits_all) {
            return Ok(Conjugate { kind: *kind, messages });
        }
        let misfit = messages.iter().find(|message| !kinds.iter().any(|kind| fits(*kind, &message.form)));
        Err(Refusal {
            statement: misfit.map_or(own, |message| message.statement),
            reason: format!("its prior, {}, does not meet that likelihood in closed form", statement.name),
        })
    }

    /// `gamma with normal and poisson`: the conjugate pairs that stand there.
    fn pairs(&self, statement: &Statement, messages: &[Message]) -> String {
        let children: BTreeSet<&str> =
            messages.iter().map(|message| self.system.statements[message.statement].name).collect();
        let children: Vec<&str> = children.into_iter().collect();
        format!("{} prior with {} below it: a closed form", statement.name, children.join(" and "))
    }

    fn explain(&self, refusal: &Refusal) -> String {
        let statement = &self.system.statements[refusal.statement];
        let about = match statement.target {
            Target::Unknown(unknown) => &self.model.unknowns[unknown].name,
            Target::Response(column) => &self.model.columns[column].name,
        };
        format!("{} ({} of {about})", refusal.reason, statement.name)
    }

    pub(super) fn name(&self, quantity: Quantity) -> String {
        quantity_name(self.model, quantity)
    }
}

/// The name of a quantity in the text.
pub(super) fn quantity_name(model: &Model, quantity: Quantity) -> String {
    match quantity {
        Quantity::Unknown(unknown) => model.unknowns[unknown].name.clone(),
        Quantity::Cells(column) => format!("missing {}", model.columns[column].name),
    }
}

/// How many scalars a quantity has.
pub(super) fn quantity_size(model: &Model, bound: &Bound, quantity: Quantity) -> usize {
    match quantity {
        Quantity::Unknown(unknown) => dimension_sizes(model, bound, unknown).product(),
        Quantity::Cells(column) => bound.values(column).1.len(),
    }
}

fn dimension_sizes(model: &Model, bound: &Bound, unknown: Id<Unknown>) -> impl Iterator<Item = usize> {
    model.unknowns[unknown].dimensions.iter().map(|index| bound.size(*index))
}

/// Whether a law has finitely many values, whatever its parameters.
pub(super) fn is_finite(system: &System, statement: &Statement) -> bool {
    match statement.law {
        Law::Bernoulli | Law::BernoulliLogOdds | Law::BernoulliProbit => true,
        Law::Binomial | Law::BinomialLogOdds | Law::BinomialProbit => {
            system.graph.depends(statement.parameters[0]).is_empty()
        }
        Law::Poisson | Law::PoissonLog | Law::NegativeBinomial | Law::NegativeBinomialLog => {
            statement.high.is_some_and(|high| system.graph.depends(high).is_empty())
        }
        _ => false,
    }
}

/// The families of full conditionals that a prior can be part of.
fn conjugate_kinds(law: Law) -> &'static [ConjugateKind] {
    match law {
        Law::Normal | Law::HalfNormal => &[ConjugateKind::Normal],
        Law::Gamma | Law::Exponential => &[ConjugateKind::Gamma],
        Law::InverseGamma => &[ConjugateKind::InverseGamma],
        Law::Beta => &[ConjugateKind::Beta],
        // Flat between its ends: a truncated normal, or a truncated beta where it is a probability.
        Law::Uniform => &[ConjugateKind::Normal, ConjugateKind::Beta],
        Law::StudentT
        | Law::Laplace
        | Law::Cauchy
        | Law::Lognormal
        | Law::Weibull
        | Law::HalfCauchy
        | Law::HalfStudentT
        | Law::Bernoulli
        | Law::BernoulliLogOdds
        | Law::BernoulliProbit
        | Law::Binomial
        | Law::BinomialLogOdds
        | Law::BinomialProbit
        | Law::Poisson
        | Law::PoissonLog
        | Law::NegativeBinomial
        | Law::NegativeBinomialLog => &[],
    }
}

fn fits(kind: ConjugateKind, form: &Form) -> bool {
    match (kind, form) {
        (ConjugateKind::Normal, Form::Mean { .. }) | (ConjugateKind::Beta, Form::Share { .. }) => true,
        (ConjugateKind::Gamma, Form::Power { exponent, .. }) => *exponent == 1.0,
        (ConjugateKind::InverseGamma, Form::Power { exponent, .. }) => *exponent == -1.0,
        _ => false,
    }
}
