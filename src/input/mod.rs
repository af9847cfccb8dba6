//! From YAML text to a [`Document`]: positions kept, names, expressions and lengths resolved, every problem listed.
//!
//! Knows the catalogue; must not know grids or solvers.

mod buildups;
mod diagnostic;
mod document;
mod environments;
mod expression;
mod flanks;
mod load;
mod location;
mod materials;
mod names;
mod nearest;
mod numbers;
mod parameters;
mod problem;
mod read;
mod reader;
mod render;
mod section;
mod shapes;
mod syntax;
mod token;
mod tree;
mod wording;
mod wording_syntax;

pub use diagnostic::{Diagnostic, Related, Severity};
pub use document::{
    Axis, Document, Environment, EnvironmentKind, Fill, FlankEntry, LengthUnit, Material, Plane, Probe, Provenance,
    Region, Resistances, Shape, Side, Source, Span, Spanned, SurfaceClass,
};
pub use load::load;
pub use location::{line_column, line_columns};
pub use nearest::nearest;
pub use read::parse;
pub use render::render;
