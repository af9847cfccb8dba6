//! What one cell holds of both sides, and how far they disagree there.

use super::problem::Problem;
use crate::grid::{Cell, Rectangle};

/// The part of the gap in one cell that splitting along x, and along y, cures. W/(m·K).
pub(super) type Cure = [f64; 2];

/// One basis problem in one cell: temperatures at the corners with the gradients between them, fluxes on the faces.
#[derive(Clone, Copy, Default)]
pub(super) struct CellFields {
    corners: [f64; 4],
    /// ∂T/∂x at the bottom and top edges.
    along_x: [f64; 2],
    /// ∂T/∂y at the left and right edges.
    along_y: [f64; 2],
    flux: [f64; 4],
}

impl CellFields {
    pub(super) fn read(cell: &Cell, temperature: &[f64], flux: &[f64]) -> Self {
        let Rectangle { width_m, height_m, corners, faces, .. } = cell.shape;
        let [sw, se, nw, ne] = corners.map(|node| temperature[node.index()]);
        Self {
            corners: [sw, se, nw, ne],
            along_x: [(se - sw) / width_m, (ne - nw) / width_m],
            along_y: [(nw - sw) / height_m, (ne - se) / height_m],
            flux: faces.map(|face| flux[face.index()]),
        }
    }

    /// Mean temperature of the cell.
    pub(super) fn mean(&self) -> f64 {
        0.25 * self.corners.iter().sum::<f64>()
    }

    /// Mean of ∇T·∇T' over the cell.
    pub(super) fn gradient_product(&self, other: &Self) -> f64 {
        mean_product(self.along_x, other.along_x) + mean_product(self.along_y, other.along_y)
    }

    /// Mean of q·q' over the cell.
    pub(super) fn flux_product(&self, other: &Self) -> f64 {
        let [west, east, south, north] = self.flux;
        let [other_west, other_east, other_south, other_north] = other.flux;
        mean_product([west, east], [other_west, other_east]) + mean_product([south, north], [other_south, other_north])
    }

    /// T − T_air at the two corners of a face, where the air is at `air`.
    pub(super) fn above_air(&self, face: usize, air: f64) -> [f64; 2] {
        Rectangle::FACE_CORNERS[face].map(|corner| self.corners[corner] - air)
    }

    /// Flux density that enters the solid through a face.
    pub(super) fn entering(&self, face: usize) -> f64 {
        Rectangle::INWARD[face] * self.flux[face]
    }
}

/// Mean of the product of two functions that run linearly between their end values.
pub(super) fn mean_product(a: [f64; 2], b: [f64; 2]) -> f64 {
    (a[0] * (2.0 * b[0] + b[1]) + a[1] * (b[0] + 2.0 * b[1])) / 6.0
}

/// How far the two sides of one basis problem disagree in one cell and on its surfaces.
///
/// Every entry is scaled so that the squares add up to the cell's term of the gap. Entries are linear in the fields, so
/// that the last air's follow from the others'.
#[derive(Clone, Copy, Default)]
pub(super) struct Defect {
    /// The mean of q + λ∇T, along x and y.
    mean: [f64; 2],
    /// The variations that splitting along x cures.
    varies_x: [f64; 2],
    /// The variations that splitting along y cures.
    varies_y: [f64; 2],
    /// For each face: mean and variation of q_in − h(T_air − T).
    surface: [[f64; 2]; 4],
}

impl Defect {
    /// The defect of basis problem `basis` in a cell.
    pub(super) fn of(problem: &Problem, cell: &Cell, fields: &CellFields, basis: usize) -> Self {
        let conductivity = problem.conductivity_of(cell);
        let CellFields { along_x, along_y, flux: [west, east, south, north], .. } = *fields;
        let scale = (cell.shape.width_m * cell.shape.height_m / conductivity).sqrt();
        let twelfth = scale / 12.0_f64.sqrt();
        let mut defect = Self {
            mean: [
                scale * (0.5 * (west + east) + conductivity * 0.5 * (along_x[0] + along_x[1])),
                scale * (0.5 * (south + north) + conductivity * 0.5 * (along_y[0] + along_y[1])),
            ],
            varies_x: [twelfth * (east - west), twelfth * conductivity * (along_y[1] - along_y[0])],
            varies_y: [twelfth * (north - south), twelfth * conductivity * (along_x[1] - along_x[0])],
            surface: [[0.0; 2]; 4],
        };
        for (face, surface) in cell.shape.surfaces.iter().enumerate() {
            let Some(film) = surface.map(|s| problem.film(s)).filter(|f| f.resistance > 0.0) else { continue };
            let [first, second] = fields.above_air(face, film.temperature_in(basis));
            let scale = (cell.shape.face_length_m(face) * film.resistance).sqrt();
            let mean = fields.entering(face) + 0.5 * (first + second) / film.resistance;
            let varies = (second - first) / film.resistance / 12.0_f64.sqrt();
            defect.surface[face] = [scale * mean, scale * varies];
        }
        defect
    }

    /// The last air's defect: all basis problems together make a uniform temperature, which has none.
    pub(super) fn of_last(others: &[Self]) -> Self {
        let mut out = Self::default();
        for d in others {
            for k in 0..2 {
                out.mean[k] -= d.mean[k];
                out.varies_x[k] -= d.varies_x[k];
                out.varies_y[k] -= d.varies_y[k];
                for face in 0..4 {
                    out.surface[face][k] -= d.surface[face][k];
                }
            }
        }
        out
    }

    /// The cell's term of the gap, by the direction of splitting that cures it.
    ///
    /// The mean defect is shared in proportion to the variations; a surface term belongs to the interval along the
    /// surface (west and east faces run along y).
    pub(super) fn cure(&self) -> Cure {
        let square = |v: [f64; 2]| v[0] * v[0] + v[1] * v[1];
        let (x, y, mean) = (square(self.varies_x), square(self.varies_y), square(self.mean));
        let share = if x + y > 0.0 { x / (x + y) } else { 0.5 };
        let upright = square(self.surface[0]) + square(self.surface[1]);
        let level = square(self.surface[2]) + square(self.surface[3]);
        [x + share * mean + level, y + (1.0 - share) * mean + upright]
    }

    /// The cell's term of the gap.
    pub(super) fn term(&self) -> f64 {
        let [x, y] = self.cure();
        x + y
    }
}
