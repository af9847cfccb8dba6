//! What must hold on any section, tried on random ones.

use super::section::Section;
use crate::index::{EnvironmentId, PartId};
use crate::junction::Content;
use proptest::prelude::*;

/// The gap equals its local terms to this fraction of the energies; the release-build check is looser, for large grids.
const IDENTITY: f64 = 1e-12;

#[derive(Clone, Debug)]
struct Random {
    x: Vec<f64>,
    y: Vec<f64>,
    /// Content by field, as number: 0 to 4 a part, 5 outside.
    fields: Vec<usize>,
    conductivities: Vec<f64>,
    resistances: Vec<f64>,
}

impl Random {
    /// Solid in the middle, air a left, b right, c above (with three airs), nothing below.
    fn section(&self) -> Section {
        let (columns, rows) = (self.x.len() - 1, self.y.len() - 1);
        let mut contents = Vec::new();
        for row in 0..rows {
            for column in 0..columns {
                let field = self.fields[row * columns + column];
                contents.push(if column == 0 {
                    Content::Air(EnvironmentId::new(0))
                } else if column + 1 == columns {
                    Content::Air(EnvironmentId::new(1))
                } else if row + 1 == rows {
                    if self.resistances.len() > 2 { Content::Air(EnvironmentId::new(2)) } else { Content::Outside }
                } else if field == 5 {
                    Content::Outside
                } else {
                    Content::Solid(PartId::new(field))
                });
            }
        }
        remove_islands(&mut contents, columns);
        Section::of(&self.x, &self.y, contents, &self.conductivities, &self.resistances)
    }
}

/// Takes out solids that no air reaches through edges; the junction room refuses drawings that have them.
fn remove_islands(contents: &mut [Content], columns: usize) {
    let is_air = |content: Content| matches!(content, Content::Air(_));
    let is_solid = |content: Content| matches!(content, Content::Solid(_));
    let mut reached: Vec<bool> = contents.iter().map(|&content| is_air(content)).collect();
    for _ in 0..contents.len() {
        for k in (0..contents.len()).filter(|&k| is_solid(contents[k])) {
            let west = (k % columns > 0).then(|| k - 1);
            let east = ((k + 1) % columns > 0).then_some(k + 1);
            let neighbours = [west, east, k.checked_sub(columns), Some(k + columns)];
            reached[k] |= neighbours.into_iter().flatten().any(|n| reached.get(n) == Some(&true));
        }
    }
    for (content, reached) in contents.iter_mut().zip(reached) {
        if !reached {
            *content = Content::Outside;
        }
    }
}

fn lines(count: usize) -> impl Strategy<Value = Vec<f64>> {
    prop::collection::vec(-3.0..0.0_f64, count).prop_map(|widths| {
        let mut at = vec![0.0];
        for width in widths {
            at.push(at[at.len() - 1] + 10.0_f64.powf(width));
        }
        at
    })
}

fn random(airs: usize) -> impl Strategy<Value = Random> {
    (3_usize..7, 2_usize..6).prop_flat_map(move |(columns, rows)| {
        (
            lines(columns),
            lines(rows),
            prop::collection::vec(0_usize..6, columns * rows),
            prop::collection::vec((-1.6..2.4_f64).prop_map(|l| 10.0_f64.powf(l)), 5),
            prop::collection::vec(0.01..0.3_f64, airs),
        )
            .prop_map(|(x, y, fields, conductivities, resistances)| Random {
                x,
                y,
                fields,
                conductivities,
                resistances,
            })
    })
}

fn overlap(a: [f64; 2], b: [f64; 2]) -> bool {
    let slack = 1e-9 * (a[1].abs() + b[1].abs());
    a[0] <= b[1] + slack && b[0] <= a[1] + slack
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(60))]

    #[test]
    fn the_gap_is_the_sum_of_its_parts(random in random(2)) {
        let solution = random.section().refined(1e-4, 4);
        prop_assert!(solution.identity_error <= IDENTITY, "{:e}", solution.identity_error);
        let [low, high] = solution.bracket(0, 1);
        prop_assert!(low <= high);
    }

    /// A later, narrower bracket overlaps an earlier one, as both hold the exact value.
    #[test]
    fn refinement_stays_within_the_first_bracket(random in random(3)) {
        let first = random.section().solve();
        let later = random.section().refined(1e-4, 6);
        for (i, j) in [(0, 1), (0, 2), (1, 2)] {
            prop_assert!(overlap(first.bracket(i, j), later.bracket(i, j)));
            prop_assert_eq!(later.bracket(i, j), later.bracket(j, i));
        }
    }

    /// What leaves one air arrives at the others: L_ij + L_ik is the heat flow out of i, whose two sides are known.
    #[test]
    fn couplings_add_up(random in random(3)) {
        let solution = random.section().refined(1e-4, 5);
        for i in 0..3 {
            let others: Vec<[f64; 2]> = (0..3).filter(|&j| j != i).map(|j| solution.bracket(i, j)).collect();
            let sum = [others[0][0] + others[1][0], others[0][1] + others[1][1]];
            let upper = solution.upper_side(i);
            prop_assert!(overlap(sum, [upper - solution.gap(i), upper]));
        }
    }

    /// Mirrored or turned by a quarter, the section has the same couplings.
    #[test]
    fn turning_and_mirroring_change_nothing(random in random(2)) {
        let (columns, rows) = (random.x.len() - 1, random.y.len() - 1);
        let straight = random.section();
        let reversed = |lines: &[f64]| lines.iter().rev().map(|l| -l).collect::<Vec<f64>>();
        let contents = |section: &Section, place: &dyn Fn(usize, usize) -> (usize, usize), width: usize, height: usize| {
            let mut out = Vec::new();
            for row in 0..height {
                for column in 0..width {
                    let (from_column, from_row) = place(column, row);
                    out.push(section.grid.sheet_content(from_column, from_row));
                }
            }
            out
        };
        let mirrored = contents(&straight, &|column, row| (columns - 1 - column, row), columns, rows);
        let mut mirrored = Section::of(&reversed(&random.x), &random.y, mirrored, &random.conductivities, &random.resistances);
        // A quarter turn to the left: the new x is −y, the new y is x.
        let turned = contents(&straight, &|column, row| (row, rows - 1 - column), rows, columns);
        let mut turned = Section::of(&reversed(&random.y), &random.x, turned, &random.conductivities, &random.resistances);
        let mut straight = straight;
        let bracket = straight.refined(1e-4, 5).bracket(0, 1);
        prop_assert!(overlap(bracket, mirrored.refined(1e-4, 5).bracket(0, 1)));
        prop_assert!(overlap(bracket, turned.refined(1e-4, 5).bracket(0, 1)));
    }

    /// Conductivities and films scaled together scale the coupling.
    #[test]
    fn couplings_scale_with_conductivities_and_films(random in random(2), factor in 0.1..10.0_f64) {
        let mut scaled = random.clone();
        scaled.conductivities.iter_mut().for_each(|k| *k *= factor);
        scaled.resistances.iter_mut().for_each(|r| *r /= factor);
        let [low, high] = random.section().solve().bracket(0, 1);
        let [scaled_low, scaled_high] = scaled.section().solve().bracket(0, 1);
        // What a solver leaves is in proportion to the films' conductances (up to some 200 W/(m·K) here), not to the
        // coupling, which may be 0.
        let tolerance = (1e-8 * high.abs() + 1e-8) * factor;
        prop_assert!((scaled_low - factor * low).abs() <= tolerance);
        prop_assert!((scaled_high - factor * high).abs() <= tolerance);
    }
}
