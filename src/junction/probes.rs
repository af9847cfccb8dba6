//! The points at which temperatures are wanted: they lie in a solid or on its edge.

use super::fault::Fault;
use super::lines::line_at;
use super::listing::FAULTS_NAMED;
use super::model::Probe;
use super::painting::{Paint, Painting};
use super::remark::Findings;
use crate::input::Document;

/// The probes, moved onto a line of the drawing where one is within its tolerance; those outside any solid are refused.
pub(super) fn probes(painting: &Painting, document: &Document, findings: &mut Findings) -> Vec<Probe> {
    let lines = &painting.lines;
    let mut probes = Vec::new();
    let mut outside = 0;
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
        if paints.iter().any(|paint| matches!(paint, Paint::Solid(_))) {
            probes.push(Probe { name: probe.name.value.clone(), at });
            continue;
        }
        let inside = match paints.first() {
            Some(Paint::Air(environment)) => {
                format!("in the environment `{}`", document.environments[environment.index()].name.value)
            }
            Some(Paint::Void) => "in a void".to_owned(),
            Some(_) => "in an unpainted part of the sheet".to_owned(),
            None => "outside the sheet".to_owned(),
        };
        outside += 1;
        // a search of the whole sheet, so only for those that will be told
        let nearest = if outside <= FAULTS_NAMED { nearest_solid(painting, probe.at) } else { None };
        let name = probe.name.value.clone();
        findings.faults.push(Fault::ProbeOutside { span: probe.name.span, name, at: probe.at, inside, nearest });
    }
    probes
}

/// The point of a solid that is nearest to `at`, in metres.
fn nearest_solid(painting: &Painting, at: [f64; 2]) -> Option<[f64; 2]> {
    let (x, y) = (&painting.lines.x, &painting.lines.y);
    let columns = painting.lines.columns();
    let solids = (0..painting.paints.len()).filter(|&field| matches!(painting.paints[field], Paint::Solid(_)));
    let nearest_in = |field: usize| {
        let (column, row) = (field % columns, field / columns);
        [at[0].clamp(x[column], x[column + 1]), at[1].clamp(y[row], y[row + 1])]
    };
    let distance = |point: [f64; 2]| (point[0] - at[0]).hypot(point[1] - at[1]);
    solids.map(nearest_in).min_by(|&a, &b| distance(a).total_cmp(&distance(b)))
}

/// The intervals between `lines` that a coordinate lies in: two if it is on a line, none outside.
pub(super) fn touching(lines: &[f64], at: f64) -> std::ops::Range<usize> {
    let count = lines.len() - 1;
    let first = lines.partition_point(|&line| line < at);
    let after = lines.partition_point(|&line| line <= at);
    first.saturating_sub(1)..after.min(count)
}
