//! Text, JSON and CSV from a rating: pure functions from data to text, each ending with a line break.
//!
//! Knows the figures (`rating`, `verification`) and the model they belong to (`junction`); must not know solvers, files
//! or terminals. All it knows of the reader's page is a [`Style`].

mod caution;
mod csv;
mod digits;
mod files;
mod json;
mod kinds;
mod lines;
mod page;
mod pairs;
mod place;
#[cfg(test)]
mod sample;
mod style;
mod table;
mod text;
mod understood;
mod units;
mod verified;

pub use caution::CAUTION;
pub use csv::csv;
pub use files::{FailedFile, Problem, RatedFile};
pub use json::json;
pub use style::Style;
pub use text::text;
pub use understood::understood;
pub use units::Units;
pub use verified::{verification_json, verification_text};
