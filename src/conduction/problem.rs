//! What conduction is asked: a grid, a conductivity a cell, a film a surface.

use crate::grid::{Cell, Grid};
use crate::index::{NodeId, SurfaceId};

/// The film between a surface and its air.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Film {
    /// The air, counted from 0 among those of this problem.
    pub air: usize,
    /// Surface resistance in m²K/W; 0 is a prescribed temperature.
    pub resistance: f64,
}

impl Film {
    /// The air's temperature in basis problem `basis`.
    pub(super) fn temperature_in(self, basis: usize) -> f64 {
        f64::from(u8::from(self.air == basis))
    }
}

/// Steady conduction on one grid.
#[derive(Clone, Copy, Debug)]
pub struct Problem<'a> {
    /// The grid.
    pub grid: &'a Grid,
    /// Conductivity by cell, W/(m·K); places without solid are not read.
    pub conductivity: &'a [f64],
    /// Film by surface.
    pub films: &'a [Film],
    /// Number of airs; at least one.
    pub airs: usize,
}

impl Problem<'_> {
    /// Basis problem k has air k at 1 and all others at 0. The last one follows from the others, as together they make
    /// a uniform temperature of 1; so this many are solved.
    pub fn solved(&self) -> usize {
        self.airs - 1
    }

    pub(super) fn film(&self, surface: SurfaceId) -> Film {
        self.films[surface.index()]
    }

    pub(super) fn conductivity_of(&self, cell: &Cell) -> f64 {
        self.conductivity[cell.id.index()]
    }

    /// The air whose temperature is prescribed at each node, where there is one.
    pub(super) fn prescribed_nodes(&self) -> PrescribedNodes {
        let mut found = PrescribedNodes::default();
        if self.films.iter().all(|film| film.resistance > 0.0) {
            return found;
        }
        let mut air_at: Vec<Option<usize>> = vec![None; self.grid.node_count()];
        for cell in self.grid.cells() {
            for (face, surface) in cell.shape.surfaces.iter().enumerate() {
                let Some(film) = surface.map(|s| self.film(s)).filter(|f| f.resistance == 0.0) else { continue };
                for corner in crate::grid::Rectangle::FACE_CORNERS[face] {
                    let node = cell.shape.corners[corner];
                    match air_at[node.index()] {
                        None => {
                            air_at[node.index()] = Some(film.air);
                            found.nodes.push((node, film.air));
                        }
                        Some(other) if other != film.air => {
                            found.touching.push(Touching { node, airs: [other, film.air] })
                        }
                        Some(_) => {}
                    }
                }
            }
        }
        found
    }
}

/// A place where two prescribed temperatures meet: the heat flow there is infinite.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Touching {
    /// The node.
    pub node: NodeId,
    /// The two airs.
    pub airs: [usize; 2],
}

/// Nodes with a prescribed temperature, in a fixed order.
#[derive(Clone, Debug, Default)]
pub(super) struct PrescribedNodes {
    pub(super) nodes: Vec<(NodeId, usize)>,
    pub(super) touching: Vec<Touching>,
}
