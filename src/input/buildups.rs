//! `buildups:` named lists of layers.

use super::document::{Spanned, SurfaceClass};
use super::materials::{CONDUCTIVITIES, Materials};
use super::names::NameIndex;
use super::numbers::{Measure, NOTHING_M};
use super::problem::{KeyProblem, Limit, NameList, NumberProblem, RegionProblem, Remark};
use super::reader::{Block, Choice, NamedBlock, Reader};
use super::tree::{Content, Node};

const EXAMPLE: &str = "`outer wall:` and below it, one line a layer, `- mineral wool: 140`";

/// One layer, with something to it.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Layer {
    /// Place in the document's list of materials.
    pub(super) material: usize,
    /// In the file's unit, so that layers add up without rounding.
    pub(super) thickness: f64,
    pub(super) class: SurfaceClass,
}

struct Buildup {
    name: Spanned<String>,
    /// `None` if a layer is at fault.
    layers: Option<Vec<Layer>>,
    used: bool,
}

/// The build-ups of a file.
#[derive(Default)]
pub(super) struct Buildups {
    list: Vec<Buildup>,
    /// `None` where the block is at fault: then no name can be called unknown.
    index: Option<NameIndex>,
}

impl Buildups {
    /// The layers of a build-up, first to last, or `None` where a fault has been reported.
    pub(super) fn find(&mut self, reader: &mut Reader, name: &Spanned<String>) -> Option<&[Layer]> {
        let Some(place) = self.index.as_ref()?.find(&name.value) else {
            reader.report_unknown_name(&name.value, name.span, NameList::Buildups);
            return None;
        };
        self.list[place].used = true;
        self.list[place].layers.as_deref()
    }

    /// Remarks on build-ups that no region asked for.
    pub(super) fn finish(self, reader: &mut Reader) {
        for buildup in self.list {
            if !buildup.used {
                reader.report(buildup.name.span, Remark::UnusedBuildup { name: buildup.name.value });
            }
        }
    }
}

/// Reads `buildups:`, if there is such a block.
pub(super) fn read(reader: &mut Reader, node: Option<&Node>, materials: &mut Materials) -> Buildups {
    let block = NamedBlock { key: "buildups", noun: "a build-up", example: EXAMPLE };
    let named = node.map_or(Some(Vec::new()), |node| reader.named(node, &block));
    let Some(named) = named else {
        return Buildups::default();
    };
    let index = NameIndex::new(named.iter().map(|(name, _)| name));
    let mut list = Vec::new();
    for (name, node) in named {
        let layers = layers(reader, &name, node, materials);
        list.push(Buildup { name, layers, used: false });
    }
    Buildups { list, index: Some(index) }
}

fn layers(reader: &mut Reader, name: &Spanned<String>, node: &Node, materials: &mut Materials) -> Option<Vec<Layer>> {
    let what = format!("the build-up `{}`", name.value);
    let items = reader.list(node, &what, "a list of layers, each with a dash before it", "`- mineral wool: 140`")?;
    if items.is_empty() {
        reader.report(node.span, KeyProblem::NoEntries { key: "build-up", example: "`- mineral wool: 140`" });
        return None;
    }
    // every layer is read, and all must be sound
    let layers: Vec<Option<Option<Layer>>> = items.iter().map(|item| layer(reader, item, materials)).collect();
    let layers: Option<Vec<Option<Layer>>> = layers.into_iter().collect();
    layers.map(|layers| layers.into_iter().flatten().collect())
}

/// One layer: `Some(None)` if its thickness is zero, `None` if it is at fault.
fn layer(reader: &mut Reader, node: &Node, materials: &mut Materials) -> Option<Option<Layer>> {
    let (key, value) = match &node.content {
        Content::Mapping(entries) => match entries.as_slice() {
            [(key, value)] => (key, value),
            _ => {
                reader.report(node.span, several_keys(entries));
                return None;
            }
        },
        Content::Scalar { text, .. } if !node.is_nothing() => {
            reader.report(node.span, RegionProblem::LayerWithoutThickness { material: text.clone() });
            return None;
        }
        _ => {
            let expected = "a material with its thickness";
            reader.wrong_type(node, "a layer".to_owned(), expected, "`- mineral wool: 140`".to_owned());
            return None;
        }
    };
    let name = reader.name(key, "a material")?;
    match &value.content {
        Content::Mapping(_) => detailed_layer(reader, &name, value, materials),
        _ if value.is_nothing() => {
            reader.report(key.span, RegionProblem::LayerWithoutThickness { material: name.value });
            None
        }
        _ => {
            let thickness = thickness(reader, &name, value);
            layer_of(reader, &name, thickness, Some(SurfaceClass::default()), materials)
        }
    }
}

fn several_keys(entries: &[(std::rc::Rc<Node>, std::rc::Rc<Node>)]) -> RegionProblem {
    let text = |node: &Node| node.text().unwrap_or("").to_owned();
    let has_thickness = entries.iter().any(|(key, _)| key.text() == Some("thickness"));
    match entries {
        [] => RegionProblem::LayersTogether,
        _ if has_thickness => {
            // either `material: mineral wool` beside it, or the name with nothing after it
            let material = entries.iter().find(|(key, _)| key.text() == Some("material")).map(|(_, value)| text(value));
            RegionProblem::LayerSpelledOut { material: material.unwrap_or_else(|| text(&entries[0].0)) }
        }
        _ => RegionProblem::LayersTogether,
    }
}

/// The layer `name: {thickness: …, resistance: …, surface: …}`.
fn detailed_layer(
    reader: &mut Reader,
    name: &Spanned<String>,
    node: &Node,
    materials: &mut Materials,
) -> Option<Option<Layer>> {
    let block = Block {
        what: format!("the layer `{}`", name.value),
        place: "a layer",
        keys: &["thickness", "resistance", "surface"],
        example: format!("`{}: {{ thickness: 25, resistance: 0.18 }}`", name.value),
        owner: Some(name.span),
    };
    let fields = reader.fields(node, &block)?;
    let class = match fields.get("surface") {
        Some(node) => surface_class(reader, node),
        None => Some(SurfaceClass::default()),
    };
    let thickness = reader.require(&fields, "thickness", "thickness: 25");
    let thickness = thickness.and_then(|node| self::thickness(reader, name, node));
    let resistance = fields.get("resistance").map(|node| {
        let limits = &[Limit::MoreThan(0.0)];
        let what = format!("`resistance` of the layer `{}`", name.value);
        let advice = Some("resistances are in m²K/W; leave it out where the material's conductivity is meant");
        reader.measure(node, &Measure { what, unit: "m²K/W", limits, advice })
    });
    let Some(resistance) = resistance else {
        return layer_of(reader, name, thickness, class, materials);
    };
    let (thickness, resistance, class) = (thickness?, resistance?, class?);
    let Some(thickness) = thickness else {
        return Some(None);
    };
    let thickness_m = reader.unit.metres(thickness);
    let conductivity = thickness_m / resistance;
    if let Some(limit) = CONDUCTIVITIES.into_iter().find(|limit| !limit.holds(conductivity)) {
        let what = format!("the conductivity of `{}`, thickness divided by resistance,", name.value);
        let advice = Some("check the thickness and the resistance");
        reader
            .report(node.span, NumberProblem::OutOfRange { what, value: conductivity, unit: "W/(m·K)", limit, advice });
        return None;
    }
    let material = materials.of_resistance(&name.value, name.span, thickness_m, resistance);
    Some(Some(Layer { material, thickness, class }))
}

/// A layer of a material that must be defined, also where its thickness is zero.
fn layer_of(
    reader: &mut Reader,
    name: &Spanned<String>,
    thickness: Option<Option<f64>>,
    class: Option<SurfaceClass>,
    materials: &mut Materials,
) -> Option<Option<Layer>> {
    if thickness == Some(None) {
        return materials.mention(reader, &name.value, name.span).map(|()| None);
    }
    let material = materials.find(reader, &name.value, name.span);
    Some(Some(Layer { material: material?, thickness: thickness??, class: class? }))
}

/// A thickness in the file's unit: `Some(None)` if it is zero, which leaves the layer out with a remark.
fn thickness(reader: &mut Reader, material: &Spanned<String>, node: &Node) -> Option<Option<f64>> {
    let what = format!("the thickness of `{}`", material.value);
    let value = reader.length(node, &what)?;
    let thickness_m = reader.unit.metres(value);
    if thickness_m < -NOTHING_M {
        let (unit, limit) = (reader.unit.symbol(), Limit::AtLeast(0.0));
        let advice = Some("a thickness of 0 leaves the layer out");
        reader.report(node.span, NumberProblem::OutOfRange { what, value, unit, limit, advice });
        return None;
    }
    if thickness_m <= NOTHING_M {
        reader.report(node.span, Remark::ZeroLayer { material: material.value.clone() });
        return Some(None);
    }
    Some(Some(value))
}

/// The word of a key `surface`.
pub(super) fn surface_class(reader: &mut Reader, node: &Node) -> Option<SurfaceClass> {
    let choice = Choice {
        what: "`surface`".to_owned(),
        words: &["opaque", "frame", "glazing"],
        values: &[SurfaceClass::Opaque, SurfaceClass::Frame, SurfaceClass::Glazing],
        meaning: Some("opaque is the rule and need not be written; frame and glazing are a window's parts"),
    };
    reader.choice(node, &choice)
}
