//! The drawing on its own lines: which part or air fills each field between neighbouring lines, and which surface
//! lies on each edge between two fields.
//!
//! Only `junction` and `grid` use fields by column and row; later rooms see cells, faces and nodes.

use crate::index::{EnvironmentId, PartId, SurfaceId};

/// What fills a field of the sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Content {
    /// Outside the model: painted void, or never painted.
    Outside,
    /// Air.
    Air(EnvironmentId),
    /// A solid.
    Solid(PartId),
}

/// The drawing on its own lines. Fields are counted by column (left to right) and row (bottom to top).
#[derive(Clone, Debug, PartialEq)]
pub struct Sheet {
    x: Vec<f64>,
    y: Vec<f64>,
    contents: Vec<Content>,
    upright: Vec<Option<SurfaceId>>,
    level: Vec<Option<SurfaceId>>,
}

impl Sheet {
    /// A sheet of fields between the lines `x` and `y` (metres, strictly rising), without surfaces yet.
    ///
    /// `contents` runs row by row from the bottom, `x.len() - 1` fields a row.
    ///
    /// # Panics
    /// If lines do not rise or the number of fields does not match them.
    pub fn new(x: Vec<f64>, y: Vec<f64>, contents: Vec<Content>) -> Self {
        let rises = |lines: &[f64]| lines.len() > 1 && lines.windows(2).all(|w| w[0] < w[1]);
        assert!(rises(&x) && rises(&y), "sheet lines rise");
        let (columns, rows) = (x.len() - 1, y.len() - 1);
        assert_eq!(contents.len(), columns * rows, "one content a field");
        let upright = vec![None; (columns + 1) * rows];
        let level = vec![None; columns * (rows + 1)];
        Self { x, y, contents, upright, level }
    }

    /// Upright lines, in metres, from the left.
    pub fn x_lines(&self) -> &[f64] {
        &self.x
    }

    /// Level lines, in metres, from the bottom.
    pub fn y_lines(&self) -> &[f64] {
        &self.y
    }

    /// Number of columns of fields.
    pub fn columns(&self) -> usize {
        self.x.len() - 1
    }

    /// Number of rows of fields.
    pub fn rows(&self) -> usize {
        self.y.len() - 1
    }

    /// What fills a field.
    pub fn content(&self, column: usize, row: usize) -> Content {
        self.contents[row * self.columns() + column]
    }

    /// The surface on upright line `line` beside row `row`.
    pub fn upright_surface(&self, line: usize, row: usize) -> Option<SurfaceId> {
        self.upright[row * (self.columns() + 1) + line]
    }

    /// The surface on level line `line` beside column `column`.
    pub fn level_surface(&self, column: usize, line: usize) -> Option<SurfaceId> {
        self.level[line * self.columns() + column]
    }

    /// Puts a surface on upright line `line` beside row `row`.
    pub(crate) fn set_upright_surface(&mut self, line: usize, row: usize, surface: SurfaceId) {
        let columns = self.columns();
        self.upright[row * (columns + 1) + line] = Some(surface);
    }

    /// Puts a surface on level line `line` beside column `column`.
    pub(crate) fn set_level_surface(&mut self, column: usize, line: usize, surface: SurfaceId) {
        let columns = self.columns();
        self.level[line * columns + column] = Some(surface);
    }

    /// The longer side of the sheet, in metres.
    pub fn size_m(&self) -> f64 {
        (self.x[self.columns()] - self.x[0]).max(self.y[self.rows()] - self.y[0])
    }
}
