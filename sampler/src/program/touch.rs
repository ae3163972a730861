//! Inverse maps: for each element of a quantity, the elements of a factor that depend on it.

use std::ops::Range;
use std::sync::Arc;

use super::compile::NodeProgram;
use super::factor::Factor;
use super::kernel::{Elements, OBSERVED, Op};
use crate::symbolic::Quantity;

/// The elements of a factor that each element of a quantity touches.
#[derive(Clone, Debug)]
pub enum Touched {
    /// Every element touches all that count.
    All,
    /// In compressed rows: element `k` touches `elements[starts[k]..starts[k + 1]]`.
    Rows {
        /// Starts, one more than there are elements.
        starts: Arc<[u32]>,
        /// The touched elements, ascending for each.
        elements: Arc<[u32]>,
    },
}

impl Touched {
    /// The elements of the factor that an element of the quantity touches.
    pub fn of<'a>(&'a self, factor: &'a Factor, element: usize) -> Elements<'a> {
        match self {
            Touched::All => factor.elements(),
            Touched::Rows { starts, elements } => {
                Elements::List(&elements[starts[element] as usize..starts[element + 1] as usize])
            }
        }
    }
}

/// Finds the inverse map of a quantity, which lies at `range` of the state, in a factor's parameters.
pub fn touched(factor: &Factor, nodes: &[NodeProgram], quantity: Quantity, range: &Range<usize>) -> Touched {
    let through_node = factor.kernel.ops.iter().any(|op| match op {
        Op::Node(node, _) | Op::NodeGather(node, _) => depends(nodes, *node, quantity),
        _ => false,
    });
    if range.len() <= 1 || through_node {
        return Touched::All;
    }
    let mut starts = vec![0u32; range.len() + 1];
    visit(factor, range, |element, _| starts[element as usize + 1] += 1);
    for at in 1..starts.len() {
        starts[at] += starts[at - 1];
    }
    let mut next = starts.clone();
    let mut elements = vec![0u32; starts[range.len()] as usize];
    visit(factor, range, |element, row| {
        elements[next[element as usize] as usize] = row;
        next[element as usize] += 1;
    });
    let (starts, elements) = without_repeats(&starts, elements);
    Touched::Rows { starts: starts.into(), elements: elements.into() }
}

/// Calls `each` with every pair of an element of the quantity and a row of the factor that reads it. A row that reads it
/// twice is given twice.
fn visit(factor: &Factor, range: &Range<usize>, mut each: impl FnMut(u32, u32)) {
    let len = factor.domain.len() as u32;
    let mut pair = |place: usize, row: u32| {
        if range.contains(&place) && factor.is_active(row) {
            each((place - range.start) as u32, row);
        }
    };
    for op in &factor.kernel.ops {
        match op {
            Op::Scalar(place) if range.contains(&(*place as usize)) => {
                (0..len).for_each(|row| pair(*place as usize, row));
            }
            Op::Block(offset) => (0..len).for_each(|row| pair((offset + row) as usize, row)),
            Op::Gather(places) => (0..len).for_each(|row| pair(places[row as usize] as usize, row)),
            Op::Cells(_, places) => {
                let live = (0..len).filter(|row| places[*row as usize] != OBSERVED);
                live.for_each(|row| pair(places[row as usize] as usize, row));
            }
            _ => {}
        }
    }
}

fn without_repeats(starts: &[u32], mut elements: Vec<u32>) -> (Vec<u32>, Vec<u32>) {
    let mut kept = Vec::with_capacity(elements.len());
    let mut kept_starts = vec![0u32];
    for bounds in starts.windows(2) {
        let rows = &mut elements[bounds[0] as usize..bounds[1] as usize];
        rows.sort_unstable();
        let first = kept.len();
        for row in rows.iter() {
            if kept[first..].last() != Some(row) {
                kept.push(*row);
            }
        }
        kept_starts.push(kept.len() as u32);
    }
    (kept_starts, kept)
}

fn depends(nodes: &[NodeProgram], node: usize, quantity: Quantity) -> bool {
    nodes[node].depends.contains(&quantity)
}
