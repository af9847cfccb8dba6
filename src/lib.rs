//! Coldseam rates thermal bridges: a junction described in YAML goes in, its linear thermal transmittance with a
//! guaranteed numerical bracket and the temperature factor of its coldest inside surface come out.
//!
//! Data flows one way, and each room knows only the rooms before it:
//!
//! ```text
//! YAML text → input → junction → grid → conduction → rating → report
//!               ↑ catalogue                             ↓
//!                                                 verification
//! ```
//!
//! - [`catalogue`]: published material values and surface resistances, each with its source
//! - [`input`]: the document with positions; names, expressions and lengths resolved; diagnostics
//! - [`junction`]: the checked model in SI units; impossible states cannot be built
//! - [`grid`]: lines, cells, faces, nodes and surfaces, and their splitting
//! - [`conduction`]: both sides of the bracket on one grid
//! - [`rating`]: when to stop, couplings, Ψ, temperature factors, warnings
//! - [`report`]: text, JSON and CSV from a rating
//! - [`verification`]: published cases, computed and compared
//! - [`commands`]: the command line

pub mod catalogue;
pub mod commands;
pub mod conduction;
pub mod grid;
pub mod index;
pub mod input;
pub mod junction;
pub mod rating;
pub mod report;
pub mod verification;
