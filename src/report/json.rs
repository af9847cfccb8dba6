//! Ratings as JSON, for other programs. SI always: W, m, K, °C. Fields are only ever added.
//!
//! ```text
//! {
//!   "coldseam": "0.1.0",                  the version that wrote it
//!   "ratings": [R, …],                    in the order of the files given
//!   "failed": [{"file": "…", "problems": [P, …]}, …],
//!   "caution": "…"                        what the figures do not say
//! }
//! ```
//!
//! **R**, one junction rated:
//!
//! | field | meaning |
//! | --- | --- |
//! | `file`, `title` | as the user wrote them |
//! | `bracket_met` | whether every bracket is as narrow as asked and every temperature factor has settled |
//! | `warnings` | what a reviewer would raise, one sentence each |
//! | `coupling` | for each pair of airs, `between` [warm, cold] and the bracket of L, `low`, `value`, `high`, W/(m·K); all three null where the coupling is infinite (prescribed temperatures touch) |
//! | `flanks` | `name`; `between`; `u` used for Ψ, W/(m²·K); lengths used, `internal`, `overall_internal`, `external`, m, null where not settled; `measured`, the same three as the drawing gives them; `u_layers`, the transmittance of the drawn layers; `cut`, the sheet edge; `warm_resistance`, `cold_resistance`, m²·K/W; `layers` from warm to cold, each `material`, `thickness` in m, `conductivity` in W/(m·K) |
//! | `psi` | for each pair that flanks separate, `between` and the brackets of Ψ, W/(m·K), in `internal`, `overall_internal`, `external` dimensions, each `{low, value, high}`, or null where a length is not settled or the coupling is infinite |
//! | `temperature_factor` | for each internal environment and surface class, from the moisture run: `environment`; `surface` (opaque, frame, glazing); `value` of f_Rsi, null where no external environment is colder; `bound`, always "converged": not bracketed; `temperature` of the coldest point, °C; its place `x`, `y`, m; `change` since the last pass with at most half the nodes, or null; `meets`, what meets there; `near_spaced_bars`, if true not to be used for a verdict |
//! | `grid` | `nodes` of the last grid, `passes` of refinement |
//! | `asked` | `half_width`, W/(m·K), or `relative_half_width`, a fraction of L (the other is null); `node_limit` |
//! | `plane` | "vertical" or "horizontal" |
//! | `environments` | the airs: `name`, `kind` (internal, unheated, external), `temperature` °C, `relative_humidity` % or null |
//! | `surfaces` | `environment`; `air`; `from`, `to`, [x, y] in m; `faces` (left, right, top, bottom: the side of the solid on which the air lies); `class`; `direction` of heat flow (up, horizontal, down); `resistance`, `moisture_resistance`, m²·K/W, and the `rule` they follow; `heat_flow` into the solid, W/m; `mean`, `lowest`, °C, of the heat-flow run; `lowest_moisture`, °C |
//! | `probes` | `name`; `x`, `y`, m; `temperature`, `moisture_temperature`, °C |
//! | `materials` | `name`; `conductivity`, W/(m·K); `source`; `bar_spacing`, m, where it stands for spaced bars, else null |
//! | `sensitivities` | `between`, `material`, `per_percent`: the change of L, W/(m·K), for 1 % more conductivity |
//! | `evidence` | `heat_balance` and `two_grid` (or null) of ISO 10211; `identity_error`, the relative departure of the gap from the sum of its local terms |
//! | `flank_proposal` | a `flanks:` block to complete and paste, where the drawing does not settle every length, else null |
//! | `remarks` | **P**s that did not stop the reading |
//!
//! **P**, a complaint: `line` and `column` from 1, null for the file as a whole; `severity` (error, warning); `message`;
//! `label`, what was expected there, or null; `help`, what to write instead, or null.
//!
//! Numbers carry full precision, so that no bound is rounded inwards.

use serde::Serialize;

use super::caution::CAUTION;
use super::files::{FailedFile, Problem, RatedFile};
use super::kinds::kind_word;
use super::pairs::air_name;
use crate::index::AirId;
use crate::input::{Plane, Severity};
use crate::junction::{Flank, Junction, Lengths};
use crate::rating::{Accuracy, Bracket, Rating};

/// All results as one JSON document in the schema of this module, ended by a line break.
pub fn json(ratings: &[RatedFile], failed: &[FailedFile]) -> String {
    document(&Document {
        coldseam: env!("CARGO_PKG_VERSION"),
        ratings: ratings.iter().map(rated).collect(),
        failed: failed
            .iter()
            .map(|file| Failed { file: &file.file, problems: file.problems.iter().map(problem).collect() })
            .collect(),
        caution: CAUTION,
    })
}

/// Indented JSON, ended by a line break.
pub(super) fn document(value: &impl Serialize) -> String {
    let mut text = serde_json::to_string_pretty(value).expect("plain data with string keys is always JSON");
    text.push('\n');
    text
}

#[derive(Serialize)]
struct Document<'a> {
    coldseam: &'static str,
    ratings: Vec<Rated<'a>>,
    failed: Vec<Failed<'a>>,
    caution: &'static str,
}

#[derive(Serialize)]
struct Failed<'a> {
    file: &'a str,
    problems: Vec<ProblemEntry<'a>>,
}

#[derive(Serialize)]
struct ProblemEntry<'a> {
    line: Option<usize>,
    column: Option<usize>,
    severity: &'static str,
    message: &'a str,
    label: Option<&'a str>,
    help: Option<&'a str>,
}

#[derive(Serialize)]
struct Rated<'a> {
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

fn problem(problem: &Problem) -> ProblemEntry<'_> {
    ProblemEntry {
        line: problem.line,
        column: problem.column,
        severity: match problem.severity {
            Severity::Error => "error",
            Severity::Warning => "warning",
        },
        message: &problem.message,
        label: Some(problem.label.as_str()).filter(|label| !label.is_empty()),
        help: problem.help.as_deref(),
    }
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

fn rated(file: &RatedFile) -> Rated<'_> {
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

#[cfg(test)]
mod tests {
    use serde_json::{Value, json as value};

    use super::*;
    use crate::report::sample;

    fn parsed(ratings: &[RatedFile], failed: &[FailedFile]) -> Value {
        serde_json::from_str(&json(ratings, failed)).unwrap()
    }

    #[test]
    fn the_agreed_fields_stand_where_they_were_agreed() {
        let document = parsed(&[sample::balcony()], &[]);
        assert_eq!(document["coldseam"], value!(env!("CARGO_PKG_VERSION")));
        assert_eq!(document["failed"], value!([]));
        let rating = &document["ratings"][0];
        assert_eq!(rating["file"], value!("junctions/balcony-slab.yaml"));
        assert_eq!(rating["title"], value!("Balcony slab through an externally insulated wall"));
        assert_eq!(rating["bracket_met"], value!(true));
        assert_eq!(rating["warnings"], value!([]));
        assert_eq!(rating["grid"], value!({"nodes": 5097, "passes": 15}));
        let flank = &rating["flanks"][0];
        assert_eq!(flank["name"], value!("wall above"));
        assert_eq!(flank["between"], value!(["flat", "outdoors"]));
        assert_eq!(flank["u"], value!(0.2164));
        assert_eq!([&flank["internal"], &flank["overall_internal"], &flank["external"]], [1.2, 1.3, 1.3]);
        assert_eq!(rating["psi"][0]["between"], value!(["flat", "outdoors"]));
        assert_eq!(
            rating["psi"][0]["internal"],
            value!({"low": 0.8426, "value": 0.5 * (0.8426 + 0.8430), "high": 0.8430})
        );
        let factor = &rating["temperature_factor"][0];
        assert_eq!(factor["environment"], value!("flat"));
        assert_eq!(factor["surface"], value!("opaque"));
        assert_eq!(factor["bound"], value!("converged"));
        assert_eq!([&factor["value"], &factor["temperature"], &factor["x"], &factor["y"]], [0.7476, 13.69, 0.368, 0.1]);
    }

    #[test]
    fn bounds_keep_every_bit() {
        let mut file = sample::balcony();
        let exact = Bracket { low: 0.1 + 0.2, high: f64::from_bits(0.1f64.to_bits() + 3) + 1.0 };
        file.rating.couplings[0].bracket = Some(exact);
        let coupling = &parsed(&[file], &[])["ratings"][0]["coupling"][0];
        assert_eq!(coupling["low"].as_f64().unwrap().to_bits(), exact.low.to_bits());
        assert_eq!(coupling["high"].as_f64().unwrap().to_bits(), exact.high.to_bits());
    }

    #[test]
    fn what_is_not_settled_is_null() {
        let document = parsed(&[sample::unsettled(), sample::infinite()], &[]);
        let [unsettled, infinite] = [&document["ratings"][0], &document["ratings"][1]];
        assert_eq!(unsettled["psi"][0]["external"], Value::Null);
        assert_eq!(unsettled["flanks"][0]["external"], Value::Null);
        assert_eq!(unsettled["temperature_factor"][0]["value"], Value::Null);
        assert!(unsettled["flank_proposal"].as_str().unwrap().starts_with("flanks:\n"));
        assert_eq!(unsettled["remarks"][0]["severity"], value!("warning"));
        assert_eq!(
            unsettled["asked"],
            value!({"half_width": 0.00002, "relative_half_width": null, "node_limit": 10000})
        );
        assert_eq!(
            infinite["coupling"][0],
            value!({"between": ["flat", "outdoors"], "low": null, "value": null, "high": null})
        );
        assert_eq!(infinite["psi"][0]["internal"], Value::Null);
    }

    #[test]
    fn a_failed_file_lists_its_problems() {
        let problem = Problem {
            line: Some(3),
            column: Some(8),
            severity: Severity::Error,
            message: "unknown material \"mineral wol\"".into(),
            label: "no material of this name".into(),
            help: Some("did you mean \"mineral wool\"?".into()),
        };
        let whole = Problem::of_whole_file("the file is empty", None);
        let failed = FailedFile { file: "torn.yaml".into(), problems: vec![problem, whole] };
        assert_eq!(
            parsed(&[], &[failed])["failed"],
            value!([{"file": "torn.yaml", "problems": [
                {"line": 3, "column": 8, "severity": "error", "message": "unknown material \"mineral wol\"",
                 "label": "no material of this name", "help": "did you mean \"mineral wool\"?"},
                {"line": null, "column": null, "severity": "error", "message": "the file is empty", "label": null,
                 "help": null},
            ]}])
        );
    }
}
