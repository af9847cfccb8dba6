//! The solids of a drawing: materials as used, and spaced bars blended with what lies under them.

use super::model::Part;
use super::place;
use crate::index::PartId;
use crate::input::{LengthUnit, Material, Provenance, SurfaceClass};
use std::collections::BTreeMap;

/// What makes two solids one part: name, conductivity (as bits), class, bar spacing (as bits).
type Key = (String, u64, SurfaceClass, Option<u64>);

/// Parts in order of first appearance, each once.
#[derive(Default)]
pub(super) struct PartList {
    parts: Vec<Part>,
    known: BTreeMap<Key, PartId>,
}

impl PartList {
    /// The part's index, and whether it is new.
    pub(super) fn intern(&mut self, part: Part) -> (PartId, bool) {
        let key =
            (part.material.clone(), part.conductivity_w_mk.to_bits(), part.class, part.bar_spacing_m.map(f64::to_bits));
        let count = self.known.len();
        let id = *self.known.entry(key).or_insert(PartId::new(count));
        let new = self.known.len() > count;
        if new {
            self.parts.push(part);
        }
        (id, new)
    }

    /// A part by its index.
    pub(super) fn get(&self, id: PartId) -> &Part {
        &self.parts[id.index()]
    }

    /// All parts.
    pub(super) fn into_parts(self) -> Vec<Part> {
        self.parts
    }
}

/// Where a material's conductivity comes from, for the report.
fn source(provenance: &Provenance) -> String {
    match provenance {
        Provenance::File(Some(source)) => source.clone(),
        Provenance::File(None) => "this file, no source given".to_owned(),
        Provenance::Catalogue(source) => format!("catalogue: {source}"),
        Provenance::LayerResistance => "from the layer's resistance".to_owned(),
    }
}

/// A material as a part.
pub(super) fn plain(material: &Material, class: SurfaceClass) -> Part {
    Part {
        material: material.name.clone(),
        conductivity_w_mk: material.conductivity_w_mk,
        source: source(&material.provenance),
        class,
        bar_spacing_m: None,
    }
}

/// Bars of one cross-section at one spacing, in a box of a certain extent across them.
#[derive(Clone, Copy, Debug)]
pub(super) struct Bars<'a> {
    /// What they are made of.
    pub(super) material: &'a Material,
    /// Cross-section of one bar, m².
    pub(super) area_m2: f64,
    /// From bar to bar along the junction, m.
    pub(super) spacing_m: f64,
    /// Extent of the box across the bars, m.
    pub(super) height_m: f64,
    /// Class of the region's surfaces.
    pub(super) class: SurfaceClass,
}

impl Bars<'_> {
    /// The bars' share of the section across them; above 1 they do not fit.
    pub(super) fn fraction(&self) -> f64 {
        self.area_m2 / (self.spacing_m * self.height_m)
    }

    /// Bars in `under` as one part of area-weighted conductivity: heat along the bars passes bar and rest side by side.
    pub(super) fn blended_with(&self, under: &Part, unit: LengthUnit) -> Part {
        let fraction = self.fraction().min(1.0);
        let name = format!(
            "{} bars {} {}² every {} in {}",
            self.material.name,
            place::significant(self.area_m2 / unit.in_metres().powi(2), 4),
            unit.symbol(),
            place::length(self.spacing_m, unit),
            under.material
        );
        let origin = format!(
            "area-weighted: {} % {} ({}), the rest {} ({})",
            place::significant(100.0 * fraction, 3),
            self.material.name,
            source(&self.material.provenance),
            under.material,
            under.source
        );
        Part {
            material: name,
            conductivity_w_mk: fraction * self.material.conductivity_w_mk + (1.0 - fraction) * under.conductivity_w_mk,
            source: origin,
            class: self.class,
            bar_spacing_m: Some(self.spacing_m),
        }
    }
}
