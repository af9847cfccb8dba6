//! Where the output goes.

use std::io::{IsTerminal, stderr, stdout};

/// The page width where output does not go to a terminal.
const USUAL_WIDTH: usize = 80;

/// What a run needs to know of the places it writes to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Terminal {
    /// Whether results may be coloured.
    pub colour_results: bool,
    /// Whether messages may be coloured.
    pub colour_messages: bool,
    /// Columns of the page for results.
    pub width: usize,
    /// Whether a progress bar may be drawn on the process's standard error.
    pub progress: bool,
}

impl Default for Terminal {
    /// A pipe.
    fn default() -> Self {
        Self { colour_results: false, colour_messages: false, width: USUAL_WIDTH, progress: false }
    }
}

impl Terminal {
    /// What the process's standard output and error are; `NO_COLOR`, unless empty, forbids colour.
    pub fn detect() -> Self {
        let colour = std::env::var_os("NO_COLOR").is_none_or(|value| value.is_empty());
        let width = terminal_size::terminal_size_of(stdout()).map(|(width, _)| usize::from(width.0));
        Self {
            colour_results: colour && stdout().is_terminal(),
            colour_messages: colour && stderr().is_terminal(),
            width: width.unwrap_or(USUAL_WIDTH),
            progress: stderr().is_terminal(),
        }
    }
}
