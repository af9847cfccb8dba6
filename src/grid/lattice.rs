//! The grid: two families of lines over a sheet. Cells, faces and nodes are numbered row by row from the bottom.

use super::cell::{Cell, Face, FaceSides, Rectangle};
use super::grading::AxisLines;
use crate::index::{CellId, FaceId, NodeId, PartId, SurfaceId};
use crate::junction::{Content, Sheet};
use std::sync::Arc;

/// A grid would need more nodes than allowed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("{nodes} nodes are needed, {limit} are allowed")]
pub struct GridTooLarge {
    /// Nodes needed.
    pub nodes: usize,
    /// Nodes allowed.
    pub limit: usize,
}

/// A grid over a sheet. Slices by cell, face or node have room for every place of the lattice, solid or not.
#[derive(Clone, Debug)]
pub struct Grid {
    sheet: Arc<Sheet>,
    pub(super) x: AxisLines,
    pub(super) y: AxisLines,
    upright_drawn: Vec<Option<u32>>,
    level_drawn: Vec<Option<u32>>,
}

impl Grid {
    /// The first grid over a sheet: its own lines, graded.
    ///
    /// # Errors
    /// If it needs more than `node_limit` nodes; nothing large is allocated before that is known.
    pub fn first(sheet: Arc<Sheet>, node_limit: usize) -> Result<Self, GridTooLarge> {
        let x = AxisLines::graded(sheet.x_lines());
        let y = AxisLines::graded(sheet.y_lines());
        let nodes = x.at.len().saturating_mul(y.at.len());
        if nodes > node_limit {
            return Err(GridTooLarge { nodes, limit: node_limit });
        }
        Ok(Self::over(sheet, x, y))
    }

    pub(super) fn over(sheet: Arc<Sheet>, x: AxisLines, y: AxisLines) -> Self {
        let upright_drawn = x.drawn_lines();
        let level_drawn = y.drawn_lines();
        Self { sheet, x, y, upright_drawn, level_drawn }
    }

    pub(super) fn sheet(&self) -> &Arc<Sheet> {
        &self.sheet
    }

    /// What fills a field of the sheet (for tests that redraw it).
    #[cfg(test)]
    pub(crate) fn sheet_content(&self, column: usize, row: usize) -> Content {
        self.sheet.content(column, row)
    }

    /// Number of columns of cells.
    pub(super) fn columns(&self) -> usize {
        self.x.intervals()
    }

    /// Number of rows of cells.
    pub(super) fn rows(&self) -> usize {
        self.y.intervals()
    }

    /// Places for nodes: the length of a slice by node, and the size that the node limit speaks of.
    pub fn node_count(&self) -> usize {
        self.x.at.len() * self.y.at.len()
    }

    /// Places for cells: the length of a slice by cell.
    pub fn cell_count(&self) -> usize {
        self.columns() * self.rows()
    }

    /// Places for faces: the length of a slice by face.
    pub fn face_count(&self) -> usize {
        (self.columns() + 1) * self.rows() + self.columns() * (self.rows() + 1)
    }

    /// Nodes a line and number of lines of the lattice that the nodes form; solvers use it, nobody else needs it.
    pub fn node_lattice(&self) -> [usize; 2] {
        [self.x.at.len(), self.y.at.len()]
    }

    /// Cells a line and number of lines of the lattice that the cells form.
    pub fn cell_lattice(&self) -> [usize; 2] {
        [self.columns(), self.rows()]
    }

    /// The cells in batches that do not depend on the number of threads; a batch's cells have consecutive indices.
    pub fn batches(&self) -> usize {
        self.rows()
    }

    /// Room for cells in one batch: batch k owns the cell indices from k × this on.
    pub fn batch_cells(&self) -> usize {
        self.columns()
    }

    /// The solid cells of one batch.
    pub fn batch(&self, batch: usize) -> impl Iterator<Item = Cell> + '_ {
        (0..self.columns()).filter_map(move |column| self.cell(column, batch))
    }

    /// Every solid cell, in the order of their indices.
    pub fn cells(&self) -> impl Iterator<Item = Cell> + '_ {
        (0..self.batches()).flat_map(|batch| self.batch(batch))
    }

    /// The solid cell with this index.
    ///
    /// # Panics
    /// If there is no solid at that index.
    pub fn cell_at(&self, id: CellId) -> Cell {
        let (column, row) = (id.index() % self.columns(), id.index() / self.columns());
        self.cell(column, row).expect("the index came from a solid cell")
    }

    /// The middle of a cell, in metres.
    pub fn centre(&self, id: CellId) -> [f64; 2] {
        let (column, row) = (id.index() % self.columns(), id.index() / self.columns());
        [0.5 * (self.x.at[column] + self.x.at[column + 1]), 0.5 * (self.y.at[row] + self.y.at[row + 1])]
    }

    /// Where a node lies, in metres.
    pub fn position(&self, node: NodeId) -> [f64; 2] {
        let width = self.x.at.len();
        [self.x.at[node.index() % width], self.y.at[node.index() / width]]
    }

    pub(super) fn part(&self, column: usize, row: usize) -> Option<PartId> {
        match self.sheet.content(self.x.drawn[column] as usize, self.y.drawn[row] as usize) {
            Content::Solid(part) => Some(part),
            Content::Air(_) | Content::Outside => None,
        }
    }

    pub(super) fn cell_id(&self, column: usize, row: usize) -> CellId {
        CellId::new(row * self.columns() + column)
    }

    fn upright_face(&self, line: usize, row: usize) -> FaceId {
        FaceId::new(row * (self.columns() + 1) + line)
    }

    fn level_face(&self, column: usize, line: usize) -> FaceId {
        FaceId::new((self.columns() + 1) * self.rows() + line * self.columns() + column)
    }

    fn upright_surface(&self, line: usize, row: usize) -> Option<SurfaceId> {
        self.sheet.upright_surface(self.upright_drawn[line]? as usize, self.y.drawn[row] as usize)
    }

    fn level_surface(&self, column: usize, line: usize) -> Option<SurfaceId> {
        self.sheet.level_surface(self.x.drawn[column] as usize, self.level_drawn[line]? as usize)
    }

    fn cell(&self, column: usize, row: usize) -> Option<Cell> {
        let part = self.part(column, row)?;
        let south_west = row * self.x.at.len() + column;
        let north_west = south_west + self.x.at.len();
        Some(Cell {
            id: self.cell_id(column, row),
            part,
            shape: Rectangle {
                width_m: self.x.at[column + 1] - self.x.at[column],
                height_m: self.y.at[row + 1] - self.y.at[row],
                corners: [south_west, south_west + 1, north_west, north_west + 1].map(NodeId::new),
                faces: [
                    self.upright_face(column, row),
                    self.upright_face(column + 1, row),
                    self.level_face(column, row),
                    self.level_face(column, row + 1),
                ],
                surfaces: [
                    self.upright_surface(column, row),
                    self.upright_surface(column + 1, row),
                    self.level_surface(column, row),
                    self.level_surface(column, row + 1),
                ],
            },
        })
    }

    /// Every face that heat can cross.
    pub fn faces(&self) -> impl Iterator<Item = Face> + '_ {
        let upright = (0..self.rows()).flat_map(move |row| {
            (0..=self.columns()).filter_map(move |line| {
                let before = line.checked_sub(1).map(|column| (column, row));
                let after = (line < self.columns()).then_some((line, row));
                let length_m = self.y.at[row + 1] - self.y.at[row];
                self.face(self.upright_face(line, row), length_m, [before, after], 0, self.upright_surface(line, row))
            })
        });
        let level = (0..=self.rows()).flat_map(move |line| {
            (0..self.columns()).filter_map(move |column| {
                let before = line.checked_sub(1).map(|row| (column, row));
                let after = (line < self.rows()).then_some((column, line));
                let length_m = self.x.at[column + 1] - self.x.at[column];
                self.face(self.level_face(column, line), length_m, [before, after], 1, self.level_surface(column, line))
            })
        });
        upright.chain(level)
    }

    fn face(
        &self,
        id: FaceId,
        length_m: f64,
        places: [Option<(usize, usize)>; 2],
        axis: usize,
        surface: Option<SurfaceId>,
    ) -> Option<Face> {
        let solid = |place: Option<(usize, usize)>| {
            let (column, row) = place?;
            self.part(column, row)?;
            let extent = match axis {
                0 => self.x.at[column + 1] - self.x.at[column],
                _ => self.y.at[row + 1] - self.y.at[row],
            };
            Some((self.cell_id(column, row), 0.5 * extent))
        };
        let sides = match (solid(places[0]), solid(places[1]), surface) {
            (Some((a, half_a)), Some((b, half_b)), _) => FaceSides::Cells { cells: [a, b], half_m: [half_a, half_b] },
            (Some((cell, half_m)), None, Some(surface)) => FaceSides::Surface { cell, half_m, surface, inward: -1.0 },
            (None, Some((cell, half_m)), Some(surface)) => FaceSides::Surface { cell, half_m, surface, inward: 1.0 },
            _ => return None,
        };
        Some(Face { id, length_m, sides })
    }
}
