//! From a document to a junction: paint, check, lay surfaces, find cuts and flanks, review.

use super::cuts::{self, PlacedCut};
use super::flank_choice::Choosing;
use super::flanks::Drawing;
use super::model::{Air, Environment, Junction};
use super::remark::Findings;
use super::surfaces::{self, Setting};
use super::{checks, listing, painting, place, probes, proposal, review, surface_rule};
use crate::index::AirId;
use crate::input::{Diagnostic, Document, Side};

/// So many remarks of the reading are taken over.
const READ_REMARKS_NAMED: usize = 40;

/// Checks how the statements of a document fit together and builds the junction they describe.
///
/// # Errors
/// Every problem of the drawing, in the order of the file, none of them a consequence of another.
pub fn build(document: &Document) -> Result<Junction, Vec<Diagnostic>> {
    let mut findings = Findings::default();
    let junction = assemble(document, &mut findings);
    match junction {
        Some(junction) if findings.faults.is_empty() => Ok(junction),
        _ => {
            debug_assert!(!findings.faults.is_empty(), "a drawing that is no junction has a fault");
            Err(listing::diagnostics(findings.faults, document.unit))
        }
    }
}

/// The junction, as far as it can be built; whatever keeps it from being one is among the faults.
fn assemble(document: &Document, findings: &mut Findings) -> Option<Junction> {
    let painting = painting::paint(document, findings)?;
    let (airs, environments) = airs(document);
    let whole = checks::check(&painting, document, &environments, findings);
    let probes = probes::probes(&painting, document, findings);
    if !whole {
        return None;
    }
    let mut sheet = painting.sheet();
    let parts = painting.parts.clone();
    let setting = Setting { document, airs: &airs, environments: &environments, parts: &parts };
    let surfaces = surfaces::lay(&mut sheet, &setting);
    let symmetry: Vec<Side> =
        Side::ALL.into_iter().filter(|side| document.symmetry.iter().any(|listed| listed.value == *side)).collect();
    let cuts = cuts::find(&sheet, &symmetry);
    let choice = Choosing::new(&cuts, &surfaces, &airs).choose(document, findings);
    let drawing = Drawing {
        sheet: &sheet,
        airs: &airs,
        parts: &parts,
        surfaces: &surfaces,
        cuts: &cuts,
        symmetry: &symmetry,
        tolerance_m: painting.lines.tolerance_m,
    };
    let flanks = drawing.flanks(&choice.flanks, findings);
    let settled = flanks.iter().all(|flank| {
        let lengths = flank.lengths;
        lengths.internal_m.and(lengths.overall_internal_m).and(lengths.external_m).is_some()
    });
    let proposed: Vec<_> = if choice.open.is_empty() {
        choice.flanks.iter().zip(flanks.iter().map(|flank| flank.lengths)).collect()
    } else {
        choice.open.iter().map(|chosen| (chosen, Default::default())).collect()
    };
    let ask = !settled || !choice.open.is_empty();
    let flank_proposal = ask.then(|| proposal::block(&drawing, &proposed, document.unit));
    review::remark_on_size(&drawing, findings);
    review::remark_on_near_cuts(&drawing, &flanks, findings);
    review::remark_on_plates(&painting, document, findings);
    Some(Junction {
        title: document.title.clone(),
        plane: document.plane,
        unit: document.unit,
        warnings: warnings(document, findings),
        cuts: cuts.into_iter().map(|PlacedCut { cut, .. }| cut).collect(),
        airs,
        environments,
        parts,
        sheet,
        surfaces,
        symmetry,
        flanks,
        flank_proposal,
        probes,
    })
}

/// What the reading remarked, then what the drawing gives rise to.
fn warnings(document: &Document, findings: &Findings) -> Vec<String> {
    let mut warnings: Vec<String> =
        document.remarks.iter().take(READ_REMARKS_NAMED).map(|remark| remark.message.clone()).collect();
    let left = document.remarks.len() - warnings.len();
    if left > 0 {
        warnings.push(format!("{} more remarks of the reading are left out here", place::count(left)));
    }
    warnings.extend(listing::sentences(&findings.remarks, document.unit));
    warnings
}

impl Junction {
    /// Two different airs, the warmer one first: by kind, then temperature, then order in the file.
    pub fn warm_first(&self, a: AirId, b: AirId) -> [AirId; 2] {
        surface_rule::warmer_first(&self.airs, a, b)
    }
}

/// The airs in file order, and each environment's own.
fn airs(document: &Document) -> (Vec<Air>, Vec<Environment>) {
    let mut airs = Vec::new();
    let mut air_of = vec![None; document.environments.len()];
    for (index, environment) in document.environments.iter().enumerate() {
        if environment.same_as.is_none() {
            air_of[index] = Some(AirId::new(airs.len()));
            airs.push(Air {
                name: environment.name.value.clone(),
                kind: environment.kind,
                temperature_c: environment.temperature_c,
                relative_humidity_percent: environment.relative_humidity_percent,
            });
        }
    }
    let environments = document.environments.iter().enumerate().map(|(index, environment)| Environment {
        name: environment.name.value.clone(),
        air: air_of[environment.same_as.unwrap_or(index)].expect("`same_as` names an entry with its own air"),
    });
    (airs, environments.collect())
}
