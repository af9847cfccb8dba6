//! Steady heat conduction on one grid, from both sides: temperatures that bound the heat flow from above, fluxes that
//! bound it from below, and the gap between them, cell by cell.
//!
//! Conductivities come in as a slice by cell, films as a slice by surface; must not know buildings or Ψ.

mod defect;
mod flux_side;
mod galerkin;
mod gap;
mod gradients;
mod multigrid;
mod problem;
mod solution;
mod stencil;
mod temperature_side;
#[cfg(test)]
mod tests;
mod tridiagonal;

pub use problem::{Film, Problem, Touching};
pub use solution::{Solution, SolveError, solve};
