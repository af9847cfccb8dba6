//! Which region shows in each field, found by painting from the last region to the first.
//!
//! Fields lie in strips along the longer axis of the sheet. Each strip keeps, for every field, the next field not yet
//! filled (a disjoint-set forest with path halving), so a field is filled once and filled stretches are skipped at once;
//! and the stretch outside which it is filled, so that a region that later ones cover costs a look at each strip. The
//! work is proportional to the number of fields plus regions × strips, and strips are the fewer of columns and rows.

/// No region shows here.
pub(super) const BARE: u32 = u32::MAX;

/// The fields of a sheet and the region that shows in each.
pub(super) struct Canvas {
    columns: usize,
    rows: usize,
    next: Vec<u32>,
    /// By strip: no field before the first place is open, and none from the second on.
    open_between: Vec<[u32; 2]>,
    top: Vec<u32>,
}

impl Canvas {
    /// An empty canvas.
    pub(super) fn new(columns: usize, rows: usize) -> Self {
        let (strips, length) = (columns.min(rows), columns.max(rows));
        let next = (0..strips).flat_map(|_| 0..=length as u32).collect();
        let open_between = vec![[0, length as u32]; strips];
        Self { columns, rows, next, open_between, top: vec![BARE; columns * rows] }
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

    /// The part of `places` that can hold open fields of `strip`; the lower bound is not below the upper if none can.
    fn within_open(&self, strip: usize, places: [usize; 2]) -> [usize; 2] {
        let [first, after] = self.open_between[strip];
        [places[0].max(first as usize), places[1].min(after as usize)]
    }

    /// Fills the open fields in `places` of `strip` with `region`; returns how many there were.
    pub(super) fn fill(&mut self, strip: usize, places: [usize; 2], region: u32) -> usize {
        let [start, after] = self.within_open(strip, places);
        if start >= after {
            return 0;
        }
        let mut filled = 0;
        let mut place = self.open(strip, start);
        while place < after {
            let field = self.field(strip, place);
            self.top[field] = region;
            self.next[strip * (self.columns.max(self.rows) + 1) + place] += 1;
            filled += 1;
            place = self.open(strip, place);
        }
        let [first_open, after_open] = &mut self.open_between[strip];
        if start == *first_open as usize {
            *first_open = place as u32;
        }
        if after == *after_open as usize {
            *after_open = start as u32;
        }
        filled
    }

    /// The open fields in `places` of `strip`, left open.
    pub(super) fn open_fields(&mut self, strip: usize, places: [usize; 2]) -> Vec<usize> {
        let mut fields = Vec::new();
        let [start, after] = self.within_open(strip, places);
        if start >= after {
            return fields;
        }
        let mut place = self.open(strip, start);
        while place < after {
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
