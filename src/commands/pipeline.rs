//! From a path to a rating: reads, checks and solves, with every failure in one form.

use std::path::Path;

use super::refusal::{Refusal, our_fault, whole_file};

use crate::input::{self, Diagnostic, Source};
use crate::junction::{self, Junction, count_text};
use crate::rating::{self, GridTooLarge, Progress, RateError, Rating, Request};

/// A junction file, read and checked.
pub(super) struct Reading {
    pub(super) source: Source,
    /// Remarks that do not stop the work.
    pub(super) remarks: Vec<Diagnostic>,
    pub(super) junction: Junction,
}

/// Reads and checks a file.
pub(super) fn read(path: &Path) -> Result<Reading, Refusal> {
    let (source, document) = input::load(path).map_err(|(source, diagnostics)| Refusal { source, diagnostics })?;
    match junction::build(&document) {
        Ok(junction) => Ok(Reading { source, remarks: document.remarks, junction }),
        Err(diagnostics) => Err(Refusal { source, diagnostics }),
    }
}

/// A drawing whose own lines make more nodes than allowed.
fn too_fine(grid: GridTooLarge) -> Diagnostic {
    let message = format!(
        "the first grid over this drawing needs {} nodes, and the node limit is {}",
        count_text(grid.nodes),
        count_text(grid.limit)
    );
    let help = "let regions share their coordinates and leave out detail that does not matter, or set `--node-limit` \
                well above that number; a million nodes take some 600 MB";
    whole_file(message, Some(help.to_owned()))
}

/// Solves a junction. Grid and fields go as soon as the figures are known: many files may be rated at once.
pub(super) fn rate(
    junction: Junction,
    request: &Request,
    progress: &(dyn Fn(Progress) + Sync),
) -> Result<Rating, Box<Diagnostic>> {
    rating::rate(junction, request, progress).map(|rated| rated.rating).map_err(|error| match error {
        RateError::FirstGrid(grid) => Box::new(too_fine(grid)),
        RateError::Solve(_) => Box::new(our_fault(&error.to_string())),
    })
}
