//! How long, how large, how linear: `cargo bench --bench speed`.
//!
//! Medians of several runs. The limits printed beside each figure are those this project holds itself to on a machine
//! of two cores; the bench prints, it does not fail.

use coldseam::conduction::{Film, Problem, solve};
use coldseam::grid::Grid;
use coldseam::input;
use coldseam::junction::{self, Junction};
use std::path::Path;
use std::process::{Command, Stdio};
use std::sync::Arc;
use std::time::{Duration, Instant};

const ROOT: &str = env!("CARGO_MANIFEST_DIR");

fn main() -> Result<(), String> {
    whole_process("junctions/balcony-slab.yaml", 15, "80 ms, 60 MB")?;
    whole_process("junctions/balcony-break.yaml", 9, "1500 ms")?;
    whole_process("benches/sections/balcony-bars-as-plates.yaml", 9, "1500 ms")?;
    scaling()
}

/// The middle one of several durations.
fn median(mut runs: Vec<Duration>) -> f64 {
    runs.sort_unstable();
    runs[runs.len() / 2].as_secs_f64()
}

/// Runs the release binary on a demo junction, output thrown away.
fn whole_process(name: &str, runs: usize, limit: &str) -> Result<(), String> {
    let file = Path::new(ROOT).join(name);
    let mut peak_kilobytes = 0;
    let mut times = Vec::new();
    for _ in 0..runs {
        let started = Instant::now();
        let mut child = Command::new(env!("CARGO_BIN_EXE_coldseam"))
            .arg("rate")
            .arg(&file)
            .stdout(Stdio::null())
            .spawn()
            .map_err(|error| error.to_string())?;
        let status = format!("/proc/{}/status", child.id());
        loop {
            if let Some(kilobytes) = std::fs::read_to_string(&status).ok().and_then(|text| peak(&text)) {
                peak_kilobytes = peak_kilobytes.max(kilobytes);
            }
            if child.try_wait().map_err(|error| error.to_string())?.is_some() {
                break;
            }
            std::thread::sleep(Duration::from_micros(200));
        }
        times.push(started.elapsed());
    }
    let megabytes = f64::from(peak_kilobytes) / 1024.0;
    report(&format!("rate {name}: {:.0} ms, peak {megabytes:.0} MB (limit {limit})", 1000.0 * median(times)));
    Ok(())
}

/// The peak resident size in a Linux process status, in kilobytes.
fn peak(status: &str) -> Option<u32> {
    status.lines().find_map(|line| line.strip_prefix("VmHWM:"))?.split_whitespace().next()?.parse().ok()
}

/// Both sides solved once on ever finer grids of the balcony slab.
fn scaling() -> Result<(), String> {
    let path = Path::new(ROOT).join("junctions/balcony-slab.yaml");
    let (_, document) = input::load(&path).map_err(|(source, problems)| input::render(&source, &problems, false))?;
    let junction = junction::build(&document).map_err(|_| "the demo junction does not build".to_string())?;
    let mut grid = Grid::first(Arc::new(junction.sheet.clone()), usize::MAX).map_err(|error| error.to_string())?;
    let mut per_unknown = Vec::new();
    for least in [1e4, 1e5, 1e6] {
        while (grid.node_count() as f64) < 0.5 * least {
            grid = grid.split_everywhere();
        }
        let runs = if least < 1e6 { 7 } else { 3 };
        let times: Vec<Duration> = (0..runs).map(|_| once(&junction, &grid)).collect();
        let seconds = median(times);
        per_unknown.push(seconds / grid.node_count() as f64);
        report(&format!("both sides once at {} nodes: {:.3} s", grid.node_count(), seconds));
    }
    report(&format!("time a node, largest over smallest grid: {:.2} (limit 2.5)", per_unknown[2] / per_unknown[0]));
    report(&format!("peak of this process: {:.0} MB (limit 600 MB)", own_peak()));
    Ok(())
}

fn own_peak() -> f64 {
    let status = std::fs::read_to_string("/proc/self/status").unwrap_or_default();
    f64::from(peak(&status).unwrap_or(0)) / 1024.0
}

fn once(junction: &Junction, grid: &Grid) -> Duration {
    let started = Instant::now();
    let mut conductivity = vec![0.0; grid.cell_count()];
    for cell in grid.cells() {
        conductivity[cell.id.index()] = junction.parts[cell.part.index()].conductivity_w_mk;
    }
    let film = |surface: &junction::Surface| Film { air: surface.air.index(), resistance: surface.resistance };
    let films: Vec<Film> = junction.surfaces.iter().map(film).collect();
    let problem = Problem { grid, conductivity: &conductivity, films: &films, airs: junction.airs.len() };
    let solution = solve(&problem, None);
    assert!(solution.is_ok(), "the solve failed: {:?}", solution.err());
    started.elapsed()
}

#[expect(clippy::print_stdout, reason = "a bench prints its figures")]
fn report(line: &str) {
    println!("{line}");
}
