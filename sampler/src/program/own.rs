//! A quantity's elements with the law that each of them follows.

use std::ops::Range;
use std::sync::Arc;

use stook_lang::distribution::Law;

use super::Program;
use super::factor::Factor;
use super::kernel::Elements;
use crate::distribution;
use crate::rule::Chain;
use crate::symbolic::Quantity;

/// The elements of a quantity: their places in the state, and the elements of the factor that gives their law.
#[derive(Clone, Debug)]
pub struct OwnElements {
    /// The quantity.
    pub quantity: Quantity,
    /// The factor that gives its law.
    pub factor: usize,
    range: Range<usize>,
    /// For a column's missing cells the row of each; else the element itself.
    rows: Option<Arc<[u32]>>,
}

impl OwnElements {
    /// The elements of a quantity that lies at `range`; `rows` are the rows of a column's missing cells.
    pub fn new(
        quantity: Quantity,
        factor: usize,
        range: Range<usize>,
        rows: Option<Arc<[u32]>>,
    ) -> OwnElements {
        OwnElements { quantity, factor, range, rows }
    }

    /// How many.
    pub fn len(&self) -> usize {
        self.range.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.range.is_empty()
    }

    /// The place of an element in the state.
    pub fn place(&self, element: usize) -> usize {
        self.range.start + element
    }

    /// The element of the factor that gives the law of an element.
    pub fn row(&self, element: usize) -> u32 {
        self.rows.as_ref().map_or(element as u32, |rows| rows[element])
    }

    /// The law of an element at the chain's state: parameters and ends.
    pub fn law(&self, program: &Program, chain: &mut Chain, element: usize) -> (Law, [f64; 3], (f64, f64)) {
        let factor: &Factor = &program.factors[self.factor];
        factor.run(&chain.state, Elements::List(&[self.row(element)]), &mut chain.scratch);
        (factor.law, factor.parameters(&chain.scratch, 0), factor.ends(&chain.scratch, 0))
    }

    /// The log density of an element under its own law.
    pub fn ln_density(&self, program: &Program, chain: &mut Chain, element: usize) -> f64 {
        let factor = &program.factors[self.factor];
        factor.log_density(&chain.state, Elements::List(&[self.row(element)]), &mut chain.scratch)
    }

    /// A draw of an element from its own law at the chain's state.
    pub fn draw(&self, program: &Program, chain: &mut Chain, element: usize) -> f64 {
        let (law, parameters, (low, high)) = self.law(program, chain, element);
        let parameters = &parameters[..law.arity()];
        if distribution::check_params(law, parameters).is_err() {
            return f64::NAN;
        }
        if low == f64::NEG_INFINITY && high == f64::INFINITY {
            distribution::draw(law, &mut chain.stream, parameters)
        } else {
            distribution::draw_between(law, &mut chain.stream, low, high, parameters)
        }
    }
}
