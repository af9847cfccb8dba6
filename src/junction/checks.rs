//! Whether a painted drawing is a model: solids bounded by air, airs apart, adiabatic edges only on purpose.

use super::canvas::BARE;
use super::fault::Fault;
use super::lines::line_at;
use super::model::{Environment, Probe};
use super::painting::{Paint, Painting};
use super::remark::{Findings, Remark};
use crate::index::AirId;
use crate::input::{Document, Span};
use std::collections::{BTreeMap, BTreeSet};

/// An edge between two fields: the fields, and its ends in metres.
struct Edge {
    fields: [usize; 2],
    from: [f64; 2],
    to: [f64; 2],
}

/// Checks the whole drawing. Returns whether cuts and flanks can be judged; not where fields are wrong or missing.
pub(super) fn check(
    painting: &Painting,
    document: &Document,
    environments: &[Environment],
    findings: &mut Findings,
) -> bool {
    let section = document.section_span;
    let solid = painting.paints.iter().any(|paint| matches!(paint, Paint::Solid(_)));
    let air = painting.paints.iter().any(|paint| matches!(paint, Paint::Air(_)));
    if !solid {
        findings.faults.push(Fault::NoSolid { section });
    }
    if !air {
        findings.faults.push(Fault::NoAir { section });
    }
    if !solid || !air {
        return false;
    }
    let before = findings.faults.len();
    check_gaps(painting, document, findings);
    check_airs_apart(painting, document, environments, findings);
    let whole = findings.faults.len() == before;
    check_solids_reach_air(painting, document, findings);
    remark_on_airs(painting, document, environments, findings);
    whole
}

/// Every edge between two fields, upright ones first.
fn inner_edges(painting: &Painting) -> impl Iterator<Item = Edge> {
    let (x, y) = (&painting.lines.x, &painting.lines.y);
    let (columns, rows) = (painting.lines.columns(), painting.lines.rows());
    let upright = (0..rows).flat_map(move |row| {
        (1..columns).map(move |column| {
            let field = row * columns + column;
            Edge { fields: [field - 1, field], from: [x[column], y[row]], to: [x[column], y[row + 1]] }
        })
    });
    let level = (1..rows).flat_map(move |row| {
        (0..columns).map(move |column| {
            let field = row * columns + column;
            Edge { fields: [field - columns, field], from: [x[column], y[row]], to: [x[column + 1], y[row]] }
        })
    });
    upright.chain(level)
}

impl Edge {
    fn middle(&self) -> [f64; 2] {
        [0.5 * (self.from[0] + self.to[0]), 0.5 * (self.from[1] + self.to[1])]
    }

    /// The two fields, the one that satisfies `first` first; `None` unless the other satisfies `second`.
    fn sorted(
        &self,
        paints: &[Paint],
        first: impl Fn(Paint) -> bool,
        second: impl Fn(Paint) -> bool,
    ) -> Option<[usize; 2]> {
        let [a, b] = self.fields;
        if first(paints[a]) && second(paints[b]) {
            Some([a, b])
        } else if first(paints[b]) && second(paints[a]) {
            Some([b, a])
        } else {
            None
        }
    }
}

fn is_solid(paint: Paint) -> bool {
    matches!(paint, Paint::Solid(_))
}

/// Numbers the connected groups of fields that are `members`; `None` elsewhere.
fn groups(painting: &Painting, members: impl Fn(Paint) -> bool) -> Vec<Option<usize>> {
    let (columns, rows) = (painting.lines.columns(), painting.lines.rows());
    let mut group: Vec<Option<usize>> = vec![None; painting.paints.len()];
    let mut count = 0;
    let mut waiting = Vec::new();
    for start in 0..painting.paints.len() {
        if group[start].is_some() || !members(painting.paints[start]) {
            continue;
        }
        group[start] = Some(count);
        waiting.push(start);
        while let Some(field) = waiting.pop() {
            let (column, row) = (field % columns, field / columns);
            let neighbours = [
                (column > 0).then(|| field - 1),
                (column + 1 < columns).then(|| field + 1),
                (row > 0).then(|| field - columns),
                (row + 1 < rows).then(|| field + columns),
            ];
            for neighbour in neighbours.into_iter().flatten() {
                if group[neighbour].is_none() && members(painting.paints[neighbour]) {
                    group[neighbour] = Some(count);
                    waiting.push(neighbour);
                }
            }
        }
        count += 1;
    }
    group
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

/// A solid's edge against an unpainted field: one complaint for each connected gap.
fn check_gaps(painting: &Painting, document: &Document, findings: &mut Findings) {
    let gap = groups(painting, |paint| paint == Paint::Nothing);
    let mut contact: BTreeMap<usize, (usize, [f64; 2])> = BTreeMap::new();
    for edge in inner_edges(painting) {
        if let Some([empty, solid]) = edge.sorted(&painting.paints, |paint| paint == Paint::Nothing, is_solid)
            && let Some(number) = gap[empty]
        {
            contact.entry(number).or_insert((solid, edge.middle()));
        }
    }
    if contact.is_empty() {
        return;
    }
    let mut extents: BTreeMap<usize, ([f64; 2], [f64; 2])> = BTreeMap::new();
    let columns = painting.lines.columns();
    for (field, number) in gap.iter().enumerate() {
        let Some(number) = number else { continue };
        let (column, row) = (field % columns, field / columns);
        let none = ([f64::INFINITY, f64::NEG_INFINITY], [f64::INFINITY, f64::NEG_INFINITY]);
        let (x, y) = extents.entry(*number).or_insert(none);
        *x = [x[0].min(painting.lines.x[column]), x[1].max(painting.lines.x[column + 1])];
        *y = [y[0].min(painting.lines.y[row]), y[1].max(painting.lines.y[row + 1])];
    }
    for (number, (field, at)) in contact {
        let (solid, span) = solid_at(painting, document, field);
        let (x, y) = extents[&number];
        findings.faults.push(Fault::Gap { span, solid, at, x, y });
    }
}

/// Two different airs that share an edge: one complaint for each pair.
fn check_airs_apart(painting: &Painting, document: &Document, environments: &[Environment], findings: &mut Findings) {
    let mut told: BTreeSet<(AirId, AirId)> = BTreeSet::new();
    for edge in inner_edges(painting) {
        let [Paint::Air(a), Paint::Air(b)] = edge.fields.map(|field| painting.paints[field]) else { continue };
        let airs = [environments[a.index()].air, environments[b.index()].air];
        if airs[0] == airs[1] || !told.insert((airs[0].min(airs[1]), airs[0].max(airs[1]))) {
            continue;
        }
        let later =
            edge.fields.into_iter().max_by_key(|&field| painting.regions[field]).expect("an edge has two fields");
        findings.faults.push(Fault::AirsTouch {
            span: region_span(painting, document, later),
            airs: [a, b].map(|environment| environments[environment.index()].name.clone()),
            from: edge.from,
            to: edge.to,
        });
    }
}

/// A connected solid that no air touches. One beside a gap is left alone: the gap was complained about.
fn check_solids_reach_air(painting: &Painting, document: &Document, findings: &mut Findings) {
    let solid = groups(painting, is_solid);
    let mut settled: BTreeSet<usize> = BTreeSet::new();
    for edge in inner_edges(painting) {
        let touches = |paint: Paint| matches!(paint, Paint::Air(_) | Paint::Nothing);
        if let Some([field, _]) = edge.sorted(&painting.paints, is_solid, touches) {
            settled.extend(solid[field]);
        }
    }
    for (field, number) in solid.iter().enumerate() {
        let Some(number) = *number else { continue };
        if settled.insert(number) {
            let (solid, span) = solid_at(painting, document, field);
            findings.faults.push(Fault::SolidWithoutAir { span, solid, at: painting.middle(field) });
        }
    }
}

/// Environments that appear nowhere, and a solid that only one air touches.
fn remark_on_airs(painting: &Painting, document: &Document, environments: &[Environment], findings: &mut Findings) {
    let drawn: BTreeSet<usize> = document
        .regions
        .iter()
        .filter_map(|region| match region.fill {
            crate::input::Fill::Environment(environment) => Some(environment),
            _ => None,
        })
        .collect();
    for (index, environment) in environments.iter().enumerate() {
        // the air of others (`same_as`) need not be drawn itself
        let lends_its_air = document.environments.iter().any(|other| other.same_as == Some(index));
        if !drawn.contains(&index) && !lends_its_air {
            findings.remarks.push(Remark::EnvironmentUnused { name: environment.name.clone() });
        }
    }
    let mut touching: BTreeSet<AirId> = BTreeSet::new();
    for edge in inner_edges(painting) {
        let air = |paint: Paint| matches!(paint, Paint::Air(_));
        if let Some([_, field]) = edge.sorted(&painting.paints, is_solid, air)
            && let Paint::Air(environment) = painting.paints[field]
        {
            touching.insert(environments[environment.index()].air);
        }
    }
    if let (1, Some(air)) = (touching.len(), touching.first()) {
        let only = environments.iter().find(|environment| environment.air == *air);
        findings.remarks.push(Remark::OneAir { name: only.map(|found| found.name.clone()).unwrap_or_default() });
    }
}

/// The probes, moved onto a line of the drawing where one is within its tolerance; those outside any solid are refused.
pub(super) fn probes(painting: &Painting, document: &Document, findings: &mut Findings) -> Vec<Probe> {
    let lines = &painting.lines;
    let mut probes = Vec::new();
    for probe in &document.probes {
        let upright = line_at(&lines.x, probe.at[0], lines.tolerance_m);
        let level = line_at(&lines.y, probe.at[1], lines.tolerance_m);
        let at = [upright.map_or(probe.at[0], |line| lines.x[line]), level.map_or(probe.at[1], |line| lines.y[line])];
        let columns = touching(&lines.x, at[0]);
        let rows = touching(&lines.y, at[1]);
        let paints: Vec<Paint> = rows
            .flat_map(|row| columns.clone().map(move |column| (column, row)))
            .map(|(column, row)| painting.paints[row * lines.columns() + column])
            .collect();
        if paints.iter().any(|&paint| is_solid(paint)) {
            probes.push(Probe { name: probe.name.value.clone(), at });
            continue;
        }
        let inside = match paints.first() {
            Some(Paint::Air(environment)) => format!("in {}", document.environments[environment.index()].name.value),
            Some(Paint::Void) => "in a void".to_owned(),
            Some(_) => "in an unpainted part of the sheet".to_owned(),
            None => "outside the sheet".to_owned(),
        };
        let name = probe.name.value.clone();
        findings.faults.push(Fault::ProbeOutside { span: probe.name.span, name, at: probe.at, inside });
    }
    probes
}

/// The intervals between `lines` that a coordinate lies in: two if it is on a line, none outside.
pub(super) fn touching(lines: &[f64], at: f64) -> std::ops::Range<usize> {
    let count = lines.len() - 1;
    let first = lines.partition_point(|&line| line < at);
    let after = lines.partition_point(|&line| line <= at);
    first.saturating_sub(1)..after.min(count)
}

#[cfg(test)]
mod tests;
