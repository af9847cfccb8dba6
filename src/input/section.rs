//! `section:` the regions, in painting order. A region of a build-up becomes one region a layer.

use super::buildups::{Buildups, Layer, surface_class};
use super::document::{Axis, Fill, Region, Shape, SurfaceClass};
use super::environments::Environments;
use super::materials::Materials;
use super::numbers::{Measure, NOTHING_M};
use super::problem::{FileProblem, KeyProblem, Limit, RegionProblem};
use super::reader::{Block, Choice, Fields, Reader};
use super::shapes::{range_m, shape};
use super::tree::{Content, LIST_LIMIT, Node};

/// What a region can be, and the further keys that each kind has.
const KINDS: [(&str, &[&str]); 4] = [
    ("environment", &["x", "y", "outline"]),
    ("buildup", &["x", "y", "towards"]),
    ("material", &["x", "y", "outline", "spaced", "surface"]),
    ("void", &["x", "y", "outline"]),
];

/// The keys of all kinds, the four kinds first.
const KEYS: [&str; 10] =
    ["environment", "buildup", "material", "void", "x", "y", "outline", "towards", "spaced", "surface"];

const EXAMPLE: &str = "`- { material: reinforced concrete, x: [0, 200], y: [0, 1000] }`";

/// The lists that regions refer to.
pub(super) struct Lists {
    pub(super) environments: Environments,
    pub(super) materials: Materials,
    pub(super) buildups: Buildups,
}

/// Reads `section:`.
pub(super) fn read(reader: &mut Reader, node: &Node, lists: &mut Lists) -> Vec<Region> {
    if node.is_nothing() {
        reader.report(node.span, KeyProblem::NoEntries { key: "section", example: EXAMPLE });
        return Vec::new();
    }
    let expected = "a list of regions, each with a dash before it";
    let Some(items) = reader.list(node, "`section`", expected, EXAMPLE) else {
        return Vec::new();
    };
    if items.is_empty() {
        reader.report(node.span, KeyProblem::NoEntries { key: "section", example: EXAMPLE });
    }
    let mut regions = Vec::new();
    for item in items {
        region(reader, item, lists, &mut regions);
        if regions.len() > LIST_LIMIT {
            reader.report(item.span, FileProblem::TooManyRegions);
            break;
        }
    }
    regions
}

fn region(reader: &mut Reader, node: &Node, lists: &mut Lists, regions: &mut Vec<Region>) {
    let block = Block {
        what: "this region".to_owned(),
        place: "a region",
        keys: &KEYS,
        example: EXAMPLE.to_owned(),
        owner: Some(node.span),
    };
    let Some(fields) = reader.fields(node, &block) else {
        return;
    };
    let kinds: Vec<&'static str> =
        KINDS.iter().map(|(kind, _)| *kind).filter(|kind| fields.get(kind).is_some()).collect();
    let kind = match kinds.as_slice() {
        [kind] => *kind,
        [] => {
            if !fields.perhaps_meant(&KEYS[..4]) {
                reader.report(node.span, RegionProblem::RegionWithoutContent);
            }
            return;
        }
        _ => {
            reader.report(node.span, RegionProblem::RegionWithSeveral { found: kinds });
            return;
        }
    };
    refuse_keys_of_other_kinds(reader, &fields, kind);
    let Some(subject) = fields.get(kind) else {
        return;
    };
    match kind {
        "buildup" => laid_out(reader, &fields, subject, lists, regions),
        _ => regions.extend(filled(reader, &fields, kind, subject, lists)),
    }
}

fn refuse_keys_of_other_kinds(reader: &mut Reader, fields: &Fields, kind: &'static str) {
    let place = match kind {
        "environment" => "an environment's region",
        "buildup" => "a build-up's region",
        "material" => "a material's region",
        _ => "a void",
    };
    let own = KINDS.iter().find(|(name, _)| *name == kind).map_or([].as_slice(), |(_, keys)| *keys);
    for key in fields.keys().filter(|key| *key != kind && !own.contains(key)) {
        let belongs_to = match key {
            "towards" => "a build-up",
            "spaced" => "a material in a box",
            "surface" => "a material, or a layer of a build-up",
            _ => "a material, an environment or a void",
        };
        if let Some(span) = fields.key_span(key) {
            reader.report(span, KeyProblem::MisplacedKey { key, place, belongs_to });
        }
    }
}

/// A region of one filling: an environment, a material or a void.
fn filled(reader: &mut Reader, fields: &Fields, kind: &str, subject: &Node, lists: &mut Lists) -> Option<Region> {
    let fill = match kind {
        "environment" => {
            let name = reader.name(subject, "an environment");
            name.and_then(|name| lists.environments.find(reader, &name)).map(Fill::Environment)
        }
        "material" => {
            let name = reader.name(subject, "a material");
            name.and_then(|name| lists.materials.find(reader, &name.value, name.span)).map(Fill::Material)
        }
        _ => {
            let meaning = Some("a void is a part of the sheet outside the model; no heat passes its edges");
            let choice = Choice { what: "`void`".to_owned(), words: &["adiabatic"], values: &[()], meaning };
            reader.choice(subject, &choice).map(|()| Fill::Void)
        }
    };
    let class = match fields.get("surface") {
        Some(node) if kind == "material" => surface_class(reader, node),
        _ => Some(SurfaceClass::default()),
    };
    let shape = shape(reader, fields);
    let spaced = match fields.get("spaced") {
        Some(node) if kind == "material" => Some(spaced(reader, fields, node, shape.as_ref())),
        _ => None,
    };
    let fill = match (fill?, spaced) {
        (Fill::Material(material), Some(bars)) => {
            let Bars { area_m2, spacing_m, along } = bars?;
            Fill::SpacedBars { material, area_m2, spacing_m, along }
        }
        (fill, _) => fill,
    };
    Some(Region { span: fields.span, shape: shape?, fill, class: class? })
}

struct Bars {
    area_m2: f64,
    spacing_m: f64,
    along: Axis,
}

/// `spaced:` bars that cross the box. `None` where a fault has been reported, here or in the shape.
fn spaced(reader: &mut Reader, fields: &Fields, node: &Node, shape: Option<&Shape>) -> Option<Bars> {
    let block = Block {
        what: "`spaced`".to_owned(),
        place: "spaced bars",
        keys: &["area", "spacing", "along"],
        example: "`spaced: { area: 113, spacing: 200 }`".to_owned(),
        owner: fields.key_span("spaced"),
    };
    let bars = reader.fields(node, &block)?;
    let measure = Measure {
        what: "`area` of the bars".to_owned(),
        unit: "mm²",
        limits: &[Limit::MoreThan(0.0)],
        advice: Some(
            "it is the cross-section of one bar in mm², whatever the file's unit: 78.5 for a diameter of 10 mm",
        ),
    };
    let area = reader.require(&bars, "area", "area: 113").and_then(|node| reader.measure(node, &measure));
    let spacing = reader.require(&bars, "spacing", "spacing: 200");
    let spacing = spacing.and_then(|node| reader.positive_length(node, "`spacing` of the bars"));
    let along = bars.get("along").map(|node| {
        let meaning = Some("it is the direction in which the bars run");
        let what = "`along`".to_owned();
        reader.choice(node, &Choice { what, words: &["x", "y"], values: &[Axis::X, Axis::Y], meaning })
    });
    let [x, y] = match shape? {
        Shape::Box { x, y } => [x[1] - x[0], y[1] - y[0]],
        Shape::Outline(_) => {
            reader.report(node.span, RegionProblem::SpacedOutline);
            return None;
        }
    };
    let along = match along {
        Some(along) => along?,
        None if (x - y).abs() <= NOTHING_M => {
            reader.report(node.span, RegionProblem::SpacedSquare);
            return None;
        }
        None if x > y => Axis::X,
        None => Axis::Y,
    };
    let (area_m2, spacing_m) = (area? * 1e-6, reader.unit.metres(spacing?));
    let across = if along == Axis::X { y } else { x };
    // a hair's breadth of tolerance, for bars that fill their box
    if area_m2 / spacing_m > across * (1.0 + 1e-9) {
        let problem =
            RegionProblem::BarsOverfull { bars_mm2_per_m: area_m2 / spacing_m * 1e6, box_mm2_per_m: across * 1e6 };
        reader.report(node.span, problem);
        return None;
    }
    Some(Bars { area_m2, spacing_m, along })
}

#[derive(Clone, Copy)]
enum Direction {
    Right,
    Left,
    Up,
    Down,
}

/// A build-up's layers, one region each, stacked from where the first one starts.
fn laid_out(reader: &mut Reader, fields: &Fields, subject: &Node, lists: &mut Lists, regions: &mut Vec<Region>) {
    let name = reader.name(subject, "a build-up");
    let layers = name.and_then(|name| lists.buildups.find(reader, &name).map(<[Layer]>::to_vec));
    let choice = Choice {
        what: "`towards`".to_owned(),
        words: &["right", "left", "up", "down"],
        values: &[Direction::Right, Direction::Left, Direction::Up, Direction::Down],
        meaning: Some("it is the direction from the first layer to the last"),
    };
    let towards = reader.require(fields, "towards", "towards: right").and_then(|node| reader.choice(node, &choice));
    let Some(towards) = towards else {
        return;
    };
    let (stacked, other) = match towards {
        Direction::Right | Direction::Left => ("x", "y"),
        Direction::Up | Direction::Down => ("y", "x"),
    };
    let start = reader.require(fields, stacked, if stacked == "x" { "x: 0" } else { "y: 0" });
    let start = start.and_then(|node| start_of_layers(reader, node, stacked));
    let range = reader.require(fields, other, if other == "y" { "y: [0, 1000]" } else { "x: [0, 1000]" });
    let range = range.and_then(|node| range_m(reader, node, other));
    let (Some(layers), Some(start), Some(range)) = (layers, start, range) else {
        return;
    };
    let unit = reader.unit;
    let mut at = start;
    for layer in layers {
        let next = match towards {
            Direction::Right | Direction::Up => at + layer.thickness,
            Direction::Left | Direction::Down => at - layer.thickness,
        };
        let depth = [unit.metres(at.min(next)), unit.metres(at.max(next))];
        let shape = if stacked == "x" { Shape::Box { x: depth, y: range } } else { Shape::Box { x: range, y: depth } };
        regions.push(Region { span: fields.span, shape, fill: Fill::Material(layer.material), class: layer.class });
        if regions.len() > LIST_LIMIT {
            return;
        }
        at = next;
    }
}

/// The one number at which the first layer starts, in the file's unit.
fn start_of_layers(reader: &mut Reader, node: &Node, axis: &'static str) -> Option<f64> {
    if matches!(node.content, Content::List(_)) {
        reader.report(node.span, RegionProblem::StartIsRange { axis });
        return None;
    }
    reader.length(node, &format!("`{axis}`, where the first layer starts,"))
}
