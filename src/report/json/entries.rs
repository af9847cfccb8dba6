//! One junction's entry in the JSON document; the schema is told at the parent module's `json`.

use serde::Serialize;

use super::{ProblemEntry, problem};
use crate::index::AirId;
use crate::input::Plane;
use crate::junction::{Flank, Junction, Lengths};
use crate::rating::{Accuracy, Bracket, Rating};
use crate::report::files::RatedFile;
use crate::report::kinds::kind_word;
use crate::report::pairs::air_name;

/// The entry of a rated file.
#[derive(Serialize)]
pub(super) struct Rated<'a> {
    file: &'a str,
    title: &'a str,
    bracket_met: bool,
    warnings: &'a [String],
    coupling: Vec<CouplingEntry<'a>>,
    flanks: Vec<FlankEntry<'a>>,
    psi: Vec<PsiEntry<'a>>,
    temperature_factor: Vec<FactorEntry<'a>>,
    grid: GridEntry,
    asked: AskedEntry,
    plane: &'static str,
    symmetry: Vec<&'static str>,
    environments: Vec<AirEntry<'a>>,
    surfaces: Vec<SurfaceEntry<'a>>,
    probes: Vec<ProbeEntry<'a>>,
    materials: Vec<MaterialEntry<'a>>,
    sensitivities: Vec<SensitivityEntry<'a>>,
    evidence: EvidenceEntry,
    flank_proposal: Option<&'a str>,
    remarks: Vec<ProblemEntry<'a>>,
}

/// The names of two airs, the warmer first.
type Between<'a> = [&'a str; 2];

#[derive(Serialize)]
struct BracketEntry {
    low: Option<f64>,
    value: Option<f64>,
    high: Option<f64>,
}

#[derive(Serialize)]
struct CouplingEntry<'a> {
    between: Between<'a>,
    #[serde(flatten)]
    bracket: BracketEntry,
}

#[derive(Serialize)]
struct PsiEntry<'a> {
    between: Between<'a>,
    internal: Option<BracketEntry>,
    overall_internal: Option<BracketEntry>,
    external: Option<BracketEntry>,
}

#[derive(Serialize)]
struct LengthsEntry {
    internal: Option<f64>,
    overall_internal: Option<f64>,
    external: Option<f64>,
}

#[derive(Serialize)]
struct LayerEntry<'a> {
    material: &'a str,
    thickness: f64,
    conductivity: f64,
}

#[derive(Serialize)]
struct FlankEntry<'a> {
    name: &'a str,
    between: Between<'a>,
    u: f64,
    #[serde(flatten)]
    lengths: LengthsEntry,
    measured: LengthsEntry,
    u_layers: f64,
    cut: &'static str,
    warm_resistance: f64,
    cold_resistance: f64,
    layers: Vec<LayerEntry<'a>>,
}

#[derive(Serialize)]
struct FactorEntry<'a> {
    environment: &'a str,
    surface: &'static str,
    value: Option<f64>,
    bound: &'static str,
    temperature: f64,
    x: f64,
    y: f64,
    change: Option<f64>,
    meets: &'a str,
    near_spaced_bars: bool,
}

#[derive(Serialize)]
struct GridEntry {
    nodes: usize,
    passes: usize,
}

#[derive(Serialize)]
struct AskedEntry {
    half_width: Option<f64>,
    relative_half_width: Option<f64>,
    node_limit: usize,
}

#[derive(Serialize)]
struct AirEntry<'a> {
    name: &'a str,
    kind: &'static str,
    temperature: f64,
    relative_humidity: Option<f64>,
}

#[derive(Serialize)]
struct SurfaceEntry<'a> {
    environment: &'a str,
    air: &'a str,
    from: [f64; 2],
    to: [f64; 2],
    faces: &'static str,
    class: &'static str,
    direction: &'static str,
    resistance: f64,
    moisture_resistance: f64,
    rule: &'a str,
    heat_flow: f64,
    mean: f64,
    lowest: f64,
    lowest_moisture: f64,
}

#[derive(Serialize)]
struct ProbeEntry<'a> {
    name: &'a str,
    x: f64,
    y: f64,
    temperature: f64,
    moisture_temperature: f64,
}

#[derive(Serialize)]
struct MaterialEntry<'a> {
    name: &'a str,
    conductivity: f64,
    source: &'a str,
    bar_spacing: Option<f64>,
}

#[derive(Serialize)]
struct SensitivityEntry<'a> {
    between: Between<'a>,
    material: &'a str,
    per_percent: f64,
}

#[derive(Serialize)]
struct EvidenceEntry {
    heat_balance: f64,
    two_grid: Option<f64>,
    identity_error: f64,
}

fn bracket(bracket: Bracket) -> BracketEntry {
    BracketEntry { low: Some(bracket.low), value: Some(bracket.value()), high: Some(bracket.high) }
}

fn between(junction: &Junction, warm: AirId, cold: AirId) -> Between<'_> {
    [air_name(junction, warm), air_name(junction, cold)]
}

fn lengths(lengths: Lengths) -> LengthsEntry {
    LengthsEntry {
        internal: lengths.internal_m,
        overall_internal: lengths.overall_internal_m,
        external: lengths.external_m,
    }
}

fn flank<'a>(junction: &'a Junction, flank: &'a Flank) -> FlankEntry<'a> {
    FlankEntry {
        name: &flank.name,
        between: between(junction, flank.warm, flank.cold),
        u: flank.u_w_m2k,
        lengths: lengths(flank.lengths),
        measured: lengths(flank.measured),
        u_layers: flank.u_layers_w_m2k,
        cut: junction.cuts[flank.cut].side.word(),
        warm_resistance: flank.warm_resistance,
        cold_resistance: flank.cold_resistance,
        layers: flank
            .layers
            .iter()
            .map(|layer| {
                let part = &junction.parts[layer.part.index()];
                LayerEntry {
                    material: &part.material,
                    thickness: layer.thickness_m,
                    conductivity: part.conductivity_w_mk,
                }
            })
            .collect(),
    }
}

fn factors(rating: &Rating) -> Vec<FactorEntry<'_>> {
    rating
        .temperature_factors
        .iter()
        .map(|factor| FactorEntry {
            environment: air_name(&rating.junction, factor.air),
            surface: factor.class.word(),
            value: factor.value,
            bound: "converged",
            temperature: factor.temperature_c,
            x: factor.at[0],
            y: factor.at[1],
            change: factor.change,
            meets: &factor.meets,
            near_spaced_bars: factor.near_spaced_bars,
        })
        .collect()
}

fn surfaces(rating: &Rating) -> Vec<SurfaceEntry<'_>> {
    let junction = &rating.junction;
    rating
        .surfaces
        .iter()
        .map(|result| {
            let surface = &junction.surfaces[result.surface.index()];
            SurfaceEntry {
                environment: &junction.environments[surface.environment.index()].name,
                air: air_name(junction, surface.air),
                from: surface.from,
                to: surface.to,
                faces: surface.faces.word(),
                class: surface.class.word(),
                direction: surface.direction.word(),
                resistance: surface.resistance,
                moisture_resistance: surface.moisture_resistance,
                rule: &surface.rule,
                heat_flow: result.heat_flow_w_m,
                mean: result.mean_c,
                lowest: result.lowest_c,
                lowest_moisture: result.lowest_moisture_c,
            }
        })
        .collect()
}

/// The entry of a rated file.
pub(super) fn rated(file: &RatedFile) -> Rated<'_> {
    let rating = &file.rating;
    let junction = &rating.junction;
    let (half_width, relative_half_width) = match rating.request.accuracy {
        Accuracy::Absolute(half_width) => (Some(half_width), None),
        Accuracy::Relative(fraction) => (None, Some(fraction)),
    };
    Rated {
        file: &file.file,
        title: &junction.title,
        bracket_met: rating.bracket_met,
        warnings: &rating.warnings,
        coupling: rating
            .couplings
            .iter()
            .map(|coupling| CouplingEntry {
                between: between(junction, coupling.warm, coupling.cold),
                bracket: coupling.bracket.map_or(BracketEntry { low: None, value: None, high: None }, bracket),
            })
            .collect(),
        flanks: junction.flanks.iter().map(|entry| flank(junction, entry)).collect(),
        psi: rating
            .psi
            .iter()
            .map(|psi| PsiEntry {
                between: between(junction, psi.warm, psi.cold),
                internal: psi.internal.map(bracket),
                overall_internal: psi.overall_internal.map(bracket),
                external: psi.external.map(bracket),
            })
            .collect(),
        temperature_factor: factors(rating),
        grid: GridEntry { nodes: rating.evidence.nodes, passes: rating.evidence.passes },
        asked: AskedEntry { half_width, relative_half_width, node_limit: rating.request.node_limit },
        plane: match junction.plane {
            Plane::Vertical => "vertical",
            Plane::Horizontal => "horizontal",
        },
        symmetry: junction.symmetry.iter().map(|side| side.word()).collect(),
        environments: junction
            .airs
            .iter()
            .map(|air| AirEntry {
                name: &air.name,
                kind: kind_word(air.kind),
                temperature: air.temperature_c,
                relative_humidity: air.relative_humidity_percent,
            })
            .collect(),
        surfaces: surfaces(rating),
        probes: rating
            .probes
            .iter()
            .map(|probe| ProbeEntry {
                name: &probe.name,
                x: probe.at[0],
                y: probe.at[1],
                temperature: probe.temperature_c,
                moisture_temperature: probe.moisture_temperature_c,
            })
            .collect(),
        materials: junction
            .parts
            .iter()
            .map(|part| MaterialEntry {
                name: &part.material,
                conductivity: part.conductivity_w_mk,
                source: &part.source,
                bar_spacing: part.bar_spacing_m,
            })
            .collect(),
        sensitivities: rating
            .sensitivities
            .iter()
            .map(|s| SensitivityEntry {
                between: between(junction, s.warm, s.cold),
                material: &s.material,
                per_percent: s.per_percent,
            })
            .collect(),
        evidence: EvidenceEntry {
            heat_balance: rating.evidence.heat_balance,
            two_grid: rating.evidence.two_grid,
            identity_error: rating.evidence.identity_error,
        },
        flank_proposal: junction.flank_proposal.as_deref(),
        remarks: file.remarks.iter().map(problem).collect(),
    }
}
