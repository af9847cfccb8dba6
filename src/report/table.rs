//! Aligned columns of text.

use super::lines::{broken, columns, plain};
use super::style::Style;

/// Columns between columns.
const GAP: usize = 2;
/// The least width to which a wrapped column is narrowed.
const LEAST: usize = 8;

/// How a column is set.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Align {
    /// Words: to the left.
    Left,
    /// Words: to the left, broken into several lines where the page is too narrow.
    Wrap,
    /// Numbers: to the right.
    Right,
}

/// A table under construction.
#[derive(Clone, Debug)]
pub(super) struct Table {
    aligns: Vec<Align>,
    heads: Vec<Vec<String>>,
    rows: Vec<Vec<String>>,
}

impl Table {
    /// A table with these heads; a head may have several lines, and all may be empty.
    pub(super) fn new<S: AsRef<str>>(heads: &[(S, Align)]) -> Self {
        Self {
            aligns: heads.iter().map(|(_, align)| *align).collect(),
            heads: heads.iter().map(|(head, _)| head.as_ref().split('\n').map(plain).collect()).collect(),
            rows: Vec::new(),
        }
    }

    /// Adds a row.
    ///
    /// # Panics
    /// If it has not one cell a column.
    pub(super) fn row<const N: usize>(&mut self, cells: [String; N]) {
        assert_eq!(N, self.aligns.len(), "one cell a column");
        self.rows.push(cells.iter().map(|cell| plain(cell)).collect());
    }

    /// Whether it has no row.
    pub(super) fn is_empty(&self) -> bool {
        self.rows.is_empty()
    }

    /// Its lines, indented by `indent`, kept within the page as far as wrapped columns allow.
    pub(super) fn lines(&self, indent: usize, style: &Style) -> Vec<String> {
        let widths = self.widths(style.page_width().saturating_sub(indent));
        let mut lines = Vec::new();
        let head_lines = self.heads.iter().map(Vec::len).max().unwrap_or(0);
        for index in 0..head_lines {
            // Heads stand on the last lines, next to their columns.
            let cells: Vec<&str> = self
                .heads
                .iter()
                .map(|head| (index + head.len()).checked_sub(head_lines).map_or("", |line| head[line].as_str()))
                .collect();
            let line = self.line(&cells, &widths, indent);
            if !line.is_empty() {
                lines.push(style.faint(&line));
            }
        }
        for row in &self.rows {
            let cells: Vec<Vec<String>> = row.iter().zip(&widths).map(|(cell, width)| broken(cell, *width)).collect();
            for index in 0..cells.iter().map(Vec::len).max().unwrap_or(0) {
                let cells: Vec<&str> = cells.iter().map(|cell| cell.get(index).map_or("", String::as_str)).collect();
                lines.push(self.line(&cells, &widths, indent));
            }
        }
        lines
    }

    fn line(&self, cells: &[&str], widths: &[usize], indent: usize) -> String {
        let mut line = " ".repeat(indent);
        for (index, cell) in cells.iter().enumerate() {
            let padding = " ".repeat(widths[index].saturating_sub(columns(cell)));
            match self.aligns[index] {
                Align::Right => line.extend([padding.as_str(), cell]),
                Align::Left | Align::Wrap => line.extend([cell, padding.as_str()]),
            }
            line.push_str(&" ".repeat(GAP));
        }
        line.trim_end().to_owned()
    }

    /// Natural widths; where they are too wide together, the wrapped columns give way, the widest first.
    fn widths(&self, available: usize) -> Vec<usize> {
        let mut widths: Vec<usize> = (0..self.aligns.len())
            .map(|index| {
                let heads = self.heads[index].iter().map(|line| columns(line));
                heads.chain(self.rows.iter().map(|row| columns(&row[index]))).max().unwrap_or(0)
            })
            .collect();
        let total = |widths: &[usize]| widths.iter().sum::<usize>() + GAP * widths.len().saturating_sub(1);
        while total(&widths) > available {
            let wrapped = (0..widths.len()).filter(|&i| self.aligns[i] == Align::Wrap && widths[i] > LEAST);
            match wrapped.max_by_key(|&i| widths[i]) {
                Some(widest) => widths[widest] -= 1,
                None => break,
            }
        }
        widths
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_stand_under_each_other() {
        let mut table = Table::new(&[("material", Align::Wrap), ("λ\nW/(m·K)", Align::Right)]);
        table.row(["mineral wool".into(), "0.035".into()]);
        table.row(["steel".into(), "50".into()]);
        let lines = table.lines(2, &Style::default());
        assert_eq!(
            lines,
            [
                "                      λ",
                "  material      W/(m·K)",
                "  mineral wool    0.035",
                "  steel              50",
            ]
        );
    }

    #[test]
    fn a_long_name_is_broken_where_the_page_is_narrow() {
        let mut table = Table::new(&[("", Align::Wrap), ("", Align::Right)]);
        table.row(["reinforced concrete of the balcony slab with a long name indeed".into(), "2.3".into()]);
        let lines = table.lines(2, &Style { width: 60, ..Style::default() });
        assert_eq!(lines.len(), 2);
        assert!(lines.iter().all(|line| columns(line) <= 60), "{lines:?}");
        assert!(lines[0].ends_with("2.3"));
    }
}
