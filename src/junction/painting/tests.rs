use super::*;
use crate::input::{EnvironmentKind, Side, SurfaceClass};
use crate::junction::test_draft::Draft;
use crate::junction::{Content, build};
use approx::assert_relative_eq;
use proptest::prelude::*;

/// A wall of block between two airs, to paint on.
fn wall() -> Draft {
    Draft::section().paint("outdoors", [-500.0, 0.0], [0.0, 1000.0]).paint("flat", [200.0, 700.0], [0.0, 1000.0]).paint(
        "block",
        [0.0, 200.0],
        [0.0, 1000.0],
    )
}

#[test]
fn later_regions_cover_earlier_ones() {
    let junction = wall().paint("wool", [50.0, 100.0], [400.0, 600.0]).built();
    let sheet = &junction.sheet;
    assert_eq!((sheet.columns(), sheet.rows()), (5, 3));
    let material = |column, row| match sheet.content(column, row) {
        Content::Solid(part) => junction.parts[part.index()].material.as_str(),
        Content::Air(environment) => junction.environments[environment.index()].name.as_str(),
        Content::Outside => "outside",
    };
    assert_eq!(
        (0..5).map(|column| material(column, 0)).collect::<Vec<_>>(),
        ["outdoors", "block", "block", "block", "flat"]
    );
    assert_eq!(
        (0..5).map(|column| material(column, 1)).collect::<Vec<_>>(),
        ["outdoors", "block", "wool", "block", "flat"]
    );
}

#[test]
fn the_same_material_in_another_class_is_another_part() {
    let junction = wall().paint("block", [0.0, 200.0], [400.0, 600.0]).class(SurfaceClass::Frame).built();
    let parts: Vec<_> = junction.parts.iter().map(|part| (part.material.as_str(), part.class)).collect();
    assert_eq!(parts, [("block", SurfaceClass::Opaque), ("block", SurfaceClass::Frame)]);
}

#[test]
fn spaced_bars_are_weighted_by_area_with_what_lies_under_them_field_by_field() {
    // six 12 mm bars a metre, about: 113 mm² every 200 mm in a box 20 mm high is a share of 113 / 4000 = 0.02825
    let junction = wall()
        .paint("wool", [0.0, 100.0], [0.0, 1000.0])
        .bars("steel", Axis::X, [113.0, 200.0], [0.0, 200.0], [500.0, 520.0])
        .built();
    let of = |name: &str| junction.parts.iter().find(|part| part.material == name).expect("the blend is a part");
    let in_wool = of("steel bars 113 mm² every 200 mm in wool");
    assert_relative_eq!(in_wool.conductivity_w_mk, 0.02825 * 50.0 + 0.97175 * 0.035, epsilon = 1e-12);
    assert_eq!(in_wool.bar_spacing_m, Some(0.2));
    assert_eq!(
        in_wool.source,
        "area-weighted: 2.82 % steel (this file, no source given), the rest wool (this file, no source given)"
    );
    let in_block = of("steel bars 113 mm² every 200 mm in block");
    assert_relative_eq!(in_block.conductivity_w_mk, 0.02825 * 50.0 + 0.97175 * 0.5, epsilon = 1e-12);
    let remark =
        "steel bars 113 mm² every 200 mm in wool: calculated with the area-weighted conductivity 1.447 W/(m·K)";
    assert!(junction.warnings.iter().any(|warning| warning == remark), "{:?}", junction.warnings);
}

#[test]
fn crossing_rows_of_bars_compose_in_order() {
    let junction = wall()
        .bars("steel", Axis::X, [100.0, 100.0], [0.0, 200.0], [500.0, 520.0])
        .bars("timber", Axis::Y, [200.0, 100.0], [80.0, 100.0], [500.0, 520.0])
        .built();
    // steel takes 100 / 2000 = 5 %, then timber 200 / 2000 = 10 % of that blend
    let first = 0.05 * 50.0 + 0.95 * 0.5;
    let name = "timber bars 200 mm² every 100 mm in steel bars 100 mm² every 100 mm in block";
    let both = junction.parts.iter().find(|part| part.material == name).expect("the blend is a part");
    assert_relative_eq!(both.conductivity_w_mk, 0.1 * 0.13 + 0.9 * first, epsilon = 1e-12);
}

#[test]
fn bars_that_do_not_fit_or_have_nothing_to_cross_are_refused_together() {
    let draft = wall().bars("steel", Axis::X, [5000.0, 200.0], [0.0, 200.0], [100.0, 120.0]).bars(
        "steel",
        Axis::X,
        [113.0, 200.0],
        [-100.0, 200.0],
        [500.0, 520.0],
    );
    assert_eq!(
        draft.messages(),
        [
            "bars of 5000 mm² every 200 mm do not fit into a box 20 mm high",
            "spaced bars lie in the environment `outdoors` at x -50 mm, y 510 mm",
        ]
    );
    assert_eq!(draft.refused()[1].span, Some(draft.region_span(4)));
}

#[test]
fn bars_over_air_that_a_later_solid_covers_are_fine() {
    let draft = wall().bars("steel", Axis::X, [113.0, 200.0], [0.0, 300.0], [500.0, 520.0]);
    assert_eq!(draft.messages(), ["spaced bars lie in the environment `flat` at x 250 mm, y 510 mm"]);
    draft.paint("concrete", [200.0, 300.0], [400.0, 600.0]).built();
}

#[test]
fn a_sloping_edge_is_refused_with_its_end_points_at_its_first_vertex() {
    let draft = wall().outline("concrete", &[[0.0, 0.0], [200.0, 0.0], [200.0, 100.0], [0.0, 50.0]]);
    assert_eq!(draft.messages(), ["the edge from x 200 mm, y 100 mm to x 0 mm, y 50 mm is not along an axis"]);
    let Shape::Outline(points) = &draft.document.regions[3].shape else { panic!("an outline was drawn") };
    assert_eq!(draft.refused()[0].span, Some(points[2].span));
    assert_eq!(draft.refused()[0].label, "sloping edges are not solved yet");
}

#[test]
fn every_wrong_outline_is_listed() {
    let eight = [[0.0, 0.0], [100.0, 0.0], [100.0, 100.0], [50.0, 100.0], [50.0, -50.0], [0.0, -50.0]];
    let draft = wall().outline("concrete", &eight).outline("wool", &[[0.0, 500.0], [100.0, 500.0], [50.0, 600.0]]);
    assert_eq!(
        draft.messages(),
        [
            "this outline touches or crosses itself at x 50 mm, y 0 mm",
            "the edge from x 100 mm, y 500 mm to x 50 mm, y 600 mm is not along an axis, and one more edge of this outline slopes",
        ]
    );
}

#[test]
fn an_outline_paints_what_boxes_paint() {
    let notched = [[0.0, 100.0], [60.0, 100.0], [60.0, 160.0], [30.0, 160.0], [30.0, 140.0], [0.0, 140.0]];
    let by_outline = wall().outline("concrete", &notched).built();
    let by_boxes =
        wall().paint("concrete", [0.0, 60.0], [100.0, 140.0]).paint("concrete", [30.0, 60.0], [140.0, 160.0]).built();
    assert_eq!(by_outline.sheet, by_boxes.sheet);
}

#[test]
fn too_many_lines_are_refused_before_anything_is_allocated() {
    let mut draft = wall();
    for step in 0..1500 {
        let at = f64::from(step) * 0.1;
        draft = draft.paint("wool", [at, at + 0.05], [at, at + 0.05]);
    }
    let messages = draft.messages();
    assert_eq!(messages.len(), 1);
    assert!(messages[0].starts_with("the regions' corners make 3,00"), "{}", messages[0]);
}

#[test]
fn twenty_thousand_regions_paint_quickly() {
    // 200 × 100 boxes in the wall; a painter that fills every region in full would be fine here, one that compares each
    // field with each region would take minutes
    let mut draft = wall();
    for i in 0..200 {
        for j in 0..100 {
            let (x, y) = (f64::from(i), 10.0 * f64::from(j));
            draft = draft.paint(if (i + j) % 2 == 0 { "wool" } else { "concrete" }, [x, x + 1.0], [y, y + 10.0]);
        }
    }
    let started = std::time::Instant::now();
    let junction = draft.built();
    assert_eq!(junction.sheet.columns() * junction.sheet.rows(), 202 * 100);
    assert!(started.elapsed().as_secs() < 5, "took {:?}", started.elapsed());
}

#[test]
fn what_later_regions_hide_and_what_is_too_thin_is_remarked_on() {
    let junction = wall()
        .paint("wool", [50.0, 100.0], [400.0, 600.0])
        .paint("concrete", [0.0, 200.0], [300.0, 700.0])
        .paint("steel", [50.0, 50.0005], [100.0, 200.0])
        .built();
    assert!(
        junction.warnings.contains(
            &"steel at x 50 mm, y 150 mm is thinner than 0.0012 mm, a millionth of the drawing, and was left out"
                .to_owned()
        )
    );
    assert!(
        junction
            .warnings
            .contains(&"wool at x 50 to 100 mm, y 400 to 600 mm is covered completely by later regions".to_owned())
    );
    // and neither is told twice
    assert_eq!(junction.warnings.iter().filter(|warning| warning.contains("steel at")).count(), 1);
}

#[test]
fn of_many_hidden_regions_the_first_few_are_named_and_the_rest_counted() {
    let mut draft = wall();
    for step in 0..25 {
        draft = draft.paint("wool", [0.0, 100.0], [10.0 * f64::from(step), 500.0]);
    }
    let warnings = draft.paint("concrete", [0.0, 200.0], [0.0, 500.0]).built().warnings;
    let hidden: Vec<_> = warnings.iter().filter(|warning| warning.contains("covered completely")).collect();
    assert_eq!(hidden.len(), 21);
    assert_eq!(hidden[20], "5 more of these: regions covered completely by later regions");
}

#[test]
fn an_outline_that_leaves_no_field_is_no_solid() {
    let draft = Draft::section().outline("block", &[[0.0, 0.0], [100.0, 0.0], [200.0, 0.0]]);
    assert_eq!(draft.messages(), ["the section is only 0 mm in y, and 200 mm in x"]);
}

/// What a careless painter would do: every region in full, in order.
fn painted_naively(document: &Document) -> Vec<(Option<usize>, f64)> {
    let lines = Lines::of(&document.regions);
    let mut fields = vec![(None, 0.0); lines.columns() * lines.rows()];
    for (index, region) in document.regions.iter().enumerate() {
        for (field, state) in fields.iter_mut().enumerate() {
            let at = middle(&lines, field);
            let (x, y) = extents(&region.shape);
            if at[0] < x[0] || at[0] > x[1] || at[1] < y[0] || at[1] > y[1] {
                continue;
            }
            let conductivity = match region.fill {
                Fill::Material(material) => document.materials[material].conductivity_w_mk,
                Fill::SpacedBars { material, area_m2, spacing_m, along } => {
                    let height = if along == Axis::X { y[1] - y[0] } else { x[1] - x[0] };
                    let share = area_m2 / spacing_m / height;
                    share * document.materials[material].conductivity_w_mk + (1.0 - share) * state.1
                }
                _ => 0.0,
            };
            *state = (Some(index), conductivity);
        }
    }
    fields
}

proptest! {
    #[test]
    fn painting_from_the_last_region_equals_painting_from_the_first(
        boxes in prop::collection::vec((0..7u8, 0..6u8, 1..4u8, 0..6u8, 1..4u8), 1..12)
    ) {
        // a base of block under everything, so that bars have something to cross; bars last, over solids only
        let mut draft = Draft::section().paint("block", [0.0, 1000.0], [0.0, 1000.0]);
        for (kind, x, width, y, height) in boxes {
            let side = |at: u8, length: u8| [100.0 * f64::from(at), 100.0 * f64::from(at + length)];
            let (x, y) = (side(x, width), side(y, height));
            draft = match kind {
                0 => draft.paint("flat", x, y),
                1 => draft.paint("void", x, y),
                2 => draft.paint("wool", x, y),
                3 => draft.paint("concrete", x, y),
                4 => draft.bars("steel", Axis::X, [900.0, 200.0], x, y),
                5 => draft.bars("steel", Axis::Y, [700.0, 150.0], x, y),
                _ => draft.paint("plaster", x, y),
            };
        }
        let mut findings = Findings::default();
        let painting = paint(&draft.document, &mut findings).expect("boxes can be painted");
        let on_air = findings.faults.iter().any(|fault| matches!(fault, Fault::BarsWithoutSolid { .. }));
        for (field, (region, conductivity)) in painted_naively(&draft.document).into_iter().enumerate() {
            prop_assert_eq!(painting.regions[field] as usize, region.expect("the base covers the sheet"));
            if let Paint::Solid(part) = painting.paints[field] {
                let painted = painting.parts[part.index()].conductivity_w_mk;
                prop_assert!((painted - conductivity).abs() < 1e-9, "{} and {}", painted, conductivity);
            } else {
                prop_assert!(conductivity == 0.0 || on_air);
            }
        }
    }
}

#[test]
fn a_document_of_airs_alone_is_no_junction() {
    let draft = Draft::section().paint("flat", [0.0, 1.0], [0.0, 1.0]);
    assert_eq!(draft.messages(), ["no part of the section is solid"]);
    let draft = Draft::section().paint("block", [0.0, 1.0], [0.0, 1.0]).symmetry(Side::Left);
    assert_eq!(draft.messages(), ["no part of the section is air"]);
    assert!(build(&draft.air("attic", EnvironmentKind::Unheated, 5.0).document).is_err());
}

#[test]
fn rows_of_bars_that_do_not_fit_together_are_refused() {
    // 0.6 and 0.5 of the room
    let draft = wall().bars("steel", Axis::X, [2400.0, 200.0], [0.0, 200.0], [500.0, 520.0]).bars(
        "timber",
        Axis::X,
        [2000.0, 200.0],
        [0.0, 200.0],
        [500.0, 520.0],
    );
    assert_eq!(
        draft.messages(),
        ["spaced bars over one another at x 100 mm, y 510 mm would fill 110 % of the room there"]
    );
}

#[test]
fn a_pile_of_bars_is_refused_and_not_blended_for_hours() {
    let mut draft = wall();
    for _ in 0..2000 {
        draft = draft.bars("steel", Axis::X, [0.1, 200.0], [0.0, 200.0], [500.0, 520.0]);
    }
    let messages = draft.messages();
    assert_eq!(messages, ["more than 8 rows of spaced bars lie over one another at x 100 mm, y 510 mm"]);
}
