//! A ready-to-paste `flanks:` block with what could be measured and what is left to fill in.

use super::fault::{listed, near_text};
use super::flank_choice::Chosen;
use super::flanks::{Drawing, systems};
use super::model::Lengths;
use super::place;
use crate::input::LengthUnit;
use std::fmt::Write;

/// The block, one line a flank, in the file's unit.
pub(super) fn block(drawing: &Drawing, flanks: &[(&Chosen, Lengths)], unit: LengthUnit) -> String {
    let mut block = String::from("flanks:\n");
    for (chosen, lengths) in flanks {
        let placed = &drawing.cuts[chosen.cut];
        let mut entry = format!("name: {}, cut: {}", yaml_text(&chosen.name), placed.cut.side.word());
        if needs_near(drawing, chosen.cut) {
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

/// Whether naming the side alone would not pick this cut plane.
fn needs_near(drawing: &Drawing, cut: usize) -> bool {
    let placed = &drawing.cuts[cut];
    let rivals = drawing.cuts.iter().filter(|other| {
        other.cut.side == placed.cut.side && other.cut.on_sheet_edge && other.is_flank(drawing.surfaces)
    });
    !placed.cut.on_sheet_edge || rivals.count() > 1
}

/// A name as YAML: bare where that is safe within braces, else in double quotes.
fn yaml_text(name: &str) -> String {
    let plain = |character: char| character.is_alphanumeric() || " _-".contains(character);
    let word = ["true", "false", "null", "yes", "no", "on", "off", "y", "n"].contains(&name.to_lowercase().as_str());
    if name.starts_with(char::is_alphabetic) && name.chars().all(plain) && !name.ends_with(' ') && !word {
        return name.to_owned();
    }
    let escaped: String = name
        .chars()
        .map(|character| match character {
            '"' => "\\\"".to_owned(),
            '\\' => "\\\\".to_owned(),
            control if control.is_control() => format!("\\u{:04x}", u32::from(control)),
            other => other.to_string(),
        })
        .collect();
    format!("\"{escaped}\"")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_quoted_only_where_yaml_needs_it() {
        assert_eq!(yaml_text("wall above 2"), "wall above 2");
        assert_eq!(yaml_text("roof: \"flat\""), "\"roof: \\\"flat\\\"\"");
        assert_eq!(yaml_text("no"), "\"no\"");
        assert_eq!(yaml_text("2nd wall"), "\"2nd wall\"");
    }
}
