//! Several ratings on one page.

use std::collections::BTreeSet;
use std::path::Path;

use crate::rating::{Bracket, Rating};
use crate::report::digits::{asked_half_width, covering, decimals, rounded_cold};
use crate::report::files::{FailedFile, RatedFile};
use crate::report::page::Page;
use crate::report::pairs::{Pair, pair_name, pairs};
use crate::report::table::{Align, Table};
use crate::report::units::Units;

/// One line a junction and pair of airs.
pub(super) fn summary(page: &mut Page<'_>, ratings: &[RatedFile], failed: &[FailedFile]) {
    let units = page.style().units;
    page.heading(&format!("Summary, Ψ in {}", units.linear_transmittance().symbol));
    let mut table = Table::new(&[
        ("junction", Align::Wrap),
        ("Ψ internal", Align::Right),
        ("Ψ external", Align::Right),
        ("f_Rsi", Align::Right),
        ("", Align::Wrap),
    ]);
    let names = short_names(ratings, failed);
    for (rated, name) in ratings.iter().zip(&names) {
        let all = pairs(&rated.rating);
        for (index, pair) in all.iter().enumerate() {
            let [internal, external] = psi(&rated.rating, pair, units);
            let mut remarks = Vec::new();
            if all.len() > 1 {
                remarks.push(pair_name(&rated.rating.junction, pair.warm, pair.cold));
            }
            remarks.extend(state(&rated.rating));
            let name = if index == 0 { name.clone() } else { String::new() };
            table.row([name, internal, external, factor(&rated.rating, pair), remarks.join("; ")]);
        }
        if all.is_empty() {
            let none = || "none".to_owned();
            table.row([name.clone(), none(), none(), none(), state(&rated.rating).join("; ")]);
        }
    }
    for name in &names[ratings.len()..] {
        table.row([name.clone(), String::new(), String::new(), String::new(), "could not be rated".to_owned()]);
    }
    page.table(2, &table);
}

/// The names of the files without their folders, unless two would look alike.
fn short_names(ratings: &[RatedFile], failed: &[FailedFile]) -> Vec<String> {
    let long = || ratings.iter().map(|r| r.file.as_str()).chain(failed.iter().map(|f| f.file.as_str()));
    let last = |path: &str| Path::new(path).file_name().map_or(path.to_owned(), |n| n.to_string_lossy().into_owned());
    let short: Vec<String> = long().map(last).collect();
    let distinct: BTreeSet<&String> = short.iter().collect();
    if distinct.len() == short.len() { short } else { long().map(str::to_owned).collect() }
}

fn psi(rating: &Rating, pair: &Pair<'_>, units: Units) -> [String; 2] {
    let coupling = pair.coupling.and_then(|coupling| coupling.bracket);
    let unit = units.linear_transmittance();
    let asked = coupling.map_or(0.0, |l| asked_half_width(rating.request.accuracy, l.value()));
    let cell = |bracket: Option<Bracket>| match bracket {
        Some(bracket) => {
            let bracket = Bracket { low: unit.of(bracket.low), high: unit.of(bracket.high) };
            covering(bracket, decimals(bracket.half_width(), unit.of(asked))).joined()
        }
        None if coupling.is_none() => "none".to_owned(),
        None => "not settled".to_owned(),
    };
    match pair.psi {
        Some(psi) => [cell(psi.internal), cell(psi.external)],
        None => ["none".to_owned(), "none".to_owned()],
    }
}

/// The lowest temperature factor of the pair's warm side.
fn factor(rating: &Rating, pair: &Pair<'_>) -> String {
    let values = rating.temperature_factors.iter().filter(|f| f.air == pair.warm).filter_map(|f| f.value);
    values.min_by(f64::total_cmp).map_or_else(|| "none".to_owned(), |value| rounded_cold(value, 3))
}

fn state(rating: &Rating) -> Vec<String> {
    let mut words = Vec::new();
    if !rating.bracket_met {
        words.push("bracket not met".to_owned());
    }
    match rating.warnings.len() {
        0 => {}
        1 => words.push("1 warning".to_owned()),
        more => words.push(format!("{more} warnings")),
    }
    words
}
