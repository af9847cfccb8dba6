//! The flanks' thermal transmittances and lengths.

use super::cuts::PlacedCut;
use super::flank_choice::Chosen;
use super::measure::{self, Reach};
use super::model::{Air, Cut, Flank, Layer, Lengths, Part, Surface};
use super::remark::{Findings, Remark};
use super::sheet::{Content, Sheet};
use super::surface_rule::warmer_first;
use super::view::View;
use crate::input::Side;

/// A given length may differ from the measured one by this much before it is worth a remark.
const LENGTH_DIFFERENCE_M: f64 = 0.0005;
/// A given U may differ from that of the layers by this fraction before it is worth a remark.
const U_DIFFERENCE: f64 = 0.05;

/// A flank's length may run on beyond the end of its layers by its thickness, or by this much (a lintel, a bearing, an edge
/// strip), before it is worth a remark.
const BEYOND_LAYERS_M: f64 = 0.25;

/// The checked drawing that flanks are taken from.
pub(super) struct Drawing<'a> {
    /// The sheet, with its surfaces.
    pub(super) sheet: &'a Sheet,
    /// All airs.
    pub(super) airs: &'a [Air],
    /// All parts.
    pub(super) parts: &'a [Part],
    /// All surfaces.
    pub(super) surfaces: &'a [Surface],
    /// All cut planes.
    pub(super) cuts: &'a [PlacedCut],
    /// Symmetry edges.
    pub(super) symmetry: &'a [Side],
    /// Distance below which two coordinates are one.
    pub(super) tolerance_m: f64,
}

impl Drawing<'_> {
    /// What measuring needs to know of the flank cut at `cut`.
    pub(super) fn reach(&self, cut: usize) -> Reach {
        let placed = &self.cuts[cut];
        let view = View::new(self.sheet, placed.cut.side);
        let [from, to] = placed.airs(self.surfaces);
        let airs = warmer_first(self.airs, from, to);
        let [first, after] = placed.positions;
        let (warm_line, cold_line) = if airs[0] == from { (first, after) } else { (after, first) };
        let cut_m = view.depth_at(placed.depth_line);
        Reach {
            side: placed.cut.side,
            cut_m,
            internal_m: view.position_at(warm_line),
            external_m: view.position_at(cold_line),
            straight_m: self.straight(placed, warm_line),
            layers: self.warm_to_cold(placed, airs[0] == from),
            layers_along: self.layers_along(placed, warm_line, airs[0] == from),
            airs,
            mirror_m: self.mirror(view, placed.cut.side).map(|plane_m| (plane_m - cut_m).abs()),
        }
    }

    fn warm_to_cold(&self, placed: &PlacedCut, warm_first: bool) -> Vec<Layer> {
        let mut layers = placed.cut.layers.clone();
        if !warm_first {
            layers.reverse();
        }
        layers
    }

    /// The sequences of layers behind the straight warm surface after the cut's own, from warm to cold, each once.
    fn layers_along(&self, placed: &PlacedCut, warm_line: usize, rising: bool) -> Vec<Vec<Layer>> {
        let view = View::new(self.sheet, placed.cut.side);
        let mut found: Vec<Vec<Layer>> = Vec::new();
        for depth in placed.depth_line + 1..self.straight_end(placed, warm_line) {
            let upwards = warm_line..view.positions();
            let positions: Vec<usize> = if rising { upwards.collect() } else { (0..warm_line).rev().collect() };
            let mut layers: Vec<Layer> = Vec::new();
            for position in positions {
                let Content::Solid(part) = view.content(position, depth) else { break };
                let thickness_m = view.position_at(position + 1) - view.position_at(position);
                match layers.last_mut() {
                    Some(last) if last.part == part => last.thickness_m += thickness_m,
                    _ => layers.push(Layer { part, thickness_m }),
                }
            }
            if found.last() != Some(&layers) {
                found.push(layers);
            }
        }
        found
    }

    /// Length of the straight surface from the cut on.
    fn straight(&self, placed: &PlacedCut, line: usize) -> f64 {
        let view = View::new(self.sheet, placed.cut.side);
        (view.depth_at(self.straight_end(placed, line)) - view.depth_at(placed.depth_line)).abs()
    }

    /// The depth at which the straight surface ends: the same line, the same air and class, on the same side of the solid.
    fn straight_end(&self, placed: &PlacedCut, line: usize) -> usize {
        let view = View::new(self.sheet, placed.cut.side);
        let surface = |depth: usize| view.side_surface(line, depth).map(|surface| &self.surfaces[surface.index()]);
        let start = surface(placed.depth_line);
        let goes_on = |depth: &usize| {
            surface(*depth).zip(start).is_some_and(|(here, start)| {
                here.air == start.air && here.faces == start.faces && here.class == start.class
            })
        };
        (placed.depth_line..view.depths()).take_while(goes_on).last().map_or(placed.depth_line, |last| last + 1)
    }

    /// The coordinate of the symmetry edge across from `side`, where solid lies on one.
    fn mirror(&self, view: View, side: Side) -> Option<f64> {
        let last = view.depths() - 1;
        let solid = (0..view.positions()).any(|position| matches!(view.content(position, last), Content::Solid(_)));
        (solid && self.symmetry.contains(&side.opposite())).then(|| view.depth_at(last + 1))
    }

    /// The flanks as chosen, with U and lengths; what a reviewer would ask about them goes to `findings`.
    pub(super) fn flanks(&self, chosen: &[Chosen], findings: &mut Findings) -> Vec<Flank> {
        let reaches: Vec<Reach> = chosen.iter().map(|flank| self.reach(flank.cut)).collect();
        let measured = measure::measure(&reaches, self.tolerance_m);
        let corner = measure::is_corner(&reaches);
        let mut flanks = Vec::new();
        for (chosen, measured) in chosen.iter().zip(measured) {
            let flank = self.flank(chosen, measured, corner);
            remark(&flank, chosen, &self.cuts[flank.cut].cut, findings);
            flanks.push(flank);
        }
        flanks
    }

    fn flank(&self, chosen: &Chosen, measured: Lengths, corner: bool) -> Flank {
        let placed = &self.cuts[chosen.cut];
        let [from, to] = placed.airs(self.surfaces);
        let [warm, cold] = warmer_first(self.airs, from, to);
        let ends = [placed.cut.surface_from, placed.cut.surface_to].map(|end| self.surfaces[end.index()].resistance);
        let layers = self.warm_to_cold(placed, warm == from);
        let [warm_resistance, cold_resistance] = if warm == from { ends } else { [ends[1], ends[0]] };
        let resistance: f64 =
            layers.iter().map(|layer| layer.thickness_m / self.parts[layer.part.index()].conductivity_w_mk).sum();
        let u_layers_w_m2k = 1.0 / (warm_resistance + resistance + cold_resistance);
        Flank {
            name: chosen.name.clone(),
            cut: chosen.cut,
            warm,
            cold,
            warm_resistance,
            cold_resistance,
            layers,
            u_layers_w_m2k,
            u_w_m2k: chosen.entry.and_then(|entry| entry.u_w_m2k).unwrap_or(u_layers_w_m2k),
            lengths: lengths(chosen, measured, corner),
            measured,
        }
    }
}

/// The file's own lengths where it gives them, else the measured ones. In a corner overall internal equals internal.
fn lengths(chosen: &Chosen, measured: Lengths, corner: bool) -> Lengths {
    let Some(entry) = chosen.entry else { return measured };
    let internal_m = entry.internal_m.map(|given| given.value).or(measured.internal_m);
    Lengths {
        internal_m,
        overall_internal_m: entry.overall_internal_m.map(|given| given.value).or(if corner {
            internal_m
        } else {
            measured.overall_internal_m
        }),
        external_m: entry.external_m.map(|given| given.value).or(measured.external_m),
    }
}

/// The three dimension systems in words, with the lengths they stand for.
pub(super) fn systems(lengths: &Lengths) -> [(&'static str, Option<f64>); 3] {
    [
        ("internal", lengths.internal_m),
        ("overall internal", lengths.overall_internal_m),
        ("external", lengths.external_m),
    ]
}

fn remark(flank: &Flank, chosen: &Chosen, cut: &Cut, findings: &mut Findings) {
    let thickness_m: f64 = flank.layers.iter().map(|layer| layer.thickness_m).sum();
    // at a re-entrant corner the internal, elsewhere the external length runs through the other element
    let shorter_m =
        flank.lengths.internal_m.map(|internal_m| internal_m.min(flank.lengths.external_m.unwrap_or(internal_m)));
    if let (Some(length_m), Some(end_m)) = (shorter_m, cut.undisturbed_m)
        && length_m - end_m > thickness_m.max(BEYOND_LAYERS_M)
    {
        findings.remarks.push(Remark::LayersEnd { flank: flank.name.clone(), end_m, length_m });
    }
    let (given, layers) = (flank.u_w_m2k, flank.u_layers_w_m2k);
    if (given - layers).abs() > U_DIFFERENCE * layers {
        findings.remarks.push(Remark::UDiffers { flank: flank.name.clone(), given, layers });
    }
    if let Some(entry) = chosen.entry {
        let given = [entry.internal_m, entry.overall_internal_m, entry.external_m];
        for (given, (system, measured_m)) in given.into_iter().zip(systems(&flank.measured)) {
            if let (Some(given), Some(measured_m)) = (given, measured_m)
                && (given.value - measured_m).abs() > LENGTH_DIFFERENCE_M
            {
                let (flank, given_m) = (flank.name.clone(), given.value);
                findings.remarks.push(Remark::LengthDiffers { flank, system, given_m, measured_m });
            }
        }
    }
    let open: Vec<&'static str> =
        systems(&flank.lengths).into_iter().filter(|(_, length)| length.is_none()).map(|(system, _)| system).collect();
    if !open.is_empty() {
        findings.remarks.push(Remark::LengthsUnsettled { flank: flank.name.clone(), systems: open });
    }
}

#[cfg(test)]
mod tests;
