//! Positions as the user wrote them: in the file's unit, so that they are found again in the drawing.

use super::digits::trimmed;
use crate::input::LengthUnit;

/// A length or coordinate given in metres, in the file's unit, to a hundredth of a millimetre or better.
pub(super) fn measure(metres: f64, unit: LengthUnit) -> String {
    let decimals = match unit {
        LengthUnit::Millimetre => 2,
        LengthUnit::Centimetre | LengthUnit::Inch => 3,
        LengthUnit::Metre => 5,
    };
    trimmed(metres / unit.in_metres(), decimals)
}

/// A point given in metres, as `368, 100` in the file's unit.
pub(super) fn point(at: [f64; 2], unit: LengthUnit) -> String {
    format!("{}, {}", measure(at[0], unit), measure(at[1], unit))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// 1 in = 25.4 mm exactly.
    #[test]
    fn positions_are_in_the_files_unit() {
        assert_eq!(point([0.368, -0.1], LengthUnit::Millimetre), "368, -100");
        assert_eq!(point([0.3685, 0.0], LengthUnit::Metre), "0.3685, 0");
        assert_eq!(measure(0.0254 * 5.5, LengthUnit::Inch), "5.5");
        assert_eq!(measure(-1e-9, LengthUnit::Millimetre), "0");
    }
}
