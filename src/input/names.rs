//! Finding things by name: exactly as written, else without regard to letter case; and what to say of a name that
//! no list has.

use std::collections::BTreeMap;

use super::document::{Span, Spanned};
use super::problem::{NameList, NameProblem};
use super::reader::Reader;
use super::tree::{Content, Node};
use crate::catalogue;

/// A list's names and the place of each in it.
#[derive(Debug, Default)]
pub(super) struct NameIndex {
    exact: BTreeMap<String, usize>,
    folded: BTreeMap<String, usize>,
}

impl NameIndex {
    pub(super) fn new<'a>(names: impl Iterator<Item = &'a Spanned<String>>) -> Self {
        let mut index = Self::default();
        for (place, name) in names.enumerate() {
            index.exact.entry(name.value.clone()).or_insert(place);
            index.folded.entry(name.value.to_lowercase()).or_insert(place);
        }
        index
    }

    pub(super) fn find(&self, name: &str) -> Option<usize> {
        self.exact.get(name).or_else(|| self.folded.get(&name.to_lowercase())).copied()
    }
}

/// Names are counted up to here.
pub(super) const MOST_COUNTED: usize = 1000;

/// The names that a file gives to things, collected before any of them is checked.
#[derive(Debug, Default)]
pub(super) struct KnownNames {
    environments: Vec<String>,
    materials: Vec<String>,
    buildups: Vec<String>,
}

impl KnownNames {
    /// Collects the keys of three blocks of the file.
    pub(super) fn collect(environments: Option<&Node>, materials: Option<&Node>, buildups: Option<&Node>) -> Self {
        let keys = |block: Option<&Node>| match block.map(|node| &node.content) {
            Some(Content::Mapping(entries)) => {
                entries.iter().filter_map(|(key, _)| key.text()).map(|name| name.trim().to_owned()).collect()
            }
            _ => Vec::new(),
        };
        Self { environments: keys(environments), materials: keys(materials), buildups: keys(buildups) }
    }

    fn names<'a>(&'a self, list: NameList) -> Box<dyn Iterator<Item = &'a str> + 'a> {
        match list {
            NameList::Environments => Box::new(self.environments.iter().map(String::as_str)),
            NameList::Materials => Box::new(self.materials.iter().map(String::as_str)),
            NameList::Buildups => Box::new(self.buildups.iter().map(String::as_str)),
            NameList::Catalogue => Box::new(catalogue::names().map(|name| name as &'a str)),
        }
    }
}

/// The first few names of a list, and how many there are in all.
#[derive(Clone, Debug, Default, PartialEq)]
pub(super) struct FirstNames {
    pub(super) first: Vec<String>,
    pub(super) total: usize,
}

impl FirstNames {
    /// So many are kept.
    const KEPT: usize = 8;

    pub(super) fn of<'a>(names: impl Iterator<Item = &'a str>) -> Self {
        let mut kept = Self::default();
        for name in names {
            kept.total += 1;
            if kept.total <= Self::KEPT {
                kept.first.push(name.to_owned());
            }
        }
        kept
    }
}

impl Reader<'_> {
    /// Reports a name that `wanted` does not have, with the nearest one of any list, the wanted list's first.
    pub(super) fn report_unknown_name(&mut self, name: &str, span: Span, wanted: NameList) {
        let order = match wanted {
            NameList::Environments => [NameList::Environments, NameList::Buildups, NameList::Materials].as_slice(),
            NameList::Buildups => &[NameList::Buildups, NameList::Materials, NameList::Environments],
            NameList::Materials | NameList::Catalogue => {
                &[NameList::Materials, NameList::Catalogue, NameList::Buildups, NameList::Environments]
            }
        };
        let names = std::mem::take(&mut self.known);
        let nearest = order.iter().find_map(|list| {
            let near = self.suggest(name, names.names(*list))?;
            Some((*list, near.to_owned()))
        });
        let known = FirstNames::of(names.names(wanted).take(if nearest.is_none() { MOST_COUNTED } else { 0 }));
        self.known = names;
        self.report(span, NameProblem::UnknownName { list: wanted, name: name.to_owned(), nearest, known });
    }
}
