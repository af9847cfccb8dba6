//! Where in a file something stands, as people and editors count it: lines and columns from 1.

use super::diagnostic::{Diagnostic, Severity};
use super::document::Source;

/// The line and column of a byte of the text, both from 1; columns count characters.
///
/// An offset beyond the end is taken as the end, one inside a character as its first byte. A byte-order mark at the
/// very start takes no column.
pub fn line_column(source: &Source, offset: usize) -> (usize, usize) {
    let text = &source.text;
    let before = &text[..char_start(text, offset)];
    let line_start = before.rfind('\n').map_or(0, |newline| newline + 1);
    let line = before.bytes().filter(|byte| *byte == b'\n').count() + 1;
    let column = before[line_start..].trim_start_matches('\u{feff}').chars().count() + 1;
    (line, column)
}

/// The first byte of the character that byte `offset` of the text belongs to; the end for anything beyond.
pub(super) fn char_start(text: &str, offset: usize) -> usize {
    let offset = offset.min(text.len());
    (0..=offset).rev().find(|start| text.is_char_boundary(*start)).unwrap_or(0)
}

/// A diagnostic with its place as line and column: what JSON shows of it.
#[derive(Clone, Debug, PartialEq, Eq, serde::Serialize)]
pub struct LocatedDiagnostic {
    /// `error` or `warning`.
    pub severity: &'static str,
    /// What is wrong.
    pub message: String,
    /// What was expected there; may be empty.
    pub label: String,
    /// What to write instead.
    pub help: Option<String>,
    /// Line, from 1; `None` for a problem of the file as a whole.
    pub line: Option<usize>,
    /// Column in characters, from 1.
    pub column: Option<usize>,
}

impl Diagnostic {
    /// This diagnostic with its place in `source` as line and column.
    pub fn located(&self, source: &Source) -> LocatedDiagnostic {
        let place = self.span.map(|span| line_column(source, span.start));
        LocatedDiagnostic {
            severity: match self.severity {
                Severity::Error => "error",
                Severity::Warning => "warning",
            },
            message: self.message.clone(),
            label: self.label.clone(),
            help: self.help.clone(),
            line: place.map(|(line, _)| line),
            column: place.map(|(_, column)| column),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn place(text: &str, offset: usize) -> (usize, usize) {
        line_column(&Source { name: String::new(), text: text.to_owned() }, offset)
    }

    #[test]
    fn lines_and_columns_count_from_one() {
        assert_eq!(place("", 0), (1, 1));
        assert_eq!(place("ab\ncd", 1), (1, 2));
        assert_eq!(place("ab\ncd", 3), (2, 1));
        assert_eq!(place("ab\r\ncd", 5), (2, 2));
        assert_eq!(place("ab\n", 99), (2, 1));
    }

    #[test]
    fn columns_count_characters_and_skip_the_byte_order_mark() {
        assert_eq!(place("λ: 2", 4), (1, 4));
        assert_eq!(place("λ: 2", 1), (1, 1));
        assert_eq!(place("\u{feff}ab", 4), (1, 2));
    }
}
