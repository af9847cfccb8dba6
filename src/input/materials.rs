//! `materials:` the file's own conductivities, and the catalogue's behind them.

use std::collections::BTreeMap;

use super::document::{Material, Provenance, Span, Spanned};
use super::names::NameIndex;
use super::numbers::{Measure, plain};
use super::problem::{Limit, NameList, Remark};
use super::reader::{Block, NamedBlock, Reader};
use super::tree::Node;
use crate::catalogue;

/// Conductivities in W/(m·K): above zero far enough for arithmetic, and no more than diamond has.
pub(super) const CONDUCTIVITIES: [Limit; 3] = [Limit::MoreThan(0.0), Limit::AtLeast(1e-6), Limit::AtMost(5000.0)];

/// A conductivity this many times the catalogue's under the same name, or so small a part of it, is likely a slip.
const UNLIKELY_RATIO: f64 = 10.0;

const ADVICE: &str = "conductivities are in W/(m·K): insulation has about 0.03, concrete about 2, copper 380";

const EXAMPLE: &str = "`mineral wool: { conductivity: 0.035, source: \"declared by the maker\" }`";

/// The materials a document ends up with: the file's own first.
#[derive(Default)]
pub(super) struct Materials {
    /// `None` for one that is at fault.
    list: Vec<Option<Material>>,
    names: Vec<Spanned<String>>,
    /// `None` where the block is at fault: then no name can be called unknown.
    index: Option<NameIndex>,
    used: Vec<bool>,
    from_catalogue: BTreeMap<&'static str, usize>,
    /// Conductivity and place of those made from a layer's resistance.
    from_resistance: BTreeMap<String, (f64, usize)>,
}

/// Reads `materials:`; without such a block there is still the catalogue.
pub(super) fn read(reader: &mut Reader, node: Option<&Node>) -> Materials {
    let block = NamedBlock { key: "materials", noun: "a material", example: EXAMPLE };
    let named = node.map_or(Some(Vec::new()), |node| reader.named(node, &block));
    let Some(named) = named else {
        return Materials::default();
    };
    let mut materials = Materials {
        list: Vec::new(),
        names: named.iter().map(|(name, _)| name.clone()).collect(),
        index: Some(NameIndex::new(named.iter().map(|(name, _)| name))),
        used: vec![false; named.len()],
        from_catalogue: BTreeMap::new(),
        from_resistance: BTreeMap::new(),
    };
    for (name, node) in named {
        materials.list.push(material(reader, name, node));
    }
    materials
}

fn material(reader: &mut Reader, name: Spanned<String>, node: &Node) -> Option<Material> {
    let block = Block {
        what: format!("the material `{}`", name.value),
        place: "a material",
        keys: &["conductivity", "source"],
        example: format!("`{}: {{ conductivity: 0.035 }}`", name.value),
        owner: Some(name.span),
    };
    let fields = reader.fields(node, &block)?;
    let measure = Measure {
        what: format!("`conductivity` of `{}`", name.value),
        unit: "W/(m·K)",
        limits: &CONDUCTIVITIES,
        advice: Some(ADVICE),
    };
    let conductivity = reader.require(&fields, "conductivity", "conductivity: 0.035");
    let measure_span = conductivity.map_or(name.span, |node| node.span);
    let conductivity = conductivity.and_then(|node| reader.measure(node, &measure));
    let source = fields.get("source").map(|node| {
        reader.line_of_text(node, &format!("`source` of `{}`", name.value), "`source: \"declared by the maker\"`")
    });
    let source = match source {
        Some(source) => Some(source?),
        None => None,
    };
    let conductivity_w_mk = conductivity?;
    if let Some(entry) = catalogue::look_up(&name.value) {
        let ratio = conductivity_w_mk / entry.conductivity_w_mk;
        if !(1.0 / UNLIKELY_RATIO..=UNLIKELY_RATIO).contains(&ratio) {
            let catalogue_w_mk = entry.conductivity_w_mk;
            let name = name.value.clone();
            reader.report(measure_span, Remark::UnlikeCatalogue { name, conductivity_w_mk, catalogue_w_mk });
        }
    }
    Some(Material { name: name.value, span: Some(name.span), conductivity_w_mk, provenance: Provenance::File(source) })
}

impl Materials {
    /// The material of a name: the file's own, else the catalogue's. `None` where a fault has been reported.
    pub(super) fn find(&mut self, reader: &mut Reader, name: &str, span: Span) -> Option<usize> {
        if let Some(place) = self.index.as_ref()?.find(name) {
            self.used[place] = true;
            return self.list[place].is_some().then_some(place);
        }
        let Some(entry) = catalogue::look_up(name) else {
            reader.report_unknown_name(name, span, NameList::Materials);
            return None;
        };
        if let Some(place) = self.from_catalogue.get(entry.name.as_str()) {
            return Some(*place);
        }
        if entry.typical {
            let conductivity_w_mk = entry.conductivity_w_mk;
            reader.report(span, Remark::TypicalValue { name: name.to_owned(), conductivity_w_mk });
        }
        // the report shows which entry was meant by another name
        let source = entry.provenance();
        let source = if name == entry.name { source } else { format!("{}: {source}", entry.name) };
        self.from_catalogue.insert(&entry.name, self.list.len());
        self.list.push(Some(Material {
            name: name.to_owned(),
            span: None,
            conductivity_w_mk: entry.conductivity_w_mk,
            provenance: Provenance::Catalogue(source),
        }));
        Some(self.list.len() - 1)
    }

    /// Whether there is a material of that name, for a layer of no thickness: it needs none, but the name must be right.
    pub(super) fn mention(&mut self, reader: &mut Reader, name: &str, span: Span) -> Option<()> {
        let own = self.index.as_ref()?.find(name);
        if own.is_none() && catalogue::look_up(name).is_some() {
            return Some(());
        }
        self.find(reader, name, span).map(|_| ())
    }

    /// The material of a layer of which thickness and resistance are known; it need not be defined anywhere.
    pub(super) fn of_resistance(&mut self, name: &str, span: Span, thickness_m: f64, resistance_m2k_w: f64) -> usize {
        let conductivity_w_mk = thickness_m / resistance_m2k_w;
        let short = format!("{name} (R {})", plain(resistance_m2k_w));
        // the same resistance in another thickness needs another name
        let long = format!("{name} (R {}, {} mm)", plain(resistance_m2k_w), plain(thickness_m * 1e3));
        for full_name in [&short, &long] {
            match self.from_resistance.get(full_name) {
                Some((conductivity, place)) if *conductivity == conductivity_w_mk => return *place,
                Some(_) => {}
                None => return self.add_of_resistance(full_name.clone(), span, conductivity_w_mk),
            }
        }
        self.add_of_resistance(long, span, conductivity_w_mk)
    }

    fn add_of_resistance(&mut self, name: String, span: Span, conductivity_w_mk: f64) -> usize {
        self.from_resistance.insert(name.clone(), (conductivity_w_mk, self.list.len()));
        let provenance = Provenance::LayerResistance;
        self.list.push(Some(Material { name, span: Some(span), conductivity_w_mk, provenance }));
        self.list.len() - 1
    }

    /// Remarks on the file's materials that nothing asked for, and the list for the document.
    pub(super) fn finish(self, reader: &mut Reader) -> Vec<Material> {
        for (name, used) in self.names.iter().zip(&self.used) {
            if !used {
                reader.report(name.span, Remark::UnusedMaterial { name: name.value.clone() });
            }
        }
        self.list.into_iter().flatten().collect()
    }
}
