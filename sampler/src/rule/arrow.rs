//! A Gaussian block whose largest unknown is diagonal in the precision: that unknown is eliminated, the rest is dense.
//!
//! With a core c and a fringe f the precision is `[C S'; S D]`, D diagonal. The core's marginal precision is the Schur
//! complement `C - S' D^-1 S`, and given the core the fringe's scalars are independent. Without a fringe this is a dense
//! Cholesky (Rue 2001); with one it costs the fringe's length times the core's square.

use crate::numeric::dense;
use crate::numeric::stream::Stream;

/// A Gaussian with core and fringe: precision and linear term, then factor and mean.
#[derive(Clone, Debug)]
pub(super) struct Arrow {
    core_size: usize,
    /// Row-major, lower triangle.
    core: Vec<f64>,
    /// For each fringe scalar its row of S.
    side: Vec<f64>,
    fringe: Vec<f64>,
    linear: Vec<f64>,
    noise: Vec<f64>,
}

impl Arrow {
    /// An empty one.
    pub(super) fn new(core: usize, fringe: usize) -> Arrow {
        Arrow {
            core_size: core,
            core: vec![0.0; core * core],
            side: vec![0.0; core * fringe],
            fringe: vec![0.0; fringe],
            linear: vec![0.0; core + fringe],
            noise: vec![0.0; core],
        }
    }

    /// Sets precision and linear term to zero.
    pub(super) fn clear(&mut self) {
        self.core.fill(0.0);
        self.side.fill(0.0);
        self.fringe.fill(0.0);
        self.linear.fill(0.0);
    }

    /// Adds to the precision at `(row, column)`, `column <= row`; core scalars come first. Two different scalars of the
    /// fringe never meet.
    #[inline]
    pub(super) fn add(&mut self, row: usize, column: usize, value: f64) {
        if row < self.core_size {
            self.core[row * self.core_size + column] += value;
        } else if column < self.core_size {
            self.side[(row - self.core_size) * self.core_size + column] += value;
        } else {
            debug_assert_eq!(row, column, "the fringe is diagonal");
            self.fringe[row - self.core_size] += value;
        }
    }

    /// Adds to the linear term.
    #[inline]
    pub(super) fn add_linear(&mut self, at: usize, value: f64) {
        self.linear[at] += value;
    }

    /// Eliminates the fringe and factors the core. On an error the scalar whose pivot is not positive.
    pub(super) fn factor(&mut self) -> Result<(), usize> {
        let size = self.core_size;
        for (at, pivot) in self.fringe.iter().enumerate() {
            if !(*pivot > 0.0 && pivot.is_finite()) {
                return Err(size + at);
            }
            let row = &self.side[at * size..(at + 1) * size];
            let linear = self.linear[size + at];
            for (i, a) in row.iter().enumerate().filter(|(_, a)| **a != 0.0) {
                let scaled = a / pivot;
                self.linear[i] -= scaled * linear;
                let target = &mut self.core[i * size..i * size + i + 1];
                for (target, b) in target.iter_mut().zip(row) {
                    *target -= scaled * b;
                }
            }
        }
        dense::factor(&mut self.core, size).map_err(|problem| problem.at)?;
        dense::solve(&self.core, size, &mut self.linear[..size]);
        match self.linear.iter().position(|value| !value.is_finite()) {
            Some(at) => Err(at),
            None => Ok(()),
        }
    }

    /// A draw, into `out`; the block must have been factored.
    pub(super) fn draw(&mut self, stream: &mut Stream, out: &mut [f64]) {
        let size = self.core_size;
        for noise in &mut self.noise {
            *noise = stream.normal();
        }
        // x = mean + L^-T z has the precision L L^T.
        dense::solve_transposed(&self.core, size, &mut self.noise);
        for at in 0..size {
            out[at] = self.linear[at] + self.noise[at];
        }
        let (core, fringe) = out.split_at_mut(size);
        for (at, value) in fringe.iter_mut().enumerate() {
            *value = self.fringe_mean(at, core) + stream.normal() / self.fringe[at].sqrt();
        }
    }

    /// The mean of a fringe scalar given the core.
    fn fringe_mean(&self, at: usize, core: &[f64]) -> f64 {
        let row = &self.side[at * self.core_size..(at + 1) * self.core_size];
        let met: f64 = row.iter().zip(core).map(|(a, b)| a * b).sum();
        (self.linear[self.core_size + at] - met) / self.fringe[at]
    }

    /// The log density at a point; the block must have been factored.
    pub(super) fn ln_density(&self, x: &[f64]) -> f64 {
        let size = self.core_size;
        let mut total = -0.5 * x.len() as f64 * libm::log(2.0 * std::f64::consts::PI);
        for row in 0..size {
            // One element of L^T (x - mean).
            let deviation = |below: usize| self.core[below * size + row] * (x[below] - self.linear[below]);
            let scaled: f64 = (row..size).map(deviation).sum();
            total += libm::log(self.core[row * size + row]) - 0.5 * scaled * scaled;
        }
        for (at, precision) in self.fringe.iter().enumerate() {
            let deviation = x[size + at] - self.fringe_mean(at, &x[..size]);
            total += 0.5 * libm::log(*precision) - 0.5 * precision * deviation * deviation;
        }
        total
    }
}
