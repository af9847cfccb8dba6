//! The pairs of airs that a rating has figures for.

use crate::index::AirId;
use crate::junction::Junction;
use crate::rating::{Coupling, Psi, Rating};

/// What a rating says about two airs.
#[derive(Clone, Copy, Debug)]
pub(super) struct Pair<'a> {
    pub(super) warm: AirId,
    pub(super) cold: AirId,
    pub(super) coupling: Option<&'a Coupling>,
    pub(super) psi: Option<&'a Psi>,
}

/// The pairs of airs: those the solid joins in the rating's order, then any that only flanks separate.
pub(super) fn pairs(rating: &Rating) -> Vec<Pair<'_>> {
    let psi_of = |warm, cold| rating.psi.iter().find(|psi| (psi.warm, psi.cold) == (warm, cold));
    let coupled = rating.couplings.iter().map(|coupling| Pair {
        warm: coupling.warm,
        cold: coupling.cold,
        coupling: Some(coupling),
        psi: psi_of(coupling.warm, coupling.cold),
    });
    let known = |psi: &Psi| rating.couplings.iter().any(|c| (c.warm, c.cold) == (psi.warm, psi.cold));
    let lone = rating.psi.iter().filter(|psi| !known(psi));
    coupled.chain(lone.map(|psi| Pair { warm: psi.warm, cold: psi.cold, coupling: None, psi: Some(psi) })).collect()
}

/// The name of an air.
pub(super) fn air_name(junction: &Junction, air: AirId) -> &str {
    &junction.airs[air.index()].name
}

/// `flat to outdoors`.
pub(super) fn pair_name(junction: &Junction, warm: AirId, cold: AirId) -> String {
    format!("{} to {}", air_name(junction, warm), air_name(junction, cold))
}
