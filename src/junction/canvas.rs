//! Which region shows in each field, found by painting from the last region to the first.
//!
//! Fields lie in strips along the longer axis of the sheet. Each strip keeps, for every field, the next field not yet
//! filled (a disjoint-set forest with path halving), so a field is filled once and filled stretches are skipped at once:
//! the work is proportional to the number of fields plus regions × strips, and strips are the fewer of columns and rows.

/// No region shows here.
pub(super) const BARE: u32 = u32::MAX;

/// The fields of a sheet and the region that shows in each.
pub(super) struct Canvas {
    columns: usize,
    rows: usize,
    next: Vec<u32>,
    top: Vec<u32>,
}

impl Canvas {
    /// An empty canvas.
    pub(super) fn new(columns: usize, rows: usize) -> Self {
        let (strips, length) = (columns.min(rows), columns.max(rows));
        let next = (0..strips).flat_map(|_| 0..=length as u32).collect();
        Self { columns, rows, next, top: vec![BARE; columns * rows] }
    }

    /// Whether strips are columns (and not rows).
    pub(super) fn strips_are_columns(&self) -> bool {
        self.columns < self.rows
    }

    /// The field at `place` of `strip`, counted row by row from the bottom.
    pub(super) fn field(&self, strip: usize, place: usize) -> usize {
        if self.strips_are_columns() { place * self.columns + strip } else { strip * self.columns + place }
    }

    /// The first field of `strip` at or after `place` that is not filled; the strip's length if there is none.
    fn open(&mut self, strip: usize, place: usize) -> usize {
        let start = strip * (self.columns.max(self.rows) + 1);
        let next = &mut self.next[start..];
        let mut place = place;
        while next[place] as usize != place {
            next[place] = next[next[place] as usize];
            place = next[place] as usize;
        }
        place
    }

    /// Fills the open fields in `places` of `strip` with `region`; returns how many there were.
    pub(super) fn fill(&mut self, strip: usize, places: [usize; 2], region: u32) -> usize {
        let mut filled = 0;
        let mut place = self.open(strip, places[0]);
        while place < places[1] {
            let field = self.field(strip, place);
            self.top[field] = region;
            self.next[strip * (self.columns.max(self.rows) + 1) + place] += 1;
            filled += 1;
            place = self.open(strip, place);
        }
        filled
    }

    /// The open fields in `places` of `strip`, left open.
    pub(super) fn open_fields(&mut self, strip: usize, places: [usize; 2]) -> Vec<usize> {
        let mut fields = Vec::new();
        let mut place = self.open(strip, places[0]);
        while place < places[1] {
            fields.push(self.field(strip, place));
            place = self.open(strip, place + 1);
        }
        fields
    }

    /// The region that shows in each field, or [`BARE`].
    pub(super) fn into_top(self) -> Vec<u32> {
        self.top
    }
}
