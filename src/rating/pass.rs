//! One pass: both runs on one grid, and what they say.

use super::model::{Accuracy, Bracket, Request};
use super::run::Setting;
use super::surfaces::{self, Coldest};
use crate::conduction::{Solution, SolveError};
use crate::grid::Grid;
use crate::junction::Junction;

/// The two settings of a rating.
#[derive(Clone, Debug)]
pub(super) struct Settings {
    pub(super) heat: Setting,
    pub(super) moisture: Setting,
}

impl Settings {
    pub(super) fn new(junction: &Junction) -> Self {
        Self {
            heat: Setting::new(junction, |surface| surface.resistance),
            moisture: Setting::new(junction, |surface| surface.moisture_resistance),
        }
    }
}

/// Nodal temperatures to start both runs from.
pub(super) struct Starts {
    pub(super) heat: Vec<Vec<f64>>,
    pub(super) moisture: Option<Vec<Vec<f64>>>,
}

/// Both runs on one grid.
#[derive(Debug)]
pub(super) struct Pass {
    pub(super) grid: Grid,
    pub(super) conductivity: Vec<f64>,
    pub(super) heat: Solution,
    pub(super) moisture: Option<Solution>,
    /// A pair of airs that take part, by place, and its bracket; `None` where it is infinite.
    pub(super) couplings: Vec<([usize; 2], Option<Bracket>)>,
    pub(super) coldest: Vec<Coldest>,
    /// Temperatures at the probes, °C: heat-flow run, moisture run.
    pub(super) probes: Vec<[f64; 2]>,
    /// Half the sum of absolute heat flows at the file's temperatures (at 1 K per pair where these are all equal), W/m.
    pub(super) heat_flow: f64,
}

impl Pass {
    pub(super) fn solve(
        junction: &Junction,
        settings: &Settings,
        grid: Grid,
        starts: Option<Starts>,
    ) -> Result<Self, SolveError> {
        let conductivity = super::run::conductivities(junction, &grid);
        let (heat_start, moisture_start) = match starts {
            Some(starts) => (Some(starts.heat), starts.moisture),
            None => (None, None),
        };
        let needs_moisture = !settings.heat.same_films(&settings.moisture);
        let (heat, moisture) = rayon::join(
            || settings.heat.solve(&grid, &conductivity, heat_start),
            || needs_moisture.then(|| settings.moisture.solve(&grid, &conductivity, moisture_start)).transpose(),
        );
        let (heat, moisture) = (heat?, moisture?);
        let couplings = couplings(&heat, settings.heat.airs.len());
        let heat_flow = heat_flow(&couplings, &settings.heat.temperatures);
        let mut pass =
            Self { grid, conductivity, heat, moisture, couplings, coldest: Vec::new(), probes: Vec::new(), heat_flow };
        pass.coldest = surfaces::coldest(junction, settings, &pass);
        pass.probes = surfaces::probes(junction, settings, &pass);
        Ok(pass)
    }

    /// The moisture run's solution: its own, or the heat-flow run's where the films are the same.
    pub(super) fn moisture(&self) -> &Solution {
        self.moisture.as_ref().unwrap_or(&self.heat)
    }

    pub(super) fn nodes(&self) -> usize {
        self.grid.node_count()
    }

    /// Whether a coupling's bracket is as narrow as asked.
    pub(super) fn is_narrow(bracket: Bracket, request: &Request) -> bool {
        bracket.half_width() <= asked(bracket, request)
    }

    /// How far the widest coupling is from what was asked: half-width over asked; 0 where there is none.
    pub(super) fn worst_ratio(&self, request: &Request) -> f64 {
        let ratio = |bracket: &Bracket| bracket.half_width() / asked(*bracket, request);
        self.couplings.iter().filter_map(|(_, bracket)| bracket.as_ref()).map(ratio).fold(0.0, f64::max)
    }
}

/// The half-width asked for a coupling, W/(m·K).
pub(super) fn asked(bracket: Bracket, request: &Request) -> f64 {
    match request.accuracy {
        Accuracy::Absolute(half_width) => half_width,
        Accuracy::Relative(fraction) => fraction * bracket.value().abs(),
    }
}

fn couplings(heat: &Solution, airs: usize) -> Vec<([usize; 2], Option<Bracket>)> {
    let infinite = |air: usize| heat.touching().iter().any(|touching| touching.airs.contains(&air));
    let pairs = (0..airs).flat_map(|i| (i + 1..airs).map(move |j| [i, j]));
    pairs
        .map(|[i, j]| {
            let bracket = (!infinite(i) && !infinite(j)).then(|| {
                let [low, high] = heat.bracket(i, j);
                Bracket { low, high }
            });
            ([i, j], bracket)
        })
        .collect()
}

fn heat_flow(couplings: &[([usize; 2], Option<Bracket>)], temperatures: &[f64]) -> f64 {
    let even = temperatures.windows(2).all(|pair| pair[0] == pair[1]);
    let mut out_of = vec![0.0; temperatures.len()];
    for &([i, j], bracket) in couplings {
        let difference = if even { 1.0 } else { temperatures[i] - temperatures[j] };
        let flow = bracket.map_or(0.0, |b| b.value() * difference);
        out_of[i] += flow;
        out_of[j] -= flow;
    }
    0.5 * out_of.iter().map(|flow: &f64| flow.abs()).sum::<f64>()
}
