//! A plan to a program: factors, reductions, moves.

use std::collections::BTreeSet;
use std::sync::Arc;

use super::{
    CompiledPiece, Compiler, Derived, Domain, Factor, Layout, OwnElements, Program, ResponsePieces, touched,
};
use crate::bind::Bound;
use crate::plan::gaussian::Rows;
use crate::plan::{Form, Message, Plan, Step, Update};
use crate::rule::{
    Closed, ConjugateRule, Context, EnumerateRule, ForwardRule, Gatherer, JointRule, Move, Part, RescaleRule,
    ShiftRule, SliceRule, Transform, Width,
};
use crate::symbolic::{Node, Piece, Quantity, System, Target};

pub(super) fn program(bound: &Bound, plan: &Plan) -> Program {
    let system = &plan.system;
    let layout = Layout::new(bound, system);
    let mut compiler = Compiler::new(bound, system, &layout);
    let factors: Vec<Factor> = system
        .statements
        .iter()
        .map(|statement| Factor::new(&mut compiler, bound, &layout, system, statement))
        .collect();
    let mut assembler =
        Assembler { bound, system, layout: &layout, factors: &factors, compiler: &mut compiler };
    let moves = plan.steps.iter().map(|step| assembler.moved(step)).collect();
    let derived = assembler.derived();
    let responses = assembler.responses();
    let quantities = assembler.quantities();
    let predicted = quantities.iter().filter(|own| is_predicted(system, own.quantity)).cloned().collect();
    let nodes = std::mem::take(&mut compiler.nodes);
    Program { layout, factors, nodes, moves, quantities, predicted, derived, responses }
}

fn is_predicted(system: &System, quantity: Quantity) -> bool {
    matches!(quantity, Quantity::Cells(_)) && system.children(quantity).is_empty()
}

struct Assembler<'a, 'c> {
    bound: &'a Bound,
    system: &'a System,
    layout: &'a Layout,
    factors: &'a [Factor],
    compiler: &'c mut Compiler<'a>,
}

impl Assembler<'_, '_> {
    fn moved(&mut self, step: &Step) -> Move {
        let quantity = step.quantities[0];
        match &step.update {
            Update::Joint(joint) => {
                Move::Joint(JointRule::new(self.compiler, self.bound, self.layout, self.system, joint))
            }
            Update::Conjugate(conjugate) => Move::Conjugate(ConjugateRule {
                kind: conjugate.kind,
                gatherer: self.gatherer(quantity, &conjugate.messages),
                own: self.own(quantity),
            }),
            Update::Enumerate => Move::Enumerate(EnumerateRule::new(
                self.own(quantity),
                self.children(quantity),
                self.is_reduced(quantity),
            )),
            Update::Slice(messages) => Move::Slice(self.slice(quantity, messages.as_deref())),
            Update::Forward => Move::Forward(ForwardRule { own: self.own(quantity) }),
            Update::Rescale(found) => Move::Rescale(RescaleRule {
                scale: self.own(quantity),
                transform: self.transform(quantity),
                power: found.power,
                effects: found.effects.iter().map(|(effect, _)| self.own(*effect)).collect(),
                children: found
                    .children
                    .iter()
                    .map(|(child, rows)| (*child, self.part(rows.as_ref())))
                    .collect(),
                quadratic: found.quadratic,
                width: Width::default(),
                centres: vec![],
                deviations: vec![],
            }),
            Update::Shift(shift) => Move::Shift(ShiftRule {
                scalar: self.own(shift.scalar.0),
                effect: self.own(shift.effect.0),
                width: Width::default(),
            }),
        }
    }

    fn slice(&mut self, quantity: Quantity, messages: Option<&[Message]>) -> SliceRule {
        let own = self.own(quantity);
        let closed = messages.map(|messages| {
            let mut exponents: Vec<f64> = vec![];
            for message in messages {
                if let Form::Power { exponent, .. } = message.form
                    && !exponents.contains(&exponent)
                {
                    exponents.push(exponent);
                }
            }
            let sums = exponents.iter().map(|_| Vec::with_capacity(own.len())).collect();
            Closed { gatherer: self.gatherer(quantity, messages), exponents, sums }
        });
        SliceRule {
            children: if closed.is_some() { vec![] } else { self.children(quantity) },
            transform: self.transform(quantity),
            reduced: self.is_reduced(quantity),
            closed,
            widths: vec![Width::default(); own.len()],
            own,
        }
    }

    /// Rows summed for their squares: every place of the state is a scalar of its own.
    fn part(&mut self, rows: Option<&Rows>) -> Option<Part> {
        let columns: Vec<u32> = (0..self.layout.len() as u32).collect();
        let (bound, layout, system) = (self.bound, self.layout, self.system);
        let mut context = Context { compiler: self.compiler, bound, layout, system, columns: &columns };
        rows.map(|rows| Part::new(&mut context, rows))
    }

    fn gatherer(&mut self, quantity: Quantity, messages: &[Message]) -> Gatherer {
        Gatherer::new(self.compiler, self.bound, self.layout, self.system, quantity, messages)
    }

    fn own(&self, quantity: Quantity) -> OwnElements {
        let rows: Option<Arc<[u32]>> = match quantity {
            Quantity::Unknown(_) => None,
            Quantity::Cells(column) => Some(self.bound.values(column).1),
        };
        let factor = self.system.law_of(quantity).unwrap_or(0);
        OwnElements::new(quantity, factor, self.layout.range(quantity), rows)
    }

    fn children(&self, quantity: Quantity) -> Vec<(usize, super::Touched)> {
        let range = self.layout.range(quantity);
        let children = self.system.children(quantity).into_iter();
        let touch = |factor: usize| touched(&self.factors[factor], &self.compiler.nodes, quantity, &range);
        children.map(|factor| (factor, touch(factor))).collect()
    }

    fn is_reduced(&self, quantity: Quantity) -> bool {
        self.compiler.nodes.iter().any(|node| node.depends.contains(&quantity))
    }

    fn transform(&self, quantity: Quantity) -> Transform {
        let model = &self.bound.model;
        match quantity {
            Quantity::Unknown(unknown) => {
                let unknown = &model.unknowns[unknown];
                if unknown.prior.law.is_discrete() {
                    return Transform::Whole;
                }
                Transform::of(model, &self.bound.givens, unknown.support)
            }
            // A response's law may give any value, whatever its column admits.
            Quantity::Cells(_) => {
                let discrete =
                    self.system.law_of(quantity).is_some_and(|at| self.factors[at].law.is_discrete());
                if discrete { Transform::Whole } else { Transform::Identity }
            }
        }
    }

    fn derived(&mut self) -> Vec<Derived> {
        let model = &self.bound.model;
        let compile = |(id, sym): &(_, _)| {
            let named: &stook_lang::model::Named = &model.named[*id];
            let domain = Domain::of_scope(self.bound, &named.dimensions);
            let kernel = self.compiler.kernel(&domain, &[*sym]);
            Derived { name: named.name.clone(), domain, kernel }
        };
        self.system.derived.iter().map(compile).collect()
    }

    fn responses(&mut self) -> Vec<ResponsePieces> {
        let system = self.system;
        let is_response = |at: &usize| matches!(system.statements[*at].target, Target::Response(_));
        let factors = (0..system.statements.len()).filter(is_response);
        let with_pieces = factors.zip(&system.pieces).filter_map(|(at, pieces)| Some((at, pieces.as_ref()?)));
        with_pieces
            .map(|(factor, pieces)| {
                let domain = Domain::of_scope(self.bound, &system.statements[factor].scope);
                ResponsePieces {
                    factor,
                    link: pieces.link,
                    location: self.compiler.kernel(&domain, &[pieces.location]),
                    pieces: pieces.pieces.iter().map(|piece| self.piece(&domain, piece)).collect(),
                }
            })
            .collect()
    }

    fn piece(&mut self, domain: &Domain, piece: &Piece) -> CompiledPiece {
        let places = match self.system.graph.node(piece.value) {
            Node::Unknown(unknown, accesses) if piece.unknown == Some(*unknown) => {
                Some(self.compiler.places(domain, Quantity::Unknown(*unknown), accesses))
            }
            _ => None,
        };
        CompiledPiece {
            name: piece.name.clone(),
            unknown: piece.unknown,
            kernel: self.compiler.kernel(domain, &[piece.value]),
            uniform: self.system.graph.is_uniform(piece.value),
            places,
        }
    }

    /// Each quantity after those that its law depends on. The checker has refused cycles.
    fn quantities(&self) -> Vec<OwnElements> {
        let mut done: BTreeSet<Quantity> = BTreeSet::new();
        let mut order = vec![];
        let mut waiting: Vec<usize> = (0..self.system.statements.len()).collect();
        while !waiting.is_empty() {
            let before = waiting.len();
            waiting.retain(|at| {
                let statement = &self.system.statements[*at];
                let ready = statement
                    .roots()
                    .flat_map(|root| self.system.graph.depends(root))
                    .all(|quantity| done.contains(quantity));
                if ready {
                    done.insert(statement.quantity());
                    order.push(self.own(statement.quantity()));
                }
                !ready
            });
            if waiting.len() == before {
                break;
            }
        }
        order.retain(|own| !own.is_empty() || matches!(self.factors[own.factor].target, Target::Unknown(_)));
        order
    }
}
