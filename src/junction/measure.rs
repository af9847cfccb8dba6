//! How long each flank is, as far as the drawing's geometry settles it.
//!
//! A flank runs from its cut plane inwards. Its *internal line* is the line of its warm surface at the cut, its
//! *external line* that of its cold surface. The rules, laid out on paper:
//!
//! - **One flank** whose element runs to a symmetry edge across the sheet: it is in line with its own mirror image.
//!   Warm surface uninterrupted: every length runs to the symmetry plane. Interrupted: internal to where the straight
//!   warm surface ends, the others to the symmetry plane.
//! - **Two flanks at a right angle** between the same airs (a corner, re-entrant or not): internal (external) lengths run
//!   to where the internal (external) lines meet. Overall internal equals internal.
//! - **Two flanks in line**: on opposite sides, overlapping, warm on the same side. Internal to where the straight warm
//!   surface ends; the others to the middle between these two ends, so that together they run from cut to cut. A warm
//!   surface that runs from cut to cut is shared half and half, if both separate the same airs with the same layers;
//!   where the layers differ, the place at which one element becomes the other is not the surface's to tell. Nor is it
//!   settled where one element begins before the other's straight warm surface ends.
//! - **A T**: two in line, and a third at a right angle on their warm side. Its internal and overall internal length run
//!   to the others' internal line, its external length to their external line, where the two agree on it.
//! - **A cross**: two pairs in line, each by the rule above.
//! - **Anything else** is not settled.

use super::model::{Layer, Lengths};
use super::view::{inward_axis, inward_sign};
use crate::index::AirId;
use crate::input::Side;

/// What measuring needs to know of a flank. Coordinates in metres.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Reach {
    /// The side at which it is cut.
    pub(super) side: Side,
    /// Coordinate of the cut plane along the flank.
    pub(super) cut_m: f64,
    /// Coordinate of the internal (warm) surface line, across the flank.
    pub(super) internal_m: f64,
    /// Coordinate of the external (cold) surface line, across the flank.
    pub(super) external_m: f64,
    /// Length of the straight warm surface, followed from the cut.
    pub(super) straight_m: f64,
    /// Warmer and colder air.
    pub(super) airs: [AirId; 2],
    /// Layers at the cut, from warm to cold.
    pub(super) layers: Vec<Layer>,
    /// The sequences of layers behind its straight warm surface after the cut's own, from warm to cold.
    pub(super) layers_along: Vec<Vec<Layer>>,
    /// Distance from the cut to a symmetry edge across the sheet, where solid lies on one.
    pub(super) mirror_m: Option<f64>,
}

impl Reach {
    /// The side of the flank on which the warm air lies.
    pub(super) fn warm_side(&self) -> Side {
        match (inward_axis(self.side), self.internal_m > self.external_m) {
            (0, true) => Side::Top,
            (0, false) => Side::Bottom,
            (_, true) => Side::Right,
            (_, false) => Side::Left,
        }
    }

    /// Distance from the cut to a coordinate along the flank; negative outside.
    fn to(&self, coordinate_m: f64) -> f64 {
        (coordinate_m - self.cut_m) * inward_sign(self.side)
    }

    /// Coordinate at which the straight warm surface ends.
    fn straight_end(&self) -> f64 {
        self.cut_m + self.straight_m * inward_sign(self.side)
    }

    /// Whether the element of another flank begins before this one's straight warm surface ends.
    fn runs_into(&self, other: &Self, tolerance_m: f64) -> bool {
        !alike(&self.layers, &other.layers, tolerance_m)
            && self.layers_along.iter().any(|layers| alike(layers, &other.layers, tolerance_m))
    }

    fn is_parallel_to(&self, other: &Self) -> bool {
        inward_axis(self.side) == inward_axis(other.side)
    }

    fn overlaps(&self, other: &Self, tolerance_m: f64) -> bool {
        let range = |reach: &Self| [reach.internal_m.min(reach.external_m), reach.internal_m.max(reach.external_m)];
        let (a, b) = (range(self), range(other));
        a[1].min(b[1]) - a[0].max(b[0]) > tolerance_m
    }
}

/// Whether two sequences of layers are the same.
fn alike(a: &[Layer], b: &[Layer], tolerance_m: f64) -> bool {
    let same =
        |(a, b): (&Layer, &Layer)| a.part == b.part && (a.thickness_m - b.thickness_m).abs() <= 2.0 * tolerance_m;
    a.len() == b.len() && a.iter().zip(b).all(same)
}

/// Whether two flanks, and no more, meet at a right angle.
pub(super) fn is_corner(flanks: &[Reach]) -> bool {
    matches!(flanks, [a, b] if !a.is_parallel_to(b))
}

/// The lengths of every flank; `None` where the geometry does not settle one.
pub(super) fn measure(flanks: &[Reach], tolerance_m: f64) -> Vec<Lengths> {
    let mut lengths = vec![Lengths::default(); flanks.len()];
    let opposite = |a: &Reach, b: &Reach| a.side == b.side.opposite();
    // a mirrored flank beside others makes a figure of its own that no rule covers
    let mirrored = flanks.iter().any(|a| a.mirror_m.is_some() && !flanks.iter().any(|b| opposite(a, b)));
    match flanks {
        [only] => {
            if let Some(mirror_m) = only.mirror_m {
                lengths[0] = with_mirror(only, mirror_m, tolerance_m);
            }
        }
        _ if mirrored => {}
        [a, b] if opposite(a, b) => set_pair(&mut lengths, [0, 1], in_line(a, b, tolerance_m)),
        [a, b] if !a.is_parallel_to(b) => set_pair(&mut lengths, [0, 1], corner(a, b)),
        [_, _, _] => {
            for third in 0..3 {
                let [i, j] = [(third + 1) % 3, (third + 2) % 3];
                let (a, b, c) = (&flanks[i], &flanks[j], &flanks[third]);
                if opposite(a, b) && a.warm_side() == c.side && b.warm_side() == c.side {
                    set_pair(&mut lengths, [i, j], in_line(a, b, tolerance_m));
                    lengths[third] = against(c, a, b, tolerance_m);
                }
            }
        }
        [_, _, _, _] if Side::ALL.into_iter().all(|side| flanks.iter().any(|flank| flank.side == side)) => {
            for i in 0..4 {
                for j in i + 1..4 {
                    if opposite(&flanks[i], &flanks[j]) {
                        set_pair(&mut lengths, [i, j], in_line(&flanks[i], &flanks[j], tolerance_m));
                    }
                }
            }
        }
        _ => {}
    }
    lengths
}

fn set_pair(lengths: &mut [Lengths], [i, j]: [usize; 2], pair: Option<[Lengths; 2]>) {
    if let Some([first, second]) = pair {
        lengths[i] = first;
        lengths[j] = second;
    }
}

/// The same length in every dimension system.
fn same(length_m: f64) -> Lengths {
    Lengths { internal_m: Some(length_m), overall_internal_m: Some(length_m), external_m: Some(length_m) }
}

/// A flank in line with its own mirror image.
fn with_mirror(flank: &Reach, mirror_m: f64, tolerance_m: f64) -> Lengths {
    let internal_m = if flank.straight_m >= mirror_m - tolerance_m { mirror_m } else { flank.straight_m };
    Lengths { internal_m: Some(internal_m), ..same(mirror_m) }
}

/// Two flanks at a right angle. Both must turn their warm side to the other, or both their cold side.
fn corner(a: &Reach, b: &Reach) -> Option<[Lengths; 2]> {
    if a.airs != b.airs || (a.warm_side() == b.side) != (b.warm_side() == a.side) {
        return None;
    }
    let run = |flank: &Reach, other: &Reach| {
        let (internal_m, external_m) = (flank.to(other.internal_m), flank.to(other.external_m));
        (internal_m > 0.0 && external_m > 0.0).then_some(Lengths { external_m: Some(external_m), ..same(internal_m) })
    };
    Some([run(a, b)?, run(b, a)?])
}

/// Two flanks in one line.
fn in_line(a: &Reach, b: &Reach, tolerance_m: f64) -> Option<[Lengths; 2]> {
    if !a.overlaps(b, tolerance_m) || a.warm_side() != b.warm_side() {
        return None;
    }
    let distance_m = a.to(b.cut_m);
    if a.runs_into(b, tolerance_m) || b.runs_into(a, tolerance_m) {
        // one element becomes the other away from where the warm surface is interrupted
        return None;
    }
    if a.straight_m >= distance_m - tolerance_m {
        // uninterrupted from cut to cut
        let one_wall = a.airs == b.airs && alike(&a.layers, &b.layers, tolerance_m);
        return one_wall.then_some([same(0.5 * distance_m), same(0.5 * distance_m)]);
    }
    if a.straight_m + b.straight_m > distance_m + tolerance_m {
        return None;
    }
    let middle_m = 0.5 * (a.straight_end() + b.straight_end());
    let run = |flank: &Reach| Lengths { internal_m: Some(flank.straight_m), ..same(flank.to(middle_m)) };
    Some([run(a), run(b)])
}

/// The third flank of a T, running up against two in line.
fn against(third: &Reach, a: &Reach, b: &Reach, tolerance_m: f64) -> Lengths {
    let to_common = |first_m: f64, second_m: f64| {
        let agree = (first_m - second_m).abs() <= tolerance_m;
        Some(third.to(first_m)).filter(|&length_m| agree && length_m > 0.0)
    };
    let internal_m = to_common(a.internal_m, b.internal_m);
    let external_m = to_common(a.external_m, b.external_m);
    Lengths { internal_m, overall_internal_m: internal_m, external_m }
}

#[cfg(test)]
mod tests {
    use super::*;

    const TOLERANCE_M: f64 = 1e-6;

    fn reach(side: Side, cut_m: f64, [internal_m, external_m]: [f64; 2], straight_m: f64) -> Reach {
        let airs = [AirId::new(0), AirId::new(1)];
        Reach {
            side,
            cut_m,
            internal_m,
            external_m,
            straight_m,
            airs,
            layers: Vec::new(),
            layers_along: Vec::new(),
            mirror_m: None,
        }
    }

    fn open(flanks: &[Reach]) -> bool {
        measure(flanks, TOLERANCE_M).iter().all(|lengths| *lengths == Lengths::default())
    }

    #[test]
    fn the_warm_side_follows_the_internal_line() {
        assert_eq!(reach(Side::Top, 1.0, [0.3, 0.0], 1.0).warm_side(), Side::Right);
        assert_eq!(reach(Side::Bottom, 1.0, [0.0, 0.3], 1.0).warm_side(), Side::Left);
        assert_eq!(reach(Side::Left, 1.0, [0.3, 0.0], 1.0).warm_side(), Side::Top);
        assert_eq!(reach(Side::Right, 1.0, [0.0, 0.3], 1.0).warm_side(), Side::Bottom);
    }

    #[test]
    fn a_corner_that_turns_one_warm_and_one_cold_side_is_none() {
        let wall = reach(Side::Top, 1.3, [0.3, 0.0], 1.0);
        let floor = |lines| reach(Side::Right, 1.3, lines, 1.0);
        assert!(!open(&[wall.clone(), floor([0.3, 0.0])]));
        assert!(open(&[wall, floor([0.0, 0.3])]));
    }

    #[test]
    fn a_corner_needs_the_same_airs_and_lines_that_meet_within_the_sheet() {
        let wall = reach(Side::Top, 1.3, [0.3, 0.0], 1.0);
        let other = Reach { airs: [AirId::new(0), AirId::new(2)], ..reach(Side::Right, 1.3, [0.3, 0.0], 1.0) };
        assert!(open(&[wall.clone(), other]));
        assert!(open(&[wall, reach(Side::Right, 1.3, [1.5, 1.2], 1.0)]));
    }

    #[test]
    fn in_line_means_overlapping_and_warm_on_the_same_side() {
        let left = reach(Side::Left, 0.0, [0.2, 0.0], 1.0);
        let right = |lines| reach(Side::Right, 3.0, lines, 1.5);
        assert!(!open(&[left.clone(), right([0.3, 0.1])]));
        assert!(open(&[left.clone(), right([0.4, 0.2])]), "side by side");
        assert!(open(&[left, right([0.0, 0.2])]), "warm above and warm below");
    }

    #[test]
    fn in_line_lengths_add_up_from_cut_to_cut() {
        let flanks = [reach(Side::Left, 0.0, [0.2, 0.0], 1.0), reach(Side::Right, 3.0, [0.2, 0.0], 1.5)];
        let lengths = measure(&flanks, TOLERANCE_M);
        let sum = |pick: fn(&Lengths) -> Option<f64>| lengths.iter().filter_map(pick).sum::<f64>();
        approx::assert_relative_eq!(sum(|lengths| lengths.internal_m), 2.5, epsilon = 1e-12);
        approx::assert_relative_eq!(sum(|lengths| lengths.overall_internal_m), 3.0, epsilon = 1e-12);
        approx::assert_relative_eq!(sum(|lengths| lengths.external_m), 3.0, epsilon = 1e-12);
    }

    #[test]
    fn an_uninterrupted_surface_between_two_pairs_of_airs_is_not_shared() {
        let left = reach(Side::Left, 0.0, [0.2, 0.0], 3.0);
        let right = reach(Side::Right, 3.0, [0.2, 0.0], 3.0);
        assert!(!open(&[left.clone(), right.clone()]));
        assert!(open(&[left, Reach { airs: [AirId::new(0), AirId::new(2)], ..right }]));
    }

    #[test]
    fn flanks_on_one_side_or_beside_a_mirrored_one_are_not_settled() {
        let top = |line: f64| reach(Side::Top, 1.3, [line + 0.3, line], 1.0);
        assert!(open(&[top(0.0), top(1.0)]));
        let mirrored = Reach { mirror_m: Some(2.0), ..top(0.0) };
        assert!(!open(std::slice::from_ref(&mirrored)));
        assert!(open(&[mirrored, reach(Side::Right, 1.3, [0.3, 0.0], 1.0)]));
        assert!(open(&[top(0.0)]));
        assert!(open(&[]));
    }
}
