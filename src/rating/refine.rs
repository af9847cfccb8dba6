//! When to stop: passes of both runs on ever finer grids, until every bracket is as narrow as asked and the temperature
//! factors have settled, or the node limit is reached.

use super::model::Request;
use super::pass::{Pass, Settings, Starts};
use super::run::{Setting, carry};
use crate::conduction::{Solution, SolveError};
use crate::grid::{Grid, GridTooLarge};
use crate::junction::Junction;
use std::sync::Arc;

/// A temperature factor has settled when it changed by no more than this since the last pass with at most half the
/// nodes; the same share of the temperature span holds for probes. ISO 10211 asks for 0.005.
pub(super) const SETTLED: f64 = 0.0003;

/// Passes after which refinement is given up; sections need 5 to 40.
const PASS_LIMIT: usize = 300;

/// A rating that could not be made.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum RateError {
    /// The drawing's own lines need more nodes than allowed.
    #[error(transparent)]
    FirstGrid(#[from] GridTooLarge),
    /// A solve whose result cannot be used.
    #[error(transparent)]
    Solve(#[from] SolveError),
}

/// How far a rating has come, after each pass.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Progress {
    /// Passes done.
    pub pass: usize,
    /// Nodes of the last one.
    pub nodes: usize,
    /// The widest coupling's half-width over what was asked: below 1 it is met. 0 where there is no coupling.
    pub ratio: f64,
}

/// Why refinement ended.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum End {
    /// Everything asked is reached.
    Met,
    /// The next grid would have this many nodes, more than allowed.
    NodeLimit(usize),
    /// What is left of the gap lies where cells can be split no further.
    Exhausted,
}

/// What is kept of an earlier pass to compare with.
struct Earlier {
    grid: Grid,
    factors: Vec<Option<f64>>,
    temperatures: Vec<f64>,
    probes: Vec<[f64; 2]>,
    heat_flow: f64,
}

impl Earlier {
    fn of(pass: &Pass) -> Self {
        Self {
            grid: pass.grid.clone(),
            factors: pass.coldest.iter().map(|c| c.factor).collect(),
            temperatures: pass.coldest.iter().map(|c| c.temperature_c).collect(),
            probes: pass.probes.clone(),
            heat_flow: pass.heat_flow,
        }
    }
}

/// The points whose temperatures must settle: the coldest ones, then the probes.
fn watched(junction: &Junction, pass: &Pass) -> Vec<[f64; 2]> {
    pass.coldest.iter().map(|c| c.at).chain(junction.probes.iter().map(|probe| probe.at)).collect()
}

/// How refinement ended, and how the last pass compares with the last one that had at most half its nodes.
pub(super) struct Ended {
    pub(super) why: End,
    pub(super) passes: usize,
    /// Change of each temperature factor; `None` where there was no such pass or no factor.
    pub(super) factor_changes: Vec<Option<f64>>,
    /// Whether temperature factors and probes have settled.
    pub(super) settled: bool,
    /// Relative change of the heat flow.
    pub(super) two_grid: Option<f64>,
    /// Largest departure from the gap identity over all passes.
    pub(super) identity_error: f64,
}

/// Refines until met, exhausted or at the node limit.
pub(super) fn refine(
    junction: &Junction,
    settings: &Settings,
    request: &Request,
    progress: &(dyn Fn(Progress) + Sync),
) -> Result<(Pass, Ended), RateError> {
    let sheet = Arc::new(junction.sheet.clone());
    let mut grid = Grid::first(sheet, request.node_limit)?;
    let mut starts = None;
    let mut history: Vec<Earlier> = Vec::new();
    let mut identity_error: f64 = 0.0;
    loop {
        let pass = Pass::solve(junction, settings, grid, starts)?;
        identity_error = identity_error.max(pass.heat.identity_error).max(pass.moisture().identity_error);
        let passes = history.len() + 1;
        let ratio = pass.worst_ratio(request);
        progress(Progress { pass: passes, nodes: pass.nodes(), ratio });
        let earlier = history.iter().rev().find(|earlier| 2 * earlier.grid.node_count() <= pass.nodes());
        let settling = Settling::new(junction, settings, &pass, earlier);
        match next_splitting(settings, request, &pass, &settling, passes) {
            Err(why) => {
                let settled = settling.settled || (why == End::Met && settling.never_compared);
                let two_grid = earlier
                    .filter(|e| e.heat_flow > 0.0 && pass.heat_flow > 0.0)
                    .map(|e| (pass.heat_flow - e.heat_flow).abs() / pass.heat_flow);
                let factor_changes = settling.factor_changes;
                return Ok((pass, Ended { why, passes, factor_changes, settled, two_grid, identity_error }));
            }
            Ok(splitting) => {
                starts = Some(Starts {
                    heat: carry(&pass.grid, &splitting, &pass.heat),
                    moisture: pass.moisture.as_ref().map(|m| carry(&pass.grid, &splitting, m)),
                });
                history.push(Earlier::of(&pass));
                grid = pass.grid.split(&splitting);
            }
        }
    }
}

/// How temperatures compare with an earlier pass.
struct Settling {
    factor_changes: Vec<Option<f64>>,
    settled: bool,
    /// Watched points at which the grid is as coarse as it was: no change there says nothing. Split them.
    stale: Vec<[f64; 2]>,
    never_compared: bool,
}

impl Settling {
    fn new(junction: &Junction, settings: &Settings, pass: &Pass, earlier: Option<&Earlier>) -> Self {
        let nothing_to_settle = pass.coldest.is_empty() && pass.probes.is_empty();
        let Some(earlier) = earlier else {
            let factor_changes = vec![None; pass.coldest.len()];
            return Self { factor_changes, settled: nothing_to_settle, stale: Vec::new(), never_compared: true };
        };
        let stale: Vec<[f64; 2]> = watched(junction, pass)
            .into_iter()
            .filter(|&at| {
                let (now, then) = (pass.grid.fineness_m(at), earlier.grid.fineness_m(at));
                (0..2).any(|axis| now[axis] > 0.0 && now[axis] >= then[axis])
            })
            .collect();
        let span = settings.heat.span_k();
        let still = |now: f64, then: f64| (now - then).abs() <= SETTLED * span;
        let factor_changes: Vec<Option<f64>> =
            pass.coldest.iter().zip(&earlier.factors).map(|(c, then)| Some((c.factor? - (*then)?).abs())).collect();
        let factors = factor_changes.iter().flatten().all(|&change| change <= SETTLED);
        let points = pass.coldest.iter().zip(&earlier.temperatures).all(|(c, &then)| still(c.temperature_c, then));
        let probes = pass.probes.iter().zip(&earlier.probes).all(|(now, then)| (0..2).all(|k| still(now[k], then[k])));
        let settled = factors && points && probes && stale.is_empty();
        Self { factor_changes, settled, never_compared: !stale.is_empty(), stale }
    }
}

/// Where to split next, or why not.
fn next_splitting(
    settings: &Settings,
    request: &Request,
    pass: &Pass,
    settling: &Settling,
    passes: usize,
) -> Result<crate::grid::Splitting, End> {
    let ratio = pass.worst_ratio(request);
    let (narrow, settled) = (ratio <= 1.0, settling.settled);
    if narrow && settled {
        return Err(End::Met);
    }
    let mut splitting = if pass.couplings.iter().any(|(_, bracket)| bracket.is_none()) && !settled {
        // The gap of an infinite coupling gathers at the touching point and says nothing about temperatures elsewhere.
        pass.grid.whole_splitting()
    } else {
        let mut cures = heat_cures(settings, request, pass, settled);
        if ratio * pass.grid.exhausted_share(&cures) > 1.0 {
            return Err(End::Exhausted);
        }
        let moisture = pass.moisture();
        let weights: Vec<f64> = (0..settings.moisture.airs.len()).map(|k| 1.0 / moisture.gap(k)).collect();
        add(&mut cures, &weighted(&settings.moisture, pass, moisture, &weights));
        // A gap of nothing but rounding has nothing to split: a plain layered wall is exact on its first grid.
        let at_rounding = narrow && is_rounding(settings, pass);
        let Some(splitting) = pass.grid.choose_splitting(&cures).filter(|_| !at_rounding) else {
            return Err(if narrow { End::Met } else { End::Exhausted });
        };
        splitting
    };
    for &at in &settling.stale {
        pass.grid.split_around(&mut splitting, at);
    }
    if passes == PASS_LIMIT {
        return Err(End::Exhausted);
    }
    let nodes = pass.grid.node_count_after(&splitting);
    if nodes > request.node_limit { Err(End::NodeLimit(nodes)) } else { Ok(splitting) }
}

/// Whether both runs' gaps are rounding only.
fn is_rounding(settings: &Settings, pass: &Pass) -> bool {
    let run = |setting: &Setting, solution: &Solution| {
        (0..setting.airs.len()).all(|k| solution.gap(k) <= 1e-9 * solution.upper_side(k))
    };
    run(&settings.heat, &pass.heat) && run(&settings.moisture, pass.moisture())
}

/// The heat-flow run's cures: each coupling that is still too wide asks for the relative shares of its two airs' gaps.
/// Probes ask too, as long as they have not settled.
fn heat_cures(settings: &Settings, request: &Request, pass: &Pass, settled: bool) -> Vec<[f64; 2]> {
    let mut weights = vec![0.0; settings.heat.airs.len()];
    for &([i, j], bracket) in &pass.couplings {
        let probes_ask = !settled && !pass.probes.is_empty();
        let asks = bracket.is_some_and(|bracket| !Pass::is_narrow(bracket, request) || probes_ask);
        if asks {
            weights[i] += 1.0 / pass.heat.gap(i);
            weights[j] += 1.0 / pass.heat.gap(j);
        }
    }
    weighted(&settings.heat, pass, &pass.heat, &weights)
}

fn weighted(setting: &Setting, pass: &Pass, solution: &Solution, weights: &[f64]) -> Vec<[f64; 2]> {
    solution.cures(&setting.problem(&pass.grid, &pass.conductivity), weights)
}

fn add(total: &mut [[f64; 2]], more: &[[f64; 2]]) {
    for (total, more) in total.iter_mut().zip(more) {
        total[0] += more[0];
        total[1] += more[1];
    }
}

/// The place that holds most of the gap of a coupling's airs, and its share (0 to 1), counting everything within a
/// hundredth of the model's size around the fullest cell.
pub(super) fn fullest_place(settings: &Settings, pass: &Pass, airs: [usize; 2]) -> Option<([f64; 2], f64)> {
    let mut weights = vec![0.0; settings.heat.airs.len()];
    for k in airs {
        weights[k] = 1.0 / pass.heat.gap(k);
    }
    let cures = weighted(&settings.heat, pass, &pass.heat, &weights);
    let term = |cure: &[f64; 2]| cure[0] + cure[1];
    let total: f64 = cures.iter().map(term).sum();
    let fullest = pass.grid.cells().max_by(|a, b| term(&cures[a.id.index()]).total_cmp(&term(&cures[b.id.index()])))?;
    let centre = pass.grid.centre(fullest.id);
    let radius = 0.01 * pass.grid.size_m();
    let near = |at: [f64; 2]| (at[0] - centre[0]).hypot(at[1] - centre[1]) <= radius;
    let held: f64 =
        pass.grid.cells().filter(|c| near(pass.grid.centre(c.id))).map(|c| term(&cures[c.id.index()])).sum();
    (total > 0.0).then(|| (pass.grid.nearest_drawn_corner(centre), held / total))
}
