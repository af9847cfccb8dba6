//! A cell, a face, and what they touch.

use crate::index::{CellId, FaceId, NodeId, PartId, SurfaceId};

/// A solid rectangle of the grid.
///
/// Corners run south-west, south-east, north-west, north-east; faces west, east, south, north. A sloping edge will
/// bring cells of another shape; they join as variants beside this one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rectangle {
    /// Extent along x in metres.
    pub width_m: f64,
    /// Extent along y in metres.
    pub height_m: f64,
    /// Its corners.
    pub corners: [NodeId; 4],
    /// Its faces.
    pub faces: [FaceId; 4],
    /// The surface on each face, where air lies beyond it.
    pub surfaces: [Option<SurfaceId>; 4],
}

impl Rectangle {
    /// Which corners bound each face (west, east, south, north), the one with the smaller coordinate first.
    pub const FACE_CORNERS: [[usize; 2]; 4] = [[0, 2], [1, 3], [0, 1], [2, 3]];

    /// +1 where the positive axis direction enters the solid through that face, −1 where it leaves.
    pub const INWARD: [f64; 4] = [1.0, -1.0, 1.0, -1.0];

    /// Length of a face in metres.
    pub fn face_length_m(&self, face: usize) -> f64 {
        if face < 2 { self.height_m } else { self.width_m }
    }
}

/// A solid cell of the grid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Cell {
    /// Its index, for slices by cell.
    pub id: CellId,
    /// The part it is made of.
    pub part: PartId,
    /// Its shape and neighbours.
    pub shape: Rectangle,
}

/// What lies on the two sides of a face that heat can cross.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum FaceSides {
    /// Two cells, in the positive axis direction.
    Cells {
        /// The cells.
        cells: [CellId; 2],
        /// Distance from each cell's centre to the face, in metres.
        half_m: [f64; 2],
    },
    /// A cell and air.
    Surface {
        /// The cell.
        cell: CellId,
        /// Distance from its centre to the face, in metres.
        half_m: f64,
        /// The surface.
        surface: SurfaceId,
        /// +1 where the positive axis direction enters the solid, −1 where it leaves.
        inward: f64,
    },
}

/// A face that heat can cross; adiabatic faces are left out.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Face {
    /// Its index, for slices by face.
    pub id: FaceId,
    /// Its length in metres.
    pub length_m: f64,
    /// What lies on its sides.
    pub sides: FaceSides,
}
