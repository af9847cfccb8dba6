//! Against a script on general-purpose libraries that solves the same sections on uniform grids:
//! `cargo bench --bench comparison` (needs `python3` with numpy, scipy, scikit-fem and pyyaml; another interpreter can be
//! named in the environment variable COLDSEAM_PYTHON).
//!
//! Truth is this tool's own value at a half-width of 0.00002 W/(m·K). For each grid of the script, the tool is asked for
//! an accuracy whose true error is no larger than the script's; the ratio of times is printed. The tool's time is that
//! of the whole process, the script's leaves its imports out.

use std::path::{Path, PathBuf};
use std::process::Command;
use std::time::Instant;

const ROOT: &str = env!("CARGO_MANIFEST_DIR");

fn main() -> Result<(), String> {
    compare("balcony-slab.yaml", &["5", "2.5", "1.25"], 25)?;
    compare("balcony-bars-as-plates.yaml", &["5", "2.5", "1.25"], 200)
}

struct Run {
    value: f64,
    seconds: f64,
}

fn compare(name: &str, spacings: &[&str], goal: u32) -> Result<(), String> {
    let file = Path::new(ROOT).join("benches/sections").join(name);
    let truth = tool(&file, "0.00002")?.value;
    report(&format!("{name}: truth {truth:.5} W/(m·K)"));
    for spacing in spacings {
        let script = script(&file, spacing)?;
        let script_error = (script.value - truth).abs();
        // The coarsest accuracy that is at least as good in truth.
        let accuracies =
            ["0.1", "0.05", "0.02", "0.01", "0.005", "0.002", "0.001", "0.0005", "0.0002", "0.0001", "0.00005"];
        for accuracy in accuracies {
            let tool = tool(&file, accuracy)?;
            let error = (tool.value - truth).abs();
            if error <= script_error {
                report(&format!(
                    "  script at {spacing} mm: error {script_error:.5} in {:.3} s; tool at ± {accuracy}: error {error:.5} in {:.4} s; {:.0} times (goal {goal})",
                    script.seconds,
                    tool.seconds,
                    script.seconds / tool.seconds
                ));
                break;
            }
        }
    }
    Ok(())
}

/// Median of seven runs of the release binary.
fn tool(file: &Path, accuracy: &str) -> Result<Run, String> {
    let mut runs = Vec::new();
    for _ in 0..7 {
        let started = Instant::now();
        let output = Command::new(env!("CARGO_BIN_EXE_coldseam"))
            .args(["rate", "--format", "json", "--accuracy", accuracy])
            .arg(file)
            .output()
            .map_err(|error| error.to_string())?;
        let seconds = started.elapsed().as_secs_f64();
        let json: serde_json::Value = serde_json::from_slice(&output.stdout).map_err(|error| error.to_string())?;
        let value = json["ratings"][0]["coupling"][0]["value"].as_f64().ok_or("no coupling in the rating")?;
        runs.push(Run { value, seconds });
    }
    Ok(middle(runs))
}

/// Median of three runs of the script, each in a process of its own.
fn script(file: &Path, spacing: &str) -> Result<Run, String> {
    let python = std::env::var_os("COLDSEAM_PYTHON").map_or_else(|| PathBuf::from("python3"), PathBuf::from);
    let mut runs = Vec::new();
    for _ in 0..3 {
        let output = Command::new(&python)
            .arg(Path::new(ROOT).join("benches/uniform_fem.py"))
            .arg(file)
            .arg(spacing)
            .output()
            .map_err(|error| format!("{}: {error}", python.display()))?;
        let text = String::from_utf8_lossy(&output.stdout).into_owned();
        let words: Vec<&str> = text.split_whitespace().collect();
        let after = |word: &str| words.iter().position(|w| *w == word).and_then(|k| words.get(k + 1)?.parse().ok());
        let seconds = words.iter().rev().nth(1).and_then(|word| word.parse().ok());
        match (after("L2D"), seconds) {
            (Some(value), Some(seconds)) => runs.push(Run { value, seconds }),
            _ => return Err(format!("the script said: {text}{}", String::from_utf8_lossy(&output.stderr))),
        }
    }
    Ok(middle(runs))
}

fn middle(mut runs: Vec<Run>) -> Run {
    runs.sort_by(|a, b| a.seconds.total_cmp(&b.seconds));
    let place = runs.len() / 2;
    runs.swap_remove(place)
}

#[expect(clippy::print_stdout, reason = "a bench prints its figures")]
fn report(line: &str) {
    println!("{line}");
}
