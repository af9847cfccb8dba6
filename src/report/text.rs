//! A rating for people: what is signed comes first, what a reviewer checks after it.
//!
//! Order: title and environments; whether the bracket was met; Ψ in each dimension system, L and heat flow of each pair;
//! the coldest inside surfaces; warnings; flanks; surfaces; probes; sensitivities; materials; numerical evidence. Several
//! ratings close with a table of them all, and the caution comes last, once.

mod evidence;
mod flanks;
mod head;
mod inputs;
mod results;
mod summary;
mod surfaces;
mod warnings;

use super::caution::CAUTION;
use super::files::{FailedFile, RatedFile};
use super::page::Page;
use super::style::Style;

pub(super) use flanks::{flanks, layer_words};
pub(super) use head::head;
pub(super) use inputs::materials;
pub(super) use warnings::warnings;

/// All ratings as text, each line ended; empty where nothing was rated.
///
/// Files that failed are named in the closing table only: their problems are rendered elsewhere, with the quoted line.
pub fn text(ratings: &[RatedFile], failed: &[FailedFile], style: &Style) -> String {
    let mut page = Page::new(style);
    for (index, rated) in ratings.iter().enumerate() {
        if index > 0 {
            page.blank();
            page.rule();
            page.blank();
        }
        one(&mut page, rated);
    }
    if !ratings.is_empty() && ratings.len() + failed.len() > 1 {
        page.blank();
        page.rule();
        summary::summary(&mut page, ratings, failed);
    }
    if !ratings.is_empty() {
        page.blank();
        page.block(0, CAUTION);
    }
    page.finish()
}

fn one(page: &mut Page<'_>, rated: &RatedFile) {
    let rating = &rated.rating;
    head(page, &rated.file, &rating.junction);
    results::status(page, rating);
    results::pairs(page, rating);
    results::coldest(page, rating);
    warnings(page, &rating.warnings);
    flanks(page, &rating.junction);
    surfaces::surfaces(page, rating);
    surfaces::probes(page, rating);
    inputs::sensitivities(page, rating);
    materials(page, &rating.junction);
    evidence::evidence(page, rating);
}

#[cfg(test)]
mod tests;
