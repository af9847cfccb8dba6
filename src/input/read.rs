//! From the text of a file to its document.

use super::buildups::Buildups;
use super::document::{Document, LengthUnit, Plane, Source};
use super::environments::Environments;
use super::materials::Materials;
use super::names::KnownNames;
use super::problem::{FileProblem, Remark};
use super::reader::{Block, Choice, Fields, Reader, kind_of};
use super::section::Lists;
use super::tree::{self, Content, Node};
use super::{Diagnostic, buildups, environments, flanks, materials, parameters, section};

const KEYS: [&str; 11] = [
    "title",
    "unit",
    "plane",
    "parameters",
    "environments",
    "materials",
    "buildups",
    "section",
    "symmetry",
    "flanks",
    "probes",
];

/// Reads a junction file.
///
/// The format:
///
/// - Any number may be an expression of the file's parameters: `+ - * / ( )`, `min`, `max`, `sqrt`, `abs`. A comma
///   between brackets separates the list's values, so a `max(a, b)` there needs a parameter of its own. Text in quotes
///   is no number.
/// - Lengths take the file's `unit` where they are used, also the `spacing` of bars; parameters are plain numbers. A
///   bar's `area` is in mm², temperatures are in °C, conductivities in W/(m·K), resistances in m²K/W.
/// - Names are found as written, else without regard to letter case; a material in the file before the catalogue.
/// - `x` and `y` of a box may be written in either order. An outline's first point may be repeated at its end.
/// - `symmetry` is a list of sides or a single one. `flanks: []` says that there are none; without the key they are
///   found in the drawing.
/// - A layer of thickness zero is left out. Of a layer with a `resistance` the material need not be defined.
/// - Optional blocks may be left empty. YAML aliases may be used; merge keys, tags and further documents may not.
///
/// # Errors
/// Everything that is wrong with the file, in file order, as far as one thing is not the consequence of another.
/// Remarks, which do not stop the reading, are in [`Document::remarks`]; they are left out where there are errors.
pub fn parse(source: &Source) -> Result<Document, Vec<Diagnostic>> {
    let mut reader = Reader::new(&source.text);
    let tree = tree::build(&source.text);
    let readable = tree.problems.is_empty();
    for (span, problem) in &tree.problems {
        reader.report(*span, problem.clone());
    }
    let document = match &tree.root {
        Some(root) => document(&mut reader, root),
        None => {
            if readable {
                reader.report_file(FileProblem::Empty);
            }
            None
        }
    };
    let (errors, remarks) = reader.finish();
    match document {
        Some(document) if errors.is_empty() => Ok(Document { remarks, ..document }),
        _ => Err(errors),
    }
}

/// Reads all parts. `None` only if something was reported.
fn document(reader: &mut Reader, root: &Node) -> Option<Document> {
    if root.is_nothing() {
        reader.report_file(FileProblem::Empty);
        return None;
    }
    if !matches!(root.content, Content::Mapping(_)) {
        reader.report(root.span, FileProblem::NoKeys { found: kind_of(root) });
        return None;
    }
    let block = Block {
        what: "the file".to_owned(),
        place: "a junction file",
        keys: &KEYS,
        example: String::new(),
        owner: None,
    };
    let fields = reader.fields(root, &block)?;
    reader.known = KnownNames::collect(fields.get("environments"), fields.get("materials"), fields.get("buildups"));
    let title = reader.require(&fields, "title", "title: Balcony slab through an insulated wall");
    let title = title.and_then(|node| reader.line_of_text(node, "`title`", "`title: Balcony slab`"));
    let unit = fields.get("unit").map_or(Some(LengthUnit::default()), |node| unit(reader, node));
    reader.unit = unit.unwrap_or_default();
    let plane = plane(reader, &fields);
    match fields.get("parameters") {
        Some(node) => parameters::read(reader, node),
        None if fields.perhaps_meant(&["parameters"]) => reader.parameters.set_unreadable(),
        None => {}
    }
    let mut lists = lists(reader, &fields);
    let section = reader.require(&fields, "section", "`section:` and below it the regions, each with a dash before it");
    let regions = section.map(|node| section::read(reader, node, &mut lists));
    let symmetry = fields.get("symmetry").map_or(Vec::new(), |node| flanks::symmetry(reader, node));
    let flanks = fields.get("flanks").map(|node| flanks::read(reader, node));
    let probes = fields.get("probes").map_or(Vec::new(), |node| flanks::probes(reader, node));
    lists.buildups.finish(reader);
    let materials = lists.materials.finish(reader);
    for (name, span) in reader.parameters.unused() {
        reader.report(span, Remark::UnusedParameter { name });
    }
    Some(Document {
        title: title?,
        unit: reader.unit,
        plane: plane?,
        environments: lists.environments.into_list(),
        materials,
        regions: regions?,
        section_span: fields.key_span("section")?,
        symmetry,
        flanks,
        probes,
        remarks: Vec::new(),
    })
}

fn unit(reader: &mut Reader, node: &Node) -> Option<LengthUnit> {
    let choice = Choice {
        what: "`unit`".to_owned(),
        words: &["mm", "cm", "m", "in"],
        values: &[LengthUnit::Millimetre, LengthUnit::Centimetre, LengthUnit::Metre, LengthUnit::Inch],
        meaning: Some("it is the unit of every length in the file; without it lengths are in mm"),
    };
    reader.choice(node, &choice)
}

fn plane(reader: &mut Reader, fields: &Fields) -> Option<Plane> {
    let choice = Choice {
        what: "`plane`".to_owned(),
        words: &["vertical", "horizontal"],
        values: &[Plane::Vertical, Plane::Horizontal],
        meaning: Some("vertical is a section through the building, y pointing up; horizontal is a plan"),
    };
    let example = "`plane: vertical` for a section, y pointing up, or `plane: horizontal` for a plan";
    reader.require(fields, "plane", example).and_then(|node| reader.choice(node, &choice))
}

/// Environments, materials and build-ups. Where the key of a block is misspelt, names from it are not called unknown.
fn lists(reader: &mut Reader, fields: &Fields) -> Lists {
    let example = "`environments:` and below it one line each, as in `flat: { kind: internal, temperature: 20 }`";
    let environments = match reader.require(fields, "environments", example) {
        Some(node) => environments::read(reader, node),
        None => Environments::default(),
    };
    let mut materials = match fields.perhaps_meant(&["materials"]) {
        false => materials::read(reader, fields.get("materials")),
        true => Materials::default(),
    };
    let buildups = match fields.perhaps_meant(&["buildups"]) {
        false => buildups::read(reader, fields.get("buildups"), &mut materials),
        true => Buildups::default(),
    };
    Lists { environments, materials, buildups }
}

#[cfg(test)]
mod tests;
