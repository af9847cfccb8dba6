//! What meets at a point of a surface, in words.

use super::fault_wording::listed;
use super::lines::line_at;
use super::model::Junction;
use super::probes::touching;
use super::sheet::Content;
use crate::index::PartId;
use std::collections::BTreeSet;

/// Points within this fraction of the drawing's size of a line are on it.
const ON_LINE_FRACTION: f64 = 1e-6;

/// What meets at a point of a surface: `inside corner of gypsum plaster and reinforced concrete`, `flat surface of gypsum
/// plaster`. A corner is an inside one where more than half of the surroundings is solid; voids do not count.
pub fn describe_point(junction: &Junction, at: [f64; 2]) -> String {
    let sheet = &junction.sheet;
    let tolerance_m = ON_LINE_FRACTION * sheet.size_m();
    let on_line = |lines: &[f64], at: f64| line_at(lines, at, tolerance_m).map_or(at, |line| lines[line]);
    let columns = touching(sheet.x_lines(), on_line(sheet.x_lines(), at[0]));
    let rows = touching(sheet.y_lines(), on_line(sheet.y_lines(), at[1]));
    let mut solids: BTreeSet<PartId> = BTreeSet::new();
    let (mut solid, mut air) = (0, 0);
    for row in rows {
        for column in columns.clone() {
            match sheet.content(column, row) {
                Content::Solid(part) => {
                    solids.insert(part);
                    solid += 1;
                }
                Content::Air(_) => air += 1,
                Content::Outside => {}
            }
        }
    }
    let mut names: Vec<String> = Vec::new();
    for part in solids {
        let name = &junction.parts[part.index()].material;
        if !names.contains(name) {
            names.push(name.clone());
        }
    }
    if names.is_empty() {
        return "no solid".to_owned();
    }
    let figure = match (solid, air) {
        (_, 0) => "inside",
        (solid, air) if solid > air => "inside corner of",
        (solid, air) if solid < air => "outside corner of",
        _ => "flat surface of",
    };
    format!("{figure} {}", listed(&names))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::junction::test_draft::{Draft, balcony};

    #[test]
    fn corners_and_flat_surfaces_are_told_apart() {
        let junction = balcony(-100.0, 100.0).built();
        let at = |x: f64, y: f64| describe_point(&junction, [x * 1e-3, y * 1e-3]);
        assert_eq!(at(368.0, 100.0), "inside corner of plaster and concrete");
        assert_eq!(at(368.0, 777.0), "flat surface of plaster");
        assert_eq!(at(900.0, 100.0), "flat surface of concrete");
        assert_eq!(at(-1000.0, 100.0), "outside corner of concrete");
        assert_eq!(at(368.0, 1300.0), "flat surface of plaster", "the sheet's edge is no corner");
        assert_eq!(at(200.0, 500.0), "inside block");
        assert_eq!(at(900.0, 900.0), "no solid");
    }

    #[test]
    fn materials_that_meet_on_a_flat_surface_are_both_named() {
        let junction = Draft::section()
            .paint("outdoors", [-500.0, 0.0], [0.0, 1000.0])
            .paint("flat", [200.0, 700.0], [0.0, 1000.0])
            .paint("block", [0.0, 200.0], [0.0, 400.0])
            .paint("concrete", [0.0, 200.0], [400.0, 1000.0])
            .built();
        assert_eq!(describe_point(&junction, [0.2, 0.4 + 1e-9]), "flat surface of block and concrete");
        assert_eq!(super::super::point_text(&junction, [0.2, 0.4]), "x 200 mm, y 400 mm");
    }
}
