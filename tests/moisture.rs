//! The temperature factor comes from the moisture run (ISO 13788's surface resistances), not from the heat-flow run.
//!
//! A plane wall has f_Rsi = 1 − R_si / (R_si + Σ d/λ + R_se) everywhere, so every expected value here is exact.

mod rated;

use approx::assert_abs_diff_eq;
use coldseam::input::SurfaceClass;
use coldseam::rating::{Rating, Request, TemperatureFactor};
use rated::rate;

/// A solve's rounding.
const ROUNDING: f64 = 1e-9;

/// Σ d/λ of 0.24 m of 0.12 W/(m·K), m²K/W.
const WALL: f64 = 2.0;

/// f_Rsi of the wall.
fn factor(inside: f64, outside: f64) -> f64 {
    1.0 - inside / (inside + WALL + outside)
}

/// A wall of R = 2 between a flat (on its right) and outdoors, in a vertical section. `flat` and `outdoors` are further
/// keys of the environments, `wall` of the region.
fn plain_wall(flat: &str, outdoors: &str, wall: &str) -> Rating {
    let text = format!(
        "
title: wall
plane: vertical
environments:
  outdoors: {{ kind: external, temperature: -5{outdoors} }}
  flat: {{ kind: internal, temperature: 20{flat} }}
materials:
  block: {{ conductivity: 0.12 }}
section:
  - {{ environment: outdoors, x: [-100, 0], y: [0, 1000] }}
  - {{ environment: flat, x: [240, 340], y: [0, 1000] }}
  - {{ material: block, x: [0, 240], y: [0, 1000]{wall} }}
"
    );
    rate("wall", &text, &Request::default())
}

#[track_caller]
fn only_factor(rating: &Rating) -> &TemperatureFactor {
    assert_eq!(rating.temperature_factors.len(), 1);
    &rating.temperature_factors[0]
}

#[track_caller]
fn assert_factor(rating: &Rating, expected: f64) {
    let factor = only_factor(rating);
    assert_abs_diff_eq!(factor.value.expect("two airs"), expected, epsilon = ROUNDING);
    assert_abs_diff_eq!(factor.temperature_c, -5.0 + 25.0 * expected, epsilon = 25.0 * ROUNDING);
    for surface in &rating.surfaces {
        if rating.junction.surfaces[surface.surface.index()].air == factor.air {
            assert_abs_diff_eq!(surface.lowest_moisture_c, factor.temperature_c, epsilon = 25.0 * ROUNDING);
        }
    }
}

/// Lowest temperature of the flat's surface in the heat-flow run, °C.
fn lowest_of_heat_run(rating: &Rating) -> f64 {
    let air = only_factor(rating).air;
    let own = rating.surfaces.iter().filter(|s| rating.junction.surfaces[s.surface.index()].air == air);
    own.map(|surface| surface.lowest_c).fold(f64::INFINITY, f64::min)
}

/// ISO 13788: 0.25 inside; ISO 6946: 0.13 inside, 0.04 outside, and U from these alone.
#[test]
fn an_opaque_wall_takes_0_25_for_moisture_and_0_13_for_heat() {
    let rating = plain_wall("", "", "");
    assert_factor(&rating, factor(0.25, 0.04));
    assert_abs_diff_eq!(lowest_of_heat_run(&rating), -5.0 + 25.0 * factor(0.13, 0.04), epsilon = 25.0 * ROUNDING);
    let coupling = rating.couplings[0].bracket.expect("films keep it finite");
    assert_abs_diff_eq!(coupling.value(), 1.0 / (0.13 + WALL + 0.04), epsilon = ROUNDING);
}

/// ISO 13788: 0.13 on frames and glazing.
#[test]
fn frames_and_glazing_take_0_13() {
    for (word, class) in [("frame", SurfaceClass::Frame), ("glazing", SurfaceClass::Glazing)] {
        let rating = plain_wall("", "", &format!(", surface: {word}"));
        assert_factor(&rating, factor(0.13, 0.04));
        assert_eq!(only_factor(&rating).class, class);
    }
}

#[test]
fn moisture_resistance_overrides_the_moisture_run_alone() {
    let plain = plain_wall("", "", "");
    let rating = plain_wall(", moisture_resistance: 0.35", "", "");
    assert_factor(&rating, factor(0.35, 0.04));
    assert_eq!(rating.couplings, plain.couplings);
    assert_factor(&plain_wall(", moisture_resistance: 0.35", "", ", surface: frame"), factor(0.35, 0.04));
    let by_direction = ", moisture_resistance: { up: 0.2, horizontal: 0.3, down: 0.4 }";
    assert_factor(&plain_wall(by_direction, "", ""), factor(0.3, 0.04));
    assert_factor(&plain_wall("", ", moisture_resistance: 0.02", ""), factor(0.25, 0.02));
}

#[test]
fn surface_resistance_inside_overrides_the_heat_run_alone() {
    let rating = plain_wall(", surface_resistance: 0.10", "", "");
    assert_factor(&rating, factor(0.25, 0.04));
    let coupling = rating.couplings[0].bracket.expect("films keep it finite");
    assert_abs_diff_eq!(coupling.value(), 1.0 / (0.10 + WALL + 0.04), epsilon = ROUNDING);
}

#[test]
fn surface_resistance_outside_holds_in_both_runs() {
    assert_factor(&plain_wall("", ", surface_resistance: 0.13", ""), factor(0.25, 0.13));
}

#[test]
fn a_prescribed_temperature_stays_prescribed_for_moisture() {
    assert_factor(&plain_wall(", surface_resistance: 0", "", ""), 1.0);
    assert_factor(&plain_wall("", ", surface_resistance: 0", ""), factor(0.25, 0.0));
    assert_factor(&plain_wall(", surface_resistance: 0, moisture_resistance: 0.25", "", ""), factor(0.25, 0.04));
}

/// ISO 13788's 0.25 knows no direction of heat flow: a floor and a ceiling take it as well.
#[test]
fn horizontal_surfaces_take_0_25_too() {
    for (flat, outdoors) in [("[240, 340]", "[-100, 0]"), ("[-100, 0]", "[240, 340]")] {
        let text = format!(
            "
title: floor or roof
plane: vertical
environments:
  outdoors: {{ kind: external, temperature: -5 }}
  flat: {{ kind: internal, temperature: 20 }}
materials:
  block: {{ conductivity: 0.12 }}
section:
  - {{ environment: outdoors, y: {outdoors}, x: [0, 1000] }}
  - {{ environment: flat, y: {flat}, x: [0, 1000] }}
  - {{ material: block, y: [0, 240], x: [0, 1000] }}
"
        );
        assert_factor(&rate("floor or roof", &text, &Request::default()), factor(0.25, 0.04));
    }
}

/// With two airs the factor does not depend on their temperatures, not even if these are equal.
#[test]
fn with_two_airs_the_factor_does_not_depend_on_their_temperatures() {
    let text = |flat: &str, outdoors: &str| {
        format!(
            "
title: wall
plane: vertical
environments:
  outdoors: {{ kind: external, temperature: {outdoors} }}
  flat: {{ kind: internal, temperature: {flat} }}
materials:
  block: {{ conductivity: 0.12 }}
section:
  - {{ environment: outdoors, x: [-100, 0], y: [0, 1000] }}
  - {{ environment: flat, x: [240, 340], y: [0, 1000] }}
  - {{ material: block, x: [0, 240], y: [0, 1000] }}
"
        )
    };
    for (flat, outdoors) in [("20", "-5"), ("24", "23"), ("150", "0")] {
        let rating = rate("wall", &text(flat, outdoors), &Request::default());
        assert_abs_diff_eq!(only_factor(&rating).value.unwrap(), factor(0.25, 0.04), epsilon = ROUNDING);
    }
    // Where it is no warmer inside, the coldest point says nothing about the detail, and there is no factor.
    for (flat, outdoors) in [("20", "20"), ("20", "35")] {
        let rating = rate("wall", &text(flat, outdoors), &Request::default());
        assert_eq!(only_factor(&rating).value, None);
    }
}

/// A wall of R = 0.3 to a store (unheated) below and one of R = 2 to outdoors above, apart from each other.
fn flat_beside_a_store(store_c: f64) -> Rating {
    let text = format!(
        "
title: flat, store and outdoors
plane: vertical
environments:
  outdoors: {{ kind: external, temperature: -5 }}
  store: {{ kind: unheated, temperature: {store_c} }}
  flat: {{ kind: internal, temperature: 20 }}
materials:
  block: {{ conductivity: 0.12 }}
  thin block: {{ conductivity: 0.8 }}
section:
  - {{ void: adiabatic, x: [-100, 240], y: [-1000, 1000] }}
  - {{ environment: flat, x: [240, 340], y: [-1000, 1000] }}
  - {{ environment: outdoors, x: [-100, 0], y: [100, 1000] }}
  - {{ material: block, x: [0, 240], y: [100, 1000] }}
  - {{ environment: store, x: [-100, 0], y: [-1000, -100] }}
  - {{ material: thin block, x: [0, 240], y: [-1000, -100] }}
"
    );
    rate("three airs", &text, &Request::default())
}

/// With three airs there is no factor free of temperatures: it is (θ_si − θ_e)/(θ_i − θ_e) at the file's own.
/// The store's wall has R_si 0.25 and, as ISO 6946 has it for a surface within the building, 0.13 on its other side.
#[test]
fn with_three_airs_the_files_temperatures_decide() {
    for store_c in [10.0, 4.0, 0.0] {
        let rating = flat_beside_a_store(store_c);
        let found = only_factor(&rating);
        let surface_c = 20.0 - (20.0 - store_c) * 0.25 / (0.25 + 0.3 + 0.13);
        assert_abs_diff_eq!(found.temperature_c, surface_c, epsilon = 25.0 * ROUNDING);
        assert_abs_diff_eq!(found.value.unwrap(), (surface_c + 5.0) / 25.0, epsilon = ROUNDING);
    }
    // a store as warm as the flat leaves the wall to outdoors as the coldest
    let rating = flat_beside_a_store(20.0);
    assert_abs_diff_eq!(only_factor(&rating).value.unwrap(), factor(0.25, 0.04), epsilon = ROUNDING);
}

/// Opaque wall above, frame of the same R below, a void between them: one factor each, each with its own resistance.
#[test]
fn each_surface_class_has_its_own_factor() {
    let text = "
title: wall and frame
plane: horizontal
environments:
  outdoors: { kind: external, temperature: -5 }
  flat: { kind: internal, temperature: 20 }
materials:
  block: { conductivity: 0.12 }
section:
  - { environment: outdoors, x: [-100, 0], y: [-1000, 1000] }
  - { environment: flat, x: [240, 340], y: [-1000, 1000] }
  - { material: block, x: [0, 240], y: [100, 1000] }
  - { void: adiabatic, x: [0, 240], y: [-100, 100] }
  - { material: block, surface: frame, x: [0, 240], y: [-1000, -100] }
";
    let rating = rate("wall and frame", text, &Request::default());
    let found: Vec<_> = rating.temperature_factors.iter().map(|f| (f.class, f.value.unwrap())).collect();
    assert_eq!(found.len(), 2);
    for ((class, value), expected) in
        found.into_iter().zip([(SurfaceClass::Opaque, factor(0.25, 0.04)), (SurfaceClass::Frame, factor(0.13, 0.04))])
    {
        assert_eq!(class, expected.0);
        assert_abs_diff_eq!(value, expected.1, epsilon = ROUNDING);
    }
}
