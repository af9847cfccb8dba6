//! Published cases beside what was computed: the output of `coldseam verify`.

use serde::Serialize;

use super::digits::significant;
use super::json::document;
use super::page::Page;
use super::style::Style;
use super::table::{Align, Table};
use crate::verification::{CaseResult, Item};

/// Quantity, published and computed value, difference, allowed difference and verdict, case by case.
pub fn verification_text(cases: &[CaseResult], style: &Style) -> String {
    let mut page = Page::new(style);
    for case in cases {
        let verdict = if case.holds() { "holds" } else { "DOES NOT HOLD" };
        page.heading(&format!("{}: {verdict}", case.name));
        page.block(2, &case.source);
        if case.items.iter().any(|item| item.bracket.is_some()) {
            page.block(2, "± is the bracket's half-width; an exact value must lie inside the bracket");
        }
        let mut table = Table::new(&[
            ("quantity", Align::Wrap),
            ("published", Align::Right),
            ("computed", Align::Right),
            ("±", Align::Left),
            ("difference", Align::Right),
            ("allowed", Align::Right),
            ("unit", Align::Left),
            ("", Align::Left),
        ]);
        for item in &case.items {
            table.row(row(item));
        }
        page.table(2, &table);
        for item in &case.items {
            if let Some(note) = note(item) {
                page.paragraph(2, &note);
            }
        }
    }
    page.blank();
    let items: Vec<&Item> = cases.iter().flat_map(|case| &case.items).collect();
    let held = items.iter().filter(|item| item.holds).count();
    let word = if cases.len() == 1 { "case" } else { "cases" };
    let verdict = format!("{held} of {} comparisons in {} {word} hold", items.len(), cases.len());
    if held == items.len() {
        page.title(&verdict)
    } else {
        page.alert(0, &verdict)
    }
    page.finish()
}

fn row(item: &Item) -> [String; 8] {
    let places = places(item);
    [
        item.quantity.clone(),
        super::digits::fixed(item.published, places),
        super::digits::fixed(item.computed, places),
        item.bracket.map_or(String::new(), |(low, high)| short(0.5 * (high - low))),
        short(item.computed - item.published),
        short(item.allowed),
        item.unit.to_owned(),
        if item.holds { "holds".to_owned() } else { "DOES NOT HOLD".to_owned() },
    ]
}

/// Two significant digits, with an exponent where many zeros would hide them.
fn short(value: f64) -> String {
    if value == 0.0 || value.abs() >= 1e-3 { significant(value, 2) } else { format!("{value:.1e}") }
}

/// Decimals that show a difference of a tenth of the allowed one.
fn places(item: &Item) -> usize {
    let smallest = item.allowed.abs().max(1e-9);
    (1.0 - smallest.log10().floor()).clamp(1.0, 9.0) as usize
}

fn note(item: &Item) -> Option<String> {
    (!item.note.is_empty()).then(|| format!("{}: {}", item.quantity, item.note))
}

/// The same as JSON: `{"coldseam", "holds", "cases": [{"name", "source", "holds", "items": [{"quantity", "unit",
/// "published", "computed", "low", "high", "difference", "allowed", "holds", "note"}]}]}`; `low` and `high` are null
/// where the value is not bracketed.
pub fn verification_json(cases: &[CaseResult]) -> String {
    document(&Verification {
        coldseam: env!("CARGO_PKG_VERSION"),
        holds: cases.iter().all(CaseResult::holds),
        cases: cases
            .iter()
            .map(|case| CaseEntry {
                name: &case.name,
                source: &case.source,
                holds: case.holds(),
                items: case.items.iter().map(item_entry).collect(),
            })
            .collect(),
    })
}

fn item_entry(item: &Item) -> ItemEntry<'_> {
    ItemEntry {
        quantity: &item.quantity,
        unit: item.unit,
        published: item.published,
        computed: item.computed,
        low: item.bracket.map(|(low, _)| low),
        high: item.bracket.map(|(_, high)| high),
        difference: item.computed - item.published,
        allowed: item.allowed,
        holds: item.holds,
        note: &item.note,
    }
}

#[derive(Serialize)]
struct Verification<'a> {
    coldseam: &'static str,
    holds: bool,
    cases: Vec<CaseEntry<'a>>,
}

#[derive(Serialize)]
struct CaseEntry<'a> {
    name: &'a str,
    source: &'a str,
    holds: bool,
    items: Vec<ItemEntry<'a>>,
}

#[derive(Serialize)]
struct ItemEntry<'a> {
    quantity: &'a str,
    unit: &'static str,
    published: f64,
    computed: f64,
    low: Option<f64>,
    high: Option<f64>,
    difference: f64,
    allowed: f64,
    holds: bool,
    note: &'a str,
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Invented figures, not a published case.
    fn cases() -> Vec<CaseResult> {
        let item = |quantity: &str, unit, published, computed, allowed, bracket, holds, note: &str| Item {
            quantity: quantity.into(),
            unit,
            published,
            computed,
            bracket,
            allowed,
            holds,
            note: note.into(),
        };
        vec![
            CaseResult {
                name: "Invented wall".into(),
                source: "a table of ours".into(),
                items: vec![
                    item("temperature at A", "°C", 7.1, 7.066, 0.1, None, true, ""),
                    item("heat flow", "W/m", 9.5, 9.4951, 0.1, Some((9.49466, 9.49554)), true, "both sides agree"),
                ],
            },
            CaseResult {
                name: "Invented corner".into(),
                source: "a formula of ours".into(),
                items: vec![item("shape factor", "", 0.559, 0.571, 0.005, None, false, "")],
            },
        ]
    }

    #[test]
    fn each_case_has_its_verdict() {
        assert_eq!(
            verification_text(&cases(), &Style::default()),
            "\
Invented wall: holds
  a table of ours
  ± is the bracket's half-width; an exact value must lie inside the bracket
  quantity         published  computed  ±       difference  allowed  unit
  temperature at        7.10      7.07              -0.034      0.1  °C    holds
  A
  heat flow             9.50      9.50  4.4e-4     -0.0049      0.1  W/m   holds
  heat flow: both sides agree

Invented corner: DOES NOT HOLD
  a formula of ours
  quantity      published  computed  ±  difference  allowed  unit
  shape factor     0.5590    0.5710          0.012    0.005        DOES NOT HOLD

2 of 3 comparisons in 2 cases hold
"
        );
    }

    #[test]
    fn json_says_the_same() {
        let json: serde_json::Value = serde_json::from_str(&verification_json(&cases())).unwrap();
        assert_eq!(json["holds"], false);
        assert_eq!(json["cases"][0]["holds"], true);
        assert_eq!(json["cases"][0]["items"][1]["low"], 9.49466);
        assert_eq!(json["cases"][0]["items"][0]["low"], serde_json::Value::Null);
        assert_eq!(json["cases"][1]["items"][0]["published"], 0.559);
        assert!(verification_text(&cases()[..1], &Style::default()).ends_with("2 of 2 comparisons in 1 case hold\n"));
    }
}
