//! Where a region lies: boxes and outlines.

use super::document::{Shape, Span, Spanned};
use super::numbers::{NOTHING_M, RANGE};
use super::problem::RegionProblem;
use super::reader::{Fields, Reader};
use super::tree::Node;

/// The keys that place a region.
pub(super) const PLACE_KEYS: [&str; 3] = ["x", "y", "outline"];

/// A box from `x` and `y`, or a polygon from `outline`.
pub(super) fn shape(reader: &mut Reader, fields: &Fields) -> Option<Shape> {
    let (x, y) = (fields.get("x"), fields.get("y"));
    if let Some(outline) = fields.get("outline") {
        if let Some(extra) = fields.key_span("x").or(fields.key_span("y")) {
            reader.report(extra, RegionProblem::OutlineAndBox);
        }
        return self::outline(reader, outline).map(Shape::Outline);
    }
    if x.is_none() && y.is_none() {
        if !fields.perhaps_meant(&PLACE_KEYS) {
            reader.report(fields.span, RegionProblem::RegionWithoutPlace);
        }
        return None;
    }
    let x = reader.require(fields, "x", "x: [0, 200]").map(|node| range_m(reader, node, "x"));
    let y = reader.require(fields, "y", "y: [0, 200]").map(|node| range_m(reader, node, "y"));
    Some(Shape::Box { x: x??, y: y?? })
}

/// A range of coordinates in metres, lower end first.
pub(super) fn range_m(reader: &mut Reader, node: &Node, axis: &'static str) -> Option<[f64; 2]> {
    let [from, to] = reader.two_lengths(node, &format!("`{axis}`"), &RANGE)?;
    let (low, high) = (reader.unit.metres(from.min(to)), reader.unit.metres(from.max(to)));
    if high - low <= NOTHING_M {
        reader.report(node.span, RegionProblem::ZeroExtent { axis, at: from, unit: reader.unit.symbol() });
        return None;
    }
    Some([low, high])
}

/// The points of a polygon, in metres. The first may be repeated at the end.
fn outline(reader: &mut Reader, node: &Node) -> Option<Vec<Spanned<[f64; 2]>>> {
    let expected = "a list of points";
    let items = reader.list(node, "`outline`", expected, "`outline: [[0, 0], [60, 0], [60, 40]]`")?;
    let points: Vec<Option<Spanned<[f64; 2]>>> = items
        .iter()
        .map(|item| Some(Spanned { value: reader.point(item, "a point of the outline")?, span: item.span }))
        .collect();
    let mut points = points.into_iter().collect::<Option<Vec<_>>>()?;
    if points.len() > 1 && coincide(points[0].value, points[points.len() - 1].value) {
        points.pop();
    }
    if points.len() < 3 {
        reader.report(node.span, RegionProblem::FewPoints { found: points.len() });
        return None;
    }
    let repeated: Vec<Span> =
        points.windows(2).filter(|pair| coincide(pair[0].value, pair[1].value)).map(|pair| pair[1].span).collect();
    for span in &repeated {
        reader.report(*span, RegionProblem::RepeatedPoint);
    }
    if !repeated.is_empty() {
        return None;
    }
    let (area, length) = area_and_length(&points);
    if area.abs() <= NOTHING_M * length {
        reader.report(node.span, RegionProblem::NoArea);
        return None;
    }
    Some(points)
}

fn coincide(a: [f64; 2], b: [f64; 2]) -> bool {
    (a[0] - b[0]).hypot(a[1] - b[1]) <= NOTHING_M
}

/// The area within a closed polygon (negative if it runs clockwise) and the length around it.
fn area_and_length(points: &[Spanned<[f64; 2]>]) -> (f64, f64) {
    let origin = points[0].value;
    let mut area = 0.0;
    let mut length = 0.0;
    for (index, point) in points.iter().enumerate() {
        let a = point.value;
        let b = points[(index + 1) % points.len()].value;
        area += 0.5 * ((a[0] - origin[0]) * (b[1] - origin[1]) - (b[0] - origin[0]) * (a[1] - origin[1]));
        length += (b[0] - a[0]).hypot(b[1] - a[1]);
    }
    (area, length)
}
