//! What a reviewer would raise about the numbers; the drawing's own warnings come from `junction`.

use super::fields::Fields;
use super::model::{Accuracy, Evidence, Request, TemperatureFactor};
use super::pass::{Pass, Settings, asked};
use super::refine::{End, Ended, SETTLED, fullest_place};
use crate::grid::Rectangle;
use crate::index::AirId;
use crate::junction::{Content, Junction, point_text};

/// ISO 10211: sum of all heat flows over half the sum of their absolute values.
const LARGEST_IMBALANCE: f64 = 1e-4;
/// ISO 10211: change of the sum of absolute heat flows when the subdivisions double.
const LARGEST_TWO_GRID_CHANGE: f64 = 0.01;
/// The flux density at a cut may depart from that of the clear element by this much of it.
const LARGEST_FLUX_DEPARTURE: f64 = 0.02;
/// Fields that meet crosswise with conductivities this many times apart make convergence slow (the field varies as a
/// small power of the distance; see the exact four-quadrant solutions of `verification`).
const CROSSWISE_RATIO: f64 = 20.0;

/// Every remark, in the order: bracket, temperatures, criteria of ISO 10211, flanks.
pub(super) fn remarks(
    junction: &Junction,
    request: &Request,
    ended: &Ended,
    fields: &Fields,
    factors: &[TemperatureFactor],
    evidence: &Evidence,
) -> Vec<String> {
    let Fields { settings, pass } = fields;
    let mut out = Vec::new();
    infinite_couplings(junction, settings, pass, &mut out);
    wide_brackets(junction, request, ended.why, fields, &mut out);
    if !ended.settled {
        unsettled_factors(junction, factors, &mut out);
    }
    for factor in factors.iter().filter(|f| f.near_spaced_bars) {
        out.push(format!(
            "the coldest surface point of {} ({}) lies near spaced bars, which the section smears out: at a bar it is colder \
             than printed; do not judge mould by this value",
            junction.airs[factor.air.index()].name,
            point_text(junction, factor.at),
        ));
    }
    if evidence.heat_balance > LARGEST_IMBALANCE {
        out.push(format!(
            "heat flows do not balance: their sum is {:.1e} of half their absolute sum (ISO 10211 asks for less than {LARGEST_IMBALANCE:.0e})",
            evidence.heat_balance
        ));
    }
    if let Some(change) = evidence.two_grid.filter(|&change| change > LARGEST_TWO_GRID_CHANGE) {
        out.push(format!(
            "the heat flow changed by {:.1} % between the last grid and one of at most half its nodes (ISO 10211 asks for 1 % at most)",
            100.0 * change
        ));
    }
    flank_fluxes(junction, fields, &mut out);
    out
}

fn names(junction: &Junction, airs: [AirId; 2]) -> String {
    let [warm, cold] = junction.warm_first(airs[0], airs[1]);
    format!("{} and {}", junction.airs[warm.index()].name, junction.airs[cold.index()].name)
}

fn infinite_couplings(junction: &Junction, settings: &Settings, pass: &Pass, out: &mut Vec<String>) {
    let mut seen: Vec<[AirId; 2]> = Vec::new();
    for touching in pass.heat.touching() {
        let airs = touching.airs.map(|k| settings.heat.airs[k]);
        if seen.contains(&airs) {
            continue;
        }
        seen.push(airs);
        out.push(format!(
            "prescribed surface temperatures of {} touch at {}: the heat flow there is infinite, so no coupling is given, only temperatures; \
             give one of them a surface resistance above 0",
            names(junction, airs),
            point_text(junction, pass.grid.position(touching.node)),
        ));
    }
}

fn wide_brackets(junction: &Junction, request: &Request, end: End, fields: &Fields, out: &mut Vec<String>) {
    let Fields { settings, pass } = fields;
    for &([i, j], bracket) in &pass.couplings {
        let Some(bracket) = bracket.filter(|b| !Pass::is_narrow(*b, request)) else { continue };
        let airs = [settings.heat.airs[i], settings.heat.airs[j]];
        let mut text = format!(
            "bracket not met between {}: half-width {} W/(m·K), asked {}",
            names(junction, airs),
            significant(bracket.half_width()),
            match request.accuracy {
                Accuracy::Absolute(half_width) => format!("{} W/(m·K)", significant(half_width)),
                Accuracy::Relative(fraction) =>
                    format!("{} % = {} W/(m·K)", significant(100.0 * fraction), significant(asked(bracket, request))),
            },
        );
        if let Some((place, share)) = fullest_place(settings, pass, [i, j]) {
            text +=
                &format!("; {:.0} % of the remaining gap lies around {}", 100.0 * share, point_text(junction, place));
            if let Some(crosswise) = crosswise(junction, place) {
                text += &format!(
                    ", where {crosswise} meet crosswise: such a point converges slowly on any grid, and the bracket is honest about it"
                );
            }
        }
        text += &match end {
            End::NodeLimit(nodes) => format!(
                "; the next grid needs {nodes} nodes, {} are allowed: raise the node limit or ask for less accuracy",
                request.node_limit
            ),
            End::Exhausted | End::Met => "; cells there cannot be split further in double precision".to_string(),
        };
        out.push(text);
    }
}

/// The two materials that meet crosswise at a crossing of the drawing's lines, if they do with very different
/// conductivities.
fn crosswise(junction: &Junction, at: [f64; 2]) -> Option<String> {
    let sheet = &junction.sheet;
    let column = sheet.x_lines().iter().position(|&x| x == at[0]).filter(|&c| c > 0 && c < sheet.columns())?;
    let row = sheet.y_lines().iter().position(|&y| y == at[1]).filter(|&r| r > 0 && r < sheet.rows())?;
    let around = [(column, row), (column - 1, row), (column - 1, row - 1), (column, row - 1)];
    let parts: Vec<_> = around
        .iter()
        .map(|&(column, row)| match sheet.content(column, row) {
            Content::Solid(part) => Some(&junction.parts[part.index()]),
            Content::Air(_) | Content::Outside => None,
        })
        .collect::<Option<_>>()?;
    let conductivity = |k: usize| parts[k].conductivity_w_mk;
    let lower = |a: usize, b: usize| conductivity(a).min(conductivity(b));
    let higher = |a: usize, b: usize| conductivity(a).max(conductivity(b));
    let apart = lower(0, 2) > CROSSWISE_RATIO * higher(1, 3) || lower(1, 3) > CROSSWISE_RATIO * higher(0, 2);
    apart.then(|| format!("{} and {}", parts[0].material, parts[1].material))
}

fn unsettled_factors(junction: &Junction, factors: &[TemperatureFactor], out: &mut Vec<String>) {
    let worst = factors.iter().filter(|f| f.change.is_some_and(|change| change > SETTLED)).collect::<Vec<_>>();
    if worst.is_empty() {
        out.push(
            "surface or probe temperatures had not settled when refinement ended; treat them as approximate"
                .to_string(),
        );
    }
    for factor in worst {
        out.push(format!(
            "f_Rsi of {} had not settled: it changed by {:.4} since the last grid of at most half the nodes (asked {SETTLED}); coarse grids err \
             on the unsafe side",
            junction.airs[factor.air.index()].name,
            factor.change.unwrap_or(0.0),
        ));
    }
}

/// Compares the flux density that enters at the warm end of each flank's cut with that of its layers.
fn flank_fluxes(junction: &Junction, fields: &Fields, out: &mut Vec<String>) {
    let Fields { settings, pass } = fields;
    for flank in &junction.flanks {
        let cut = &junction.cuts[flank.cut];
        let warm_at_from = junction.surfaces[cut.surface_from.index()].air == flank.warm;
        let end = if warm_at_from { cut.from } else { cut.to };
        let (Some(warm), Some(cold)) = (settings.heat.place(flank.warm), settings.heat.place(flank.cold)) else {
            continue;
        };
        if pass.heat.touching().iter().any(|t| t.airs.contains(&warm) || t.airs.contains(&cold)) {
            continue;
        }
        let unit: Vec<f64> = (0..settings.heat.airs.len()).map(|k| f64::from(u8::from(k == warm))).collect();
        let surface = if warm_at_from { cut.surface_from } else { cut.surface_to };
        let flux = pass.grid.cells().find_map(|cell| {
            let face = cell.shape.surfaces.iter().position(|&s| s == Some(surface))?;
            let touches = Rectangle::FACE_CORNERS[face]
                .iter()
                .any(|&corner| pass.grid.position(cell.shape.corners[corner]) == end);
            touches.then(|| Rectangle::INWARD[face] * pass.heat.flux(cell.shape.faces[face], &unit))
        });
        let Some(flux) = flux else { continue };
        let departure = flux / flank.u_layers_w_m2k - 1.0;
        if departure.abs() > LARGEST_FLUX_DEPARTURE {
            let reason = if cut.symmetry {
                "between planes of symmetry this close the clear element is nowhere undisturbed, so Ψ holds for this spacing only"
            } else {
                "the cut lies where the junction is still felt, or the element is not plane: move the cut out"
            };
            out.push(format!(
                "flank {}: at the cut the heat flux differs by {:+.1} % from that of its layers (U = {:.3} W/(m²·K)): {reason}",
                flank.name,
                100.0 * departure,
                flank.u_layers_w_m2k,
            ));
        }
    }
}

/// Two significant digits, without an exponent for the usual sizes.
fn significant(value: f64) -> String {
    if value == 0.0 || !(1e-9..1e6).contains(&value.abs()) {
        return format!("{value:.1e}");
    }
    let decimals = (1 - value.abs().log10().floor() as i32).max(0) as usize;
    format!("{value:.decimals$}")
}

#[cfg(test)]
mod tests {
    use super::significant;

    #[test]
    fn significant_digits_need_no_exponent() {
        assert_eq!(significant(0.0005), "0.00050");
        assert_eq!(significant(0.01234), "0.012");
        assert_eq!(significant(12.0), "12");
    }
}
