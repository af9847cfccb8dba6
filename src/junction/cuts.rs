//! Cut planes: straight adiabatic runs through solid, on the sheet's edge or against a void, from air to air.

use super::model::{Cut, Layer, Surface};
use super::sheet::{Content, Sheet};
use super::view::View;
use crate::index::{AirId, SurfaceId};
use crate::input::Side;

/// A cut plane and where it lies in the view from its side.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct PlacedCut {
    /// The cut.
    pub(super) cut: Cut,
    /// First position of its fields, and one past the last.
    pub(super) positions: [usize; 2],
    /// Its depth line.
    pub(super) depth_line: usize,
}

impl PlacedCut {
    /// The airs at its two ends.
    pub(super) fn airs(&self, surfaces: &[Surface]) -> [AirId; 2] {
        [self.cut.surface_from, self.cut.surface_to].map(|surface| surfaces[surface.index()].air)
    }

    /// Whether it separates two airs.
    pub(super) fn is_flank(&self, surfaces: &[Surface]) -> bool {
        let [from, to] = self.airs(surfaces);
        from != to
    }

    /// Its middle, in metres.
    pub(super) fn middle(&self) -> [f64; 2] {
        [0.5 * (self.cut.from[0] + self.cut.to[0]), 0.5 * (self.cut.from[1] + self.cut.to[1])]
    }

    /// Thickness of the element that is cut, in metres.
    pub(super) fn thickness_m(&self) -> f64 {
        self.cut.layers.iter().map(|layer| layer.thickness_m).sum()
    }
}

/// All cut planes: left, right, top, bottom; from the side inwards; along rising coordinates.
pub(super) fn find(sheet: &Sheet, symmetry: &[Side]) -> Vec<PlacedCut> {
    let mut cuts = Vec::new();
    for side in Side::ALL {
        let view = View::new(sheet, side);
        for depth_line in 0..view.depths() {
            for positions in adiabatic_runs(view, depth_line) {
                cuts.extend(cut(view, side, positions, depth_line, symmetry));
            }
        }
    }
    cuts
}

/// The maximal runs of solid fields at a depth line that have nothing before them.
fn adiabatic_runs(view: View, depth_line: usize) -> Vec<[usize; 2]> {
    let mut runs: Vec<[usize; 2]> = Vec::new();
    for position in 0..view.positions() {
        let adiabatic = matches!(view.content(position, depth_line), Content::Solid(_))
            && view.before(position, depth_line) == Content::Outside;
        if !adiabatic {
            continue;
        }
        match runs.last_mut() {
            Some(run) if run[1] == position => run[1] = position + 1,
            _ => runs.push([position, position + 1]),
        }
    }
    runs
}

/// The cut on a run, if air bounds it at both ends.
fn cut(view: View, side: Side, positions: [usize; 2], depth_line: usize, symmetry: &[Side]) -> Option<PlacedCut> {
    let [first, after] = positions;
    let ends_in_air = first > 0
        && after < view.positions()
        && matches!(view.content(first - 1, depth_line), Content::Air(_))
        && matches!(view.content(after, depth_line), Content::Air(_));
    if !ends_in_air {
        return None;
    }
    let end_surface = |line: usize| -> SurfaceId {
        view.side_surface(line, depth_line).expect("an edge between solid and air carries a surface")
    };
    let on_sheet_edge = depth_line == 0;
    let cut = Cut {
        side,
        from: view.point(first, depth_line),
        to: view.point(after, depth_line),
        surface_from: end_surface(first),
        surface_to: end_surface(after),
        layers: layers(view, positions, depth_line),
        on_sheet_edge,
        symmetry: on_sheet_edge && symmetry.contains(&side),
        undisturbed_m: undisturbed(view, positions, depth_line),
    };
    Some(PlacedCut { cut, positions, depth_line })
}

/// The layers that the run crosses, neighbouring fields of one part merged.
fn layers(view: View, [first, after]: [usize; 2], depth: usize) -> Vec<Layer> {
    let mut layers: Vec<Layer> = Vec::new();
    let mut start = first;
    for position in first..after {
        let here = view.content(position, depth);
        if position + 1 < after && view.content(position + 1, depth) == here {
            continue;
        }
        if let Content::Solid(part) = here {
            layers.push(Layer { part, thickness_m: view.position_at(position + 1) - view.position_at(start) });
        }
        start = position + 1;
    }
    layers
}

/// Distance inwards to the first place where the sequence of fields, with the air beyond both ends, is another.
fn undisturbed(view: View, [first, after]: [usize; 2], depth_line: usize) -> Option<f64> {
    let changed = |depth: usize| {
        (first - 1..=after).any(|position| view.content(position, depth) != view.content(position, depth_line))
    };
    let depth = (depth_line + 1..view.depths()).find(|&depth| changed(depth))?;
    Some((view.depth_at(depth) - view.depth_at(depth_line)).abs())
}

#[cfg(test)]
mod tests {
    use crate::input::Side;
    use crate::junction::Cut;
    use crate::junction::test_draft::Draft;

    fn cuts(draft: &Draft) -> Vec<Cut> {
        draft.built().cuts
    }

    fn wall() -> Draft {
        Draft::plan()
            .paint("outdoors", [-500.0, 0.0], [0.0, 3000.0])
            .paint("flat", [250.0, 750.0], [0.0, 3000.0])
            .paint("block", [0.0, 250.0], [0.0, 3000.0])
    }

    #[test]
    fn neighbouring_fields_of_one_part_are_one_layer() {
        // the beam's edges put lines through the wall
        let cuts = cuts(&wall().paint("concrete", [100.0, 150.0], [1250.0, 1500.0]));
        assert_eq!(cuts.iter().map(|cut| cut.side).collect::<Vec<_>>(), [Side::Top, Side::Bottom]);
        assert!(cuts.iter().all(|cut| cut.layers.len() == 1 && cut.layers[0].thickness_m == 0.25));
        assert_eq!(cuts.iter().map(|cut| cut.undisturbed_m).collect::<Vec<_>>(), [Some(1.5), Some(1.25)]);
    }

    #[test]
    fn a_wall_without_change_is_never_disturbed() {
        assert!(cuts(&wall()).iter().all(|cut| cut.undisturbed_m.is_none() && cut.on_sheet_edge && !cut.symmetry));
    }

    #[test]
    fn only_the_symmetry_edges_cuts_lie_on_it() {
        let cuts = cuts(&wall().symmetry(Side::Top));
        assert_eq!(cuts.iter().map(|cut| cut.symmetry).collect::<Vec<_>>(), [true, false]);
    }

    #[test]
    fn a_run_that_ends_at_the_sheets_corner_or_at_a_void_is_no_cut() {
        let corner = Draft::plan()
            .paint("outdoors", [0.0, 1000.0], [500.0, 1000.0])
            .paint("block", [0.0, 1000.0], [0.0, 500.0])
            .paint("flat", [400.0, 600.0], [100.0, 300.0]);
        assert!(cuts(&corner).is_empty());
        let void = wall().paint("void", [250.0, 750.0], [2000.0, 3000.0]);
        assert_eq!(cuts(&void).iter().map(|cut| cut.side).collect::<Vec<_>>(), [Side::Bottom]);
    }

    #[test]
    fn the_ends_name_the_surfaces_they_meet() {
        let junction = wall().built();
        let cut = &junction.cuts[0];
        let faces = [cut.surface_from, cut.surface_to].map(|surface| junction.surfaces[surface.index()].faces);
        assert_eq!(faces, [Side::Left, Side::Right]);
    }
}
