//! Whole files, right and wrong.

use crate::input::document::*;
use crate::input::{Diagnostic, parse};

/// The example of the format: every kind of statement once.
const BALCONY: &str = r#"
title: Balcony slab  through an
  externally insulated wall
unit: mm
plane: vertical

parameters:
  wool: total - 228
  total: 368

environments:
  outdoors: { kind: external, temperature: -5 }
  flat:     { kind: internal, temperature: 20, relative_humidity: 50 }
  cladding gap: { same_as: soffit, surface_resistance: 0.13 }
  soffit: { same_as: Outdoors, moisture_resistance: { up: 0.1, horizontal: 0.13, down: 0.17 } }

materials:
  hollow block:        { conductivity: 0.50, source: "declared by the maker" }
  mineral wool:        { conductivity: 0.07 / 2 }
  Steel:               { conductivity: 48 }

buildups:
  outer wall:
    - cement render: 15
    - mineral wool: wool
    - hollow block: { thickness: 200, surface: frame }
    - gypsum plaster: 0
    - air layer: { thickness: 25, resistance: 0.18 }

section:
  - { environment: outdoors, x: [0, -1200], y: [-1300, 1300] }
  - { environment: flat, x: [wool + 228, 1600], y: [-1300, 1300] }
  - { environment: cladding gap, x: [-1200, -1100], y: [0, 10] }
  - { buildup: outer wall, x: 0, towards: right, y: [-1300, 1300] }
  - { buildup: outer wall, y: 1300, towards: down, x: [0, 100] }
  - { material: hollow block, outline: [[0, 100], [60, 100], [60, 160], [0, 100]], surface: glazing }
  - { material: steel, spaced: { area: 113, spacing: 200 }, x: [0, 80], y: [0, 10] }
  - { void: adiabatic, x: [-1200, -1100], y: [-1300, -1200] }

symmetry: left
flanks:
  - { name: wall above, cut: top, near: [10, 20], internal: 1200, external: 1300 }
  - { name: wall below, cut: bottom, overall_internal: 1300, u: 0.21 }
probes:
  corner: [wool + 228, 100]
"#;

fn read(text: &str) -> Result<Document, Vec<Diagnostic>> {
    parse(&Source { name: "test.yaml".to_owned(), text: text.to_owned() })
}

/// The messages that a file is refused with.
fn messages(text: &str) -> Vec<String> {
    read(text).unwrap_err().into_iter().map(|diagnostic| diagnostic.message).collect()
}

/// The smallest file there is, with a piece replaced.
fn wall_with(old: &str, new: &str) -> String {
    let wall = "\
title: Wall
plane: horizontal
environments:
  out: { kind: external, temperature: 0 }
materials:
  block: { conductivity: 0.5 }
section:
  - { environment: out, x: [-1, 0], y: [0, 1] }
  - { material: block, x: [0, 1], y: [0, 1] }
";
    assert!(wall.contains(old), "{old}");
    wall.replace(old, new)
}

fn boxes(document: &Document) -> Vec<([f64; 2], [f64; 2])> {
    let of_shape = |region: &Region| match &region.shape {
        Shape::Box { x, y } => Some((*x, *y)),
        Shape::Outline(_) => None,
    };
    document.regions.iter().filter_map(of_shape).collect()
}

#[test]
fn every_kind_of_statement_is_understood() {
    let document = read(BALCONY).unwrap();
    assert_eq!(document.title, "Balcony slab through an externally insulated wall");
    assert_eq!((document.unit, document.plane), (LengthUnit::Millimetre, Plane::Vertical));

    let environment = |place: usize| &document.environments[place];
    assert_eq!(environment(1).name.value, "flat");
    assert_eq!(environment(1).relative_humidity_percent, Some(50.0));
    assert_eq!((environment(0).same_as, environment(3).same_as, environment(2).same_as), (None, Some(0), Some(0)));
    assert_eq!((environment(2).kind, environment(2).temperature_c), (EnvironmentKind::External, -5.0));
    assert_eq!(environment(2).surface_resistance, Some(Resistances::One(0.13)));
    let by_direction = Resistances::ByDirection { up: 0.1, horizontal: 0.13, down: 0.17 };
    assert_eq!(environment(3).moisture_resistance, Some(by_direction));
    assert_eq!(environment(2).moisture_resistance, None);

    let names: Vec<&str> = document.materials.iter().map(|material| material.name.as_str()).collect();
    assert_eq!(names, ["hollow block", "mineral wool", "Steel", "cement render", "air layer (R 0.18)"]);
    assert_eq!(document.materials[1].conductivity_w_mk, 0.035);
    assert_eq!(document.materials[0].provenance, Provenance::File(Some("declared by the maker".to_owned())));
    assert!(matches!(&document.materials[3].provenance, Provenance::Catalogue(source) if source.contains("EN 12524")));
    // 25 mm at 0.18 m²K/W
    assert!((document.materials[4].conductivity_w_mk - 0.025 / 0.18).abs() < 1e-15);
    assert_eq!(document.materials[4].provenance, Provenance::LayerResistance);

    assert_eq!(document.flanks.as_ref().unwrap().len(), 2);
    let flank = &document.flanks.as_ref().unwrap()[0];
    assert_eq!((flank.name.value.as_str(), flank.cut.value, flank.near), ("wall above", Side::Top, Some([0.01, 0.02])));
    assert_eq!((flank.internal_m.unwrap().value, flank.overall_internal_m, flank.u_w_m2k), (1.2, None, None));
    assert_eq!(document.flanks.as_ref().unwrap()[1].u_w_m2k, Some(0.21));
    assert_eq!(document.symmetry.iter().map(|side| side.value).collect::<Vec<_>>(), [Side::Left]);
    assert_eq!(document.probes[0].at, [0.368, 0.1]);
    let section = document.section_span;
    assert_eq!(&BALCONY[section.start..section.end], "section");
}

#[test]
fn regions_are_laid_out_in_metres() {
    let document = read(BALCONY).unwrap();
    let boxes = boxes(&document);
    assert_eq!(boxes[0], ([-1.2, 0.0], [-1.3, 1.3]));
    assert_eq!(boxes[1].0, [0.368, 1.6]);
    // four layers to the right, the plaster of no thickness left out: sums of millimetres, without rounding
    let x: Vec<[f64; 2]> = boxes[3..7].iter().map(|(x, _)| *x).collect();
    assert_eq!(x, [[0.0, 0.015], [0.015, 0.155], [0.155, 0.355], [0.355, 0.38]]);
    // and downwards
    let y: Vec<[f64; 2]> = boxes[7..11].iter().map(|(_, y)| *y).collect();
    assert_eq!(y, [[1.285, 1.3], [1.145, 1.285], [0.945, 1.145], [0.92, 0.945]]);
    let classes: Vec<SurfaceClass> = document.regions[3..7].iter().map(|region| region.class).collect();
    assert_eq!(classes[1..3], [SurfaceClass::Opaque, SurfaceClass::Frame]);

    let outline = &document.regions[11];
    assert_eq!(outline.class, SurfaceClass::Glazing);
    let Shape::Outline(points) = &outline.shape else { panic!("{outline:?}") };
    let corners: Vec<[f64; 2]> = points.iter().map(|point| point.value).collect();
    assert_eq!(corners, [[0.0, 0.1], [0.06, 0.1], [0.06, 0.16]], "the first point's repetition is left out");
    let Fill::SpacedBars { material, area_m2, spacing_m, along } = document.regions[12].fill else { panic!() };
    assert_eq!((material, spacing_m, along), (2, 0.2, Axis::X));
    assert!((area_m2 - 113e-6).abs() < 1e-18);
    assert_eq!(document.regions[13].fill, Fill::Void);
    let region = document.regions[13].span;
    assert!(BALCONY[region.start..region.end].starts_with("{ void: adiabatic") && BALCONY[..region.end].ends_with('}'));
}

#[test]
fn remarks_do_not_stop_the_reading() {
    let text = wall_with(
        "section:",
        "  spare: { conductivity: 1 }\nparameters:\n  spare: 1\nbuildups:\n  spare: [EPS: 0, XPS: 10]\nsection:",
    );
    let remarks: Vec<String> = read(&text).unwrap().remarks.into_iter().map(|remark| remark.message).collect();
    assert_eq!(
        remarks,
        [
            "the material `spare` is not used",
            "the parameter `spare` is not used",
            "the build-up `spare` is not used",
            "the layer `EPS` is left out, as its thickness is 0",
            "`XPS` is taken with a typical conductivity, 0.034 W/(m·K)",
        ]
    );
}

#[test]
fn lengths_follow_the_unit() {
    for (unit, metres) in [("mm", 0.001), ("cm", 0.01), ("m", 1.0), ("in", 0.0254)] {
        let document = read(&wall_with("plane", &format!("unit: {unit}\nplane"))).unwrap();
        assert_eq!(boxes(&document)[1].0, [0.0, metres], "{unit}");
    }
    let text = wall_with("plane", "unit: in\nplane")
        .replace("block, x: [0, 1]", "block, spaced: { area: 100, spacing: 10 }, x: [0, 2]");
    let document = read(&text).unwrap();
    let Fill::SpacedBars { area_m2, spacing_m, .. } = document.regions[1].fill else { panic!() };
    assert!((area_m2 - 1e-4).abs() < 1e-18, "areas are in mm² in every file");
    assert!((spacing_m - 0.254).abs() < 1e-15);
}

#[test]
fn names_are_found_as_written_first_and_in_the_file_first() {
    let used = |materials: &str, name: &str| {
        let text = wall_with("  block: { conductivity: 0.5 }", materials)
            .replace("material: block", &format!("material: {name}"));
        let document = read(&text).unwrap();
        let Fill::Material(place) = document.regions[1].fill else { panic!() };
        document.materials[place].conductivity_w_mk
    };
    let two = "  Steel: { conductivity: 40 }\n  steel: { conductivity: 45 }";
    assert_eq!(used(two, "steel"), 45.0);
    assert_eq!(used(two, "Steel"), 40.0);
    assert_eq!(used(two, "STEEL"), 40.0);
    // EN 12524's steel has 50, its stainless steel 17
    assert_eq!(used("  Steel: { conductivity: 40 }", "steel"), 40.0);
    assert_eq!(used(two, "Stainless Steel"), 17.0);
}

#[test]
fn the_catalogues_entry_is_told_where_another_name_was_used() {
    let document = read(&wall_with("material: block", "material: gypsum plaster")).unwrap();
    let plaster = &document.materials[1];
    assert_eq!((plaster.name.as_str(), plaster.conductivity_w_mk, plaster.span), ("gypsum plaster", 0.57, None));
    let Provenance::Catalogue(source) = &plaster.provenance else { panic!() };
    assert!(source.starts_with("gypsum plaster (1300 kg/m3): EN 12524:2000"), "{source}");
}

#[test]
fn layers_of_one_resistance_share_a_material_if_they_are_equally_thick() {
    let layers = "buildups:\n  a:\n    - gap: { thickness: 25, resistance: 0.18 }\n    - gap: { thickness: 25, resistance: 0.18 }\n    \
                  - gap: { thickness: 50, resistance: 0.18 }\nsection:";
    let document = read(&wall_with("section:", layers)).unwrap();
    let names: Vec<&str> = document.materials.iter().map(|material| material.name.as_str()).collect();
    assert_eq!(names, ["block", "gap (R 0.18)", "gap (R 0.18, 50 mm)"]);
}

#[test]
fn flanks_may_be_none_or_left_to_the_drawing() {
    assert_eq!(read(&wall_with("section:", "section:")).unwrap().flanks, None);
    assert_eq!(read(&wall_with("section:", "flanks: []\nsection:")).unwrap().flanks, Some(Vec::new()));
    assert_eq!(
        messages(&wall_with("section:", "flanks:\nsection:")),
        ["`flanks` must be a list of flanks, each with a dash before it, or [] for none, not nothing"]
    );
}

#[test]
fn optional_blocks_may_be_empty_and_lines_may_end_as_on_windows() {
    let text = wall_with("section:", "parameters:\nbuildups: {}\nsymmetry: []\nprobes: ~\nsection:");
    let document = read(&text).unwrap();
    assert_eq!(read(&text.replace('\n', "\r\n")).unwrap().regions.len(), document.regions.len());
    assert!(read(&format!("\u{feff}{text}")).is_ok());
    assert!(read(&format!("---\n{text}...\n")).is_ok());
}

#[test]
fn aliases_repeat_a_value_and_its_faults_are_told_once() {
    let text = wall_with("x: [-1, 0], y: [0, 1]", "x: [-1, 0], y: &height [0, 1]")
        .replace("block, x: [0, 1], y: [0, 1]", "block, x: [0, 1], y: *height");
    assert_eq!(boxes(&read(&text).unwrap())[1].1, [0.0, 0.001]);
    assert_eq!(messages(&text.replace("&height [0, 1]", "&height [0, top]")), ["there is no parameter `top`"]);
}

#[test]
fn a_misspelt_block_is_one_mistake() {
    assert_eq!(messages(&wall_with("environments", "enviroments")), ["`enviroments` is not a key of a junction file"]);
    assert_eq!(messages(&wall_with("materials", "material")), ["`material` is not a key of a junction file"]);
    let text = wall_with("section:", "parametres:\n  wide: 1\nsection:").replace("x: [0, 1]", "x: [0, wide]");
    assert_eq!(messages(&text), ["`parametres` is not a key of a junction file"]);
    assert_eq!(
        messages(&wall_with("  block: { conductivity: 0.5 }", "  - block")),
        ["`materials` must be a block of `name: value` entries, not a list"]
    );
    assert_eq!(
        messages(&wall_with("conductivity", "lambda")),
        ["the material `block` has no `conductivity`", "`lambda` is not a key of a material"]
    );
}

#[test]
fn bounds_of_quantities_are_kept() {
    let one = |old: &str, new: &str| {
        let messages = messages(&wall_with(old, new));
        assert_eq!(messages.len(), 1, "{messages:?}");
        messages[0].clone()
    };
    assert_eq!(one("temperature: 0", "temperature: -300"), "`temperature` of `out` must be at least -100 °C");
    assert_eq!(one("conductivity: 0.5", "conductivity: 0"), "`conductivity` of `block` must be more than 0 W/(m·K)");
    assert_eq!(one("x: [0, 1]", "x: [0, 1e12]"), "`x` must be at most 10000000 mm");
    assert_eq!(
        one("temperature: 0", "temperature: 0, relative_humidity: 0"),
        "`relative_humidity` of `out` must be more than 0 %"
    );
    assert!(read(&wall_with("temperature: 0", "temperature: 0, surface_resistance: 0")).is_ok());
    assert_eq!(read(&wall_with("temperature: 0", "temperature: 0, relative_humidity: 0.5")).unwrap().remarks.len(), 1);
}

#[test]
fn positions_in_expressions_count_bytes_also_after_other_alphabets() {
    let text = wall_with("title: Wall", "title: Wärmebrücke λ").replace("x: [0, 1]", "x: [0, 2 * wänd]");
    let diagnostic = read(&text).unwrap_err().remove(0);
    let span = diagnostic.span.unwrap();
    assert_eq!(&text[span.start..span.end], "wänd");
}

mod properties {
    use super::*;
    use proptest::prelude::*;

    proptest! {
        /// Whatever an editor's slip makes of a file, it is read or refused with places inside the text.
        #[test]
        fn damaged_files_never_panic(
            damages in prop::collection::vec((0..BALCONY.len(), 0..12_usize, "[ \t\n:\\-\\[\\]{}\"'#&*!|>%@`,a0.é?<]{0,4}"), 1..6)
        ) {
            let mut text = BALCONY.to_owned();
            for (place, length, insert) in damages {
                let start = crate::input::location::char_start(&text, place);
                let end = crate::input::location::char_start(&text, start + length);
                text.replace_range(start..end.max(start), &insert);
            }
            let source = Source { name: "damaged.yaml".to_owned(), text };
            if let Err(diagnostics) = parse(&source) {
                prop_assert!(!diagnostics.is_empty());
                for diagnostic in &diagnostics {
                    let inside = diagnostic.span.is_none_or(|span| source.text.get(span.start..span.end).is_some());
                    prop_assert!(inside, "{diagnostic:?}");
                }
                prop_assert!(!crate::input::render(&source, &diagnostics, true).is_empty());
            }
        }
    }
}
