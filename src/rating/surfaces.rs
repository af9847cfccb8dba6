//! What happens on the surfaces: the coldest points, and heat flow and temperatures of every surface.

use super::fields::{Fields, Run};
use super::model::SurfaceResult;
use super::pass::{Pass, Settings};
use super::run::Setting;
use crate::grid::{Cell, Rectangle};
use crate::index::{AirId, SurfaceId};
use crate::input::{EnvironmentKind, SurfaceClass};
use crate::junction::Junction;

/// Of two points, one is colder only if it is so by this fraction of the temperature span; otherwise the first found
/// (lowest, then leftmost) stands, so that a plain wall names the same point on every grid.
const TIE_FRACTION: f64 = 1e-9;

/// The coldest surface point of an internal air and a surface class, in the moisture run.
#[derive(Clone, Debug)]
pub(super) struct Coldest {
    pub(super) air: AirId,
    pub(super) class: SurfaceClass,
    pub(super) at: [f64; 2],
    pub(super) surface: SurfaceId,
    pub(super) temperature_c: f64,
    /// Temperature factor, where indoors and outdoors are settled and differ.
    pub(super) factor: Option<f64>,
}

/// Every surface face of a cell: surface, face number.
fn surface_faces(cell: &Cell) -> impl Iterator<Item = (SurfaceId, usize)> + '_ {
    cell.shape.surfaces.iter().enumerate().filter_map(|(face, surface)| surface.map(|surface| (surface, face)))
}

/// The coldest points, by air, then class.
pub(super) fn coldest(junction: &Junction, settings: &Settings, pass: &Pass) -> Vec<Coldest> {
    let setting = &settings.moisture;
    let solution = pass.moisture();
    let span = setting.span_k();
    let mut found: Vec<Coldest> = Vec::new();
    for cell in pass.grid.cells() {
        for (surface, face) in surface_faces(&cell) {
            let data = &junction.surfaces[surface.index()];
            if junction.airs[data.air.index()].kind != EnvironmentKind::Internal {
                continue;
            }
            for corner in Rectangle::FACE_CORNERS[face] {
                let node = cell.shape.corners[corner];
                // A prescribed surface has its air's temperature, also where it touches another one.
                let temperature_c = if data.moisture_resistance == 0.0 {
                    junction.airs[data.air.index()].temperature_c
                } else {
                    solution.temperature(node, &setting.temperatures)
                };
                let at = pass.grid.position(node);
                let (air, class) = (data.air, data.class);
                let candidate = Coldest { air, class, at, surface, temperature_c, factor: None };
                match found.iter_mut().find(|c| c.air == data.air && c.class == data.class) {
                    Some(best) if temperature_c < best.temperature_c - TIE_FRACTION * span => *best = candidate,
                    Some(_) => {}
                    None => found.push(candidate),
                }
            }
        }
    }
    found.sort_by_key(|c| (c.air, c.class));
    for c in &mut found {
        c.factor = factor(junction, setting, c);
    }
    found
}

/// f_Rsi = (θ_si − θ_e)/(θ_i − θ_e), where outdoor air has one temperature, below that indoors; otherwise there is none.
fn factor(junction: &Junction, setting: &Setting, coldest: &Coldest) -> Option<f64> {
    let external: Vec<usize> = (0..setting.airs.len())
        .filter(|&k| junction.airs[setting.airs[k].index()].kind == EnvironmentKind::External)
        .collect();
    let outdoors = setting.temperatures[*external.first()?];
    let indoors = junction.airs[coldest.air.index()].temperature_c;
    let one = external.iter().all(|&k| setting.temperatures[k] == outdoors);
    (one && indoors > outdoors).then(|| (coldest.temperature_c - outdoors) / (indoors - outdoors))
}

/// Temperatures at the probes, °C: heat-flow run, moisture run.
pub(super) fn probes(junction: &Junction, settings: &Settings, pass: &Pass) -> Vec<[f64; 2]> {
    let probe = |probe: &crate::junction::Probe| {
        let cell = pass.grid.cell_holding(probe.at).expect("the junction was checked: a probe lies in a solid");
        [(&settings.heat, &pass.heat), (&settings.moisture, pass.moisture())].map(|(setting, solution)| {
            let corners = cell.shape.corners.map(|node| solution.temperature(node, &setting.temperatures));
            pass.grid.interpolate(&cell, corners, probe.at)
        })
    };
    junction.probes.iter().map(probe).collect()
}

/// Heat flow and temperatures of every surface.
pub(super) fn results(junction: &Junction, fields: &Fields) -> Vec<SurfaceResult> {
    struct Sums {
        heat_flow: f64,
        temperature: f64,
        length: f64,
        lowest: [f64; 2],
    }
    let empty = || Sums { heat_flow: 0.0, temperature: 0.0, length: 0.0, lowest: [f64::INFINITY; 2] };
    let mut sums: Vec<Sums> = junction.surfaces.iter().map(|_| empty()).collect();
    for cell in fields.grid().cells() {
        for (surface, face) in surface_faces(&cell) {
            let sum = &mut sums[surface.index()];
            let length = cell.shape.face_length_m(face);
            let entering = Rectangle::INWARD[face] * fields.flux_w_m2(Run::Heat, cell.shape.faces[face]);
            sum.heat_flow += length * entering;
            sum.length += length;
            for corner in Rectangle::FACE_CORNERS[face] {
                let node = cell.shape.corners[corner];
                let temperature = fields.temperature_c(Run::Heat, node);
                sum.temperature += 0.5 * length * temperature;
                sum.lowest[0] = sum.lowest[0].min(temperature);
                sum.lowest[1] = sum.lowest[1].min(fields.temperature_c(Run::Moisture, node));
            }
        }
    }
    let result = |(index, sum): (usize, &Sums)| SurfaceResult {
        surface: SurfaceId::new(index),
        heat_flow_w_m: sum.heat_flow,
        mean_c: sum.temperature / sum.length,
        lowest_c: sum.lowest[0],
        lowest_moisture_c: sum.lowest[1],
    };
    sums.iter().enumerate().map(result).collect()
}
