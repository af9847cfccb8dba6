//! From a junction to its figures: when to stop refining, couplings, Ψ, temperature factors, warnings.
//!
//! Knows `junction`, `grid` and `conduction`; must not know files or terminals.

mod fields;
mod model;
mod pass;
mod psi;
mod refine;
mod remarks;
mod run;
mod surfaces;

pub use crate::grid::GridTooLarge;
pub use fields::{Fields, Run};
pub use model::{
    Accuracy, Bracket, Coupling, Evidence, ProbeResult, Psi, Rating, Request, Sensitivity, SurfaceResult,
    TemperatureFactor,
};
pub use refine::{Progress, RateError};

use crate::junction::{Content, Junction, describe_point};
use pass::{Pass, Settings};
use refine::{End, Ended};
use surfaces::Coldest;

/// A rating with the fields behind it.
#[derive(Debug)]
pub struct Rated {
    /// The figures.
    pub rating: Rating,
    /// The last grid and the fields of both runs.
    pub fields: Fields,
}

/// Rates a junction: refines until what is asked is reached or the node limit stops it, then forms every figure.
///
/// `progress` is told after each pass. Running out of nodes is an answer (`bracket_met` is false), not an error.
///
/// # Errors
/// If the first grid needs more nodes than allowed, or an internal check fails.
pub fn rate(junction: Junction, request: &Request, progress: &(dyn Fn(Progress) + Sync)) -> Result<Rated, RateError> {
    let settings = Settings::new(&junction);
    let (pass, ended) = refine::refine(&junction, &settings, request, progress)?;
    let fields = Fields { settings, pass };
    let Fields { settings, pass } = &fields;
    let couplings = psi::couplings(&junction, settings, pass);
    let temperature_factors = temperature_factors(&junction, pass, &ended);
    let probes = junction.probes.iter().zip(&pass.probes);
    let probes = probes
        .map(|(probe, &[temperature_c, moisture_temperature_c])| ProbeResult {
            name: probe.name.clone(),
            at: probe.at,
            temperature_c,
            moisture_temperature_c,
        })
        .collect();
    let surfaces = surfaces::results(&junction, &fields);
    let evidence = evidence(pass, &ended, &surfaces, couplings.is_empty());
    let mut warnings = junction.warnings.clone();
    warnings.extend(remarks::remarks(&junction, request, &ended, &fields, &temperature_factors, &evidence));
    let finite = couplings.iter().all(|coupling| coupling.bracket.is_some());
    let rating = Rating {
        bracket_met: ended.why == End::Met && ended.settled && finite,
        psi: psi::psi(&junction, &couplings),
        sensitivities: psi::sensitivities(&junction, &fields, &couplings),
        couplings,
        temperature_factors,
        surfaces,
        probes,
        evidence,
        warnings,
        request: *request,
        junction,
    };
    Ok(Rated { rating, fields })
}

fn temperature_factors(junction: &Junction, pass: &Pass, ended: &Ended) -> Vec<TemperatureFactor> {
    let points = pass.coldest.iter().zip(&ended.factor_changes);
    points
        .map(|(coldest, &change)| TemperatureFactor {
            air: coldest.air,
            class: coldest.class,
            value: coldest.factor,
            change,
            temperature_c: coldest.temperature_c,
            at: coldest.at,
            surface: coldest.surface,
            meets: describe_point(junction, coldest.at),
            near_spaced_bars: near_spaced_bars(junction, coldest),
        })
        .collect()
}

/// Whether smeared bars lie within one spacing of the point: so far their true, uneven effect reaches.
fn near_spaced_bars(junction: &Junction, coldest: &Coldest) -> bool {
    let sheet = &junction.sheet;
    let beyond = |lines: &[f64], k: usize, value: f64| (lines[k] - value).max(value - lines[k + 1]).max(0.0);
    (0..sheet.rows()).any(|row| {
        (0..sheet.columns()).any(|column| {
            let Content::Solid(part) = sheet.content(column, row) else { return false };
            let Some(spacing_m) = junction.parts[part.index()].bar_spacing_m else { return false };
            let dx = beyond(sheet.x_lines(), column, coldest.at[0]);
            let dy = beyond(sheet.y_lines(), row, coldest.at[1]);
            dx.hypot(dy) <= spacing_m
        })
    })
}

/// The numerical evidence; where no heat flows at all (`idle`), ISO 10211's criteria have nothing but rounding to judge.
fn evidence(pass: &Pass, ended: &Ended, surfaces: &[SurfaceResult], idle: bool) -> Evidence {
    let sum: f64 = surfaces.iter().map(|s| s.heat_flow_w_m).sum();
    let absolute: f64 = surfaces.iter().map(|s| s.heat_flow_w_m.abs()).sum();
    Evidence {
        nodes: pass.nodes(),
        passes: ended.passes,
        heat_balance: if absolute > 0.0 && !idle { sum.abs() / (0.5 * absolute) } else { 0.0 },
        two_grid: ended.two_grid.filter(|_| !idle),
        identity_error: ended.identity_error,
    }
}
