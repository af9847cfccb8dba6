//! Splitting: where the gap lies decides which intervals are bisected, and values at nodes move to the new grid.

use super::grading::AxisLines;
use super::lattice::Grid;

/// Intervals shorter than this fraction of the model's size are not split: below it, differences of temperatures
/// drown in rounding (measured on four-material corners, where cells of 1e-9 brought noise of 1e-5).
const SMALLEST_INTERVAL_FRACTION: f64 = 1e-7;

/// Each pass splits the intervals that hold this share of the gap, largest first. More of it makes fewer, larger
/// passes; less makes many passes that each solve anew.
const SHARE_TO_SPLIT: f64 = 0.5;

/// Intervals whose gaps differ by no more than this fraction are split together: mirrored drawings get mirrored grids,
/// and digits that the solver leaves open decide nothing.
const TIE: f64 = 1e-6;

/// Which intervals to bisect.
#[derive(Clone, Debug, PartialEq)]
pub struct Splitting {
    columns: Vec<bool>,
    rows: Vec<bool>,
}

/// An interval that could be bisected: the gap it would cure, whether it is a column, its number.
type Candidate = (f64, bool, usize);

impl Grid {
    /// The gap of every interval from that of each cell: `gap[cell] = [cured by splitting along x, along y]`. Those that
    /// can still be split, and the sum of all.
    fn candidates(&self, gap: &[[f64; 2]]) -> (Vec<Candidate>, f64) {
        assert_eq!(gap.len(), self.cell_count(), "one gap a cell");
        let mut columns = vec![0.0; self.columns()];
        let mut rows = vec![0.0; self.rows()];
        for (k, [along_x, along_y]) in gap.iter().enumerate() {
            columns[k % self.columns()] += along_x;
            rows[k / self.columns()] += along_y;
        }
        let total = columns.iter().chain(&rows).sum();
        let columns = columns.into_iter().enumerate().map(|(k, gap)| (gap, true, k));
        let rows = rows.into_iter().enumerate().map(|(k, gap)| (gap, false, k));
        let lines = |is_column: bool| if is_column { &self.x } else { &self.y };
        let splittable = |&(gap, is_column, k): &Candidate| gap > 0.0 && self.is_splittable(lines(is_column), k);
        (columns.chain(rows).filter(splittable).collect(), total)
    }

    /// The share of a gap (0 to 1) that lies where nothing can be split any more; 0 where there is none.
    ///
    /// # Panics
    /// If the slice does not have one entry a cell.
    pub fn exhausted_share(&self, gap: &[[f64; 2]]) -> f64 {
        let (candidates, total) = self.candidates(gap);
        let within_reach: f64 = candidates.iter().map(|c| c.0).sum();
        if total > 0.0 { (1.0 - within_reach / total).max(0.0) } else { 0.0 }
    }

    /// Chooses intervals from the gap of each cell: `gap[cell] = [cured by splitting along x, along y]`.
    ///
    /// Returns `None` where the gap is zero or no interval can be split.
    ///
    /// # Panics
    /// If the slice does not have one entry a cell.
    pub fn choose_splitting(&self, gap: &[[f64; 2]]) -> Option<Splitting> {
        let (mut candidates, _) = self.candidates(gap);
        candidates.sort_by(|a, b| b.0.total_cmp(&a.0).then(b.1.cmp(&a.1)).then(a.2.cmp(&b.2)));
        if candidates.is_empty() {
            return None;
        }
        let within_reach: f64 = candidates.iter().map(|c| c.0).sum();
        let mut splitting = Splitting { columns: vec![false; self.columns()], rows: vec![false; self.rows()] };
        let (mut covered, mut least) = (0.0, 0.0);
        for (gap, is_column, k) in candidates {
            if covered >= SHARE_TO_SPLIT * within_reach && gap < (1.0 - TIE) * least {
                break;
            }
            covered += gap;
            least = gap;
            let marks = if is_column { &mut splitting.columns } else { &mut splitting.rows };
            marks[k] = true;
        }
        Some(splitting)
    }

    fn is_splittable(&self, lines: &AxisLines, k: usize) -> bool {
        lines.at[k + 1] - lines.at[k] >= 2.0 * SMALLEST_INTERVAL_FRACTION * self.sheet().size_m()
    }

    /// Intervals of an axis that touch a coordinate.
    fn touching(&self, lines: &AxisLines, value: f64) -> std::ops::Range<usize> {
        let slack = 0.5 * SMALLEST_INTERVAL_FRACTION * self.sheet().size_m();
        let after = lines.at.partition_point(|&line| line <= value + slack);
        let before = lines.at.partition_point(|&line| line < value - slack);
        before.saturating_sub(1)..after.min(lines.intervals())
    }

    /// The smallest interval along x, and along y, that touches a point, in metres; 0 where none can be split further.
    pub fn fineness_m(&self, at: [f64; 2]) -> [f64; 2] {
        let smallest = |lines: &AxisLines, value: f64| {
            let touching = self.touching(lines, value).filter(|&k| self.is_splittable(lines, k));
            touching.map(|k| lines.at[k + 1] - lines.at[k]).reduce(f64::min).unwrap_or(0.0)
        };
        [smallest(&self.x, at[0]), smallest(&self.y, at[1])]
    }

    /// Adds the intervals that touch a point to a splitting, where they can still be split.
    pub fn split_around(&self, splitting: &mut Splitting, at: [f64; 2]) {
        let mark = |lines: &AxisLines, value: f64, marks: &mut Vec<bool>| {
            for k in self.touching(lines, value).filter(|&k| self.is_splittable(lines, k)) {
                marks[k] = true;
            }
        };
        mark(&self.x, at[0], &mut splitting.columns);
        mark(&self.y, at[1], &mut splitting.rows);
    }

    /// Nodes of this grid after a splitting.
    pub fn node_count_after(&self, splitting: &Splitting) -> usize {
        let marked = |marks: &[bool]| marks.iter().filter(|&&m| m).count();
        (self.x.at.len() + marked(&splitting.columns)) * (self.y.at.len() + marked(&splitting.rows))
    }

    /// This grid with the chosen intervals bisected.
    pub fn split(&self, splitting: &Splitting) -> Self {
        Self::over(self.sheet().clone(), self.x.bisected(&splitting.columns), self.y.bisected(&splitting.rows))
    }

    /// Every interval.
    pub fn whole_splitting(&self) -> Splitting {
        Splitting { columns: vec![true; self.columns()], rows: vec![true; self.rows()] }
    }

    /// This grid with every interval bisected (for nested-grid tests and benchmarks).
    pub fn split_everywhere(&self) -> Self {
        self.split(&self.whole_splitting())
    }

    /// Values at this grid's nodes carried to the nodes of `self.split(splitting)`, bilinearly.
    ///
    /// # Panics
    /// If the slice does not have one entry a node.
    pub fn carry_to_split(&self, splitting: &Splitting, values: &[f64]) -> Vec<f64> {
        assert_eq!(values.len(), self.node_count(), "one value a node");
        let width = self.x.at.len();
        let between = |marks: &[bool], line: &[f64]| {
            let mut out = Vec::with_capacity(2 * line.len());
            for (k, &value) in line.iter().enumerate() {
                out.push(value);
                if k < marks.len() && marks[k] {
                    out.push(0.5 * (value + line[k + 1]));
                }
            }
            out
        };
        let lines: Vec<Vec<f64>> = values.chunks(width).map(|line| between(&splitting.columns, line)).collect();
        let mut out = Vec::with_capacity(self.node_count_after(splitting));
        for (k, line) in lines.iter().enumerate() {
            out.extend_from_slice(line);
            if k < splitting.rows.len() && splitting.rows[k] {
                out.extend(line.iter().zip(&lines[k + 1]).map(|(a, b)| 0.5 * (a + b)));
            }
        }
        out
    }
}
