//! The first lines of a grid: every line of the drawing, then enough between them that neighbours are of like size.

/// Neighbouring intervals of the first grid differ by at most this factor. Larger steps cost accuracy beside thin
/// layers, smaller ones cost nodes in every later pass; bisection makes steps of 2 anyway.
const LARGEST_STEP: f64 = 4.0;

/// One axis of a grid: lines, and the interval of the drawing in which each interval of the grid lies.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct AxisLines {
    /// Positions in metres, rising.
    pub(super) at: Vec<f64>,
    /// For each interval, the drawing's interval that holds it.
    pub(super) drawn: Vec<u32>,
}

impl AxisLines {
    /// Lines of the drawing, and between them bisections until neighbouring intervals are of like size.
    pub(super) fn graded(drawing: &[f64]) -> Self {
        let drawn: Vec<u32> = (0..drawing.len() as u32 - 1).collect();
        let mut lines = Self { at: drawing.to_vec(), drawn };
        loop {
            let width = |k: usize| lines.at[k + 1] - lines.at[k];
            let count = lines.intervals();
            let split: Vec<bool> = (0..count)
                .map(|k| {
                    let too_wide = |other: usize| width(k) > LARGEST_STEP * width(other);
                    (k > 0 && too_wide(k - 1)) || (k + 1 < count && too_wide(k + 1))
                })
                .collect();
            if !split.contains(&true) {
                return lines;
            }
            lines = lines.bisected(&split);
        }
    }

    /// Number of intervals.
    pub(super) fn intervals(&self) -> usize {
        self.drawn.len()
    }

    /// These lines with the marked intervals bisected.
    pub(super) fn bisected(&self, split: &[bool]) -> Self {
        let extra = split.iter().filter(|&&s| s).count();
        let mut at = Vec::with_capacity(self.at.len() + extra);
        let mut drawn = Vec::with_capacity(self.drawn.len() + extra);
        for (k, &halve) in split.iter().enumerate() {
            at.push(self.at[k]);
            drawn.push(self.drawn[k]);
            if halve {
                at.push(0.5 * (self.at[k] + self.at[k + 1]));
                drawn.push(self.drawn[k]);
            }
        }
        at.push(self.at[self.intervals()]);
        Self { at, drawn }
    }

    /// For each line, the drawing's line that it lies on, if any.
    pub(super) fn drawn_lines(&self) -> Vec<Option<u32>> {
        let count = self.intervals();
        (0..=count)
            .map(|k| {
                if k == 0 {
                    Some(self.drawn[0])
                } else if k == count {
                    Some(self.drawn[k - 1] + 1)
                } else {
                    (self.drawn[k] != self.drawn[k - 1]).then(|| self.drawn[k])
                }
            })
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn neighbours_are_of_like_size_beside_a_foil() {
        let lines = AxisLines::graded(&[0.0, 0.0005, 1.0]);
        for pair in lines.at.windows(3) {
            let (a, b) = (pair[1] - pair[0], pair[2] - pair[1]);
            assert!(a.max(b) <= LARGEST_STEP * a.min(b));
        }
        assert!(lines.intervals() < 20, "grading is geometric, not uniform");
        assert_eq!(lines.drawn_lines().iter().flatten().count(), 3);
    }
}
