//! Couplings of named airs, and the linear thermal transmittance: Ψ = L2D − Σ U·l (ISO 10211, ISO 14683).

use super::fields::Fields;
use super::model::{Bracket, Coupling, Psi, Sensitivity};
use super::pass::{Pass, Settings};
use crate::junction::{Flank, Junction, Lengths};

/// Couplings smaller than this fraction of the films' conductance are rounding: no solid joins those two airs.
const NOTHING: f64 = 1e-11;

/// The coupling of every pair of airs that the solid joins, in file order of the airs.
pub(super) fn couplings(junction: &Junction, settings: &Settings, pass: &Pass) -> Vec<Coupling> {
    let nothing = NOTHING * pass.heat.largest_conductance();
    pass.couplings
        .iter()
        .filter(|(_, bracket)| bracket.is_none_or(|b| b.high.abs().max(b.low.abs()) > nothing))
        .map(|&([i, j], bracket)| {
            let [warm, cold] = junction.warm_first(settings.heat.airs[i], settings.heat.airs[j]);
            Coupling { warm, cold, bracket }
        })
        .collect()
}

/// Ψ of every coupled pair of airs that flanks separate.
pub(super) fn psi(junction: &Junction, couplings: &[Coupling]) -> Vec<Psi> {
    couplings
        .iter()
        .filter_map(|coupling| {
            let flanks: Vec<&Flank> =
                junction.flanks.iter().filter(|f| f.warm == coupling.warm && f.cold == coupling.cold).collect();
            let transmittance = |length: fn(&Lengths) -> Option<f64>| -> Option<Bracket> {
                let losses: Option<Vec<f64>> =
                    flanks.iter().map(|flank| Some(flank.u_w_m2k * length(&flank.lengths)?)).collect();
                Some(coupling.bracket?.plus(-losses?.iter().sum::<f64>()))
            };
            (!flanks.is_empty()).then(|| Psi {
                warm: coupling.warm,
                cold: coupling.cold,
                internal: transmittance(|l| l.internal_m),
                overall_internal: transmittance(|l| l.overall_internal_m),
                external: transmittance(|l| l.external_m),
            })
        })
        .collect()
}

/// How each finite coupling responds to each material's conductivity, strongest first within a pair.
pub(super) fn sensitivities(junction: &Junction, fields: &Fields, couplings: &[Coupling]) -> Vec<Sensitivity> {
    let Fields { settings, pass } = fields;
    let mut materials: Vec<&str> = Vec::new();
    let group: Vec<usize> = junction
        .parts
        .iter()
        .map(|part| {
            materials.iter().position(|&m| m == part.material).unwrap_or_else(|| {
                materials.push(&part.material);
                materials.len() - 1
            })
        })
        .collect();
    let by_part = pass.heat.responses(&pass.grid, junction.parts.len(), |cell| cell.part.index());
    let mut out = Vec::new();
    for coupling in couplings.iter().filter(|c| c.bracket.is_some()) {
        let place = |air| settings.heat.place(air).expect("a coupled air takes part");
        let (i, j) = (place(coupling.warm), place(coupling.cold));
        let mut by_material = vec![0.0; materials.len()];
        for ((part, group), response) in junction.parts.iter().zip(&group).zip(&by_part) {
            by_material[*group] += 0.01 * part.conductivity_w_mk * response[(i, j)];
        }
        let mut pair: Vec<Sensitivity> = materials
            .iter()
            .zip(by_material)
            .map(|(material, per_percent)| Sensitivity {
                warm: coupling.warm,
                cold: coupling.cold,
                material: (*material).to_string(),
                per_percent,
            })
            .collect();
        pair.sort_by(|a, b| b.per_percent.abs().total_cmp(&a.per_percent.abs()));
        out.extend(pair);
    }
    out
}
