//! The rows that a statement adds to a Gaussian block: `value - constant = sum of c x + noise`.
//!
//! The rows may refer to scalars outside the block that is drawn (other members of a larger block that is drawn in turns):
//! those are known. Where the coefficients are data and the noise is the same for all rows, the sums of products are made
//! once, over the rows, and a sweep costs what the cells cost: the pairs of scalars that meet in a row.

use std::collections::HashMap;
use std::sync::Arc;

use super::Chain;
use super::arrow::Arrow;
use crate::bind::Bound;
use crate::plan::gaussian::{RowValue, Rows};
use crate::program::{Compiler, Domain, Elements, Factor, Kernel, Layout, Program, Route, Scratch, State};
use crate::symbolic::{System, Target};

/// Up to so many rows the linear term is summed anew every sweep.
const FEW_ROWS: usize = 64;

/// Not in the block.
pub(super) const OUTSIDE: u32 = u32::MAX;

/// The rows of one statement, compiled.
#[derive(Clone, Debug)]
pub struct Part {
    factor: usize,
    value: RowValue,
    /// Outputs: the coefficients, the constant, the sd.
    kernel: Kernel,
    /// For each term the place in the state that each row refers to.
    terms: Vec<Route>,
    sums: Option<Sums>,
    /// The block's scalars and coefficients of the row at hand.
    row: Vec<(usize, f64)>,
}

/// A statement's rows summed once.
#[derive(Clone, Debug)]
struct Sums {
    /// Sums of products of coefficients of two scalars of the block: row, column (not above the row), sum.
    inside: Arc<[(u32, u32, f64)]>,
    /// What the linear term is made of, where that is worth summing; else it is summed over the rows every sweep.
    linear: Option<LinearSums>,
    /// The sd alone.
    sd: Kernel,
}

/// The linear term of a statement's rows, around a reference: `sum of c (value - constant - rows at the reference)`, and
/// what the state's distance from the reference takes from it. Values that share a large offset keep their digits because
/// the reference has it.
#[derive(Clone, Debug)]
struct LinearSums {
    /// For each scalar of the block its sum at the reference.
    at_reference: Arc<[(u32, f64)]>,
    /// Of a scalar of the block and any scalar that it meets: the block's, the place of the other, sum of products.
    pairs: Arc<[(u32, u32, f64)]>,
    /// The reference by places of the state.
    reference: Arc<[f64]>,
    /// The sum of the squares of `value - constant - rows at the reference`.
    squares: f64,
}

/// Below this share of the sum of squares at the reference what is left has lost too many digits, and the rows are read.
const LEAST_SHARE: f64 = 1e-6;

impl LinearSums {
    /// The sum of squared residuals at a state, from the sums of a part whose scalars are all places of the state.
    fn squares_at(&self, values: &[f64]) -> Option<f64> {
        let distance = |place: u32| values[place as usize] - self.reference[place as usize];
        let linear: f64 = self.at_reference.iter().map(|(place, sum)| distance(*place) * sum).sum();
        let quadratic: f64 = self.pairs.iter().map(|(i, j, sum)| distance(*i) * sum * distance(*j)).sum();
        let left = self.squares - 2.0 * linear + quadratic;
        (left > LEAST_SHARE * self.squares).then_some(left)
    }
}

/// What compiling a part needs.
pub(crate) struct Context<'a, 'c> {
    pub(crate) compiler: &'c mut Compiler<'a>,
    pub(crate) bound: &'a Bound,
    pub(crate) layout: &'a Layout,
    pub(crate) system: &'a System,
    /// For each place of the state the block's scalar, or `OUTSIDE`.
    pub(crate) columns: &'c [u32],
}

impl Part {
    pub(crate) fn new(context: &mut Context<'_, '_>, rows: &Rows) -> Part {
        let system = context.system;
        let statement = &system.statements[rows.statement];
        let domain = Domain::of_scope(context.bound, &statement.scope);
        let outputs: Vec<_> = rows.terms.iter().map(|(_, c)| *c).chain([rows.constant, rows.sd]).collect();
        let kernel = context.compiler.kernel(&domain, &outputs);
        let places = |(leaf, _): &(crate::symbolic::Leaf, _)| {
            context.compiler.places(&domain, leaf.quantity, &leaf.accesses)
        };
        let terms: Vec<Route> = rows.terms.iter().map(places).collect();
        let row = Vec::with_capacity(terms.len());
        let mut part = Part { factor: rows.statement, value: rows.value, kernel, terms, sums: None, row };
        let data = |sym| system.graph.depends(sym).is_empty();
        if rows.is_summed_once(system) {
            let factor = Factor::new(context.compiler, context.bound, context.layout, system, statement);
            let known = match (rows.value, statement.target) {
                (RowValue::Zero, _) => true,
                (_, Target::Response(_)) => system.children(statement.quantity()).is_empty(),
                (_, Target::Unknown(_)) => false,
            };
            let sd = context.compiler.kernel(&domain, &[rows.sd]);
            // Few rows are quickly summed anew, with every digit.
            let known = known && data(rows.constant) && factor.elements().len() > FEW_ROWS;
            let ones: Vec<bool> =
                rows.terms.iter().map(|(_, c)| system.graph.as_number(*c) == Some(1.0)).collect();
            let anchor = ones.iter().position(|one| *one);
            part.sums = Some(part.summed(&factor, known.then_some(anchor), sd, context));
        }
        part
    }

    /// Sums the rows once. Coefficients are data, and so are values and constants where `linear` is given: it names the
    /// term, if there is one with coefficient 1, that the reference is put on.
    fn summed(
        &mut self,
        factor: &Factor,
        linear: Option<Option<usize>>,
        sd: Kernel,
        context: &Context<'_, '_>,
    ) -> Sums {
        // What is summed is data; the outputs that read the state (the sd, an unknown constant) are left out.
        let kernel = self.kernel.first_outputs(self.terms.len() + usize::from(linear.is_some()));
        let mut reference = vec![0.0; context.layout.len()];
        if let Some(Some(anchor)) = linear {
            self.set_reference(factor, &kernel, anchor, &mut reference);
        }
        let mut products: HashMap<(u32, u32), f64, Fast> = HashMap::default();
        let mut sums: HashMap<u32, f64, Fast> = HashMap::default();
        let mut row: Vec<(u32, f64)> = vec![];
        let mut squares = 0.0;
        self.each_row(factor, &kernel, |part, scratch, at, element| {
            row.clear();
            for (term, route) in part.terms.iter().enumerate() {
                row.push((route.at(element), scratch.register(&kernel, term)[at]));
            }
            for (i, a) in &row {
                for (j, b) in row.iter().filter(|(j, _)| j <= i) {
                    *products.entry((*i, *j)).or_default() += a * b;
                }
            }
            if linear.is_some() {
                let constant = scratch.register(&kernel, part.terms.len())[at];
                let expected: f64 = row.iter().map(|(place, a)| a * reference[*place as usize]).sum();
                let value = part.left_side(factor, &NO_STATE, element) - constant - expected;
                squares += value * value;
                for (i, a) in &row {
                    *sums.entry(*i).or_default() += a * value;
                }
            }
        });
        let (inside, pairs) = split(products, context.columns);
        let at_reference = in_order(sums.into_iter().filter_map(|(place, sum)| {
            let column = context.columns[place as usize];
            (column != OUTSIDE).then_some((column, sum))
        }));
        let linear = linear.map(|_| LinearSums {
            at_reference: at_reference.into(),
            pairs: pairs.into(),
            reference: reference.into(),
            squares,
        });
        Sums { inside: inside.into(), linear, sd }
    }

    /// Puts the mean of the values that refer to each scalar of the anchor's term on it.
    fn set_reference(&mut self, factor: &Factor, kernel: &Kernel, anchor: usize, reference: &mut [f64]) {
        let mut counts = vec![0.0; reference.len()];
        self.each_row(factor, kernel, |part, scratch, at, element| {
            let constant = scratch.register(kernel, part.terms.len())[at];
            let value = part.left_side(factor, &NO_STATE, element) - constant;
            let place = part.terms[anchor].at(element) as usize;
            counts[place] += 1.0;
            reference[place] += (value - reference[place]) / counts[place];
        });
    }

    fn each_row(
        &mut self,
        factor: &Factor,
        kernel: &Kernel,
        mut each: impl FnMut(&Part, &Scratch, usize, usize),
    ) {
        let mut scratch = Scratch::default();
        for chunk in factor.elements().chunks() {
            kernel.run(&NO_STATE, chunk, &mut scratch);
            chunk.for_each(|at, element| each(self, &scratch, at, element));
        }
    }

    /// The sum of squared residuals at a state where the rows have been summed for it.
    pub(super) fn squares(&self, state: &State) -> Option<f64> {
        self.sums.as_ref()?.linear.as_ref()?.squares_at(&state.values)
    }

    /// Whether the rows have been summed for their squares.
    pub(super) fn has_squares(&self) -> bool {
        self.sums.as_ref().is_some_and(|sums| sums.linear.is_some())
    }

    /// The log density of the rows at the chain's state up to a constant for its sd, where they have been summed for it.
    pub(super) fn ln_density(&self, chain: &mut Chain) -> Option<f64> {
        let squares = self.squares(&chain.state)?;
        let kernel = &self.sums.as_ref()?.sd;
        kernel.run(&chain.state, Elements::Range(0, 1), &mut chain.scratch);
        let sd = chain.scratch.register(kernel, 0)[0];
        Some(-0.5 * squares / (sd * sd))
    }

    fn left_side(&self, factor: &Factor, state: &State, row: usize) -> f64 {
        match self.value {
            RowValue::Target => factor.value(state, row),
            RowValue::LogTarget => libm::log(factor.value(state, row)),
            RowValue::Zero => 0.0,
        }
    }

    /// Adds the rows to the precision and the linear term of the block's distance from the chain's state.
    pub(super) fn add(&mut self, program: &Program, chain: &mut Chain, columns: &[u32], arrow: &mut Arrow) {
        let factor = &program.factors[self.factor];
        if factor.elements().is_empty() {
            return;
        }
        let Some(sums) = &self.sums else {
            return self.add_rows(factor, chain, columns, arrow, true);
        };
        sums.sd.run(&chain.state, Elements::Range(0, 1), &mut chain.scratch);
        let sd = chain.scratch.register(&sums.sd, 0)[0];
        let weight = 1.0 / (sd * sd);
        for (row, column, sum) in sums.inside.iter() {
            arrow.add(*row as usize, *column as usize, weight * sum);
        }
        let Some(linear) = &sums.linear else {
            return self.add_rows(factor, chain, columns, arrow, false);
        };
        for (column, sum) in linear.at_reference.iter() {
            arrow.add_linear(*column as usize, weight * sum);
        }
        for (column, place, sum) in linear.pairs.iter() {
            let distance = chain.state.values[*place as usize] - linear.reference[*place as usize];
            arrow.add_linear(*column as usize, -weight * sum * distance);
        }
    }

    /// Adds the rows one by one, to the linear term and, where asked, to the precision.
    fn add_rows(
        &mut self,
        factor: &Factor,
        chain: &mut Chain,
        columns: &[u32],
        arrow: &mut Arrow,
        precision: bool,
    ) {
        let terms = self.terms.len();
        let mut entries = std::mem::take(&mut self.row);
        for chunk in factor.elements().chunks() {
            self.kernel.run(&chain.state, chunk, &mut chain.scratch);
            let (scratch, state) = (&chain.scratch, &chain.state);
            chunk.for_each(|at, row| {
                let output = |which: usize| scratch.register(&self.kernel, which)[at];
                let sd = output(terms + 1);
                let weight = 1.0 / (sd * sd);
                let mut value = self.left_side(factor, state, row) - output(terms);
                entries.clear();
                for (term, route) in self.terms.iter().enumerate() {
                    let place = route.at(row) as usize;
                    value -= output(term) * state.values[place];
                    if columns[place] != OUTSIDE {
                        entries.push((columns[place] as usize, output(term)));
                    }
                }
                for (i, a) in &entries {
                    arrow.add_linear(*i, weight * a * value);
                    if precision {
                        for (j, b) in entries.iter().filter(|(j, _)| j <= i) {
                            arrow.add(*i, *j, weight * a * b);
                        }
                    }
                }
            });
        }
        self.row = entries;
    }
}

/// What kernels of data alone are run with.
static NO_STATE: State = State { values: vec![], nodes: vec![] };

/// Pairs of the block's scalars, or of one of them and a place of the state, with their sums of products.
type Pairs = Vec<(u32, u32, f64)>;

/// Sums by places of the state to sums by the block's scalars: inside the block, and of each of its scalars with all that it
/// meets.
fn split(products: HashMap<(u32, u32), f64, Fast>, columns: &[u32]) -> (Pairs, Pairs) {
    let (mut inside, mut pairs) = (vec![], vec![]);
    for ((i, j), sum) in products {
        let (a, b) = (columns[i as usize], columns[j as usize]);
        if a != OUTSIDE {
            pairs.push((a, j, sum));
        }
        if b != OUTSIDE && i != j {
            pairs.push((b, i, sum));
        }
        if a != OUTSIDE && b != OUTSIDE {
            inside.push((a.max(b), a.min(b), sum));
        }
    }
    inside.sort_by_key(|(row, column, _)| (*row, *column));
    pairs.sort_by_key(|(column, place, _)| (*column, *place));
    (inside, pairs)
}

fn in_order(sums: impl Iterator<Item = (u32, f64)>) -> Vec<(u32, f64)> {
    let mut list: Vec<(u32, f64)> = sums.collect();
    list.sort_by_key(|(column, _)| *column);
    list
}

/// A hash of small keys: a product with an odd constant for each word (Knuth 1973, section 6.4).
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Fast(u64);

impl std::hash::BuildHasher for Fast {
    type Hasher = Fast;
    fn build_hasher(&self) -> Fast {
        Fast(0)
    }
}

impl std::hash::Hasher for Fast {
    fn write(&mut self, bytes: &[u8]) {
        bytes.iter().for_each(|byte| self.write_u32(u32::from(*byte)));
    }
    fn write_u32(&mut self, word: u32) {
        self.0 = (self.0.rotate_left(23) ^ u64::from(word)).wrapping_mul(0x9e37_79b9_7f4a_7c15);
    }
    fn finish(&self) -> u64 {
        self.0.rotate_left(26)
    }
}
