//! What the numbers rest on.

use super::results::accuracy_words;
use crate::rating::Rating;
use crate::report::digits::{asked_half_width, count, fixed, rounded_up_to_two_digits};
use crate::report::page::Page;
use crate::report::pairs::air_name;
use crate::report::table::{Align, Table};

/// The bracket, the grid, and ISO 10211's own criteria beside it.
pub(super) fn evidence(page: &mut Page<'_>, rating: &Rating) {
    let evidence = &rating.evidence;
    let units = page.style().units;
    page.heading("Numerical evidence");
    let mut table = Table::new(&[("", Align::Left), ("", Align::Left), ("", Align::Wrap)]);
    let mut row = |name: &str, value: String, asked: String| table.row([name.to_owned(), value, asked]);
    let met = if rating.bracket_met { "met" } else { "not met" };
    row("bracket", met.to_owned(), format!("asked: {}", accuracy_words(rating.request.accuracy, units)));
    if let Some(half_width) = widest(rating) {
        let unit = units.linear_transmittance();
        row(
            "widest half-width",
            format!("{} {}", rounded_up_to_two_digits(unit.of(half_width)), unit.symbol),
            String::new(),
        );
    }
    row(
        "grid",
        format!("{} nodes", count(evidence.nodes)),
        format!("passes: {}; node limit: {}", evidence.passes, count(rating.request.node_limit)),
    );
    row("heat balance", small(evidence.heat_balance), "ISO 10211 asks for less than 0.0001".to_owned());
    row(
        "two grids",
        evidence.two_grid.map_or_else(|| "no earlier pass".to_owned(), |change| percent(100.0 * change)),
        "since at most half the nodes; ISO 10211 asks for at most 1 %".to_owned(),
    );
    for factor in &rating.temperature_factors {
        let name = format!("f_Rsi, {}, {}", air_name(&rating.junction, factor.air), factor.class.word());
        if let Some(change) = factor.change {
            row(&name, format!("changed by {}", fixed(change.abs(), 4)), "ISO 10211 asks for at most 0.005".to_owned());
        }
    }
    row(
        "gap identity",
        small(evidence.identity_error),
        "relative departure of the bracket's width from the sum of its local terms".to_owned(),
    );
    page.table(2, &table);
}

/// The largest half-width, in terms of what was asked of each.
fn widest(rating: &Rating) -> Option<f64> {
    let brackets = rating.couplings.iter().filter_map(|coupling| coupling.bracket);
    brackets
        .max_by(|a, b| {
            let ratio = |b: crate::rating::Bracket| {
                b.half_width() / asked_half_width(rating.request.accuracy, b.value()).max(f64::MIN_POSITIVE)
            };
            ratio(*a).total_cmp(&ratio(*b))
        })
        .map(crate::rating::Bracket::half_width)
}

/// A number near nought in powers of ten.
fn small(value: f64) -> String {
    if value == 0.0 { "0".to_owned() } else { format!("{value:.1e}") }
}

fn percent(value: f64) -> String {
    format!("{} %", if value.abs() < 0.01 { small(value) } else { fixed(value, 2) })
}
