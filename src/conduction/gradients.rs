//! Preconditioned conjugate gradients (Hestenes and Stiefel, 1952).

use super::multigrid::Multigrid;
use super::stencil::PARALLEL_FROM;
use rayon::prelude::*;

/// Sums are formed in chunks of this many, then added in order: the same digits on any number of threads.
const CHUNK: usize = 8192;

/// Iterations after which a solve is given up; building sections need 10 to 30, noise of conductivities up to 170.
const ITERATION_LIMIT: usize = 500;

/// The residual is computed afresh this often, as the running one drifts.
const REFRESH_EVERY: usize = 50;

/// How a solve ended.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Convergence {
    /// Iterations done.
    pub(super) iterations: usize,
    /// √(rᵀM⁻¹r) at the end over √(xᵀb): the error's energy relative to the solution's.
    pub(super) relative_error: f64,
    /// Whether the tolerance was reached.
    pub(super) reached: bool,
}

/// Solves `A x = b` from the present `x`, until √(rᵀM⁻¹r) is below `tolerance` × √(xᵀb).
///
/// A plain ‖r‖ relative to ‖b‖ means little here: entries differ by a factor of 10⁸, and rounding alone keeps it up.
pub(super) fn solve(multigrid: &mut Multigrid, b: &[f64], x: &mut [f64], tolerance: f64) -> Convergence {
    let n = b.len();
    let (mut r, mut z, mut p, mut ap) = (vec![0.0; n], vec![0.0; n], vec![0.0; n], vec![0.0; n]);
    residual(multigrid, b, x, &mut r);
    multigrid.apply(&r, &mut z);
    p.copy_from_slice(&z);
    let mut rz = dot(&r, &z);
    let mut scale = rz.max(dot(x, b));
    let mut convergence = Convergence { iterations: 0, relative_error: 0.0, reached: true };
    loop {
        convergence.relative_error = if scale > 0.0 { (rz.max(0.0) / scale).sqrt() } else { 0.0 };
        convergence.reached = convergence.relative_error <= tolerance;
        if convergence.reached || convergence.iterations == ITERATION_LIMIT || !rz.is_finite() {
            return convergence;
        }
        convergence.iterations += 1;
        multigrid.matrix().multiply(&p, &mut ap);
        let alpha = rz / dot(&p, &ap);
        add_scaled(x, alpha, &p);
        if convergence.iterations.is_multiple_of(REFRESH_EVERY) {
            residual(multigrid, b, x, &mut r);
        } else {
            add_scaled(&mut r, -alpha, &ap);
        }
        multigrid.apply(&r, &mut z);
        let next = dot(&r, &z);
        scale = dot(x, b);
        let beta = next / rz;
        rz = next;
        for_chunks(&mut p, &z, |p, z| *p = z + beta * *p);
    }
}

fn residual(multigrid: &Multigrid, b: &[f64], x: &[f64], r: &mut [f64]) {
    multigrid.matrix().multiply(x, r);
    for_chunks(r, b, |r, b| *r = b - *r);
}

fn add_scaled(target: &mut [f64], factor: f64, source: &[f64]) {
    for_chunks(target, source, |t, s| *t += factor * s);
}

fn for_chunks(target: &mut [f64], source: &[f64], work: impl Fn(&mut f64, f64) + Sync) {
    let chunk = |(target, source): (&mut [f64], &[f64])| {
        for (t, s) in target.iter_mut().zip(source) {
            work(t, *s);
        }
    };
    if target.len() >= PARALLEL_FROM {
        target.par_chunks_mut(CHUNK).zip(source.par_chunks(CHUNK)).for_each(chunk);
    } else {
        chunk((target, source));
    }
}

/// The inner product, summed in fixed chunks.
pub(super) fn dot(a: &[f64], b: &[f64]) -> f64 {
    let chunk = |(a, b): (&[f64], &[f64])| a.iter().zip(b).map(|(a, b)| a * b).sum::<f64>();
    if a.len() >= PARALLEL_FROM {
        let parts: Vec<f64> = a.par_chunks(CHUNK).zip(b.par_chunks(CHUNK)).map(chunk).collect();
        parts.iter().sum()
    } else {
        a.chunks(CHUNK).zip(b.chunks(CHUNK)).map(chunk).sum()
    }
}
