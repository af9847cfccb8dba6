//! What keeps a drawing from being rated: the facts. The sentences are in `fault_wording`.

use crate::input::{Side, Span};

/// A reason why a document is no junction, and where in the file it shows. Lengths and places in metres.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Fault {
    /// The drawing's lines enclose more fields than can be handled.
    TooManyFields { span: Span, columns: usize, rows: usize, limit: usize },
    /// All regions together are so thin along one axis that nothing is left of them.
    Flat { span: Span, axis: &'static str, size: f64, other_axis: &'static str, other_size: f64 },
    /// Too many rows of spaced bars lie over one another.
    BarsTooDeep { span: Span, at: [f64; 2], limit: usize },
    /// An outline has an edge that is not along an axis.
    SlopingEdge { span: Span, from: [f64; 2], to: [f64; 2], more: usize },
    /// An outline touches or crosses itself on the edge that starts at `span`.
    OutlineTouchesItself { span: Span, at: [f64; 2] },
    /// Spaced bars with an outline that is no box.
    BarsWithOutline { span: Span },
    /// Spaced bars need more room than their box has.
    BarsTooLarge { span: Span, area_m2: f64, spacing_m: f64, height_m: f64 },
    /// Rows of spaced bars over one another need more room than there is: their share of it.
    BarsTooLargeTogether { span: Span, at: [f64; 2], share: f64 },
    /// Spaced bars lie where there is no solid.
    BarsWithoutSolid { span: Span, under: String, at: [f64; 2] },
    /// No field of the sheet is solid; whether there were solids, which later regions cover.
    NoSolid { span: Span, covered: bool },
    /// No field of the sheet is air; whether there was air, which later regions cover.
    NoAir { span: Span, covered: bool },
    /// Only one air touches the solid: no heat flows.
    OneAir { span: Span, name: String },
    /// A solid ends at a part of the sheet that was never painted; the environment beside that part, if there is just one.
    Gap { span: Span, solid: String, at: [f64; 2], x: [f64; 2], y: [f64; 2], air: Option<String> },
    /// Two airs share an edge, and so many more; whether this one ends at the sheet's edge.
    AirsTouch { span: Span, airs: [String; 2], from: [f64; 2], to: [f64; 2], at_edge: bool, more: usize },
    /// More airs touch the solid than can be handled.
    TooManyAirs { span: Span, count: usize, limit: usize },
    /// A connected solid touches no air.
    SolidWithoutAir { span: Span, solid: String, x: [f64; 2], y: [f64; 2] },
    /// A probe lies in no solid; the nearest point of one.
    ProbeOutside { span: Span, name: String, at: [f64; 2], inside: String, nearest: Option<[f64; 2]> },
    /// A flank names a side that has no cut plane, or none between two airs.
    NoCut { span: Span, side: Side, elsewhere: Vec<Side>, on_voids: Vec<[f64; 2]> },
    /// A flank names a side that has several cut planes.
    SeveralCuts { span: Span, side: Side, count: usize, near: Vec<[f64; 2]> },
    /// A flank names a cut plane with the same air at both ends.
    SameAir { span: Span, side: Side, air: String, at: [f64; 2] },
    /// A flank names a cut plane that an earlier flank has; the sides of cut planes that no flank names.
    CutTwice { span: Span, first: Span, first_name: String, at: [f64; 2], open: Vec<Side> },
}

impl Fault {
    /// Where it shows.
    pub(super) fn span(&self) -> Span {
        match *self {
            Self::TooManyFields { span, .. }
            | Self::Flat { span, .. }
            | Self::BarsTooDeep { span, .. }
            | Self::SlopingEdge { span, .. }
            | Self::OutlineTouchesItself { span, .. }
            | Self::BarsWithOutline { span }
            | Self::BarsTooLarge { span, .. }
            | Self::BarsTooLargeTogether { span, .. }
            | Self::BarsWithoutSolid { span, .. }
            | Self::NoSolid { span, .. }
            | Self::NoAir { span, .. }
            | Self::OneAir { span, .. }
            | Self::Gap { span, .. }
            | Self::AirsTouch { span, .. }
            | Self::TooManyAirs { span, .. }
            | Self::SolidWithoutAir { span, .. }
            | Self::ProbeOutside { span, .. }
            | Self::NoCut { span, .. }
            | Self::SeveralCuts { span, .. }
            | Self::SameAir { span, .. }
            | Self::CutTwice { span, .. } => span,
        }
    }

    /// What such faults are, where they are only counted.
    pub(super) fn kind(&self) -> &'static str {
        match self {
            Self::TooManyFields { .. } => "sections with too many different coordinates",
            Self::Flat { .. } => "sections of no extent",
            Self::BarsTooDeep { .. } => "places with too many rows of spaced bars",
            Self::SlopingEdge { .. } => "outlines with edges that are not along an axis",
            Self::OutlineTouchesItself { .. } => "outlines that touch or cross themselves",
            Self::BarsWithOutline { .. } => "spaced bars drawn with an outline",
            Self::BarsTooLarge { .. } => "spaced bars that do not fit into their box",
            Self::BarsTooLargeTogether { .. } => "rows of spaced bars that do not fit over one another",
            Self::BarsWithoutSolid { .. } => "spaced bars where there is no solid",
            Self::NoSolid { .. } => "sections without a solid",
            Self::NoAir { .. } => "sections without air",
            Self::OneAir { .. } => "sections with one air only",
            Self::Gap { .. } => "unpainted parts of the sheet beside a solid",
            Self::AirsTouch { .. } => "pairs of airs that touch",
            Self::TooManyAirs { .. } => "sections with too many airs",
            Self::SolidWithoutAir { .. } => "solids that touch no air",
            Self::ProbeOutside { .. } => "probes in no solid",
            Self::NoCut { .. } => "flanks without a cut plane",
            Self::SeveralCuts { .. } => "flanks that do not say which cut plane is theirs",
            Self::SameAir { .. } => "flanks with the same air on both sides",
            Self::CutTwice { .. } => "flanks whose cut plane is named twice",
        }
    }
}
