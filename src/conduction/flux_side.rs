//! The lower side of the bracket: cell-centred finite volumes with series resistances between cell centres, which is
//! the lowest-order Raviart–Thomas method with lumped quadrature.
//!
//! Any flux field without sources that leaves cut planes alone gives a lower bound of the heat flow (the maximum of
//! `C(q) = 2 Σ∫ T_air q_in − ∫ |q|²/λ − Σ∫ R q_in²`). Fluxes are kept per face, positive along the axis; what a solver
//! leaves unbalanced in a cell is kept too, as it counts to first order.

use super::gradients::{self, Convergence};
use super::multigrid::Multigrid;
use super::problem::Problem;
use super::stencil::Stencil;
use crate::grid::{Face, FaceSides};

/// Tolerance of the solve; see [`super::temperature_side`]. What it leaves unbalanced widens the bracket.
const TOLERANCE: f64 = 1e-11;

/// Flux densities on the faces, W/m² per kelvin, one field a solved basis problem.
#[derive(Clone, Debug)]
pub(super) struct FluxSide {
    /// By face, positive along the axis; adiabatic faces stay 0.
    pub(super) fields: Vec<Vec<f64>>,
    /// By cell: heat that leaves the cell without having entered it, W/m per kelvin.
    pub(super) imbalance: Vec<Vec<f64>>,
    /// Conductance of all half cells and films to the air at 1, W/(m·K): what rounding is measured by where no heat flows.
    pub(super) conductance: Vec<f64>,
    pub(super) convergence: Vec<Convergence>,
}

/// Solves every basis problem, from the means of the nodal temperatures in each cell.
pub(super) fn solve(problem: &Problem, nodal: &[Vec<f64>]) -> FluxSide {
    let cells = problem.grid.cell_count();
    let mut matrix = Stencil::five_point(problem.grid.cell_lattice());
    let mut loads = vec![vec![0.0; cells]; problem.solved()];
    for face in problem.grid.faces() {
        let conductance = face.length_m / resistance(problem, &face);
        match face.sides {
            FaceSides::Cells { cells: [a, b], .. } => {
                matrix.add_diagonal(a.index(), conductance);
                matrix.add_diagonal(b.index(), conductance);
                matrix.add_coupling(a.index(), b.index(), -conductance);
            }
            FaceSides::Surface { cell, surface, .. } => {
                matrix.add_diagonal(cell.index(), conductance);
                if let Some(load) = loads.get_mut(problem.film(surface).air) {
                    load[cell.index()] += conductance;
                }
            }
        }
    }
    matrix.close_empty_rows();
    let mut multigrid = Multigrid::new(matrix);
    let conductance = loads.iter().map(|load| load.iter().sum()).collect();
    let mut side = FluxSide { fields: Vec::new(), imbalance: Vec::new(), conductance, convergence: Vec::new() };
    for (basis, (load, nodal)) in loads.iter().zip(nodal).enumerate() {
        let mut temperature = cell_means(problem, nodal);
        side.convergence.push(gradients::solve(&mut multigrid, load, &mut temperature, TOLERANCE));
        let (flux, imbalance) = fluxes(problem, basis, &temperature);
        side.fields.push(flux);
        side.imbalance.push(imbalance);
    }
    side
}

/// Resistance between what lies on the two sides of a face, m²K/W.
fn resistance(problem: &Problem, face: &Face) -> f64 {
    match face.sides {
        FaceSides::Cells { cells: [a, b], half_m: [half_a, half_b] } => {
            half_a / problem.conductivity[a.index()] + half_b / problem.conductivity[b.index()]
        }
        FaceSides::Surface { cell, half_m, surface, .. } => {
            half_m / problem.conductivity[cell.index()] + problem.film(surface).resistance
        }
    }
}

fn cell_means(problem: &Problem, nodal: &[f64]) -> Vec<f64> {
    let mut means = vec![0.0; problem.grid.cell_count()];
    for cell in problem.grid.cells() {
        means[cell.id.index()] = 0.25 * cell.shape.corners.iter().map(|n| nodal[n.index()]).sum::<f64>();
    }
    means
}

fn fluxes(problem: &Problem, basis: usize, temperature: &[f64]) -> (Vec<f64>, Vec<f64>) {
    let mut flux = vec![0.0; problem.grid.face_count()];
    let mut imbalance = vec![0.0; temperature.len()];
    for face in problem.grid.faces() {
        let resistance = resistance(problem, &face);
        match face.sides {
            FaceSides::Cells { cells: [a, b], .. } => {
                let density = (temperature[a.index()] - temperature[b.index()]) / resistance;
                flux[face.id.index()] = density;
                imbalance[a.index()] += density * face.length_m;
                imbalance[b.index()] -= density * face.length_m;
            }
            FaceSides::Surface { cell, surface, inward, .. } => {
                let air = problem.film(surface).temperature_in(basis);
                let entering = (air - temperature[cell.index()]) / resistance;
                flux[face.id.index()] = inward * entering;
                imbalance[cell.index()] -= entering * face.length_m;
            }
        }
    }
    (flux, imbalance)
}
