//! Surface resistances after ISO 6946 (heat-flow run) and ISO 13788 (moisture run).
//!
//! ISO 6946: external 0.04; elsewhere 0.10, 0.13 or 0.17 m²K/W as heat flows upwards, horizontally (the face's normal
//! within 30° of horizontal) or downwards. ISO 13788: 0.25 on internal opaque surfaces, 0.13 on frames and glazing.

use super::model::{Air, HeatDirection};
use crate::catalogue::surfaces;
use crate::index::AirId;
use crate::input::{Environment, EnvironmentKind, Plane, Resistances, Side, SurfaceClass};
use std::cmp::Ordering;

/// Orders two airs by warmth, the warmer one first: by kind, then by temperature.
pub(super) fn by_warmth(a: &Air, b: &Air) -> Ordering {
    a.kind.cmp(&b.kind).then(b.temperature_c.total_cmp(&a.temperature_c))
}

/// Two different airs, the warmer one first: by kind, then temperature, then order in the file.
pub(super) fn warmer_first(airs: &[Air], a: AirId, b: AirId) -> [AirId; 2] {
    let order = by_warmth(&airs[a.index()], &airs[b.index()]).then(a.cmp(&b));
    if order == Ordering::Greater { [b, a] } else { [a, b] }
}

/// The direction of heat flow at a surface that `faces` its own air, with the air `across` the solid, met by following
/// the normal inwards (`None` where the sheet or a void ends it).
pub(super) fn direction(airs: &[Air], plane: Plane, faces: Side, own: AirId, across: Option<AirId>) -> HeatDirection {
    let (Plane::Vertical, Side::Top | Side::Bottom, Some(across)) = (plane, faces, across) else {
        return HeatDirection::Horizontal;
    };
    let order = by_warmth(&airs[own.index()], &airs[across.index()]);
    match (order, faces) {
        (Ordering::Equal, _) => HeatDirection::Horizontal,
        // a warm room's floor, or the ceiling of a cold space under a warm one
        (Ordering::Less, Side::Top) | (Ordering::Greater, Side::Bottom) => HeatDirection::Down,
        _ => HeatDirection::Up,
    }
}

/// The resistances of one surface, and where they come from.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Resistance {
    /// Heat-flow run, m²K/W.
    pub(super) heat: f64,
    /// Moisture run, m²K/W.
    pub(super) moisture: f64,
    /// Both origins in words.
    pub(super) rule: String,
}

fn chosen(given: Resistances, direction: HeatDirection) -> (f64, String) {
    match given {
        Resistances::One(value) => (value, "given in the file".to_owned()),
        Resistances::ByDirection { up, horizontal, down } => {
            let value = match direction {
                HeatDirection::Up => up,
                HeatDirection::Horizontal => horizontal,
                HeatDirection::Down => down,
            };
            (value, format!("given in the file, heat flow {}", direction.word()))
        }
    }
}

/// The resistances of a surface of `class` on `environment`, with heat flowing in `direction`.
pub(super) fn resistance(environment: &Environment, class: SurfaceClass, direction: HeatDirection) -> Resistance {
    let (heat, heat_rule) = if let Some(given) = environment.surface_resistance {
        chosen(given, direction)
    } else if environment.kind == EnvironmentKind::External {
        (surfaces::EXTERNAL_M2K_W, "ISO 6946, external".to_owned())
    } else {
        let value = match direction {
            HeatDirection::Up => surfaces::INTERNAL_UPWARDS_M2K_W,
            HeatDirection::Horizontal => surfaces::INTERNAL_HORIZONTAL_M2K_W,
            HeatDirection::Down => surfaces::INTERNAL_DOWNWARDS_M2K_W,
        };
        (value, format!("ISO 6946, heat flow {}", direction.word()))
    };
    let (moisture, moisture_rule) = if let Some(given) = environment.moisture_resistance {
        let (value, rule) = chosen(given, direction);
        (value, Some(rule))
    } else if heat == 0.0 || environment.kind != EnvironmentKind::Internal {
        (heat, None)
    } else {
        let value = if class == SurfaceClass::Opaque {
            surfaces::MOISTURE_OPAQUE_M2K_W
        } else {
            surfaces::MOISTURE_FRAME_AND_GLAZING_M2K_W
        };
        (value, Some(format!("ISO 13788, {}", class.word())))
    };
    let rule = match moisture_rule {
        Some(moisture_rule) => format!("{heat_rule}; moisture run: {moisture_rule}"),
        None => heat_rule,
    };
    Resistance { heat, moisture, rule }
}
