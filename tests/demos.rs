//! The demo library: every file rates as printed, and raises exactly the remarks it is meant to.

mod demo_files;
mod rated;

use coldseam::rating::{Coupling, Rating, Request};
use demo_files::demo_files;
use rated::rate;

/// Every demo, with a part of each warning it must raise, in order.
///
/// Spaced bars: the conductivity used is told, and that the coldest point lies near them. Stud bays: the cut planes lie
/// on planes of symmetry half-way to the next stud, where the stud is still felt (ISO 10211 wants the model to end
/// there all the same); the steel stud is a plate that bridges insulation, and is meant so.
const DEMOS: [(&str, &[&str]); 13] = [
    (
        "balcony-break",
        &[
            "stainless steel bars 78.5 mm² every 125 mm in break insulation: calculated with",
            "stainless steel bars 50.3 mm² every 250 mm in break insulation: calculated with",
            "bearing mortar bars 2400 mm² every 250 mm in break insulation: calculated with",
            "near spaced bars",
        ],
    ),
    ("balcony-slab", &[]),
    ("external-corner", &[]),
    ("floor-over-cycle-store", &[]),
    ("intermediate-floor-external-insulation", &[]),
    ("intermediate-floor-internal-insulation", &[]),
    ("parapet", &[]),
    ("party-wall", &[]),
    ("re-entrant-corner", &[]),
    (
        "steel-stud-bay",
        &[
            "steel, 1.5 mm thick, bridges mineral wool",
            "flank left: at the cut the heat flux differs",
            "flank right: at the cut the heat flux differs",
        ],
    ),
    (
        "timber-stud-bay",
        &["flank left: at the cut the heat flux differs", "flank right: at the cut the heat flux differs"],
    ),
    ("window-lintel", &[]),
    ("window-reveal", &[]),
];

#[test]
fn the_library_is_what_this_test_expects() {
    let expected: Vec<String> = DEMOS.iter().map(|(name, _)| format!("junctions/{name}.yaml")).collect();
    let found: Vec<String> = demo_files().into_iter().map(|(file, _)| file).collect();
    assert_eq!(found, expected, "files in junctions/ (left); those with their expected warnings in this test (right)");
    assert!(found.len() >= 10);
}

#[test]
fn every_demo_opens_with_what_to_change_first() {
    for (file, text) in demo_files() {
        let opening: Vec<&str> = text.lines().take_while(|line| line.starts_with('#')).collect();
        assert!(
            opening.iter().any(|line| line.contains("Change first:")),
            "{file}: its opening comment is {opening:#?}"
        );
    }
}

#[test]
fn every_demo_rates_as_asked_with_the_expected_warnings() {
    for ((file, text), (_, expected)) in demo_files().into_iter().zip(DEMOS) {
        let rating = rate(&file, &text, &Request::default());
        assert!(rating.bracket_met, "{file}: bracket not met");
        assert!(rating.junction.title.ends_with("Fennel Row"), "{file}: {}", rating.junction.title);
        let warnings = &rating.warnings;
        assert_eq!(warnings.len(), expected.len(), "{file}: {warnings:#?}");
        for (warning, part) in warnings.iter().zip(expected) {
            assert!(warning.contains(part), "{file}: expected {part:?} in {warning:?}");
        }
    }
}

/// The criteria of ISO 10211 for a numerical method: the sum of heat flows below 0.0001 of half their absolute sum, and
/// the heat flow changed by less than 1 % by doubling the subdivisions (clause on calculation accuracy, recalled).
#[test]
fn every_demo_meets_the_criteria_of_iso_10211() {
    for (file, text) in demo_files() {
        let evidence = rate(&file, &text, &Request::default()).evidence;
        assert!(evidence.heat_balance < 1e-4, "{file}: {evidence:?}");
        assert!(evidence.two_grid.is_some_and(|change| change < 0.01), "{file}: {evidence:?}");
        assert!(evidence.identity_error < 1e-12, "{file}: {evidence:?}");
    }
}

#[test]
fn every_demo_has_psi_in_every_dimension_system() {
    for (file, text) in demo_files() {
        let rating = rate(&file, &text, &Request::default());
        assert_eq!(rating.psi.len(), rating.couplings.len(), "{file}");
        for psi in &rating.psi {
            assert!(psi.internal.and(psi.overall_internal).and(psi.external).is_some(), "{file}: {psi:?}");
        }
    }
}

/// The file with the entries of `environments:` in reverse order; each stands on a line of its own.
fn with_environments_reversed(text: &str) -> String {
    let (before, rest) = text.split_once("environments:\n").expect("every junction has environments");
    let (entries, after) = rest.split_once("\n\n").expect("an empty line ends the block");
    let reversed: Vec<&str> = entries.lines().rev().collect();
    assert!(reversed.len() > 1 && reversed.iter().all(|line| line.ends_with('}')), "{entries}");
    format!("{before}environments:\n{}\n\n{after}", reversed.join("\n"))
}

/// The order decides which basis problem is solved and which follows from the others. Digits that the solver leaves
/// open may tip the choice of the next interval to split, so grids may differ; values may not, by more than a fiftieth
/// of the half-width asked, nor the coldest temperature by more than it may still change (0.0003 of 25 K, `SETTLED` in
/// `src/rating/refine.rs`).
#[test]
fn the_order_of_the_environments_does_not_matter() {
    for (file, text) in demo_files() {
        let plain = rate(&file, &text, &Request::default());
        let reversed = rate(&file, &with_environments_reversed(&text), &Request::default());
        assert!(reversed.bracket_met, "{file}");
        assert_eq!(plain.couplings.len(), reversed.couplings.len(), "{file}");
        for coupling in &plain.couplings {
            let twin = reversed.couplings.iter().find(|other| pair(&reversed, other) == pair(&plain, coupling));
            let [a, b] =
                [Some(coupling), twin].map(|coupling| coupling.and_then(|c| c.bracket).expect("finite in both"));
            assert!((a.value() - b.value()).abs() < 1e-5, "{file}: {a:?} and {b:?}");
        }
        assert_eq!(plain.temperature_factors.len(), reversed.temperature_factors.len(), "{file}");
        for (a, b) in plain.temperature_factors.iter().zip(&reversed.temperature_factors) {
            assert!((a.temperature_c - b.temperature_c).abs() < 0.0075, "{file}: {a:?} and {b:?}");
        }
    }
}

fn pair<'a>(rating: &'a Rating, coupling: &Coupling) -> [&'a str; 2] {
    [coupling.warm, coupling.cold].map(|air| rating.junction.airs[air.index()].name.as_str())
}
