//! `flanks:`, `symmetry:` and `probes:`.

use super::document::{FlankEntry, Probe, Side, Spanned};
use super::numbers::Measure;
use super::problem::{Limit, NameProblem};
use super::reader::{Block, Choice, Fields, NamedBlock, Reader};
use super::tree::{Content, Node};

const FLANK_KEYS: [&str; 7] = ["name", "cut", "near", "internal", "overall_internal", "external", "u"];

const FLANK_EXAMPLE: &str = "`- { name: wall above, cut: top, internal: 1200, external: 1300 }`";

fn sides(what: String) -> Choice<Side> {
    Choice { what, words: &["left", "right", "top", "bottom"], values: &Side::ALL, meaning: None }
}

/// Reads `flanks:`.
pub(super) fn read(reader: &mut Reader, node: &Node) -> Vec<FlankEntry> {
    let expected = "a list of flanks, each with a dash before it, or [] for none";
    let Some(items) = reader.list(node, "`flanks`", expected, FLANK_EXAMPLE) else {
        return Vec::new();
    };
    let mut flanks: Vec<FlankEntry> = Vec::new();
    let mut first_places = std::collections::BTreeMap::new();
    for item in items {
        let Some(flank) = flank(reader, item) else {
            continue;
        };
        match first_places.get(&flank.name.value).copied() {
            Some(first) => {
                let problem = NameProblem::NameTwice { noun: "flank", name: flank.name.value };
                reader.report_with(flank.name.span, problem, first, "first listed here");
            }
            None => {
                first_places.insert(flank.name.value.clone(), flank.name.span);
                flanks.push(flank);
            }
        }
    }
    flanks
}

fn flank(reader: &mut Reader, node: &Node) -> Option<FlankEntry> {
    let block = Block {
        what: "this flank".to_owned(),
        place: "a flank",
        keys: &FLANK_KEYS,
        example: FLANK_EXAMPLE.to_owned(),
        owner: Some(node.span),
    };
    let fields = reader.fields(node, &block)?;
    let name = reader.require(&fields, "name", "name: wall above").and_then(|node| reader.name(node, "a flank"));
    let cut = reader.require(&fields, "cut", "cut: top").and_then(|node| {
        let value = reader.choice(node, &sides("`cut`".to_owned()))?;
        Some(Spanned { value, span: node.span })
    });
    let near = fields.get("near").map(|node| reader.point(node, "`near`"));
    let internal_m = length(reader, &fields, "internal");
    let overall_internal_m = length(reader, &fields, "overall_internal");
    let external_m = length(reader, &fields, "external");
    let u = fields.get("u").map(|node| {
        let advice = Some("it is the thermal transmittance of the clear element in W/(m²·K)");
        let limits = &[Limit::MoreThan(0.0), Limit::AtMost(100.0)];
        reader.measure(node, &Measure { what: "`u`".to_owned(), unit: "W/(m²·K)", limits, advice })
    });
    Some(FlankEntry {
        span: node.span,
        name: name?,
        cut: cut?,
        near: sound(near)?,
        internal_m: internal_m?,
        overall_internal_m: overall_internal_m?,
        external_m: external_m?,
        u_w_m2k: sound(u)?,
    })
}

/// A length of a flank in metres: `Some(None)` if it is not given, `None` if it is at fault.
fn length(reader: &mut Reader, fields: &Fields, key: &'static str) -> Option<Option<Spanned<f64>>> {
    let Some(node) = fields.get(key) else {
        return Some(None);
    };
    let length = reader.positive_length(node, &format!("the {} length", key.replace('_', " ")))?;
    Some(Some(Spanned { value: reader.unit.metres(length), span: node.span }))
}

/// `None` if a value was given and is at fault.
fn sound<T>(given: Option<Option<T>>) -> Option<Option<T>> {
    match given {
        Some(None) => None,
        Some(value) => Some(value),
        None => Some(None),
    }
}

/// Reads `symmetry:`, a list of sides or a single one.
pub(super) fn symmetry(reader: &mut Reader, node: &Node) -> Vec<Spanned<Side>> {
    let mut symmetry: Vec<Spanned<Side>> = Vec::new();
    let mut side = |reader: &mut Reader, node: &Node| {
        let Some(value) = reader.choice(node, &sides("`symmetry`".to_owned())) else {
            return;
        };
        match symmetry.iter().find(|earlier| earlier.value == value) {
            Some(first) => {
                let problem = NameProblem::NameTwice { noun: "side", name: value.word().to_owned() };
                reader.report_with(node.span, problem, first.span, "first listed here");
            }
            None => symmetry.push(Spanned { value, span: node.span }),
        }
    };
    match &node.content {
        Content::List(items) => items.iter().for_each(|item| side(reader, item)),
        Content::Scalar { .. } if node.is_nothing() => {}
        Content::Scalar { .. } => side(reader, node),
        Content::Mapping(_) => {
            reader.wrong_type(node, "`symmetry`".to_owned(), "a list of sides", "`symmetry: [left, right]`".to_owned());
        }
    }
    symmetry
}

/// Reads `probes:`.
pub(super) fn probes(reader: &mut Reader, node: &Node) -> Vec<Probe> {
    let block = NamedBlock { key: "probes", noun: "a probe", example: "`wall corner: [368, 100]`" };
    let mut probes = Vec::new();
    for (name, node) in reader.named(node, &block).unwrap_or_default() {
        if let Some(at) = reader.point(node, &format!("the probe `{}`", name.value)) {
            probes.push(Probe { name, at });
        }
    }
    probes
}
