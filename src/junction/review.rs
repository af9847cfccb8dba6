//! What a reviewer would ask about a drawing: cut planes too near, and plates that were probably meant as bars.

use super::flanks::Drawing;
use super::model::Flank;
use super::painting::{Paint, Painting};
use super::remark::{Findings, Remark};
use crate::input::{Document, Fill, Region, Shape};

/// ISO 10211: a cut plane lies at least this far from the central element, in metres ...
const CUT_DISTANCE_M: f64 = 1.0;
/// ... and at least this many thicknesses of the flanking element.
const CUT_DISTANCE_THICKNESSES: f64 = 3.0;

/// A plate is thinner than this, in metres ...
const PLATE_THICKNESS_M: f64 = 0.03;
/// ... and conducts more than this, in W/(m·K): metals, and no building material else.
const PLATE_CONDUCTIVITY: f64 = 10.0;
/// Insulation conducts less than this, in W/(m·K).
const INSULATION_CONDUCTIVITY: f64 = 0.06;
/// What a bar is anchored in conducts at least this, in W/(m·K): masonry, concrete, metal.
const ANCHOR_CONDUCTIVITY: f64 = 0.3;

/// Sheets smaller or larger than this, in metres, make one ask whether the unit is right: a junction with its flanks
/// measures some metres, ground some tens.
const USUAL_SIZE_M: std::ops::RangeInclusive<f64> = 0.02..=200.0;

/// Asks about the unit where the sheet's longer side is out of the ordinary.
pub(super) fn remark_on_size(drawing: &Drawing, findings: &mut Findings) {
    let size_m = drawing.sheet.size_m();
    if !USUAL_SIZE_M.contains(&size_m) {
        findings.remarks.push(Remark::UnusualSize { size_m });
    }
}

/// Cut planes nearer to where their layers change than ISO 10211 asks. Symmetry planes may lie anywhere; cut planes on
/// voids count where they are flanks.
pub(super) fn remark_on_near_cuts(drawing: &Drawing, flanks: &[Flank], findings: &mut Findings) {
    for (index, placed) in drawing.cuts.iter().enumerate() {
        let counts = placed.cut.on_sheet_edge || flanks.iter().any(|flank| flank.cut == index);
        let asked_m = CUT_DISTANCE_M.max(CUT_DISTANCE_THICKNESSES * placed.thickness_m());
        let Some(distance_m) = placed.cut.undisturbed_m else { continue };
        if counts && !placed.cut.symmetry && distance_m < asked_m - drawing.tolerance_m {
            let (cut, at) = (placed.cut.side.word().to_owned(), placed.middle());
            findings.remarks.push(Remark::CutTooNear { cut, at, distance_m, asked_m });
        }
    }
}

/// What lies beside a stretch of plate.
#[derive(Clone, Copy, PartialEq)]
enum Beside {
    Insulation,
    Anchor,
    Other,
}

/// Thin plates of metal that cross insulation from one good conductor to another. A section cannot tell a plate that runs
/// on along the junction (a web, a flashing) from a row of bars, so this is put as a question. Boxes only; the fields
/// beside a plate are looked at along it, and those beyond its two ends.
pub(super) fn remark_on_plates(painting: &Painting, document: &Document, findings: &mut Findings) {
    for (index, region) in document.regions.iter().enumerate() {
        let (Fill::Material(material), Shape::Box { x, y }) = (&region.fill, &region.shape) else { continue };
        let material = &document.materials[*material];
        let thickness_m = (x[1] - x[0]).min(y[1] - y[0]);
        if material.conductivity_w_mk <= PLATE_CONDUCTIVITY || thickness_m >= PLATE_THICKNESS_M {
            continue;
        }
        let plate = Plate::new(painting, index, region, [*x, *y]);
        if let Some([first, last]) = plate.bridge() {
            findings.remarks.push(Remark::PlateBridges {
                plate: material.name.clone(),
                thickness_m,
                insulation: plate.insulation_at(first),
                from: plate.on_axis(first),
                to: plate.on_axis(last + 1),
            });
        }
    }
}

/// A thin box, followed along its longer side.
struct Plate<'a> {
    painting: &'a Painting,
    region: u32,
    along_x: bool,
    along: [usize; 2],
    across: [usize; 2],
    middle_m: f64,
}

impl<'a> Plate<'a> {
    fn new(painting: &'a Painting, index: usize, region: &Region, [x, y]: [[f64; 2]; 2]) -> Self {
        debug_assert!(matches!(region.shape, Shape::Box { .. }), "plates are boxes");
        let along_x = x[1] - x[0] >= y[1] - y[0];
        let columns = x.map(|at| painting.lines.upright(at));
        let rows = y.map(|at| painting.lines.level(at));
        let (along, across) = if along_x { (columns, rows) } else { (rows, columns) };
        let middle_m = if along_x { 0.5 * (y[0] + y[1]) } else { 0.5 * (x[0] + x[1]) };
        Self { painting, region: index as u32, along_x, along, across, middle_m }
    }

    /// The field at a place along and across the plate; `None` outside the sheet.
    fn field(&self, along: Option<usize>, across: Option<usize>) -> Option<usize> {
        let (columns, rows) = (self.painting.lines.columns(), self.painting.lines.rows());
        let (column, row) = if self.along_x { (along?, across?) } else { (across?, along?) };
        (column < columns && row < rows).then(|| row * columns + column)
    }

    /// Conductivity of the solid in a field, `Some(None)` for anything else, `None` outside the sheet and in voids.
    fn solid(&self, field: Option<usize>) -> Option<Option<f64>> {
        match self.painting.paints[field?] {
            Paint::Solid(part) => Some(Some(self.painting.parts[part.index()].conductivity_w_mk)),
            Paint::Air(_) => Some(None),
            Paint::Void | Paint::Nothing => None,
        }
    }

    fn sides(&self, along: usize) -> [Option<usize>; 2] {
        [self.field(Some(along), self.across[0].checked_sub(1)), self.field(Some(along), Some(self.across[1]))]
    }

    /// What lies beside the plate at a place along it.
    fn beside(&self, along: usize) -> Beside {
        let sides: Vec<Option<f64>> = self.sides(along).into_iter().filter_map(|field| self.solid(field)).collect();
        let insulates = |side: &Option<f64>| side.is_some_and(|conductivity| conductivity < INSULATION_CONDUCTIVITY);
        let anchors = |side: &Option<f64>| side.is_some_and(|conductivity| conductivity >= ANCHOR_CONDUCTIVITY);
        let own = self.field(Some(along), Some(self.across[0]));
        let shows = own.is_some_and(|field| self.painting.regions[field] == self.region);
        if sides.iter().any(anchors) {
            Beside::Anchor
        } else if shows && !sides.is_empty() && sides.iter().all(insulates) {
            Beside::Insulation
        } else {
            Beside::Other
        }
    }

    /// Whether a good conductor lies beyond an end of the plate.
    fn beyond(&self, along: Option<usize>) -> Beside {
        let anchored = (self.across[0]..self.across[1]).any(|across| {
            let conductivity = self.solid(self.field(along, Some(across))).flatten();
            conductivity.is_some_and(|conductivity| conductivity >= ANCHOR_CONDUCTIVITY)
        });
        if anchored { Beside::Anchor } else { Beside::Other }
    }

    /// First and last place of the first stretch in insulation between two anchors.
    fn bridge(&self) -> Option<[usize; 2]> {
        let mut last = self.beyond(self.along[0].checked_sub(1));
        let mut start = None;
        for along in self.along[0]..self.along[1] {
            let here = self.beside(along);
            if here == Beside::Insulation && last == Beside::Anchor {
                start = Some(along);
            } else if here == Beside::Anchor && start.is_some() {
                return start.map(|start| [start, along - 1]);
            } else if here == Beside::Other {
                start = None;
            }
            last = here;
        }
        (self.beyond(Some(self.along[1])) == Beside::Anchor)
            .then_some(start)
            .flatten()
            .map(|start| [start, self.along[1] - 1])
    }

    /// Name of the insulation beside the plate.
    fn insulation_at(&self, along: usize) -> String {
        let part = self.sides(along).into_iter().flatten().find_map(|field| match self.painting.paints[field] {
            Paint::Solid(part) => Some(self.painting.parts[part.index()].material.clone()),
            _ => None,
        });
        part.unwrap_or_default()
    }

    /// A point on the plate's axis at a line across it, in metres.
    fn on_axis(&self, line: usize) -> [f64; 2] {
        let lines = &self.painting.lines;
        if self.along_x { [lines.x[line], self.middle_m] } else { [self.middle_m, lines.y[line]] }
    }
}

#[cfg(test)]
mod tests;
