//! From YAML text to a [`Document`]: positions kept, names, expressions and lengths resolved, every problem listed.
//!
//! Knows the catalogue; must not know grids or solvers.

mod diagnostic;
mod document;

pub use diagnostic::{Diagnostic, Related, Severity};
pub use document::{
    Axis, Document, Environment, EnvironmentKind, Fill, FlankEntry, LengthUnit, Material, Plane, Probe, Provenance,
    Region, Resistances, Shape, Side, Source, Span, Spanned, SurfaceClass,
};
