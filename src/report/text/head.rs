//! What was rated: title, file, section, airs.

use crate::input::Plane;
use crate::junction::{Air, Junction};
use crate::report::digits::trimmed;
use crate::report::kinds::kind_word;
use crate::report::lines::{HELD_SPACE, with_unit};
use crate::report::page::Page;
use crate::report::place::measure;
use crate::report::units::Units;

/// The opening lines of a report on one junction.
pub(in crate::report) fn head(page: &mut Page<'_>, file: &str, junction: &Junction) {
    let units = page.style().units;
    page.title(&junction.title);
    page.block(0, &format!("{file}, {}", section(junction)));
    page.block(0, &junction.airs.iter().map(|air| described(air, units)).collect::<Vec<_>>().join("; "));
    if let Some(planes) = planes_of_symmetry(junction) {
        page.block(0, &format!("{planes}; L and Ψ are those of the part drawn"));
    }
}

/// `planes of symmetry: left, right`; `None` where there are none.
fn planes_of_symmetry(junction: &Junction) -> Option<String> {
    let sides: Vec<&str> = junction.symmetry.iter().map(|side| side.word()).collect();
    let noun = if sides.len() == 1 { "plane" } else { "planes" };
    (!sides.is_empty()).then(|| format!("{noun} of symmetry: {}", sides.join(", ")))
}

/// `vertical section 2800 × 2600 mm`.
fn section(junction: &Junction) -> String {
    let plane = match junction.plane {
        Plane::Vertical => "vertical section",
        Plane::Horizontal => "horizontal section (plan)",
    };
    let (x, y) = (junction.sheet.x_lines(), junction.sheet.y_lines());
    let unit = junction.unit;
    let (width, height) = (x[x.len() - 1] - x[0], y[y.len() - 1] - y[0]);
    format!(
        "{plane} {}{HELD_SPACE}×{HELD_SPACE}{}",
        measure(width, unit),
        with_unit(measure(height, unit), unit.symbol())
    )
}

/// `flat: internal, 20 °C, 50 % relative humidity`.
fn described(air: &Air, units: Units) -> String {
    let humidity =
        air.relative_humidity_percent.map(|p| format!(", {} relative humidity", with_unit(trimmed(p, 1), "%")));
    let temperature = with_unit(trimmed(units.temperature(air.temperature_c), 1), units.temperature_symbol());
    format!("{}: {}, {temperature}{}", air.name, kind_word(air.kind), humidity.unwrap_or_default())
}
