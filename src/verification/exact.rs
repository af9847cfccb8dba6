//! Exact two-dimensional results: the bracket must hold them.
//!
//! Unless a case says otherwise, values were derived or recalled and confirmed by an independent finite-element solve.

use super::rated::rated;
use super::{CaseResult, Item};
use crate::rating::{Accuracy, Bracket, Rating, Request};

/// The relative half-width asked in these cases.
const ASKED: f64 = 1e-4;

/// Crosswise quadrants are not met at any sensible number of nodes; this many show an honest bracket.
const CROSSWISE_NODE_LIMIT: usize = 20_000;

/// With that many nodes a crosswise bracket's half-width is within this fraction of the exact value.
const CROSSWISE_ALLOWED: f64 = 0.05;

/// Tip temperatures of the fin are converged, not bracketed, and may differ by this much of the base's.
const TIP_TOLERANCE: f64 = 5e-4;

fn request() -> Request {
    Request { accuracy: Accuracy::Relative(ASKED), ..Request::default() }
}

fn coupling(rating: &Rating) -> Bracket {
    rating.couplings[0].bracket.expect("no prescribed surfaces touch in these cases")
}

/// An exact value against a bracket: it must lie inside, and the bracket must be as narrow as asked.
fn held(quantity: String, exact: f64, bracket: Bracket, allowed: f64) -> Item {
    Item {
        quantity,
        unit: "W/(m·K)",
        published: exact,
        computed: bracket.value(),
        bracket: Some((bracket.low, bracket.high)),
        allowed,
        holds: bracket.low <= exact && exact <= bracket.high && bracket.half_width() <= allowed,
        note: String::new(),
    }
}

/// Isothermal corner of walls a and b thick, excess over inner lengths, conductivity 1:
/// E(r) = 2/π (ln((1 + r²)/4r) + r atan(1/r) + atan(r)/r), r = a/b.
pub(super) fn corners() -> CaseResult {
    let item = |r: f64| {
        let excess =
            2.0 / std::f64::consts::PI * (((1.0 + r * r) / (4.0 * r)).ln() + r * (1.0 / r).atan() + r.atan() / r);
        let leg = 8.0 * r;
        let text = format!(
            "
title: isothermal corner
unit: m
plane: horizontal
environments:
  inside: {{ kind: internal, temperature: 1, surface_resistance: 0 }}
  outside: {{ kind: external, temperature: 0, surface_resistance: 0 }}
materials:
  wall: {{ conductivity: 1 }}
section:
  - {{ environment: outside, x: [{far}, {leg}], y: [-2, {leg}] }}
  - {{ material: wall, x: [-{r}, {leg}], y: [-1, {leg}] }}
  - {{ environment: inside, x: [0, {leg}], y: [0, {leg}] }}
",
            far = -r - 1.0,
        );
        let rating = rated("isothermal corner", &text, &request());
        let plain = leg / r + leg;
        let bracket = coupling(&rating);
        held(format!("ratio {r}"), excess, bracket.plus(-plain), ASKED * (plain + excess))
    };
    CaseResult {
        name: "Isothermal corner of two walls: excess over inner lengths by thickness ratio".to_string(),
        source: "exact, by conformal mapping; for equal walls 1 − 2 ln 2/π".to_string(),
        items: [1.0, 1.5, 2.0, 3.0].map(item).into(),
    }
}

/// A strip at 1 on a slab at 0 below, adiabatic beside the strip: strip s, slab W wide and H high.
pub(super) fn strips() -> CaseResult {
    // [s, W, H, conductance], from elliptic integrals evaluated to 30 digits.
    let cases = [
        [0.5, 1.0, 1.0, 0.819_644_188_480_507],
        [0.25, 1.0, 1.0, 0.621_205_357_245_511],
        [0.1, 1.0, 1.0, 0.458_979_928_075_517],
        [0.5, 1.0, 0.5, std::f64::consts::SQRT_2],
        [0.5, 1.0, 2.0, 0.450_321_745_635_689],
        [1.0, 4.0, 1.0, 1.441_071_156_215_32],
    ];
    let item = |[s, w, h, exact]: [f64; 4]| {
        let text = format!(
            "
title: strip on a slab
unit: m
plane: horizontal
environments:
  strip: {{ kind: internal, temperature: 1, surface_resistance: 0 }}
  below: {{ kind: external, temperature: 0, surface_resistance: 0 }}
materials:
  slab: {{ conductivity: 1 }}
section:
  - {{ material: slab, x: [0, {w}], y: [0, {h}] }}
  - {{ environment: below, x: [0, {w}], y: [-1, 0] }}
  - {{ environment: strip, x: [0, {s}], y: [{h}, {h} + 1] }}
  - {{ void: adiabatic, x: [{s}, {w}], y: [{h}, {h} + 1] }}
symmetry: [left, right]
flanks: []
"
        );
        let bracket = coupling(&rated("strip on a slab", &text, &request()));
        held(format!("{s}, {w}, {h}"), exact, bracket, ASKED * exact)
    };
    CaseResult {
        name: "Strip on a slab: width of the strip, width and height of the slab".to_string(),
        source: "exact, by elliptic integrals; square-root singularity at the strip's edge".to_string(),
        items: cases.map(item).into(),
    }
}

/// Four equal quadrants that meet at a point, heat from left to right.
pub(super) fn quadrants() -> CaseResult {
    let item = |s: [f64; 4], crosswise: bool| {
        let [s1, s2, s3, s4] = s;
        let triples = s1 * s2 * s3 + s1 * s2 * s4 + s1 * s3 * s4 + s2 * s3 * s4;
        let exact = (triples / (s1 + s2 + s3 + s4) * (s1 + s4) * (s2 + s3) / ((s1 + s2) * (s3 + s4))).sqrt();
        let text = format!(
            "
title: four quadrants
unit: m
plane: horizontal
environments:
  left: {{ kind: internal, temperature: 1, surface_resistance: 0 }}
  right: {{ kind: external, temperature: 0, surface_resistance: 0 }}
materials:
  top left: {{ conductivity: {s1} }}
  top right: {{ conductivity: {s2} }}
  bottom right: {{ conductivity: {s3} }}
  bottom left: {{ conductivity: {s4} }}
section:
  - {{ environment: left, x: [-2, -1], y: [-1, 1] }}
  - {{ environment: right, x: [1, 2], y: [-1, 1] }}
  - {{ material: top left, x: [-1, 0], y: [0, 1] }}
  - {{ material: top right, x: [0, 1], y: [0, 1] }}
  - {{ material: bottom right, x: [0, 1], y: [-1, 0] }}
  - {{ material: bottom left, x: [-1, 0], y: [-1, 0] }}
symmetry: [top, bottom]
flanks: []
"
        );
        let node_limit = if crosswise { CROSSWISE_NODE_LIMIT } else { Request::default().node_limit };
        let bracket = coupling(&rated("four quadrants", &text, &Request { node_limit, ..request() }));
        let allowed = if crosswise { CROSSWISE_ALLOWED } else { ASKED } * exact;
        let mut item = held(format!("{s1}, {s2}, {s3}, {s4}"), exact, bracket, allowed);
        if crosswise {
            item.note = "crosswise contact: converges slowly, and the bracket is wide".to_string();
        }
        item
    };
    CaseResult {
        name: "Four quadrants: conductivities clockwise from top left".to_string(),
        source: "exact (Craster and Obnosov 2001; Keller 1964, Dykhne 1970 for two materials crosswise; recalled, confirmed)".to_string(),
        items: vec![
            item([1.0, 10.0, 1.0, 10.0], false),
            item([1.0, 1.0, 1.0, 10.0], false),
            item([1.0, 2.0, 3.0, 4.0], false),
            item([0.04, 2.5, 0.7, 1.0], false),
            item([2.3, 0.04, 2.3, 0.04], true),
            item([1.0, 100.0, 1.0, 100.0], true),
        ],
    }
}

/// Half of a plate fin, half-thickness 1, conductivity 1, base at 1, film Bi on top and tip.
pub(super) fn fins() -> CaseResult {
    // [Bi, length, heat flow, tip temperature at mid-plane, at the corner]: exact series, 200,000 terms.
    let cases = [
        [1.0, 5.0, 0.902_845_722, 0.014_021_757, 0.009_144_788],
        [0.5, 8.0, 0.666_638_431, 0.006_515_228, 0.005_173_741],
        [2.0, 3.0, 1.195_444_786, 0.032_620_306, 0.015_472_125],
        [0.1, 5.0, 0.297_818_326, 0.317_416_662, 0.302_184_436],
    ];
    let mut items = Vec::new();
    for [biot, length, heat, middle, corner] in cases {
        let text = format!(
            "
title: plate fin
unit: m
plane: horizontal
environments:
  base: {{ kind: internal, temperature: 1, surface_resistance: 0 }}
  air: {{ kind: external, temperature: 0, surface_resistance: 1 / {biot} }}
materials:
  fin: {{ conductivity: 1 }}
section:
  - {{ environment: base, x: [-1, 0], y: [0, 1] }}
  - {{ material: fin, x: [0, {length}], y: [0, 1] }}
  - {{ environment: air, x: [0, {length}], y: [1, 2] }}
  - {{ environment: air, x: [{length}, {length} + 1], y: [0, 1] }}
symmetry: [bottom]
flanks: []
probes:
  middle: [{length}, 0]
  corner: [{length}, 1]
"
        );
        let rating = rated("plate fin", &text, &request());
        items.push(held(format!("heat {biot}, {length}"), heat, coupling(&rating), ASKED * heat));
        for (probe, exact) in rating.probes.iter().zip([middle, corner]) {
            items.push(Item {
                quantity: format!("{} {biot}, {length}", probe.name),
                unit: "K per K",
                published: exact,
                computed: probe.temperature_c,
                bracket: None,
                allowed: TIP_TOLERANCE,
                holds: (probe.temperature_c - exact).abs() <= TIP_TOLERANCE,
                note: String::new(),
            });
        }
    }
    CaseResult {
        name: "Plate fin: heat flow, tip temperature (middle, corner) by Biot number, length".to_string(),
        source: "exact, by separation of variables (series of 200,000 terms)".to_string(),
        items,
    }
}
