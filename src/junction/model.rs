//! The checked model in SI units. Nothing in it is left to resolve, and an impossible state cannot be built.

use super::sheet::Sheet;
use crate::index::{AirId, EnvironmentId, PartId, SurfaceId};
use crate::input::{EnvironmentKind, LengthUnit, Plane, Side, SurfaceClass};

/// The air of an environment.
#[derive(Clone, Debug, PartialEq)]
pub struct Air {
    /// Its name.
    pub name: String,
    /// Internal, unheated or external.
    pub kind: EnvironmentKind,
    /// Temperature in °C.
    pub temperature_c: f64,
    /// Relative humidity in percent, where given.
    pub relative_humidity_percent: Option<f64>,
}

/// An entry of `environments:`: a surface rule on some air.
#[derive(Clone, Debug, PartialEq)]
pub struct Environment {
    /// Its name.
    pub name: String,
    /// Whose air it is.
    pub air: AirId,
}

/// A solid of one conductivity and surface class.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    /// The material's name.
    pub material: String,
    /// Thermal conductivity in W/(m·K); for spaced bars the area-weighted one.
    pub conductivity_w_mk: f64,
    /// Where the conductivity comes from, for the report.
    pub source: String,
    /// The class of its surfaces in the moisture run.
    pub class: SurfaceClass,
    /// For spaced bars, their distance along the junction in metres.
    pub bar_spacing_m: Option<f64>,
}

/// The direction in which heat leaves or enters an air at a surface (ISO 6946).
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HeatDirection {
    /// Upwards.
    Up,
    /// Horizontally, or not settled.
    Horizontal,
    /// Downwards.
    Down,
}

impl HeatDirection {
    /// up, horizontal or down.
    pub fn word(self) -> &'static str {
        match self {
            Self::Up => "up",
            Self::Horizontal => "horizontal",
            Self::Down => "down",
        }
    }
}

/// A straight piece of surface with one surface resistance.
#[derive(Clone, Debug, PartialEq)]
pub struct Surface {
    /// The environment it faces.
    pub environment: EnvironmentId,
    /// That environment's air.
    pub air: AirId,
    /// Its class in the moisture run.
    pub class: SurfaceClass,
    /// One end, in metres (the one with the smaller coordinate).
    pub from: [f64; 2],
    /// The other end, in metres.
    pub to: [f64; 2],
    /// The side of the solid on which the air lies: `Top` for a floor's upper face.
    pub faces: Side,
    /// The direction of heat flow that decided the resistance.
    pub direction: HeatDirection,
    /// Surface resistance of the heat-flow run in m²K/W; 0 is a prescribed temperature.
    pub resistance: f64,
    /// Surface resistance of the moisture run in m²K/W.
    pub moisture_resistance: f64,
    /// Where the two resistances come from, for the report ("ISO 6946, horizontal", "given").
    pub rule: String,
}

impl Surface {
    /// Its length in metres.
    pub fn length_m(&self) -> f64 {
        (self.to[0] - self.from[0]).hypot(self.to[1] - self.from[1])
    }
}

/// One layer of a flank, from the warm side to the cold side.
#[derive(Clone, Debug, PartialEq)]
pub struct Layer {
    /// The part it is made of.
    pub part: PartId,
    /// Thickness in metres.
    pub thickness_m: f64,
}

/// A cut through solid on an adiabatic edge, from air to air.
#[derive(Clone, Debug, PartialEq)]
pub struct Cut {
    /// The sheet edge it lies on (or faces, where it lies on a void).
    pub side: Side,
    /// One end, in metres (the one with the smaller coordinate).
    pub from: [f64; 2],
    /// The other end, in metres.
    pub to: [f64; 2],
    /// The surface met at `from`.
    pub surface_from: SurfaceId,
    /// The surface met at `to`.
    pub surface_to: SurfaceId,
    /// Layers from `from` to `to`.
    pub layers: Vec<Layer>,
    /// Whether it lies on the sheet's edge (and not against a void).
    pub on_sheet_edge: bool,
    /// Whether it lies on a plane of symmetry.
    pub symmetry: bool,
    /// Distance from the cut to the nearest place where its sequence of layers changes, in metres;
    /// `None` where it never does.
    pub undisturbed_m: Option<f64>,
}

/// A length of a flank in one dimension system.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Lengths {
    /// Internal, in metres; `None` where neither file nor geometry settles it.
    pub internal_m: Option<f64>,
    /// Overall internal, in metres.
    pub overall_internal_m: Option<f64>,
    /// External, in metres.
    pub external_m: Option<f64>,
}

/// A plane element that meets the junction.
#[derive(Clone, Debug, PartialEq)]
pub struct Flank {
    /// Its name.
    pub name: String,
    /// Where it is cut; index in [`Junction::cuts`].
    pub cut: usize,
    /// The warmer air (by kind, then temperature, then order in the file).
    pub warm: AirId,
    /// The colder air.
    pub cold: AirId,
    /// Surface resistance on the warm side, m²K/W.
    pub warm_resistance: f64,
    /// Surface resistance on the cold side, m²K/W.
    pub cold_resistance: f64,
    /// Layers from warm to cold.
    pub layers: Vec<Layer>,
    /// The one-dimensional thermal transmittance of these layers, surface to surface, W/(m²·K).
    pub u_layers_w_m2k: f64,
    /// The transmittance used for Ψ: the file's own, or that of the layers.
    pub u_w_m2k: f64,
    /// The lengths used for Ψ: the file's own, or measured.
    pub lengths: Lengths,
    /// The lengths measured in the drawing, where its geometry settles them.
    pub measured: Lengths,
}

/// A named point at which temperatures are wanted; it lies in a solid or on its edge.
#[derive(Clone, Debug, PartialEq)]
pub struct Probe {
    /// Its name.
    pub name: String,
    /// Position in metres.
    pub at: [f64; 2],
}

/// A junction that can be solved.
#[derive(Clone, Debug, PartialEq)]
pub struct Junction {
    /// The title.
    pub title: String,
    /// How the section lies.
    pub plane: Plane,
    /// The unit the user thinks in, for coordinates in messages.
    pub unit: LengthUnit,
    /// Airs, in file order.
    pub airs: Vec<Air>,
    /// Environments, in file order.
    pub environments: Vec<Environment>,
    /// Parts, in order of first appearance.
    pub parts: Vec<Part>,
    /// The drawing on its own lines.
    pub sheet: Sheet,
    /// Surfaces, in the order environment, then bottom to top, then left to right.
    pub surfaces: Vec<Surface>,
    /// Sheet edges that are planes of symmetry.
    pub symmetry: Vec<Side>,
    /// Cuts through solid from air to air on the sheet's edges and on voids.
    pub cuts: Vec<Cut>,
    /// The plane elements for Ψ; empty where none was found or settled.
    pub flanks: Vec<Flank>,
    /// A ready-to-paste `flanks:` block with what could be measured, where lengths are not settled.
    pub flank_proposal: Option<String>,
    /// Points at which temperatures are wanted.
    pub probes: Vec<Probe>,
    /// What a reviewer would ask about the drawing, one sentence each, in the order found.
    pub warnings: Vec<String>,
}
