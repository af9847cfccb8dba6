//! What keeps a drawing from being rated: the facts, and all sentences in one place.

use super::place;
use crate::input::{Diagnostic, LengthUnit, Severity, Side, Span};

/// A reason why a document is no junction. Lengths and places in metres.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Fault {
    /// The drawing's lines enclose more fields than can be handled.
    TooManyFields { section: Span, columns: usize, rows: usize, limit: usize },
    /// Spaced bars lie over one another so often that their fields exceed the limit.
    TooManyBarFields { section: Span, limit: usize },
    /// An outline has an edge that is not along an axis.
    SlopingEdge { span: Span, from: [f64; 2], to: [f64; 2], more: usize },
    /// An outline touches or crosses itself.
    OutlineTouchesItself { span: Span, at: [f64; 2] },
    /// Spaced bars with an outline that is no box.
    BarsWithOutline { span: Span },
    /// Spaced bars need more room than their box has.
    BarsTooLarge { span: Span, area_m2: f64, spacing_m: f64, height_m: f64 },
    /// Spaced bars lie where there is no solid.
    BarsWithoutSolid { span: Span, under: String, at: [f64; 2] },
    /// No field of the sheet is solid.
    NoSolid { section: Span },
    /// No field of the sheet is air.
    NoAir { section: Span },
    /// A solid ends at a part of the sheet that was never painted.
    Gap { span: Span, solid: String, at: [f64; 2], x: [f64; 2], y: [f64; 2] },
    /// Two airs share an edge.
    AirsTouch { span: Span, airs: [String; 2], from: [f64; 2], to: [f64; 2] },
    /// A connected solid touches no air.
    SolidWithoutAir { span: Span, solid: String, at: [f64; 2] },
    /// A probe lies in no solid.
    ProbeOutside { span: Span, name: String, at: [f64; 2], inside: String },
    /// A flank names a side that has no cut plane, or none between two airs.
    NoCut { span: Span, side: Side, elsewhere: Vec<Side>, on_voids: Vec<[f64; 2]> },
    /// A flank names a side that has several cut planes.
    SeveralCuts { span: Span, side: Side, near: Vec<[f64; 2]> },
    /// A flank names a cut plane with the same air at both ends.
    SameAir { span: Span, side: Side, air: String, at: [f64; 2] },
    /// A flank names a cut plane that an earlier flank has.
    CutTwice { span: Span, first: Span, first_name: String, at: [f64; 2] },
}

/// `near: [60, 1300]`, ready to paste.
pub(super) fn near_text(at: [f64; 2], unit: LengthUnit) -> String {
    format!("near: [{}, {}]", place::number(at[0], unit), place::number(at[1], unit))
}

/// Words joined by commas and a last `and`.
pub(super) fn listed(words: &[String]) -> String {
    match words {
        [] => String::new(),
        [only] => only.clone(),
        [first @ .., last] => format!("{} and {last}", first.join(", ")),
    }
}

impl Fault {
    /// The diagnostic, with lengths in the file's unit.
    pub(super) fn diagnostic(&self, unit: LengthUnit) -> Diagnostic {
        let mut related = Vec::new();
        let (span, message, label, help) = match self {
            Self::TooManyFields { section, columns, rows, limit } => (
                section,
                format!(
                    "the section's vertices make {columns} columns × {rows} rows, more than {limit} fields can be solved"
                ),
                "too many different coordinates".to_owned(),
                "let regions share their coordinates, leave out detail that does not matter, or split the junction",
            ),
            Self::TooManyBarFields { section, limit } => (
                section,
                format!("spaced bars lie over one another on more than {limit} fields"),
                "too many overlapping spaced bars".to_owned(),
                "draw each row of bars once, with the spacing it has",
            ),
            Self::SlopingEdge { span, from, to, more } => {
                let others = match more {
                    0 => String::new(),
                    1 => ", and one more of this outline slopes".to_owned(),
                    _ => format!(", and {more} more of this outline slope"),
                };
                (
                    span,
                    format!(
                        "the edge from {} to {} is not along an axis{others}",
                        place::point(*from, unit),
                        place::point(*to, unit)
                    ),
                    "sloping edges are not solved yet".to_owned(),
                    "draw it with horizontal and vertical edges, in steps where it slopes",
                )
            }
            Self::OutlineTouchesItself { span, at } => (
                span,
                format!("the outline touches or crosses itself at {}", place::point(*at, unit)),
                "an outline goes round one area once".to_owned(),
                "use one outline for each area, or paint the hole over it as a region of its own",
            ),
            Self::BarsWithOutline { span } => (
                span,
                "spaced bars are drawn with an outline".to_owned(),
                "spaced bars need a box".to_owned(),
                "give `x:` and `y:`, so that it is clear which way the bars run",
            ),
            Self::BarsTooLarge { span, area_m2, spacing_m, height_m } => (
                span,
                format!(
                    "bars of {} {}² every {} do not fit into a box {} high",
                    place::significant(area_m2 / unit.in_metres().powi(2), 4),
                    unit.symbol(),
                    place::length(*spacing_m, unit),
                    place::length(*height_m, unit)
                ),
                "more bar than box".to_owned(),
                "`area:` is one bar's cross-section and `spacing:` the distance from bar to bar; check both, and the box across the bars",
            ),
            Self::BarsWithoutSolid { span, under, at } => (
                span,
                format!("spaced bars lie on {under} at {}", place::point(*at, unit)),
                "spaced bars cross a solid painted before them".to_owned(),
                "paint what the bars cross first, or end the box where the solid ends",
            ),
            Self::NoSolid { section } => (
                section,
                "no part of the section is solid".to_owned(),
                "nothing to conduct heat".to_owned(),
                "add a region with `material:` or `buildup:`, painted after the air around it",
            ),
            Self::NoAir { section } => (
                section,
                "no part of the section is air".to_owned(),
                "nothing to exchange heat with".to_owned(),
                "add a region with `environment:` on each side of the solid, painted before it",
            ),
            Self::Gap { span, solid, at, x, y } => (
                span,
                format!("{solid} ends at an unpainted part of the sheet: {}", place::rectangle(*x, *y, unit)),
                format!("its edge at {} has neither air nor solid beside it", place::point(*at, unit)),
                "paint the air that is there, or `void: adiabatic` if the model ends there on purpose",
            ),
            Self::AirsTouch { span, airs: [first, second], from, to } => (
                span,
                format!("{first} and {second} touch from {} to {}", place::point(*from, unit), place::point(*to, unit)),
                "two different airs need a solid between them".to_owned(),
                "close the gap with the solid that separates them, or give one `same_as:` the other if it is the same air",
            ),
            Self::SolidWithoutAir { span, solid, at } => (
                span,
                format!("the solid around {} ({solid}) touches no environment", place::point(*at, unit)),
                "its temperature is not settled by anything".to_owned(),
                "join it to the rest of the section, let air reach it, or leave it out",
            ),
            Self::ProbeOutside { span, name, at, inside } => (
                span,
                format!("probe `{name}` at {} lies {inside}", place::point(*at, unit)),
                "temperatures exist in solids and on their edges".to_owned(),
                "move it onto a solid; a point on a surface gives the surface temperature",
            ),
            Self::NoCut { span, side, elsewhere, on_voids } => {
                let mut help: Vec<String> = Vec::new();
                if !elsewhere.is_empty() {
                    let sides: Vec<String> = elsewhere.iter().map(|side| format!("`cut: {}`", side.word())).collect();
                    help.push(format!("plane elements are cut at {}", listed(&sides)));
                }
                if !on_voids.is_empty() {
                    let places: Vec<String> = on_voids.iter().map(|&at| near_text(at, unit)).collect();
                    help.push(format!("cut planes on a void are named with {}", places.join(" or ")));
                }
                if help.is_empty() {
                    help.push(
                        "let the wall, floor or roof run to the sheet's edge, with its air on both sides".to_owned(),
                    );
                }
                return complaint(
                    *span,
                    format!("no plane element is cut at the {} edge of the sheet", side.word()),
                    "a cut plane runs through solid from one air to another".to_owned(),
                    help.join("; "),
                );
            }
            Self::SeveralCuts { span, side, near } => {
                let places: Vec<String> = near.iter().map(|&at| near_text(at, unit)).collect();
                return complaint(
                    *span,
                    format!("{} plane elements are cut at the {} edge of the sheet", near.len(), side.word()),
                    "which one is meant?".to_owned(),
                    format!("add {}", places.join(" or ")),
                );
            }
            Self::SameAir { span, side, air, at } => (
                span,
                format!("the element cut at the {} ({}) has {air} on both sides", side.word(), place::point(*at, unit)),
                "a flank separates two different airs".to_owned(),
                "leave this flank out: no heat flows through it far from the junction",
            ),
            Self::CutTwice { span, first, first_name, at } => {
                related.push(crate::input::Related { span: *first, label: format!("`{first_name}` has it already") });
                (
                    span,
                    format!("the cut plane at {} is named twice", place::point(*at, unit)),
                    "each cut plane is one flank".to_owned(),
                    "leave one of them out, or give this one the cut plane it means",
                )
            }
        };
        Diagnostic { related, ..complaint(*span, message, label, help.to_owned()) }
    }
}

fn complaint(span: Span, message: String, label: String, help: String) -> Diagnostic {
    Diagnostic { severity: Severity::Error, span: Some(span), message, label, help: Some(help), related: Vec::new() }
}
