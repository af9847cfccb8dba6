//! How a text report is dressed.

use super::units::Units;

/// The widest line of running text: longer ones are hard to read.
const WIDEST: usize = 120;
/// The narrowest page that is laid out for; a narrower terminal breaks the lines itself.
const NARROWEST: usize = 60;

/// How a text report is dressed. It holds all that a report knows of the place where it will be read.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Style {
    /// Whether headings and warnings are set off by escape sequences.
    pub colour: bool,
    /// Columns of the page; kept within 60 to 120.
    pub width: usize,
    /// The units to print in.
    pub units: Units,
}

impl Default for Style {
    fn default() -> Self {
        Self { colour: false, width: 80, units: Units::Si }
    }
}

impl Style {
    /// The width that lines are broken at.
    pub(super) fn page_width(&self) -> usize {
        self.width.clamp(NARROWEST, WIDEST)
    }

    fn dressed(&self, text: &str, code: &str) -> String {
        if self.colour && !text.is_empty() { format!("\u{1b}[{code}m{text}\u{1b}[0m") } else { text.to_owned() }
    }

    /// A heading: bold.
    pub(super) fn heading(&self, text: &str) -> String {
        self.dressed(text, "1")
    }

    /// What can be skipped at first reading, such as the heads of columns: faint.
    pub(super) fn faint(&self, text: &str) -> String {
        self.dressed(text, "2")
    }

    /// What must not be overlooked: bold and in the terminal's third colour.
    pub(super) fn alert(&self, text: &str) -> String {
        self.dressed(text, "1;33")
    }
}
