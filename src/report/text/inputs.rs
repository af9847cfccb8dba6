//! What went in, and how much of it matters.

use crate::junction::{Junction, Part};
use crate::rating::Rating;
use crate::report::digits::{fixed, significant};
use crate::report::page::Page;
use crate::report::pairs::pair_name;
use crate::report::table::{Align, Table};
use crate::report::units::Units;

/// Most materials that are listed a pair.
const MOST_LISTED: usize = 5;

/// The materials whose conductivity matters most to each coupling.
pub(super) fn sensitivities(page: &mut Page<'_>, rating: &Rating) {
    let unit = page.style().units.linear_transmittance();
    for coupling in &rating.couplings {
        let of_pair = rating.sensitivities.iter().filter(|s| (s.warm, s.cold) == (coupling.warm, coupling.cold));
        let mut table = Table::new(&[("", Align::Wrap), ("", Align::Right), ("", Align::Left), ("", Align::Right)]);
        for sensitivity in of_pair.take(MOST_LISTED) {
            let change = fixed(unit.of(sensitivity.per_percent), 4);
            if change == fixed(0.0, 4) {
                continue;
            }
            let share = coupling.bracket.filter(|l| l.value() != 0.0).map(|l| sensitivity.per_percent / l.value());
            table.row([
                sensitivity.material.clone(),
                with_sign(change),
                unit.symbol.to_owned(),
                share.map(|share| format!("{} %", with_sign(fixed(100.0 * share, 2)))).unwrap_or_default(),
            ]);
        }
        if !table.is_empty() {
            let name = pair_name(&rating.junction, coupling.warm, coupling.cold);
            page.heading(&format!("What 1 % more conductivity does to L, {name}"));
            page.table(2, &table);
        }
    }
}

fn with_sign(number: String) -> String {
    if number.starts_with('-') { number } else { format!("+{number}") }
}

/// The materials with their conductivities and where these come from.
pub(in crate::report) fn materials(page: &mut Page<'_>, junction: &Junction) {
    let units = page.style().units;
    page.heading("Materials");
    let conductivity = format!("λ in {}", units.conductivity().symbol);
    let mut table = Table::new(&[("", Align::Wrap), (conductivity.as_str(), Align::Right), ("source", Align::Wrap)]);
    let mut seen: Vec<[String; 3]> = Vec::new();
    for part in &junction.parts {
        let row = material(part, units);
        // Parts that differ in surface class only are one material to a reader.
        if !seen.contains(&row) {
            seen.push(row.clone());
            table.row(row);
        }
    }
    page.table(2, &table);
}

fn material(part: &Part, units: Units) -> [String; 3] {
    let conductivity = significant(units.conductivity().of(part.conductivity_w_mk), 4);
    [part.material.clone(), conductivity, part.source.clone()]
}
