//! The checked model of a junction in SI units, built from an input document: the drawing painted in order, surfaces
//! with their resistances, cut planes, flanks with lengths.
//!
//! Knows `input` (for names, positions and diagnostics) and `catalogue`; must not know YAML, grids or solvers.

mod model;
mod sheet;

pub use model::{Air, Cut, Environment, Flank, HeatDirection, Junction, Layer, Lengths, Part, Probe, Surface};
pub use sheet::{Content, Sheet};
