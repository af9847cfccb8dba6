//! Layered walls, roofs and floors by ISO 6946: U = 1/(R_si + Σ d/λ + R_se).

use super::rated::rated;
use super::{CaseResult, Item};
use crate::rating::Request;

/// A plane element has no gap but rounding: the bracket must be this narrow, W/(m²·K).
const ALLOWED: f64 = 1e-6;

/// An element: name, surface resistances inside and outside, layers of thickness (m) and conductivity, drawn `towards`.
struct Element {
    name: &'static str,
    inside: f64,
    outside: f64,
    layers: &'static [(f64, f64)],
    towards: &'static str,
}

const ELEMENTS: [Element; 3] = [
    Element {
        name: "wall, horizontal",
        inside: 0.13,
        outside: 0.04,
        layers: &[(0.013, 0.57), (0.2, 0.5), (0.14, 0.035), (0.015, 1.0)],
        towards: "right",
    },
    Element {
        name: "flat roof, upwards",
        inside: 0.10,
        outside: 0.04,
        layers: &[(0.2, 2.3), (0.22, 0.035), (0.01, 0.23)],
        towards: "up",
    },
    Element {
        name: "floor, downwards",
        inside: 0.17,
        outside: 0.04,
        layers: &[(0.05, 1.35), (0.03, 0.04), (0.2, 2.3), (0.16, 0.036), (0.008, 1.0)],
        towards: "down",
    },
];

/// The three directions of heat flow, each with the surface resistances of ISO 6946 found by the tool.
pub(super) fn elements() -> CaseResult {
    CaseResult {
        name: "Thermal transmittance U of layered elements, by direction of heat flow".to_string(),
        source: "ISO 6946:2017 (surface resistances recalled and reproduced from the standard's own formula)"
            .to_string(),
        items: ELEMENTS.iter().map(item).collect(),
    }
}

fn item(element: &Element) -> Item {
    let Element { name, inside, outside, layers, towards } = element;
    let resistance: f64 = inside + layers.iter().map(|(thickness, lambda)| thickness / lambda).sum::<f64>() + outside;
    let exact = 1.0 / resistance;
    let total: f64 = layers.iter().map(|(thickness, _)| thickness).sum();
    let (along, across) = if *towards == "right" { ("x", "y") } else { ("y", "x") };
    let sign = if *towards == "down" { -1.0 } else { 1.0 };
    let mut text = "
title: layered element
unit: m
plane: vertical
environments:
  inside: { kind: internal, temperature: 20 }
  outside: { kind: external, temperature: 0 }
materials:
"
    .to_string();
    let mut buildup = String::new();
    for (number, (thickness, lambda)) in layers.iter().enumerate() {
        text += &format!("  layer {number}: {{ conductivity: {lambda} }}\n");
        buildup += &format!("    - layer {number}: {thickness}\n");
    }
    text += &format!(
        "
buildups:
  element:
{buildup}
section:
  - {{ environment: inside, {along}: [{near}, 0], {across}: [0, 1] }}
  - {{ environment: outside, {along}: [{far}, {beyond}], {across}: [0, 1] }}
  - {{ buildup: element, {along}: 0, towards: {towards}, {across}: [0, 1] }}
flanks: []
",
        near = -0.1 * sign,
        far = total * sign,
        beyond = (total + 0.1) * sign,
    );
    let rating = rated(name, &text, &Request::default());
    let bracket = rating.couplings[0].bracket.expect("films keep the coupling finite");
    Item {
        quantity: (*name).to_string(),
        unit: "W/(m²·K)",
        published: exact,
        computed: bracket.value(),
        bracket: Some((bracket.low, bracket.high)),
        allowed: ALLOWED,
        holds: bracket.low - 1e-12 <= exact && exact <= bracket.high + 1e-12 && bracket.half_width() <= ALLOWED,
        note: String::new(),
    }
}
