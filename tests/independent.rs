//! The demo junctions against an independent solve of the same files.
//!
//! `tests/independent/results.json` was made by `solve_sections.py` beside it: scikit-fem (a general-purpose
//! finite-element library), biquadratic elements, and a reader and painter of its own. It shares no code with the tool.

mod demo_files;
mod rated;

use std::collections::BTreeMap;
use std::fs;

use coldseam::index::AirId;
use coldseam::rating::{Accuracy, Coupling, Rating, Request};
use demo_files::demo_files;
use rated::rate;
use serde::Deserialize;

const RESULTS: &str = "tests/independent/results.json";

const HOW_TO_RERUN: &str = "if a file was added, removed or changed, solve all of them again: `python \
                            tests/independent/solve_sections.py` (see README.md there; it takes some minutes and \
                            rewrites results.json)";

/// The recorded numbers are rounded to seven decimals.
const ROUNDING: f64 = 0.5e-7;

/// How far the two lowest temperatures may be apart, K.
///
/// The tool stops when its coldest temperature has changed by no more than 0.0003 of the temperature span since a grid
/// of at most half the nodes (`SETTLED` in `src/rating/refine.rs`): 0.0075 K at the demos' 25 K. What is left after the
/// last halving beside a sharp corner is about as much again. The independent solve's own last change is below 0.0002 K;
/// together 0.02 K. The largest difference seen is 0.013 K (window reveal).
const TEMPERATURE_DIFFERENCE_K: f64 = 0.02;

#[derive(Deserialize)]
struct Results {
    sections: BTreeMap<String, Section>,
}

#[derive(Deserialize)]
struct Section {
    /// By "warmer air | colder air".
    l2d: BTreeMap<String, Extrapolated>,
    /// By air: its coupling to all others on the finest grid, which the exact value cannot exceed.
    upper: BTreeMap<String, f64>,
    /// By "air, surface class", in the moisture run.
    lowest_inside: BTreeMap<String, Lowest>,
}

#[derive(Deserialize)]
struct Extrapolated {
    value: f64,
    estimated_error: f64,
}

#[derive(Deserialize)]
struct Lowest {
    temperature: f64,
}

fn results() -> BTreeMap<String, Section> {
    let text = fs::read_to_string(RESULTS).expect("the independent results are recorded");
    let results: Results = serde_json::from_str(&text).expect("the independent results are as their README describes");
    results.sections
}

fn air(rating: &Rating, index: AirId) -> &str {
    &rating.junction.airs[index.index()].name
}

/// Every coupling's bracket, by "warmer air | colder air".
fn brackets(rating: &Rating) -> BTreeMap<String, [f64; 2]> {
    let bracket = |coupling: &Coupling| {
        let pair = format!("{} | {}", air(rating, coupling.warm), air(rating, coupling.cold));
        let bracket = coupling.bracket.expect("no demo has touching prescribed temperatures");
        (pair, [bracket.low, bracket.high])
    };
    rating.couplings.iter().map(bracket).collect()
}

/// Rates every section that was solved independently, and compares the couplings.
fn compare_couplings(half_width: f64) {
    let request = Request { accuracy: Accuracy::Absolute(half_width), ..Request::default() };
    for (file, section) in results() {
        let text = fs::read_to_string(&file).unwrap_or_else(|error| panic!("{file}: {error}; {HOW_TO_RERUN}"));
        let rating = rate(&file, &text, &request);
        let brackets = brackets(&rating);
        assert!(brackets.keys().eq(section.l2d.keys()), "{file}: pairs of airs differ; {HOW_TO_RERUN}");
        for (pair, independent) in &section.l2d {
            let [low, high] = brackets[pair];
            let Extrapolated { value, estimated_error: error } = *independent;
            assert!(high - low <= 2.0 * half_width, "{file}: {pair}: bracket not met");
            assert!(
                low - error <= value && value <= high + error,
                "{file}: {pair}: independently {value} ± {error}, the bracket {low} to {high}; {HOW_TO_RERUN}",
            );
        }
        for (name, upper) in &section.upper {
            let of_air = |pair: &&str| pair.split(" | ").any(|end| end == name);
            let low: f64 = brackets.keys().map(String::as_str).filter(of_air).map(|pair| brackets[pair][0]).sum();
            assert!(
                low <= upper + ROUNDING,
                "{file}: {name}: the lower bound {low} exceeds the independent upper bound {upper}; {HOW_TO_RERUN}",
            );
        }
    }
}

#[test]
fn every_demo_was_solved_independently() {
    let demos: Vec<String> = demo_files().into_iter().map(|(file, _)| file).collect();
    let solved: Vec<String> = results().into_keys().filter(|file| file.starts_with("junctions/")).collect();
    assert!(solved.len() >= 6, "only {} demos were solved independently", solved.len());
    assert_eq!(demos, solved, "files in junctions/ (left) and in {RESULTS} (right); {HOW_TO_RERUN}");
}

#[test]
fn independent_couplings_lie_within_the_brackets_at_the_default_accuracy() {
    compare_couplings(0.0005);
}

#[test]
fn independent_couplings_lie_within_brackets_ten_times_narrower() {
    compare_couplings(0.00005);
}

#[test]
fn independent_lowest_inside_temperatures_agree() {
    for (file, section) in results() {
        let text = fs::read_to_string(&file).unwrap_or_else(|error| panic!("{file}: {error}; {HOW_TO_RERUN}"));
        let rating = rate(&file, &text, &Request::default());
        let coldest: BTreeMap<String, f64> = rating
            .temperature_factors
            .iter()
            .map(|factor| (format!("{}, {}", air(&rating, factor.air), factor.class.word()), factor.temperature_c))
            .collect();
        assert!(coldest.keys().eq(section.lowest_inside.keys()), "{file}: surfaces differ; {HOW_TO_RERUN}");
        for (surface, independent) in &section.lowest_inside {
            let (tool, independent) = (coldest[surface], independent.temperature);
            assert!(
                (tool - independent).abs() <= TEMPERATURE_DIFFERENCE_K,
                "{file}: {surface}: coldest at {tool} °C, independently {independent} °C; {HOW_TO_RERUN}",
            );
        }
    }
}
