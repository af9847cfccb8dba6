use crate::input::{EnvironmentKind, Side};
use crate::junction::test_draft::{Draft, balcony};

/// Two walls side by side that end at the top of the sheet, with three airs, and a beam below that joins them.
fn two_walls() -> Draft {
    Draft::plan()
        .air("stair", EnvironmentKind::Unheated, 10.0)
        .paint("outdoors", [-1000.0, 0.0], [0.0, 2000.0])
        .paint("stair", [200.0, 1200.0], [200.0, 2000.0])
        .paint("flat", [1400.0, 2400.0], [0.0, 2000.0])
        .paint("block", [0.0, 200.0], [0.0, 2000.0])
        .paint("block", [1200.0, 1400.0], [0.0, 2000.0])
        .paint("block", [0.0, 1400.0], [0.0, 200.0])
}

fn near(at_mm: [f64; 2]) -> impl FnOnce(&mut crate::input::FlankEntry) {
    move |entry| entry.near = Some(at_mm.map(|at| at * 1e-3))
}

#[test]
fn several_on_a_side_are_numbered_and_asked_for_by_near() {
    let junction = two_walls().built();
    let names: Vec<_> = junction.flanks.iter().map(|flank| flank.name.as_str()).collect();
    assert_eq!(names, ["top", "top 2", "bottom"]);
    let draft = two_walls().flank("wall", Side::Top, |_| {});
    assert_eq!(draft.messages(), ["2 plane elements are cut at the top edge of the sheet"]);
    assert_eq!(
        draft.refused()[0].help.as_deref(),
        Some("add a point on it: `near: [100, 2000]` or `near: [1300, 2000]`")
    );
    let entries = draft.document.flanks.as_ref().expect("a flank is listed");
    assert_eq!(draft.refused()[0].span, Some(entries[0].cut.span));
    let named = two_walls().flank("wall", Side::Top, near([1250.0, 1900.0])).built();
    assert_eq!(named.cuts[named.flanks[0].cut].from, [1.2, 2.0]);
    let proposal = named.flank_proposal.expect("one of three is not settled");
    assert!(proposal.contains("near: [1250, 1900]"), "as the file has it: {proposal}");
}

#[test]
fn a_side_without_a_cut_plane_is_refused_with_the_sides_that_have_one() {
    let draft = balcony(-100.0, 100.0).flank("wall", Side::Left, |_| {});
    assert_eq!(draft.messages(), ["no plane element is cut at the left edge of the sheet"]);
    assert_eq!(
        draft.refused()[0].help.as_deref(),
        Some(
            "write `cut: top` or `cut: bottom`, where plane elements are cut; or let the wall, floor or roof run to the \
             left edge of the sheet, with its air on both sides"
        )
    );
}

#[test]
fn a_cut_with_the_same_air_at_both_ends_is_refused_with_that_reason() {
    let draft = balcony(-100.0, 100.0).flank("slab", Side::Right, |_| {});
    assert_eq!(draft.messages(), ["the element cut at the right edge (x 1600 mm, y 0 mm) has flat on both sides"]);
}

#[test]
fn a_cut_named_twice_is_refused_and_the_first_is_shown() {
    let draft = balcony(-100.0, 100.0).flank("above", Side::Top, |_| {}).flank("again", Side::Top, |_| {});
    assert_eq!(draft.messages(), ["the cut plane at x 184 mm, y 1300 mm is named twice"]);
    let problem = draft.refused().remove(0);
    let entries = draft.document.flanks.as_ref().expect("flanks are listed");
    assert_eq!((problem.related[0].span, problem.span), (entries[0].cut.span, Some(entries[1].cut.span)));
    assert_eq!(problem.related[0].label, "`above` has it already");
}

#[test]
fn every_wrong_flank_is_listed() {
    let draft = balcony(-100.0, 100.0).flank("a", Side::Left, |_| {}).flank("b", Side::Right, |_| {}).flank(
        "c",
        Side::Top,
        |_| {},
    );
    assert_eq!(draft.messages().len(), 2);
}

#[test]
fn a_cut_on_a_void_is_a_flank_only_where_near_names_it() {
    // the wall ends at a void 100 below the sheet's top
    let drawn = || {
        Draft::plan()
            .paint("outdoors", [-500.0, 0.0], [0.0, 1500.0])
            .paint("flat", [200.0, 700.0], [0.0, 1500.0])
            .paint("block", [0.0, 200.0], [0.0, 1400.0])
            .paint("void", [0.0, 200.0], [1400.0, 1500.0])
    };
    let junction = drawn().built();
    let names: Vec<_> = junction.flanks.iter().map(|flank| flank.name.as_str()).collect();
    assert_eq!(names, ["bottom"]);
    let on_void: Vec<_> = junction.cuts.iter().filter(|cut| !cut.on_sheet_edge).collect();
    assert_eq!(on_void.len(), 1);
    assert_eq!(on_void[0].side, Side::Top);
    approx::assert_relative_eq!(on_void[0].from[1], 1.4, epsilon = 1e-12);
    let draft = drawn().flank("wall", Side::Top, |_| {});
    assert_eq!(
        draft.refused()[0].help.as_deref(),
        Some(
            "write `cut: bottom`, where plane elements are cut; or name a cut plane on a void with `near: [100, 1400]`; \
             or let the wall, floor or roof run to the top edge of the sheet, with its air on both sides"
        )
    );
    let named = drawn().flank("wall", Side::Top, near([100.0, 1400.0])).flank("below", Side::Bottom, |_| {}).built();
    for flank in &named.flanks {
        // 1400 from cut to cut, shared half and half
        approx::assert_relative_eq!(flank.lengths.internal_m.expect("settled"), 0.7, epsilon = 1e-12);
    }
}

#[test]
fn a_drawing_without_flanks_says_so() {
    let junction = Draft::plan()
        .paint("outdoors", [-500.0, 0.0], [0.0, 500.0])
        .paint("flat", [200.0, 700.0], [0.0, 500.0])
        .paint("block", [0.0, 200.0], [0.0, 500.0])
        .paint("void", [-500.0, 0.0], [0.0, 100.0])
        .paint("void", [-500.0, 0.0], [400.0, 500.0])
        .built();
    assert!(junction.flanks.is_empty() && junction.flank_proposal.is_none());
    assert!(junction.warnings.iter().any(|warning| warning.starts_with("no plane element is cut")));
}
