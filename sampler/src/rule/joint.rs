//! The joint Gaussian block: one draw of all its scalars from their full conditional (Rue 2001).
//!
//! The block's largest unknown is eliminated where its elements are independent given the rest (see [`super::arrow`]). A
//! block that is drawn in turns, each time its few global coefficients with one of its factors, is the collapsed Gibbs
//! sampler of Papaspiliopoulos, Roberts and Zanella (2020).

use std::sync::Arc;

use super::arrow::Arrow;
use super::rows::{Context, OUTSIDE, Part};
use super::{Chain, Trouble};
use crate::bind::Bound;
use crate::plan::Joint;
use crate::program::{Compiler, Layout, Program};
use crate::symbolic::{Quantity, System};

/// The update of one Gaussian block.
#[derive(Clone, Debug)]
pub struct JointRule {
    quantities: Vec<Quantity>,
    /// The place in the state of each scalar of the block, the fringe last.
    places: Vec<usize>,
    /// For each place of the state the block's scalar.
    columns: Arc<[u32]>,
    parts: Vec<Part>,
    arrow: Arrow,
    drawn: Vec<f64>,
}

impl JointRule {
    /// Compiles a block.
    pub fn new<'a>(
        compiler: &mut Compiler<'a>,
        bound: &'a Bound,
        layout: &'a Layout,
        system: &'a System,
        joint: &Joint,
    ) -> JointRule {
        let quantities: Vec<Quantity> = joint.core.iter().chain(&joint.fringe).copied().collect();
        let places: Vec<usize> = quantities.iter().flat_map(|quantity| layout.range(*quantity)).collect();
        let mut columns = vec![OUTSIDE; layout.len()];
        places.iter().zip(0u32..).for_each(|(place, column)| columns[*place] = column);
        let mut context = Context { compiler, bound, layout, system, columns: &columns };
        let parts = joint.rows.iter().map(|rows| Part::new(&mut context, rows)).collect();
        let fringe: usize = joint.fringe.iter().map(|quantity| layout.range(*quantity).len()).sum();
        JointRule {
            quantities,
            arrow: Arrow::new(places.len() - fringe, fringe),
            drawn: vec![0.0; places.len()],
            columns: columns.into(),
            places,
            parts,
        }
    }

    /// Draws the whole block.
    pub fn update(&mut self, program: &Program, chain: &mut Chain) -> Result<(), Trouble> {
        self.condition(program, chain)?;
        self.arrow.draw(&mut chain.stream, &mut self.drawn);
        for (place, distance) in self.places.iter().zip(&self.drawn) {
            chain.state.values[*place] += distance;
        }
        for quantity in &self.quantities {
            program.refresh(*quantity, chain);
        }
        Ok(())
    }

    /// Works out the full conditional of the block's distance from the chain's state: the residuals are then small
    /// numbers, and each sweep is a step of iterative refinement (Golub and Van Loan 2013, section 3.5.3).
    fn condition(&mut self, program: &Program, chain: &mut Chain) -> Result<(), Trouble> {
        self.arrow.clear();
        for part in &mut self.parts {
            part.add(program, chain, &self.columns, &mut self.arrow);
        }
        self.arrow.factor().map_err(|at| {
            let place = self.places[at];
            Trouble { place, value: chain.state.values[place], what: "the joint normal conditional" }
        })
    }

    /// The log density of the block's full conditional at the chain's own values, for checks.
    pub fn ln_density(&mut self, program: &Program, chain: &mut Chain) -> Result<f64, Trouble> {
        self.condition(program, chain)?;
        // The block's distance from where it is: none.
        Ok(self.arrow.ln_density(&vec![0.0; self.places.len()]))
    }

    /// The places of the block's scalars in the state.
    pub fn places(&self) -> &[usize] {
        &self.places
    }
}
