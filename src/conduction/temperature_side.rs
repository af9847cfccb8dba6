//! The upper side of the bracket: bilinear finite elements on the nodes.
//!
//! Any continuous temperature field gives an upper bound of the heat flow (the minimum of the energy
//! `E(T) = ∫ λ|∇T|² + Σ∫ h (T − T_air)²`); the finite-element solution gives the best one on its grid.

use super::gradients::{self, Convergence};
use super::multigrid::Multigrid;
use super::problem::{Problem, Touching};
use super::stencil::Stencil;
use crate::grid::{Cell, Rectangle};

/// Tolerance of the solve, as the energy of the error over that of the solution, square-rooted: leaves 1e-20 of
/// the coupling, and temperatures to some nine digits.
const TOLERANCE: f64 = 1e-10;

/// Temperatures at the nodes, one field a solved basis problem, between 0 and 1.
#[derive(Clone, Debug)]
pub(super) struct TemperatureSide {
    pub(super) fields: Vec<Vec<f64>>,
    pub(super) touching: Vec<Touching>,
    pub(super) convergence: Vec<Convergence>,
}

/// Solves every basis problem from the fields of `start`, where given.
pub(super) fn solve(problem: &Problem, start: Option<Vec<Vec<f64>>>) -> TemperatureSide {
    let nodes = problem.grid.node_count();
    let mut matrix = Stencil::nine_point(problem.grid.node_lattice());
    let mut loads = vec![vec![0.0; nodes]; problem.solved()];
    for cell in problem.grid.cells() {
        add_conduction(&mut matrix, &cell, problem.conductivity_of(&cell));
        add_films(problem, &mut matrix, &mut loads, &cell);
    }
    let prescribed = problem.prescribed_nodes();
    for &(node, air) in &prescribed.nodes {
        // Where two prescribed temperatures touch, the node takes the mean of both.
        let touching = prescribed.touching.iter().find(|t| t.node == node);
        let share = |k: usize| match touching {
            Some(t) => 0.5 * t.airs.iter().filter(|&&a| a == k).count() as f64,
            None => f64::from(u8::from(air == k)),
        };
        let values: Vec<f64> = (0..problem.solved()).map(share).collect();
        matrix.fix(node.index(), &values, &mut loads);
    }
    matrix.close_empty_rows();
    let mut multigrid = Multigrid::new(matrix);
    let mut fields = start.unwrap_or_else(|| vec![vec![0.0; nodes]; problem.solved()]);
    let convergence = loads
        .iter()
        .zip(&mut fields)
        .map(|(load, field)| gradients::solve(&mut multigrid, load, field, TOLERANCE))
        .collect();
    // Fixed rows are decoupled: set them exactly, so that the field is admissible to the last digit.
    for &(node, _) in &prescribed.nodes {
        for (field, load) in fields.iter_mut().zip(&loads) {
            field[node.index()] = load[node.index()];
        }
    }
    TemperatureSide { fields, touching: prescribed.touching, convergence }
}

/// λ∫∇φ·∇φ of the four bilinear shape functions on an a × b rectangle.
fn add_conduction(matrix: &mut Stencil, cell: &Cell, conductivity: f64) {
    let Rectangle { width_m, height_m, corners, .. } = cell.shape;
    let along_x = conductivity * height_m / width_m / 6.0;
    let along_y = conductivity * width_m / height_m / 6.0;
    let [sw, se, nw, ne] = corners.map(|node| node.index());
    for corner in [sw, se, nw, ne] {
        matrix.add_diagonal(corner, 2.0 * (along_x + along_y));
    }
    matrix.add_coupling(sw, se, along_y - 2.0 * along_x);
    matrix.add_coupling(nw, ne, along_y - 2.0 * along_x);
    matrix.add_coupling(sw, nw, along_x - 2.0 * along_y);
    matrix.add_coupling(se, ne, along_x - 2.0 * along_y);
    matrix.add_coupling(sw, ne, -along_x - along_y);
    matrix.add_coupling(se, nw, -along_x - along_y);
}

/// ∫ h φφ and ∫ h φ T_air on the surfaces of a cell.
fn add_films(problem: &Problem, matrix: &mut Stencil, loads: &mut [Vec<f64>], cell: &Cell) {
    for (face, surface) in cell.shape.surfaces.iter().enumerate() {
        let Some(film) = surface.map(|s| problem.film(s)).filter(|f| f.resistance > 0.0) else { continue };
        let conductance = cell.shape.face_length_m(face) / film.resistance;
        let [first, second] = Rectangle::FACE_CORNERS[face].map(|corner| cell.shape.corners[corner].index());
        matrix.add_diagonal(first, conductance / 3.0);
        matrix.add_diagonal(second, conductance / 3.0);
        matrix.add_coupling(first, second, conductance / 6.0);
        if let Some(load) = loads.get_mut(film.air) {
            load[first] += conductance / 2.0;
            load[second] += conductance / 2.0;
        }
    }
}
