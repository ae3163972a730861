//! Columns of values: missing cells and cells outside their support.

use std::fmt;
use std::sync::Arc;

use stook_lang::arena::Id;
use stook_lang::model::{Column, ColumnKind, Model, Support};

use super::labels::Interned;
use super::problem::{DataProblem, Examples};
use super::{Binder, Cells, constant};
use crate::table;

impl Binder<'_> {
    /// The cells of every column, by position.
    pub(super) fn columns(&mut self, interned: &Interned) -> Vec<Cells> {
        let model = self.model;
        let ids: Vec<Id<Column>> = model.columns.ids().collect();
        ids.into_iter()
            .map(|column| match &model.columns[column].kind {
                ColumnKind::Labels { .. } => {
                    Cells::Labels(interned.rows.get(&column).cloned().unwrap_or_else(|| Arc::from([])))
                }
                ColumnKind::Values { support, gaps, between, .. } => {
                    self.values(column, *support, *gaps, *between)
                }
            })
            .collect()
    }

    fn values(
        &mut self,
        column: Id<Column>,
        support: Support,
        may_miss: bool,
        between: Option<(Id<stook_lang::model::Expression>, Id<stook_lang::model::Expression>)>,
    ) -> Cells {
        let values: Vec<f64> = match self.raw(column) {
            table::Column::Numbers { values } => values.clone(),
            table::Column::Labels { .. } => vec![],
        };
        let bounds = bounds(self.model, self.givens, support);
        let range = between
            .map(|(a, b)| (constant(self.model, self.givens, a), constant(self.model, self.givens, b)))
            .map(|(low, high)| Bounds { low, high, open: (false, false), whole: false });
        let mut missing = vec![];
        let (mut gaps, mut outside, mut beyond) =
            (Examples::default(), Examples::default(), Examples::default());
        for (row, value) in values.iter().enumerate() {
            if value.is_nan() {
                missing.push(row as u32);
                if !may_miss {
                    gaps.add(row, String::new);
                }
            } else if !bounds.holds(*value) {
                outside.add(row, || value.to_string());
            } else if range.as_ref().is_some_and(|range| !range.holds(*value)) {
                beyond.add(row, || value.to_string());
            }
        }
        let name = self.model.columns[column].name.clone();
        if !gaps.is_empty() {
            let cells = gaps.cells(|row, text| self.place(column, row, text));
            self.problems.push(DataProblem::Gap { column: name.clone(), cells });
        }
        if !outside.is_empty() {
            let cells = outside.cells(|row, text| self.place(column, row, text));
            self.problems.push(DataProblem::OutsideSupport {
                column: name.clone(),
                support: bounds.to_string(),
                cells,
            });
        }
        if let Some(range) = range.filter(|_| !beyond.is_empty()) {
            let cells = beyond.cells(|row, text| self.place(column, row, text));
            self.problems.push(DataProblem::OutsideRange { column: name, range: range.to_string(), cells });
        }
        Cells::Values { values: values.into(), missing: missing.into() }
    }
}

/// DataPlace numbers lie.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Bounds {
    low: f64,
    high: f64,
    /// Whether an end is excluded.
    open: (bool, bool),
    whole: bool,
}

/// The bounds of a support type.
pub(super) fn bounds(model: &Model, givens: &[f64], support: Support) -> Bounds {
    let end = |bound: Option<_>, none: f64| bound.map_or(none, |bound| constant(model, givens, bound));
    let (low, high, open, whole) = match support {
        Support::Real { low, high } => {
            (end(low, f64::NEG_INFINITY), end(high, f64::INFINITY), (low.is_some(), high.is_some()), false)
        }
        Support::Positive => (0.0, f64::INFINITY, (true, false), false),
        // Fractions are observed at their ends; whether a law allows that shows in its density.
        Support::Fraction => (0.0, 1.0, (false, false), false),
        Support::Count => (0.0, f64::INFINITY, (false, false), true),
        Support::YesNo => (0.0, 1.0, (false, false), true),
    };
    Bounds { low, high, open, whole }
}

impl Bounds {
    pub(super) fn holds(&self, value: f64) -> bool {
        let above = if self.open.0 { value > self.low } else { value >= self.low };
        let below = if self.open.1 { value < self.high } else { value <= self.high };
        above && below && value.is_finite() && (!self.whole || value.fract() == 0.0)
    }
}

impl fmt::Display for Bounds {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let number = if self.whole { "a whole number" } else { "a number" };
        match (self.low.is_finite(), self.high.is_finite()) {
            (false, false) => write!(f, "{number}"),
            (true, false) if self.open.0 => write!(f, "{number} above {}", self.low),
            (true, false) => write!(f, "{number} from {}", self.low),
            (false, true) => write!(f, "{number} below {}", self.high),
            (true, true) => write!(f, "{number} between {} and {}", self.low, self.high),
        }
    }
}
