//! What a junction file says, with every name, expression and length resolved to SI units, and its position kept.

/// A stretch of the file's text, in bytes.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub struct Span {
    /// First byte.
    pub start: usize,
    /// One past the last byte.
    pub end: usize,
}

/// A value and where it was written.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spanned<T> {
    /// The value.
    pub value: T,
    /// Where it stands in the file.
    pub span: Span,
}

/// A file's name, as given by the user, and its text.
#[derive(Clone, Debug)]
pub struct Source {
    /// The path as the user wrote it, for messages.
    pub name: String,
    /// The whole text.
    pub text: String,
}

/// The unit of every length in a file.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum LengthUnit {
    /// Millimetres (the default).
    #[default]
    Millimetre,
    /// Centimetres.
    Centimetre,
    /// Metres.
    Metre,
    /// Inches of 25.4 mm.
    Inch,
}

impl LengthUnit {
    /// Metres in one unit.
    pub fn in_metres(self) -> f64 {
        match self {
            Self::Millimetre => 1e-3,
            Self::Centimetre => 1e-2,
            Self::Metre => 1.0,
            Self::Inch => 0.0254,
        }
    }

    /// A length in this unit, in metres. 140 mm come out as exactly the number written 0.14.
    pub fn metres(self, length: f64) -> f64 {
        match self {
            Self::Millimetre => length / 1000.0,
            Self::Centimetre => length / 100.0,
            Self::Metre => length,
            Self::Inch => length * 25.4 / 1000.0,
        }
    }

    /// The unit's symbol: mm, cm, m or in.
    pub fn symbol(self) -> &'static str {
        match self {
            Self::Millimetre => "mm",
            Self::Centimetre => "cm",
            Self::Metre => "m",
            Self::Inch => "in",
        }
    }
}

/// How the section lies in the building.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Plane {
    /// A vertical section: y points up.
    Vertical,
    /// A plan: all heat flow is horizontal.
    Horizontal,
}

/// What an environment is, warmest kind first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum EnvironmentKind {
    /// A heated room.
    Internal,
    /// A space that is neither heated nor outdoors.
    Unheated,
    /// Outdoor air.
    External,
}

/// Surface resistances given by the user, in m²K/W; 0 is a prescribed temperature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Resistances {
    /// The same in every direction of heat flow.
    One(f64),
    /// By the direction of heat flow.
    ByDirection {
        /// Heat flowing upwards.
        up: f64,
        /// Heat flowing horizontally.
        horizontal: f64,
        /// Heat flowing downwards.
        down: f64,
    },
}

/// An entry of `environments:`; one with `same_as` has taken over the kind, temperature and humidity.
#[derive(Clone, Debug, PartialEq)]
pub struct Environment {
    /// Its name.
    pub name: Spanned<String>,
    /// Index in [`Document::environments`] of the entry whose air this is (never itself a `same_as`); `None`: its own.
    pub same_as: Option<usize>,
    /// Internal, unheated or external.
    pub kind: EnvironmentKind,
    /// Air temperature in °C.
    pub temperature_c: f64,
    /// Relative humidity in percent, where given.
    pub relative_humidity_percent: Option<f64>,
    /// Overrides the standard's surface resistance in the heat-flow run.
    pub surface_resistance: Option<Resistances>,
    /// Overrides the standard's surface resistance in the moisture run.
    pub moisture_resistance: Option<Resistances>,
}

/// Where a material's conductivity comes from.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Provenance {
    /// The junction file; the text is its `source:`, if it has one.
    File(Option<String>),
    /// The built-in catalogue; the text names the published source.
    Catalogue(String),
    /// A layer given by its thermal resistance: conductivity = thickness / resistance.
    LayerResistance,
}

/// A material that the section uses, or that the file defines.
#[derive(Clone, Debug, PartialEq)]
pub struct Material {
    /// Its name as the file writes it.
    pub name: String,
    /// Where it is defined; `None` for the catalogue's.
    pub span: Option<Span>,
    /// Thermal conductivity in W/(m·K), finite and positive.
    pub conductivity_w_mk: f64,
    /// Where that comes from.
    pub provenance: Provenance,
}

/// The class of a surface for the moisture run (ISO 13788).
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub enum SurfaceClass {
    /// Walls, floors, roofs.
    #[default]
    Opaque,
    /// Window and door frames.
    Frame,
    /// Glazing.
    Glazing,
}

impl SurfaceClass {
    /// The word the input file and the outputs use: opaque, frame or glazing.
    pub fn word(self) -> &'static str {
        match self {
            Self::Opaque => "opaque",
            Self::Frame => "frame",
            Self::Glazing => "glazing",
        }
    }
}

/// The outline of a region, in metres.
#[derive(Clone, Debug, PartialEq)]
pub enum Shape {
    /// A box with sides along the axes; the lower bound comes first and both sides are longer than zero.
    Box {
        /// Extent along x.
        x: [f64; 2],
        /// Extent along y.
        y: [f64; 2],
    },
    /// A closed polygon of at least three points, the last joined to the first.
    Outline(Vec<Spanned<[f64; 2]>>),
}

/// An axis of the sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Axis {
    /// Left to right.
    X,
    /// Bottom to top.
    Y,
}

/// What a region is filled with.
#[derive(Clone, Debug, PartialEq)]
pub enum Fill {
    /// A solid; index in [`Document::materials`].
    Material(usize),
    /// Bars of a material that cross what was painted before, spaced along the junction.
    SpacedBars {
        /// Index in [`Document::materials`].
        material: usize,
        /// Cross-section of one bar, m².
        area_m2: f64,
        /// Distance from bar to bar along the junction, m.
        spacing_m: f64,
        /// The axis along which the bars run.
        along: Axis,
    },
    /// Air; index in [`Document::environments`].
    Environment(usize),
    /// A part of the sheet outside the model; its edges are adiabatic.
    Void,
}

/// One region, in painting order. A build-up has become one region a layer.
#[derive(Clone, Debug, PartialEq)]
pub struct Region {
    /// Where it is described.
    pub span: Span,
    /// Its outline.
    pub shape: Shape,
    /// What fills it.
    pub fill: Fill,
    /// The class of its surfaces.
    pub class: SurfaceClass,
}

/// An edge of the sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Side {
    /// Smallest x.
    Left,
    /// Largest x.
    Right,
    /// Largest y.
    Top,
    /// Smallest y.
    Bottom,
}

impl Side {
    /// All four, in the order of declaration.
    pub const ALL: [Self; 4] = [Self::Left, Self::Right, Self::Top, Self::Bottom];

    /// left, right, top or bottom.
    pub fn word(self) -> &'static str {
        match self {
            Self::Left => "left",
            Self::Right => "right",
            Self::Top => "top",
            Self::Bottom => "bottom",
        }
    }

    /// The side across the sheet.
    pub fn opposite(self) -> Self {
        match self {
            Self::Left => Self::Right,
            Self::Right => Self::Left,
            Self::Top => Self::Bottom,
            Self::Bottom => Self::Top,
        }
    }
}

/// One entry of `flanks:`.
#[derive(Clone, Debug, PartialEq)]
pub struct FlankEntry {
    /// Where it is described.
    pub span: Span,
    /// Its name.
    pub name: Spanned<String>,
    /// The sheet edge that cuts it.
    pub cut: Spanned<Side>,
    /// Picks the cut plane nearest to this point, in metres, where a side has several.
    pub near: Option<[f64; 2]>,
    /// Internal length in metres, where given.
    pub internal_m: Option<Spanned<f64>>,
    /// Overall internal length in metres, where given.
    pub overall_internal_m: Option<Spanned<f64>>,
    /// External length in metres, where given.
    pub external_m: Option<Spanned<f64>>,
    /// Thermal transmittance of the clear element in W/(m²·K), where it has its own value.
    pub u_w_m2k: Option<f64>,
}

/// A named point at which temperatures are wanted.
#[derive(Clone, Debug, PartialEq)]
pub struct Probe {
    /// Its name.
    pub name: Spanned<String>,
    /// Position in metres.
    pub at: [f64; 2],
}

/// A junction file whose every statement makes sense on its own. How they fit together is checked by `junction`.
#[derive(Clone, Debug, PartialEq)]
pub struct Document {
    /// The title.
    pub title: String,
    /// The unit lengths are written in; values here are metres already.
    pub unit: LengthUnit,
    /// How the section lies.
    pub plane: Plane,
    /// Environments in file order; at least one.
    pub environments: Vec<Environment>,
    /// The file's materials in file order, then those used from the catalogue and those made from layer resistances.
    pub materials: Vec<Material>,
    /// Regions in painting order; at least one.
    pub regions: Vec<Region>,
    /// Where `section:` stands, for problems of the whole.
    pub section_span: Span,
    /// Sheet edges that are planes of symmetry.
    pub symmetry: Vec<Spanned<Side>>,
    /// The flanks, where the file lists them; `None` leaves them to the geometry.
    pub flanks: Option<Vec<FlankEntry>>,
    /// Points at which temperatures are wanted.
    pub probes: Vec<Probe>,
    /// Remarks that do not stop the reading, such as a layer left out for its zero thickness.
    pub remarks: Vec<super::Diagnostic>,
}
