//! Small sections drawn as text, without the input room.

use crate::conduction::{Film, Problem, Solution, solve};
use crate::grid::Grid;
use crate::index::{EnvironmentId, PartId, SurfaceId};
use crate::junction::{Content, Sheet};
use std::sync::Arc;

/// A section with its conductivities by part and one film an air.
#[derive(Clone, Debug)]
pub(super) struct Section {
    pub(super) grid: Grid,
    pub(super) conductivities: Vec<f64>,
    pub(super) films: Vec<Film>,
}

impl Section {
    /// From a picture, top row first: a digit is a part, a letter an air (a = 0), a dot outside the model.
    pub(super) fn drawn(x: &[f64], y: &[f64], picture: &[&str], conductivities: &[f64], resistances: &[f64]) -> Self {
        let content = |byte: u8| match byte {
            b'0'..=b'9' => Content::Solid(PartId::new(usize::from(byte - b'0'))),
            b'a'..=b'z' => Content::Air(EnvironmentId::new(usize::from(byte - b'a'))),
            _ => Content::Outside,
        };
        let contents = picture.iter().rev().flat_map(|row| row.bytes()).map(content).collect();
        Self::of(x, y, contents, conductivities, resistances)
    }

    /// From fields row by row from the bottom; surface k is that of air k.
    pub(super) fn of(
        x: &[f64],
        y: &[f64],
        contents: Vec<Content>,
        conductivities: &[f64],
        resistances: &[f64],
    ) -> Self {
        let mut sheet = Sheet::new(x.to_vec(), y.to_vec(), contents);
        let (columns, rows) = (sheet.columns(), sheet.rows());
        let between = |a: Content, b: Content| match (a, b) {
            (Content::Solid(_), Content::Air(air)) | (Content::Air(air), Content::Solid(_)) => {
                Some(SurfaceId::new(air.index()))
            }
            _ => None,
        };
        for row in 0..rows {
            for line in 1..columns {
                if let Some(surface) = between(sheet.content(line - 1, row), sheet.content(line, row)) {
                    sheet.set_upright_surface(line, row, surface);
                }
            }
        }
        for line in 1..rows {
            for column in 0..columns {
                if let Some(surface) = between(sheet.content(column, line - 1), sheet.content(column, line)) {
                    sheet.set_level_surface(column, line, surface);
                }
            }
        }
        let films = resistances.iter().enumerate().map(|(air, &resistance)| Film { air, resistance }).collect();
        let grid = Grid::first(Arc::new(sheet), 1_000_000).unwrap();
        Self { grid, conductivities: conductivities.to_vec(), films }
    }

    /// Calls `work` with the problem on the present grid.
    pub(super) fn with<T>(&self, work: impl FnOnce(&Problem) -> T) -> T {
        let mut conductivity = vec![0.0; self.grid.cell_count()];
        for cell in self.grid.cells() {
            conductivity[cell.id.index()] = self.conductivities[cell.part.index()];
        }
        work(&Problem { grid: &self.grid, conductivity: &conductivity, films: &self.films, airs: self.films.len() })
    }

    pub(super) fn solve(&self) -> Solution {
        self.with(|problem| solve(problem, None).unwrap())
    }

    /// Refines until the half-width of the coupling of airs 0 and 1 is at most `accuracy`, or `passes` are done.
    pub(super) fn refined(&mut self, accuracy: f64, passes: usize) -> Solution {
        let mut start = None;
        for _ in 1..passes {
            let (solution, cures) = self.with(|problem| {
                let solution = solve(problem, start.take()).unwrap();
                let weights: Vec<f64> = (0..problem.airs).map(|air| 1.0 / solution.gap(air)).collect();
                let cures = solution.cures(problem, &weights);
                (solution, cures)
            });
            let [low, high] = solution.bracket(0, 1);
            let Some(splitting) = self.grid.choose_splitting(&cures).filter(|_| high - low > 2.0 * accuracy) else {
                return solution;
            };
            start = Some(solution.nodal().iter().map(|t| self.grid.carry_to_split(&splitting, t)).collect());
            self.grid = self.grid.split(&splitting);
        }
        self.with(|problem| solve(problem, start).unwrap())
    }
}
