//! `coldseam verify`: published cases beside what is computed here.

use std::io;

use super::args::{VerifyArguments, VerifyFormat};
use super::outcome::Outcome;
use super::run::Output;
use super::terminal::Terminal;
use crate::report::{Style, verification_json, verification_text};
use crate::verification::{self, CaseResult};

/// Computes and compares all cases.
pub(super) fn verify(arguments: &VerifyArguments, terminal: &Terminal, output: &mut Output<'_>) -> io::Result<Outcome> {
    let cases = verification::run();
    let text = match arguments.format {
        VerifyFormat::Json => verification_json(&cases),
        VerifyFormat::Text => {
            let style = Style { colour: terminal.colour_results, width: terminal.width, ..Style::default() };
            verification_text(&cases, &style)
        }
    };
    output.results(&text)?;
    Ok(if cases.iter().all(CaseResult::holds) { Outcome::Done } else { Outcome::LimitNotMet })
}
