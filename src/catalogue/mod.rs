//! Published material values and surface resistances, each with its source.
//!
//! Knows no other room.

mod materials;
pub mod surfaces;

pub use materials::{CatalogueMaterial, look_up, names};
