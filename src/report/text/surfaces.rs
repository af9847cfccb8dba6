//! What every surface and probe does.

use crate::rating::{Rating, SurfaceResult};
use crate::report::digits::{fixed, rounded_cold, significant};
use crate::report::page::Page;
use crate::report::place::{point, surface_cells};
use crate::report::table::{Align, Table};

/// Most surfaces that are listed; beyond, those with most heat flow.
const MOST_LISTED: usize = 14;

/// Heat flow and temperatures of the surfaces.
pub(super) fn surfaces(page: &mut Page<'_>, rating: &Rating) {
    let (junction, units) = (&rating.junction, page.style().units);
    if rating.surfaces.is_empty() {
        return;
    }
    let (flow, resistance, unit) = (units.heat_flow(), units.resistance(), junction.unit.symbol());
    page.heading("Surfaces (converged, not bracketed; heat flow into the solid is positive)");
    page.block(
        2,
        &format!(
            "of the heat-flow run; from and to in {unit}, R_s for heat flow and for moisture in {}, heat flow in {}, {}",
            resistance.symbol,
            flow.symbol,
            units.temperature_symbol()
        ),
    );
    let mut table = Table::new(&[
        ("environ-\nment", Align::Wrap),
        ("from x, y", Align::Left),
        ("to x, y", Align::Left),
        ("faces", Align::Left),
        ("R_s\nheat", Align::Right),
        ("R_s\nmoist.", Align::Right),
        ("heat\nflow", Align::Right),
        ("mean\ntemp.", Align::Right),
        ("least\ntemp.", Align::Right),
    ]);
    let listed = most_heat(&rating.surfaces);
    let mut last = None;
    for result in &listed {
        let surface = &junction.surfaces[result.surface.index()];
        let [environment, from, to, faces] = surface_cells(junction, surface, &mut last);
        table.row([
            environment,
            from,
            to,
            faces,
            significant(resistance.of(surface.resistance), 3),
            significant(resistance.of(surface.moisture_resistance), 3),
            fixed(flow.of(result.heat_flow_w_m), 2),
            fixed(units.temperature(result.mean_c), 1),
            rounded_cold(units.temperature(result.lowest_c), 1),
        ]);
    }
    page.table(2, &table);
    let left_out = rating.surfaces.len() - listed.len();
    if left_out > 0 {
        page.block(2, &format!("and {left_out} more with less heat flow: --format json lists them"));
    }
}

/// The surfaces to list, in their own order.
fn most_heat(surfaces: &[SurfaceResult]) -> Vec<&SurfaceResult> {
    let mut order: Vec<usize> = (0..surfaces.len()).collect();
    order.sort_by(|&a, &b| surfaces[b].heat_flow_w_m.abs().total_cmp(&surfaces[a].heat_flow_w_m.abs()));
    order.truncate(MOST_LISTED);
    order.sort_unstable();
    order.into_iter().map(|index| &surfaces[index]).collect()
}

/// Temperatures at the probes.
pub(super) fn probes(page: &mut Page<'_>, rating: &Rating) {
    if rating.probes.is_empty() {
        return;
    }
    let (unit, units) = (rating.junction.unit, page.style().units);
    page.heading(&format!("Probes in {} (converged, not bracketed)", units.temperature_symbol()));
    let mut table = Table::new(&[
        ("probe".to_owned(), Align::Wrap),
        (format!("at x, y in {}", unit.symbol()), Align::Left),
        ("heat-flow run".to_owned(), Align::Right),
        ("moisture run".to_owned(), Align::Right),
    ]);
    for probe in &rating.probes {
        table.row([
            probe.name.clone(),
            point(probe.at, unit),
            fixed(units.temperature(probe.temperature_c), 2),
            fixed(units.temperature(probe.moisture_temperature_c), 2),
        ]);
    }
    page.table(2, &table);
}
