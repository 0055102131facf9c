//! Triangular factors by Householder reflections (Householder 1958, Journal of the ACM 5; Golub &
//! Van Loan, Matrix Computations).

use nalgebra::DMatrix;

use super::sum::dot;

/// The upper triangular factor R of a matrix A = QR, built from blocks of rows: only R and one block
/// are in memory, so the rows may come from anywhere.
#[derive(Clone, Debug)]
pub(crate) struct RowFactor {
    factor: DMatrix<f64>,
}

impl RowFactor {
    /// The factor of no rows yet.
    pub(crate) fn new(columns: usize) -> Self {
        RowFactor { factor: DMatrix::zeros(columns, columns) }
    }

    /// Folds more rows in: reflections of the factor stacked on the block annihilate the block.
    #[allow(clippy::indexing_slicing, reason = "rows and columns come from the matrix itself")]
    pub(crate) fn fold(&mut self, mut block: DMatrix<f64>) {
        let rows = block.nrows();
        if rows == 0 {
            return;
        }
        let mut rest = block.as_mut_slice();
        for j in 0..self.factor.ncols() {
            let (column, later) = rest.split_at_mut(rows);
            rest = later;
            let below = dot(column, column);
            if below == 0.0 {
                continue;
            }
            let diagonal = self.factor[(j, j)];
            let reflected = -diagonal.hypot(below.sqrt()).copysign(diagonal);
            // The reflector is (head, column) in row j of the factor and the rows of the block.
            let head = diagonal - reflected;
            let half_square = -reflected * head;
            self.factor[(j, j)] = reflected;
            for (other, l) in rest.chunks_exact_mut(rows).zip(j + 1..) {
                let above = self.factor[(j, l)];
                let multiple = (head * above + dot(column, other)) / half_square;
                self.factor[(j, l)] = above - multiple * head;
                other.iter_mut().zip(column.iter()).for_each(|(y, x)| *y -= multiple * x);
            }
        }
    }

    /// R, p x p; its diagonal may have either sign.
    pub(crate) fn into_factor(self) -> DMatrix<f64> {
        self.factor
    }
}

/// A factor with its columns in the order in which they were chosen: at every step the column with
/// the largest part outside the span of those before it (Businger & Golub 1965, Numerische
/// Mathematik 7).
#[derive(Clone, Debug)]
pub(crate) struct PivotedFactor {
    /// Which column of the input stands in each place.
    pub(crate) order: Vec<usize>,
    /// R of the reordered columns; the size of a diagonal element is the norm of the part of that
    /// column outside the span of the columns before it.
    pub(crate) factor: DMatrix<f64>,
}

impl PivotedFactor {
    /// Factors a square matrix. Norms are computed anew at every step, because updated ones lose
    /// the small remainders that this factor is asked for.
    pub(crate) fn new(matrix: &DMatrix<f64>) -> Self {
        let columns = matrix.ncols();
        let mut factor = matrix.clone();
        let mut order: Vec<usize> = (0..columns).collect();
        for step in 0..columns {
            let norms = (step..columns).map(|j| factor.view_range(step.., j).norm());
            let first_largest = (step..columns).zip(norms).fold((step, -1.0), |best, candidate| {
                if candidate.1 > best.1 { candidate } else { best }
            });
            factor.swap_columns(step, first_largest.0);
            order.swap(step, first_largest.0);
            annihilate_below(&mut factor, step);
        }
        PivotedFactor { order, factor }
    }
}

/// Reflects the rows from `step` on so that column `step` vanishes below its diagonal.
#[allow(clippy::indexing_slicing, reason = "rows and columns come from the matrix itself")]
fn annihilate_below(matrix: &mut DMatrix<f64>, step: usize) {
    let mut reflector = matrix.view_range(step.., step).clone_owned();
    let norm = reflector.norm();
    if norm == 0.0 {
        return;
    }
    let diagonal = reflector[0];
    let reflected = -norm.copysign(diagonal);
    reflector[0] = diagonal - reflected;
    let half_square = -reflected * reflector[0];
    for j in step + 1..matrix.ncols() {
        let mut other = matrix.view_range_mut(step.., j);
        let multiple = reflector.dot(&other) / half_square;
        other.axpy(-multiple, &reflector, 1.0);
    }
    matrix.view_range_mut(step.., step).fill(0.0);
    matrix[(step, step)] = reflected;
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Numbers without pattern in -1..1, the same in every run.
    fn scattered(rows: usize, columns: usize) -> DMatrix<f64> {
        DMatrix::from_fn(rows, columns, |i, j| ((i * columns + j + 1) as f64 * 12.9898).sin())
    }

    fn largest_difference(a: &DMatrix<f64>, b: &DMatrix<f64>) -> f64 {
        (a - b).amax()
    }

    #[test]
    fn the_factor_reproduces_the_cross_products_whatever_the_blocks() {
        let matrix = scattered(57, 9);
        for block in [1, 4, 9, 10, 56, 57] {
            let mut fold = RowFactor::new(9);
            for start in (0..57).step_by(block) {
                let rows = block.min(57 - start);
                fold.fold(matrix.rows(start, rows).clone_owned());
            }
            let factor = fold.into_factor();
            let difference = largest_difference(&factor.tr_mul(&factor), &matrix.tr_mul(&matrix));
            assert!(difference < 1e-13, "{difference} with blocks of {block}");
        }
    }

    #[test]
    fn the_pivoted_factor_reproduces_the_reordered_matrix_and_its_diagonal_falls() {
        let matrix = scattered(12, 12);
        let pivoted = PivotedFactor::new(&matrix);
        let reordered = matrix.select_columns(&pivoted.order);
        let difference = largest_difference(
            &pivoted.factor.tr_mul(&pivoted.factor),
            &reordered.tr_mul(&reordered),
        );
        assert!(difference < 1e-13, "{difference}");
        let diagonal: Vec<f64> = pivoted.factor.diagonal().iter().map(|x| x.abs()).collect();
        assert!(diagonal.windows(2).all(|pair| pair[0] >= pair[1] * (1.0 - 1e-12)));
    }
}
