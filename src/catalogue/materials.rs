//! A small list of design conductivities, read from `materials.csv`.
//!
//! The figures of EN 12524 were read in secondary tabulations, not in the standard itself. For insulation products the
//! standards list none, as the maker's declared value applies: those entries are marked typical.

use std::collections::BTreeMap;
use std::sync::LazyLock;

/// One material of the catalogue.
#[derive(Clone, Debug, PartialEq, serde::Deserialize)]
pub struct CatalogueMaterial {
    /// Its name.
    pub name: String,
    /// Other names it is found by.
    #[serde(deserialize_with = "names_between_bars")]
    pub also: Vec<String>,
    /// Design thermal conductivity in W/(m·K).
    pub conductivity_w_mk: f64,
    /// Density in kg/m³; `None` for typical products.
    pub density_kg_m3: Option<f64>,
    /// Specific heat capacity in J/(kg·K).
    pub heat_capacity_j_kgk: f64,
    /// A typical value of a kind of product, to be replaced by the declared one.
    #[serde(deserialize_with = "yes_or_no")]
    pub typical: bool,
    /// Where the values are published.
    pub source: String,
}

impl CatalogueMaterial {
    /// Where the conductivity comes from, in words for a report.
    pub fn provenance(&self) -> String {
        if self.typical { "typical value, replace by the declared one".to_owned() } else { self.source.clone() }
    }
}

/// The catalogue and where each name, in small letters, stands in it.
struct Catalogue {
    materials: Vec<CatalogueMaterial>,
    by_name: BTreeMap<String, usize>,
}

static CATALOGUE: LazyLock<Catalogue> = LazyLock::new(|| {
    let mut reader = csv::Reader::from_reader(include_str!("materials.csv").as_bytes());
    let materials: Result<Vec<CatalogueMaterial>, csv::Error> = reader.deserialize().collect();
    let materials = materials.expect("the catalogue's own file is well formed");
    let mut by_name = BTreeMap::new();
    for (place, material) in materials.iter().enumerate() {
        for name in std::iter::once(&material.name).chain(&material.also) {
            by_name.insert(name.to_lowercase(), place);
        }
    }
    Catalogue { materials, by_name }
});

/// The material of that name or other name; letter case does not count.
pub fn look_up(name: &str) -> Option<&'static CatalogueMaterial> {
    let catalogue: &'static Catalogue = &CATALOGUE;
    catalogue.by_name.get(&name.to_lowercase()).map(|place| &catalogue.materials[*place])
}

/// All names and other names, in the catalogue's order.
pub fn names() -> impl Iterator<Item = &'static str> {
    let catalogue: &'static Catalogue = &CATALOGUE;
    let names = |material: &'static CatalogueMaterial| std::iter::once(&material.name).chain(&material.also);
    catalogue.materials.iter().flat_map(names).map(String::as_str)
}

fn names_between_bars<'de, D: serde::Deserializer<'de>>(deserializer: D) -> Result<Vec<String>, D::Error> {
    let text: String = serde::Deserialize::deserialize(deserializer)?;
    Ok(text.split('|').filter(|name| !name.is_empty()).map(str::to_owned).collect())
}

fn yes_or_no<'de, D: serde::Deserializer<'de>>(deserializer: D) -> Result<bool, D::Error> {
    let text: String = serde::Deserialize::deserialize(deserializer)?;
    match text.as_str() {
        "yes" => Ok(true),
        "no" => Ok(false),
        _ => Err(serde::de::Error::custom("expected yes or no")),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_entry_has_a_positive_conductivity_and_a_source() {
        assert!(CATALOGUE.materials.len() >= 40);
        for material in &CATALOGUE.materials {
            assert!(material.conductivity_w_mk > 0.0 && material.conductivity_w_mk < 1000.0, "{material:?}");
            assert!(material.density_kg_m3.is_none_or(|density| density > 0.0), "{material:?}");
            assert!(material.heat_capacity_j_kgk > 0.0, "{material:?}");
            assert!(!material.source.is_empty() && !material.provenance().is_empty(), "{material:?}");
            assert_eq!(material.typical, material.density_kg_m3.is_none(), "{material:?}");
        }
    }

    #[test]
    fn no_name_means_two_materials() {
        assert_eq!(names().count(), CATALOGUE.by_name.len());
        assert!(names().all(|name| name.trim() == name && !name.is_empty()));
    }

    /// EN 12524:2000, as read in a published table of its values.
    #[test]
    fn published_values_are_found_by_name() {
        let conductivity = |name: &str| look_up(name).unwrap().conductivity_w_mk;
        assert_eq!(conductivity("reinforced concrete"), 2.3);
        assert_eq!(conductivity("Reinforced Concrete (2 % steel)"), 2.5);
        assert_eq!(conductivity("softwood"), 0.13);
        assert_eq!(conductivity("timber (700 kg/m3)"), 0.18);
        assert_eq!(conductivity("STEEL"), 50.0);
        assert_eq!(conductivity("stainless steel"), 17.0);
        assert_eq!(conductivity("aluminium"), 160.0);
        assert_eq!(conductivity("gypsum plasterboard"), 0.25);
        assert!(look_up("mineral wool").unwrap().typical);
        assert!(look_up("unobtainium").is_none());
    }
}
