//! Every edge between a solid and air, gathered into straight surfaces of one resistance.

use super::model::{Air, Environment, Part, Surface};
use super::sheet::{Content, Sheet};
use super::surface_rule;
use super::view::{Edge, View};
use crate::index::{AirId, EnvironmentId, SurfaceId};
use crate::input::{Document, Side, SurfaceClass};

/// What a surface's resistance depends on.
pub(super) struct Setting<'a> {
    /// The document, for the plane and the environments' overrides.
    pub(super) document: &'a Document,
    /// The airs.
    pub(super) airs: &'a [Air],
    /// The environments.
    pub(super) environments: &'a [Environment],
    /// The parts.
    pub(super) parts: &'a [Part],
}

/// A surface in the making, with the edges it lies on.
struct Run {
    surface: Surface,
    edges: Vec<Edge>,
}

/// Finds all surfaces, puts them on the sheet, and returns them in the order environment, bottom to top, left to right.
pub(super) fn lay(sheet: &mut Sheet, setting: &Setting) -> Vec<Surface> {
    let mut runs: Vec<Run> = Side::ALL.into_iter().flat_map(|side| runs_facing(sheet, side, setting)).collect();
    runs.sort_by(|a, b| {
        let (a, b) = (&a.surface, &b.surface);
        let order = a.environment.cmp(&b.environment);
        let order = order.then(a.from[1].total_cmp(&b.from[1])).then(a.from[0].total_cmp(&b.from[0]));
        order.then(a.to[1].total_cmp(&b.to[1])).then(a.to[0].total_cmp(&b.to[0])).then(a.faces.cmp(&b.faces))
    });
    for (index, run) in runs.iter().enumerate() {
        for edge in &run.edges {
            edge.set_surface(sheet, SurfaceId::new(index));
        }
    }
    runs.into_iter().map(|run| run.surface).collect()
}

/// The surfaces whose air lies on side `faces` of the solid.
fn runs_facing(sheet: &Sheet, faces: Side, setting: &Setting) -> Vec<Run> {
    let view = View::new(sheet, faces);
    let mut runs: Vec<Run> = Vec::new();
    for line in 1..view.depths() {
        let mut open = false;
        for position in 0..view.positions() {
            let (Content::Air(environment), Content::Solid(part)) =
                (view.before(position, line), view.content(position, line))
            else {
                open = false;
                continue;
            };
            let class = setting.parts[part.index()].class;
            let next = setting.surface(view, [position, line], faces, environment, class);
            let edge = view.front_edge(position, line);
            match runs.last_mut() {
                Some(run) if open && continues(&run.surface, &next) => {
                    run.surface.to = next.to;
                    run.edges.push(edge);
                }
                _ => runs.push(Run { surface: next, edges: vec![edge] }),
            }
            open = true;
        }
    }
    runs
}

fn continues(run: &Surface, next: &Surface) -> bool {
    run.environment == next.environment
        && run.class == next.class
        && run.resistance == next.resistance
        && run.moisture_resistance == next.moisture_resistance
}

impl Setting<'_> {
    /// The surface on one edge: at a position and depth line of the view from the side that it faces.
    fn surface(
        &self,
        view: View,
        [position, line]: [usize; 2],
        faces: Side,
        environment: EnvironmentId,
        class: SurfaceClass,
    ) -> Surface {
        let air = self.environments[environment.index()].air;
        let across = self.air_across(view, position, line);
        let direction = surface_rule::direction(self.airs, self.document.plane, faces, air, across);
        let rule = surface_rule::resistance(&self.document.environments[environment.index()], class, direction);
        Surface {
            environment,
            air,
            class,
            from: view.point(position, line),
            to: view.point(position + 1, line),
            faces,
            direction,
            resistance: rule.heat,
            moisture_resistance: rule.moisture,
            rule: rule.rule,
        }
    }

    /// The air met by following the normal inwards through the solid; `None` where a void or the sheet's edge comes first.
    fn air_across(&self, view: View, position: usize, line: usize) -> Option<AirId> {
        let behind = (line..view.depths()).map(|depth| view.content(position, depth));
        match behind.into_iter().find(|content| !matches!(content, Content::Solid(_))) {
            Some(Content::Air(environment)) => Some(self.environments[environment.index()].air),
            _ => None,
        }
    }
}

#[cfg(test)]
mod tests;
