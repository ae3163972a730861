//! Cholesky factors of small dense matrices, in place and without allocation.

/// A matrix that is not positive definite.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct NotPositiveDefinite {
    /// The row whose pivot is not positive.
    pub at: usize,
}

/// Factors a symmetric positive definite matrix, given by its lower triangle in row-major order, into `L L'`; L replaces
/// the lower triangle (Golub and Van Loan 2013, section 4.2).
pub fn factor(matrix: &mut [f64], size: usize) -> Result<(), NotPositiveDefinite> {
    for row in 0..size {
        let (above, current) = matrix.split_at_mut(row * size);
        let current = &mut current[..=row];
        for column in 0..row {
            let other = &above[column * size..column * size + column + 1];
            let met = dot(&current[..column], &other[..column]);
            current[column] = (current[column] - met) / other[column];
        }
        let pivot = current[row] - dot(&current[..row], &current[..row]);
        if !(pivot > 0.0 && pivot.is_finite()) {
            return Err(NotPositiveDefinite { at: row });
        }
        current[row] = pivot.sqrt();
    }
    Ok(())
}

/// Solves `L L' x = b` for a factor, in place of b.
pub fn solve(factor: &[f64], size: usize, b: &mut [f64]) {
    for row in 0..size {
        let met = dot(&factor[row * size..row * size + row], &b[..row]);
        b[row] = (b[row] - met) / factor[row * size + row];
    }
    solve_transposed(factor, size, b);
}

/// Solves `L' x = b` for a factor, in place of b.
pub fn solve_transposed(factor: &[f64], size: usize, b: &mut [f64]) {
    for row in (0..size).rev() {
        let found = b[row] / factor[row * size + row];
        b[row] = found;
        for (before, entry) in b[..row].iter_mut().zip(&factor[row * size..row * size + row]) {
            *before -= entry * found;
        }
    }
}

/// Four partial sums: the order is fixed, so that the bits are, and the loop can be vectorised.
#[inline]
fn dot(a: &[f64], b: &[f64]) -> f64 {
    let mut sums = [0.0; 4];
    let (a4, b4) = (a.chunks_exact(4), b.chunks_exact(4));
    let rest: f64 = a4.remainder().iter().zip(b4.remainder()).map(|(a, b)| a * b).sum();
    for (a, b) in a4.zip(b4) {
        for at in 0..4 {
            sums[at] += a[at] * b[at];
        }
    }
    (sums[0] + sums[1]) + (sums[2] + sums[3]) + rest
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::numeric::stream::Stream;

    /// A random matrix `A A' + I` and its lower triangle.
    fn positive_definite(size: usize, stream: &mut Stream) -> Vec<f64> {
        let a: Vec<f64> = (0..size * size).map(|_| stream.normal()).collect();
        let mut product = vec![0.0; size * size];
        for i in 0..size {
            for j in 0..size {
                product[i * size + j] = (0..size).map(|k| a[i * size + k] * a[j * size + k]).sum::<f64>();
            }
            product[i * size + i] += 1.0;
        }
        product
    }

    #[test]
    fn factors_multiply_back_and_solve() {
        let mut stream = Stream::new(1, 0);
        for size in [1, 2, 3, 7, 16, 33] {
            let matrix = positive_definite(size, &mut stream);
            let mut found = matrix.clone();
            assert!(factor(&mut found, size).is_ok());
            for i in 0..size {
                for j in 0..=i {
                    let product: f64 = (0..=j).map(|k| found[i * size + k] * found[j * size + k]).sum();
                    assert!((product - matrix[i * size + j]).abs() < 1e-10 * size as f64);
                }
            }
            let x: Vec<f64> = (0..size).map(|_| stream.normal()).collect();
            let mut b: Vec<f64> =
                (0..size).map(|i| (0..size).map(|j| matrix[i * size + j] * x[j]).sum()).collect();
            solve(&found, size, &mut b);
            for (found, wanted) in b.iter().zip(&x) {
                assert!((found - wanted).abs() < 1e-8);
            }
        }
    }

    #[test]
    fn a_matrix_that_is_not_positive_definite_is_refused_at_its_row() {
        let mut matrix = vec![1.0, 0.0, 0.0, 2.0, 1.0, 0.0, 0.0, 0.0, 1.0];
        assert_eq!(factor(&mut matrix, 3), Err(NotPositiveDefinite { at: 1 }));
        assert_eq!(factor(&mut [f64::NAN], 1), Err(NotPositiveDefinite { at: 0 }));
    }
}
