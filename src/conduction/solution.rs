//! Both sides on one grid, and the brackets they give.

use super::flux_side::{self, FluxSide};
use super::gap;
use super::problem::{Problem, Touching};
use super::temperature_side::{self, TemperatureSide};
use crate::grid::{Cell, Grid};
use crate::index::{FaceId, NodeId};
use nalgebra::DMatrix;

/// Upper minus lower side must equal the sum of its local terms to this fraction of both energies. Rounding leaves
/// 1e-15 to 1e-12 on sections from ten to a million cells; a wrong sign or a missing term leaves 1e-3 and more.
const IDENTITY_TOLERANCE: f64 = 1e-10;

/// Sums over the grid carry rounding of about this fraction of the energies; brackets are never claimed narrower.
const ROUNDING: f64 = 1e-12;

/// A solve whose result cannot be used.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum SolveError {
    /// The gap does not equal its local terms: a mistake in this program.
    #[error(
        "internal check failed: upper minus lower side departs from the sum of its local terms by {departure:.2e} of the \
         energy (limit {IDENTITY_TOLERANCE:.0e})"
    )]
    Identity {
        /// The departure, as a fraction of the energies.
        departure: f64,
    },
    /// Numbers ran out of range.
    #[error("the solve ran out of the range of numbers; conductivities, lengths or resistances differ too widely")]
    OutOfRange,
}

/// Both sides of every basis problem on one grid.
#[derive(Clone, Debug)]
pub struct Solution {
    temperature: TemperatureSide,
    flux: FluxSide,
    airs: usize,
    /// Over all airs, symmetric: the upper side's form.
    upper: DMatrix<f64>,
    /// Over all airs, symmetric: the lower side's form, imbalance not yet taken off.
    lower: DMatrix<f64>,
    /// Over all airs: heat that enters from air (row) in basis problem (column).
    inflow: DMatrix<f64>,
    /// By air: Σ |r_c| of its basis problem.
    unbalanced: Vec<f64>,
    /// Largest departure from the gap identity.
    pub identity_error: f64,
}

/// Solves both sides. `start` are nodal temperatures carried over from a coarser grid.
///
/// # Errors
/// If a result is not finite or fails the gap identity.
pub fn solve(problem: &Problem, start: Option<Vec<Vec<f64>>>) -> Result<Solution, SolveError> {
    let temperature = temperature_side::solve(problem, start);
    let flux = flux_side::solve(problem, &temperature.fields);
    let forms = gap::measure(problem, &temperature, &flux);
    let n = problem.solved();
    let mut identity_error: f64 = 0.0;
    for k in 0..n {
        let (energy, dissipation) = (forms.energy[(k, k)], forms.dissipation[(k, k)]);
        let gap = energy + dissipation - 2.0 * forms.inflow[(k, k)];
        // Where prescribed temperatures touch, the field jumps along one edge and the identity does not hold.
        if temperature.touching.is_empty() {
            let scale = energy + dissipation + ROUNDING * flux.conductance[k];
            let departure = (gap - forms.local[k] - forms.imbalance_term[k]).abs() / scale;
            identity_error = identity_error.max(departure);
        }
        if !gap.is_finite() {
            return Err(SolveError::OutOfRange);
        }
    }
    if identity_error > IDENTITY_TOLERANCE {
        return Err(SolveError::Identity { departure: identity_error });
    }
    let inflow = DMatrix::from_fn(problem.airs, problem.airs, |i, j| {
        if j < n { forms.inflow[(i, j)] } else { -(0..n).map(|k| forms.inflow[(i, k)]).sum::<f64>() }
    });
    let dissipation = over_all_airs(&forms.dissipation);
    let lower =
        DMatrix::from_fn(problem.airs, problem.airs, |i, j| inflow[(i, j)] + inflow[(j, i)] - dissipation[(i, j)]);
    let mut unbalanced: Vec<f64> = flux.imbalance.iter().map(|r| r.iter().map(|r| r.abs()).sum()).collect();
    unbalanced
        .push((0..problem.grid.cell_count()).map(|c| flux.imbalance.iter().map(|r| r[c]).sum::<f64>().abs()).sum());
    let upper = over_all_airs(&forms.energy);
    Ok(Solution { temperature, flux, airs: problem.airs, upper, lower, inflow, unbalanced, identity_error })
}

/// A form over all airs from the lower half of that over the solved ones: together they make a uniform state, for
/// which the form is zero.
fn over_all_airs(solved: &DMatrix<f64>) -> DMatrix<f64> {
    let n = solved.nrows();
    let full = |i: usize, j: usize| solved[(i.max(j), i.min(j))];
    let row = |i: usize| (0..n).map(|k| full(i, k)).sum::<f64>();
    DMatrix::from_fn(n + 1, n + 1, |i, j| match (i < n, j < n) {
        (true, true) => full(i, j),
        (true, false) => -row(i),
        (false, true) => -row(j),
        (false, false) => (0..n).map(row).sum(),
    })
}

impl Solution {
    /// Lower and upper bound of the coupling coefficient between two airs, W/(m·K).
    ///
    /// `L_ij = ¼ (E(s e_i − e_j/s) − E(s e_i + e_j/s))`; with each exact E between its two sides, the middle does not
    /// depend on s and the half-width is `¼ (s² g_i + g_j/s²)`, narrowest for `s⁴ = g_j/g_i`: `½ √(g_i g_j)`. In the
    /// field for `s e_i ± e_j/s` temperatures stay within ± max(s, 1/s), so what the solver left unbalanced there costs
    /// at most `2 max(s, 1/s) (s ρ_i + ρ_j/s)` with ρ = Σ |r_c|.
    ///
    /// # Panics
    /// If `i == j`, or either is not an air of the problem.
    pub fn bracket(&self, i: usize, j: usize) -> [f64; 2] {
        assert!(i != j && i < self.airs && j < self.airs, "airs {i} and {j} of {}", self.airs);
        let (i, j) = (i.min(j), i.max(j));
        let middle = -0.5 * (self.upper[(i, j)] + self.lower[(i, j)]);
        let (gap_i, gap_j) = (self.gap(i), self.gap(j));
        let weight = |air: usize, gap: f64| gap + 2.0 * self.unbalanced[air];
        let s = (weight(j, gap_j) / weight(i, gap_i)).powf(0.25);
        let s = if s.is_finite() && s > 0.0 { s } else { 1.0 };
        let unbalanced = 2.0 * s.max(1.0 / s) * (s * self.unbalanced[i] + self.unbalanced[j] / s);
        let half_width = 0.25 * (s * s * gap_i + gap_j / (s * s) + unbalanced);
        [middle - half_width, middle + half_width]
    }

    /// Upper minus lower side of the heat flow out of an air, at least its rounding, W/(m·K).
    pub fn gap(&self, air: usize) -> f64 {
        let upper = self.upper[(air, air)];
        (upper - self.lower[(air, air)]).max(ROUNDING * upper)
    }

    /// The upper side of the heat flow out of an air at 1, the others at 0: the energy of its temperature field.
    pub fn upper_side(&self, air: usize) -> f64 {
        self.upper[(air, air)]
    }

    /// The finite-volume heat flow out of an air at 1, the others at 0: also a lower bound, a little lower than that of
    /// the bracket.
    pub fn finite_volume_heat_flow(&self, air: usize) -> f64 {
        self.inflow[(air, air)]
    }

    /// Conductance of all half cells and films of the solved airs, W/(m·K): what rounding is measured by.
    pub fn largest_conductance(&self) -> f64 {
        self.flux.conductance.iter().copied().fold(0.0, f64::max)
    }

    /// Places where prescribed temperatures of two airs touch; couplings of these airs are infinite.
    pub fn touching(&self) -> &[Touching] {
        &self.temperature.touching
    }

    /// Iterations of the temperature side and of the flux side, over all basis problems.
    pub fn iterations(&self) -> [usize; 2] {
        [&self.temperature.convergence, &self.flux.convergence].map(|c| c.iter().map(|c| c.iterations).sum())
    }

    /// By cell, the sum over airs of `weights[air]` × its gap there, as `[cured by splitting along x, along y]`.
    ///
    /// # Panics
    /// If there is not one weight an air.
    pub fn cures(&self, problem: &Problem, weights: &[f64]) -> Vec<[f64; 2]> {
        assert_eq!(weights.len(), self.airs, "one weight an air");
        gap::cures(problem, &self.temperature, &self.flux, weights)
    }

    /// Nodal temperatures of the solved basis problems, for a start on a finer grid.
    pub fn nodal(&self) -> &[Vec<f64>] {
        &self.temperature.fields
    }

    /// The temperature at a node when air k is at `airs[k]`.
    ///
    /// # Panics
    /// If there is not one temperature an air.
    pub fn temperature(&self, node: NodeId, airs: &[f64]) -> f64 {
        let last = self.last(airs);
        let rise = |k: usize| (airs[k] - last) * self.temperature.fields[k][node.index()];
        last + (0..self.airs - 1).map(rise).sum::<f64>()
    }

    /// The flux density on a face, positive along the axis, W/m², when air k is at `airs[k]`.
    ///
    /// # Panics
    /// If there is not one temperature an air.
    pub fn flux(&self, face: FaceId, airs: &[f64]) -> f64 {
        let last = self.last(airs);
        (0..self.airs - 1).map(|k| (airs[k] - last) * self.flux.fields[k][face.index()]).sum()
    }

    fn last(&self, airs: &[f64]) -> f64 {
        assert_eq!(airs.len(), self.airs, "one temperature an air");
        airs[self.airs - 1]
    }

    /// How couplings respond to the conductivity of each group of cells: by group, `∂L_ij/∂λ` for every pair of airs.
    ///
    /// It is `−∫ ∇T_i·∇T_j` over the group, as the energy is stationary: no further solve, and one sweep for all pairs.
    pub fn responses(&self, grid: &Grid, groups: usize, group_of: impl Fn(&Cell) -> usize) -> Vec<DMatrix<f64>> {
        let products = gap::gradient_products(grid, &self.temperature, &self.flux, groups, group_of);
        products.iter().map(|product| -over_all_airs(product)).collect()
    }
}
