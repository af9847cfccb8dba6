//! A text report under construction: headings, paragraphs, tables.

use super::lines::{broken, broken_after, columns, plain};
use super::style::Style;
use super::table::Table;

/// A text report under construction.
pub(super) struct Page<'a> {
    style: &'a Style,
    text: String,
}

impl<'a> Page<'a> {
    pub(super) fn new(style: &'a Style) -> Self {
        Self { style, text: String::new() }
    }

    pub(super) fn style(&self) -> &'a Style {
        self.style
    }

    /// What has been written, ending with a line break.
    pub(super) fn finish(self) -> String {
        self.text
    }

    fn push(&mut self, line: &str) {
        self.text.push_str(line);
        self.text.push('\n');
    }

    pub(super) fn blank(&mut self) {
        self.push("");
    }

    /// A line across the page.
    pub(super) fn rule(&mut self) {
        self.push(&self.style.faint(&"─".repeat(self.style.page_width())));
    }

    /// A heading, with an empty line above it.
    pub(super) fn heading(&mut self, text: &str) {
        if !self.text.is_empty() {
            self.blank();
        }
        self.title(text);
    }

    /// A heading without an empty line above it.
    pub(super) fn title(&mut self, text: &str) {
        for line in broken(&plain(text), self.style.page_width()) {
            self.push(&self.style.heading(&line));
        }
    }

    /// A paragraph, its first line indented by `indent`, the others by two more.
    pub(super) fn paragraph(&mut self, indent: usize, text: &str) {
        self.item(&" ".repeat(indent), indent + 2, text);
    }

    /// A paragraph whose lines are all indented alike.
    pub(super) fn block(&mut self, indent: usize, text: &str) {
        self.item(&" ".repeat(indent), indent, text);
    }

    /// A paragraph that must not be overlooked.
    pub(super) fn alert(&mut self, indent: usize, text: &str) {
        for line in broken(&plain(text), self.style.page_width() - indent) {
            self.push(&format!("{}{}", " ".repeat(indent), self.style.alert(&line)));
        }
    }

    /// A paragraph with a mark before its first line, its other lines indented by `hanging`.
    pub(super) fn item(&mut self, mark: &str, hanging: usize, text: &str) {
        let width = self.style.page_width();
        let first = width.saturating_sub(columns(mark));
        for (index, line) in broken_after(&plain(text), first, width.saturating_sub(hanging)).iter().enumerate() {
            let lead = if index == 0 { mark.to_owned() } else { " ".repeat(hanging) };
            self.push(format!("{lead}{line}").trim_end());
        }
    }

    /// A table.
    pub(super) fn table(&mut self, indent: usize, table: &Table) {
        for line in table.lines(indent, self.style) {
            self.push(&line);
        }
    }

    /// Lines to be pasted elsewhere, so never broken.
    pub(super) fn verbatim(&mut self, indent: usize, text: &str) {
        for line in text.lines() {
            self.push(format!("{}{}", " ".repeat(indent), plain(line)).trim_end());
        }
    }
}
