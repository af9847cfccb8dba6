//! The sheet's lines: every coordinate of a vertex, those closer than a millionth of the drawing's size made one.

use crate::input::{Region, Shape};

/// Vertices closer than this fraction of the drawing's longer side are one vertex. Six digits separate rounding in the
/// file's arithmetic from the thinnest foil anybody draws (4 µm in a section of 4 m).
const SAME_VERTEX_FRACTION: f64 = 1e-6;

/// The lines of the sheet, in metres, rising.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Lines {
    /// Upright lines.
    pub(super) x: Vec<f64>,
    /// Level lines.
    pub(super) y: Vec<f64>,
    /// Distance below which two coordinates are one.
    pub(super) tolerance_m: f64,
}

impl Lines {
    /// The lines through every vertex of the regions.
    pub(super) fn of(regions: &[Region]) -> Self {
        let (mut x, mut y) = (Vec::new(), Vec::new());
        for region in regions {
            match &region.shape {
                Shape::Box { x: bounds_x, y: bounds_y } => {
                    x.extend(bounds_x);
                    y.extend(bounds_y);
                }
                Shape::Outline(points) => {
                    x.extend(points.iter().map(|point| point.value[0]));
                    y.extend(points.iter().map(|point| point.value[1]));
                }
            }
        }
        x.sort_by(f64::total_cmp);
        y.sort_by(f64::total_cmp);
        let extent = |sorted: &[f64]| sorted.last().zip(sorted.first()).map_or(0.0, |(last, first)| last - first);
        let tolerance_m = SAME_VERTEX_FRACTION * extent(&x).max(extent(&y));
        Self { x: merged(&x, tolerance_m), y: merged(&y, tolerance_m), tolerance_m }
    }

    /// Number of columns of fields between the lines.
    pub(super) fn columns(&self) -> usize {
        self.x.len().saturating_sub(1)
    }

    /// Number of rows of fields.
    pub(super) fn rows(&self) -> usize {
        self.y.len().saturating_sub(1)
    }

    /// The upright line that a vertex at `x` belongs to.
    pub(super) fn upright(&self, x: f64) -> usize {
        line_of(&self.x, x)
    }

    /// The level line that a vertex at `y` belongs to.
    pub(super) fn level(&self, y: f64) -> usize {
        line_of(&self.y, y)
    }
}

/// Keeps the first of each cluster of sorted values.
fn merged(sorted: &[f64], tolerance_m: f64) -> Vec<f64> {
    let mut lines: Vec<f64> = Vec::new();
    for &value in sorted {
        if lines.last().is_none_or(|&line| value - line > tolerance_m) {
            lines.push(value);
        }
    }
    lines
}

/// The last line not above `value`: clusters keep their first value, so this is the cluster's line.
fn line_of(lines: &[f64], value: f64) -> usize {
    lines.partition_point(|&line| line <= value).saturating_sub(1)
}

/// The line within `tolerance_m` of `value`, if there is one.
pub(super) fn line_at(lines: &[f64], value: f64, tolerance_m: f64) -> Option<usize> {
    let above = lines.partition_point(|&line| line < value);
    [above.checked_sub(1), Some(above)]
        .into_iter()
        .flatten()
        .filter(|&line| line < lines.len() && (lines[line] - value).abs() <= tolerance_m)
        .min_by(|&a, &b| (lines[a] - value).abs().total_cmp(&(lines[b] - value).abs()))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rounding_in_the_files_arithmetic_makes_no_second_line() {
        // 0.1 + 0.2 differs from 0.3 in the last place
        let mut values = vec![0.0, 0.1 + 0.2, 0.3, 1.0];
        values.sort_by(f64::total_cmp);
        let lines = merged(&values, 1e-6);
        assert_eq!(lines.len(), 3);
        assert_eq!(line_of(&lines, 0.1 + 0.2), 1);
        assert_eq!(line_of(&lines, 0.3), 1);
        assert_eq!(line_of(&lines, 1.0), 2);
    }

    #[test]
    fn the_nearest_line_within_tolerance_is_found_from_both_sides() {
        let lines = [0.0, 0.3, 1.0];
        assert_eq!(line_at(&lines, 0.3 + 1e-9, 1e-6), Some(1));
        assert_eq!(line_at(&lines, 0.3 - 1e-9, 1e-6), Some(1));
        assert_eq!(line_at(&lines, 0.5, 1e-6), None);
        assert_eq!(line_at(&lines, 1.0 + 1e-9, 1e-6), Some(2));
    }
}
