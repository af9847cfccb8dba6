//! Which cut planes are flanks: those the file lists, or those the drawing makes plain.

use super::cuts::PlacedCut;
use super::fault::Fault;
use super::fault_wording::PLACES_NAMED;
use super::model::{Air, Surface};
use super::remark::{Findings, Remark};
use crate::index::AirId;
use crate::input::{Document, FlankEntry, Side};
use std::collections::{BTreeMap, BTreeSet};

/// A flank: its name, its cut plane, and the file's entry where it has one.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Chosen<'a> {
    /// Its name.
    pub(super) name: String,
    /// Index of its cut plane.
    pub(super) cut: usize,
    /// What the file says about it.
    pub(super) entry: Option<&'a FlankEntry>,
}

/// The flanks, or, where the drawing leaves it open, the cut planes among which the user must choose.
#[derive(Clone, Debug, Default, PartialEq)]
pub(super) struct Choice<'a> {
    /// The flanks.
    pub(super) flanks: Vec<Chosen<'a>>,
    /// Candidates for the proposal, where nothing was chosen.
    pub(super) open: Vec<Chosen<'a>>,
}

/// The cut planes of a drawing, for choosing among them.
pub(super) struct Choosing<'a> {
    cuts: &'a [PlacedCut],
    surfaces: &'a [Surface],
    airs: &'a [Air],
    /// All cut planes by side.
    by_side: BTreeMap<Side, Vec<usize>>,
    /// Flanks on the sheet's edge by side.
    edge_flanks: BTreeMap<Side, Vec<usize>>,
}

impl<'a> Choosing<'a> {
    /// Sorts the cut planes by side.
    pub(super) fn new(cuts: &'a [PlacedCut], surfaces: &'a [Surface], airs: &'a [Air]) -> Self {
        let mut by_side: BTreeMap<Side, Vec<usize>> = BTreeMap::new();
        let mut edge_flanks: BTreeMap<Side, Vec<usize>> = BTreeMap::new();
        for (index, placed) in cuts.iter().enumerate() {
            by_side.entry(placed.cut.side).or_default().push(index);
            if placed.cut.on_sheet_edge && placed.is_flank(surfaces) {
                edge_flanks.entry(placed.cut.side).or_default().push(index);
            }
        }
        Self { cuts, surfaces, airs, by_side, edge_flanks }
    }

    /// The flanks of the document.
    pub(super) fn choose<'d>(&self, document: &'d Document, findings: &mut Findings) -> Choice<'d> {
        match &document.flanks {
            Some(entries) => Choice { flanks: self.listed(entries, findings), open: Vec::new() },
            None => self.automatic(findings),
        }
    }

    fn is_flank(&self, cut: usize) -> bool {
        self.cuts[cut].is_flank(self.surfaces)
    }

    /// The cut planes on a side.
    fn on_side(&self, side: Side) -> &[usize] {
        self.by_side.get(&side).map_or(&[], Vec::as_slice)
    }

    /// Flanks on the sheet's edge at `side`.
    fn flanks_on_edge(&self, side: Side) -> &[usize] {
        self.edge_flanks.get(&side).map_or(&[], Vec::as_slice)
    }

    /// Every flank on the sheet's edge that is cut off there. A cut on a symmetry edge is where a flank is cut off if no
    /// flank lies across the sheet from it, or one of the same layers (a wall above and below a slab); across from other
    /// layers that are cut off freely it is the junction's own middle (a pier); and two symmetry edges across from each
    /// other bound one repeating element, plain only if they cross the same layers.
    fn automatic(&self, findings: &mut Findings) -> Choice<'static> {
        let edge_flanks: Vec<usize> =
            Side::ALL.into_iter().flat_map(|side| self.flanks_on_edge(side)).copied().collect();
        let mut plain = Vec::new();
        let mut between_planes = Vec::new();
        for &cut in &edge_flanks {
            // a whole side is one of symmetry or not
            let across = self.flanks_on_edge(self.cuts[cut].cut.side.opposite());
            match across.first() {
                _ if !self.cuts[cut].cut.symmetry => plain.push(cut),
                None => plain.push(cut),
                Some(&other) if self.cuts[other].cut.symmetry => between_planes.push(cut),
                Some(_) if self.goes_on(cut, across) => plain.push(cut),
                Some(_) => {}
            }
        }
        let first = between_planes.first().map(|&cut| self.warm_to_cold(cut));
        if between_planes.iter().all(|&cut| Some(self.warm_to_cold(cut)) == first) {
            plain.extend(between_planes);
            plain.sort_unstable();
            if plain.is_empty() && self.surfaces.iter().any(|surface| surface.air != self.surfaces[0].air) {
                findings.remarks.push(Remark::NoFlank);
            }
            return Choice { flanks: self.named_after_sides(plain), open: Vec::new() };
        }
        let sides: BTreeSet<Side> = between_planes.iter().map(|&cut| self.cuts[cut].cut.side).collect();
        let sides = sides.into_iter().map(|side| side.word().to_owned()).collect();
        findings.remarks.push(Remark::FlankUnclear { sides });
        Choice { flanks: Vec::new(), open: self.named_after_sides(edge_flanks) }
    }

    /// Whether the element of a cut goes on across the sheet with the same layers.
    fn goes_on(&self, cut: usize, across: &[usize]) -> bool {
        across.iter().any(|&other| self.warm_to_cold(other) == self.warm_to_cold(cut))
    }

    /// The layers of a cut from warm to cold as comparable numbers: part, and thickness to a micrometre.
    fn warm_to_cold(&self, cut: usize) -> Vec<(usize, i64)> {
        let placed = &self.cuts[cut];
        let [from, to] = placed.airs(self.surfaces);
        let layer = |layer: &super::model::Layer| (layer.part.index(), (layer.thickness_m * 1e6).round() as i64);
        let mut layers: Vec<(usize, i64)> = placed.cut.layers.iter().map(layer).collect();
        if super::surface_rule::warmer_first(self.airs, from, to)[0] == to {
            layers.reverse();
        }
        layers
    }

    fn named_after_sides(&self, cuts: Vec<usize>) -> Vec<Chosen<'static>> {
        let mut count: BTreeMap<Side, usize> = BTreeMap::new();
        let mut name = |side: Side| {
            let count = count.entry(side).or_insert(0);
            *count += 1;
            if *count == 1 { side.word().to_owned() } else { format!("{} {count}", side.word()) }
        };
        cuts.into_iter().map(|cut| Chosen { name: name(self.cuts[cut].cut.side), cut, entry: None }).collect()
    }

    /// The flanks that the file lists.
    fn listed<'d>(&self, entries: &'d [FlankEntry], findings: &mut Findings) -> Vec<Chosen<'d>> {
        let mut chosen: Vec<Chosen<'d>> = Vec::new();
        let mut first_named: BTreeMap<usize, &FlankEntry> = BTreeMap::new();
        let mut named_again: Vec<(usize, &FlankEntry)> = Vec::new();
        for entry in entries {
            match self.find(entry) {
                Ok(cut) if first_named.contains_key(&cut) => named_again.push((cut, entry)),
                Ok(cut) => {
                    first_named.insert(cut, entry);
                    chosen.push(Chosen { name: entry.name.value.clone(), cut, entry: Some(entry) });
                }
                Err(fault) => findings.faults.push(fault),
            }
        }
        if !named_again.is_empty() {
            let has_open = |side: &Side| self.flanks_on_edge(*side).iter().any(|cut| !first_named.contains_key(cut));
            let open: Vec<Side> = Side::ALL.into_iter().filter(has_open).collect();
            for (cut, entry) in named_again {
                let first = first_named[&cut];
                findings.faults.push(Fault::CutTwice {
                    span: entry.cut.span,
                    first: first.cut.span,
                    first_name: first.name.value.clone(),
                    at: self.cuts[cut].middle(),
                    open: open.clone(),
                });
            }
        }
        if chosen.len() == entries.len() {
            self.remark_on_left_out(&chosen, findings);
        }
        chosen
    }

    /// The cut plane that an entry means.
    fn find(&self, entry: &FlankEntry) -> Result<usize, Fault> {
        let (side, span) = (entry.cut.value, entry.cut.span);
        // as many places as are written out, and one more to show that there are more
        let places = |cuts: &mut dyn Iterator<Item = usize>| -> Vec<[f64; 2]> {
            cuts.take(PLACES_NAMED + 1).map(|cut| self.cuts[cut].middle()).collect()
        };
        let found = match (entry.near, self.flanks_on_edge(side)) {
            (Some(near), _) => {
                let distances = self.on_side(side).iter().map(|&cut| (square_distance(&self.cuts[cut], near), cut));
                distances.min_by(|a, b| a.0.total_cmp(&b.0)).map(|(_, cut)| cut)
            }
            (None, [only]) => Some(*only),
            (None, []) => self.on_side(side).iter().copied().find(|&cut| self.cuts[cut].cut.on_sheet_edge),
            (None, several) => {
                let near = places(&mut several.iter().copied());
                return Err(Fault::SeveralCuts { span, side, count: several.len(), near });
            }
        };
        let Some(cut) = found else {
            let elsewhere = Side::ALL
                .into_iter()
                .filter(|&other| other != side && !self.flanks_on_edge(other).is_empty())
                .collect();
            let on_voids = places(&mut self.on_side(side).iter().copied().filter(|&cut| self.is_flank(cut)));
            return Err(Fault::NoCut { span, side, elsewhere, on_voids });
        };
        if !self.is_flank(cut) {
            let [air, _] = self.cuts[cut].airs(self.surfaces);
            let (air, at) = (self.airs[air.index()].name.clone(), self.cuts[cut].middle());
            return Err(Fault::SameAir { span, side, air, at });
        }
        Ok(cut)
    }

    /// Cut planes between the airs of a listed flank that no flank names. The middle of a mirrored junction is none.
    fn remark_on_left_out(&self, chosen: &[Chosen], findings: &mut Findings) {
        let pair = |cut: usize| -> BTreeSet<AirId> { self.cuts[cut].airs(self.surfaces).into_iter().collect() };
        let pairs: BTreeSet<BTreeSet<AirId>> = chosen.iter().map(|flank| pair(flank.cut)).collect();
        let named: BTreeSet<usize> = chosen.iter().map(|flank| flank.cut).collect();
        for side in Side::ALL {
            for &cut in self.flanks_on_edge(side) {
                let across = self.flanks_on_edge(side.opposite());
                let middle = self.cuts[cut].cut.symmetry && !across.is_empty() && !self.goes_on(cut, across);
                if named.contains(&cut) || middle || !pairs.contains(&pair(cut)) {
                    continue;
                }
                let [a, b] = self.cuts[cut].airs(self.surfaces);
                let airs = super::surface_rule::warmer_first(self.airs, a, b);
                findings.remarks.push(Remark::FlankLeftOut {
                    cut: side.word().to_owned(),
                    airs: airs.map(|air| self.airs[air.index()].name.clone()),
                    at: self.cuts[cut].middle(),
                });
            }
        }
    }
}

/// Square of the distance from a point to a cut, in m².
fn square_distance(cut: &PlacedCut, point: [f64; 2]) -> f64 {
    let along = |axis: usize| point[axis] - point[axis].clamp(cut.cut.from[axis], cut.cut.to[axis]);
    along(0) * along(0) + along(1) * along(1)
}

#[cfg(test)]
mod tests;
