//! Connected groups of fields, and what lies beside each.

use super::painting::{Paint, Painting};
use crate::index::EnvironmentId;
use std::cmp::Reverse;

/// Fields joined edge to edge.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Group {
    /// The first of its fields, counted row by row from the bottom.
    pub(super) first: usize,
    /// Its extent along x, in metres.
    pub(super) x: [f64; 2],
    /// Its extent along y, in metres.
    pub(super) y: [f64; 2],
    /// The solid field beside it that was painted last, and the field of the group there.
    pub(super) solid: Option<[usize; 2]>,
    /// The environments beside it: the first two met, as one, several or none is all that matters.
    pub(super) airs: Vec<EnvironmentId>,
    /// Whether an unpainted field lies beside it.
    pub(super) unpainted: bool,
}

/// The connected groups of fields that are `members`, in the order of their first fields.
pub(super) fn groups(painting: &Painting, members: impl Fn(Paint) -> bool) -> Vec<Group> {
    let paints = &painting.paints;
    let (columns, rows) = (painting.lines.columns(), painting.lines.rows());
    let mut visited = vec![false; paints.len()];
    let mut groups = Vec::new();
    let mut waiting = Vec::new();
    for first in 0..paints.len() {
        if visited[first] || !members(paints[first]) {
            continue;
        }
        visited[first] = true;
        waiting.push(first);
        let mut spread = Spread::new(first, columns);
        while let Some(field) = waiting.pop() {
            let (column, row) = (field % columns, field / columns);
            spread.reach(column, row);
            let neighbours = [
                (column > 0).then(|| field - 1),
                (column + 1 < columns).then(|| field + 1),
                (row > 0).then(|| field - columns),
                (row + 1 < rows).then(|| field + columns),
            ];
            for neighbour in neighbours.into_iter().flatten() {
                if !members(paints[neighbour]) {
                    spread.meet(painting, neighbour, field);
                } else if !visited[neighbour] {
                    visited[neighbour] = true;
                    waiting.push(neighbour);
                }
            }
        }
        groups.push(spread.group(painting));
    }
    groups
}

/// A group in the making.
struct Spread {
    first: usize,
    columns: [usize; 2],
    rows: [usize; 2],
    solid: Option<[usize; 2]>,
    airs: Vec<EnvironmentId>,
    unpainted: bool,
}

impl Spread {
    fn new(first: usize, columns: usize) -> Self {
        let (column, row) = (first % columns, first / columns);
        Self { first, columns: [column; 2], rows: [row; 2], solid: None, airs: Vec::new(), unpainted: false }
    }

    fn reach(&mut self, column: usize, row: usize) {
        self.columns = [self.columns[0].min(column), self.columns[1].max(column)];
        self.rows = [self.rows[0].min(row), self.rows[1].max(row)];
    }

    fn meet(&mut self, painting: &Painting, neighbour: usize, field: usize) {
        match painting.paints[neighbour] {
            Paint::Solid(_) => {
                // of one region the first field, whatever the order in which the group is walked
                let rank = |field: usize| (painting.regions[field], Reverse(field));
                if self.solid.is_none_or(|[found, _]| rank(found) < rank(neighbour)) {
                    self.solid = Some([neighbour, field]);
                }
            }
            Paint::Air(environment) if self.airs.len() < 2 && !self.airs.contains(&environment) => {
                self.airs.push(environment);
            }
            Paint::Nothing => self.unpainted = true,
            Paint::Air(_) | Paint::Void => {}
        }
    }

    fn group(self, painting: &Painting) -> Group {
        let extent = |lines: &[f64], [first, last]: [usize; 2]| [lines[first], lines[last + 1]];
        Group {
            first: self.first,
            x: extent(&painting.lines.x, self.columns),
            y: extent(&painting.lines.y, self.rows),
            solid: self.solid,
            airs: self.airs,
            unpainted: self.unpainted,
        }
    }
}
