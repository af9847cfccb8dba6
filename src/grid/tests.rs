//! A grid examines itself, and splitting keeps what it must.

use super::{FaceSides, Grid, Rectangle};
use crate::index::{EnvironmentId, NodeId, PartId, SurfaceId};
use crate::junction::{Content, Sheet};
use approx::assert_relative_eq;
use std::sync::Arc;

/// An L of two parts around air, a void corner, surfaces where solid meets air.
fn sheet() -> Arc<Sheet> {
    let (solid, air) = (|k| Content::Solid(PartId::new(k)), Content::Air(EnvironmentId::new(0)));
    let contents = vec![solid(0), solid(1), Content::Outside, solid(0), air, air];
    let mut sheet = Sheet::new(vec![0.0, 0.001, 0.7, 1.5], vec![-1.0, 0.2, 0.3], contents);
    sheet.set_upright_surface(1, 1, SurfaceId::new(0));
    sheet.set_level_surface(1, 1, SurfaceId::new(1));
    Arc::new(sheet)
}

/// Areas add up, every face that heat crosses has two cells or a cell and a surface, and cells and faces agree.
fn examine(grid: &Grid, area: f64, surface_length: f64) {
    let sum: f64 = grid.cells().map(|cell| cell.shape.width_m * cell.shape.height_m).sum();
    assert_relative_eq!(sum, area, max_relative = 1e-12);
    let mut sides = vec![0; grid.face_count()];
    let mut length = 0.0;
    for face in grid.faces() {
        sides[face.id.index()] = match face.sides {
            FaceSides::Cells { cells, half_m } => {
                assert!(cells[0] < cells[1] && half_m.iter().all(|half| *half > 0.0));
                2
            }
            FaceSides::Surface { cell, surface, inward, .. } => {
                length += face.length_m;
                let shape = grid.cell_at(cell).shape;
                let place = shape.faces.iter().position(|id| *id == face.id).expect("the cell has the face");
                assert_eq!(shape.surfaces[place], Some(surface));
                assert_eq!(Rectangle::INWARD[place], inward);
                1
            }
        };
    }
    assert_relative_eq!(length, surface_length, max_relative = 1e-12);
    for cell in grid.cells() {
        for id in cell.shape.faces {
            sides[id.index()] -= 1;
        }
        let [south_west, south_east, north_west, north_east] = cell.shape.corners.map(|node| grid.position(node));
        assert_relative_eq!(south_east[0] - south_west[0], cell.shape.width_m, max_relative = 1e-9);
        assert_relative_eq!(north_east[1] - south_east[1], cell.shape.height_m, max_relative = 1e-9);
        assert_eq!([north_west[0], north_west[1]], [south_west[0], north_east[1]]);
        assert_eq!(grid.cell_holding(grid.centre(cell.id)).map(|found| found.id), Some(cell.id));
    }
    // What is left is −1 on adiabatic faces (a cell, nothing beyond) and 0 elsewhere.
    assert!(sides.iter().all(|left| (-1..=0).contains(left)));
}

const AREA: f64 = 0.7 * 1.2 + 0.001 * 0.1;
const SURFACE_LENGTH: f64 = 0.1 + 0.699;

#[test]
fn first_and_split_grids_are_sound() {
    let mut grid = Grid::first(sheet(), 10_000).unwrap();
    examine(&grid, AREA, SURFACE_LENGTH);
    for seed in 0..4 {
        let gap: Vec<[f64; 2]> =
            (0..grid.cell_count()).map(|k| [((k * 7 + seed) % 11) as f64, ((k * 5 + seed) % 13) as f64]).collect();
        let splitting = grid.choose_splitting(&gap).unwrap();
        let split = grid.split(&splitting);
        assert_eq!(split.node_count(), grid.node_count_after(&splitting));
        examine(&split, AREA, SURFACE_LENGTH);
        grid = split;
    }
}

#[test]
fn a_node_limit_holds_before_anything_is_built() {
    let refused = Grid::first(sheet(), 20).unwrap_err();
    assert!(refused.nodes > refused.limit && refused.limit == 20);
}

#[test]
fn carried_values_keep_a_plane() {
    let grid = Grid::first(sheet(), 10_000).unwrap();
    let gap: Vec<[f64; 2]> = (0..grid.cell_count()).map(|k| [(k % 3) as f64, (k % 2) as f64]).collect();
    let splitting = grid.choose_splitting(&gap).unwrap();
    let split = grid.split(&splitting);
    let plane = |at: [f64; 2]| 2.0 * at[0] - 3.0 * at[1] + 1.0;
    let values: Vec<f64> = (0..grid.node_count()).map(|k| plane(grid.position(NodeId::new(k)))).collect();
    for (k, value) in grid.carry_to_split(&splitting, &values).into_iter().enumerate() {
        assert_relative_eq!(value, plane(split.position(NodeId::new(k))), epsilon = 1e-12);
    }
}

#[test]
fn the_largest_gaps_are_split_until_half_is_covered() {
    let grid = Grid::first(sheet(), 10_000).unwrap();
    let mut gap = vec![[0.0; 2]; grid.cell_count()];
    gap[0] = [6.0, 1.0];
    gap[1] = [2.0, 0.0];
    let splitting = grid.choose_splitting(&gap).unwrap();
    let [width, height] = grid.node_lattice();
    assert_eq!(grid.node_count_after(&splitting), (width + 1) * height, "6 of 9 lie in the first column");
    assert!(grid.choose_splitting(&vec![[0.0; 2]; grid.cell_count()]).is_none(), "no gap, nothing to split");
}

#[test]
fn a_point_on_an_edge_belongs_to_the_solid_beside_it() {
    let grid = Grid::first(sheet(), 10_000).unwrap();
    assert!(grid.cell_holding([0.4, 0.2]).is_some(), "the surface of the lower part");
    assert!(grid.cell_holding([0.4, 0.25]).is_none(), "air");
    assert!(grid.cell_holding([1.0, 0.0]).is_none(), "outside the model");
}
