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

/// A rectangle: `x 0 to 60 mm, y 100 to 140 mm`.
pub(super) fn rectangle(x: [f64; 2], y: [f64; 2], unit: LengthUnit) -> String {
    let range = |[low, high]: [f64; 2]| format!("{} to {}", number(low, unit), length(high, unit));
    format!("x {}, y {}", range(x), range(y))
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
    }

    #[test]
    fn significant_digits_follow_the_magnitude() {
        assert_eq!(significant(113.0, 4), "113");
        assert_eq!(significant(0.562_14, 4), "0.5621");
        assert_eq!(significant(16.95, 3), "16.9");
        assert_eq!(significant(120_000.0, 4), "120000");
    }
}
