//! The figures that are signed: Ψ, L, heat flow, f_Rsi.

use crate::rating::{Accuracy, Bracket, Rating};
use crate::report::digits::{
    asked_half_width, bounds, count, covering, decimals, fixed, quoted, rounded_cold, rounded_up_to_two_digits,
    significant,
};
use crate::report::lines::with_unit;
use crate::report::page::Page;
use crate::report::pairs::{self, Pair, air_name, pair_name};
use crate::report::place::point;
use crate::report::table::{Align, Table};
use crate::report::units::{Unit, Units};

/// Whether the bracket was met, and what ± means.
pub(super) fn status(page: &mut Page<'_>, rating: &Rating) {
    page.blank();
    if rating.couplings.iter().any(|coupling| coupling.bracket.is_none()) {
        page.alert(
            0,
            "No bracket exists where surfaces of different prescribed temperatures touch: the heat flow is infinite \
             there. Temperatures hold all the same.",
        );
    }
    if rating.bracket_met {
        met(page, rating)
    } else {
        not_met(page, rating)
    }
    match rating.warnings.len() {
        0 => {}
        1 => page.alert(0, "One warning below: read it before signing."),
        count => page.alert(0, &format!("{count} warnings below: read them before signing.")),
    }
}

fn met(page: &mut Page<'_>, rating: &Rating) {
    let asked = accuracy_words(rating.request.accuracy, page.style().units);
    let passes = if rating.evidence.passes == 1 { "pass" } else { "passes" };
    page.block(
        0,
        &format!(
            "Bracket met: {asked} was asked, reached with {} nodes in {} {passes}. ± covers the bracket and the \
             rounding of the figure printed: for the model as drawn, no numerical error is larger.",
            count(rating.evidence.nodes),
            rating.evidence.passes
        ),
    );
}

fn not_met(page: &mut Page<'_>, rating: &Rating) {
    let units = page.style().units;
    let asked = accuracy_words(rating.request.accuracy, units);
    let brackets = rating.couplings.iter().filter_map(|coupling| coupling.bracket);
    let too_wide = brackets.filter(|b| b.half_width() > asked_half_width(rating.request.accuracy, b.value()));
    let nodes = count(rating.evidence.nodes);
    let advice = format!(
        "Allow more nodes (--node-limit, now {}) or ask for less (--accuracy).",
        count(rating.request.node_limit)
    );
    if let Some(half_width) = too_wide.map(Bracket::half_width).max_by(f64::total_cmp) {
        let unit = units.linear_transmittance();
        let reached = with_unit(rounded_up_to_two_digits(unit.of(half_width)), unit.symbol);
        page.alert(
            0,
            &format!(
                "Bracket not met: {asked} was asked, {reached} was reached with {nodes} nodes. The figures carry \
                 their true, wider bracket. {advice}"
            ),
        );
    } else if rating.couplings.iter().all(|coupling| coupling.bracket.is_some()) {
        page.alert(
            0,
            &format!(
                "Not settled: every coupling's bracket is as narrow as asked ({asked}), but with {nodes} nodes a \
                 temperature factor still moves. {advice}"
            ),
        );
    }
}

/// `a half-width of 0.0005 W/(m·K)`.
pub(super) fn accuracy_words(accuracy: Accuracy, units: Units) -> String {
    match accuracy {
        Accuracy::Absolute(half_width) => {
            let unit = units.linear_transmittance();
            format!("a half-width of {}", with_unit(significant(unit.of(half_width), 3), unit.symbol))
        }
        Accuracy::Relative(fraction) => {
            format!("a half-width of {} of L", with_unit(significant(100.0 * fraction, 3), "%"))
        }
    }
}

/// Ψ in each dimension system, L and heat flow of every pair.
pub(super) fn pairs(page: &mut Page<'_>, rating: &Rating) {
    let all = pairs::pairs(rating);
    for pair in &all {
        let name = pair_name(&rating.junction, pair.warm, pair.cold);
        match pair.psi {
            Some(_) => page.heading(&format!("Linear thermal transmittance Ψ by dimension system, {name}")),
            None => page.heading(&format!("Thermal coupling coefficient L, {name}")),
        }
        page.table(2, &pair_table(rating, pair, page.style().units));
        if pair.psi.is_none() {
            page.block(2, "No Ψ: no flank is known to separate the two (see flanks).");
        }
    }
    if all.is_empty() {
        page.blank();
        page.block(0, "No two environments are joined by the solid: there is no coupling and no Ψ.");
    }
}

fn pair_table(rating: &Rating, pair: &Pair<'_>, units: Units) -> Table {
    let coupling = pair.coupling.and_then(|coupling| coupling.bracket);
    let asked = coupling.map_or(0.0, |l| asked_half_width(rating.request.accuracy, l.value()));
    let unit = units.linear_transmittance();
    let mut table = Table::new(&[("", Align::Left), ("", Align::Right), ("", Align::Left), ("", Align::Wrap)]);
    if let Some(psi) = pair.psi {
        let systems = [
            ("Ψ, internal", psi.internal),
            ("Ψ, overall internal", psi.overall_internal),
            ("Ψ, external", psi.external),
        ];
        for (name, bracket) in systems {
            let [value, symbol, remark] = match bracket {
                Some(bracket) => {
                    let [value, symbol] = bracketed(bracket, asked, unit);
                    let clear = coupling.map(|l| format!(", Σ U·l {}", fixed(unit.of(l.value() - bracket.value()), 4)));
                    let quoted = quoted(scaled(bracket, unit.per_si));
                    [value, symbol, format!("two decimals {quoted}{}", clear.unwrap_or_default())]
                }
                None if coupling.is_none() => ["none".into(), String::new(), "the coupling is infinite".into()],
                None => ["not settled".into(), String::new(), "a length is open: see flanks".into()],
            };
            table.row([name.into(), value, symbol, remark]);
        }
    }
    let name = "L, thermal coupling";
    match coupling {
        Some(bracket) => {
            let in_unit = scaled(bracket, unit.per_si);
            let places = decimals(in_unit.half_width(), unit.of(asked)) + 1;
            let (low, high) = bounds(in_unit, places);
            let [value, symbol] = bracketed(bracket, asked, unit);
            table.row([name.into(), value, symbol, format!("bounds {low} to {high}")]);
            if let Some([value, symbol, difference]) = heat_flow(rating, pair, bracket, asked, units) {
                table.row(["heat flow".into(), value, symbol, difference]);
            }
        }
        None => {
            let why = "prescribed temperatures touch";
            table.row([name.into(), "infinite".into(), String::new(), why.into()]);
        }
    }
    table
}

/// The heat flow at the file's temperatures; `None` where these are equal.
fn heat_flow(rating: &Rating, pair: &Pair<'_>, coupling: Bracket, asked: f64, units: Units) -> Option<[String; 3]> {
    let temperature = |air: crate::index::AirId| rating.junction.airs[air.index()].temperature_c;
    let difference = temperature(pair.warm) - temperature(pair.cold);
    if difference == 0.0 {
        return None;
    }
    let [value, symbol] = bracketed(scaled(coupling, difference), asked * difference.abs(), units.heat_flow());
    let kelvin = units.temperature_difference();
    Some([value, symbol, format!("at a difference of {} {}", significant(kelvin.of(difference), 4), kelvin.symbol)])
}

/// The bracket times a number of either sign.
fn scaled(bracket: Bracket, factor: f64) -> Bracket {
    let (a, b) = (bracket.low * factor, bracket.high * factor);
    Bracket { low: a.min(b), high: a.max(b) }
}

/// `0.712 ± 0.001` and the unit.
fn bracketed(bracket: Bracket, asked: f64, unit: Unit) -> [String; 2] {
    let bracket = scaled(bracket, unit.per_si);
    [covering(bracket, decimals(bracket.half_width(), unit.of(asked))).joined(), unit.symbol.to_owned()]
}

/// The coldest point of each internal environment and surface class.
pub(super) fn coldest(page: &mut Page<'_>, rating: &Rating) {
    let (junction, units) = (&rating.junction, page.style().units);
    if rating.temperature_factors.is_empty() {
        return;
    }
    page.heading("Coldest inside surface");
    page.block(2, "Moisture run with ISO 13788's surface resistances; converged, not bracketed; rounded down.");
    let mut table = Table::new(&[
        ("environment".to_owned(), Align::Wrap),
        ("surface".to_owned(), Align::Left),
        ("f_Rsi".to_owned(), Align::Right),
        (units.temperature_symbol().to_owned(), Align::Right),
        (format!("at x, y in {}", junction.unit.symbol()), Align::Left),
        ("what meets there".to_owned(), Align::Wrap),
    ]);
    for factor in &rating.temperature_factors {
        table.row([
            air_name(junction, factor.air).to_owned(),
            factor.class.word().to_owned(),
            factor.value.map_or_else(|| "none".to_owned(), |value| rounded_cold(value, 3)),
            rounded_cold(units.temperature(factor.temperature_c), 1),
            point(factor.at, junction.unit),
            factor.meets.clone(),
        ]);
    }
    page.table(2, &table);
    if rating.temperature_factors.iter().any(|factor| factor.value.is_none()) {
        page.block(2, "f_Rsi needs one external temperature below that indoors.");
    }
    for factor in rating.temperature_factors.iter().filter(|factor| factor.near_spaced_bars) {
        page.alert(
            2,
            &format!(
                "{}, {}: spaced bars, smeared along the junction, lie near this point; the bar itself is colder. Do \
                 not judge condensation or mould by this value.",
                air_name(junction, factor.air),
                factor.class.word()
            ),
        );
    }
}
