//! Rates a junction file given as text, through the library's public rooms.

use coldseam::input::{self, Source};
use coldseam::junction;
use coldseam::rating::{self, Rating, Request};

/// The rating of a junction that must be accepted; `name` is for the message if it is not.
#[track_caller]
pub(crate) fn rate(name: &str, text: &str, request: &Request) -> Rating {
    let source = Source { name: name.to_owned(), text: text.to_owned() };
    let junction = input::parse(&source).and_then(|document| junction::build(&document));
    let junction = match junction {
        Ok(junction) => junction,
        Err(problems) => panic!("{}\n{text}", input::render(&source, &problems, false)),
    };
    match rating::rate(junction, request, &|_| {}) {
        Ok(rated) => rated.rating,
        Err(error) => panic!("{name}: {error}\n{text}"),
    }
}
