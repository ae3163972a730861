//! Which unknowns are jointly Gaussian given the rest, and the rows of that block.

use std::collections::BTreeSet;

use stook_lang::distribution::Law;
use stook_lang::model::{Access, Place, Variable};

use crate::symbolic::{Leaf, Linear, Quantity, Sym, System, Target, linear};

/// The rows that a statement adds to a Gaussian block: `value - constant = sum of coefficient * leaf + noise`.
#[derive(Clone, Debug)]
pub struct Rows {
    /// The statement.
    pub statement: usize,
    /// The leaves in the block with their coefficients; for the prior of a member, its own element with -1 among them.
    pub terms: Vec<(Leaf, Sym)>,
    /// The part of the mean outside the block.
    pub constant: Sym,
    /// The noise's sd.
    pub sd: Sym,
    /// What the value is.
    pub value: RowValue,
}

impl Rows {
    /// Whether the sums of products over the rows can be made once: the coefficients are data, and the noise is the same for
    /// all rows.
    pub fn is_summed_once(&self, system: &System) -> bool {
        self.terms.iter().all(|(_, coefficient)| system.graph.depends(*coefficient).is_empty())
            && system.graph.is_uniform(self.sd)
    }
}

/// The left-hand side of a row.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum RowValue {
    /// The statement's target.
    Target,
    /// The logarithm of the statement's target.
    LogTarget,
    /// Nothing: the target is in the block itself.
    Zero,
}

/// The rows of a statement for a block of members, `None` where they are not Gaussian in it. A statement that does not
/// touch the block has no rows and is not asked for.
pub fn rows(system: &mut System, statement: usize, members: &BTreeSet<Quantity>) -> Option<Rows> {
    let stated = system.statements[statement].clone();
    let own = members.contains(&stated.quantity());
    let value = match (stated.law, own) {
        (Law::Normal, true) => RowValue::Zero,
        (Law::Normal, false) => RowValue::Target,
        (Law::Lognormal, false) => RowValue::LogTarget,
        _ => return None,
    };
    let touches = |sym: Sym| system.graph.depends(sym).iter().any(|quantity| members.contains(quantity));
    if stated.is_truncated() || touches(stated.parameters[1]) {
        return None;
    }
    let Linear { constant, mut terms } =
        linear(&mut system.graph, stated.parameters[0], &|quantity| members.contains(&quantity))?;
    if own {
        let minus = system.graph.number(-1.0);
        terms.push((itself(stated.quantity(), stated.scope.len()), minus));
    }
    Some(Rows { statement, terms, constant, sd: stated.parameters[1], value })
}

/// The leaf that refers to the element at hand.
fn itself(quantity: Quantity, dimensions: usize) -> Leaf {
    let access = |at| Access { place: Place::Variable(Variable(at as u32)), steps: vec![] };
    Leaf { quantity, accesses: (0..dimensions).map(access).collect() }
}

/// The unknowns that may stand in a Gaussian block by themselves: an untruncated normal prior.
pub fn candidates(system: &System) -> Vec<Quantity> {
    let normal = system.statements.iter().filter(|statement| {
        matches!(statement.target, Target::Unknown(_))
            && statement.law == Law::Normal
            && !statement.is_truncated()
    });
    normal.map(|statement| statement.quantity()).collect()
}

/// The largest block that can be grown from the candidates in their order: each is taken where every statement that
/// touches it stays Gaussian in the block.
pub fn grow(system: &mut System, candidates: &[Quantity]) -> BTreeSet<Quantity> {
    let mut members = BTreeSet::new();
    for candidate in candidates {
        members.insert(*candidate);
        let mut touching = system.children(*candidate);
        touching.extend(system.law_of(*candidate));
        if !touching.into_iter().all(|statement| rows(system, statement, &members).is_some()) {
            members.remove(candidate);
        }
    }
    members
}

/// The statements that touch a block, with their rows.
pub fn all_rows(system: &mut System, members: &BTreeSet<Quantity>) -> Vec<Rows> {
    let touching = |statement: usize, system: &System| {
        let stated = &system.statements[statement];
        members.contains(&stated.quantity())
            || members.iter().any(|member| stated.roots().any(|root| system.graph.depends_on(root, *member)))
    };
    let statements: Vec<usize> =
        (0..system.statements.len()).filter(|statement| touching(*statement, system)).collect();
    statements.into_iter().filter_map(|statement| rows(system, statement, members)).collect()
}

/// The rows of a response whose squared residuals can be had from sums made once: its mean is linear in the members, with
/// coefficients and a constant that are data.
pub fn squared_rows(system: &mut System, statement: usize, members: &BTreeSet<Quantity>) -> Option<Rows> {
    if !matches!(system.statements[statement].target, Target::Response(_)) {
        return None;
    }
    let is_data = |system: &System, rows: &Rows| {
        rows.is_summed_once(system) && system.graph.depends(rows.constant).is_empty()
    };
    rows(system, statement, members).filter(|rows| is_data(system, rows))
}

/// Whether no two elements of a quantity meet in a row: given the rest of the block they are independent.
pub fn separable(rows: &[Rows], quantity: Quantity) -> bool {
    rows.iter().all(|row| row.terms.iter().filter(|(leaf, _)| leaf.quantity == quantity).count() <= 1)
}
