//! Singular values and right singular vectors by one-sided Jacobi rotations.
//!
//! Hestenes (1958, Journal of the SIAM 6). Slower than bidiagonalisation for large matrices, but small
//! singular values beside large ones keep more of their digits (Demmel & Veselić 1992, SIAM Journal
//! on Matrix Analysis and Applications 13), and the smallest roots are what tests of dimensions ask for.

use nalgebra::DMatrix;

use super::sum::dot;

/// Rotations converge quadratically; ten sweeps are usual.
const SWEEPS: usize = 100;

/// Singular values, largest first, with their right singular vectors as columns in the same order.
#[derive(Clone, Debug)]
pub(crate) struct Singular {
    pub(crate) values: Vec<f64>,
    pub(crate) right: DMatrix<f64>,
}

/// Decomposes a matrix of m rows and n columns; min(m, n) values and vectors.
pub(crate) fn singular(matrix: &DMatrix<f64>) -> Singular {
    if matrix.nrows() >= matrix.ncols() {
        return rotate_columns(matrix.clone());
    }
    // Fewer rows than columns: A = LQ, and the right vectors of A are those of L carried back by Q.
    let rows = matrix.transpose().qr();
    let inner = rotate_columns(rows.r().transpose());
    Singular { values: inner.values, right: rows.q() * inner.right }
}

/// Rotates pairs of columns until all are orthogonal; their norms are the singular values, and the
/// product of the rotations holds the right vectors.
fn rotate_columns(mut matrix: DMatrix<f64>) -> Singular {
    let columns = matrix.ncols();
    let orthogonal = f64::EPSILON * (matrix.nrows() as f64).sqrt();
    let mut right = DMatrix::identity(columns, columns);
    for _ in 0..SWEEPS {
        let mut rotated = false;
        for first in 0..columns {
            for second in first + 1..columns {
                if let Some(rotation) = rotation(&matrix, first, second, orthogonal) {
                    rotation.apply(&mut matrix, first, second);
                    rotation.apply(&mut right, first, second);
                    rotated = true;
                }
            }
        }
        if !rotated {
            break;
        }
    }
    let norms: Vec<f64> = matrix.column_iter().map(|column| column.norm()).collect();
    let mut order: Vec<(usize, f64)> = norms.into_iter().enumerate().collect();
    order.sort_by(|a, b| b.1.total_cmp(&a.1));
    Singular {
        values: order.iter().map(|(_, norm)| *norm).collect(),
        right: right.select_columns(order.iter().map(|(column, _)| column)),
    }
}

struct Rotation {
    cosine: f64,
    sine: f64,
}

/// The rotation that makes two columns orthogonal; none where they are already.
fn rotation(
    matrix: &DMatrix<f64>,
    first: usize,
    second: usize,
    orthogonal: f64,
) -> Option<Rotation> {
    let (a, b) = (column(matrix, first), column(matrix, second));
    let (aa, bb, ab) = (dot(a, a), dot(b, b), dot(a, b));
    if ab.abs() <= orthogonal * aa.sqrt() * bb.sqrt() {
        return None;
    }
    let zeta = (bb - aa) / (2.0 * ab);
    let tangent = 1.0_f64.copysign(zeta) / (zeta.abs() + zeta.hypot(1.0));
    let cosine = 1.0 / tangent.hypot(1.0);
    Some(Rotation { cosine, sine: cosine * tangent })
}

fn column(matrix: &DMatrix<f64>, index: usize) -> &[f64] {
    let rows = matrix.nrows();
    matrix.as_slice().get(index * rows..(index + 1) * rows).unwrap_or_default()
}

impl Rotation {
    fn apply(&self, matrix: &mut DMatrix<f64>, first: usize, second: usize) {
        let rows = matrix.nrows();
        let (head, tail) = matrix.as_mut_slice().split_at_mut(second * rows);
        let a = head.iter_mut().skip(first * rows).take(rows);
        for (a, b) in a.zip(tail) {
            (*a, *b) = (self.cosine * *a - self.sine * *b, self.sine * *a + self.cosine * *b);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Numbers without pattern in -1..1, the same in every run.
    fn scattered(rows: usize, columns: usize) -> DMatrix<f64> {
        DMatrix::from_fn(rows, columns, |i, j| ((i * columns + j + 1) as f64 * 78.233).sin())
    }

    #[test]
    fn values_and_vectors_reproduce_the_matrix() {
        for (rows, columns) in [(1, 1), (1, 5), (5, 1), (7, 7), (20, 6), (6, 20), (40, 33)] {
            let matrix = scattered(rows, columns);
            let found = singular(&matrix);
            let count = rows.min(columns);
            assert_eq!((found.values.len(), found.right.ncols()), (count, count));
            assert!(found.values.windows(2).all(|pair| pair[0] >= pair[1]));
            let identity = DMatrix::identity(count, count);
            assert!((found.right.tr_mul(&found.right) - identity).amax() < 1e-14);
            let squares = DMatrix::from_diagonal(&nalgebra::DVector::from_iterator(
                count,
                found.values.iter().map(|value| value * value),
            ));
            let rebuilt = &found.right * squares * found.right.transpose();
            assert!((rebuilt - matrix.tr_mul(&matrix)).amax() < 1e-13, "{rows} x {columns}");
        }
    }

    #[test]
    fn a_matrix_of_zeros_has_zero_values_and_still_orthonormal_vectors() {
        for (rows, columns) in [(3, 2), (2, 3)] {
            let found = singular(&DMatrix::zeros(rows, columns));
            assert_eq!(found.values, [0.0, 0.0]);
            assert!((found.right.tr_mul(&found.right) - DMatrix::identity(2, 2)).amax() < 1e-15);
        }
    }

    #[test]
    fn a_small_value_beside_a_large_one_keeps_its_digits() {
        let matrix = DMatrix::from_row_slice(3, 2, &[1e9, 0.0, 0.0, 3.0, 1e9, 4.0]);
        let found = singular(&matrix);
        // The product of the values is the square root of det(A'A) = 2e18 * 25 - 16e18.
        let product = found.values.iter().product::<f64>();
        let exact = 34.0_f64.sqrt() * 1e9;
        assert!((product / exact - 1.0).abs() < 4e-16, "{product}");
    }
}
