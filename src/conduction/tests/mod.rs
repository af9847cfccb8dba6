//! Checks of both sides: exact results, a direct solver, and properties on random sections.

mod exact;
mod properties;
mod section;
mod solver;
