//! Why a file has no result, in the one form that all of it takes before it is shown.

use std::path::Path;

use crate::input::{self, Diagnostic, Severity, Source};
use crate::report::{FailedFile, Problem};

/// Why a file has no result.
#[derive(Clone, Debug)]
pub(super) struct Refusal {
    pub(super) source: Source,
    pub(super) diagnostics: Vec<Diagnostic>,
}

impl Refusal {
    /// For a file or folder as a whole.
    pub(super) fn of_path(path: &Path, message: String, help: Option<String>) -> Self {
        Self {
            source: Source { name: path.display().to_string(), text: String::new() },
            diagnostics: vec![whole_file(message, help)],
        }
    }

    /// For people, with the lines quoted.
    pub(super) fn rendered(&self, colour: bool) -> String {
        input::render(&self.source, &self.diagnostics, colour)
    }

    /// For reports.
    pub(super) fn failed_file(&self) -> FailedFile {
        FailedFile { file: self.source.name.clone(), problems: problems(&self.source, &self.diagnostics) }
    }
}

/// An error of the file as a whole.
pub(super) fn whole_file(message: String, help: Option<String>) -> Diagnostic {
    Diagnostic { severity: Severity::Error, span: None, message, label: String::new(), help, related: Vec::new() }
}

/// A failure that is ours, said so plainly, with what to send.
pub(super) fn our_fault(message: &str) -> Diagnostic {
    let help = format!(
        "this is a fault of Coldseam, not of the file: please report it with this message, the file, and the version \
         ({})",
        env!("CARGO_PKG_VERSION")
    );
    whole_file(format!("a check inside Coldseam failed, so there is no result: {message}"), Some(help))
}

/// Diagnostics with their places counted in lines and columns.
pub(super) fn problems(source: &Source, diagnostics: &[Diagnostic]) -> Vec<Problem> {
    let offsets: Vec<usize> = diagnostics.iter().filter_map(|diagnostic| Some(diagnostic.span?.start)).collect();
    let mut places = input::line_columns(source, &offsets).into_iter();
    diagnostics
        .iter()
        .map(|diagnostic| {
            let place = diagnostic.span.and_then(|_| places.next());
            Problem {
                line: place.map(|(line, _)| line),
                column: place.map(|(_, column)| column),
                severity: diagnostic.severity,
                message: diagnostic.message.clone(),
                label: diagnostic.label.clone(),
                help: diagnostic.help.clone(),
            }
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn our_faults_say_so_and_what_to_send() {
        let diagnostic = our_fault("the two sides differ from their local terms by 0.01");
        assert!(diagnostic.message.starts_with("a check inside Coldseam failed"));
        let help = diagnostic.help.unwrap();
        assert!(help.contains("not of the file") && help.contains(env!("CARGO_PKG_VERSION")), "{help}");
    }

    #[test]
    fn whole_file_problems_have_no_place() {
        let failed = Refusal::of_path(Path::new("a/b"), "empty".into(), None).failed_file();
        assert_eq!(failed.file, "a/b");
        assert_eq!((failed.problems[0].line, failed.problems[0].column), (None, None));
    }
}
