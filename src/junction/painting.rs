//! Painting the regions in order: which part or air fills each field between neighbouring lines of the sheet.

use super::canvas::{BARE, Canvas};
use super::fault::Fault;
use super::lines::Lines;
use super::model::Part;
use super::outline::{self, OutlineProblem, Piece, Trail};
use super::parts::{self, Bars, PartList};
use super::remark::{Findings, Remark};
use super::sheet::{Content, Sheet};
use crate::index::{EnvironmentId, PartId};
use crate::input::{Axis, Document, Fill, Region, Shape};
use std::collections::BTreeMap;

/// The most fields a drawing may have: as many as the default limit of nodes, which a grid on more could not keep.
pub(super) const FIELD_LIMIT: usize = 2_000_000;

/// The most rows of spaced bars that may lie over one another; a slab's edge has two or three.
const BARS_DEPTH_LIMIT: usize = 8;

/// What fills a field. Unlike [`Content`] it tells what was painted void from what was never painted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Paint {
    /// Never painted.
    Nothing,
    /// Painted void.
    Void,
    /// Air.
    Air(EnvironmentId),
    /// A solid.
    Solid(PartId),
}

/// A painted drawing. Fields are counted row by row from the bottom.
#[derive(Debug)]
pub(super) struct Painting {
    /// Its lines.
    pub(super) lines: Lines,
    /// What fills each field.
    pub(super) paints: Vec<Paint>,
    /// The region that shows in each field, or [`BARE`].
    pub(super) regions: Vec<u32>,
    /// The parts in order of first appearance.
    pub(super) parts: Vec<Part>,
}

impl Painting {
    /// The sheet, without surfaces yet.
    pub(super) fn sheet(&self) -> Sheet {
        let content = |paint: &Paint| match *paint {
            Paint::Nothing | Paint::Void => Content::Outside,
            Paint::Air(environment) => Content::Air(environment),
            Paint::Solid(part) => Content::Solid(part),
        };
        Sheet::new(self.lines.x.clone(), self.lines.y.clone(), self.paints.iter().map(content).collect())
    }
}

/// The middle of a field, in metres.
fn middle(lines: &Lines, field: usize) -> [f64; 2] {
    let (column, row) = (field % lines.columns(), field / lines.columns());
    [0.5 * (lines.x[column] + lines.x[column + 1]), 0.5 * (lines.y[row] + lines.y[row + 1])]
}

/// Paints the document's regions; `None` where the drawing cannot be trusted because a region could not be painted.
/// Every fault of a region is among `findings` either way.
pub(super) fn paint(document: &Document, findings: &mut Findings) -> Option<Painting> {
    for region in &document.regions {
        check_bars(document, region, findings);
    }
    let lines = Lines::of(&document.regions);
    let (columns, rows) = (lines.columns(), lines.rows());
    if columns.saturating_mul(rows) > FIELD_LIMIT {
        let span = document.section_span;
        findings.faults.push(Fault::TooManyFields { span, columns, rows, limit: FIELD_LIMIT });
        return None;
    }
    if columns * rows == 0 {
        findings.faults.push(flat(document));
        return None;
    }
    let mut canvas = Canvas::new(columns, rows);
    let covers = covers_of_regions(document, &lines, canvas.strips_are_columns(), findings)?;
    let mut bars: BTreeMap<usize, Vec<usize>> = BTreeMap::new();
    let mut hidden = Vec::new();
    for (index, region) in document.regions.iter().enumerate().rev() {
        let mut shown = 0;
        let mut too_deep = None;
        if matches!(region.fill, Fill::SpacedBars { .. }) {
            for (strip, places) in strips(&covers[index]) {
                for field in canvas.open_fields(strip, places) {
                    let stack = bars.entry(field).or_default();
                    stack.push(index);
                    if stack.len() > BARS_DEPTH_LIMIT {
                        too_deep.get_or_insert(field);
                    }
                    shown += 1;
                }
            }
            if let Some(field) = too_deep {
                let at = middle(&lines, field);
                findings.faults.push(Fault::BarsTooDeep { span: region.span, at, limit: BARS_DEPTH_LIMIT });
                return None;
            }
        } else {
            for (strip, places) in strips(&covers[index]) {
                shown += canvas.fill(strip, places, index as u32);
            }
        }
        if shown == 0 && !is_nothing(&covers[index]) {
            let (x, y) = extents(&region.shape);
            hidden.push(Remark::RegionCovered { what: fill_name(document, &region.fill), x, y });
        }
    }
    // found from the last region to the first; told in the file's order
    findings.remarks.extend(hidden.into_iter().rev());
    Some(resolve(document, lines, canvas.into_top(), &bars, findings))
}

/// The fault of regions that together are thinner along one axis than two vertices can be apart.
fn flat(document: &Document) -> Fault {
    let bounds = document.regions.iter().map(|region| extents(&region.shape));
    let none = [f64::INFINITY, f64::NEG_INFINITY];
    let join = |a: [f64; 2], b: [f64; 2]| [a[0].min(b[0]), a[1].max(b[1])];
    let (x, y) = bounds.fold((none, none), |(x, y), (next_x, next_y)| (join(x, next_x), join(y, next_y)));
    let [size, other_size] = [x[1] - x[0], y[1] - y[0]];
    let span = document.section_span;
    if size < other_size {
        Fault::Flat { span, axis: "x", size, other_axis: "y", other_size }
    } else {
        Fault::Flat { span, axis: "y", size: other_size, other_axis: "x", other_size: size }
    }
}

/// Whether a region is thinner than the drawing resolves.
fn is_nothing(cover: &[Piece]) -> bool {
    cover.iter().all(|piece| piece.strips[0] == piece.strips[1] || piece.places[0] == piece.places[1])
}

/// The strips of a region's pieces, with the places it covers there.
fn strips(cover: &[Piece]) -> impl Iterator<Item = (usize, [usize; 2])> + '_ {
    cover.iter().flat_map(|piece| (piece.strips[0]..piece.strips[1]).map(|strip| (strip, piece.places)))
}

/// What each region covers of the canvas; `None` if an outline cannot be painted.
fn covers_of_regions(
    document: &Document,
    lines: &Lines,
    strips_are_columns: bool,
    findings: &mut Findings,
) -> Option<Vec<Vec<Piece>>> {
    let mut trail = None;
    let mut covers = Vec::with_capacity(document.regions.len());
    for region in &document.regions {
        let cover = match &region.shape {
            Shape::Box { x, y } => {
                let columns = [lines.upright(x[0]), lines.upright(x[1])];
                let rows = [lines.level(y[0]), lines.level(y[1])];
                let (strips, places) = if strips_are_columns { (columns, rows) } else { (rows, columns) };
                vec![Piece { strips, places }]
            }
            Shape::Outline(points) => {
                let trail = trail.get_or_insert_with(|| Trail::new(lines));
                match outline::pieces(points, lines, strips_are_columns, trail) {
                    Ok(pieces) => pieces,
                    Err(problem) => {
                        findings.faults.push(match problem {
                            OutlineProblem::Sloping { vertex, from, to, more } => {
                                Fault::SlopingEdge { span: points[vertex].span, from, to, more }
                            }
                            OutlineProblem::TouchesItself { vertex, at } => {
                                Fault::OutlineTouchesItself { span: points[vertex].span, at }
                            }
                        });
                        continue;
                    }
                }
            }
        };
        if is_nothing(&cover) {
            let (x, y) = extents(&region.shape);
            findings.remarks.push(Remark::RegionSwallowed {
                what: fill_name(document, &region.fill),
                at: [0.5 * (x[0] + x[1]), 0.5 * (y[0] + y[1])],
                tolerance_m: lines.tolerance_m,
            });
        }
        covers.push(cover);
    }
    (covers.len() == document.regions.len()).then_some(covers)
}

/// Refuses spaced bars that no drawing can hold.
fn check_bars(document: &Document, region: &Region, findings: &mut Findings) {
    let Some(bars) = bars_of(document, region) else { return };
    if matches!(region.shape, Shape::Outline(_)) {
        findings.faults.push(Fault::BarsWithOutline { span: region.span });
    } else if bars.fraction() > 1.0 + 1e-9 {
        let Bars { area_m2, spacing_m, height_m, .. } = bars;
        findings.faults.push(Fault::BarsTooLarge { span: region.span, area_m2, spacing_m, height_m });
    }
}

/// The region's spaced bars, if it is any.
fn bars_of<'a>(document: &'a Document, region: &Region) -> Option<Bars<'a>> {
    let Fill::SpacedBars { material, area_m2, spacing_m, along } = region.fill else { return None };
    let (x, y) = extents(&region.shape);
    let across = if along == Axis::X { y } else { x };
    let material = &document.materials[material];
    Some(Bars { material, area_m2, spacing_m, height_m: across[1] - across[0], class: region.class })
}

/// Turns shown regions into parts and airs, and blends spaced bars with what lies under them.
fn resolve(
    document: &Document,
    lines: Lines,
    mut regions: Vec<u32>,
    bars: &BTreeMap<usize, Vec<usize>>,
    findings: &mut Findings,
) -> Painting {
    let mut fields_of_region: Vec<Vec<usize>> = vec![Vec::new(); document.regions.len()];
    for (&field, stack) in bars {
        fields_of_region[stack[0]].push(field);
    }
    let mut plain_shows = vec![false; document.regions.len()];
    for (field, &region) in regions.iter().enumerate() {
        if region != BARE && !bars.contains_key(&field) {
            plain_shows[region as usize] = true;
        }
    }
    let mut list = PartList::default();
    let mut paint_of_region = vec![Paint::Nothing; document.regions.len()];
    let mut blends: BTreeMap<(&[usize], u32), Paint> = BTreeMap::new();
    let mut blended: Vec<(usize, Paint)> = Vec::new();
    for (index, region) in document.regions.iter().enumerate() {
        if plain_shows[index] {
            paint_of_region[index] = match region.fill {
                Fill::Material(material) => {
                    Paint::Solid(list.intern(parts::plain(&document.materials[material], region.class)).0)
                }
                Fill::Environment(environment) => Paint::Air(EnvironmentId::new(environment)),
                Fill::Void | Fill::SpacedBars { .. } => Paint::Void,
            };
        }
        let mut complained = false;
        for &field in &fields_of_region[index] {
            let (stack, base) = (bars[&field].as_slice(), regions[field]);
            let paint = *blends.entry((stack, base)).or_insert_with(|| {
                if !complained && !is_solid(document, base) {
                    complained = true;
                    let under = match base {
                        BARE => "on an unpainted part of the sheet".to_owned(),
                        base => match document.regions[base as usize].fill {
                            Fill::Environment(_) => {
                                format!(
                                    "in the environment `{}`",
                                    fill_name(document, &document.regions[base as usize].fill)
                                )
                            }
                            _ => "in a void".to_owned(),
                        },
                    };
                    let fault = Fault::BarsWithoutSolid { span: region.span, under, at: middle(&lines, field) };
                    findings.faults.push(fault);
                }
                let share: f64 = stack
                    .iter()
                    .filter_map(|&index| bars_of(document, &document.regions[index]))
                    .map(|bars| bars.fraction())
                    .sum();
                if !complained && stack.len() > 1 && share > 1.0 + 1e-9 {
                    complained = true;
                    let at = middle(&lines, field);
                    findings.faults.push(Fault::BarsTooLargeTogether { span: region.span, at, share });
                }
                blend(document, stack, base, &mut list, findings)
            });
            blended.push((field, paint));
        }
    }
    let mut paints: Vec<Paint> = regions
        .iter()
        .map(|&region| if region == BARE { Paint::Nothing } else { paint_of_region[region as usize] })
        .collect();
    for (field, paint) in blended {
        paints[field] = paint;
        regions[field] = bars[&field][0] as u32;
    }
    Painting { lines, paints, regions, parts: list.into_parts() }
}

fn is_solid(document: &Document, region: u32) -> bool {
    region != BARE && matches!(document.regions[region as usize].fill, Fill::Material(_))
}

/// The bars of `stack` (topmost first) composed from the bottom with the region `base`. On air or nothing the bars are
/// left away: that is complained about where it happens, and what follows from it need not be.
fn blend(document: &Document, stack: &[usize], base: u32, list: &mut PartList, findings: &mut Findings) -> Paint {
    if base == BARE {
        return Paint::Void;
    }
    let under = &document.regions[base as usize];
    let mut part = match under.fill {
        Fill::Material(material) => parts::plain(&document.materials[material], under.class),
        Fill::Environment(environment) => return Paint::Air(EnvironmentId::new(environment)),
        Fill::Void | Fill::SpacedBars { .. } => return Paint::Void,
    };
    for &index in stack.iter().rev() {
        let bars = bars_of(document, &document.regions[index]).expect("only spaced bars are stacked");
        part = bars.blended_with(&part, document.unit);
    }
    let (id, new) = list.intern(part);
    if new {
        let part = list.get(id);
        findings
            .remarks
            .push(Remark::AreaWeighted { part: part.material.clone(), conductivity_w_mk: part.conductivity_w_mk });
    }
    Paint::Solid(id)
}

/// What a region is filled with, in a word or two.
fn fill_name(document: &Document, fill: &Fill) -> String {
    match *fill {
        Fill::Material(material) => document.materials[material].name.clone(),
        Fill::SpacedBars { material, .. } => format!("spaced bars of {}", document.materials[material].name),
        Fill::Environment(environment) => document.environments[environment].name.value.clone(),
        Fill::Void => "a void".to_owned(),
    }
}

/// The bounding box of a shape, in metres.
pub(super) fn extents(shape: &Shape) -> ([f64; 2], [f64; 2]) {
    match shape {
        Shape::Box { x, y } => (*x, *y),
        Shape::Outline(points) => {
            let range = |axis: usize| {
                points.iter().fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], point| {
                    [low.min(point.value[axis]), high.max(point.value[axis])]
                })
            };
            (range(0), range(1))
        }
    }
}

#[cfg(test)]
mod tests;
