//! A polygon with edges along the axes, taken apart into pieces that are boxes.

use super::lines::Lines;
use crate::input::Spanned;

/// Why an outline cannot be painted.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum OutlineProblem {
    /// An edge is not along an axis. `vertex` is the number of its first vertex; `more` counts further such edges.
    Sloping {
        /// Number of its first vertex.
        vertex: usize,
        /// Its ends, in metres.
        from: [f64; 2],
        /// Its ends, in metres.
        to: [f64; 2],
        /// Number of further sloping edges.
        more: usize,
    },
    /// It touches or crosses itself on the edge that starts at this vertex.
    TouchesItself {
        /// Number of the edge's first vertex.
        vertex: usize,
        /// The point passed twice, in metres.
        at: [f64; 2],
    },
}

/// Marks the grid points an outline has passed; shared by all outlines of a drawing so that it is allocated once.
pub(super) struct Trail {
    passed_by: Vec<u32>,
    outline: u32,
}

impl Trail {
    /// An empty trail for the points where `lines` cross.
    pub(super) fn new(lines: &Lines) -> Self {
        Self { passed_by: vec![0; lines.x.len() * lines.y.len()], outline: 0 }
    }
}

/// The same places on consecutive strips; of both the first and one past the last.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Piece {
    /// Strips of the canvas.
    pub(super) strips: [usize; 2],
    /// Places along them.
    pub(super) places: [usize; 2],
}

/// The pieces that an outline covers; none if it is thinner than the drawing resolves.
///
/// # Errors
/// A sloping edge, or an outline that touches or crosses itself.
pub(super) fn pieces(
    points: &[Spanned<[f64; 2]>],
    lines: &Lines,
    strips_are_columns: bool,
    trail: &mut Trail,
) -> Result<Vec<Piece>, OutlineProblem> {
    let corners: Vec<[usize; 2]> =
        points.iter().map(|point| [lines.upright(point.value[0]), lines.level(point.value[1])]).collect();
    let count = corners.len();
    let sloping: Vec<usize> = (0..count)
        .filter(|&i| {
            let (from, to) = (corners[i], corners[(i + 1) % count]);
            from[0] != to[0] && from[1] != to[1]
        })
        .collect();
    if let Some(&vertex) = sloping.first() {
        let (from, to) = (points[vertex].value, points[(vertex + 1) % count].value);
        return Err(OutlineProblem::Sloping { vertex, from, to, more: sloping.len() - 1 });
    }
    let flat = |axis: usize| corners.iter().all(|corner| corner[axis] == corners[0][axis]);
    if flat(0) || flat(1) {
        return Ok(Vec::new());
    }
    if let Some((vertex, at)) = repeated_point(&corners, lines, trail) {
        return Err(OutlineProblem::TouchesItself { vertex, at });
    }
    Ok(enclosed(&corners, strips_are_columns))
}

/// What lies inside an outline that does not touch itself: an edge across a strip bounds it there, and sorted along the
/// strip, two by two enclose its inside. Strips on which no edge begins or ends look the same.
fn enclosed(corners: &[[usize; 2]], strips_are_columns: bool) -> Vec<Piece> {
    let (across, along) = if strips_are_columns { (0, 1) } else { (1, 0) };
    // first strip, one past the last, and the place at which the edge crosses them
    let mut edges: Vec<[usize; 3]> = (0..corners.len())
        .map(|i| (corners[i], corners[(i + 1) % corners.len()]))
        .filter(|(from, to)| from[across] != to[across])
        .map(|(from, to)| [from[across].min(to[across]), from[across].max(to[across]), from[along]])
        .collect();
    edges.sort_unstable();
    let mut bounds: Vec<usize> = edges.iter().flat_map(|&[first, after, _]| [first, after]).collect();
    bounds.sort_unstable();
    bounds.dedup();
    let mut waiting = edges.into_iter().peekable();
    let mut crossing: Vec<[usize; 3]> = Vec::new();
    let mut pieces = Vec::new();
    for strips in bounds.windows(2) {
        crossing.retain(|&[_, after, _]| after > strips[0]);
        while let Some(edge) = waiting.next_if(|&[first, ..]| first == strips[0]) {
            crossing.push(edge);
        }
        crossing.sort_unstable_by_key(|&[_, _, place]| place);
        let piece = |pair: &[[usize; 3]]| Piece { strips: [strips[0], strips[1]], places: [pair[0][2], pair[1][2]] };
        pieces.extend(crossing.chunks_exact(2).map(piece));
    }
    pieces
}

/// Walks the outline from grid point to grid point and returns the first one passed twice, with the
/// vertex from which it was reached.
fn repeated_point(corners: &[[usize; 2]], lines: &Lines, trail: &mut Trail) -> Option<(usize, [f64; 2])> {
    trail.outline += 1;
    for (i, &from) in corners.iter().enumerate() {
        let to = corners[(i + 1) % corners.len()];
        let axis = usize::from(from[0] == to[0]);
        let mut here = from;
        while here != to {
            let mark = &mut trail.passed_by[here[1] * lines.x.len() + here[0]];
            if *mark == trail.outline {
                // a vertex is reached by the edge before it
                let vertex = if here == from { (i + corners.len() - 1) % corners.len() } else { i };
                return Some((vertex, [lines.x[here[0]], lines.y[here[1]]]));
            }
            *mark = trail.outline;
            here[axis] = if to[axis] > here[axis] { here[axis] + 1 } else { here[axis] - 1 };
        }
    }
    None
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::input::{Fill, Region, Shape, Span, SurfaceClass};

    fn run(points: &[[f64; 2]]) -> Result<Vec<Piece>, OutlineProblem> {
        let points: Vec<_> = points.iter().map(|&value| Spanned { value, span: Span::default() }).collect();
        let region = Region {
            span: Span::default(),
            shape: Shape::Outline(points.clone()),
            fill: Fill::Void,
            class: SurfaceClass::Opaque,
        };
        let lines = Lines::of(&[region]);
        pieces(&points, &lines, false, &mut Trail::new(&lines))
    }

    #[test]
    fn a_u_shape_covers_its_two_legs_and_its_foot() {
        let u = [[0., 0.], [3., 0.], [3., 2.], [2., 2.], [2., 1.], [1., 1.], [1., 2.], [0., 2.]];
        let piece = |strip: usize, places: [usize; 2]| Piece { strips: [strip, strip + 1], places };
        assert_eq!(run(&u), Ok(vec![piece(0, [0, 3]), piece(1, [0, 1]), piece(1, [2, 3])]));
    }

    #[test]
    fn strips_that_look_the_same_are_one_piece() {
        // corners as numbers of lines; those at 1, 2 and 4 are another region's
        let corners = [[0, 0], [3, 0], [3, 3], [2, 3], [2, 5], [0, 5]];
        let pieces = [Piece { strips: [0, 3], places: [0, 3] }, Piece { strips: [3, 5], places: [0, 2] }];
        assert_eq!(enclosed(&corners, false), pieces);
    }

    #[test]
    fn direction_and_idle_vertices_do_not_matter() {
        let mut square = vec![[0., 0.], [1., 0.], [2., 0.], [2., 2.], [2., 2.], [0., 2.]];
        let expected = Ok(vec![Piece { strips: [0, 1], places: [0, 2] }]);
        assert_eq!(run(&square), expected);
        square.reverse();
        assert_eq!(run(&square), expected);
    }

    #[test]
    fn an_edge_within_a_millionth_of_the_axis_is_along_it() {
        assert_eq!(
            run(&[[0., 0.], [2., 1e-7], [2., 2.], [1e-7, 2.]]),
            Ok(vec![Piece { strips: [0, 1], places: [0, 1] }])
        );
    }

    #[test]
    fn sloping_edges_are_counted_and_the_first_is_named() {
        let roof = [[0., 0.], [2., 0.], [2., 1.], [1., 2.], [0., 1.]];
        let problem = OutlineProblem::Sloping { vertex: 2, from: [2., 1.], to: [1., 2.], more: 1 };
        assert_eq!(run(&roof), Err(problem));
    }

    #[test]
    fn crossing_touching_and_folding_back_are_found() {
        let eight = [[0., 0.], [2., 0.], [2., 2.], [1., 2.], [1., -1.], [0., -1.]];
        assert_eq!(run(&eight), Err(OutlineProblem::TouchesItself { vertex: 3, at: [1., 0.] }));
        let corner_touch = [[0., 0.], [1., 0.], [1., 2.], [2., 2.], [2., 1.], [1., 1.], [0., 1.]];
        assert_eq!(run(&corner_touch), Err(OutlineProblem::TouchesItself { vertex: 4, at: [1., 1.] }));
        let spike = [[0., 0.], [2., 0.], [2., 1.], [2., 2.], [2., 1.], [0., 1.]];
        assert_eq!(run(&spike), Err(OutlineProblem::TouchesItself { vertex: 3, at: [2., 1.] }));
    }

    #[test]
    fn an_outline_thinner_than_the_drawing_resolves_covers_nothing() {
        assert_eq!(run(&[[0., 0.], [2., 0.], [2., 1e-7], [0., 1e-7]]), Ok(Vec::new()));
    }
}
