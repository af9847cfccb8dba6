//! The fields behind a rating, for pictures and further questions.

use super::pass::{Pass, Settings};
use super::run::Setting;
use crate::conduction::Solution;
use crate::grid::Grid;
use crate::index::{FaceId, NodeId};

/// The last grid with the fields of both runs, at the file's temperatures.
#[derive(Debug)]
pub struct Fields {
    pub(super) settings: Settings,
    pub(super) pass: Pass,
}

/// Which of the two runs is meant.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Run {
    /// ISO 6946 surface resistances.
    Heat,
    /// ISO 13788 surface resistances.
    Moisture,
}

impl Fields {
    /// The last grid.
    pub fn grid(&self) -> &Grid {
        &self.pass.grid
    }

    pub(super) fn of(&self, run: Run) -> (&Setting, &Solution) {
        match run {
            Run::Heat => (&self.settings.heat, &self.pass.heat),
            Run::Moisture => (&self.settings.moisture, self.pass.moisture()),
        }
    }

    /// Temperature at a node, °C.
    pub fn temperature_c(&self, run: Run, node: NodeId) -> f64 {
        let (setting, solution) = self.of(run);
        solution.temperature(node, &setting.temperatures)
    }

    /// Flux density on a face, positive along the axis, W/m².
    pub fn flux_w_m2(&self, run: Run, face: FaceId) -> f64 {
        let (setting, solution) = self.of(run);
        solution.flux(face, &setting.temperatures)
    }
}
