//! Tridiagonal solves along lines of a matrix, factored once.

use super::stencil::Stencil;

/// Factors of the tridiagonal matrices of some lines, line after line.
pub(super) struct LineFactors {
    /// Multiplier from each unknown's predecessor.
    multiplier: Vec<f64>,
    /// Inverse of each pivot.
    inverse_pivot: Vec<f64>,
}

impl LineFactors {
    /// Factors the given lines of `matrix`, in this order.
    pub(super) fn new(matrix: &Stencil, lines: &[usize]) -> Self {
        let width = matrix.width;
        let mut multiplier = Vec::with_capacity(width * lines.len());
        let mut inverse_pivot = Vec::with_capacity(width * lines.len());
        for line in lines {
            let centre = &matrix.centre[line * width..][..width];
            let east = &matrix.east[line * width..][..width];
            let mut pivot = centre[0];
            multiplier.push(0.0);
            inverse_pivot.push(1.0 / pivot);
            for i in 1..width {
                let factor = east[i - 1] / pivot;
                pivot = centre[i] - east[i - 1] * factor;
                multiplier.push(factor);
                inverse_pivot.push(1.0 / pivot);
            }
        }
        Self { multiplier, inverse_pivot }
    }

    /// Solves line `line` of the factored ones in place.
    pub(super) fn solve(&self, line: usize, values: &mut [f64]) {
        let width = values.len();
        solve_one(&self.multiplier[line * width..][..width], &self.inverse_pivot[line * width..][..width], values);
    }
}

/// Solves the lines in `chunk` in place; the first one's factors start at `at`.
pub(super) fn solve_lines(factors: &LineFactors, at: usize, chunk: &mut [f64], width: usize) {
    let multiplier = &factors.multiplier[at..at + chunk.len()];
    let inverse = &factors.inverse_pivot[at..at + chunk.len()];
    if chunk.len() == 4 * width {
        solve_four(multiplier, inverse, chunk, width);
        return;
    }
    for ((values, multiplier), inverse) in
        chunk.chunks_mut(width).zip(multiplier.chunks(width)).zip(inverse.chunks(width))
    {
        solve_one(multiplier, inverse, values);
    }
}

fn solve_one(multiplier: &[f64], inverse: &[f64], values: &mut [f64]) {
    let last = values.len() - 1;
    for i in 1..=last {
        values[i] -= multiplier[i] * values[i - 1];
    }
    values[last] *= inverse[last];
    for i in (0..last).rev() {
        values[i] = values[i] * inverse[i] - multiplier[i + 1] * values[i + 1];
    }
}

/// Four lines side by side, so that the four recurrences overlap.
fn solve_four(multiplier: &[f64], inverse: &[f64], values: &mut [f64], width: usize) {
    let m: [&[f64]; 4] = std::array::from_fn(|k| &multiplier[k * width..][..width]);
    let d: [&[f64]; 4] = std::array::from_fn(|k| &inverse[k * width..][..width]);
    let (lower, upper) = values.split_at_mut(2 * width);
    let (a, b) = lower.split_at_mut(width);
    let (c, e) = upper.split_at_mut(width);
    let (a, b, c, e) = (&mut a[..width], &mut b[..width], &mut c[..width], &mut e[..width]);
    let mut before = [a[0], b[0], c[0], e[0]];
    for i in 1..width {
        before = [
            a[i] - m[0][i] * before[0],
            b[i] - m[1][i] * before[1],
            c[i] - m[2][i] * before[2],
            e[i] - m[3][i] * before[3],
        ];
        [a[i], b[i], c[i], e[i]] = before;
    }
    let last = width - 1;
    let mut after = [a[last] * d[0][last], b[last] * d[1][last], c[last] * d[2][last], e[last] * d[3][last]];
    [a[last], b[last], c[last], e[last]] = after;
    for i in (0..last).rev() {
        after = [
            a[i] * d[0][i] - m[0][i + 1] * after[0],
            b[i] * d[1][i] - m[1][i + 1] * after[1],
            c[i] * d[2][i] - m[2][i + 1] * after[2],
            e[i] * d[3][i] - m[3][i + 1] * after[3],
        ];
        [a[i], b[i], c[i], e[i]] = after;
    }
}
