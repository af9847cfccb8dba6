//! One of the two runs of a rating: heat flow (ISO 6946 films) or moisture (ISO 13788 films), on the common grid.

use crate::conduction::{self, Film, Problem, Solution, SolveError};
use crate::grid::{Grid, Splitting};
use crate::index::AirId;
use crate::junction::{Junction, Surface};

/// What stays the same from pass to pass: which airs take part, and the film of every surface.
#[derive(Clone, Debug)]
pub(super) struct Setting {
    /// The airs that touch the solid, in file order; problems count them from 0.
    pub(super) airs: Vec<AirId>,
    /// Their temperatures, °C.
    pub(super) temperatures: Vec<f64>,
    films: Vec<Film>,
}

impl Setting {
    /// The setting of a run; `resistance` reads that run's film off a surface.
    pub(super) fn new(junction: &Junction, resistance: impl Fn(&Surface) -> f64) -> Self {
        let mut airs: Vec<AirId> = junction.surfaces.iter().map(|surface| surface.air).collect();
        airs.sort_unstable();
        airs.dedup();
        let place = |air: AirId| airs.binary_search(&air).expect("every surface's air is in the list");
        let film = |surface: &Surface| Film { air: place(surface.air), resistance: resistance(surface) };
        let films = junction.surfaces.iter().map(film).collect();
        let temperatures = airs.iter().map(|air| junction.airs[air.index()].temperature_c).collect();
        Self { airs, temperatures, films }
    }

    /// Where an air stands among those that take part.
    pub(super) fn place(&self, air: AirId) -> Option<usize> {
        self.airs.binary_search(&air).ok()
    }

    /// Warmest minus coldest air, K.
    pub(super) fn span_k(&self) -> f64 {
        let extreme = |pick: fn(f64, f64) -> f64| self.temperatures.iter().copied().reduce(pick).unwrap_or(0.0);
        extreme(f64::max) - extreme(f64::min)
    }

    /// Whether both runs have the same films, so that one solve serves both.
    pub(super) fn same_films(&self, other: &Self) -> bool {
        self.films == other.films
    }

    /// The problem of this run on a grid.
    pub(super) fn problem<'a>(&'a self, grid: &'a Grid, conductivity: &'a [f64]) -> Problem<'a> {
        Problem { grid, conductivity, films: &self.films, airs: self.airs.len() }
    }

    pub(super) fn solve(
        &self,
        grid: &Grid,
        conductivity: &[f64],
        start: Option<Vec<Vec<f64>>>,
    ) -> Result<Solution, SolveError> {
        conduction::solve(&self.problem(grid, conductivity), start)
    }
}

/// Conductivity by cell of a grid.
pub(super) fn conductivities(junction: &Junction, grid: &Grid) -> Vec<f64> {
    let mut out = vec![0.0; grid.cell_count()];
    for cell in grid.cells() {
        out[cell.id.index()] = junction.parts[cell.part.index()].conductivity_w_mk;
    }
    out
}

/// Nodal temperatures of a solution carried to the split grid.
pub(super) fn carry(grid: &Grid, splitting: &Splitting, solution: &Solution) -> Vec<Vec<f64>> {
    solution.nodal().iter().map(|field| grid.carry_to_split(splitting, field)).collect()
}
