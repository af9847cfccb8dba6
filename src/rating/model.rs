//! The figures of a rating: plain data, for reports to print. Sign: heat into the solid is positive.

use crate::index::{AirId, SurfaceId};
use crate::input::SurfaceClass;
use crate::junction::Junction;

/// A guaranteed numerical bracket of a value, for the model as drawn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bracket {
    /// The exact value of the model is not below this.
    pub low: f64,
    /// The exact value of the model is not above this.
    pub high: f64,
}

impl Bracket {
    /// The middle: the value to quote.
    pub fn value(self) -> f64 {
        0.5 * (self.low + self.high)
    }

    /// Half the width: the largest possible numerical error of the middle.
    pub fn half_width(self) -> f64 {
        0.5 * (self.high - self.low)
    }

    /// The bracket of this value plus a known number.
    pub fn plus(self, number: f64) -> Self {
        Self { low: self.low + number, high: self.high + number }
    }
}

/// How narrow the brackets shall be.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Accuracy {
    /// Half-width in W/(m·K).
    Absolute(f64),
    /// Half-width as a fraction of the value.
    Relative(f64),
}

/// What a rating is asked for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Request {
    /// How narrow every coupling's bracket shall be; default 0.0005 W/(m·K).
    pub accuracy: Accuracy,
    /// The most nodes a grid may have; default two million.
    pub node_limit: usize,
}

impl Default for Request {
    fn default() -> Self {
        Self { accuracy: Accuracy::Absolute(0.0005), node_limit: 2_000_000 }
    }
}

/// The thermal coupling between two airs, per metre of junction.
#[derive(Clone, Debug, PartialEq)]
pub struct Coupling {
    /// The warmer air.
    pub warm: AirId,
    /// The colder air.
    pub cold: AirId,
    /// Coupling coefficient in W/(m·K); `None` where it is infinite (two prescribed surfaces touch).
    pub bracket: Option<Bracket>,
}

/// The linear thermal transmittance between two airs in each dimension system, W/(m·K); `None` where the coupling is
/// infinite or a length is not settled.
#[derive(Clone, Debug, PartialEq)]
pub struct Psi {
    /// The warmer air.
    pub warm: AirId,
    /// The colder air.
    pub cold: AirId,
    /// Internal dimensions.
    pub internal: Option<Bracket>,
    /// Overall internal dimensions.
    pub overall_internal: Option<Bracket>,
    /// External dimensions.
    pub external: Option<Bracket>,
}

/// The coldest surface point of an internal environment, from the moisture run. Converged, not bracketed.
#[derive(Clone, Debug, PartialEq)]
pub struct TemperatureFactor {
    /// The internal air.
    pub air: AirId,
    /// The class of surface.
    pub class: SurfaceClass,
    /// Temperature factor f_Rsi; `None` where indoor and outdoor temperatures are equal or no environment is external.
    pub value: Option<f64>,
    /// Change of the value since the last pass with at most half the nodes.
    pub change: Option<f64>,
    /// Surface temperature at the point, °C.
    pub temperature_c: f64,
    /// Position in metres.
    pub at: [f64; 2],
    /// The surface it lies on.
    pub surface: SurfaceId,
    /// What meets at the point, in words ("inside corner; gypsum plaster", "edge of concrete and plaster").
    pub meets: String,
    /// Whether smeared spaced bars lie so near that the value must not decide a verdict.
    pub near_spaced_bars: bool,
}

/// What a surface does in the two runs.
#[derive(Clone, Debug, PartialEq)]
pub struct SurfaceResult {
    /// The surface; index in [`Junction::surfaces`].
    pub surface: SurfaceId,
    /// Heat flow into the solid through it, W per metre of junction (heat-flow run, at the file's temperatures).
    pub heat_flow_w_m: f64,
    /// Mean surface temperature, °C (heat-flow run).
    pub mean_c: f64,
    /// Lowest surface temperature, °C (heat-flow run).
    pub lowest_c: f64,
    /// Lowest surface temperature, °C (moisture run).
    pub lowest_moisture_c: f64,
}

/// Temperatures at a named point.
#[derive(Clone, Debug, PartialEq)]
pub struct ProbeResult {
    /// Its name.
    pub name: String,
    /// Position in metres.
    pub at: [f64; 2],
    /// Temperature of the heat-flow run, °C.
    pub temperature_c: f64,
    /// Temperature of the moisture run, °C.
    pub moisture_temperature_c: f64,
}

/// How a coupling responds to an input: a further 1 % of it changes the coupling by `per_percent`.
#[derive(Clone, Debug, PartialEq)]
pub struct Sensitivity {
    /// The warmer air of the pair.
    pub warm: AirId,
    /// The colder air of the pair.
    pub cold: AirId,
    /// The material whose conductivity is meant.
    pub material: String,
    /// Change of the coupling, W/(m·K), for 1 % more conductivity.
    pub per_percent: f64,
}

/// The numerical evidence, beside the bracket.
#[derive(Clone, Debug, PartialEq)]
pub struct Evidence {
    /// Nodes of the last grid.
    pub nodes: usize,
    /// Passes of refinement.
    pub passes: usize,
    /// ISO 10211: sum of all heat flows over half the sum of their absolute values; below 0.0001 is asked.
    pub heat_balance: f64,
    /// ISO 10211: relative change of the sum of absolute heat flows since the last pass with at most half the nodes;
    /// at most 0.01 is asked. `None` where there was no such pass.
    pub two_grid: Option<f64>,
    /// Largest relative departure of upper minus lower side from the sum of its local terms: round-off.
    pub identity_error: f64,
}

/// A rating's figures.
#[derive(Clone, Debug, PartialEq)]
pub struct Rating {
    /// The model rated.
    pub junction: Junction,
    /// What was asked.
    pub request: Request,
    /// Whether every bracket is as narrow as asked and every temperature factor has settled.
    pub bracket_met: bool,
    /// Every pair of airs that the solid joins, in file order of the airs.
    pub couplings: Vec<Coupling>,
    /// Ψ for every pair of airs that flanks separate.
    pub psi: Vec<Psi>,
    /// One for each internal air and surface class present.
    pub temperature_factors: Vec<TemperatureFactor>,
    /// One for each surface of the junction, in its order.
    pub surfaces: Vec<SurfaceResult>,
    /// One for each probe of the junction, in its order.
    pub probes: Vec<ProbeResult>,
    /// How each coupling responds to each material, largest first within a pair.
    pub sensitivities: Vec<Sensitivity>,
    /// The numerical evidence.
    pub evidence: Evidence,
    /// What a reviewer would raise, the drawing's warnings first.
    pub warnings: Vec<String>,
}
