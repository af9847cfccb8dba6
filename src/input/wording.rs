//! All sentences about what a file says, in one place so that they speak alike; those about its YAML and its
//! expressions are in `wording_syntax`. What is wrong comes first, one sentence without a full stop; then, beside the
//! quoted line, what was expected; then what to write instead.

use super::names::FirstNames;
use super::numbers::plain;
use super::problem::{
    KeyProblem, Limit, NameFault, NameList, NameProblem, NumberProblem, Problem, RegionProblem, Remark,
};
use super::wording_syntax::{expression_words, file_words, syntax_words};

/// A problem in words.
pub(super) struct Words {
    pub(super) message: String,
    /// Shown beside the quoted line; may be empty.
    pub(super) label: String,
    pub(super) help: Option<String>,
}

/// Empty help is none.
pub(super) fn say(message: impl Into<String>, label: impl Into<String>, help: impl Into<String>) -> Words {
    let help: String = help.into();
    Words { message: message.into(), label: label.into(), help: (!help.is_empty()).then_some(help) }
}

/// Circles of more names than this are not spelt out.
const CIRCLE_SPELT_OUT: usize = 8;

/// Text of the file quoted in a message is cut to so many characters.
const QUOTED_LENGTH: usize = 60;

pub(super) fn words(problem: &Problem) -> Words {
    match problem {
        Problem::File(problem) => file_words(problem),
        Problem::Syntax(problem) => syntax_words(problem),
        Problem::Key(problem) => key_words(problem),
        Problem::Name(problem) => name_words(problem),
        Problem::Number(problem) => number_words(problem),
        Problem::Region(problem) => region_words(problem),
        Problem::Remark(remark) => remark_words(remark),
    }
}

fn key_words(problem: &KeyProblem) -> Words {
    match problem {
        KeyProblem::UnknownKey { key, place, nearest, known } => {
            let key = quoted(key);
            let help = match nearest {
                Some(near) => format!("did you mean `{near}`?"),
                None => format!("the keys of {place} are {}", and_list(known)),
            };
            let message = format!("`{key}` is not a key of {place}");
            if key.bytes().all(|byte| byte.is_ascii_digit()) {
                let help = "a comma separates keys; write the number with a point, such as `0.77`";
                return say(message, "is this the end of a decimal number?", help.to_owned());
            }
            match key.split_once(':') {
                Some((before, after)) if *nearest == Some(before) => {
                    say(message, "a space is missing after the colon", format!("write `{before}: {after}`"))
                }
                _ => say(message, "unknown key", help),
            }
        }
        KeyProblem::MisplacedKey { key, place, belongs_to } => say(
            format!("`{key}` has no meaning in {place}"),
            "does not belong here",
            format!("`{key}` belongs to {belongs_to}"),
        ),
        KeyProblem::DuplicateKey { key } => {
            let key = quoted(key);
            say(format!("`{key}` is written twice"), "written again here", "keep one of the two")
        }
        KeyProblem::MissingKey { key, place, example } => {
            say(format!("{place} has no `{key}`"), format!("`{key}` is required"), format!("add {}", ticked(example)))
        }
        KeyProblem::WrongType { what, expected, found, example } => {
            let help = if example.is_empty() { String::new() } else { format!("for example {example}") };
            say(format!("{what} must be {expected}, not {found}"), format!("expected {expected}"), help)
        }
        KeyProblem::NoEntries { key, example } => {
            say(format!("`{key}` is empty"), "at least one entry is required", format!("for example {example}"))
        }
        KeyProblem::WrongCount { what, expected, found, example } => {
            let count = if *found == 1 { "1 value".to_owned() } else { format!("{found} values") };
            let help = format!("for example {example}; decimals take a point, as a comma separates values");
            say(format!("{what} must be {expected}, and has {count}"), format!("expected {expected}"), help)
        }
        KeyProblem::UnknownWord { what, word, choices, nearest, meaning } => {
            let near = nearest.map(|near| format!("did you mean `{near}`?"));
            let help: Vec<String> = near.into_iter().chain(meaning.map(str::to_owned)).collect();
            say(
                format!("{what} cannot be `{}`", quoted(word)),
                format!("expected {}", or_list(choices)),
                help.join("\n"),
            )
        }
    }
}

fn name_words(problem: &NameProblem) -> Words {
    match problem {
        NameProblem::BadName { noun, fault } => {
            let (fault, help) = match fault {
                NameFault::Nothing => ("is empty", "write a name"),
                NameFault::TooLong => ("is longer than 100 characters", "shorten it"),
                NameFault::ControlCharacter => ("has a line break or control character in it", "write it on one line"),
                NameFault::NoWord => ("must be a word or words", "write a name"),
            };
            say(format!("the name of {noun} {fault}"), "expected a name", help)
        }
        NameProblem::UnknownName { list, name, nearest, known } => {
            unknown_name_words(*list, name, nearest.as_ref(), known)
        }
        NameProblem::NameTwice { noun, name } => say(
            format!("the {noun} `{}` is listed twice", quoted(name)),
            "listed again here",
            if *noun == "flank" { "give each flank a name of its own" } else { "keep one of the two" },
        ),
        NameProblem::BadParameterName { name, reserved: true } => say(
            format!("a parameter cannot be called `{}`", quoted(name)),
            "the name of a function",
            "choose another name",
        ),
        NameProblem::BadParameterName { name, reserved: false } => {
            let joined: String = name.chars().map(|c| if c.is_alphanumeric() { c } else { '_' }).collect();
            let start = if joined.starts_with(|c: char| c.is_numeric()) { "_" } else { "" };
            say(
                format!("a parameter cannot be called `{}`", quoted(name)),
                "letters, digits and underscores only, no digit first",
                format!("write `{start}{}`; in an expression `-` is always minus", quoted(&joined)),
            )
        }
        NameProblem::ParameterCycle { chain } => say(
            format!("the parameter `{}` is defined by itself", quoted(&chain[0])),
            "needs its own value",
            format!("{}: give one of them a number", chain_words(chain, "needs")),
        ),
        NameProblem::EnvironmentCycle { chain } => say(
            format!("`same_as` of the environment `{}` leads back to itself", quoted(&chain[0])),
            "the air of none of them is given",
            format!("{}: give one of them its own `kind` and `temperature`", chain_words(chain, "is the same as")),
        ),
        NameProblem::TakenOver { key } => say(
            format!("`{key}` cannot stand beside `same_as`"),
            "taken over from the other environment",
            format!("leave `{key}` out, or leave `same_as` out for an environment of its own"),
        ),
    }
}

fn unknown_name_words(list: NameList, name: &str, nearest: Option<&(NameList, String)>, known: &FirstNames) -> Words {
    let name = quoted(name);
    let (noun, message) = match list {
        NameList::Environments => ("environment", format!("there is no environment `{name}`")),
        NameList::Buildups => ("build-up", format!("there is no build-up `{name}`")),
        NameList::Materials | NameList::Catalogue => {
            ("material", format!("there is no material `{name}` in the file or the catalogue"))
        }
    };
    let own_list = |near: NameList| near == list || near == NameList::Catalogue;
    let help = match nearest {
        Some((NameList::Catalogue, near)) => format!("did you mean `{}` of the catalogue?", quoted(near)),
        Some((near_list, near)) if own_list(*near_list) => format!("did you mean `{}`?", quoted(near)),
        Some((near_list, near)) => {
            let (article, key) = match near_list {
                NameList::Environments => ("an environment", "environment"),
                NameList::Buildups => ("a build-up", "buildup"),
                NameList::Materials | NameList::Catalogue => ("a material", "material"),
            };
            format!("`{0}` is {article}: a region of it is written `{key}: {0}`", quoted(near))
        }
        None => match (list, known) {
            (NameList::Materials, _) => {
                format!("define it under `materials:`, as in `{name}: {{ conductivity: 0.5 }}`")
            }
            (_, known) if known.total == 0 => format!(
                "the file has none; define it under `{}:`",
                if noun == "environment" { "environments" } else { "buildups" }
            ),
            (_, known) => format!("the file has {}", name_list(known)),
        },
    };
    say(message, format!("unknown {noun}"), help)
}

fn number_words(problem: &NumberProblem) -> Words {
    match problem {
        NumberProblem::Expression { fault, nearest, parameters } => {
            expression_words(fault, nearest.as_deref(), parameters)
        }
        NumberProblem::QuotedNumber { what } => say(
            format!("{what} must be a number, not text in quotes"),
            "text, because of the quotes",
            "write the number or expression without quotes",
        ),
        NumberProblem::FunctionInBrackets => say(
            "a comma between brackets separates values, also within a function",
            "cut off by the comma",
            "give the expression a name under `parameters:` and write that name here",
        ),
        NumberProblem::OutOfRange { what, value, unit, limit, advice } => {
            let rule = match limit {
                Limit::AtLeast(bound) if *bound == 0.0 => "not be negative".to_owned(),
                Limit::MoreThan(bound) => format!("be more than {}", with_unit(*bound, unit)),
                Limit::AtLeast(bound) => format!("be at least {}", with_unit(*bound, unit)),
                Limit::AtMost(bound) => format!("be at most {}", with_unit(*bound, unit)),
            };
            let (message, label) = (format!("{what} must {rule}"), format!("is {}", with_unit(*value, unit)));
            say(message, label, advice.unwrap_or_default())
        }
    }
}

fn region_words(problem: &RegionProblem) -> Words {
    match problem {
        RegionProblem::LayerWithoutThickness { material } => {
            let material = quoted(material);
            say(
                format!("the layer `{material}` has no thickness"),
                "a layer is a material and its thickness",
                format!("write `- {material}: 140`"),
            )
        }
        RegionProblem::LayerSpelledOut { material } => {
            let material = quoted(material);
            say(
                "a layer is written as its material with the thickness after it",
                "more than one key in a layer",
                format!("write `- {material}: 140`, or `- {material}: {{ thickness: 140 }}`"),
            )
        }
        RegionProblem::LayersTogether => say(
            "a layer must be one material with its thickness",
            "several layers, or none, after one dash",
            "write each layer on a line of its own, as in `- mineral wool: 140`",
        ),
        RegionProblem::RegionWithoutContent => say(
            "this region does not say what fills it",
            "expected one of environment, buildup, material or void",
            "for example `material: reinforced concrete`",
        ),
        RegionProblem::RegionWithSeveral { found } => say(
            format!("a region has one filling, and this one has {}: {}", found.len(), and_list(found)),
            "expected one of environment, buildup, material or void",
            "write a region for each; later regions cover earlier ones",
        ),
        RegionProblem::RegionWithoutPlace => say(
            "this region does not say where it lies",
            "expected `x` and `y`, or `outline`",
            "for example `x: [0, 200], y: [0, 1000]`",
        ),
        RegionProblem::OutlineAndBox => say(
            "a region lies either in a box or within an outline",
            "does not go with `outline`",
            "leave out `outline`, or `x` and `y`",
        ),
        RegionProblem::ZeroExtent { axis, at, unit } => say(
            format!("this region has no extent: `{axis}` runs from {0} to {0}", with_unit(*at, unit)),
            "both ends are equal",
            "give it an extent, or leave the region out",
        ),
        RegionProblem::StartIsRange { axis } => say(
            format!("`{axis}` must be one number here, not a list"),
            "expected where the first layer starts",
            format!("write for example `{axis}: 0`; the layers' thicknesses say how far the build-up reaches"),
        ),
        RegionProblem::FewPoints { found } => say(
            format!("an outline needs at least three points, and this one has {found}"),
            "expected three points or more",
            "for example `outline: [[0, 0], [60, 0], [60, 40]]`",
        ),
        RegionProblem::RepeatedPoint => {
            say("a point of this outline is the same as the one before", "repeated here", "leave one of them out")
        }
        RegionProblem::NoArea => say(
            "this outline encloses no area",
            "the points lie on one line, or the outline crosses itself",
            "list the corners in the order in which one walks around the region",
        ),
        RegionProblem::SpacedOutline => say(
            "`spaced` bars need a box",
            "not possible with an outline",
            "give the region `x` and `y`: the length of the bars and their depth in the section",
        ),
        RegionProblem::SpacedSquare => say(
            "the direction of these bars is not clear, as their box is a square",
            "`along` is required here",
            "add `along: x` or `along: y`, the direction in which the bars run",
        ),
        RegionProblem::BarsOverfull { bars_mm2_per_m, box_mm2_per_m } => say(
            format!(
                "the bars take more room than their box: {} mm² a metre in a box of {} mm² a metre",
                whole(*bars_mm2_per_m),
                whole(*box_mm2_per_m)
            ),
            "area / spacing is more than the depth of the box",
            "check the area of one bar in mm², the spacing, and the depth of the box across the bars",
        ),
    }
}

fn remark_words(remark: &Remark) -> Words {
    match remark {
        Remark::ZeroLayer { material } => {
            say(format!("the layer `{}` is left out, as its thickness is 0", quoted(material)), "no thickness", "")
        }
        Remark::UnusedMaterial { name } => say(
            format!("the material `{}` is not used", quoted(name)),
            "no layer and no region is of it",
            "check the spelling where it was meant, or leave it out",
        ),
        Remark::UnusedBuildup { name } => say(
            format!("the build-up `{}` is not used", quoted(name)),
            "no region is of it",
            "check the spelling where it was meant, or leave it out",
        ),
        Remark::UnusedParameter { name } => say(
            format!("the parameter `{}` is not used", quoted(name)),
            "changing it changes nothing",
            "check the spelling where it was meant, or leave it out",
        ),
        Remark::TypicalValue { name, conductivity_w_mk } => say(
            format!("`{name}` is taken with a typical conductivity, {} W/(m·K)", plain(*conductivity_w_mk)),
            "from the catalogue, not declared for a product",
            format!("give the product's declared value under `materials:`, as in `{name}: {{ conductivity: 0.035 }}`"),
        ),
        Remark::UnlikeCatalogue { name, conductivity_w_mk, catalogue_w_mk } => say(
            format!(
                "`{name}` conducts {} W/(m·K) here, but {} in the catalogue",
                plain(*conductivity_w_mk),
                plain(*catalogue_w_mk)
            ),
            "more than ten times apart",
            "check the decimal point and the unit, W/(m·K)".to_owned(),
        ),
        Remark::DryAir { percent } => say(
            format!("a relative humidity of {} % is very dry", plain(*percent)),
            "in percent",
            format!("if a fraction was meant, write `relative_humidity: {}`", plain(percent * 100.0)),
        ),
    }
}

/// The file's own words as they may stand in a message: not too long.
pub(super) fn quoted(text: &str) -> String {
    if text.chars().count() <= QUOTED_LENGTH {
        return text.to_owned();
    }
    text.chars().take(QUOTED_LENGTH).chain(['…']).collect()
}

fn with_unit(value: f64, unit: &str) -> String {
    let number = plain(value);
    if unit.is_empty() { number } else { format!("{number} {unit}") }
}

/// An example in backticks, unless it brings its own.
fn ticked(example: &str) -> String {
    if example.contains('`') { example.to_owned() } else { format!("`{example}`") }
}

/// A number of which only the size matters.
fn whole(value: f64) -> String {
    if value < 1e9 { format!("{value:.0}") } else { format!("{value:.0e}") }
}

fn and_list<T: AsRef<str>>(words: &[T]) -> String {
    joined(words, "and")
}

fn or_list<T: AsRef<str>>(words: &[T]) -> String {
    joined(words, "or")
}

fn joined<T: AsRef<str>>(words: &[T], last: &str) -> String {
    match words {
        [] => String::new(),
        [only] => only.as_ref().to_owned(),
        [first @ .., end] => {
            let first: Vec<&str> = first.iter().map(AsRef::as_ref).collect();
            format!("{} {last} {}", first.join(", "), end.as_ref())
        }
    }
}

/// Names of a list, the first few.
pub(super) fn name_list(names: &FirstNames) -> String {
    let shown: Vec<String> = names.first.iter().map(|name| format!("`{}`", quoted(name))).collect();
    match names.total - shown.len() {
        0 => and_list(&shown),
        more => format!("{} and {more} more", shown.join(", ")),
    }
}

/// A circle of names: "`a` needs `b`, which needs `a`".
fn chain_words(chain: &[String], verb: &str) -> String {
    let names: Vec<String> = chain.iter().map(|name| format!("`{}`", quoted(name))).collect();
    match names.as_slice() {
        [first, rest @ ..] if rest.len() <= CIRCLE_SPELT_OUT => {
            format!("{first} {verb} {}", rest.join(&format!(", which {verb} ")))
        }
        [first, second, .., last] => {
            format!("{first} {verb} {second}, and so on through {} names back to {last}", names.len() - 1)
        }
        _ => names.concat(),
    }
}
