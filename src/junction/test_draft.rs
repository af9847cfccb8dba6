//! Documents written by hand for the tests of this room: lengths in millimetres, names resolved on the way.

use super::{Junction, build};
use crate::input::{
    Axis, Diagnostic, Document, Environment, EnvironmentKind, Fill, FlankEntry, LengthUnit, Material, Plane, Probe,
    Provenance, Region, Resistances, Shape, Side, Span, Spanned, SurfaceClass,
};

/// A document in the making. Everything that can be pointed at gets a span of its own.
#[derive(Clone)]
pub(super) struct Draft {
    pub(super) document: Document,
    spans: usize,
}

fn metres(millimetres: f64) -> f64 {
    millimetres * 1e-3
}

impl Draft {
    /// An empty document with the materials of the tests.
    pub(super) fn new(plane: Plane) -> Self {
        let materials = [
            ("render", 1.0),
            ("wool", 0.035),
            ("block", 0.5),
            ("plaster", 0.57),
            ("concrete", 2.3),
            ("timber", 0.13),
            ("board", 0.25),
            ("steel", 50.0),
        ];
        let material = |(name, conductivity_w_mk): (&str, f64)| Material {
            name: name.to_owned(),
            span: None,
            conductivity_w_mk,
            provenance: Provenance::File(None),
        };
        let document = Document {
            title: "Fennel Row".to_owned(),
            unit: LengthUnit::Millimetre,
            plane,
            environments: Vec::new(),
            materials: materials.into_iter().map(material).collect(),
            regions: Vec::new(),
            section_span: Span { start: 1, end: 2 },
            symmetry: Vec::new(),
            flanks: None,
            probes: Vec::new(),
            remarks: Vec::new(),
        };
        Self { document, spans: 1 }
    }

    /// A vertical section with `outdoors` at -5 °C and `flat` at 20 °C.
    pub(super) fn section() -> Self {
        Self::new(Plane::Vertical).air("outdoors", EnvironmentKind::External, -5.0).air(
            "flat",
            EnvironmentKind::Internal,
            20.0,
        )
    }

    /// A plan with the same two airs.
    pub(super) fn plan() -> Self {
        let mut draft = Self::section();
        draft.document.plane = Plane::Horizontal;
        draft
    }

    fn span(&mut self) -> Span {
        self.spans += 1;
        Span { start: 10 * self.spans, end: 10 * self.spans + 5 }
    }

    /// The span of the region drawn `number`th, from 0.
    pub(super) fn region_span(&self, number: usize) -> Span {
        self.document.regions[number].span
    }

    pub(super) fn air(mut self, name: &str, kind: EnvironmentKind, temperature_c: f64) -> Self {
        let name = Spanned { value: name.to_owned(), span: self.span() };
        self.document.environments.push(Environment {
            name,
            same_as: None,
            kind,
            temperature_c,
            relative_humidity_percent: None,
            surface_resistance: None,
            moisture_resistance: None,
        });
        self
    }

    /// A further entry with the air of another.
    pub(super) fn same_air(mut self, name: &str, other: &str) -> Self {
        let index = self.environment(other).expect("the other is defined");
        let mut entry = self.document.environments[index].clone();
        entry.name = Spanned { value: name.to_owned(), span: self.span() };
        entry.same_as = Some(index);
        self.document.environments.push(entry);
        self
    }

    /// Overrides of the last environment.
    pub(super) fn resistances(mut self, heat: Option<Resistances>, moisture: Option<Resistances>) -> Self {
        let last = self.document.environments.last_mut().expect("an environment is defined");
        last.surface_resistance = heat;
        last.moisture_resistance = moisture;
        self
    }

    fn environment(&self, name: &str) -> Option<usize> {
        self.document.environments.iter().position(|environment| environment.name.value == name)
    }

    fn material(&self, name: &str) -> Option<usize> {
        self.document.materials.iter().position(|material| material.name == name)
    }

    fn region(mut self, shape: Shape, fill: Fill) -> Self {
        let span = self.span();
        self.document.regions.push(Region { span, shape, fill, class: SurfaceClass::Opaque });
        self
    }

    fn fill(&self, name: &str) -> Fill {
        if name == "void" {
            return Fill::Void;
        }
        match (self.material(name), self.environment(name)) {
            (Some(material), _) => Fill::Material(material),
            (None, Some(environment)) => Fill::Environment(environment),
            (None, None) => panic!("the test names {name}, which it does not define"),
        }
    }

    /// A box of a material, an environment or `void`.
    pub(super) fn paint(self, name: &str, x: [f64; 2], y: [f64; 2]) -> Self {
        let fill = self.fill(name);
        self.region(Shape::Box { x: x.map(metres), y: y.map(metres) }, fill)
    }

    /// A polygon.
    pub(super) fn outline(mut self, name: &str, points: &[[f64; 2]]) -> Self {
        let fill = self.fill(name);
        let points = points.iter().map(|point| Spanned { value: point.map(metres), span: self.span() }).collect();
        self.region(Shape::Outline(points), fill)
    }

    /// Spaced bars: cross-section in mm², spacing in mm.
    pub(super) fn bars(self, material: &str, along: Axis, area_spacing: [f64; 2], x: [f64; 2], y: [f64; 2]) -> Self {
        let material = self.material(material).expect("the material is defined");
        let fill =
            Fill::SpacedBars { material, area_m2: area_spacing[0] * 1e-6, spacing_m: metres(area_spacing[1]), along };
        self.region(Shape::Box { x: x.map(metres), y: y.map(metres) }, fill)
    }

    /// The class of the last region.
    pub(super) fn class(mut self, class: SurfaceClass) -> Self {
        self.document.regions.last_mut().expect("a region is drawn").class = class;
        self
    }

    /// Layers from `start` along rising coordinates of x, all with the same extent along y.
    pub(super) fn layers_x(mut self, start: f64, layers: &[(&str, f64)], y: [f64; 2]) -> Self {
        let mut at = start;
        for (name, thickness) in layers {
            self = self.paint(name, [at, at + thickness], y);
            at += thickness;
        }
        self
    }

    /// Layers from `start` along rising coordinates of y, all with the same extent along x.
    pub(super) fn layers_y(mut self, start: f64, layers: &[(&str, f64)], x: [f64; 2]) -> Self {
        let mut at = start;
        for (name, thickness) in layers {
            self = self.paint(name, x, [at, at + thickness]);
            at += thickness;
        }
        self
    }

    pub(super) fn symmetry(mut self, side: Side) -> Self {
        let span = self.span();
        self.document.symmetry.push(Spanned { value: side, span });
        self
    }

    pub(super) fn probe(mut self, name: &str, at: [f64; 2]) -> Self {
        let name = Spanned { value: name.to_owned(), span: self.span() };
        self.document.probes.push(Probe { name, at: at.map(metres) });
        self
    }

    /// A flank; `change` fills in what it gives besides name and cut.
    pub(super) fn flank(mut self, name: &str, cut: Side, change: impl FnOnce(&mut FlankEntry)) -> Self {
        let (span, name_span, cut_span) = (self.span(), self.span(), self.span());
        let mut entry = FlankEntry {
            span,
            name: Spanned { value: name.to_owned(), span: name_span },
            cut: Spanned { value: cut, span: cut_span },
            near: None,
            internal_m: None,
            overall_internal_m: None,
            external_m: None,
            u_w_m2k: None,
        };
        change(&mut entry);
        self.document.flanks.get_or_insert_default().push(entry);
        self
    }

    /// The junction, which the test expects to be sound.
    pub(super) fn built(&self) -> Junction {
        match build(&self.document) {
            Ok(junction) => junction,
            Err(problems) => panic!("refused: {:#?}", problems.iter().map(|it| &it.message).collect::<Vec<_>>()),
        }
    }

    /// The problems of a document which the test expects to be refused.
    pub(super) fn refused(&self) -> Vec<Diagnostic> {
        build(&self.document).expect_err("the test expects a refusal")
    }

    /// The messages of those problems.
    pub(super) fn messages(&self) -> Vec<String> {
        self.refused().into_iter().map(|problem| problem.message).collect()
    }
}

/// A length given in a flank entry, in millimetres.
pub(super) fn given(millimetres: f64) -> Option<Spanned<f64>> {
    Some(Spanned { value: metres(millimetres), span: Span::default() })
}

/// The externally insulated wall of the balcony and its neighbours, outside first: 368 mm.
pub(super) const WALL: [(&str, f64); 4] = [("render", 15.0), ("wool", 140.0), ("block", 200.0), ("plaster", 13.0)];

/// Balcony slab through that wall, from `bottom` to `top`; cut planes 1300 above and below y = 0.
pub(super) fn balcony(bottom: f64, top: f64) -> Draft {
    Draft::section()
        .paint("outdoors", [-1200.0, 0.0], [-1300.0, 1300.0])
        .paint("flat", [368.0, 1600.0], [-1300.0, 1300.0])
        .layers_x(0.0, &WALL, [-1300.0, 1300.0])
        .paint("concrete", [-1000.0, 1600.0], [bottom, top])
}
