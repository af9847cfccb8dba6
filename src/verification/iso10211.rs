//! The two-dimensional validation cases of ISO 10211 (2007 Annex A, 2017 Annex C), cases 1 and 2.

use super::rated::rated;
use super::{CaseResult, Item};
use crate::rating::{Accuracy, Rating, Request};

/// The standard allows this departure of a temperature, K.
const TEMPERATURE_TOLERANCE_K: f64 = 0.1;

/// The standard allows this departure of case 2's heat flow, W/m.
const HEAT_FLOW_TOLERANCE_W_M: f64 = 0.1;

/// Case 1: half of a square column with prescribed surface temperatures. Row by row from the top, x = a/4 … a.
///
/// The table was recalled and then reproduced to its last digit by the Fourier series
/// T = 20 Σ 4/(nπ) sin(nπx/2a) sinh(nπy/2a)/sinh(nπ), n odd.
const COLUMN_TABLE: [[f64; 4]; 7] = [
    [9.7, 13.4, 14.7, 15.1],
    [5.3, 8.6, 10.3, 10.8],
    [3.2, 5.6, 7.0, 7.5],
    [2.0, 3.6, 4.7, 5.0],
    [1.3, 2.3, 3.0, 3.2],
    [0.7, 1.4, 1.8, 1.9],
    [0.3, 0.6, 0.8, 0.9],
];

/// Case 2's points in mm with the standard's temperatures, °C.
const SHEETED_POINTS: [(&str, f64, f64, f64); 9] = [
    ("A", 0.0, 47.5, 7.1),
    ("B", 500.0, 47.5, 0.8),
    ("C", 0.0, 41.5, 7.9),
    ("D", 15.0, 41.5, 6.3),
    ("E", 500.0, 41.5, 0.8),
    ("F", 0.0, 36.5, 16.4),
    ("G", 15.0, 36.5, 16.3),
    ("H", 0.0, 0.0, 16.8),
    ("I", 500.0, 0.0, 18.3),
];

/// Case 2's heat flow, W/m.
const SHEETED_HEAT_FLOW_W_M: f64 = 9.5;

const COLUMN: &str = "
title: ISO 10211 case 1
unit: m
plane: horizontal
environments:
  hot: { kind: internal, temperature: 20, surface_resistance: 0 }
  cold: { kind: external, temperature: 0, surface_resistance: 0 }
materials:
  column: { conductivity: 1 }
section:
  - { environment: hot, x: [0, 1], y: [2, 2.1] }
  - { environment: cold, x: [-0.1, 0], y: [0, 2] }
  - { environment: cold, x: [0, 1], y: [-0.1, 0] }
  - { material: column, x: [0, 1], y: [0, 2] }
symmetry: [right]
";

const SHEETED: &str = "
title: ISO 10211 case 2
unit: mm
plane: horizontal
environments:
  outside: { kind: external, temperature: 0, surface_resistance: 0.06 }
  inside: { kind: internal, temperature: 20, surface_resistance: 0.11 }
materials:
  concrete: { conductivity: 1.15 }
  insulation: { conductivity: 0.029 }
  timber: { conductivity: 0.12 }
  aluminium: { conductivity: 230 }
section:
  - { environment: outside, x: [0, 500], y: [47.5, 57.5] }
  - { environment: inside, x: [0, 500], y: [-10, 0] }
  - { material: insulation, x: [0, 500], y: [1.5, 41.5] }
  - { material: concrete, x: [0, 500], y: [41.5, 47.5] }
  - { material: timber, x: [0, 15], y: [36.5, 41.5] }
  - { material: aluminium, x: [0, 500], y: [0, 1.5] }
  - { material: aluminium, x: [0, 1.5], y: [0, 36.5] }
  - { material: aluminium, x: [0, 15], y: [35, 36.5] }
symmetry: [left, right]
";

/// Case 1: 28 temperatures; the heat flow is infinite at the corner where 20 °C and 0 °C touch.
pub(super) fn column() -> CaseResult {
    let mut text = COLUMN.to_string() + "probes:\n";
    for (row, values) in COLUMN_TABLE.iter().enumerate() {
        for column in 0..values.len() {
            let (x, y) = (0.25 * (column + 1) as f64, 1.75 - 0.25 * row as f64);
            text += &format!("  row {} column {}: [{x}, {y}]\n", row + 1, column + 1);
        }
    }
    let rating = rated("ISO 10211 case 1", &text, &Request::default());
    let published = COLUMN_TABLE.iter().flatten();
    CaseResult {
        name: "ISO 10211 case 1: half of a square column, 28 temperatures".to_string(),
        source: "ISO 10211:2017 Annex C, case 1 (table recalled; reproduced by its Fourier series)".to_string(),
        items: rating
            .probes
            .iter()
            .zip(published)
            .map(|(probe, &value)| temperature(&probe.name, probe.temperature_c, value))
            .collect(),
    }
}

/// Case 2: nine temperatures and the heat flow through a sheeted panel.
pub(super) fn sheeted() -> CaseResult {
    let mut text = SHEETED.to_string() + "probes:\n";
    for (name, x, y, _) in SHEETED_POINTS {
        text += &format!("  {name}: [{x}, {y}]\n");
    }
    let rating =
        rated("ISO 10211 case 2", &text, &Request { accuracy: Accuracy::Relative(1e-3), ..Request::default() });
    let mut items: Vec<Item> = rating
        .probes
        .iter()
        .zip(SHEETED_POINTS)
        .map(|(probe, (name, .., value))| temperature(name, probe.temperature_c, value))
        .collect();
    items.push(heat_flow(&rating));
    CaseResult {
        name: "ISO 10211 case 2: sheeted panel, nine temperatures and the heat flow".to_string(),
        source: "ISO 10211:2017 Annex C, case 2".to_string(),
        items,
    }
}

fn temperature(point: &str, computed: f64, published: f64) -> Item {
    Item {
        quantity: point.to_string(),
        unit: "°C",
        published,
        computed,
        bracket: None,
        allowed: TEMPERATURE_TOLERANCE_K,
        holds: (computed - published).abs() <= TEMPERATURE_TOLERANCE_K,
        note: String::new(),
    }
}

fn heat_flow(rating: &Rating) -> Item {
    let bracket = rating.couplings[0].bracket.expect("no prescribed surfaces touch in case 2");
    let (low, high) = (20.0 * bracket.low, 20.0 * bracket.high);
    let within = |value: f64| (value - SHEETED_HEAT_FLOW_W_M).abs() <= HEAT_FLOW_TOLERANCE_W_M;
    Item {
        quantity: "heat flow".to_string(),
        unit: "W/m",
        published: SHEETED_HEAT_FLOW_W_M,
        computed: 20.0 * bracket.value(),
        bracket: Some((low, high)),
        allowed: HEAT_FLOW_TOLERANCE_W_M,
        holds: within(low) && within(high),
        note: String::new(),
    }
}
