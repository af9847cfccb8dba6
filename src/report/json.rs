//! Ratings as JSON; the schema is told at [`json`].

mod entries;

use serde::Serialize;

use super::caution::CAUTION;
use super::files::{FailedFile, Problem, RatedFile};
use crate::input::Severity;
use entries::{Rated, rated};

/// Ratings as JSON, for other programs. SI always: W, m, K, °C. Fields are only ever added.
///
/// ```text
/// {
///   "coldseam": "0.1.0",                  the version that wrote it
///   "ratings": [R, …],                    in the order of the files given
///   "failed": [{"file": "…", "problems": [P, …]}, …],
///   "caution": "…"                        what the figures do not say
/// }
/// ```
///
/// **R**, one junction rated:
///
/// | field | meaning |
/// | --- | --- |
/// | `file`, `title` | as the user wrote them |
/// | `bracket_met` | whether every bracket is as narrow as asked and every temperature factor has settled |
/// | `warnings` | what a reviewer would raise, one sentence each |
/// | `coupling` | for each pair of airs, `between` [warm, cold] and the bracket of L, `low`, `value`, `high`, W/(m·K); all three null where the coupling is infinite (prescribed temperatures touch) |
/// | `flanks` | `name`; `between`; `u` used for Ψ, W/(m²·K); lengths used, `internal`, `overall_internal`, `external`, m, null where not settled; `measured`, the same three as the drawing gives them; `u_layers`, the transmittance of the drawn layers; `cut`, the sheet edge; `warm_resistance`, `cold_resistance`, m²·K/W; `layers` from warm to cold, each `material`, `thickness` in m, `conductivity` in W/(m·K) |
/// | `psi` | for each pair that flanks separate, `between` and the brackets of Ψ, W/(m·K), in `internal`, `overall_internal`, `external` dimensions, each `{low, value, high}`, or null where a length is not settled or the coupling is infinite |
/// | `temperature_factor` | for each internal environment and surface class, from the moisture run: `environment`; `surface` (opaque, frame, glazing); `value` of f_Rsi, null where no external environment is colder; `bound`, always "converged": not bracketed; `temperature` of the coldest point, °C; its place `x`, `y`, m; `change` since the last pass with at most half the nodes, or null; `meets`, what meets there; `near_spaced_bars`, if true not to be used for a verdict |
/// | `grid` | `nodes` of the last grid, `passes` of refinement |
/// | `asked` | `half_width`, W/(m·K), or `relative_half_width`, a fraction of L (the other is null); `node_limit` |
/// | `plane` | "vertical" or "horizontal" |
/// | `symmetry` | sheet edges that are planes of symmetry ("left", …); couplings and Ψ are those of the part drawn |
/// | `environments` | the airs: `name`, `kind` (internal, unheated, external), `temperature` °C, `relative_humidity` % or null |
/// | `surfaces` | `environment`; `air`; `from`, `to`, [x, y] in m; `faces` (left, right, top, bottom: the side of the solid on which the air lies); `class`; `direction` of heat flow (up, horizontal, down); `resistance`, `moisture_resistance`, m²·K/W, and the `rule` they follow; `heat_flow` into the solid, W/m; `mean`, `lowest`, °C, of the heat-flow run; `lowest_moisture`, °C |
/// | `probes` | `name`; `x`, `y`, m; `temperature`, `moisture_temperature`, °C |
/// | `materials` | `name`; `conductivity`, W/(m·K); `source`; `bar_spacing`, m, where it is the area-weighted one of spaced bars and what they cross, else null |
/// | `sensitivities` | `between`, `material`, `per_percent`: the change of L, W/(m·K), for 1 % more conductivity |
/// | `evidence` | `heat_balance` and `two_grid` (or null) of ISO 10211; `identity_error`, the relative departure of the gap from the sum of its local terms |
/// | `flank_proposal` | a `flanks:` block to complete and paste, where the drawing does not settle every length, else null |
/// | `remarks` | **P**s that did not stop the reading |
///
/// **P**, a complaint: `line` and `column` from 1, null for the file as a whole; `severity` (error, warning); `message`;
/// `label`, what was expected there, or null; `help`, what to write instead, or null.
///
/// Numbers carry full precision, so that no bound is rounded inwards.
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

#[cfg(test)]
mod tests;
