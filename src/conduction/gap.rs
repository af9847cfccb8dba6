//! Energies of both sides, the gap between them, and where it lies.
//!
//! For any admissible pair of a temperature field T and a flux field q (Prager and Synge, Q. Appl. Math. 5, 1947),
//!
//! `E(T) − C(q) = ∫ |q + λ∇T|²/λ + Σ∫ (q_in − h(T_air − T))²/h + 2 Σ T̄_c r_c`,
//!
//! with r_c the heat that leaves cell c without having entered it and T̄_c the mean of T there. The terms on the right
//! are formed apart from the energies on the left, so that the identity checks the whole calculation on every solve.

use super::defect::{CellFields, Cure, Defect, mean_product};
use super::flux_side::FluxSide;
use super::problem::Problem;
use super::stencil::PARALLEL_FROM;
use super::temperature_side::TemperatureSide;
use crate::grid::{Cell, Grid};
use nalgebra::DMatrix;
use rayon::prelude::*;

/// Bilinear forms of both sides over the solved basis problems; of symmetric ones, only the lower half is filled.
pub(super) struct Forms {
    /// `∫ λ∇T_i·∇T_j + Σ∫ h (T_i − δ_i)(T_j − δ_j)`, W/(m·K).
    pub(super) energy: DMatrix<f64>,
    /// `∫ q_i·q_j/λ + Σ∫ R q_i q_j`, W/(m·K).
    pub(super) dissipation: DMatrix<f64>,
    /// Row: every air; column: solved basis problem. Heat that enters from the air in that problem, W/(m·K).
    pub(super) inflow: DMatrix<f64>,
    /// Sum of the local terms of each solved basis problem, the imbalance left out.
    pub(super) local: Vec<f64>,
    /// `2 Σ T̄_c r_c` of each solved basis problem.
    pub(super) imbalance_term: Vec<f64>,
}

impl Forms {
    fn new(problem: &Problem) -> Self {
        let n = problem.solved();
        Self {
            energy: DMatrix::zeros(n, n),
            dissipation: DMatrix::zeros(n, n),
            inflow: DMatrix::zeros(problem.airs, n),
            local: vec![0.0; n],
            imbalance_term: vec![0.0; n],
        }
    }

    fn add(&mut self, other: &Self) {
        self.energy += &other.energy;
        self.dissipation += &other.dissipation;
        self.inflow += &other.inflow;
        for k in 0..self.local.len() {
            self.local[k] += other.local[k];
            self.imbalance_term[k] += other.imbalance_term[k];
        }
    }

    fn add_cell(&mut self, problem: &Problem, cell: &Cell, fields: &[CellFields]) {
        let conductivity = problem.conductivity_of(cell);
        let area = cell.shape.width_m * cell.shape.height_m;
        for (i, a) in fields.iter().enumerate() {
            for (j, b) in fields[..=i].iter().enumerate() {
                self.energy[(i, j)] += conductivity * area * a.gradient_product(b);
                self.dissipation[(i, j)] += area / conductivity * a.flux_product(b);
            }
        }
        for (face, surface) in cell.shape.surfaces.iter().enumerate() {
            let Some(surface) = *surface else { continue };
            let film = problem.film(surface);
            let length = cell.shape.face_length_m(face);
            for (i, a) in fields.iter().enumerate() {
                self.inflow[(film.air, i)] += length * a.entering(face);
                for (j, b) in fields[..=i].iter().enumerate() {
                    self.dissipation[(i, j)] += length * film.resistance * a.entering(face) * b.entering(face);
                    if film.resistance > 0.0 {
                        let a = a.above_air(face, film.temperature_in(i));
                        let b = b.above_air(face, film.temperature_in(j));
                        self.energy[(i, j)] += length / film.resistance * mean_product(a, b);
                    }
                }
            }
        }
    }
}

/// Every integral over the grid. The same digits on any number of threads.
pub(super) fn measure(problem: &Problem, temperature: &TemperatureSide, flux: &FluxSide) -> Forms {
    let batch = |batch: usize| {
        let mut forms = Forms::new(problem);
        let mut fields = vec![CellFields::default(); problem.solved()];
        for cell in problem.grid.batch(batch) {
            for (k, field) in fields.iter_mut().enumerate() {
                *field = CellFields::read(&cell, &temperature.fields[k], &flux.fields[k]);
                forms.imbalance_term[k] += 2.0 * field.mean() * flux.imbalance[k][cell.id.index()];
                forms.local[k] += Defect::of(problem, &cell, field, k).term();
            }
            forms.add_cell(problem, &cell, &fields);
        }
        forms
    };
    let parts: Vec<Forms> = if problem.grid.cell_count() >= PARALLEL_FROM {
        (0..problem.grid.batches()).into_par_iter().map(batch).collect()
    } else {
        (0..problem.grid.batches()).map(batch).collect()
    };
    let mut total = Forms::new(problem);
    for part in &parts {
        total.add(part);
    }
    total
}

/// By cell, the sum over all airs of `weights[air]` × that air's gap there, by the direction of splitting that cures it.
pub(super) fn cures(problem: &Problem, temperature: &TemperatureSide, flux: &FluxSide, weights: &[f64]) -> Vec<Cure> {
    let room = problem.grid.batch_cells();
    let batch = |(batch, cures): (usize, &mut [Cure])| {
        let mut defects = vec![Defect::default(); problem.solved()];
        for cell in problem.grid.batch(batch) {
            for (k, defect) in defects.iter_mut().enumerate() {
                let fields = CellFields::read(&cell, &temperature.fields[k], &flux.fields[k]);
                *defect = Defect::of(problem, &cell, &fields, k);
            }
            let last = Defect::of_last(&defects);
            let cure = &mut cures[cell.id.index() - batch * room];
            for (defect, weight) in defects.iter().chain([&last]).zip(weights) {
                let [x, y] = defect.cure();
                cure[0] += weight * x;
                cure[1] += weight * y;
            }
        }
    };
    let mut cures = vec![[0.0; 2]; problem.grid.cell_count()];
    if cures.len() >= PARALLEL_FROM {
        cures.par_chunks_mut(room).enumerate().for_each(batch);
    } else {
        cures.chunks_mut(room).enumerate().for_each(batch);
    }
    cures
}

/// `∫ ∇T_i·∇T_j` over the cells of each group (`group_of` gives a cell's; `groups` of them), in m·K²/K² = 1: the
/// change of the energy form with the conductivity there.
pub(super) fn gradient_products(
    grid: &Grid,
    temperature: &TemperatureSide,
    flux: &FluxSide,
    groups: usize,
    group_of: impl Fn(&Cell) -> usize,
) -> Vec<DMatrix<f64>> {
    let n = temperature.fields.len();
    let mut products = vec![DMatrix::zeros(n, n); groups];
    for cell in grid.cells() {
        let area = cell.shape.width_m * cell.shape.height_m;
        let fields: Vec<CellFields> =
            (0..n).map(|k| CellFields::read(&cell, &temperature.fields[k], &flux.fields[k])).collect();
        let product = &mut products[group_of(&cell)];
        for (i, a) in fields.iter().enumerate() {
            for (j, b) in fields[..=i].iter().enumerate() {
                product[(i, j)] += area * a.gradient_product(b);
            }
        }
    }
    products
}
