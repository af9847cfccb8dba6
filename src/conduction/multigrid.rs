//! A multigrid preconditioner for symmetric nine-point matrices with wildly varying entries.
//!
//! Every second line of unknowns makes the next coarser level, down to one line (semicoarsening). Lines of one parity
//! are relaxed together, each by its own tridiagonal solve (zebra line relaxation), so stretched cells do no harm. A fine
//! line is interpolated from the two coarse lines beside it with weights that the matrix itself gives, collapsed to one
//! weight an unknown; the coarse matrix is the Galerkin product, which keeps nine points. After Schaffer, SIAM J. Sci.
//! Comput. 20 (1998) 228, and Dendy, J. Comput. Phys. 48 (1982) 366. Departure: the fine lines are relaxed last before
//! restriction and first after correction, so their residual is zero and the weights enter only the Galerkin product.
//!
//! The cycle is symmetric (coarse, fine, descend, fine, coarse), so it can precondition conjugate gradients.

use super::stencil::{PARALLEL_FROM, Stencil};
use super::tridiagonal::{LineFactors, solve_lines};
use rayon::prelude::*;

/// Lines solved together: hides the latency of the recurrence of each.
const LINES_TOGETHER: usize = 4;

/// Lines of one parity on one level: unknowns, right-hand side, and the factors of their tridiagonal matrices.
struct Lines {
    count: usize,
    unknowns: Vec<f64>,
    right_hand_side: Vec<f64>,
    factors: LineFactors,
}

struct Level {
    matrix: Stencil,
    /// Lines 0, 2, 4 …, which the next level keeps.
    coarse: Lines,
    /// Lines 1, 3, 5 …
    fine: Lines,
}

/// The preconditioner of one matrix.
pub(super) struct Multigrid {
    levels: Vec<Level>,
}

impl Multigrid {
    /// Builds every level of `matrix`.
    pub(super) fn new(matrix: Stencil) -> Self {
        let mut levels = Vec::new();
        let mut next = Some(matrix);
        while let Some(matrix) = next {
            let factors_of = |first: usize| {
                let lines: Vec<usize> = (first..matrix.lines).step_by(2).collect();
                let factors = LineFactors::new(&matrix, &lines);
                let zeros = || vec![0.0; matrix.width * lines.len()];
                Lines { count: lines.len(), unknowns: zeros(), right_hand_side: zeros(), factors }
            };
            let (coarse, fine) = (factors_of(0), factors_of(1));
            next = (matrix.lines > 1).then(|| super::galerkin::coarsen(&matrix, &fine.factors));
            levels.push(Level { matrix, coarse, fine });
        }
        Self { levels }
    }

    /// The matrix it was built for.
    pub(super) fn matrix(&self) -> &Stencil {
        &self.levels[0].matrix
    }

    /// One cycle from zero: `out` approximates the solution for `right_hand_side`.
    pub(super) fn apply(&mut self, right_hand_side: &[f64], out: &mut [f64]) {
        let width = self.levels[0].matrix.width;
        let top = &mut self.levels[0];
        for (k, line) in right_hand_side.chunks(width).enumerate() {
            let lines = if k % 2 == 0 { &mut top.coarse } else { &mut top.fine };
            lines.right_hand_side[(k / 2) * width..][..width].copy_from_slice(line);
        }
        cycle(&mut self.levels);
        let top = &self.levels[0];
        for (k, line) in out.chunks_mut(width).enumerate() {
            let lines = if k % 2 == 0 { &top.coarse } else { &top.fine };
            line.copy_from_slice(&lines.unknowns[(k / 2) * width..][..width]);
        }
    }
}

fn cycle(levels: &mut [Level]) {
    let Some((level, rest)) = levels.split_first_mut() else { return };
    level.relax_coarse(false);
    if level.fine.count == 0 {
        return;
    }
    level.relax_fine();
    if let Some(next) = rest.first_mut() {
        level.restrict_to(next);
    }
    cycle(rest);
    if let Some(next) = rest.first() {
        level.correct_from(next);
    }
    level.relax_fine();
    level.relax_coarse(true);
}

impl Level {
    /// Solves every fine line for the present coarse ones.
    fn relax_fine(&mut self) {
        let (matrix, coarse, fine) = (&self.matrix, &self.coarse, &mut self.fine);
        let width = matrix.width;
        let load = |k: usize, line: &mut [f64]| {
            matrix.add_below(line, 2 * k * width, &coarse.unknowns[k * width..][..width], -1.0);
            if k + 1 < coarse.count {
                let above = &coarse.unknowns[(k + 1) * width..][..width];
                matrix.add_above(line, (2 * k + 1) * width, above, -1.0);
            }
        };
        relax(fine, width, load);
    }

    /// Solves every coarse line, for the present fine ones or (`coupled` false) for fine ones of zero.
    fn relax_coarse(&mut self, coupled: bool) {
        let (matrix, coarse, fine) = (&self.matrix, &mut self.coarse, &self.fine);
        let width = matrix.width;
        let load = |k: usize, line: &mut [f64]| {
            if coupled {
                subtract_fine(matrix, fine, k, line);
            }
        };
        relax(coarse, width, load);
    }

    /// The residual of the coarse lines becomes the next level's right-hand side. As they were solved for fine lines of
    /// zero, what is left is the effect of the fine lines alone.
    fn restrict_to(&self, next: &mut Level) {
        let width = self.matrix.width;
        for (parity, lines) in [&mut next.coarse, &mut next.fine].into_iter().enumerate() {
            let line = |(k, out): (usize, &mut [f64])| {
                out.fill(0.0);
                subtract_fine(&self.matrix, &self.fine, 2 * k + parity, out);
            };
            for_each_chunk(&mut lines.right_hand_side, width, 1, line);
        }
    }

    fn correct_from(&mut self, next: &Level) {
        let width = self.matrix.width;
        for (k, line) in self.coarse.unknowns.chunks_mut(width).enumerate() {
            let lines = if k % 2 == 0 { &next.coarse } else { &next.fine };
            let correction = &lines.unknowns[(k / 2) * width..][..width];
            for (value, change) in line.iter_mut().zip(correction) {
                *value += change;
            }
        }
    }
}

/// Subtracts the effect of the fine lines on coarse line `k` from `out`.
fn subtract_fine(matrix: &Stencil, fine: &Lines, k: usize, out: &mut [f64]) {
    let width = matrix.width;
    if k < fine.count {
        matrix.add_above(out, 2 * k * width, &fine.unknowns[k * width..][..width], -1.0);
    }
    if k > 0 {
        matrix.add_below(out, (2 * k - 1) * width, &fine.unknowns[(k - 1) * width..][..width], -1.0);
    }
}

/// Sets every line to its right-hand side, lets `load` subtract the neighbours, and solves.
fn relax(lines: &mut Lines, width: usize, load: impl Fn(usize, &mut [f64]) + Sync) {
    let (right_hand_side, factors) = (&lines.right_hand_side, &lines.factors);
    let group = |(group, chunk): (usize, &mut [f64])| {
        let at = group * LINES_TOGETHER * width;
        chunk.copy_from_slice(&right_hand_side[at..at + chunk.len()]);
        for (k, line) in chunk.chunks_mut(width).enumerate() {
            load(group * LINES_TOGETHER + k, line);
        }
        solve_lines(factors, at, chunk, width);
    };
    for_each_chunk(&mut lines.unknowns, width, LINES_TOGETHER, group);
}

fn for_each_chunk(values: &mut [f64], width: usize, lines: usize, work: impl Fn((usize, &mut [f64])) + Sync + Send) {
    if values.len() >= PARALLEL_FROM / 2 {
        let least = (4096 / (lines * width)).max(1);
        values.par_chunks_mut(lines * width).with_min_len(least).enumerate().for_each(work);
    } else {
        values.chunks_mut(lines * width).enumerate().for_each(work);
    }
}
