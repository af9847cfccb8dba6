//! All sentences about what keeps a drawing from being rated: what is wrong, what was expected, what to write instead.

use super::fault::Fault;
use super::place;
use crate::input::{Diagnostic, LengthUnit, Related, Severity, Side};

/// So many places to choose from are written out.
pub(super) const PLACES_NAMED: usize = 4;

/// `near: [60, 1300]`, ready to paste.
pub(super) fn near_text(at: [f64; 2], unit: LengthUnit) -> String {
    format!("near: {}", place::pair(at, unit))
}

/// Words joined by commas and a last `and`.
pub(super) fn listed(words: &[String]) -> String {
    joined(words, "and")
}

fn joined(words: &[String], last_by: &str) -> String {
    match words {
        [] => String::new(),
        [only] => only.clone(),
        [first @ .., last] => format!("{} {last_by} {last}", first.join(", ")),
    }
}

/// `near` entries to choose from, the first few of them.
fn near_choice(places: &[[f64; 2]], unit: LengthUnit) -> String {
    let shown: Vec<String> = places.iter().take(PLACES_NAMED).map(|&at| format!("`{}`", near_text(at, unit))).collect();
    if places.len() > PLACES_NAMED { format!("{}, and so on", shown.join(", ")) } else { joined(&shown, "or") }
}

/// `cut` entries to choose from.
fn cut_choice(sides: &[Side]) -> String {
    let sides: Vec<String> = sides.iter().map(|side| format!("`cut: {}`", side.word())).collect();
    joined(&sides, "or")
}

/// What is wrong, what was expected beside the quoted line, and what to write instead.
struct Words {
    message: String,
    label: String,
    help: String,
}

fn words(message: impl Into<String>, label: impl Into<String>, help: impl Into<String>) -> Words {
    Words { message: message.into(), label: label.into(), help: help.into() }
}

impl Fault {
    /// The diagnostic, with lengths in the file's unit.
    pub(super) fn diagnostic(&self, unit: LengthUnit) -> Diagnostic {
        let Words { message, label, help } = self.words(unit);
        let related = match self {
            Self::CutTwice { first, first_name, .. } => {
                vec![Related { span: *first, label: format!("`{first_name}` has it already") }]
            }
            _ => Vec::new(),
        };
        Diagnostic { severity: Severity::Error, span: Some(self.span()), message, label, help: Some(help), related }
    }

    fn words(&self, unit: LengthUnit) -> Words {
        match self {
            Self::TooManyFields { columns, rows, limit, .. } => words(
                format!(
                    "the regions' corners make {} columns × {} rows, which is {} fields; {} can be handled",
                    place::count(*columns),
                    place::count(*rows),
                    place::count(columns.saturating_mul(*rows)),
                    place::count(*limit)
                ),
                "too many different coordinates",
                "let regions share their coordinates, leave out detail that does not matter, or split the junction",
            ),
            Self::Flat { axis, size, other_axis, other_size, .. } => words(
                format!(
                    "the section is only {} {symbol} in {axis}, and {} {symbol} in {other_axis}",
                    place::significant(size / unit.in_metres(), 3),
                    place::number(*other_size, unit),
                    symbol = unit.symbol()
                ),
                "less than a millionth of its other side",
                format!("check `{axis}` of the regions, and `unit`: it holds for every length in the file"),
            ),
            Self::BarsTooDeep { at, limit, .. } => words(
                format!("more than {limit} rows of spaced bars lie over one another at {}", place::point(*at, unit)),
                "too many overlapping spaced bars",
                "draw each row of bars once, with the spacing it has",
            ),
            Self::SlopingEdge { from, to, more, .. } => {
                let others = match more {
                    0 => String::new(),
                    1 => ", and one more edge of this outline slopes".to_owned(),
                    _ => format!(", and {} more edges of this outline slope", place::count(*more)),
                };
                words(
                    format!(
                        "the edge from {} to {} is not along an axis{others}",
                        place::point(*from, unit),
                        place::point(*to, unit)
                    ),
                    "sloping edges are not solved yet",
                    "draw it with horizontal and vertical edges, in steps where it slopes",
                )
            }
            Self::OutlineTouchesItself { at, .. } => words(
                format!("this outline touches or crosses itself at {}", place::point(*at, unit)),
                "the edge from this point meets the outline again",
                "list the corners in the order in which one walks around the region; draw a second area, or a hole, \
                 as a region of its own",
            ),
            Self::BarsWithOutline { .. } => words(
                "spaced bars are drawn with an outline",
                "spaced bars need a box",
                "give `x` and `y`, so that it is clear which way the bars run",
            ),
            Self::BarsTooLarge { area_m2, spacing_m, height_m, .. } => words(
                format!(
                    "bars of {} {}² every {} do not fit into a box {} high",
                    place::significant(area_m2 / unit.in_metres().powi(2), 4),
                    unit.symbol(),
                    place::length(*spacing_m, unit),
                    place::length(*height_m, unit)
                ),
                "more bar than box",
                "`area` is one bar's cross-section and `spacing` the distance from bar to bar; check both, and the box \
                 across the bars",
            ),
            Self::BarsTooLargeTogether { at, share, .. } => words(
                format!(
                    "spaced bars over one another at {} would fill {} % of the room there",
                    place::point(*at, unit),
                    place::significant(100.0 * share, 3)
                ),
                "with the bars drawn before them, more bar than room",
                "draw each row of bars once; check `area`, one bar's cross-section, and `spacing`, from bar to bar",
            ),
            Self::BarsWithoutSolid { under, at, .. } => words(
                format!("spaced bars lie {under} at {}", place::point(*at, unit)),
                "spaced bars cross a solid painted before them",
                "end the box where the solid ends, or paint what the bars cross before them",
            ),
            Self::NoSolid { covered: true, .. } => words(
                "no part of the section is solid: later regions cover all of its solids",
                "later regions cover earlier ones",
                "paint the air first and the solids over it",
            ),
            Self::NoSolid { covered: false, .. } => words(
                "no part of the section is solid",
                "nothing here conducts heat",
                "add what separates the airs, painted after them, such as `- { material: reinforced concrete, x: [0, \
                 200], y: [0, 1000] }`",
            ),
            Self::NoAir { covered: true, .. } => words(
                "no part of the section is air: later regions cover all of it",
                "later regions cover earlier ones",
                "paint the air first and the solids over it, and leave it room on each side of them",
            ),
            Self::NoAir { covered: false, .. } => words(
                "no part of the section is air",
                "nothing here gives heat or takes it",
                "add the air on each side of the solid, painted before it, such as `- { environment: outdoors, x: \
                 [-500, 0], y: [0, 1000] }`",
            ),
            Self::OneAir { name, .. } => words(
                format!("{name} is the only air that touches the solid, so no heat flows"),
                "a junction lies between two airs at least",
                "paint the air of the other side too, such as `- { environment: outdoors, x: [-500, 0], y: [0, 1000] }`, \
                 and mind that later regions cover earlier ones",
            ),
            Self::Gap { solid, at, x, y, air, .. } => gap(solid, *at, [*x, *y], air.as_deref(), unit),
            Self::AirsTouch { airs: [first, second], from, to, at_edge, more, .. } => {
                let others = match more {
                    0 => String::new(),
                    1 => ", and at one more place".to_owned(),
                    _ => format!(", and at {} more places", place::count(*more)),
                };
                let solid = if *at_edge {
                    "let the solid between them run on to the sheet's edge"
                } else {
                    "draw the solid that separates them there"
                };
                words(
                    format!("{first} and {second} touch at {}{others}", place::stretch(*from, *to, unit)),
                    "two different airs need a solid between them",
                    format!(
                        "{solid}, or, if it is the same air, give one of them `same_as: {}`",
                        place::yaml_text(first)
                    ),
                )
            }
            Self::TooManyAirs { count, limit, .. } => words(
                format!("{} different airs touch the solid; {limit} can be handled", place::count(*count)),
                "too many different airs",
                "give those that are the same air one environment, or `same_as`; or split the junction",
            ),
            Self::SolidWithoutAir { solid, x, y, .. } => words(
                format!("{solid} at {} touches no air", place::rectangle(*x, *y, unit)),
                "nothing settles its temperature",
                "join it to the rest of the section, let air reach it, or leave it out",
            ),
            Self::ProbeOutside { name, at, inside, nearest, .. } => words(
                format!("the probe `{name}` at {} lies {inside}", place::point(*at, unit)),
                "temperatures are given in solids and on their surfaces",
                match nearest {
                    Some(nearest) => format!("the nearest point of a solid is `{}`", place::pair(*nearest, unit)),
                    None => "move it into a solid, or onto its surface".to_owned(),
                },
            ),
            Self::NoCut { .. } | Self::SeveralCuts { .. } | Self::SameAir { .. } | Self::CutTwice { .. } => {
                self.words_on_flanks(unit)
            }
        }
    }

    /// The words of those faults that flanks have.
    fn words_on_flanks(&self, unit: LengthUnit) -> Words {
        match self {
            Self::NoCut { side, elsewhere, on_voids, .. } => {
                let mut help: Vec<String> = Vec::new();
                if !elsewhere.is_empty() {
                    help.push(format!("write {}, where plane elements are cut", cut_choice(elsewhere)));
                }
                if !on_voids.is_empty() {
                    help.push(format!("name a cut plane on a void with {}", near_choice(on_voids, unit)));
                }
                help.push(format!(
                    "let the wall, floor or roof run to the {} edge of the sheet, with its air on both sides",
                    side.word()
                ));
                words(
                    format!("no plane element is cut at the {} edge of the sheet", side.word()),
                    "a cut plane runs through solid from one air to another",
                    help.join("; or "),
                )
            }
            Self::SeveralCuts { side, count, near, .. } => words(
                format!("{} plane elements are cut at the {} edge of the sheet", place::count(*count), side.word()),
                "which one is meant?",
                format!("add a point on it: {}", near_choice(near, unit)),
            ),
            Self::SameAir { side, air, at, .. } => words(
                format!(
                    "the element cut at the {} edge ({}) has {air} on both sides",
                    side.word(),
                    place::point(*at, unit)
                ),
                "a flank separates two different airs",
                "leave this flank out: no heat flows through it far from the junction",
            ),
            Self::CutTwice { at, open, .. } => words(
                format!("the cut plane at {} is named twice", place::point(*at, unit)),
                "each cut plane is one flank",
                if open.is_empty() {
                    "leave one of the two out: every cut plane between two airs has a flank already".to_owned()
                } else {
                    format!("write {}, which no flank names yet, or leave one of the two out", cut_choice(open))
                },
            ),
            _ => unreachable!("the other faults are worded above"),
        }
    }
}

/// The words on a solid that ends at an unpainted part of the sheet.
fn gap(solid: &str, at: [f64; 2], [x, y]: [[f64; 2]; 2], air: Option<&str>, unit: LengthUnit) -> Words {
    let keys = place::region_keys(x, y, unit);
    let paint = match air {
        Some(air) => {
            let air = place::yaml_text(air);
            format!("paint the air that is there, before the solids: `- {{ environment: {air}, {keys} }}`")
        }
        None => "paint the air that is there, before the solids, or let the solid fill it".to_owned(),
    };
    words(
        format!("{solid} ends at an unpainted part of the sheet: {}", place::rectangle(x, y, unit)),
        format!("its edge at {} has neither air nor solid beside it", place::point(at, unit)),
        format!("{paint}\nor, if the model ends there on purpose: `- {{ void: adiabatic, {keys} }}`"),
    )
}
