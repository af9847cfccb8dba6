//! `parameters:` plain numbers with names, each of which may be an expression of the others, in any order.

use std::collections::BTreeMap;

use super::document::{Span, Spanned};
use super::expression::{self, Lookup};
use super::problem::NameProblem;
use super::reader::{NamedBlock, Reader};
use super::tree::Node;

/// The parameters of a file. One whose definition is at fault has no value.
#[derive(Debug, Default)]
pub(super) struct Parameters {
    list: BTreeMap<String, Parameter>,
    /// The whole block is at fault: then no name can be called unknown.
    unreadable: bool,
}

#[derive(Debug)]
struct Parameter {
    value: Option<f64>,
    span: Span,
    used: bool,
}

impl Parameters {
    pub(super) fn look_up(&mut self, name: &str) -> Lookup {
        let Some(parameter) = self.list.get_mut(name) else {
            return if self.unreadable { Lookup::Faulty } else { Lookup::Unknown };
        };
        parameter.used = true;
        parameter.value.map_or(Lookup::Faulty, Lookup::Value)
    }

    pub(super) fn set_unreadable(&mut self) {
        self.unreadable = true;
    }

    pub(super) fn names(&self) -> impl Iterator<Item = &str> {
        self.list.keys().map(String::as_str)
    }

    /// Names and places of those that no expression has asked for.
    pub(super) fn unused(&self) -> Vec<(String, Span)> {
        let unused = self.list.iter().filter(|(_, parameter)| !parameter.used);
        unused.map(|(name, parameter)| (name.clone(), parameter.span)).collect()
    }
}

/// Reads `parameters:` into `reader.parameters`.
pub(super) fn read(reader: &mut Reader, node: &Node) {
    let block = NamedBlock { key: "parameters", noun: "a parameter", example: "`wool: 140`" };
    let mut definitions: Vec<(Spanned<String>, &Node, Option<&str>)> = Vec::new();
    let named = reader.named(node, &block);
    if named.is_none() {
        reader.parameters.set_unreadable();
    }
    for (name, value) in named.unwrap_or_default() {
        let reserved = expression::function_names().any(|function| function == name.value);
        if reserved || !expression::is_name(&name.value) {
            reader.report(name.span, NameProblem::BadParameterName { name: name.value.clone(), reserved });
        }
        let text = reader.expression_text(value, &format!("the parameter `{}`", name.value));
        let parameter = Parameter { value: None, span: name.span, used: false };
        reader.parameters.list.insert(name.value.clone(), parameter);
        definitions.push((name, value, text));
    }
    let needs = needs_of(&definitions);
    let order = order_of(&needs);
    let mut ordered = vec![false; definitions.len()];
    for index in order {
        ordered[index] = true;
        let (name, node, Some(text)) = &definitions[index] else {
            continue;
        };
        match expression::evaluate(text, &mut |name| reader.parameters.look_up(name)) {
            Ok(value) => {
                reader.parameters.list.entry(name.value.clone()).and_modify(|parameter| parameter.value = Some(value));
            }
            Err(fault) => reader.report_fault(node, text, fault),
        }
    }
    report_cycles(reader, &definitions, &needs, &mut ordered);
}

/// For each definition the others that it needs.
fn needs_of(definitions: &[(Spanned<String>, &Node, Option<&str>)]) -> Vec<Vec<usize>> {
    let index: BTreeMap<&str, usize> =
        definitions.iter().enumerate().map(|(index, (name, ..))| (name.value.as_str(), index)).collect();
    let needs = |text: &Option<&str>| {
        let names = text.map_or(Vec::new(), expression::names);
        names.into_iter().filter_map(|name| index.get(name).copied()).collect()
    };
    definitions.iter().map(|(_, _, text)| needs(text)).collect()
}

/// Those that can be computed, each after all it needs (Kahn's algorithm); those in a circle or behind one are missing.
fn order_of(needs: &[Vec<usize>]) -> Vec<usize> {
    let mut waiting: Vec<usize> = needs.iter().map(Vec::len).collect();
    let mut needed_by: Vec<Vec<usize>> = vec![Vec::new(); needs.len()];
    for (index, list) in needs.iter().enumerate() {
        for need in list {
            needed_by[*need].push(index);
        }
    }
    let mut order: Vec<usize> = (0..needs.len()).filter(|index| waiting[*index] == 0).collect();
    let mut next = 0;
    while next < order.len() {
        for index in &needed_by[order[next]] {
            waiting[*index] -= 1;
            if waiting[*index] == 0 {
                order.push(*index);
            }
        }
        next += 1;
    }
    order
}

/// Follows, from each definition without a place in the order, what it needs until a circle closes.
fn report_cycles(
    reader: &mut Reader,
    definitions: &[(Spanned<String>, &Node, Option<&str>)],
    needs: &[Vec<usize>],
    settled: &mut [bool],
) {
    for start in 0..definitions.len() {
        let mut path: Vec<usize> = Vec::new();
        let mut place_in_path: BTreeMap<usize, usize> = BTreeMap::new();
        let mut at = start;
        while !settled[at] && !place_in_path.contains_key(&at) {
            place_in_path.insert(at, path.len());
            path.push(at);
            // one that waits needs at least one other that waits, or is settled by now as part of a reported circle
            match needs[at].iter().find(|need| !settled[**need]) {
                Some(need) => at = *need,
                None => break,
            }
        }
        if let (false, Some(from)) = (settled[at], place_in_path.get(&at))
            && needs[path[path.len() - 1]].contains(&at)
        {
            let circle = &path[*from..];
            let name = |index: &usize| definitions[*index].0.value.clone();
            let chain: Vec<String> = circle.iter().chain([&at]).map(name).collect();
            reader.report(definitions[at].0.span, NameProblem::ParameterCycle { chain });
        }
        for index in path {
            settled[index] = true;
        }
    }
}
