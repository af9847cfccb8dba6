//! Lengths worked out by hand on paper, in millimetres; U by hand from the layers and ISO 6946's surface resistances.

use crate::input::{EnvironmentKind, FlankEntry, Plane, Shape, Side, SurfaceClass};
use crate::junction::test_draft::{Draft, WALL, balcony, given};
use crate::junction::{Junction, Lengths};
use approx::assert_relative_eq;

/// What a test expects of a flank: name, internal, overall internal and external length in millimetres.
type Expected<'a> = (&'a str, Option<f64>, Option<f64>, Option<f64>);

fn mm(length_m: Option<f64>) -> Option<f64> {
    length_m.map(|length_m| (length_m * 1e6).round() / 1e3)
}

fn in_mm(lengths: &Lengths) -> (Option<f64>, Option<f64>, Option<f64>) {
    (mm(lengths.internal_m), mm(lengths.overall_internal_m), mm(lengths.external_m))
}

#[track_caller]
fn assert_lengths(junction: &Junction, expected: &[Expected]) {
    let found: Vec<Expected> = junction
        .flanks
        .iter()
        .map(|flank| {
            let (internal, overall, external) = in_mm(&flank.lengths);
            (flank.name.as_str(), internal, overall, external)
        })
        .collect();
    assert_eq!(found, expected);
}

fn all(name: &str, length: f64) -> Expected<'_> {
    (name, Some(length), Some(length), Some(length))
}

fn lengths(name: &str, internal: f64, overall: f64, external: f64) -> Expected<'_> {
    (name, Some(internal), Some(overall), Some(external))
}

/// A corner of two 300 mm block walls: `inner` air in the quarter enclosed by both, `outer` around it.
fn corner(inner: &str, outer: &str) -> Draft {
    Draft::plan()
        .paint(outer, [-500.0, 1300.0], [-500.0, 1300.0])
        .paint(inner, [300.0, 1300.0], [300.0, 1300.0])
        .paint("block", [0.0, 300.0], [0.0, 1300.0])
        .paint("block", [0.0, 1300.0], [0.0, 300.0])
}

/// An external wall against which a slab ends that parts two rooms.
fn party_slab() -> Draft {
    Draft::section()
        .air("downstairs", EnvironmentKind::Internal, 15.0)
        .paint("outdoors", [-500.0, 0.0], [-1300.0, 1300.0])
        .paint("flat", [368.0, 1600.0], [100.0, 1300.0])
        .paint("downstairs", [368.0, 1600.0], [-1300.0, -100.0])
        .layers_x(0.0, &WALL, [-1300.0, 1300.0])
        .paint("concrete", [155.0, 1600.0], [-100.0, 100.0])
}

/// A timber frame wall along x, 600 wide, with a stud of 44 at `stud`; symmetry planes left and right.
fn stud_bay(stud: [f64; 2]) -> Draft {
    Draft::plan()
        .paint("outdoors", [0.0, 600.0], [-500.0, 0.0])
        .paint("flat", [0.0, 600.0], [165.0, 665.0])
        .layers_y(0.0, &[("board", 12.5), ("wool", 140.0), ("board", 12.5)], [0.0, 600.0])
        .paint("timber", stud, [12.5, 152.5])
        .symmetry(Side::Left)
        .symmetry(Side::Right)
}

#[test]
fn balcony_slab_internal_to_the_slab_the_others_to_its_middle() {
    let junction = balcony(-100.0, 100.0).built();
    assert_lengths(&junction, &[lengths("top", 1200.0, 1300.0, 1300.0), lengths("bottom", 1200.0, 1300.0, 1300.0)]);
    // 1 / (0.13 + 0.013/0.57 + 0.2/0.5 + 0.14/0.035 + 0.015/1 + 0.04) = 0.217023
    let top = &junction.flanks[0];
    assert_relative_eq!(top.u_w_m2k, 0.217_023, epsilon = 1e-6);
    assert_eq!((top.warm_resistance, top.cold_resistance), (0.13, 0.04));
    assert_eq!(junction.airs[top.warm.index()].name, "flat");
    assert_eq!(junction.airs[top.cold.index()].name, "outdoors");
    let layers: Vec<_> = top.layers.iter().map(|layer| junction.parts[layer.part.index()].material.as_str()).collect();
    assert_eq!(layers, ["plaster", "block", "wool", "render"], "from warm to cold");
    assert_eq!(junction.flank_proposal, None);
    assert_eq!(junction.warnings, Vec::<String>::new());
    // the slab in the room is cut too, but has the flat on both sides
    let sides: Vec<_> = junction.cuts.iter().map(|cut| (cut.side, mm(cut.undisturbed_m))).collect();
    assert_eq!(sides, [(Side::Right, Some(1232.0)), (Side::Top, Some(1200.0)), (Side::Bottom, Some(1200.0))]);
}

#[test]
fn off_centre_slab_the_middle_is_the_middle_of_the_slab() {
    let junction = balcony(-100.0, 200.0).built();
    assert_lengths(&junction, &[lengths("top", 1100.0, 1250.0, 1250.0), lengths("bottom", 1200.0, 1350.0, 1350.0)]);
}

#[test]
fn external_corner_to_where_the_surface_lines_meet() {
    let junction = corner("flat", "outdoors").built();
    assert_lengths(&junction, &[lengths("right", 1000.0, 1000.0, 1300.0), lengths("top", 1000.0, 1000.0, 1300.0)]);
    // 1 / (0.13 + 0.3/0.5 + 0.04) = 1.298701
    assert_relative_eq!(junction.flanks[0].u_w_m2k, 1.298_701, epsilon = 1e-6);
}

#[test]
fn re_entrant_corner_has_its_longer_lines_inside() {
    let junction = corner("outdoors", "flat").built();
    assert_lengths(&junction, &[lengths("right", 1300.0, 1300.0, 1000.0), lengths("top", 1300.0, 1300.0, 1000.0)]);
}

#[test]
fn corner_cut_at_symmetry_planes_counts_both_walls() {
    let junction = corner("flat", "outdoors").symmetry(Side::Top).symmetry(Side::Right).built();
    assert_lengths(&junction, &[lengths("right", 1000.0, 1000.0, 1300.0), lengths("top", 1000.0, 1000.0, 1300.0)]);
}

#[test]
fn parapet_runs_to_the_ceiling_line_and_to_the_roofs_upper_face() {
    let junction = Draft::section()
        .paint("outdoors", [-500.0, 1600.0], [-1300.0, 1200.0])
        .paint("flat", [300.0, 1600.0], [-1300.0, 0.0])
        .layers_y(0.0, &[("concrete", 200.0), ("wool", 160.0)], [300.0, 1600.0])
        .paint("block", [0.0, 300.0], [-1300.0, 700.0])
        .built();
    assert_lengths(&junction, &[lengths("right", 1300.0, 1300.0, 1600.0), lengths("bottom", 1300.0, 1300.0, 1660.0)]);
    // heat flows up through the roof: 1 / (0.10 + 0.2/2.3 + 0.16/0.035 + 0.04) = 0.208403
    assert_relative_eq!(junction.flanks[0].u_w_m2k, 0.208_403, epsilon = 1e-6);
}

#[test]
fn party_slab_runs_to_the_lines_of_the_wall_it_ends_against() {
    let junction = party_slab().built();
    assert_lengths(
        &junction,
        &[
            lengths("right", 1232.0, 1232.0, 1600.0),
            lengths("top", 1200.0, 1300.0, 1300.0),
            lengths("bottom", 1200.0, 1300.0, 1300.0),
        ],
    );
    let slab = &junction.flanks[0];
    assert_eq!(junction.airs[slab.warm.index()].name, "flat", "20 °C against 15 °C");
    assert_eq!(junction.airs[slab.cold.index()].name, "downstairs");
    // heat flows down on both faces: 1 / (0.17 + 0.2/2.3 + 0.17) = 2.342159
    assert_relative_eq!(slab.u_w_m2k, 2.342_159, epsilon = 1e-6);
}

#[test]
fn a_t_against_walls_of_two_thicknesses_settles_only_the_line_they_share() {
    // below the slab the wall is 100 thicker on its inside
    let junction = party_slab().paint("block", [368.0, 468.0], [-1300.0, -100.0]).built();
    assert_lengths(
        &junction,
        &[
            ("right", None, None, Some(1600.0)),
            lengths("top", 1200.0, 1300.0, 1300.0),
            lengths("bottom", 1200.0, 1300.0, 1300.0),
        ],
    );
    let proposal = "flanks:
  - { name: right, cut: right, external: 1600 }  # add internal and overall_internal, in mm from the cut plane; its straight internal surface ends at 1232
  - { name: top, cut: top, internal: 1200, overall_internal: 1300, external: 1300 }
  - { name: bottom, cut: bottom, internal: 1200, overall_internal: 1300, external: 1300 }
";
    assert_eq!(junction.flank_proposal.as_deref(), Some(proposal));
    assert!(junction.warnings.iter().any(|warning| {
        warning
            == "flank right: the drawing does not settle its internal and overall internal length, and Ψ is left open \
                there; complete the proposed `flanks:`"
    }));
}

#[test]
fn stud_bay_between_symmetry_planes_is_shared_half_and_half() {
    let junction = stud_bay([278.0, 322.0]).built();
    assert_lengths(&junction, &[all("left", 300.0), all("right", 300.0)]);
    assert_eq!(junction.warnings, Vec::<String>::new(), "symmetry planes may lie near");
}

#[test]
fn half_a_bay_from_stud_to_wool_asks_which_is_the_clear_element() {
    let junction = stud_bay([0.0, 22.0]).built();
    assert!(junction.flanks.is_empty());
    let proposal = junction.flank_proposal.expect("the user must choose");
    assert!(proposal.contains("{ name: left, cut: left }"), "{proposal}");
    assert!(proposal.contains("{ name: right, cut: right }"), "{proposal}");
    assert!(junction.warnings[0].starts_with("the cut planes on the symmetry edges left and right cross different"));
    // named, the wool side runs to the plane through the stud, being in line with its own mirror image
    let named = stud_bay([0.0, 22.0]).flank("bay", Side::Right, |_| {}).built();
    assert_lengths(&named, &[all("bay", 600.0)]);
    assert_eq!(named.warnings, Vec::<String>::new());
}

#[test]
fn half_a_pier_on_a_symmetry_plane_interrupts_the_internal_length() {
    let junction = Draft::plan()
        .paint("outdoors", [0.0, 1500.0], [-500.0, 0.0])
        .paint("flat", [0.0, 1500.0], [200.0, 900.0])
        .paint("block", [0.0, 1500.0], [0.0, 200.0])
        .paint("concrete", [0.0, 150.0], [100.0, 400.0])
        .symmetry(Side::Left)
        .built();
    assert_lengths(&junction, &[lengths("right", 1350.0, 1500.0, 1500.0)]);
}

/// A first version took the wall below, cut at the plane of symmetry, for the junction's own middle and lost its length.
#[test]
fn a_wall_that_goes_on_below_the_slab_counts_though_it_is_cut_at_a_symmetry_plane() {
    let drawn = |symmetry: &[Side]| {
        let draft = Draft::section()
            .paint("outdoors", [-300.0, 0.0], [-1300.0, 1300.0])
            .paint("flat", [300.0, 2000.0], [-1300.0, 1300.0])
            .paint("block", [0.0, 300.0], [-1300.0, 1300.0])
            .paint("concrete", [100.0, 2000.0], [-100.0, 100.0]);
        symmetry.iter().fold(draft, |draft, &side| draft.symmetry(side)).built()
    };
    let both = [lengths("top", 1200.0, 1300.0, 1300.0), lengths("bottom", 1200.0, 1300.0, 1300.0)];
    for symmetry in [&[][..], &[Side::Bottom], &[Side::Top], &[Side::Top, Side::Bottom]] {
        assert_lengths(&drawn(symmetry), &both);
    }
}

#[test]
fn a_pier_outside_leaves_the_internal_surface_whole_and_is_shared_half_and_half() {
    let junction = Draft::plan()
        .paint("outdoors", [-1500.0, 1700.0], [-500.0, 0.0])
        .paint("flat", [-1500.0, 1700.0], [200.0, 900.0])
        .paint("block", [-1500.0, 1700.0], [0.0, 200.0])
        .paint("concrete", [-150.0, 150.0], [-300.0, 100.0])
        .built();
    assert_lengths(&junction, &[all("left", 1600.0), all("right", 1600.0)]);
}

#[test]
fn a_wall_that_changes_thickness_inside_is_measured_to_the_step() {
    let junction = Draft::plan()
        .paint("outdoors", [-1500.0, 1700.0], [-500.0, 0.0])
        .paint("flat", [-1500.0, 1700.0], [200.0, 900.0])
        .paint("block", [-1500.0, 0.0], [0.0, 200.0])
        .paint("block", [0.0, 1700.0], [0.0, 300.0])
        .built();
    assert_lengths(&junction, &[all("left", 1500.0), all("right", 1700.0)]);
}

#[test]
fn a_cross_of_four_rooms_is_two_pairs_in_line() {
    let junction = Draft::plan()
        .air("b", EnvironmentKind::Internal, 18.0)
        .air("c", EnvironmentKind::Unheated, 8.0)
        .paint("flat", [100.0, 1300.0], [150.0, 1400.0])
        .paint("b", [-1200.0, -100.0], [150.0, 1400.0])
        .paint("outdoors", [-1200.0, -100.0], [-1500.0, -150.0])
        .paint("c", [100.0, 1300.0], [-1500.0, -150.0])
        .paint("block", [-100.0, 100.0], [-1500.0, 1400.0])
        .paint("block", [-1200.0, 1300.0], [-150.0, 150.0])
        .built();
    assert_lengths(
        &junction,
        &[
            lengths("left", 1100.0, 1200.0, 1200.0),
            lengths("right", 1200.0, 1300.0, 1300.0),
            lengths("top", 1250.0, 1400.0, 1400.0),
            lengths("bottom", 1350.0, 1500.0, 1500.0),
        ],
    );
}

#[test]
fn a_t_on_the_cold_side_is_not_settled() {
    // a porch outside: the flat's surface runs on past the porch's wall
    let junction = Draft::plan()
        .air("porch", EnvironmentKind::Unheated, 5.0)
        .paint("outdoors", [-1500.0, -100.0], [0.0, 1500.0])
        .paint("porch", [-1500.0, -100.0], [-1500.0, -200.0])
        .paint("block", [-1500.0, 0.0], [-200.0, 0.0])
        .paint("block", [-100.0, 100.0], [-1500.0, 1500.0])
        .paint("flat", [100.0, 1000.0], [-1500.0, 1500.0])
        .built();
    let open = |name| (name, None, None, None);
    assert_lengths(&junction, &[open("left"), open("top"), open("bottom")]);
    let proposal = junction.flank_proposal.expect("the user is asked");
    assert!(proposal.contains(
        "{ name: top, cut: top }  # add internal, overall_internal and external, in mm from the cut plane; its straight \
         internal surface ends at 3000"
    ));
}

#[test]
fn one_flank_alone_is_not_settled() {
    let draft = corner("flat", "outdoors").flank("wall", Side::Top, |_| {});
    let junction = draft.built();
    assert_lengths(&junction, &[("wall", None, None, None)]);
    assert!(
        junction.warnings.contains(
            &"the element cut at the right (x 1300 mm, y 150 mm) separates flat and outdoors but is not among the flanks: \
              its heat flow stays in Ψ"
                .to_owned()
        ),
        "{:?}",
        junction.warnings
    );
}

#[test]
fn given_lengths_win_one_by_one_and_differences_are_told() {
    let junction = balcony(-100.0, 100.0)
        .flank("wall above", Side::Top, |entry| {
            entry.internal_m = given(1200.4);
            entry.external_m = given(1310.0);
        })
        .flank("wall below", Side::Bottom, |_| {})
        .built();
    assert_lengths(
        &junction,
        &[lengths("wall above", 1200.4, 1300.0, 1310.0), lengths("wall below", 1200.0, 1300.0, 1300.0)],
    );
    assert_eq!(in_mm(&junction.flanks[0].measured), (Some(1200.0), Some(1300.0), Some(1300.0)));
    assert_eq!(
        junction.warnings,
        ["flank wall above: the given external length of 1310 mm is used; the drawing measures 1300 mm"]
    );
}

#[test]
fn in_a_corner_overall_internal_follows_a_given_internal_length() {
    let junction = corner("flat", "outdoors")
        .flank("a", Side::Top, |entry| entry.internal_m = given(990.0))
        .flank("b", Side::Right, |entry| entry.overall_internal_m = given(1005.0))
        .built();
    assert_lengths(&junction, &[lengths("a", 990.0, 990.0, 1300.0), lengths("b", 1000.0, 1005.0, 1300.0)]);
}

#[test]
fn a_given_u_is_used_and_compared() {
    let with = |u| {
        let change = |entry: &mut FlankEntry| entry.u_w_m2k = Some(u);
        balcony(-100.0, 100.0).flank("above", Side::Top, change).flank("below", Side::Bottom, |_| {}).built()
    };
    let junction = with(0.25);
    assert_eq!(junction.flanks[0].u_w_m2k, 0.25);
    assert_relative_eq!(junction.flanks[0].u_layers_w_m2k, 0.217_023, epsilon = 1e-6);
    assert_eq!(
        junction.warnings,
        ["flank above: the given U of 0.25 W/(m²·K) is used; the layers cut there have 0.217 W/(m²·K)"]
    );
    assert_eq!(with(0.225).warnings, Vec::<String>::new(), "3.7 % is near enough");
}

#[test]
fn the_proposal_keeps_what_the_file_says() {
    let junction = corner("flat", "outdoors")
        .flank("wall: west", Side::Top, |entry| {
            entry.u_w_m2k = Some(1.25);
            entry.internal_m = given(1000.0);
        })
        .built();
    let first = "  - { name: \"wall: west\", cut: top, internal: 1000, u: 1.25 }  # add overall_internal and external, in mm \
                 from the cut plane; its straight internal surface ends at 1000\n";
    assert_eq!(junction.flank_proposal.as_deref(), Some(format!("flanks:\n{first}").as_str()));
}

/// The drawing mirrored at the diagonal (x and y exchanged), or at the y axis.
fn moved(draft: &Draft, point: fn([f64; 2]) -> [f64; 2], side: fn(Side) -> Side) -> Draft {
    let mut moved = draft.clone();
    for region in &mut moved.document.regions {
        let Shape::Box { x, y } = &mut region.shape else { panic!("these drawings consist of boxes") };
        let (a, b) = (point([x[0], y[0]]), point([x[1], y[1]]));
        (*x, *y) = ([a[0].min(b[0]), a[0].max(b[0])], [a[1].min(b[1]), a[1].max(b[1])]);
    }
    for listed in &mut moved.document.symmetry {
        listed.value = side(listed.value);
    }
    moved
}

#[test]
fn lengths_and_u_do_not_depend_on_how_the_plan_lies_on_the_sheet() {
    let exchange = |side| match side {
        Side::Left => Side::Bottom,
        Side::Bottom => Side::Left,
        Side::Right => Side::Top,
        Side::Top => Side::Right,
    };
    let reflect = |side: Side| if matches!(side, Side::Left | Side::Right) { side.opposite() } else { side };
    let mut party = party_slab();
    party.document.plane = Plane::Horizontal;
    for draft in [corner("flat", "outdoors"), corner("outdoors", "flat"), stud_bay([278.0, 322.0]), party] {
        let figures = |draft: &Draft| {
            let junction = draft.built();
            let figure = |flank: &crate::junction::Flank| (in_mm(&flank.lengths), (flank.u_w_m2k * 1e9).round());
            let mut all: Vec<_> = junction.flanks.iter().map(figure).collect();
            all.sort_by(|a, b| a.partial_cmp(b).expect("figures are numbers"));
            (all, junction.cuts.len(), junction.surfaces.len())
        };
        let expected = figures(&draft);
        let exchanged = moved(&draft, |[x, y]| [y, x], exchange);
        let reflected = moved(&draft, |[x, y]| [-x, y], reflect);
        assert_eq!(figures(&exchanged), expected);
        assert_eq!(figures(&reflected), expected);
        assert_eq!(figures(&moved(&exchanged, |[x, y]| [-x, y], reflect)), expected);
    }
}

/// Different layers behind one even inside face: the surface does not tell where one wall becomes the other, and half and
/// half gave a Ψ that moved with the cut planes.
#[test]
fn an_even_face_over_different_layers_is_not_shared() {
    let junction = Draft::section()
        .paint("outdoors", [-1000.0, 0.0], [-1500.0, 2000.0])
        .paint("flat", [300.0, 1800.0], [-1500.0, 2000.0])
        .paint("block", [0.0, 300.0], [-1500.0, 0.0])
        .paint("wool", [0.0, 300.0], [0.0, 2000.0])
        .built();
    assert!(junction.flanks.iter().all(|flank| flank.lengths == Lengths::default()));
    assert!(junction.flank_proposal.is_some());
}

/// A window flush with the inside: the surface's class says where the wall ends.
#[test]
fn a_flush_window_begins_where_the_class_of_surface_changes() {
    let junction = Draft::plan()
        .paint("outdoors", [-500.0, 300.0], [-1800.0, 1200.0])
        .paint("flat", [300.0, 800.0], [-1800.0, 1200.0])
        .paint("block", [0.0, 300.0], [-1800.0, 0.0])
        .paint("timber", [230.0, 300.0], [0.0, 1200.0])
        .class(SurfaceClass::Frame)
        .built();
    // to y = 0 from either cut
    assert_lengths(&junction, &[all("top", 1200.0), all("bottom", 1800.0)]);
}

/// Block goes on above the slab before the insulation begins: the flank's U does not hold on all of the length given.
#[test]
fn layers_that_end_before_the_length_does_are_remarked_on() {
    let junction = Draft::section()
        .paint("outdoors", [-1000.0, 0.0], [-1500.0, 2000.0])
        .paint("flat", [300.0, 1500.0], [-1500.0, 2000.0])
        .paint("block", [0.0, 300.0], [-1500.0, 2000.0])
        .paint("wool", [0.0, 300.0], [700.0, 2000.0])
        .paint("concrete", [0.0, 1500.0], [-100.0, 100.0])
        .flank("top", Side::Top, |entry| entry.internal_m = given(1900.0))
        .flank("bottom", Side::Bottom, |entry| entry.internal_m = given(1400.0))
        .built();
    let warning = "flank top: its layers change 1300 mm from the cut, but its length is 1900 mm";
    assert!(junction.warnings.iter().any(|w| w.starts_with(warning)), "{:?}", junction.warnings);
}

/// A partition beside the place where one wall becomes another: the split at the partition gave −0.349 for 0.002 W/(m·K).
#[test]
fn a_wall_that_changes_beside_a_partition_is_not_split_at_the_partition() {
    let drawn = |bottom: f64| {
        Draft::section()
            .paint("outdoors", [-1000.0, 0.0], [-1500.0, 2000.0])
            .paint("flat", [300.0, 1500.0], [-1500.0, 2000.0])
            .paint("block", [0.0, 300.0], [-1500.0, 0.0])
            .paint("wool", [0.0, 300.0], [0.0, 2000.0])
            .paint("board", [300.0, 1500.0], [bottom, bottom + 200.0])
            .built()
    };
    assert!(drawn(200.0).flanks.iter().all(|flank| flank.lengths == Lengths::default()));
    assert_lengths(
        &drawn(-100.0),
        &[lengths("top", 1900.0, 2000.0, 2000.0), lengths("bottom", 1400.0, 1500.0, 1500.0)],
    );
}
