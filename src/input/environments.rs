//! `environments:` the air on each side.

use super::document::{Environment, EnvironmentKind, Resistances, Span, Spanned};
use super::names::NameIndex;
use super::numbers::Measure;
use super::problem::{KeyProblem, Limit, NameList, NameProblem, Remark};
use super::reader::{Block, Choice, Fields, NamedBlock, Reader};
use super::tree::{Content, Node};

const KEYS: [&str; 6] =
    ["kind", "temperature", "relative_humidity", "surface_resistance", "moisture_resistance", "same_as"];

/// What `same_as` takes over.
const TAKEN_OVER: [&str; 3] = ["kind", "temperature", "relative_humidity"];

const EXAMPLE: &str = "`flat: { kind: internal, temperature: 20, relative_humidity: 50 }`";

/// Air outside this range, in °C, is no climate of a building.
const TEMPERATURES_C: [Limit; 2] = [Limit::AtLeast(-100.0), Limit::AtMost(200.0)];

/// Up to here, in percent, a relative humidity was probably written as a fraction.
const DRY_PERCENT: f64 = 1.0;

/// More than this, in m²K/W, is no surface resistance.
const RESISTANCES: [Limit; 2] = [Limit::AtLeast(0.0), Limit::AtMost(100.0)];

/// The environments that were read; `None` for one that is at fault.
#[derive(Default)]
pub(super) struct Environments {
    list: Vec<Option<Environment>>,
    /// `None` where the whole block is missing or at fault: then no name can be called unknown.
    index: Option<NameIndex>,
}

impl Environments {
    /// The environment of a name, or `None` where that has been reported.
    pub(super) fn find(&self, reader: &mut Reader, name: &Spanned<String>) -> Option<usize> {
        match self.index.as_ref()?.find(&name.value) {
            Some(place) => self.list[place].is_some().then_some(place),
            None => {
                reader.report_unknown_name(&name.value, name.span, NameList::Environments);
                None
            }
        }
    }

    /// Those without a fault, in file order.
    pub(super) fn into_list(self) -> Vec<Environment> {
        self.list.into_iter().flatten().collect()
    }
}

/// An environment as it stands in the file, before `same_as` is followed.
struct Draft {
    name: Spanned<String>,
    /// `same_as`: the entry, if there is one of that name, and where it is named.
    same_as: Option<(Option<usize>, Span)>,
    air: Option<Air>,
    surface_resistance: Option<Resistances>,
    moisture_resistance: Option<Resistances>,
    faulty: bool,
}

#[derive(Clone, Copy)]
struct Air {
    kind: EnvironmentKind,
    temperature_c: f64,
    relative_humidity_percent: Option<f64>,
}

/// Reads `environments:`.
pub(super) fn read(reader: &mut Reader, node: &Node) -> Environments {
    let block = NamedBlock { key: "environments", noun: "an environment", example: EXAMPLE };
    let Some(named) = reader.named(node, &block) else {
        return Environments::default();
    };
    let nothing = node.is_nothing() || matches!(&node.content, Content::Mapping(entries) if entries.is_empty());
    if nothing {
        reader.report(node.span, KeyProblem::NoEntries { key: "environments", example: EXAMPLE });
        return Environments::default();
    }
    let index = NameIndex::new(named.iter().map(|(name, _)| name));
    let drafts: Vec<Draft> = named.into_iter().map(|(name, node)| draft(reader, name, node, &index)).collect();
    let roots = roots(reader, &drafts);
    let list = drafts.iter().zip(&roots).enumerate().map(|(place, (draft, root))| {
        let root = (*root)?;
        let air = drafts[root].air.filter(|_| !draft.faulty && !drafts[root].faulty)?;
        Some(Environment {
            name: draft.name.clone(),
            same_as: (root != place).then_some(root),
            kind: air.kind,
            temperature_c: air.temperature_c,
            relative_humidity_percent: air.relative_humidity_percent,
            surface_resistance: draft.surface_resistance,
            moisture_resistance: draft.moisture_resistance,
        })
    });
    Environments { list: list.collect(), index: Some(index) }
}

fn draft(reader: &mut Reader, name: Spanned<String>, node: &Node, index: &NameIndex) -> Draft {
    let mut draft = Draft {
        name: name.clone(),
        same_as: None,
        air: None,
        surface_resistance: None,
        moisture_resistance: None,
        faulty: true,
    };
    let block = Block {
        what: format!("the environment `{}`", name.value),
        place: "an environment",
        keys: &KEYS,
        example: EXAMPLE.to_owned(),
        owner: Some(name.span),
    };
    let Some(fields) = reader.fields(node, &block) else {
        return draft;
    };
    match fields.get("same_as") {
        Some(other) => {
            for key in TAKEN_OVER {
                if let Some(span) = fields.key_span(key) {
                    reader.report(span, NameProblem::TakenOver { key });
                }
            }
            let other = reader.name(other, "an environment");
            let place = other.as_ref().and_then(|other| index.find(&other.value));
            if let (Some(other), None) = (&other, place) {
                reader.report_unknown_name(&other.value, other.span, NameList::Environments);
            }
            draft.same_as = Some((place, other.map_or(name.span, |other| other.span)));
        }
        None => draft.air = air(reader, &fields, &name.value),
    }
    let surface = resistances(reader, &fields, "surface_resistance", &name.value);
    let moisture = resistances(reader, &fields, "moisture_resistance", &name.value);
    if let (Some(surface), Some(moisture)) = (surface, moisture) {
        draft.surface_resistance = surface;
        draft.moisture_resistance = moisture;
        draft.faulty = false;
    }
    draft
}

fn air(reader: &mut Reader, fields: &Fields, name: &str) -> Option<Air> {
    let choice = Choice {
        what: format!("`kind` of `{name}`"),
        words: &["internal", "unheated", "external"],
        values: &[EnvironmentKind::Internal, EnvironmentKind::Unheated, EnvironmentKind::External],
        meaning: Some(
            "internal is a heated room, unheated a space neither heated nor outdoors, external the outdoor air",
        ),
    };
    let kind = reader.require(fields, "kind", "kind: internal").map(|node| reader.choice(node, &choice));
    let measure = Measure {
        what: format!("`temperature` of `{name}`"),
        unit: "°C",
        limits: &TEMPERATURES_C,
        advice: Some("temperatures are in °C"),
    };
    let temperature =
        reader.require(fields, "temperature", "temperature: 20").map(|node| reader.measure(node, &measure));
    let humidity = fields.get("relative_humidity").map(|node| humidity(reader, node, name));
    let relative_humidity_percent = match humidity {
        Some(humidity) => Some(humidity?),
        None => None,
    };
    Some(Air { kind: kind??, temperature_c: temperature??, relative_humidity_percent })
}

fn humidity(reader: &mut Reader, node: &Node, name: &str) -> Option<f64> {
    let measure = Measure {
        what: format!("`relative_humidity` of `{name}`"),
        unit: "%",
        limits: &[Limit::MoreThan(0.0), Limit::AtMost(100.0)],
        advice: Some("write percent, for example `relative_humidity: 50`"),
    };
    let percent = reader.measure(node, &measure)?;
    if percent <= DRY_PERCENT {
        reader.report(node.span, Remark::DryAir { percent });
    }
    Some(percent)
}

/// The resistances under a key: `Some(None)` if it is not there, `None` if it is at fault.
fn resistances(reader: &mut Reader, fields: &Fields, key: &'static str, name: &str) -> Option<Option<Resistances>> {
    let Some(node) = fields.get(key) else {
        return Some(None);
    };
    let measure = |part: &str| Measure {
        what: format!("{part}`{key}` of `{name}`"),
        unit: "m²K/W",
        limits: &RESISTANCES,
        advice: Some(
            "usual values are 0.04 outdoors, 0.10 to 0.25 indoors; 0 holds the surface at the air's temperature",
        ),
    };
    if !matches!(node.content, Content::Mapping(_)) {
        return Some(Some(Resistances::One(reader.measure(node, &measure(""))?)));
    }
    let block = Block {
        what: format!("`{key}` of `{name}`"),
        place: "a resistance by direction of heat flow",
        keys: &["up", "horizontal", "down"],
        example: format!("`{key}: {{ up: 0.10, horizontal: 0.13, down: 0.17 }}`"),
        owner: fields.key_span(key),
    };
    let fields = reader.fields(node, &block)?;
    let mut part = |key: &'static str, example: &'static str| {
        let node = reader.require(&fields, key, example)?;
        reader.measure(node, &measure(&format!("`{key}` in ")))
    };
    let (up, horizontal, down) =
        (part("up", "up: 0.10"), part("horizontal", "horizontal: 0.13"), part("down", "down: 0.17"));
    Some(Some(Resistances::ByDirection { up: up?, horizontal: horizontal?, down: down? }))
}

/// For each entry the one whose air it has: itself, or the end of its chain of `same_as`; `None` if there is no end.
/// A circle is reported once, at its first entry in the file.
fn roots(reader: &mut Reader, drafts: &[Draft]) -> Vec<Option<usize>> {
    let mut roots: Vec<Option<usize>> = vec![None; drafts.len()];
    // the walk in which an entry was first passed
    let mut walk: Vec<Option<usize>> = vec![None; drafts.len()];
    for start in 0..drafts.len() {
        let mut path = Vec::new();
        let mut at = start;
        let root = loop {
            if walk[at] == Some(start) {
                report_circle(reader, drafts, &path, at);
                break None;
            }
            if walk[at].is_some() {
                break roots[at];
            }
            walk[at] = Some(start);
            path.push(at);
            match drafts[at].same_as {
                None => break Some(at),
                Some((None, _)) => break None,
                Some((Some(next), _)) => at = next,
            }
        };
        for entry in path {
            roots[entry] = root;
        }
    }
    roots
}

fn report_circle(reader: &mut Reader, drafts: &[Draft], path: &[usize], first: usize) {
    let circle = path.iter().skip_while(|entry| **entry != first);
    let chain = circle.chain([&first]).map(|entry| drafts[*entry].name.value.clone()).collect();
    if let Some((_, span)) = drafts[first].same_as {
        reader.report(span, NameProblem::EnvironmentCycle { chain });
    }
}
