//! Whether a painted drawing is a model: solids bounded by air, airs apart, adiabatic edges only on purpose.

use super::canvas::BARE;
use super::fault::Fault;
use super::groups::groups;
use super::model::Environment;
use super::painting::{Paint, Painting};
use super::remark::{Findings, Remark};
use crate::index::{AirId, EnvironmentId};
use crate::input::{Document, Fill, Span};
use std::collections::{BTreeMap, BTreeSet};

/// The most airs that may touch the solid: each is a problem of its own to solve and to keep. Rooms, stairs, cellar and
/// outdoors at a junction come to five or six.
const AIR_LIMIT: usize = 20;

/// Checks the whole drawing. Returns whether cuts and flanks can be judged; not where fields are wrong or missing.
pub(super) fn check(
    painting: &Painting,
    document: &Document,
    environments: &[Environment],
    findings: &mut Findings,
) -> bool {
    let span = document.section_span;
    let solid = painting.paints.iter().any(|&paint| is_solid(paint));
    let air = painting.paints.iter().any(|paint| matches!(paint, Paint::Air(_)));
    if !solid {
        let covered = document.regions.iter().any(|region| matches!(region.fill, Fill::Material(_)));
        findings.faults.push(Fault::NoSolid { span, covered });
    }
    if !air {
        let covered = document.regions.iter().any(|region| matches!(region.fill, Fill::Environment(_)));
        findings.faults.push(Fault::NoAir { span, covered });
    }
    if !solid || !air {
        return false;
    }
    let before = findings.faults.len();
    check_gaps(painting, document, environments, findings);
    check_airs_apart(painting, document, environments, findings);
    let whole = findings.faults.len() == before;
    check_solids_reach_air(painting, document, findings);
    look_at_airs(painting, document, environments, findings);
    whole
}

fn is_solid(paint: Paint) -> bool {
    matches!(paint, Paint::Solid(_))
}

/// The name of the solid in a field and where its region is described.
fn solid_at(painting: &Painting, document: &Document, field: usize) -> (String, Span) {
    let name = match painting.paints[field] {
        Paint::Solid(part) => painting.parts[part.index()].material.clone(),
        _ => String::new(),
    };
    (name, region_span(painting, document, field))
}

fn region_span(painting: &Painting, document: &Document, field: usize) -> Span {
    match painting.regions[field] {
        BARE => document.section_span,
        region => document.regions[region as usize].span,
    }
}

/// The middle of the edge between two fields, in metres.
fn middle_of_edge(painting: &Painting, fields: [usize; 2]) -> [f64; 2] {
    let [low, high] = [fields[0].min(fields[1]), fields[0].max(fields[1])];
    let (x, y) = (&painting.lines.x, &painting.lines.y);
    let (column, row) = (high % painting.lines.columns(), high / painting.lines.columns());
    if high - low == 1 { [x[column], 0.5 * (y[row] + y[row + 1])] } else { [0.5 * (x[column] + x[column + 1]), y[row]] }
}

/// A solid's edge against an unpainted field: one complaint for each connected gap.
fn check_gaps(painting: &Painting, document: &Document, environments: &[Environment], findings: &mut Findings) {
    for gap in groups(painting, |paint| paint == Paint::Nothing) {
        let Some(edge) = gap.solid else { continue };
        let (solid, span) = solid_at(painting, document, edge[0]);
        let air = match gap.airs.as_slice() {
            [only] => Some(environments[only.index()].name.clone()),
            _ => None,
        };
        let at = middle_of_edge(painting, edge);
        findings.faults.push(Fault::Gap { span, solid, at, x: gap.x, y: gap.y, air });
    }
}

/// A straight stretch of line on which two airs touch: the line, its first interval and one past the last.
#[derive(Clone, Copy, PartialEq)]
struct Contact {
    upright: bool,
    line: usize,
    from: usize,
    after: usize,
}

/// The stretches on which a pair of airs touch: the first, the fields at its start, and how many more there are.
struct Touch {
    first: Contact,
    fields: [usize; 2],
    last: Contact,
    more: usize,
}

/// Two different airs that share an edge: one complaint for each pair.
fn check_airs_apart(painting: &Painting, document: &Document, environments: &[Environment], findings: &mut Findings) {
    let (columns, rows) = (painting.lines.columns(), painting.lines.rows());
    let mut touches: BTreeMap<[AirId; 2], Touch> = BTreeMap::new();
    let mut see = |fields: [usize; 2], here: Contact| {
        let [Paint::Air(a), Paint::Air(b)] = fields.map(|field| painting.paints[field]) else { return };
        let [a, b] = [a, b].map(|environment| environments[environment.index()].air);
        if a == b {
            return;
        }
        let touch = touches.entry([a.min(b), a.max(b)]).or_insert(Touch { first: here, fields, last: here, more: 0 });
        let continues = touch.last.upright == here.upright && touch.last.line == here.line;
        if continues && touch.last.after == here.from {
            touch.last.after = here.after;
            if touch.more == 0 {
                touch.first.after = here.after;
            }
        } else if touch.last != here {
            touch.last = here;
            touch.more += 1;
        }
    };
    for line in 1..columns {
        for from in 0..rows {
            let field = from * columns + line;
            see([field - 1, field], Contact { upright: true, line, from, after: from + 1 });
        }
    }
    for line in 1..rows {
        for from in 0..columns {
            let field = line * columns + from;
            see([field - columns, field], Contact { upright: false, line, from, after: from + 1 });
        }
    }
    for Touch { first, fields, more, .. } in touches.into_values() {
        let later = fields.into_iter().max_by_key(|&field| painting.regions[field]).expect("an edge has two fields");
        let names = fields.map(|field| match painting.paints[field] {
            Paint::Air(environment) => environments[environment.index()].name.clone(),
            _ => String::new(),
        });
        let (x, y) = (&painting.lines.x, &painting.lines.y);
        let (from, to) = if first.upright {
            ([x[first.line], y[first.from]], [x[first.line], y[first.after]])
        } else {
            ([x[first.from], y[first.line]], [x[first.after], y[first.line]])
        };
        let last = if first.upright { rows } else { columns };
        let at_edge = first.from == 0 || first.after == last;
        let span = region_span(painting, document, later);
        findings.faults.push(Fault::AirsTouch { span, airs: names, from, to, at_edge, more });
    }
}

/// A connected solid that no air touches. One beside a gap is left alone: the gap was complained about.
fn check_solids_reach_air(painting: &Painting, document: &Document, findings: &mut Findings) {
    for solid in groups(painting, is_solid) {
        if solid.airs.is_empty() && !solid.unpainted {
            let (name, span) = solid_at(painting, document, solid.first);
            findings.faults.push(Fault::SolidWithoutAir { span, solid: name, x: solid.x, y: solid.y });
        }
    }
}

/// Environments that appear nowhere, solids that only one air touches, and solids that too many touch.
fn look_at_airs(painting: &Painting, document: &Document, environments: &[Environment], findings: &mut Findings) {
    let environment_of = |region: &crate::input::Region| match region.fill {
        Fill::Environment(environment) => Some(environment),
        _ => None,
    };
    let drawn: BTreeSet<usize> = document.regions.iter().filter_map(environment_of).collect();
    // the air of others (`same_as`) need not be drawn itself
    let lent: BTreeSet<usize> = document.environments.iter().filter_map(|other| other.same_as).collect();
    for (index, environment) in environments.iter().enumerate() {
        if !drawn.contains(&index) && !lent.contains(&index) {
            findings.remarks.push(Remark::EnvironmentUnused { name: environment.name.clone() });
        }
    }
    let mut touching: BTreeSet<AirId> = BTreeSet::new();
    for environment in environments_at_solid(painting, environments.len()) {
        touching.insert(environments[environment.index()].air);
    }
    if touching.len() > AIR_LIMIT {
        let (span, count) = (document.section_span, touching.len());
        findings.faults.push(Fault::TooManyAirs { span, count, limit: AIR_LIMIT });
    }
    if let (1, Some(air)) = (touching.len(), touching.first()) {
        let only = environments.iter().find(|environment| environment.air == *air);
        let name = only.map(|found| found.name.clone()).unwrap_or_default();
        findings.faults.push(Fault::OneAir { span: document.section_span, name });
    }
}

/// The environments that have an edge in common with a solid.
fn environments_at_solid(painting: &Painting, count: usize) -> Vec<EnvironmentId> {
    let columns = painting.lines.columns();
    let mut touches = vec![false; count];
    let mut see = |fields: [usize; 2]| match fields.map(|field| painting.paints[field]) {
        [Paint::Air(environment), Paint::Solid(_)] | [Paint::Solid(_), Paint::Air(environment)] => {
            touches[environment.index()] = true;
        }
        _ => {}
    };
    for field in 0..painting.paints.len() {
        if field % columns > 0 {
            see([field - 1, field]);
        }
        if field >= columns {
            see([field - columns, field]);
        }
    }
    (0..count).filter(|&environment| touches[environment]).map(EnvironmentId::new).collect()
}

#[cfg(test)]
mod tests;
