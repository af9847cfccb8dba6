//! Both sides against exact two-dimensional results.

use super::section::Section;

/// Asserts that the refined bracket holds the exact value and is as narrow as asked.
fn assert_bracketed(mut section: Section, exact: f64, accuracy: f64) {
    let [low, high] = section.refined(accuracy, 60).bracket(0, 1);
    assert!(low <= exact && exact <= high, "{exact} lies outside {low} to {high}");
    assert!(high - low <= 2.0 * accuracy, "{low} to {high} is wider than ± {accuracy}");
}

/// A layered wall: R = R_se + Σ d/λ + R_si (ISO 6946), met by the very first grid.
#[test]
fn layered_wall() {
    let x = [-0.1, 0.0, 0.02, 0.16, 0.36, 0.5];
    let section = Section::drawn(&x, &[0.0, 1.0], &["a012b"], &[1.0, 0.035, 0.5], &[0.04, 0.13]);
    let exact = 1.0 / (0.04 + 0.02 / 1.0 + 0.14 / 0.035 + 0.2 / 0.5 + 0.13);
    let [low, high] = section.solve().bracket(0, 1);
    assert!(low <= exact && exact <= high && high - low < 1e-10, "{low} {exact} {high}");
}

/// An isothermal corner of walls a and b thick: L = L1/a + L2/b + E(a/b) with inner lengths and
/// E(r) = 2/π (ln((1 + r²)/4r) + r atan(1/r) + atan(r)/r), by conformal mapping (1 − 2 ln 2/π for equal walls).
#[test]
fn isothermal_corners() {
    for r in [1.0_f64, 1.5, 3.0] {
        let excess =
            2.0 / std::f64::consts::PI * (((1.0 + r * r) / (4.0 * r)).ln() + r * (1.0 / r).atan() + r.atan() / r);
        let leg = 8.0 * r;
        let x = [-r - 1.0, -r, 0.0, leg];
        let y = [-2.0, -1.0, 0.0, leg];
        let section = Section::drawn(&x, &y, &["a0b", "a00", "aaa"], &[1.0], &[0.0, 0.0]);
        assert_bracketed(section, leg / r + leg + excess, 2e-3);
    }
}

/// A strip at 1 on a slab at 0 below, adiabatic beside the strip: for strip and slab half-widths s = 0.5, W = 1 and
/// height H = 0.5 the conductance is √2 (elliptic integrals; square-root singularity at the strip's edge).
#[test]
fn strip_on_a_slab() {
    let section = Section::drawn(&[0.0, 0.5, 1.0], &[-1.0, 0.0, 0.5, 1.0], &["a.", "00", "bb"], &[1.0], &[0.0, 0.0]);
    assert_bracketed(section, 2.0_f64.sqrt(), 1e-3);
}

/// Four equal quadrants s1 top left, s2 top right, s3 bottom right, s4 bottom left, heat from left to right: the exact
/// conductance (Craster and Obnosov 2001; Keller 1964 for two materials crosswise).
fn quadrants(s: [f64; 4]) -> (Section, f64) {
    let [s1, s2, s3, s4] = s;
    let triples = s1 * s2 * s3 + s1 * s2 * s4 + s1 * s3 * s4 + s2 * s3 * s4;
    let exact = (triples / (s1 + s2 + s3 + s4) * (s1 + s4) * (s2 + s3) / ((s1 + s2) * (s3 + s4))).sqrt();
    let lines = [-2.0, -1.0, 0.0, 1.0, 2.0];
    (Section::drawn(&lines, &[-1.0, 0.0, 1.0], &["a01b", "a32b"], &s, &[0.0, 0.0]), exact)
}

#[test]
fn four_quadrants() {
    for s in [[1.0, 10.0, 1.0, 10.0], [1.0, 1.0, 1.0, 10.0], [1.0, 2.0, 3.0, 4.0], [0.04, 2.5, 0.7, 1.0]] {
        let (section, exact) = quadrants(s);
        assert_bracketed(section, exact, 2e-3 * exact);
    }
}

/// Crosswise contact of conductor and insulator converges slowly; the bracket stays wide and honest.
#[test]
fn crosswise_quadrants_stay_bracketed() {
    for s in [[2.3, 0.04, 2.3, 0.04], [1.0, 100.0, 1.0, 100.0]] {
        let (mut section, exact) = quadrants(s);
        for passes in [1, 5, 15] {
            let [low, high] = section.refined(1e-6, passes).bracket(0, 1);
            assert!(low <= exact && exact <= high, "{exact} lies outside {low} to {high}");
        }
    }
}

/// The half of a plate fin, half-thickness 1, length A, base at 1, film Bi on top and tip (exact series, evaluated with
/// 200,000 terms).
#[test]
fn plate_fin() {
    for (biot, length, exact) in [(1.0, 5.0, 0.902_845_722), (2.0, 3.0, 1.195_444_786)] {
        let x = [-1.0, 0.0, length, length + 1.0];
        let section = Section::drawn(&x, &[0.0, 1.0, 2.0], &[".bb", "a0b"], &[1.0], &[0.0, 1.0 / biot]);
        assert_bracketed(section, exact, 1e-3);
    }
}

/// On a smooth problem the gap falls with the square of the cell size: a quarter a halving.
#[test]
fn the_gap_falls_with_the_square_of_the_cell_size() {
    let mut section = Section::drawn(&[0.0, 1.0, 2.0], &[-1.0, 0.0, 1.0], &["0b", "aa"], &[1.0], &[0.5, 0.5]);
    let mut gaps = Vec::new();
    for _ in 0..6 {
        gaps.push(section.solve().gap(0));
        section.grid = section.grid.split_everywhere();
    }
    let ratio = gaps[4] / gaps[5];
    assert!((3.6..4.4).contains(&ratio), "the last halving divided the gap by {ratio}");
}

/// On nested grids the upper side never rises and the finite-volume heat flow never falls.
#[test]
fn sides_are_monotonic_on_nested_grids() {
    let (mut section, exact) = quadrants([1.0, 100.0, 1.0, 100.0]);
    let mut before = [f64::INFINITY, 0.0];
    for _ in 0..6 {
        let solution = section.solve();
        let now = [solution.upper_side(0), solution.finite_volume_heat_flow(0)];
        assert!(now[0] <= before[0] && now[1] >= before[1], "{before:?} became {now:?}");
        assert!(now[1] <= exact && exact <= now[0]);
        before = now;
        section.grid = section.grid.split_everywhere();
    }
}
