//! Published cases, computed and compared.

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
