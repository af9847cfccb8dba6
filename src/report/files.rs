//! What is reported on: a file that was rated, and one that could not be.

use crate::input::Severity;
use crate::rating::Rating;

/// A complaint about a file, its place already counted in lines and columns.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// Line, from 1; `None` for a problem of the file as a whole.
    pub line: Option<usize>,
    /// Column in characters, from 1.
    pub column: Option<usize>,
    /// Whether it stopped the work.
    pub severity: Severity,
    /// What is wrong.
    pub message: String,
    /// What was expected there; may be empty.
    pub label: String,
    /// What to write instead.
    pub help: Option<String>,
}

impl Problem {
    /// A problem of a file as a whole.
    pub fn of_whole_file(message: impl Into<String>, help: Option<String>) -> Self {
        Self {
            line: None,
            column: None,
            severity: Severity::Error,
            message: message.into(),
            label: String::new(),
            help,
        }
    }
}

/// A file that was rated.
#[derive(Clone, Debug)]
pub struct RatedFile {
    /// The path as the user wrote it.
    pub file: String,
    /// Remarks made while reading it.
    pub remarks: Vec<Problem>,
    /// Its figures.
    pub rating: Rating,
}

/// A file that could not be rated.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FailedFile {
    /// The path as the user wrote it.
    pub file: String,
    /// Why; at least one.
    pub problems: Vec<Problem>,
}
