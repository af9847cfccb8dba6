//! Everything that can be wrong with a file, as facts. The sentences are in `wording`.

use super::diagnostic::{Diagnostic, Related, Severity};
use super::document::Span;
use super::expression::ExpressionFault;
use super::names::FirstNames;

/// One thing that is wrong, or worth a remark, with the facts that its sentences need.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Problem {
    File(FileProblem),
    Syntax(SyntaxProblem),
    Key(KeyProblem),
    Name(NameProblem),
    Number(NumberProblem),
    Region(RegionProblem),
    Remark(Remark),
}

/// What is wrong with a file as a whole, or with its size.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum FileProblem {
    NoSuchFile,
    Folder,
    Unreadable { reason: String },
    TooLarge { bytes: Option<u64> },
    NotUtf8,
    Utf16,
    Empty,
    NoKeys { found: &'static str },
    TooDeep,
    TooManyValues,
    TooManyEntries,
    TooManyRegions,
}

/// What is wrong with keys, or with the kind of a value.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum KeyProblem {
    UnknownKey {
        key: String,
        place: &'static str,
        nearest: Option<&'static str>,
        known: &'static [&'static str],
    },
    /// A key that another kind of region has.
    MisplacedKey {
        key: &'static str,
        place: &'static str,
        belongs_to: &'static str,
    },
    DuplicateKey {
        key: String,
    },
    MissingKey {
        key: &'static str,
        place: String,
        example: &'static str,
    },
    WrongType {
        what: String,
        expected: &'static str,
        found: &'static str,
        example: String,
    },
    NoEntries {
        key: &'static str,
        example: &'static str,
    },
    WrongCount {
        what: String,
        expected: &'static str,
        found: usize,
        example: &'static str,
    },
    UnknownWord {
        what: String,
        word: String,
        choices: &'static [&'static str],
        nearest: Option<&'static str>,
        meaning: Option<&'static str>,
    },
}

/// What is wrong with names and what they refer to.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum NameProblem {
    BadName {
        noun: &'static str,
        fault: NameFault,
    },
    UnknownName {
        list: NameList,
        name: String,
        nearest: Option<(NameList, String)>,
        known: FirstNames,
    },
    NameTwice {
        noun: &'static str,
        name: String,
    },
    BadParameterName {
        name: String,
        reserved: bool,
    },
    ParameterCycle {
        chain: Vec<String>,
    },
    EnvironmentCycle {
        chain: Vec<String>,
    },
    /// A key beside `same_as` that is taken over from the other environment.
    TakenOver {
        key: &'static str,
    },
}

/// What is wrong with a number.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum NumberProblem {
    Expression {
        fault: ExpressionFault,
        nearest: Option<String>,
        parameters: FirstNames,
    },
    QuotedNumber {
        what: String,
    },
    /// A comma between brackets has split a function's arguments.
    FunctionInBrackets,
    OutOfRange {
        what: String,
        value: f64,
        unit: &'static str,
        limit: Limit,
        advice: Option<&'static str>,
    },
}

/// What is wrong with layers and regions.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum RegionProblem {
    LayerWithoutThickness { material: String },
    LayerSpelledOut { material: String },
    LayersTogether,
    RegionWithoutContent,
    RegionWithSeveral { found: Vec<&'static str> },
    RegionWithoutPlace,
    OutlineAndBox,
    ZeroExtent { axis: &'static str, at: f64, unit: &'static str },
    StartIsRange { axis: &'static str },
    FewPoints { found: usize },
    RepeatedPoint,
    NoArea,
    SpacedOutline,
    SpacedSquare,
    BarsOverfull { bars_mm2_per_m: f64, box_mm2_per_m: f64 },
}

/// What is worth a look but stops nothing.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Remark {
    ZeroLayer { material: String },
    UnusedMaterial { name: String },
    UnusedBuildup { name: String },
    UnusedParameter { name: String },
    TypicalValue { name: String, conductivity_w_mk: f64 },
    DryAir { percent: f64 },
    UnlikeCatalogue { name: String, conductivity_w_mk: f64, catalogue_w_mk: f64 },
}

/// What is wrong with the YAML itself.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum SyntaxProblem {
    StrangeCharacter { code: u32 },
    TabIndentation,
    Tab,
    OddSpace,
    Indentation { spaces: usize, spaces_above: usize },
    OutOfPlace,
    NoColon,
    NoSpaceAfterColon,
    NoSpaceAfterDash,
    ColonInText,
    UnclosedQuote,
    TextAfterQuote,
    Backslash,
    UnclosedBracket { expected: char },
    UnopenedBracket,
    WrongBracket { expected: char, opened: Span },
    MissingComma,
    DashInBrackets,
    ReservedCharacter { found: char },
    UnknownAlias { name: String },
    AliasOfItself,
    MergeKey,
    Tag,
    KeyIsNoWord,
    SecondDocument,
    TooDeep,
}

/// Why a name cannot be one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum NameFault {
    Nothing,
    TooLong,
    ControlCharacter,
    NoWord,
}

/// A list of the file in which a name is looked for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum NameList {
    Environments,
    Materials,
    Catalogue,
    Buildups,
}

/// A bound that a number must keep.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Limit {
    MoreThan(f64),
    AtLeast(f64),
    AtMost(f64),
}

impl Limit {
    pub(super) fn holds(self, value: f64) -> bool {
        match self {
            Self::MoreThan(bound) => value > bound,
            Self::AtLeast(bound) => value >= bound,
            Self::AtMost(bound) => value <= bound,
        }
    }
}

macro_rules! from_each_kind {
    ($($kind:ident: $type:ty),*) => {
        $(impl From<$type> for Problem {
            fn from(problem: $type) -> Self {
                Self::$kind(problem)
            }
        })*
    };
}

from_each_kind!(
    File: FileProblem, Syntax: SyntaxProblem, Key: KeyProblem, Name: NameProblem, Number: NumberProblem,
    Region: RegionProblem, Remark: Remark
);

impl Problem {
    /// The problem in words, at its place; `None`: the file as a whole.
    pub(super) fn at(&self, span: Option<Span>) -> Diagnostic {
        let words = super::wording::words(self);
        let severity = match self {
            Self::Remark(_) => Severity::Warning,
            _ => Severity::Error,
        };
        let related = match self {
            Self::Syntax(SyntaxProblem::WrongBracket { opened, .. }) => {
                vec![Related { span: *opened, label: "opened here".to_owned() }]
            }
            _ => Vec::new(),
        };
        Diagnostic { severity, span, message: words.message, label: words.label, help: words.help, related }
    }
}
