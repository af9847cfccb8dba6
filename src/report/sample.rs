//! Ratings written by hand for the tests of this room: nothing here was solved, and the figures need not agree.

use super::files::{Problem, RatedFile};
use crate::index::{AirId, EnvironmentId, PartId, SurfaceId};
use crate::input::{EnvironmentKind, LengthUnit, Plane, Severity, Side, SurfaceClass};
use crate::junction::{
    Air, Content, Cut, Environment, Flank, HeatDirection, Junction, Layer, Lengths, Part, Probe, Sheet, Surface,
};
use crate::rating::{
    Accuracy, Bracket, Coupling, Evidence, ProbeResult, Psi, Rating, Request, Sensitivity, SurfaceResult,
    TemperatureFactor,
};

fn air(name: &str, kind: EnvironmentKind, temperature_c: f64, humidity: Option<f64>) -> Air {
    Air { name: name.into(), kind, temperature_c, relative_humidity_percent: humidity }
}

fn part(material: &str, conductivity_w_mk: f64, source: &str) -> Part {
    Part {
        material: material.into(),
        conductivity_w_mk,
        source: source.into(),
        class: SurfaceClass::Opaque,
        bar_spacing_m: None,
    }
}

fn surface(environment: usize, from: [f64; 2], to: [f64; 2], faces: Side) -> Surface {
    let inside = environment == 0;
    Surface {
        environment: EnvironmentId::new(environment),
        air: AirId::new(environment),
        class: SurfaceClass::Opaque,
        from,
        to,
        faces,
        direction: HeatDirection::Horizontal,
        resistance: if inside { 0.13 } else { 0.04 },
        moisture_resistance: if inside { 0.25 } else { 0.04 },
        rule: "ISO 6946, horizontal; ISO 13788".into(),
    }
}

fn layers() -> Vec<Layer> {
    let layer = |part, thickness_m| Layer { part: PartId::new(part), thickness_m };
    vec![layer(3, 0.013), layer(2, 0.2), layer(1, 0.14), layer(0, 0.015)]
}

fn flank(name: &str, cut: usize) -> Flank {
    let lengths = Lengths { internal_m: Some(1.2), overall_internal_m: Some(1.3), external_m: Some(1.3) };
    Flank {
        name: name.into(),
        cut,
        warm: AirId::new(0),
        cold: AirId::new(1),
        warm_resistance: 0.13,
        cold_resistance: 0.04,
        layers: layers(),
        u_layers_w_m2k: 0.2164,
        u_w_m2k: 0.2164,
        lengths,
        measured: lengths,
    }
}

fn cut(side: Side, y: f64, from: usize, to: usize) -> Cut {
    Cut {
        side,
        from: [0.0, y],
        to: [0.368, y],
        surface_from: SurfaceId::new(from),
        surface_to: SurfaceId::new(to),
        layers: layers().into_iter().rev().collect(),
        on_sheet_edge: true,
        symmetry: false,
        undisturbed_m: Some(1.2),
    }
}

/// A balcony slab that runs through a wall.
pub(super) fn junction() -> Junction {
    Junction {
        title: "Balcony slab through an externally insulated wall".into(),
        plane: Plane::Vertical,
        unit: LengthUnit::Millimetre,
        airs: vec![
            air("flat", EnvironmentKind::Internal, 20.0, Some(50.0)),
            air("outdoors", EnvironmentKind::External, -5.0, None),
        ],
        environments: vec![
            Environment { name: "flat".into(), air: AirId::new(0) },
            Environment { name: "outdoors".into(), air: AirId::new(1) },
        ],
        parts: vec![
            part("cement render", 1.0, "the file"),
            part("mineral wool", 0.035, "the file"),
            part("hollow block", 0.5, "the file: declared by the maker"),
            part("gypsum plaster", 0.57, "the file"),
            part("reinforced concrete", 2.3, "catalogue: ISO 10456, table 3 (1 % of steel)"),
        ],
        sheet: Sheet::new(vec![-1.2, 0.0, 0.368, 1.6], vec![-1.3, 1.3], vec![Content::Outside; 3]),
        surfaces: vec![
            surface(0, [0.368, -0.1], [1.6, -0.1], Side::Bottom),
            surface(0, [0.368, 0.1], [1.6, 0.1], Side::Top),
            surface(0, [0.368, -1.3], [0.368, -0.1], Side::Right),
            surface(0, [0.368, 0.1], [0.368, 1.3], Side::Right),
            surface(1, [0.0, -1.3], [0.0, -0.1], Side::Left),
            surface(1, [0.0, 0.1], [0.0, 1.3], Side::Left),
            surface(1, [-1.0, 0.1], [0.0, 0.1], Side::Top),
        ],
        symmetry: vec![],
        cuts: vec![cut(Side::Top, 1.3, 5, 3), cut(Side::Bottom, -1.3, 4, 2)],
        flanks: vec![flank("wall above", 0), flank("wall below", 1)],
        flank_proposal: None,
        probes: vec![Probe { name: "skirting".into(), at: [0.368, 0.18] }],
        warnings: vec![],
    }
}

fn result(surface: usize, heat_flow_w_m: f64, mean_c: f64, lowest_c: f64) -> SurfaceResult {
    SurfaceResult {
        surface: SurfaceId::new(surface),
        heat_flow_w_m,
        mean_c,
        lowest_c,
        lowest_moisture_c: lowest_c - 1.5,
    }
}

/// An ordinary rating, met.
pub(super) fn balcony() -> RatedFile {
    let (warm, cold) = (AirId::new(0), AirId::new(1));
    let sensitivity = |material: &str, per_percent| Sensitivity { warm, cold, material: material.into(), per_percent };
    let rating = Rating {
        junction: junction(),
        request: Request::default(),
        bracket_met: true,
        couplings: vec![Coupling { warm, cold, bracket: Some(Bracket { low: 1.3620, high: 1.3624 }) }],
        psi: vec![Psi {
            warm,
            cold,
            internal: Some(Bracket { low: 0.8426, high: 0.8430 }),
            overall_internal: Some(Bracket { low: 0.7993, high: 0.7998 }),
            external: Some(Bracket { low: 0.7993, high: 0.7998 }),
        }],
        temperature_factors: vec![TemperatureFactor {
            air: warm,
            class: SurfaceClass::Opaque,
            value: Some(0.7476),
            change: Some(-0.00021),
            temperature_c: 13.69,
            at: [0.368, 0.1],
            surface: SurfaceId::new(1),
            meets: "inside corner of gypsum plaster and reinforced concrete".into(),
            near_spaced_bars: false,
        }],
        surfaces: vec![
            result(0, 11.224, 17.61, 14.62),
            result(1, 10.117, 17.94, 14.51),
            result(2, 6.353, 19.34, 15.02),
            result(3, 6.359, 19.33, 14.96),
            result(4, -6.901, -4.78, -4.99),
            result(5, -6.898, -4.78, -4.99),
            result(6, -20.254, -4.23, -4.96),
        ],
        probes: vec![ProbeResult {
            name: "skirting".into(),
            at: [0.368, 0.18],
            temperature_c: 16.412,
            moisture_temperature_c: 15.018,
        }],
        sensitivities: vec![
            sensitivity("reinforced concrete", 0.00412),
            sensitivity("mineral wool", 0.00371),
            sensitivity("hollow block", 0.00101),
            sensitivity("gypsum plaster", 0.00004),
            sensitivity("cement render", -0.0),
        ],
        evidence: Evidence {
            nodes: 5097,
            passes: 15,
            heat_balance: 2.3e-12,
            two_grid: Some(0.00031),
            identity_error: 4.1e-13,
        },
        warnings: vec![],
    };
    RatedFile { file: "junctions/balcony-slab.yaml".into(), remarks: vec![], rating }
}

/// All that can be missing is missing, and the bracket was not met.
pub(super) fn unsettled() -> RatedFile {
    let mut file = balcony();
    file.file = "a folder/unsettled.yaml".into();
    file.remarks = vec![Problem {
        line: Some(12),
        column: Some(7),
        severity: Severity::Warning,
        message: "the layer \"mineral wool\" has no thickness".into(),
        label: String::new(),
        help: None,
    }];
    let rating = &mut file.rating;
    rating.bracket_met = false;
    rating.request = Request { accuracy: Accuracy::Absolute(0.00002), node_limit: 10_000 };
    rating.couplings[0].bracket = Some(Bracket { low: 1.341, high: 1.372 });
    rating.psi[0].internal = Some(Bracket { low: -0.021, high: 0.010 });
    rating.psi[0].overall_internal = None;
    rating.psi[0].external = None;
    rating.junction.title = "Three flanks, \"quoted\", with a comma".into();
    rating.junction.flanks[0].lengths = Lengths { internal_m: Some(1.15), overall_internal_m: None, external_m: None };
    rating.junction.flanks[0].measured = Lengths { internal_m: Some(1.2), ..Lengths::default() };
    rating.junction.flanks[1].lengths = Lengths::default();
    rating.junction.flanks[1].measured = Lengths::default();
    rating.junction.flanks[1].u_w_m2k = 0.21;
    rating.junction.flank_proposal = Some(
        "flanks:\n  - { name: wall above, cut: top, internal: 1200, external:  }\n  - { name: wall below, cut: bottom }\n"
            .into(),
    );
    rating.temperature_factors[0].value = None;
    rating.temperature_factors[0].change = None;
    rating.temperature_factors[0].near_spaced_bars = true;
    rating.evidence.two_grid = None;
    rating.evidence.nodes = 9_998;
    rating.warnings = vec![
        "The cut plane at the top is 0.9 m from the nearest change of layers; ISO 10211 asks for 1.1 m (three times \
         the flank's thickness)"
            .into(),
        "internal length of \"wall above\" is given as 1150 mm; the drawing's rule gives 1200 mm".into(),
    ];
    file
}

/// Two prescribed temperatures touch: no bracket exists.
pub(super) fn infinite() -> RatedFile {
    let mut file = balcony();
    file.file = "infinite.yaml".into();
    let rating = &mut file.rating;
    rating.bracket_met = false;
    rating.junction.title = "Prescribed temperatures that touch".into();
    rating.couplings[0].bracket = None;
    rating.psi[0].internal = None;
    rating.psi[0].overall_internal = None;
    rating.psi[0].external = None;
    rating.warnings = vec!["prescribed temperatures touch at 0, 100 mm: the heat flow there is infinite".into()];
    file
}

/// Many surfaces, long names, control characters, a third air without flanks.
pub(super) fn crowded() -> RatedFile {
    let mut file = balcony();
    file.file = "junctions/a-rather-long-file-name-for-one-junction-of-the-terrace.yaml".into();
    let rating = &mut file.rating;
    rating.junction.title = "Stair\u{1b}[31m core\nwith an unheated stair".into();
    rating.junction.airs.push(air("unheated stair between the flats", EnvironmentKind::Unheated, 20.0, None));
    rating
        .junction
        .environments
        .push(Environment { name: "unheated stair between the flats".into(), air: AirId::new(2) });
    let (flat, outdoors, stair) = (AirId::new(0), AirId::new(1), AirId::new(2));
    let narrow = |value: f64| Some(Bracket { low: value - 0.0001, high: value + 0.0001 });
    rating.couplings.push(Coupling { warm: flat, cold: stair, bracket: narrow(0.3312) });
    rating.couplings.push(Coupling { warm: stair, cold: outdoors, bracket: narrow(0.0) });
    for index in 0..20 {
        let x = 0.4 + 0.05 * f64::from(index);
        let mut stair_surface = surface(0, [x, 0.1], [x + 0.05, 0.1], Side::Top);
        stair_surface.environment = EnvironmentId::new(2);
        stair_surface.air = stair;
        rating.junction.surfaces.push(stair_surface);
        rating.surfaces.push(result(rating.surfaces.len(), -0.001 * f64::from(index), 20.0, 19.96));
    }
    rating.junction.parts.push(Part {
        bar_spacing_m: Some(0.2),
        ..part("stainless steel bars 78.5 mm² every 200 mm in mineral wool", 1.234_567, "area-weighted")
    });
    rating.temperature_factors.push(TemperatureFactor {
        class: SurfaceClass::Frame,
        value: Some(0.6999),
        temperature_c: 12.49,
        ..rating.temperature_factors[0].clone()
    });
    file
}
