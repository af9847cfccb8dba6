//! The iterative solver against a direct one, and its independence of threads.

use super::super::gradients;
use super::super::multigrid::Multigrid;
use super::super::stencil::Stencil;
use super::section::Section;
use nalgebra::DVector;
use nalgebra_sparse::factorization::CscCholesky;
use nalgebra_sparse::{CooMatrix, CscMatrix};
use proptest::prelude::*;

/// The matrix as a general sparse one.
fn as_sparse(matrix: &Stencil) -> CscMatrix<f64> {
    let n = matrix.centre.len();
    let mut coo = CooMatrix::new(n, n);
    for k in 0..n {
        coo.push(k, k, matrix.centre[k]);
        let mut both = |other: usize, value: f64| {
            if value != 0.0 {
                coo.push(k, other, value);
                coo.push(other, k, value);
            }
        };
        both(k + 1, matrix.east[k]);
        both(k + matrix.width, matrix.north[k]);
        both(k + matrix.width + 1, matrix.north_east[k]);
        both(k + matrix.width - 1, matrix.north_west[k]);
    }
    CscMatrix::from(&coo)
}

/// Bilinear elements of `conductivity` by cell on stretched cells, one film at the bottom.
fn elements(width: usize, lines: usize, aspect: f64, conductivity: &[f64]) -> Stencil {
    let mut matrix = Stencil::nine_point([width, lines]);
    for line in 0..lines - 1 {
        for column in 0..width - 1 {
            let k = conductivity[line * (width - 1) + column];
            let (x, y) = (k / aspect / 6.0, k * aspect / 6.0);
            let south = line * width + column;
            let north = south + width;
            for unknown in [south, south + 1, north, north + 1] {
                matrix.add_diagonal(unknown, 2.0 * (x + y));
            }
            matrix.add_coupling(south, south + 1, y - 2.0 * x);
            matrix.add_coupling(north, north + 1, y - 2.0 * x);
            matrix.add_coupling(south, north, x - 2.0 * y);
            matrix.add_coupling(south + 1, north + 1, x - 2.0 * y);
            matrix.add_coupling(south, north + 1, -x - y);
            matrix.add_coupling(south + 1, north, -x - y);
        }
    }
    for unknown in 0..width {
        matrix.add_diagonal(unknown, 1.0);
    }
    matrix
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]

    /// A sparse Cholesky factorization of a general library gives the same solution, whatever the conductivities and
    /// however stretched the cells.
    #[test]
    fn agrees_with_a_direct_solver(
        width in 2_usize..14,
        lines in 2_usize..14,
        stretch in -2.0..2.0_f64,
        logarithms in prop::collection::vec(-1.6..2.4_f64, 13 * 13),
        loads in prop::collection::vec(-1.0..1.0_f64, 14 * 14),
    ) {
        let conductivity: Vec<f64> = logarithms.iter().map(|l| 10.0_f64.powf(*l)).collect();
        let matrix = elements(width, lines, 10.0_f64.powf(stretch), &conductivity);
        let load = &loads[..width * lines];
        let direct = CscCholesky::factor(&as_sparse(&matrix)).unwrap().solve(&DVector::from_column_slice(load));
        let mut solved = vec![0.0; load.len()];
        let convergence = gradients::solve(&mut Multigrid::new(matrix), load, &mut solved, 1e-10);
        prop_assert!(convergence.reached, "{convergence:?}");
        let scale = direct.amax();
        for (ours, theirs) in solved.iter().zip(direct.iter()) {
            prop_assert!((ours - theirs).abs() <= 1e-7 * scale, "{ours} and {theirs}");
        }
    }
}

/// A balcony slab through an insulated wall.
fn balcony() -> Section {
    let x = [-1.2, -1.0, 0.0, 0.015, 0.155, 0.355, 0.368, 1.6];
    let picture = ["aa0123b", "a444444", "aa0123b"];
    Section::drawn(&x, &[-1.3, -0.1, 0.1, 1.3], &picture, &[1.0, 0.035, 0.5, 0.57, 2.3], &[0.04, 0.13])
}

#[test]
fn the_same_digits_on_any_number_of_threads() {
    let mut section = balcony();
    while section.grid.node_count() < 60_000 {
        section.grid = section.grid.split_everywhere();
    }
    let run = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| {
            let solution = section.solve();
            let bits = |field: &[f64]| field.iter().map(|t| t.to_bits()).collect::<Vec<u64>>();
            (solution.bracket(0, 1).map(f64::to_bits), bits(&solution.nodal()[0]), solution.iterations())
        })
    };
    let one = run(1);
    assert!(one == run(2) && one == run(3), "the digits changed with the number of threads");
}

#[test]
fn building_sections_need_few_iterations() {
    let [temperature, flux] = balcony().solve().iterations();
    assert!(temperature <= 30 && flux <= 30, "{temperature} and {flux} iterations");
}
