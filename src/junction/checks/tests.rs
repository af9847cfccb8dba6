use crate::input::EnvironmentKind;
use crate::junction::test_draft::{Draft, balcony};

fn wall() -> Draft {
    Draft::section().paint("outdoors", [-500.0, 0.0], [0.0, 1000.0]).paint("flat", [200.0, 700.0], [0.0, 1000.0]).paint(
        "block",
        [0.0, 200.0],
        [0.0, 1000.0],
    )
}

#[test]
fn an_unpainted_gap_beside_a_solid_is_one_complaint_with_its_extent() {
    // a coping that leaves a gap above the wall
    let draft = Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 1200.0])
        .paint("flat", [200.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [0.0, 1000.0])
        .paint("outdoors", [200.0, 700.0], [1000.0, 1200.0])
        .paint("concrete", [60.0, 700.0], [1000.0, 1100.0])
        .paint("outdoors", [60.0, 200.0], [1100.0, 1200.0]);
    let problems = draft.refused();
    assert_eq!(problems.len(), 1);
    assert_eq!(problems[0].message, "concrete ends at an unpainted part of the sheet: x 0 to 60 mm, y 1000 to 1200 mm");
    assert_eq!(problems[0].label, "its edge at x 60 mm, y 1050 mm has neither air nor solid beside it");
    assert_eq!(problems[0].span, Some(draft.region_span(4)));
}

#[test]
fn the_help_for_a_gap_can_be_pasted() {
    let gap = |x| {
        Draft::section().paint("outdoors", [-500.0, 0.0], [0.0, 1000.0]).paint("flat", [200.0, 700.0], x).paint(
            "block",
            [0.0, 200.0],
            [0.0, 1000.0],
        )
    };
    let help = |draft: Draft| draft.refused()[0].help.clone().expect("a gap comes with help");
    // the missing strip touches the room's air alone
    let void = "or, if the model ends there on purpose: `- { void: adiabatic, x: [200, 700], y: [900, 1000] }`";
    let air =
        "paint the air that is there, before the solids: `- { environment: flat, x: [200, 700], y: [900, 1000] }`";
    assert_eq!(help(gap([0.0, 900.0])), format!("{air}\n{void}"));
    gap([0.0, 900.0]).paint("flat", [200.0, 700.0], [900.0, 1000.0]).built();
    // between two airs, neither is proposed: it would touch the other
    let short = Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
        .paint("flat", [200.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [0.0, 900.0]);
    assert!(help(short).starts_with("paint the air that is there, before the solids, or let the solid fill it\n"));
}

#[test]
fn airs_that_touch_along_a_straight_line_are_told_as_one_stretch() {
    // other regions put lines through the stretch at y 300 and y 600
    let draft = Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
        .paint("flat", [0.0, 700.0], [0.0, 1000.0])
        .paint("block", [100.0, 200.0], [300.0, 600.0])
        .paint("block", [0.0, 100.0], [0.0, 200.0]);
    let problem = &draft.refused()[0];
    assert_eq!(problem.message, "outdoors and flat touch at x 0 mm, y 200 to 1000 mm");
    let help = "let the solid between them run on to the sheet's edge, or, if it is the same air, give one of them \
                `same_as: outdoors`";
    assert_eq!(problem.help.as_deref(), Some(help));
}

#[test]
fn the_nearest_point_of_a_solid_is_proposed_for_a_probe() {
    let draft = wall().probe("beside", [201.5, 500.0]).probe("beyond", [150.0, 1234.0]);
    let help: Vec<_> = draft.refused().into_iter().filter_map(|problem| problem.help).collect();
    assert_eq!(help, ["the nearest point of a solid is `[200, 500]`", "the nearest point of a solid is `[150, 1000]`"]);
}

#[test]
fn of_many_problems_of_a_kind_ten_are_told_and_the_rest_counted() {
    let mut draft = wall();
    for step in 0..25 {
        draft = draft.probe(&format!("point {step}"), [300.0, 10.0 * f64::from(step)]);
    }
    let messages = draft.paint("concrete", [700.0, 800.0], [0.0, 1200.0]).messages();
    assert_eq!(messages.iter().filter(|message| message.contains("`point")).count(), 10);
    assert!(messages.contains(&"15 more of these: probes in no solid".to_owned()), "{messages:?}");
    // the one problem of another kind is not among those left out
    assert!(messages.iter().any(|message| message.starts_with("concrete ends at")), "{messages:?}");
}

#[test]
fn the_same_gap_painted_void_is_an_adiabatic_edge_on_purpose() {
    let gap = |name: &str| {
        Draft::section()
            .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
            .paint("flat", [200.0, 700.0], [0.0, 1000.0])
            .paint("block", [0.0, 200.0], [0.0, 800.0])
            .paint(name, [0.0, 200.0], [800.0, 1000.0])
    };
    gap("void").built();
}

#[test]
fn two_gaps_are_two_complaints() {
    let draft = Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
        .paint("flat", [200.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [100.0, 900.0]);
    assert_eq!(
        draft.messages(),
        [
            "block ends at an unpainted part of the sheet: x 0 to 200 mm, y 0 to 100 mm",
            "block ends at an unpainted part of the sheet: x 0 to 200 mm, y 900 to 1000 mm",
        ]
    );
}

#[test]
fn an_unpainted_corner_beside_air_alone_is_no_matter() {
    Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 900.0])
        .paint("flat", [200.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [0.0, 900.0])
        .paint("outdoors", [0.0, 200.0], [900.0, 1000.0])
        .paint("block", [100.0, 200.0], [900.0, 1000.0])
        .built();
}

#[test]
fn different_airs_that_share_an_edge_are_refused_once_a_pair() {
    let draft = Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
        .paint("flat", [0.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [0.0, 400.0])
        .paint("block", [0.0, 200.0], [500.0, 700.0]);
    let problems = draft.refused();
    assert_eq!(problems.len(), 1);
    assert_eq!(problems[0].message, "outdoors and flat touch at x 0 mm, y 400 to 500 mm, and at one more place");
    assert_eq!(problems[0].span, Some(draft.region_span(1)));
}

#[test]
fn airs_may_touch_at_a_point_and_the_same_air_anywhere() {
    Draft::section()
        .paint("outdoors", [0.0, 500.0], [500.0, 1000.0])
        .paint("flat", [500.0, 1000.0], [0.0, 500.0])
        .paint("block", [0.0, 500.0], [0.0, 500.0])
        .paint("block", [500.0, 1000.0], [500.0, 1000.0])
        .built();
    wall().same_air("cavity", "outdoors").paint("cavity", [-20.0, 0.0], [0.0, 1000.0]).built();
}

#[test]
fn a_solid_that_no_air_reaches_is_refused() {
    // block in a void, and a void in the block that leaves it whole
    let draft = wall()
        .paint("void", [700.0, 900.0], [0.0, 1000.0])
        .paint("concrete", [750.0, 800.0], [100.0, 200.0])
        .paint("void", [50.0, 60.0], [100.0, 200.0]);
    let problems = draft.refused();
    assert_eq!(problems.len(), 1);
    assert_eq!(problems[0].message, "concrete at x 750 to 800 mm, y 100 to 200 mm touches no air");
    assert_eq!(problems[0].span, Some(draft.region_span(4)));
}

#[test]
fn solids_that_touch_at_a_point_are_not_joined() {
    let draft = wall()
        .paint("void", [0.0, 200.0], [0.0, 500.0])
        .paint("concrete", [50.0, 150.0], [100.0, 300.0])
        .paint("wool", [150.0, 180.0], [300.0, 400.0]);
    assert_eq!(draft.messages().len(), 2);
}

#[test]
fn probes_may_lie_in_a_solid_on_its_edge_and_on_its_corner() {
    let junction = wall()
        .probe("inside", [100.0, 500.0])
        .probe("surface", [200.0, 500.0])
        .probe("corner", [200.0, 1000.0])
        .probe("just beside", [200.000_01, 500.0])
        .built();
    assert_eq!(junction.probes[2].at, [0.2, 1.0]);
    assert_eq!(junction.probes[3].at, [0.2, 0.5], "moved onto the line it is meant to be on");
}

#[test]
fn probes_in_air_in_voids_and_off_the_sheet_are_refused() {
    let draft = wall()
        .paint("void", [50.0, 100.0], [0.0, 100.0])
        .probe("in air", [-100.0, 500.0])
        .probe("in void", [75.0, 50.0])
        .probe("off", [100.0, 1100.0]);
    assert_eq!(
        draft.messages(),
        [
            "the probe `in air` at x -100 mm, y 500 mm lies in the environment `outdoors`",
            "the probe `in void` at x 75 mm, y 50 mm lies in a void",
            "the probe `off` at x 100 mm, y 1100 mm lies outside the sheet",
        ]
    );
}

#[test]
fn problems_of_different_kinds_are_listed_together() {
    let draft = Draft::section()
        .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
        .paint("flat", [0.0, 700.0], [0.0, 1000.0])
        .paint("block", [0.0, 200.0], [0.0, 400.0])
        .paint("flat", [-600.0, -500.0], [0.0, 100.0])
        .paint("block", [-600.0, -500.0], [100.0, 200.0])
        .probe("in air", [-100.0, 500.0]);
    let messages = draft.messages();
    assert!(messages.iter().any(|message| message.starts_with("flat and outdoors touch")), "{messages:?}");
    assert!(messages.iter().any(|message| message.starts_with("block ends at")), "{messages:?}");
    assert!(messages.iter().any(|message| message.starts_with("the probe")), "{messages:?}");
}

#[test]
fn unused_airs_are_remarked_on_and_a_single_air_is_refused() {
    let junction = balcony(-100.0, 100.0).air("attic", EnvironmentKind::Unheated, 5.0).built();
    assert_eq!(junction.warnings, ["environment attic appears nowhere in the section"]);
    let one = Draft::section().paint("flat", [0.0, 1000.0], [0.0, 1000.0]).paint("block", [0.0, 200.0], [0.0, 1000.0]);
    assert_eq!(one.messages(), ["flat is the only air that touches the solid, so no heat flows"]);
}

#[test]
fn more_airs_than_anybody_draws_are_refused() {
    // rooms one above the other beside one wall, with floors between them
    let storeys = |count: u32| {
        let height = f64::from(count) * 1000.0;
        let mut draft = Draft::section().paint("outdoors", [-500.0, 0.0], [0.0, height]);
        for storey in 0..count {
            let (name, y) = (format!("flat {storey}"), 1000.0 * f64::from(storey));
            draft = draft.air(&name, EnvironmentKind::Internal, 20.0).paint(&name, [0.0, 1500.0], [y, y + 1000.0]);
        }
        for storey in 1..count {
            let y = 1000.0 * f64::from(storey);
            draft = draft.paint("concrete", [0.0, 1500.0], [y - 100.0, y + 100.0]);
        }
        draft.paint("block", [0.0, 200.0], [0.0, height])
    };
    storeys(19).built();
    assert_eq!(storeys(20).messages(), ["21 different airs touch the solid; 20 can be handled"]);
}
