use crate::input::{Axis, Side};
use crate::junction::test_draft::{Draft, balcony};

/// A 368 mm wall with a slab through it, cut `above` over the slab's top.
fn cut_at(above: f64) -> Draft {
    Draft::section()
        .paint("outdoors", [-1200.0, 0.0], [-1300.0, 100.0 + above])
        .paint("flat", [368.0, 1600.0], [-1300.0, 100.0 + above])
        .paint("block", [0.0, 368.0], [-1300.0, 100.0 + above])
        .paint("concrete", [-1000.0, 1600.0], [-100.0, 100.0])
}

#[test]
fn cut_planes_keep_three_thicknesses_or_a_metre() {
    // ISO 10211: three times 368 mm is 1104 mm
    assert_eq!(cut_at(1104.0).built().warnings, Vec::<String>::new());
    assert_eq!(
        cut_at(1000.0).built().warnings,
        ["the cut plane at the top (x 184 mm, y 1100 mm) is 1000 mm from where its layers change; ISO 10211 asks for \
         1104 mm (1 m, or three times the thickness): extend the section there by 104 mm"]
    );
    assert_eq!(cut_at(500.0).symmetry(Side::Top).built().warnings.len(), 0, "a symmetry plane may lie anywhere");
}

/// A balcony slab parted from the floor by 80 mm of insulation.
fn broken_slab() -> Draft {
    balcony(-100.0, 100.0).paint("wool", [15.0, 155.0], [-100.0, 100.0])
}

const BARS_AS_PLATE: &str = "steel, 10 mm thick, bridges wool from x 15 mm, y 65 mm to x 155 mm, y 65 mm: is it really a \
     plate that runs on along the junction? Separate bars or fixings are drawn with `spaced:`, which lets far less heat \
     through";

#[test]
fn bars_across_a_break_drawn_as_a_plate_are_questioned() {
    let anchored = broken_slab().paint("steel", [-300.0, 500.0], [60.0, 70.0]).built();
    assert_eq!(anchored.warnings, [BARS_AS_PLATE]);
    let flush = broken_slab().paint("steel", [15.0, 155.0], [60.0, 70.0]).built();
    assert_eq!(flush.warnings, [BARS_AS_PLATE]);
}

#[test]
fn spaced_bars_thick_steel_and_plates_that_end_in_insulation_are_not() {
    let spaced = broken_slab().bars("steel", Axis::X, [78.5, 150.0], [-300.0, 500.0], [60.0, 70.0]).built();
    assert!(!spaced.warnings.iter().any(|warning| warning.contains("bridges")), "{:?}", spaced.warnings);
    let thick = broken_slab().paint("steel", [-300.0, 500.0], [40.0, 80.0]).built();
    assert_eq!(thick.warnings, Vec::<String>::new());
    let ends = broken_slab().paint("steel", [-300.0, 100.0], [60.0, 70.0]).built();
    assert_eq!(ends.warnings, Vec::<String>::new());
    let in_concrete = balcony(-100.0, 100.0).paint("steel", [-300.0, 500.0], [60.0, 70.0]).built();
    assert_eq!(in_concrete.warnings, Vec::<String>::new());
}

#[test]
fn an_upright_plate_is_found_as_well() {
    let web = Draft::plan()
        .paint("outdoors", [0.0, 2600.0], [-500.0, 0.0])
        .paint("flat", [0.0, 2600.0], [300.0, 800.0])
        .layers_y(0.0, &[("block", 100.0), ("wool", 100.0), ("block", 100.0)], [0.0, 2600.0])
        .paint("steel", [1300.0, 1302.0], [50.0, 250.0])
        .built();
    assert_eq!(web.warnings.len(), 1);
    assert!(
        web.warnings[0].starts_with("steel, 2 mm thick, bridges wool from x 1301 mm, y 100 mm to x 1301 mm, y 200")
    );
}
