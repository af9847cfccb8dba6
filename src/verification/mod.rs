//! Published cases, rated like a user's file and compared: the evidence that the calculation is right.
//!
//! Knows every room up to `rating`; must not know terminals.

mod exact;
mod iso10211;
mod layered;
mod rated;

use rayon::prelude::*;

/// Computes every published case, in a fixed order.
pub fn run() -> Vec<CaseResult> {
    let cases: [fn() -> CaseResult; 7] = [
        iso10211::column,
        iso10211::sheeted,
        exact::corners,
        exact::strips,
        exact::quadrants,
        exact::fins,
        layered::elements,
    ];
    cases.par_iter().map(|case| case()).collect()
}

/// One published case, computed.
#[derive(Clone, Debug, PartialEq)]
pub struct CaseResult {
    /// The case's name.
    pub name: String,
    /// Where its values are published.
    pub source: String,
    /// What was compared, in the publication's order.
    pub items: Vec<Item>,
}

impl CaseResult {
    /// Whether every comparison holds.
    pub fn holds(&self) -> bool {
        self.items.iter().all(|item| item.holds)
    }
}

/// One published value beside the computed one.
#[derive(Clone, Debug, PartialEq)]
pub struct Item {
    /// What is compared ("temperature at C", "heat flow").
    pub quantity: String,
    /// The unit of all its numbers; empty for plain numbers.
    pub unit: &'static str,
    /// The published value.
    pub published: f64,
    /// The computed value; where it is bracketed, the bracket's middle.
    pub computed: f64,
    /// The bracket's bounds, where the value is bracketed.
    pub bracket: Option<(f64, f64)>,
    /// The largest difference from the published value that is allowed.
    pub allowed: f64,
    /// Whether the comparison holds.
    pub holds: bool,
    /// What a reader should know about it; may be empty.
    pub note: String,
}

#[cfg(test)]
mod tests {
    #[test]
    fn every_published_case_holds() {
        for case in super::run() {
            for item in &case.items {
                assert!(item.holds, "{}: {item:?}", case.name);
            }
        }
    }
}
