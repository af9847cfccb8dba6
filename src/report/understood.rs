//! What was understood of a junction file, without solving it: the output of `coldseam check`.

use super::digits::significant;
use super::lines::with_unit;
use super::page::Page;
use super::pairs::air_name;
use super::place::{measure, point, surface_cells};
use super::style::Style;
use super::table::{Align, Table};
use super::text::{flanks, head, layer_words, materials, warnings};
use crate::index::SurfaceId;
use crate::junction::{Cut, Junction};

/// Extents, environments, materials, surfaces with the rule behind each resistance, cut planes with their layers,
/// flanks, probes and the drawing's warnings.
pub fn understood(file: &str, junction: &Junction, style: &Style) -> String {
    let mut page = Page::new(style);
    head(&mut page, file, junction);
    extents(&mut page, junction);
    warnings(&mut page, &junction.warnings);
    materials(&mut page, junction);
    surfaces(&mut page, junction);
    cuts(&mut page, junction);
    flanks(&mut page, junction);
    probes(&mut page, junction);
    page.blank();
    page.block(0, "Nothing was solved; coldseam rate does that.");
    page.finish()
}

fn extents(page: &mut Page<'_>, junction: &Junction) {
    let range = |lines: &[f64]| {
        format!("{} to {}", measure(lines[0], junction.unit), measure(lines[lines.len() - 1], junction.unit))
    };
    let (x, y) = (range(junction.sheet.x_lines()), range(junction.sheet.y_lines()));
    let symmetry = match junction.symmetry.as_slice() {
        [] => "no plane of symmetry".to_owned(),
        sides => format!("planes of symmetry: {}", sides.iter().map(|s| s.word()).collect::<Vec<_>>().join(", ")),
    };
    page.block(0, &format!("x {x}, y {y} {}; {symmetry}", junction.unit.symbol()));
}

fn surfaces(page: &mut Page<'_>, junction: &Junction) {
    let resistance = page.style().units.resistance();
    page.heading(&format!("Surfaces, R_s in {}, positions in {}", resistance.symbol, junction.unit.symbol()));
    let mut table = Table::new(&[
        ("environment", Align::Wrap),
        ("from x, y", Align::Left),
        ("to x, y", Align::Left),
        ("faces", Align::Left),
        ("class", Align::Left),
        ("R_s\nheat", Align::Right),
        ("R_s\nmoist.", Align::Right),
    ]);
    let mut last = None;
    for surface in &junction.surfaces {
        let [environment, from, to, faces] = surface_cells(junction, surface, &mut last);
        table.row([
            environment,
            from,
            to,
            faces,
            surface.class.word().to_owned(),
            significant(resistance.of(surface.resistance), 3),
            significant(resistance.of(surface.moisture_resistance), 3),
        ]);
    }
    page.table(2, &table);
    rules(page, junction);
}

/// Where the surface resistances come from, each rule once.
fn rules(page: &mut Page<'_>, junction: &Junction) {
    let resistance = page.style().units.resistance();
    page.heading(&format!("Where R_s comes from, in {}", resistance.symbol));
    let mut table = Table::new(&[
        ("environment", Align::Wrap),
        ("class", Align::Left),
        ("heat goes", Align::Left),
        ("R_s\nheat", Align::Right),
        ("R_s\nmoist.", Align::Right),
        ("rule", Align::Wrap),
    ]);
    let mut seen: Vec<[String; 6]> = Vec::new();
    for surface in &junction.surfaces {
        let row = [
            junction.environments[surface.environment.index()].name.clone(),
            surface.class.word().to_owned(),
            surface.direction.word().to_owned(),
            significant(resistance.of(surface.resistance), 3),
            significant(resistance.of(surface.moisture_resistance), 3),
            surface.rule.clone(),
        ];
        if !seen.contains(&row) {
            seen.push(row.clone());
            table.row(row);
        }
    }
    page.table(2, &table);
}

fn cuts(page: &mut Page<'_>, junction: &Junction) {
    if junction.cuts.is_empty() {
        return;
    }
    page.heading(&format!("Cut planes, positions in {}", junction.unit.symbol()));
    for (index, cut) in junction.cuts.iter().enumerate() {
        let flank = junction.flanks.iter().find(|flank| flank.cut == index);
        let name = flank.map_or(String::new(), |flank| format!(", flank \"{}\"", flank.name));
        let symmetry = if cut.symmetry { ", plane of symmetry" } else { "" };
        let disturbed = match cut.undisturbed_m {
            Some(m) => format!("same layers for {}", with_unit(measure(m, junction.unit), junction.unit.symbol())),
            None => "same layers throughout".to_owned(),
        };
        page.paragraph(
            2,
            &format!(
                "{}: from {} to {}{name}{symmetry}; {disturbed}",
                cut.side.word(),
                point(cut.from, junction.unit),
                point(cut.to, junction.unit)
            ),
        );
        page.paragraph(4, &crossed(page, junction, cut));
    }
}

/// The layers from one air to the other.
fn crossed(page: &Page<'_>, junction: &Junction, cut: &Cut) -> String {
    let units = page.style().units;
    let air = |surface: SurfaceId| air_name(junction, junction.surfaces[surface.index()].air);
    let layers: Vec<String> = cut.layers.iter().map(|layer| layer_words(junction, layer, units)).collect();
    format!("{} | {} | {}", air(cut.surface_from), layers.join(" | "), air(cut.surface_to))
}

fn probes(page: &mut Page<'_>, junction: &Junction) {
    if junction.probes.is_empty() {
        return;
    }
    page.heading(&format!("Probes, positions in {}", junction.unit.symbol()));
    let mut table = Table::new(&[("", Align::Wrap), ("", Align::Left)]);
    for probe in &junction.probes {
        table.row([probe.name.clone(), point(probe.at, junction.unit)]);
    }
    page.table(2, &table);
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::index::AirId;
    use crate::input::Side;
    use crate::report::sample;

    const BALCONY: &str = "\
Balcony slab through an externally insulated wall
junctions/balcony-slab.yaml, vertical section 2800 × 2600 mm
flat: internal, 20 °C, 50 % relative humidity; outdoors: external, -5 °C
x -1200 to 1600, y -1300 to 1300 mm; no plane of symmetry

Materials
                       λ in W/(m·K)  source
  cement render                   1  the file
  mineral wool                0.035  the file
  hollow block                  0.5  the file: declared by the maker
  gypsum plaster               0.57  the file
  reinforced concrete           2.3  catalogue: ISO 10456, table 3 (1 % of
                                     steel)

Surfaces, R_s in m²·K/W, positions in mm
                                                        R_s     R_s
  environment  from x, y   to x, y     faces   class   heat  moist.
  flat         368, -100   1600, -100  bottom  opaque  0.13    0.25
               368, 100    1600, 100   top     opaque  0.13    0.25
               368, -1300  368, -100   right   opaque  0.13    0.25
               368, 100    368, 1300   right   opaque  0.13    0.25
  outdoors     0, -1300    0, -100     left    opaque  0.04    0.04
               0, 100      0, 1300     left    opaque  0.04    0.04
               -1000, 100  0, 100      top     opaque  0.04    0.04

Where R_s comes from, in m²·K/W
                                    R_s     R_s
  environment  class   heat goes   heat  moist.  rule
  flat         opaque  horizontal  0.13    0.25  ISO 6946, horizontal; ISO 13788
  outdoors     opaque  horizontal  0.04    0.04  ISO 6946, horizontal; ISO 13788

Cut planes, positions in mm
  top: from 0, 1300 to 368, 1300, flank \"wall above\"; same layers for 1200 mm
    outdoors | cement render 15 mm | mineral wool 140 mm | hollow block 200 mm |
      gypsum plaster 13 mm | flat
  bottom: from 0, -1300 to 368, -1300, flank \"wall below\"; same layers for
    1200 mm
    outdoors | cement render 15 mm | mineral wool 140 mm | hollow block 200 mm |
      gypsum plaster 13 mm | flat

Flanks, U in W/(m²·K), lengths in m
                                 overall
                   U  internal  internal  external  lengths
  wall above  0.2164     1.200     1.300     1.300  measured
  wall below  0.2164     1.200     1.300     1.300  measured
  wall above, wall below; flat to outdoors: R_s 0.13, gypsum plaster 13 mm,
    hollow block 200 mm, mineral wool 140 mm, cement render 15 mm,
    R_s 0.04 m²·K/W

Probes, positions in mm
  skirting  368, 180

Nothing was solved; coldseam rate does that.
";

    #[test]
    fn a_whole_reading() {
        let text = understood("junctions/balcony-slab.yaml", &sample::junction(), &Style::default());
        assert_eq!(text, BALCONY, "\n{text}");
    }

    #[test]
    fn open_lengths_symmetry_and_warnings_are_shown() {
        let mut junction = sample::unsettled().rating.junction;
        junction.symmetry = vec![Side::Left, Side::Top];
        junction.cuts[0].symmetry = true;
        junction.cuts[1].undisturbed_m = None;
        junction.warnings = vec!["a thin plate of steel bridges mineral wool".into()];
        let text = understood("a.yaml", &junction, &Style::default());
        let unbroken = text.split_whitespace().collect::<Vec<_>>().join(" ");
        for expected in [
            "planes of symmetry: left, top",
            "Warnings 1. a thin plate of steel bridges mineral wool",
            "flank \"wall above\", plane of symmetry; same layers for",
            "flank \"wall below\"; same layers throughout",
            "flanks: - { name: wall above",
        ] {
            assert!(unbroken.contains(expected), "{text}\n\nlacks {expected:?}");
        }
    }

    #[test]
    fn without_flanks_it_says_so() {
        let mut junction = sample::junction();
        junction.flanks.clear();
        junction.surfaces[3].air = AirId::new(1);
        let text = understood("a.yaml", &junction, &Style::default());
        assert!(text.contains("Flanks\n  none listed or found\n"), "{text}");
    }
}
