//! A symmetric matrix on a lattice in which every unknown knows its eight neighbours at most.

use rayon::prelude::*;

/// Work on fewer unknowns than this is not worth handing to another thread.
pub(super) const PARALLEL_FROM: usize = 16_384;

/// A symmetric nine-point matrix on `width × lines` unknowns, numbered line by line.
///
/// Only the couplings to later unknowns are kept: east, north, north-east and north-west.
#[derive(Clone, Debug)]
pub(super) struct Stencil {
    pub(super) width: usize,
    pub(super) lines: usize,
    pub(super) centre: Vec<f64>,
    pub(super) east: Vec<f64>,
    pub(super) north: Vec<f64>,
    /// Empty where the matrix has five points only.
    pub(super) north_east: Vec<f64>,
    /// Empty where the matrix has five points only.
    pub(super) north_west: Vec<f64>,
}

impl Stencil {
    /// A zero matrix with room for the four straight neighbours.
    pub(super) fn five_point([width, lines]: [usize; 2]) -> Self {
        let zeros = || vec![0.0; width * lines];
        let (north_east, north_west) = (Vec::new(), Vec::new());
        Self { width, lines, centre: zeros(), east: zeros(), north: zeros(), north_east, north_west }
    }

    /// A zero matrix with room for all eight neighbours.
    pub(super) fn nine_point(lattice: [usize; 2]) -> Self {
        let empty = Self::five_point(lattice);
        let zeros = || vec![0.0; lattice[0] * lattice[1]];
        Self { north_east: zeros(), north_west: zeros(), ..empty }
    }

    pub(super) fn has_diagonals(&self) -> bool {
        !self.north_east.is_empty()
    }

    /// Adds to the diagonal entry of an unknown.
    pub(super) fn add_diagonal(&mut self, unknown: usize, value: f64) {
        self.centre[unknown] += value;
    }

    /// Adds to the entry, and its mirror image, that couples two neighbours.
    ///
    /// # Panics
    /// If the two are not neighbours on the lattice.
    pub(super) fn add_coupling(&mut self, first: usize, second: usize, value: f64) {
        let (low, high) = (first.min(second), first.max(second));
        // Lines count, not the distance of the numbers alone: on two unknowns a line, east and north-west are both 1 away.
        let lines_up = high / self.width - low / self.width;
        let columns_right = (high % self.width) as isize - (low % self.width) as isize;
        let entry = match (lines_up, columns_right) {
            (0, 1) => &mut self.east[low],
            (1, 0) => &mut self.north[low],
            (1, 1) => &mut self.north_east[low],
            (1, -1) => &mut self.north_west[low],
            _ => panic!("unknowns {first} and {second} are no neighbours"),
        };
        *entry += value;
    }

    /// Takes an unknown out of the system: its value in problem k is `values[k]`, and its couplings move to that
    /// problem's right-hand side.
    pub(super) fn fix(&mut self, unknown: usize, values: &[f64], right_hand_sides: &mut [Vec<f64>]) {
        self.for_each_coupling(unknown, |entry, other| {
            for (value, right_hand_side) in values.iter().zip(right_hand_sides.iter_mut()) {
                right_hand_side[other] -= *entry * value;
            }
            *entry = 0.0;
        });
        self.centre[unknown] = 1.0;
        for (value, right_hand_side) in values.iter().zip(right_hand_sides) {
            right_hand_side[unknown] = *value;
        }
    }

    fn for_each_coupling(&mut self, unknown: usize, mut visit: impl FnMut(&mut f64, usize)) {
        let (column, line) = (unknown % self.width, unknown / self.width);
        let (first, last) = (column == 0, column + 1 == self.width);
        let (bottom, top) = (line == 0, line + 1 == self.lines);
        if !last {
            visit(&mut self.east[unknown], unknown + 1);
        }
        if !first {
            visit(&mut self.east[unknown - 1], unknown - 1);
        }
        if !top {
            visit(&mut self.north[unknown], unknown + self.width);
        }
        if !bottom {
            visit(&mut self.north[unknown - self.width], unknown - self.width);
        }
        if !self.has_diagonals() {
            return;
        }
        if !top && !last {
            visit(&mut self.north_east[unknown], unknown + self.width + 1);
        }
        if !top && !first {
            visit(&mut self.north_west[unknown], unknown + self.width - 1);
        }
        if !bottom && !first {
            let other = unknown - self.width - 1;
            visit(&mut self.north_east[other], other);
        }
        if !bottom && !last {
            let other = unknown - self.width + 1;
            visit(&mut self.north_west[other], other);
        }
    }

    /// Makes rows without any entry the identity, so that places outside the solid keep the value zero.
    pub(super) fn close_empty_rows(&mut self) {
        for centre in &mut self.centre {
            if *centre == 0.0 {
                *centre = 1.0;
            }
        }
    }

    /// The product with `x`, into `out`. The same digits on any number of threads.
    pub(super) fn multiply(&self, x: &[f64], out: &mut [f64]) {
        let width = self.width;
        let line = |(line, out): (usize, &mut [f64])| {
            let at = line * width;
            let own = &x[at..at + width];
            let (centre, east) = (&self.centre[at..at + width], &self.east[at..at + width]);
            for i in 0..width {
                out[i] = centre[i] * own[i];
            }
            for i in 1..width {
                out[i - 1] += east[i - 1] * own[i];
                out[i] += east[i - 1] * own[i - 1];
            }
            if line + 1 < self.lines {
                self.add_above(out, at, &x[at + width..at + 2 * width], 1.0);
            }
            if line > 0 {
                self.add_below(out, at - width, &x[at - width..at], 1.0);
            }
        };
        if x.len() >= PARALLEL_FROM {
            out.par_chunks_mut(width).with_min_len(8).enumerate().for_each(line);
        } else {
            out.chunks_mut(width).enumerate().for_each(line);
        }
    }

    /// Adds `sign` × (couplings of the line starting at `at` to the line above) × `above` to `out`.
    pub(super) fn add_above(&self, out: &mut [f64], at: usize, above: &[f64], sign: f64) {
        let width = self.width;
        let (out, above) = (&mut out[..width], &above[..width]);
        let north = &self.north[at..at + width];
        if !self.has_diagonals() {
            for i in 0..width {
                out[i] += sign * north[i] * above[i];
            }
            return;
        }
        let (north_east, north_west) = (&self.north_east[at..at + width], &self.north_west[at..at + width]);
        for i in 0..width {
            out[i] += sign * north[i] * above[i];
        }
        for i in 1..width {
            out[i - 1] += sign * north_east[i - 1] * above[i];
            out[i] += sign * north_west[i] * above[i - 1];
        }
    }

    /// Adds `sign` × (couplings of the line above to the line starting at `at`) × `below` to `out`, a part of the
    /// line above.
    pub(super) fn add_below(&self, out: &mut [f64], at: usize, below: &[f64], sign: f64) {
        let width = self.width;
        let (out, below) = (&mut out[..width], &below[..width]);
        let north = &self.north[at..at + width];
        for i in 0..width {
            out[i] += sign * north[i] * below[i];
        }
        if !self.has_diagonals() {
            return;
        }
        let (north_east, north_west) = (&self.north_east[at..at + width], &self.north_west[at..at + width]);
        for i in 1..width {
            out[i] += sign * north_east[i - 1] * below[i - 1];
            out[i - 1] += sign * north_west[i] * below[i];
        }
    }
}
