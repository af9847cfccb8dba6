//! Expected values: ISO 6946 (0.04; 0.10, 0.13, 0.17 m²K/W) and ISO 13788 (0.25, 0.13 m²K/W).

use crate::input::{EnvironmentKind, Resistances, Side, SurfaceClass};
use crate::junction::test_draft::{Draft, balcony};
use crate::junction::{HeatDirection, Junction, Surface};

/// The surface of `environment` that faces `side`, when there is one only.
fn surface<'a>(junction: &'a Junction, environment: &str, side: Side) -> &'a Surface {
    let matches = |surface: &&Surface| {
        junction.environments[surface.environment.index()].name == environment && surface.faces == side
    };
    let found: Vec<_> = junction.surfaces.iter().filter(matches).collect();
    assert_eq!(found.len(), 1, "surfaces of {environment} that face {side:?}");
    found[0]
}

/// A slab between an air above and an air below.
fn slab(above: (&str, EnvironmentKind, f64), below: (&str, EnvironmentKind, f64)) -> Draft {
    Draft::new(crate::input::Plane::Vertical)
        .air(above.0, above.1, above.2)
        .air(below.0, below.1, below.2)
        .paint(above.0, [0.0, 1000.0], [200.0, 1000.0])
        .paint("concrete", [0.0, 1000.0], [0.0, 200.0])
        .paint(below.0, [0.0, 1000.0], [-800.0, 0.0])
}

const ROOM: (&str, EnvironmentKind, f64) = ("room", EnvironmentKind::Internal, 20.0);
const COOL: (&str, EnvironmentKind, f64) = ("cool room", EnvironmentKind::Internal, 15.0);
const CELLAR: (&str, EnvironmentKind, f64) = ("cellar", EnvironmentKind::Unheated, 8.0);
const SKY: (&str, EnvironmentKind, f64) = ("outdoors", EnvironmentKind::External, -5.0);

#[test]
fn heat_flows_up_through_a_roof_and_down_through_a_floor_over_outdoors() {
    let roof = slab(SKY, ROOM).built();
    let ceiling = surface(&roof, "room", Side::Bottom);
    assert_eq!((ceiling.resistance, ceiling.direction), (0.10, HeatDirection::Up));
    assert_eq!(ceiling.rule, "ISO 6946, heat flow up; moisture run: ISO 13788, opaque");
    assert_eq!(surface(&roof, "outdoors", Side::Top).resistance, 0.04);
    assert_eq!(surface(&roof, "outdoors", Side::Top).rule, "ISO 6946, external");

    let floor = slab(ROOM, SKY).built();
    let upper = surface(&floor, "room", Side::Top);
    assert_eq!((upper.resistance, upper.direction), (0.17, HeatDirection::Down));
    assert_eq!(surface(&floor, "outdoors", Side::Bottom).resistance, 0.04, "external in every direction");
}

#[test]
fn an_unheated_space_takes_the_direction_of_the_heat_that_reaches_it() {
    // under a warm room: down on both faces; over one: up on both
    let cellar = slab(ROOM, CELLAR).built();
    assert_eq!(surface(&cellar, "room", Side::Top).resistance, 0.17);
    assert_eq!(surface(&cellar, "cellar", Side::Bottom).resistance, 0.17);
    let attic = slab(CELLAR, ROOM).built();
    assert_eq!(surface(&attic, "room", Side::Bottom).resistance, 0.10);
    assert_eq!(surface(&attic, "cellar", Side::Top).resistance, 0.10);
    // towards outdoors the unheated space is the warm one, whatever the temperatures
    let frosty = ("cellar", EnvironmentKind::Unheated, -10.0);
    assert_eq!(surface(&slab(SKY, frosty).built(), "cellar", Side::Bottom).resistance, 0.10);
}

#[test]
fn between_rooms_the_temperature_decides_and_equal_ones_are_horizontal() {
    let rooms = slab(ROOM, COOL).built();
    assert_eq!(surface(&rooms, "room", Side::Top).resistance, 0.17);
    assert_eq!(surface(&rooms, "cool room", Side::Bottom).resistance, 0.17);
    let equal = slab(ROOM, ("next", EnvironmentKind::Internal, 20.0)).built();
    assert_eq!(surface(&equal, "room", Side::Top).resistance, 0.13);
    assert_eq!(surface(&equal, "next", Side::Bottom).direction, HeatDirection::Horizontal);
}

#[test]
fn upright_faces_and_plans_are_horizontal() {
    let wall = balcony(-100.0, 100.0).built();
    let walls: Vec<_> = wall.surfaces.iter().filter(|surface| surface.faces == Side::Right).collect();
    assert_eq!(walls.len(), 2, "above and below the slab");
    assert!(walls.iter().all(|surface| surface.resistance == 0.13));
    let mut plan = slab(SKY, ROOM);
    plan.document.plane = crate::input::Plane::Horizontal;
    assert_eq!(surface(&plan.built(), "room", Side::Bottom).resistance, 0.13);
}

#[test]
fn a_normal_that_meets_the_same_air_the_sheets_edge_or_a_void_settles_nothing() {
    // inside the flat the slab's two faces look at the same air; outside the normal meets the same air too
    let junction = balcony(-100.0, 100.0).built();
    assert_eq!(surface(&junction, "flat", Side::Top).resistance, 0.13);
    assert_eq!(surface(&junction, "flat", Side::Bottom).resistance, 0.13);
    // the top of a parapet wall: its normal runs down to the cut plane
    let stub = Draft::section()
        .paint("flat", [0.0, 1000.0], [0.0, 1000.0])
        .paint("block", [400.0, 600.0], [0.0, 500.0])
        .paint("block", [1000.0, 1200.0], [0.0, 1000.0])
        .paint("outdoors", [1200.0, 1500.0], [0.0, 1000.0])
        .built();
    assert_eq!(surface(&stub, "flat", Side::Top).resistance, 0.13);
    let void = slab(ROOM, SKY).paint("void", [0.0, 1000.0], [50.0, 100.0]).built();
    assert_eq!(surface(&void, "room", Side::Top).resistance, 0.13);
}

#[test]
fn the_direction_follows_the_column_so_that_one_ceiling_can_have_two_rules() {
    // a ceiling under outdoors on the left and under another room on the right
    let junction = Draft::section()
        .air("upstairs", EnvironmentKind::Internal, 20.0)
        .paint("flat", [0.0, 2000.0], [-1000.0, 0.0])
        .paint("concrete", [0.0, 2000.0], [0.0, 200.0])
        .paint("outdoors", [0.0, 900.0], [200.0, 1200.0])
        .paint("upstairs", [1100.0, 2000.0], [200.0, 1200.0])
        .paint("block", [900.0, 1100.0], [200.0, 1200.0])
        .built();
    let ceilings: Vec<_> = junction
        .surfaces
        .iter()
        .filter(|surface| surface.faces == Side::Bottom)
        .map(|surface| (surface.from[0], surface.to[0], surface.resistance))
        .collect();
    assert_eq!(ceilings, [(0.0, 0.9, 0.10), (0.9, 2.0, 0.13)]);
}

#[test]
fn given_resistances_win_in_one_number_or_by_direction() {
    let by_direction = Resistances::ByDirection { up: 0.11, horizontal: 0.12, down: 0.14 };
    let draft = |heat, moisture| {
        Draft::section()
            .resistances(heat, moisture)
            .paint("outdoors", [0.0, 1000.0], [200.0, 1000.0])
            .paint("concrete", [0.0, 1000.0], [0.0, 200.0])
            .paint("flat", [0.0, 1000.0], [-800.0, 0.0])
            .built()
    };
    let junction = draft(Some(by_direction), None);
    let ceiling = surface(&junction, "flat", Side::Bottom);
    assert_eq!((ceiling.resistance, ceiling.moisture_resistance), (0.11, 0.25));
    assert_eq!(ceiling.rule, "given in the file, heat flow up; moisture run: ISO 13788, opaque");
    let junction = draft(Some(Resistances::One(0.2)), Some(by_direction));
    let ceiling = surface(&junction, "flat", Side::Bottom);
    assert_eq!((ceiling.resistance, ceiling.moisture_resistance), (0.2, 0.11));
    let junction = draft(Some(Resistances::One(0.0)), None);
    let ceiling = surface(&junction, "flat", Side::Bottom);
    assert_eq!((ceiling.resistance, ceiling.moisture_resistance), (0.0, 0.0), "0 stays 0");
}

#[test]
fn the_moisture_run_knows_classes_and_kinds() {
    let of = |class: SurfaceClass| {
        let junction = Draft::section()
            .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
            .paint("flat", [200.0, 700.0], [0.0, 1000.0])
            .paint("block", [0.0, 200.0], [0.0, 1000.0])
            .class(class)
            .built();
        (
            surface(&junction, "flat", Side::Right).moisture_resistance,
            surface(&junction, "outdoors", Side::Left).moisture_resistance,
        )
    };
    assert_eq!(of(SurfaceClass::Opaque), (0.25, 0.04));
    assert_eq!(of(SurfaceClass::Frame), (0.13, 0.04));
    assert_eq!(of(SurfaceClass::Glazing), (0.13, 0.04));
    let cellar = slab(ROOM, CELLAR).built();
    assert_eq!(surface(&cellar, "cellar", Side::Bottom).moisture_resistance, 0.17, "as the heat-flow run");
}

#[test]
fn a_surface_runs_straight_across_materials_and_ends_where_its_class_does() {
    let junction = Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
        .paint("flat", [200.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [0.0, 400.0])
        .paint("concrete", [0.0, 200.0], [400.0, 750.0])
        .paint("timber", [0.0, 200.0], [750.0, 1000.0])
        .class(SurfaceClass::Frame)
        .built();
    let inside: Vec<_> = junction
        .surfaces
        .iter()
        .filter(|surface| surface.faces == Side::Right)
        .map(|surface| (surface.from[1], surface.to[1], surface.class))
        .collect();
    assert_eq!(inside, [(0.0, 0.75, SurfaceClass::Opaque), (0.75, 1.0, SurfaceClass::Frame)]);
}

#[test]
fn surfaces_come_by_environment_then_bottom_to_top_then_left_to_right_and_lie_on_the_sheet() {
    let junction = balcony(-100.0, 100.0).built();
    let key = |surface: &Surface| (surface.environment, surface.from[1], surface.from[0]);
    assert!(junction.surfaces.windows(2).all(|pair| key(&pair[0]) <= key(&pair[1])));
    // outdoors: two wall faces, three faces of the slab; the flat: two wall faces, two of the slab
    assert_eq!(junction.surfaces.len(), 9);
    let sheet = &junction.sheet;
    let mut found = vec![0.0; junction.surfaces.len()];
    for line in 0..=sheet.columns() {
        for row in 0..sheet.rows() {
            if let Some(surface) = sheet.upright_surface(line, row) {
                found[surface.index()] += sheet.y_lines()[row + 1] - sheet.y_lines()[row];
            }
        }
    }
    for line in 0..=sheet.rows() {
        for column in 0..sheet.columns() {
            if let Some(surface) = sheet.level_surface(column, line) {
                found[surface.index()] += sheet.x_lines()[column + 1] - sheet.x_lines()[column];
            }
        }
    }
    for (surface, found) in junction.surfaces.iter().zip(found) {
        approx::assert_relative_eq!(surface.length_m(), found, epsilon = 1e-12);
    }
}

#[test]
fn two_entries_of_the_same_air_are_two_surfaces_with_their_own_rules() {
    let junction = Draft::section()
        .same_air("cavity", "outdoors")
        .resistances(Some(Resistances::One(0.13)), None)
        .paint("outdoors", [-500.0, 0.0], [500.0, 1000.0])
        .paint("cavity", [-500.0, 0.0], [0.0, 500.0])
        .paint("flat", [200.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [0.0, 1000.0])
        .built();
    assert_eq!(surface(&junction, "outdoors", Side::Left).resistance, 0.04);
    assert_eq!(surface(&junction, "cavity", Side::Left).resistance, 0.13);
    assert_eq!(surface(&junction, "cavity", Side::Left).air, surface(&junction, "outdoors", Side::Left).air);
}
