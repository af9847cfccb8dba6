//! `coldseam check`: what was understood of junction files, without solving.

use std::io;

use super::args::CheckArguments;
use super::files::junction_files;
use super::outcome::Outcome;
use super::pipeline;
use super::run::Output;
use super::terminal::Terminal;
use crate::input;
use crate::report::{Style, understood};

/// Checks all files and prints what was understood, in the order given.
pub(super) fn check(arguments: &CheckArguments, terminal: &Terminal, output: &mut Output<'_>) -> io::Result<Outcome> {
    let style = Style { colour: terminal.colour_results, width: terminal.width, units: arguments.units.into() };
    let mut outcome = Outcome::Done;
    let mut printed = false;
    for file in arguments.files.iter().flat_map(|path| junction_files(path)) {
        match file.and_then(|path| pipeline::read(&path)) {
            Ok(reading) => {
                if !reading.remarks.is_empty() {
                    let remarks = input::render(&reading.source, &reading.remarks, terminal.colour_messages);
                    output.messages(&remarks);
                }
                if printed {
                    output.results(&format!("\n{}\n\n", "─".repeat(terminal.width.min(80))))?;
                }
                printed = true;
                output.results(&understood(&reading.source.name, &reading.junction, &style))?;
            }
            Err(refusal) => {
                output.messages(&refusal.rendered(terminal.colour_messages));
                outcome = outcome.worse(Outcome::InputAtFault);
            }
        }
    }
    Ok(outcome)
}
