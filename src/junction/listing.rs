//! How much of what was found is told: the first few of each kind one by one, the rest of it as a number. A generated
//! file may have thousands of the same mistake, and a person reads ten.

use super::fault::Fault;
use super::place;
use super::remark::Remark;
use crate::input::{Diagnostic, LengthUnit, Severity};
use std::mem::{Discriminant, discriminant};

/// So many faults of a kind are told one by one.
pub(super) const FAULTS_NAMED: usize = 10;

/// So many remarks of a kind are told one by one; four flanks can have twelve lengths to remark on.
const REMARKS_NAMED: usize = 20;

/// Members of one kind: how many were found, and the first that is not told.
struct Kind<'a, T> {
    kind: Discriminant<T>,
    found: usize,
    first_left: Option<&'a T>,
}

/// Those of `all` that are told, and, for each kind with more, how many are left and the first of them.
fn sifted<T>(all: &[T], named: usize) -> (Vec<&T>, Vec<(usize, &T)>) {
    let mut kinds: Vec<Kind<T>> = Vec::new();
    let mut told = Vec::new();
    for item in all {
        let index = match kinds.iter().position(|kind| kind.kind == discriminant(item)) {
            Some(index) => index,
            None => {
                kinds.push(Kind { kind: discriminant(item), found: 0, first_left: None });
                kinds.len() - 1
            }
        };
        let kind = &mut kinds[index];
        kind.found += 1;
        if kind.found <= named {
            told.push(item);
        } else if kind.first_left.is_none() {
            kind.first_left = Some(item);
        }
    }
    let left = kinds.iter().filter_map(|kind| Some((kind.found - named.min(kind.found), kind.first_left?)));
    let left = left.collect();
    (told, left)
}

/// The faults in the order of the file.
pub(super) fn diagnostics(mut faults: Vec<Fault>, unit: LengthUnit) -> Vec<Diagnostic> {
    faults.sort_by_key(Fault::span);
    let (told, left) = sifted(&faults, FAULTS_NAMED);
    let mut diagnostics: Vec<Diagnostic> = told.into_iter().map(|fault| fault.diagnostic(unit)).collect();
    diagnostics.extend(left.into_iter().map(|(count, first)| Diagnostic {
        severity: Severity::Error,
        span: Some(first.span()),
        message: format!("{} more of these: {}", place::count(count), first.kind()),
        label: "the next one".to_owned(),
        help: Some("correct those above first; many of the others may go with them".to_owned()),
        related: Vec::new(),
    }));
    diagnostics.sort_by_key(|diagnostic| diagnostic.span);
    diagnostics
}

/// The remarks as sentences, in the order found; those that are only counted come last.
pub(super) fn sentences(remarks: &[Remark], unit: LengthUnit) -> Vec<String> {
    let (told, left) = sifted(remarks, REMARKS_NAMED);
    let told = told.into_iter().map(|remark| remark.sentence(unit));
    told.chain(
        left.into_iter().map(|(count, first)| format!("{} more of these: {}", place::count(count), first.kind())),
    )
    .collect()
}
