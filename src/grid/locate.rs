//! Finding the cell at a point, and values between nodes.

use super::cell::Cell;
use super::lattice::Grid;

/// A point this fraction of the model's size outside a cell still counts as on its edge.
const EDGE_FRACTION: f64 = 1e-9;

impl Grid {
    /// A solid cell that holds the point, edges included; `None` where no solid is.
    pub fn cell_holding(&self, at: [f64; 2]) -> Option<Cell> {
        let slack = EDGE_FRACTION * self.sheet().size_m();
        let candidates = |lines: &[f64], value: f64| {
            let upper = lines.partition_point(|&line| line <= value + slack);
            let lower = lines.partition_point(|&line| line < value - slack);
            lower.saturating_sub(1)..upper.min(lines.len() - 1)
        };
        let rows = candidates(&self.y.at, at[1]);
        rows.flat_map(|row| candidates(&self.x.at, at[0]).map(move |column| (column, row)))
            .find(|&(column, row)| self.part(column, row).is_some())
            .map(|(column, row)| self.cell_at(self.cell_id(column, row)))
    }

    /// The bilinear value at a point of a cell from values at its corners.
    pub fn interpolate(&self, cell: &Cell, corners: [f64; 4], at: [f64; 2]) -> f64 {
        let [south_west, _, _, north_east] = cell.shape.corners.map(|node| self.position(node));
        let u = ((at[0] - south_west[0]) / (north_east[0] - south_west[0])).clamp(0.0, 1.0);
        let v = ((at[1] - south_west[1]) / (north_east[1] - south_west[1])).clamp(0.0, 1.0);
        let [sw, se, nw, ne] = corners;
        (1.0 - v) * ((1.0 - u) * sw + u * se) + v * ((1.0 - u) * nw + u * ne)
    }

    /// The longer side of the model, in metres.
    pub fn size_m(&self) -> f64 {
        self.sheet().size_m()
    }

    /// The crossing of the drawing's own lines that is nearest to a point, in metres.
    pub fn nearest_drawn_corner(&self, at: [f64; 2]) -> [f64; 2] {
        let nearest = |lines: &[f64], value: f64| {
            let by_distance = |a: &&f64, b: &&f64| (**a - value).abs().total_cmp(&(**b - value).abs());
            *lines.iter().min_by(by_distance).expect("a sheet has lines")
        };
        [nearest(self.sheet().x_lines(), at[0]), nearest(self.sheet().y_lines(), at[1])]
    }
}
