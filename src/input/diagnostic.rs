//! A problem or a remark as data: what, where, and what to write instead. Drawing it is `render`'s job.

use super::document::Span;

/// Whether a diagnostic stops the work.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// The input cannot be rated.
    Error,
    /// Worth a look; the work goes on.
    Warning,
}

/// A further place that explains a diagnostic, such as where a name was first defined.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Related {
    /// The place.
    pub span: Span,
    /// What it is, in a few words.
    pub label: String,
}

/// One complaint about an input file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Diagnostic {
    /// Error or warning.
    pub severity: Severity,
    /// Where; `None` for a problem of the file as a whole (not UTF-8, too large, missing).
    pub span: Option<Span>,
    /// What is wrong, one sentence without a full stop.
    pub message: String,
    /// What was expected, shown beside the quoted line; may be empty.
    pub label: String,
    /// What to write instead, or the nearest name.
    pub help: Option<String>,
    /// Further places.
    pub related: Vec<Related>,
}
