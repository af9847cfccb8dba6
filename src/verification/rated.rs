//! Rates a built-in case through the same rooms as a user's file.

use crate::input::{self, Source};
use crate::junction;
use crate::rating::{self, Rating, Request};

/// Rates a case written as a junction file.
///
/// # Panics
/// If the built-in text is at fault; every case is rated in the tests.
pub(super) fn rated(name: &str, text: &str, request: &Request) -> Rating {
    let source = Source { name: name.to_string(), text: text.to_string() };
    let complaints = |diagnostics: Vec<input::Diagnostic>| -> ! {
        panic!("the built-in case is at fault:\n{}", input::render(&source, &diagnostics, false))
    };
    let document = input::parse(&source).unwrap_or_else(|diagnostics| complaints(diagnostics));
    let junction = junction::build(&document).unwrap_or_else(|diagnostics| complaints(diagnostics));
    match rating::rate(junction, request, &|_| {}) {
        Ok(rated) => rated.rating,
        Err(error) => panic!("the built-in case {name} cannot be rated: {error}"),
    }
}
