//! Positions as the user wrote them: in the file's unit, so that they are found again in the drawing.

use super::digits::trimmed;
use crate::input::LengthUnit;
use crate::junction::{Junction, Surface};

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

/// Environment, ends and faced side of a surface as cells of a table. A name stands once for all that follow it (`last`
/// keeps it), so that a long one does not fill the page.
pub(super) fn surface_cells<'a>(junction: &'a Junction, surface: &Surface, last: &mut Option<&'a str>) -> [String; 4] {
    let name = junction.environments[surface.environment.index()].name.as_str();
    let repeated = last.replace(name) == Some(name);
    [
        if repeated { String::new() } else { name.to_owned() },
        point(surface.from, junction.unit),
        point(surface.to, junction.unit),
        surface.faces.word().to_owned(),
    ]
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
