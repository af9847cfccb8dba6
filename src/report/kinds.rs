//! The words for kinds of environment, alike in all formats.

use crate::input::EnvironmentKind;

/// internal, unheated or external.
pub(super) fn kind_word(kind: EnvironmentKind) -> &'static str {
    match kind {
        EnvironmentKind::Internal => "internal",
        EnvironmentKind::Unheated => "unheated",
        EnvironmentKind::External => "external",
    }
}
