//! What a reviewer would ask about a drawing that can be rated: the facts, and all sentences in one place.

use super::fault_wording::listed;
use super::place;
use crate::input::LengthUnit;

/// A remark on the drawing. Lengths and places in metres.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Remark {
    /// A region is thinner than two vertices can be apart.
    RegionSwallowed { what: String, at: [f64; 2], tolerance_m: f64 },
    /// Later regions cover a region completely.
    RegionCovered { what: String, x: [f64; 2], y: [f64; 2] },
    /// Spaced bars were given an area-weighted conductivity.
    AreaWeighted { part: String, conductivity_w_mk: f64 },
    /// An environment appears nowhere in the section.
    EnvironmentUnused { name: String },
    /// The sheet is so small or so large that the unit may be wrong.
    UnusualSize { size_m: f64 },
    /// No cut plane separates two airs.
    NoFlank,
    /// The only cut planes lie on symmetry edges across from each other and cross different layers.
    FlankUnclear { sides: Vec<String> },
    /// The file's flanks leave out a cut plane between two airs.
    FlankLeftOut { cut: String, airs: [String; 2], at: [f64; 2] },
    /// The file's U differs from that of the layers.
    UDiffers { flank: String, given: f64, layers: f64 },
    /// A given length differs from the measured one.
    LengthDiffers { flank: String, system: &'static str, given_m: f64, measured_m: f64 },
    /// A flank's length runs on where its layers have ended.
    LayersEnd { flank: String, end_m: f64, length_m: f64 },
    /// The drawing does not settle lengths of a flank.
    LengthsUnsettled { flank: String, systems: Vec<&'static str> },
    /// A cut plane lies nearer to the junction than ISO 10211 asks.
    CutTooNear { cut: String, at: [f64; 2], distance_m: f64, asked_m: f64 },
    /// A thin conductive plate bridges insulation.
    PlateBridges { plate: String, thickness_m: f64, insulation: String, from: [f64; 2], to: [f64; 2] },
}

impl Remark {
    /// The sentence, with lengths in the file's unit.
    pub(super) fn sentence(&self, unit: LengthUnit) -> String {
        match self {
            Self::RegionSwallowed { what, at, tolerance_m } => format!(
                "{what} at {} is thinner than {} {}, a millionth of the drawing, and was left out",
                place::point(*at, unit),
                place::significant(tolerance_m / unit.in_metres(), 3),
                unit.symbol()
            ),
            Self::RegionCovered { what, x, y } => {
                format!("{what} at {} is covered completely by later regions", place::rectangle(*x, *y, unit))
            }
            Self::AreaWeighted { part, conductivity_w_mk } => format!(
                "{part}: calculated with the area-weighted conductivity {} W/(m·K)",
                place::significant(*conductivity_w_mk, 4)
            ),
            Self::EnvironmentUnused { name } => format!("environment {name} appears nowhere in the section"),
            Self::UnusualSize { size_m } => format!(
                "the sheet measures {}: is `unit: {}` right for the numbers in the file?",
                place::length(*size_m, unit),
                unit.symbol()
            ),
            Self::NoFlank => {
                "no plane element is cut between two airs at the sheet's edges, so there is no Ψ: only the thermal coupling is given"
                    .to_owned()
            }
            Self::FlankUnclear { sides } => format!(
                "the cut planes on the symmetry edges {} cross different layers, so the drawing does not say which is the \
                 clear element: Ψ is left open; list the one that is under `flanks:`",
                listed(sides)
            ),
            Self::FlankLeftOut { cut, airs: [warm, cold], at } => format!(
                "the element cut at the {cut} ({}) separates {warm} and {cold} but is not among the flanks: its heat flow \
                 stays in Ψ",
                place::point(*at, unit)
            ),
            Self::UDiffers { flank, given, layers } => format!(
                "flank {flank}: the given U of {} W/(m²·K) is used; the layers cut there have {} W/(m²·K)",
                place::significant(*given, 4),
                place::significant(*layers, 4)
            ),
            Self::LengthDiffers { flank, system, given_m, measured_m } => format!(
                "flank {flank}: the given {system} length of {} is used; the drawing measures {}",
                place::length(*given_m, unit),
                place::length(*measured_m, unit)
            ),
            Self::LayersEnd { flank, end_m, length_m } => format!(
                "flank {flank}: its layers change {} from the cut, but its length is {}: on the stretch between, Ψ holds \
                 the difference to U; if another element begins there, cut or list it apart",
                place::length(*end_m, unit),
                place::length(*length_m, unit)
            ),
            Self::LengthsUnsettled { flank, systems } => {
                let systems: Vec<String> = systems.iter().map(|&system| system.to_owned()).collect();
                format!(
                    "flank {flank}: the drawing does not settle its {} length, and Ψ is left open there; complete the \
                     proposed `flanks:`",
                    listed(&systems)
                )
            }
            Self::CutTooNear { cut, at, distance_m, asked_m } => format!(
                "the cut plane at the {cut} ({}) is {} from where its layers change; ISO 10211 asks for {} (1 m, or three \
                 times the thickness): extend the section there by {}",
                place::point(*at, unit),
                place::length(*distance_m, unit),
                place::length(*asked_m, unit),
                place::length(asked_m - distance_m, unit)
            ),
            Self::PlateBridges { plate, thickness_m, insulation, from, to } => format!(
                "{plate}, {} thick, bridges {insulation} from {} to {}: is it really a plate that runs on along the \
                 junction? Separate bars or fixings are drawn with `spaced:`, which lets far less heat through",
                place::length(*thickness_m, unit),
                place::point(*from, unit),
                place::point(*to, unit)
            ),
        }
    }

    /// What such remarks are about, where they are only counted.
    pub(super) fn kind(&self) -> &'static str {
        match self {
            Self::RegionSwallowed { .. } => "regions thinner than a millionth of the drawing, left out",
            Self::RegionCovered { .. } => "regions covered completely by later regions",
            Self::AreaWeighted { .. } => "solids calculated with an area-weighted conductivity",
            Self::EnvironmentUnused { .. } => "environments that appear nowhere in the section",
            Self::UnusualSize { .. } => "sheets of an unusual size",
            Self::NoFlank => "sections without a plane element between two airs",
            Self::FlankUnclear { .. } => "cut planes on symmetry edges that cross different layers",
            Self::FlankLeftOut { .. } => "cut planes between the flanks' airs that are no flanks",
            Self::UDiffers { .. } => "flanks with a given U that differs from that of their layers",
            Self::LengthDiffers { .. } => "given lengths that differ from the drawing's",
            Self::LayersEnd { .. } => "flanks whose length runs on where their layers have ended",
            Self::LengthsUnsettled { .. } => "flanks with lengths that the drawing does not settle",
            Self::CutTooNear { .. } => "cut planes nearer to where their layers change than ISO 10211 asks",
            Self::PlateBridges { .. } => "thin metal plates that bridge insulation",
        }
    }
}

/// Faults and remarks as they are found.
#[derive(Debug, Default)]
pub(super) struct Findings {
    /// What keeps the drawing from being rated.
    pub(super) faults: Vec<super::fault::Fault>,
    /// What is worth a look.
    pub(super) remarks: Vec<Remark>,
}
