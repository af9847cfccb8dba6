//! The checked model of a junction in SI units, built from an input document: the drawing painted in order, surfaces
//! with their resistances, cut planes, flanks with lengths.
//!
//! Knows `input` (for names, positions and diagnostics) and `catalogue`; must not know YAML, grids or solvers.

mod build;
mod canvas;
mod checks;
mod cuts;
mod fault;
mod fault_wording;
mod flank_choice;
mod flanks;
mod groups;
mod lines;
mod listing;
mod measure;
mod meeting;
mod model;
mod outline;
mod painting;
mod parts;
mod place;
mod probes;
mod proposal;
mod remark;
mod review;
mod sheet;
mod surface_rule;
mod surfaces;
#[cfg(test)]
mod test_draft;
mod view;

pub use build::build;
pub use meeting::describe_point;
pub use model::{Air, Cut, Environment, Flank, HeatDirection, Junction, Layer, Lengths, Part, Probe, Surface};
pub(crate) use place::count as count_text;
pub use place::point_text;
pub use sheet::{Content, Sheet};
