//! The coarse matrix of the multigrid: weights from the matrix itself, then the Galerkin product.

use super::stencil::Stencil;
use super::tridiagonal::LineFactors;

/// How each unknown of a fine line is made from the coarse lines beside it.
struct Weights {
    below: Vec<f64>,
    above: Vec<f64>,
}

/// The Galerkin product on lines 0, 2, 4 … of `matrix`; `fine` are the factors of lines 1, 3, 5 …
pub(super) fn coarsen(matrix: &Stencil, fine: &LineFactors) -> Stencil {
    let width = matrix.width;
    let mut coarse = Stencil::nine_point([width, matrix.lines.div_ceil(2)]);
    for k in 0..coarse.lines {
        let own = 2 * k * width;
        coarse.centre[k * width..][..width].copy_from_slice(&matrix.centre[own..][..width]);
        coarse.east[k * width..][..width].copy_from_slice(&matrix.east[own..][..width]);
    }
    for k in 0..matrix.lines / 2 {
        let weights = weights(matrix, fine, k);
        let below = Coarse::below(matrix, k);
        fold_into_lower(&mut coarse, &below, &weights.below, k);
        if 2 * k + 2 < matrix.lines {
            let above = Coarse::above(matrix, k);
            fold_into_upper(&mut coarse, &above, &weights.above, k);
            couple(&mut coarse, &below, &above, &weights, k);
        }
    }
    coarse
}

/// Entries around fine line 2k + 1 as the Galerkin product needs them: its own, and those to one coarse line.
struct Coarse<'a> {
    centre: &'a [f64],
    east: &'a [f64],
    straight: &'a [f64],
    /// From the lower line's unknown i to the upper line's i + 1; empty without diagonals.
    rising: &'a [f64],
    /// From the lower line's unknown i to the upper line's i − 1; empty without diagonals.
    falling: &'a [f64],
}

impl<'a> Coarse<'a> {
    fn new(matrix: &'a Stencil, fine_line: usize, lower_line: usize) -> Self {
        let width = matrix.width;
        let line = |entries: &'a [f64], line: usize| &entries[line * width..][..width];
        let diagonal = |entries: &'a [f64]| if entries.is_empty() { entries } else { line(entries, lower_line) };
        Self {
            centre: line(&matrix.centre, fine_line),
            east: line(&matrix.east, fine_line),
            straight: line(&matrix.north, lower_line),
            rising: diagonal(&matrix.north_east),
            falling: diagonal(&matrix.north_west),
        }
    }

    fn below(matrix: &'a Stencil, k: usize) -> Self {
        Self::new(matrix, 2 * k + 1, 2 * k)
    }

    fn above(matrix: &'a Stencil, k: usize) -> Self {
        Self::new(matrix, 2 * k + 1, 2 * k + 1)
    }

    fn rising(&self, i: usize) -> f64 {
        self.rising.get(i).copied().unwrap_or(0.0)
    }

    fn falling(&self, i: usize) -> f64 {
        self.falling.get(i).copied().unwrap_or(0.0)
    }
}

/// The fine line's answer to a coarse line of ones beside it.
fn weights(matrix: &Stencil, fine: &LineFactors, k: usize) -> Weights {
    let width = matrix.width;
    let ones = vec![1.0; width];
    let mut below = vec![0.0; width];
    matrix.add_below(&mut below, 2 * k * width, &ones, -1.0);
    fine.solve(k, &mut below);
    let mut above = vec![0.0; width];
    if 2 * k + 2 < matrix.lines {
        matrix.add_above(&mut above, (2 * k + 1) * width, &ones, -1.0);
        fine.solve(k, &mut above);
    }
    Weights { below, above }
}

/// What the fine line adds to the coarse line below it.
fn fold_into_lower(coarse: &mut Stencil, entries: &Coarse, w: &[f64], k: usize) {
    let width = coarse.width;
    let centre = &mut coarse.centre[k * width..][..width];
    let east = &mut coarse.east[k * width..][..width];
    for i in 0..width {
        centre[i] += w[i] * (w[i] * entries.centre[i] + 2.0 * entries.straight[i]);
        if i + 1 < width {
            east[i] += w[i] * entries.east[i] * w[i + 1] + w[i] * entries.falling(i + 1) + entries.rising(i) * w[i + 1];
        }
    }
}

/// What the fine line adds to the coarse line above it.
fn fold_into_upper(coarse: &mut Stencil, entries: &Coarse, w: &[f64], k: usize) {
    let width = coarse.width;
    let centre = &mut coarse.centre[(k + 1) * width..][..width];
    let east = &mut coarse.east[(k + 1) * width..][..width];
    for i in 0..width {
        centre[i] += w[i] * (w[i] * entries.centre[i] + 2.0 * entries.straight[i]);
        if i + 1 < width {
            east[i] += w[i] * entries.east[i] * w[i + 1] + w[i] * entries.rising(i) + entries.falling(i + 1) * w[i + 1];
        }
    }
}

/// The coupling that the fine line makes between the coarse lines beside it.
fn couple(coarse: &mut Stencil, below: &Coarse, above: &Coarse, weights: &Weights, k: usize) {
    let width = coarse.width;
    let (w, u) = (&weights.below, &weights.above);
    for i in 0..width {
        let at = k * width + i;
        coarse.north[at] = w[i] * below.centre[i] * u[i] + below.straight[i] * u[i] + w[i] * above.straight[i];
        if i + 1 < width {
            coarse.north_east[at] =
                w[i] * below.east[i] * u[i + 1] + below.rising(i) * u[i + 1] + w[i] * above.rising(i);
        }
        if i > 0 {
            coarse.north_west[at] =
                w[i] * below.east[i - 1] * u[i - 1] + below.falling(i) * u[i - 1] + w[i] * above.falling(i);
        }
    }
}
