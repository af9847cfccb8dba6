//! A ready-to-paste `flanks:` block with what could be measured and what is left to fill in.

use super::fault_wording::{listed, near_text};
use super::flank_choice::Chosen;
use super::flanks::{Drawing, systems};
use super::model::Lengths;
use super::place;
use crate::input::{LengthUnit, Side};
use std::collections::BTreeMap;
use std::fmt::Write;

/// The block, one line a flank, in the file's unit.
pub(super) fn block(drawing: &Drawing, flanks: &[(&Chosen, Lengths)], unit: LengthUnit) -> String {
    let mut block = String::from("flanks:\n");
    let mut on_edge: BTreeMap<Side, usize> = BTreeMap::new();
    for placed in drawing.cuts.iter().filter(|placed| placed.cut.on_sheet_edge && placed.is_flank(drawing.surfaces)) {
        *on_edge.entry(placed.cut.side).or_insert(0) += 1;
    }
    for (chosen, lengths) in flanks {
        let placed = &drawing.cuts[chosen.cut];
        let mut entry = format!("name: {}, cut: {}", place::yaml_text(&chosen.name), placed.cut.side.word());
        // naming the side alone would not pick this cut plane
        if !placed.cut.on_sheet_edge || on_edge.get(&placed.cut.side).is_some_and(|&count| count > 1) {
            let near = chosen.entry.and_then(|entry| entry.near).unwrap_or_else(|| placed.middle());
            write!(entry, ", {}", near_text(near, unit)).expect("writing to a string cannot fail");
        }
        let mut open = Vec::new();
        for (system, length_m) in systems(lengths) {
            let key = system.replace(' ', "_");
            match length_m {
                Some(length_m) => write!(entry, ", {key}: {}", place::number(length_m, unit))
                    .expect("writing to a string cannot fail"),
                None => open.push(key),
            }
        }
        if let Some(u) = chosen.entry.and_then(|entry| entry.u_w_m2k) {
            write!(entry, ", u: {u}").expect("writing to a string cannot fail");
        }
        write!(block, "  - {{ {entry} }}").expect("writing to a string cannot fail");
        if !open.is_empty() {
            let straight_m = drawing.reach(chosen.cut).straight_m;
            write!(
                block,
                "  # add {}, in {} from the cut plane; its straight internal surface ends at {}",
                listed(&open),
                unit.symbol(),
                place::number(straight_m, unit)
            )
            .expect("writing to a string cannot fail");
        }
        block.push('\n');
    }
    block
}
