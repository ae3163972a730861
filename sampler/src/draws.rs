//! The draws of a run: every reported scalar, every chain.

use serde::Serialize;

/// What a scalar is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum ScalarKind {
    /// An element of an unknown.
    Unknown,
    /// An element of a derived quantity.
    Derived,
    /// A missing cell of a response, estimated.
    Missing,
}

/// One reported scalar.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Scalar {
    /// The name of the unknown, derived quantity or column.
    pub quantity: String,
    /// The labels of its element, one for each dimension, nested labels as `parent/child`; a missing cell has its row
    /// number (from 1) in the table.
    pub labels: Vec<String>,
    /// The unit, where the model gives one.
    pub unit: Option<String>,
    /// What it is.
    pub kind: ScalarKind,
}

impl Scalar {
    /// The name with its labels: `season_dev[2019]`.
    pub fn title(&self) -> String {
        if self.labels.is_empty() {
            self.quantity.clone()
        } else {
            format!("{}[{}]", self.quantity, self.labels.join(", "))
        }
    }
}

/// The draws of all reported scalars.
#[derive(Clone, Debug)]
pub struct Draws {
    /// The scalars: unknowns in the order of the model, then derived quantities, then missing cells.
    pub scalars: Vec<Scalar>,
    /// How many chains.
    pub chains: usize,
    /// Draws of each chain.
    pub draws: usize,
    /// For each scalar its draws, chain after chain.
    pub values: Vec<Vec<f64>>,
}

impl Draws {
    /// The draws of one scalar, a slice for each chain.
    pub fn by_chain(&self, scalar: usize) -> Vec<&[f64]> {
        self.values[scalar].chunks_exact(self.draws.max(1)).collect()
    }
}
