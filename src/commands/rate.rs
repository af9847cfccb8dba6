//! `coldseam rate`: solve junctions and print their figures.

use std::io;
use std::path::{Path, PathBuf};

use rayon::prelude::*;

use super::args::{Format, RateArguments};
use super::files::junction_files;
use super::outcome::Outcome;
use super::pipeline;
use super::progress::Progress;
use super::refusal::{Refusal, problems};
use super::run::Output;
use super::terminal::Terminal;
use crate::rating::{self, Request};
use crate::report::{self, FailedFile, RatedFile, Style};

/// What became of one file: its figures or why there are none, and what to tell people about it.
struct Attempt {
    result: Result<RatedFile, FailedFile>,
    messages: String,
}

/// Rates all files and prints the results in the order given.
///
/// Messages go to standard error in every format: whoever looks sees them, and a program that reads JSON has the same
/// problems as data under `failed` and `remarks`.
pub(super) fn rate(arguments: &RateArguments, terminal: &Terminal, output: &mut Output<'_>) -> io::Result<Outcome> {
    let files: Vec<_> = arguments.files.iter().flat_map(|path| junction_files(path)).collect();
    let progress = Progress::new(files.len(), terminal.progress);
    let request = arguments.request();
    let all = || -> Vec<Attempt> {
        let numbered = files.into_par_iter().enumerate();
        numbered.map(|(number, file)| attempt(number, file, &request, terminal, &progress)).collect()
    };
    let pool = rayon::ThreadPoolBuilder::new().num_threads(arguments.threads.unwrap_or(0)).build();
    let attempts = match pool {
        Ok(pool) => pool.install(all),
        // Without threads of its own the work still gets done.
        Err(_) => all(),
    };
    progress.clear();

    let (mut ratings, mut failed) = (Vec::new(), Vec::new());
    for attempt in attempts {
        output.messages(&attempt.messages);
        match attempt.result {
            Ok(rated) => ratings.push(rated),
            Err(file) => failed.push(file),
        }
    }
    let text = match arguments.format {
        Format::Json => report::json(&ratings, &failed),
        Format::Csv => report::csv(&ratings),
        Format::Text => {
            let style = Style { colour: terminal.colour_results, width: terminal.width, units: arguments.units.into() };
            report::text(&ratings, &failed, &style)
        }
    };
    output.results(&text)?;
    Ok(outcome(&ratings, &failed))
}

fn attempt(
    number: usize,
    file: Result<PathBuf, Refusal>,
    request: &Request,
    terminal: &Terminal,
    progress: &Progress,
) -> Attempt {
    let result = file.and_then(|path| one(&path, request, &|pass| progress.pass(number, pass)));
    progress.done(number);
    match result {
        Ok(rated) => Attempt { result: Ok(rated), messages: String::new() },
        Err(refusal) => {
            Attempt { result: Err(refusal.failed_file()), messages: refusal.rendered(terminal.colour_messages) }
        }
    }
}

/// Reads and solves one file. Remarks of the reading are among the rating's warnings; JSON has them with their places.
fn one(path: &Path, request: &Request, progress: &(dyn Fn(rating::Progress) + Sync)) -> Result<RatedFile, Refusal> {
    let reading = pipeline::read(path)?;
    let remarks = problems(&reading.source, &reading.remarks);
    match pipeline::rate(reading.junction, request, progress) {
        Ok(rating) => Ok(RatedFile { file: reading.source.name, remarks, rating }),
        Err(diagnostic) => Err(Refusal { source: reading.source, diagnostics: vec![*diagnostic] }),
    }
}

fn outcome(ratings: &[RatedFile], failed: &[FailedFile]) -> Outcome {
    let of_rating = |rated: &RatedFile| if rated.rating.bracket_met { Outcome::Done } else { Outcome::LimitNotMet };
    let of_failed = failed.iter().map(|_| Outcome::InputAtFault);
    ratings.iter().map(of_rating).chain(of_failed).fold(Outcome::Done, Outcome::worse)
}
