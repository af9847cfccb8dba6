//! The plane elements for Ψ, their transmittances and lengths.

use crate::junction::{Flank, Junction, Layer, Lengths};
use crate::report::digits::{fixed, significant, trimmed};
use crate::report::lines::{HELD_SPACE, with_unit};
use crate::report::page::Page;
use crate::report::pairs::pair_name;
use crate::report::table::{Align, Table};
use crate::report::units::Units;

/// Lengths that differ by less are the same, m: a hundredth of the millimetre that lengths are printed in.
const SAME_LENGTH_M: f64 = 1e-5;

/// The flanks with U, lengths and layers, and the block to paste where a length is open.
pub(in crate::report) fn flanks(page: &mut Page<'_>, junction: &Junction) {
    if junction.flanks.is_empty() && junction.flank_proposal.is_none() {
        page.heading("Flanks");
        page.block(2, "none listed or found");
        return;
    }
    let units = page.style().units;
    if junction.flanks.is_empty() {
        page.heading("Flanks");
        page.block(2, "none is settled");
    } else {
        page.heading(&format!("Flanks, U in {}, lengths in {}", units.transmittance().symbol, units.length().symbol));
        table(page, junction, units);
    }
    if let Some(proposal) = &junction.flank_proposal {
        page.blank();
        page.alert(2, "The drawing does not settle every length. Complete this block and paste it into the file:");
        page.blank();
        page.verbatim(2, proposal);
    }
}

/// U, lengths and layers of every flank.
fn table(page: &mut Page<'_>, junction: &Junction, units: Units) {
    let mut table = Table::new(&[
        ("", Align::Wrap),
        ("\nU", Align::Right),
        ("\ninternal", Align::Right),
        ("overall\ninternal", Align::Right),
        ("\nexternal", Align::Right),
        ("\nlengths", Align::Wrap),
    ]);
    for flank in &junction.flanks {
        let lengths = flank.lengths;
        table.row([
            flank.name.clone(),
            fixed(units.transmittance().of(flank.u_w_m2k), 4),
            length(lengths.internal_m, units),
            length(lengths.overall_internal_m, units),
            length(lengths.external_m, units),
            origin(flank, units),
        ]);
    }
    page.table(2, &table);
    for (names, layers) in layer_lines(junction, units) {
        page.paragraph(2, &format!("{}; {layers}", names.join(", ")));
    }
}

fn length(metres: Option<f64>, units: Units) -> String {
    metres.map_or_else(|| "not settled".to_owned(), |metres| fixed(units.length().of(metres), 3))
}

/// Whether the lengths are the drawing's or the file's, and where these differ.
fn origin(flank: &Flank, units: Units) -> String {
    let systems = |l: Lengths| [l.internal_m, l.overall_internal_m, l.external_m];
    let used_and_measured: Vec<_> = systems(flank.lengths).into_iter().zip(systems(flank.measured)).collect();
    let settled = || used_and_measured.iter().filter_map(|(used, measured)| used.map(|used| (used, *measured)));
    let agrees = |used: f64, measured: Option<f64>| measured.is_some_and(|m| (m - used).abs() <= SAME_LENGTH_M);
    if settled().next().is_none() {
        return "open".to_owned();
    }
    if settled().all(|(used, measured)| agrees(used, measured)) {
        return "measured".to_owned();
    }
    let names = ["internal", "overall", "external"];
    let differing: Vec<String> = names
        .iter()
        .zip(&used_and_measured)
        .filter_map(|(name, (used, measured))| {
            let (used, measured) = ((*used)?, (*measured)?);
            let text = format!("{name} {}", fixed(units.length().of(measured), 3));
            (!agrees(used, Some(measured))).then_some(text)
        })
        .collect();
    if differing.is_empty() { "given".to_owned() } else { format!("given; measured {}", differing.join(", ")) }
}

/// The layers of the flanks, those of equal ones together.
fn layer_lines(junction: &Junction, units: Units) -> Vec<(Vec<&str>, String)> {
    let mut lines: Vec<(Vec<&str>, String)> = Vec::new();
    for flank in &junction.flanks {
        let layers = layers(junction, flank, units);
        match lines.iter_mut().find(|(_, known)| *known == layers) {
            Some((names, _)) => names.push(&flank.name),
            None => lines.push((vec![&flank.name], layers)),
        }
    }
    lines
}

/// The layers from warm to cold with both surface resistances, so that U can be worked out again.
fn layers(junction: &Junction, flank: &Flank, units: Units) -> String {
    let resistance = units.resistance();
    let between: Vec<String> = flank.layers.iter().map(|layer| layer_words(junction, layer, units)).collect();
    let own = if flank.u_w_m2k == flank.u_layers_w_m2k {
        String::new()
    } else {
        let unit = units.transmittance();
        let drawn = with_unit(fixed(unit.of(flank.u_layers_w_m2k), 4), unit.symbol);
        format!("; U is given, that of the layers drawn is {drawn}")
    };
    format!(
        "{}: R_s{HELD_SPACE}{}, {}, R_s{HELD_SPACE}{}{own}",
        pair_name(junction, flank.warm, flank.cold),
        significant(resistance.of(flank.warm_resistance), 4),
        between.join(", "),
        with_unit(significant(resistance.of(flank.cold_resistance), 4), resistance.symbol)
    )
}

/// `mineral wool 140 mm`.
pub(in crate::report) fn layer_words(junction: &Junction, layer: &Layer, units: Units) -> String {
    let thickness = units.thickness();
    let places = if units == Units::Si { 2 } else { 3 };
    let of_layer = with_unit(trimmed(thickness.of(layer.thickness_m), places), thickness.symbol);
    format!("{} {of_layer}", junction.parts[layer.part.index()].material)
}
