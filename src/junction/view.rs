//! The sheet as seen when looking in from one of its sides, so that a rule is written once for all four.
//!
//! Positions run along the side in the direction of rising coordinate; depths run away from it.

use super::sheet::{Content, Sheet};
use crate::index::SurfaceId;
use crate::input::Side;

/// An edge between two fields, or on the sheet's outline.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Edge {
    /// On an upright line, beside a row.
    Upright { line: usize, row: usize },
    /// On a level line, beside a column.
    Level { column: usize, line: usize },
}

impl Edge {
    /// The surface on it.
    pub(super) fn surface(self, sheet: &Sheet) -> Option<SurfaceId> {
        match self {
            Self::Upright { line, row } => sheet.upright_surface(line, row),
            Self::Level { column, line } => sheet.level_surface(column, line),
        }
    }

    /// Puts a surface on it.
    pub(super) fn set_surface(self, sheet: &mut Sheet, surface: SurfaceId) {
        match self {
            Self::Upright { line, row } => sheet.set_upright_surface(line, row, surface),
            Self::Level { column, line } => sheet.set_level_surface(column, line, surface),
        }
    }
}

/// Whether positions along a side are counted by columns (top, bottom) and not by rows.
pub(super) fn runs_level(side: Side) -> bool {
    matches!(side, Side::Top | Side::Bottom)
}

/// The axis along which a plane element cut at `side` runs: 0 for x, 1 for y.
pub(super) fn inward_axis(side: Side) -> usize {
    usize::from(runs_level(side))
}

/// +1 where looking in from `side` is looking along rising coordinates.
pub(super) fn inward_sign(side: Side) -> f64 {
    if matches!(side, Side::Left | Side::Bottom) { 1.0 } else { -1.0 }
}

/// The sheet seen from a side.
#[derive(Clone, Copy)]
pub(super) struct View<'a> {
    sheet: &'a Sheet,
    side: Side,
}

impl<'a> View<'a> {
    /// Looking in from `side`.
    pub(super) fn new(sheet: &'a Sheet, side: Side) -> Self {
        Self { sheet, side }
    }

    /// Number of fields along the side.
    pub(super) fn positions(self) -> usize {
        if runs_level(self.side) { self.sheet.columns() } else { self.sheet.rows() }
    }

    /// Number of fields away from the side.
    pub(super) fn depths(self) -> usize {
        if runs_level(self.side) { self.sheet.rows() } else { self.sheet.columns() }
    }

    /// What fills a field.
    pub(super) fn content(self, position: usize, depth: usize) -> Content {
        let depth = if inward_sign(self.side) > 0.0 { depth } else { self.depths() - 1 - depth };
        if runs_level(self.side) { self.sheet.content(position, depth) } else { self.sheet.content(depth, position) }
    }

    /// What lies before a depth line, towards the side.
    pub(super) fn before(self, position: usize, depth_line: usize) -> Content {
        if depth_line == 0 { Content::Outside } else { self.content(position, depth_line - 1) }
    }

    /// The sheet line at a depth line.
    fn sheet_line(self, depth_line: usize) -> usize {
        if inward_sign(self.side) > 0.0 { depth_line } else { self.depths() - depth_line }
    }

    /// The coordinate of a depth line, in metres.
    pub(super) fn depth_at(self, depth_line: usize) -> f64 {
        let lines = if runs_level(self.side) { self.sheet.y_lines() } else { self.sheet.x_lines() };
        lines[self.sheet_line(depth_line)]
    }

    /// The coordinate of a position line, in metres.
    pub(super) fn position_at(self, position_line: usize) -> f64 {
        let lines = if runs_level(self.side) { self.sheet.x_lines() } else { self.sheet.y_lines() };
        lines[position_line]
    }

    /// The point where two lines cross, in metres.
    pub(super) fn point(self, position_line: usize, depth_line: usize) -> [f64; 2] {
        let (position, depth) = (self.position_at(position_line), self.depth_at(depth_line));
        if runs_level(self.side) { [position, depth] } else { [depth, position] }
    }

    /// The edge across the line of sight, between the fields before and after a depth line.
    pub(super) fn front_edge(self, position: usize, depth_line: usize) -> Edge {
        let line = self.sheet_line(depth_line);
        if runs_level(self.side) {
            Edge::Level { column: position, line }
        } else {
            Edge::Upright { line, row: position }
        }
    }

    /// The surface on the edge along the line of sight, between the fields on both sides of a position line.
    pub(super) fn side_surface(self, position_line: usize, depth: usize) -> Option<SurfaceId> {
        let depth = if inward_sign(self.side) > 0.0 { depth } else { self.depths() - 1 - depth };
        let edge = if runs_level(self.side) {
            Edge::Upright { line: position_line, row: depth }
        } else {
            Edge::Level { column: depth, line: position_line }
        };
        edge.surface(self.sheet)
    }
}
