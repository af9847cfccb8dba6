//! The grid over a sheet: lines, cells, faces, nodes and surfaces, and their splitting.
//!
//! Answers who touches whom and how large; must not know temperatures, conductivities or buildings. Later rooms go
//! through [`Grid::cells`] and [`Grid::faces`], never by column and row, so that cells of another shape can join.

mod cell;
mod grading;
mod lattice;
mod locate;
mod split;
#[cfg(test)]
mod tests;

pub use cell::{Cell, Face, FaceSides, Rectangle};
pub use lattice::{Grid, GridTooLarge};
pub use split::Splitting;
