//! What must hold of any junction file: random sections as text, written in several ways that mean the same.

mod rated;

use std::collections::{BTreeMap, BTreeSet};

use coldseam::input::{self, Shape, Source};
use coldseam::rating::{Accuracy, Coupling, Rating, Request};
use proptest::prelude::*;
use rated::rate;

/// What fills a field of the random section.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Fill {
    Material(usize),
    Void,
    /// A pocket of a third air.
    Store,
    Outdoors,
    Flat,
}

/// A box in whole millimetres.
#[derive(Clone, Copy, Debug)]
struct Region {
    x: [i32; 2],
    y: [i32; 2],
    fill: Fill,
}

/// A random section: `columns` × `rows` fields between outdoors on the left and a flat on the right.
#[derive(Clone, Debug)]
struct Drawing {
    regions: Vec<Region>,
    conductivities: [f64; 4],
}

/// Takes out solids that no air reaches through their edges, and pockets of air beside the outer airs: such drawings
/// are refused.
fn make_whole(fields: &mut [Fill], columns: usize) {
    for (k, field) in fields.iter_mut().enumerate() {
        let outer = k % columns == 0 || (k + 1).is_multiple_of(columns);
        if outer && *field == Fill::Store {
            *field = Fill::Material(0);
        }
    }
    fields[0] = Fill::Material(1);
    let solid = |fill: Fill| matches!(fill, Fill::Material(_));
    let mut reached: Vec<bool> = fields.iter().map(|&fill| fill == Fill::Store).collect();
    for _ in 0..fields.len() {
        for k in 0..fields.len() {
            let [first, last] = [k % columns == 0, (k + 1).is_multiple_of(columns)];
            let neighbours =
                [(!first).then(|| k - 1), (!last).then_some(k + 1), k.checked_sub(columns), Some(k + columns)];
            let touched = neighbours.into_iter().flatten().any(|n| reached.get(n) == Some(&true));
            reached[k] |= solid(fields[k]) && (first || last || touched);
        }
    }
    for (field, reached) in fields.iter_mut().zip(reached) {
        if solid(*field) && !reached {
            *field = Fill::Void;
        }
    }
}

fn drawing() -> impl Strategy<Value = Drawing> {
    let fill = prop_oneof![
        8 => (0_usize..4).prop_map(Fill::Material),
        1 => Just(Fill::Void),
        1 => Just(Fill::Store),
    ];
    let conductivity = || prop_oneof![Just(0.035), Just(0.5), Just(2.3), Just(50.0), 0.02..3.0_f64];
    (2_usize..5, 1_usize..5).prop_flat_map(move |(columns, rows)| {
        (
            prop::collection::vec(2_i32..300, columns),
            prop::collection::vec(2_i32..300, rows),
            prop::collection::vec(fill.clone(), columns * rows),
            [conductivity(), conductivity(), conductivity(), conductivity()],
        )
            .prop_map(|(widths, heights, mut fields, conductivities)| {
                // the solid meets both airs, or the section would be refused
                fields[0] = Fill::Material(0);
                fields[widths.len() - 1] = Fill::Material(1);
                make_whole(&mut fields, widths.len());
                let lines = |sizes: &[i32]| -> Vec<i32> {
                    let ends = sizes.iter().scan(0, |end, size| {
                        *end += size;
                        Some(*end)
                    });
                    std::iter::once(0).chain(ends).collect()
                };
                let (x, y) = (lines(&widths), lines(&heights));
                let (right, top) = (x[widths.len()], y[heights.len()]);
                let mut regions = vec![
                    Region { x: [-100, 0], y: [0, top], fill: Fill::Outdoors },
                    Region { x: [right, right + 100], y: [0, top], fill: Fill::Flat },
                ];
                for (row, y) in y.windows(2).enumerate() {
                    for (column, x) in x.windows(2).enumerate() {
                        let fill = fields[row * widths.len() + column];
                        regions.push(Region { x: [x[0], x[1]], y: [y[0], y[1]], fill });
                    }
                }
                Drawing { regions, conductivities }
            })
    })
}

/// How a drawing is written down.
struct Writing {
    unit: &'static str,
    parameters: &'static str,
    length: fn(i32) -> String,
    conductivity: fn(f64) -> String,
    /// Environments, in this order; the store only where there is one.
    environments: [(Fill, &'static str); 3],
}

const OUTDOORS: &str = "outdoors: { kind: external, temperature: -5 }";
const FLAT: &str = "flat: { kind: internal, temperature: 20 }";
const STORE: &str = "store: { kind: unheated, temperature: 4 }";

const PLAIN: Writing = Writing {
    unit: "mm",
    parameters: "",
    length: |value| value.to_string(),
    conductivity: |value| value.to_string(),
    environments: [(Fill::Outdoors, OUTDOORS), (Fill::Store, STORE), (Fill::Flat, FLAT)],
};

impl Drawing {
    fn text(&self, writing: &Writing) -> String {
        let mut text = format!(
            "title: random section\nunit: {}\nplane: horizontal\n{}\nenvironments:\n",
            writing.unit, writing.parameters
        );
        for (fill, entry) in writing.environments {
            if self.regions.iter().any(|region| region.fill == fill) {
                text += &format!("  {entry}\n");
            }
        }
        text += "materials:\n";
        for (k, &value) in self.conductivities.iter().enumerate() {
            text += &format!("  material {k}: {{ conductivity: {} }}\n", (writing.conductivity)(value));
        }
        text += "section:\n";
        for Region { x, y, fill } in &self.regions {
            let fill = match fill {
                Fill::Material(k) => format!("material: material {k}"),
                Fill::Void => "void: adiabatic".to_owned(),
                Fill::Store => "environment: store".to_owned(),
                Fill::Outdoors => "environment: outdoors".to_owned(),
                Fill::Flat => "environment: flat".to_owned(),
            };
            let [[x0, x1], [y0, y1]] = [x, y].map(|range| range.map(writing.length));
            text += &format!("  - {{ {fill}, x: [{x0}, {x1}], y: [{y0}, {y1}] }}\n");
        }
        text
    }

    /// With every region changed.
    fn with(&self, change: impl Fn(Region) -> Vec<Region>) -> Self {
        Self { regions: self.regions.iter().flat_map(|&region| change(region)).collect(), ..self.clone() }
    }

    fn rate(&self, writing: &Writing) -> Rating {
        // few nodes: conductor and insulator often meet crosswise here, which keeps brackets wide on any grid
        let request = Request { accuracy: Accuracy::Absolute(0.01), node_limit: 4000 };
        rate("random section", &self.text(writing), &request)
    }

    fn brackets(&self) -> Brackets {
        brackets(&self.rate(&PLAIN))
    }
}

type Brackets = BTreeMap<String, [f64; 2]>;

/// Every coupling's bracket by the names of its airs; two airs that no solid joins have none.
fn brackets(rating: &Rating) -> Brackets {
    let bracket = |coupling: &Coupling| {
        let [warm, cold] = [coupling.warm, coupling.cold].map(|air| &rating.junction.airs[air.index()].name);
        let bracket = coupling.bracket.expect("no temperature is prescribed here");
        (format!("{warm} | {cold}"), [bracket.low, bracket.high])
    };
    rating.couplings.iter().map(bracket).collect()
}

/// The brackets of each pair of airs in two ratings; a pair left out exchanges no heat.
fn pairs(a: &Brackets, b: &Brackets) -> Vec<[[f64; 2]; 2]> {
    let names: BTreeSet<&String> = a.keys().chain(b.keys()).collect();
    names.into_iter().map(|pair| [a, b].map(|brackets| brackets.get(pair).copied().unwrap_or([0.0; 2]))).collect()
}

/// What rounding and an iterative solver leave of a coupling, W/(m·K). It is in proportion to the films' conductances
/// (some 20 W/(m·K) here), not to the coupling, which may be 0.
const SOLVER: f64 = 1e-7;

/// Whether the brackets of two ratings of one section overlap: both hold the exact value.
fn overlap(a: &Brackets, b: &Brackets) -> bool {
    pairs(a, b).into_iter().all(|[a, b]| a[0] <= b[1] + SOLVER && b[0] <= a[1] + SOLVER)
}

/// Every number of a rating that does not depend on how the file is written, to the last bit.
fn figures(rating: &Rating) -> String {
    format!("{:?}", (&rating.couplings, &rating.psi, &rating.temperature_factors, &rating.surfaces, &rating.evidence))
}

/// A whole number as an arithmetic expression whose every step is exact.
fn expression(value: i32) -> String {
    match value.rem_euclid(3) {
        0 => format!("width + {} - {}", value + 1000, 1137),
        1 => format!("width * {} + {}", value / 137, value % 137).replace("+ -", "- "),
        _ => format!("({} + even) / 2 - even / 2", 2 * value),
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 32, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn a_mirrored_section_has_the_same_couplings(drawing in drawing()) {
        let mirrored = drawing.with(|region| vec![Region { x: region.x.map(|x| -x), ..region }]);
        prop_assert!(overlap(&drawing.brackets(), &mirrored.brackets()));
    }

    /// A quarter turn to the left: the new x is −y, the new y is x.
    #[test]
    fn a_turned_section_has_the_same_couplings(drawing in drawing()) {
        let turned = drawing.with(|region| vec![Region { x: region.y.map(|y| -y), y: region.x, ..region }]);
        prop_assert!(overlap(&drawing.brackets(), &turned.brackets()));
    }

    /// Every region painted as two boxes, cut across its longer side: further lines in the drawing, the same solid.
    #[test]
    fn regions_split_in_two_give_the_same_couplings(drawing in drawing(), share in 0.1..0.9_f64) {
        let split = drawing.with(|region| {
            let Region { x, y, .. } = region;
            let within = |range: [i32; 2]| range[0] + (share * f64::from(range[1] - range[0])).ceil() as i32;
            if x[1] - x[0] >= y[1] - y[0] {
                let at = within(x).min(x[1] - 1);
                vec![Region { x: [x[0], at], ..region }, Region { x: [at, x[1]], ..region }]
            } else {
                let at = within(y).min(y[1] - 1);
                vec![Region { y: [y[0], at], ..region }, Region { y: [at, y[1]], ..region }]
            }
        });
        prop_assert!(overlap(&drawing.brackets(), &split.brackets()));
    }

    /// 140 mm and 0.14 m are the same number to the last bit, and so is everything that follows.
    #[test]
    fn the_unit_of_length_changes_nothing(drawing in drawing()) {
        let metres = Writing { unit: "m", length: |value| (f64::from(value) / 1000.0).to_string(), ..PLAIN };
        let [plain, metres] = [&PLAIN, &metres].map(|writing| drawing.rate(writing));
        prop_assert_eq!(figures(&plain), figures(&metres));
    }

    #[test]
    fn expressions_give_the_same_bits_as_plain_numbers(drawing in drawing()) {
        let expressions = Writing {
            parameters: "parameters:\n  width: 137\n  even: 14\n  half: 1 / 2\n",
            length: expression,
            conductivity: |value| format!("{} * half", 2.0 * value),
            ..PLAIN
        };
        prop_assert_eq!(figures(&drawing.rate(&PLAIN)), figures(&drawing.rate(&expressions)));
    }

    /// Grids may differ (see the test of this name on the demos), but the brackets hold one value.
    #[test]
    fn the_order_of_the_environments_does_not_matter(drawing in drawing()) {
        let [outdoors, store, flat] = PLAIN.environments;
        let swapped = Writing { environments: [flat, store, outdoors], ..PLAIN };
        prop_assert!(overlap(&drawing.brackets(), &brackets(&drawing.rate(&swapped))));
    }
}

#[test]
fn expressions_stand_for_the_numbers_they_replace() {
    let value = |text: &str| {
        let text = format!(
            "title: t\nunit: m\nplane: horizontal\nparameters:\n  width: 137\n  even: 14\nenvironments:\n  \
             a: {{ kind: external, temperature: 0 }}\nsection:\n  - {{ environment: a, x: [{text}, 2000], y: [0, 1] }}\n"
        );
        let source = Source { name: "expression".to_owned(), text };
        let document = input::parse(&source).expect("the file makes sense on its own");
        let Shape::Box { x, .. } = document.regions[0].shape else { panic!("the region is a box") };
        x[0]
    };
    for number in [-270, -138, -100, -1, 0, 1, 2, 137, 500, 999] {
        assert_eq!(value(&expression(number)), f64::from(number), "{}", expression(number));
    }
}
