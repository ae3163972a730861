//! Where the state of a chain holds what.

use std::collections::BTreeMap;
use std::ops::Range;

use crate::bind::Bound;
use crate::symbolic::{Quantity, System, Target};

/// The place of every quantity in the state.
#[derive(Clone, Debug)]
pub struct Layout {
    places: BTreeMap<Quantity, Range<usize>>,
    len: usize,
}

impl Layout {
    /// Unknowns in the order of the model, then the missing cells of the responses.
    pub fn new(bound: &Bound, system: &System) -> Layout {
        let mut layout = Layout { places: BTreeMap::new(), len: 0 };
        for statement in &system.statements {
            let size = match statement.target {
                Target::Unknown(_) => statement.scope.iter().map(|index| bound.size(*index)).product(),
                Target::Response(column) => bound.values(column).1.len(),
            };
            layout.places.insert(statement.quantity(), layout.len..layout.len + size);
            layout.len += size;
        }
        layout
    }

    /// The place of a quantity; empty for one that the state does not hold.
    pub fn range(&self, quantity: Quantity) -> Range<usize> {
        self.places.get(&quantity).cloned().unwrap_or(0..0)
    }

    /// How many scalars the state holds.
    pub fn len(&self) -> usize {
        self.len
    }

    /// Whether it holds none.
    pub fn is_empty(&self) -> bool {
        self.len == 0
    }

    /// The quantity and element at a place of the state.
    pub fn at(&self, place: usize) -> Option<(Quantity, usize)> {
        let holds = |range: &Range<usize>| range.contains(&place);
        self.places.iter().find(|(_, range)| holds(range)).map(|(q, range)| (*q, place - range.start))
    }
}

/// The state of a chain: the scalars, and the reductions that are worked out from them.
#[derive(Clone, Debug, PartialEq)]
pub struct State {
    /// Every scalar, by [`Layout`].
    pub values: Vec<f64>,
    /// The value of each reduction, by the compiler's order.
    pub nodes: Vec<Vec<f64>>,
}
