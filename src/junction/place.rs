//! Lengths and places in words, in the unit of the file.

use super::model::Junction;
use crate::input::LengthUnit;

/// Decimals that resolve about a hundredth of a millimetre.
fn decimals(unit: LengthUnit) -> usize {
    match unit {
        LengthUnit::Millimetre => 2,
        LengthUnit::Centimetre | LengthUnit::Inch => 3,
        LengthUnit::Metre => 5,
    }
}

/// Cuts trailing zeros, a trailing point, and the sign of a zero.
fn trimmed(text: &str) -> String {
    let short = if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.') } else { text };
    if short == "-0" { "0".to_owned() } else { short.to_owned() }
}

/// A length as a bare number of the unit.
pub(super) fn number(length_m: f64, unit: LengthUnit) -> String {
    trimmed(&format!("{:.*}", decimals(unit), length_m / unit.in_metres()))
}

/// A length with its unit: `140 mm`.
pub(super) fn length(length_m: f64, unit: LengthUnit) -> String {
    format!("{} {}", number(length_m, unit), unit.symbol())
}

/// A point: `x 368 mm, y 100 mm`.
pub(super) fn point(at: [f64; 2], unit: LengthUnit) -> String {
    format!("x {}, y {}", length(at[0], unit), length(at[1], unit))
}

/// Two different lengths as bare numbers that differ: with more decimals than usual where it takes them.
fn range(bounds: [f64; 2], unit: LengthUnit) -> [String; 2] {
    let usual = decimals(unit);
    let with = |decimals: usize| bounds.map(|bound| trimmed(&format!("{:.*}", decimals, bound / unit.in_metres())));
    (usual..usual + 6).map(with).find(|[low, high]| low != high).unwrap_or_else(|| with(usual))
}

/// A rectangle: `x 0 to 60 mm, y 100 to 140 mm`.
pub(super) fn rectangle(x: [f64; 2], y: [f64; 2], unit: LengthUnit) -> String {
    let [x, y] = [x, y].map(|bounds| range(bounds, unit).join(" to "));
    format!("x {x} {symbol}, y {y} {symbol}", symbol = unit.symbol())
}

/// A rectangle ready to paste into a region: `x: [0, 60], y: [100, 140]`.
pub(super) fn region_keys(x: [f64; 2], y: [f64; 2], unit: LengthUnit) -> String {
    let [x, y] = [x, y].map(|bounds| range(bounds, unit).join(", "));
    format!("x: [{x}], y: [{y}]")
}

/// A point ready to paste: `[368, 100]`.
pub(super) fn pair(at: [f64; 2], unit: LengthUnit) -> String {
    format!("[{}, {}]", number(at[0], unit), number(at[1], unit))
}

/// A stretch along an axis: `x 140 mm, y 950 to 1000 mm`.
pub(super) fn stretch(from: [f64; 2], to: [f64; 2], unit: LengthUnit) -> String {
    let along = |axis: usize| {
        if from[axis] == to[axis] {
            length(from[axis], unit)
        } else {
            format!("{} {}", range([from[axis], to[axis]], unit).join(" to "), unit.symbol())
        }
    };
    format!("x {}, y {}", along(0), along(1))
}

/// A count with its thousands set apart: `2,000,000`.
pub(crate) fn count(number: usize) -> String {
    let digits = number.to_string();
    let groups: Vec<&str> =
        digits.as_bytes().rchunks(3).rev().map(|group| std::str::from_utf8(group).expect("digits are text")).collect();
    groups.join(",")
}

/// A number with `digits` significant digits at most: `113`, `0.5621`.
pub(super) fn significant(value: f64, digits: usize) -> String {
    if value == 0.0 || !value.is_finite() {
        return format!("{value}");
    }
    let magnitude = value.abs().log10().floor();
    let decimals = (digits as f64 - 1.0 - magnitude).max(0.0) as usize;
    trimmed(&format!("{value:.decimals$}"))
}

/// A name as YAML: bare where that is safe within braces, else in double quotes.
pub(super) fn yaml_text(name: &str) -> String {
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

/// A point of the junction in the file's unit: `x 368 mm, y 100 mm`.
pub fn point_text(junction: &Junction, at: [f64; 2]) -> String {
    point(at, junction.unit)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lengths_lose_trailing_zeros_and_keep_a_hundredth_of_a_millimetre() {
        assert_eq!(length(0.368, LengthUnit::Millimetre), "368 mm");
        assert_eq!(length(0.0125, LengthUnit::Millimetre), "12.5 mm");
        assert_eq!(length(0.000_123, LengthUnit::Millimetre), "0.12 mm");
        assert_eq!(length(-1e-9, LengthUnit::Millimetre), "0 mm");
        assert_eq!(length(0.3, LengthUnit::Centimetre), "30 cm");
        assert_eq!(length(1.2, LengthUnit::Metre), "1.2 m");
        assert_eq!(length(0.0254, LengthUnit::Inch), "1 in");
        assert_eq!(length(1.0, LengthUnit::Millimetre), "1000 mm");
    }

    #[test]
    fn points_and_rectangles_name_both_axes() {
        assert_eq!(point([0.368, -0.1], LengthUnit::Millimetre), "x 368 mm, y -100 mm");
        assert_eq!(rectangle([0.0, 0.06], [0.1, 0.14], LengthUnit::Millimetre), "x 0 to 60 mm, y 100 to 140 mm");
        assert_eq!(stretch([0.14, 0.95], [0.14, 1.0], LengthUnit::Millimetre), "x 140 mm, y 950 to 1000 mm");
    }

    #[test]
    fn the_bounds_of_a_sliver_differ() {
        let sliver = region_keys([0.0, 0.000_002], [0.1, 0.100_001], LengthUnit::Millimetre);
        assert_eq!(sliver, "x: [0, 0.002], y: [100, 100.001]");
    }

    #[test]
    fn counts_are_read_by_thousands() {
        assert_eq!([0, 999, 1000, 2_000_000].map(count), ["0", "999", "1,000", "2,000,000"]);
    }

    #[test]
    fn significant_digits_follow_the_magnitude() {
        assert_eq!(significant(113.0, 4), "113");
        assert_eq!(significant(0.562_14, 4), "0.5621");
        assert_eq!(significant(16.95, 3), "16.9");
        assert_eq!(significant(120_000.0, 4), "120000");
    }

    #[test]
    fn names_are_quoted_only_where_yaml_needs_it() {
        assert_eq!(yaml_text("wall above 2"), "wall above 2");
        assert_eq!(yaml_text("roof: \"flat\""), "\"roof: \\\"flat\\\"\"");
        assert_eq!(yaml_text("no"), "\"no\"");
        assert_eq!(yaml_text("2nd wall"), "\"2nd wall\"");
    }
}
