//! From a junction to its figures: when to stop refining, couplings, Ψ, temperature factors, warnings.
//!
//! Knows `junction`, `grid` and `conduction`; must not know files or terminals.

mod model;

pub use model::{
    Accuracy, Bracket, Coupling, Evidence, ProbeResult, Psi, Rating, Request, Sensitivity, SurfaceResult,
    TemperatureFactor,
};
