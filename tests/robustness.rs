//! Demo junctions, damaged at random: whatever a file says, the answer is a rating or a list of problems, never a panic.

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::fs;
use std::path::PathBuf;
use std::time::{Duration, Instant};

use coldseam::input::{self, Severity, Source};
use coldseam::junction;
use coldseam::rating::{self, Accuracy, RateError, Request};
use proptest::prelude::*;
use proptest::sample::Index;
use proptest::test_runner::{Config, RngAlgorithm, TestCaseError, TestRng, TestRunner};

/// Damaged files tried; more are tried with `COLDSEAM_ROBUSTNESS_CASES=20000`.
const CASES: u32 = 400;

/// No file may take longer; generous, for a debug build on a busy machine.
const PATIENCE: Duration = Duration::from_secs(5);

/// Fields of a drawing up to which it is solved as well.
const SMALL_SHEET: usize = 2_500;

/// One way to damage a file. Indices pick a line, and a number on it or in the file.
#[derive(Clone, Debug)]
enum Damage {
    DeleteLine(Index),
    DuplicateLine(Index, Index),
    SwapLines(Index, Index),
    /// Another number, or what should be one, in place of a number.
    ChangeNumber(Index, &'static str),
    /// A number moved a little or a lot.
    ScaleNumber(Index, f64),
    SwapNumbers(Index, Index),
    SwapWords(Index, Index),
    DeleteCharacter(Index),
    InsertCharacter(Index, char),
    CutOff(Index),
    /// A sound statement that the file did not have, at its end.
    Statement(&'static str),
    /// A sound entry that an environment or a material did not have.
    Entry(Index, usize),
}

const STATEMENTS: [&str; 7] = [
    "symmetry: [left, top]\n",
    "symmetry: [right, bottom]\n",
    "symmetry: [left, right, top, bottom]\n",
    "probes: { here: [0, 0], there: [100, 100], beyond: [370, 500] }\n",
    "unit: in\n",
    "flanks: []\n",
    "flanks: [{ name: a, cut: top }, { name: b, cut: bottom }, { name: c, cut: right }]\n",
];

const ENTRIES: [(&str, &str); 8] = [
    ("temperature:", "surface_resistance: 0, temperature:"),
    ("temperature:", "moisture_resistance: 0, temperature:"),
    ("temperature:", "surface_resistance: 1e-6, temperature:"),
    ("temperature:", "surface_resistance: { up: 0, horizontal: 0.1, down: 5 }, temperature:"),
    ("kind: external", "kind: internal"),
    ("kind: internal", "kind: unheated"),
    ("{ material:", "{ surface: frame, material:"),
    ("{ material:", "{ spaced: { area: 113, spacing: 200 }, material:"),
];

const NUMBERS: [&str; 14] =
    ["0", "-1", "1e9", "-1e9", "1e-9", "1e-7", "0.001", "9999", "1e308", "nan", "text", "wool", "", "[1, 2]"];

fn damage() -> impl Strategy<Value = Damage> {
    let index = any::<Index>;
    prop_oneof![
        3 => index().prop_map(Damage::DeleteLine),
        2 => (index(), index()).prop_map(|(line, to)| Damage::DuplicateLine(line, to)),
        2 => (index(), index()).prop_map(|(a, b)| Damage::SwapLines(a, b)),
        5 => (index(), prop::sample::select(NUMBERS.to_vec())).prop_map(|(at, new)| Damage::ChangeNumber(at, new)),
        5 => (index(), prop_oneof![0.9..1.1, -10.0..10.0, Just(-1.0), Just(1e-3), Just(1e3)])
            .prop_map(|(at, factor)| Damage::ScaleNumber(at, factor)),
        5 => (index(), index()).prop_map(|(a, b)| Damage::SwapNumbers(a, b)),
        2 => (index(), index()).prop_map(|(a, b)| Damage::SwapWords(a, b)),
        1 => index().prop_map(Damage::DeleteCharacter),
        1 => (index(), prop::sample::select(vec!['{', '}', '[', ']', ':', ',', '-', '"', '\'', '#', ' ', '\n', '\t', '&', '*', '0', 'λ', '\0']))
            .prop_map(|(at, character)| Damage::InsertCharacter(at, character)),
        1 => index().prop_map(Damage::CutOff),
        2 => prop::sample::select(STATEMENTS.to_vec()).prop_map(Damage::Statement),
        4 => (index(), index()).prop_map(|(at, entry)| Damage::Entry(at, entry.index(ENTRIES.len()))),
    ]
}

/// Stretches of the text whose characters all satisfy `belongs`.
fn stretches(text: &str, belongs: impl Fn(char) -> bool) -> Vec<std::ops::Range<usize>> {
    let mut found: Vec<std::ops::Range<usize>> = Vec::new();
    for (at, character) in text.char_indices().filter(|(_, character)| belongs(*character)) {
        match found.last_mut() {
            Some(last) if last.end == at => last.end = at + character.len_utf8(),
            _ => found.push(at..at + character.len_utf8()),
        }
    }
    found
}

fn numbers(text: &str) -> Vec<std::ops::Range<usize>> {
    let mut found = stretches(text, |character| character.is_ascii_digit() || character == '.' || character == '-');
    found.retain(|range| text[range.clone()].parse::<f64>().is_ok());
    found
}

fn words(text: &str) -> Vec<std::ops::Range<usize>> {
    stretches(text, |character| character.is_alphabetic() || character == '_')
}

/// The text with the two stretches exchanged.
fn exchanged(text: &str, a: std::ops::Range<usize>, b: std::ops::Range<usize>) -> String {
    let (first, second) = if a.start <= b.start { (a, b) } else { (b, a) };
    if first == second {
        return text.to_owned();
    }
    [&text[..first.start], &text[second.clone()], &text[first.end..second.start], &text[first], &text[second.end..]]
        .concat()
}

fn replaced(text: &str, range: std::ops::Range<usize>, new: &str) -> String {
    [&text[..range.start], new, &text[range.end..]].concat()
}

fn damaged(text: &str, damage: &Damage) -> String {
    let mut lines: Vec<&str> = text.split_inclusive('\n').collect();
    let places: Vec<usize> = text.char_indices().map(|(at, _)| at).collect();
    let (numbers, words) = (numbers(text), words(text));
    if lines.is_empty() || numbers.is_empty() || words.is_empty() {
        return text.to_owned();
    }
    match damage {
        Damage::DeleteLine(line) => {
            lines.remove(line.index(lines.len()));
            lines.concat()
        }
        Damage::DuplicateLine(line, to) => {
            lines.insert(to.index(lines.len()), lines[line.index(lines.len())]);
            lines.concat()
        }
        Damage::SwapLines(a, b) => {
            let count = lines.len();
            lines.swap(a.index(count), b.index(count));
            lines.concat()
        }
        Damage::ChangeNumber(at, new) => replaced(text, numbers[at.index(numbers.len())].clone(), new),
        Damage::ScaleNumber(at, factor) => {
            let range = numbers[at.index(numbers.len())].clone();
            let number: f64 = text[range.clone()].parse().expect("only what is a number was picked");
            replaced(text, range, &format!("{}", number * factor))
        }
        Damage::SwapNumbers(a, b) => {
            exchanged(text, numbers[a.index(numbers.len())].clone(), numbers[b.index(numbers.len())].clone())
        }
        Damage::SwapWords(a, b) => {
            exchanged(text, words[a.index(words.len())].clone(), words[b.index(words.len())].clone())
        }
        Damage::DeleteCharacter(at) => {
            let at = places[at.index(places.len())];
            let length = text[at..].chars().next().map_or(0, char::len_utf8);
            replaced(text, at..at + length, "")
        }
        Damage::InsertCharacter(at, character) => {
            let at = places[at.index(places.len())];
            replaced(text, at..at, &character.to_string())
        }
        Damage::Statement(statement) => format!("{text}{statement}"),
        Damage::Entry(at, entry) => {
            let (old, new) = ENTRIES[*entry];
            let found: Vec<usize> = text.match_indices(old).map(|(at, _)| at).collect();
            if found.is_empty() {
                return text.to_owned();
            }
            let start = found[at.index(found.len())];
            replaced(text, start..start + old.len(), new)
        }
        Damage::CutOff(at) => text[..places[at.index(places.len())]].to_owned(),
    }
}

/// The demo junctions: name and text.
fn demos() -> Vec<(String, String)> {
    let folder = fs::read_dir("junctions").expect("the demo junctions are beside the tests");
    let mut paths: Vec<PathBuf> = folder.flatten().map(|entry| entry.path()).collect();
    paths.retain(|path| path.extension().is_some_and(|extension| extension == "yaml"));
    paths.sort();
    paths
        .into_iter()
        .map(|path| (path.display().to_string(), fs::read_to_string(path).expect("a demo junction can be read")))
        .collect()
}

/// How far a file came.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Came {
    NotRead,
    NotBuilt,
    Built,
    FirstGridTooFine,
    Rated,
}

/// Takes a file as far as it goes; `Err` says what is wrong with the answer, not with the file.
fn taken_through(name: &str, text: &str) -> Result<Came, TestCaseError> {
    let source = Source { name: name.to_owned(), text: text.to_owned() };
    let document = match input::parse(&source) {
        Ok(document) => document,
        Err(problems) => {
            refusal_is_whole(&source, &problems)?;
            return Ok(Came::NotRead);
        }
    };
    let junction = match junction::build(&document) {
        Ok(junction) => junction,
        Err(problems) => {
            refusal_is_whole(&source, &problems)?;
            return Ok(Came::NotBuilt);
        }
    };
    if junction.sheet.columns() * junction.sheet.rows() > SMALL_SHEET {
        return Ok(Came::Built);
    }
    let request = Request { accuracy: Accuracy::Absolute(0.0005), node_limit: 20_000 };
    match rating::rate(junction, &request, &|_| {}) {
        Ok(rated) => {
            for coupling in &rated.rating.couplings {
                if let Some(bracket) = coupling.bracket {
                    prop_assert!(bracket.low <= bracket.high, "{:?}", bracket);
                }
            }
            Ok(Came::Rated)
        }
        Err(RateError::FirstGrid(grid)) => {
            prop_assert!(grid.nodes > grid.limit);
            Ok(Came::FirstGridTooFine)
        }
        Err(RateError::Solve(error)) => Err(TestCaseError::fail(format!("an inner check failed: {error}"))),
    }
}

/// A refusal names at least one error, each with a sentence, and can be shown.
fn refusal_is_whole(source: &Source, problems: &[input::Diagnostic]) -> Result<(), TestCaseError> {
    prop_assert!(problems.iter().any(|problem| problem.severity == Severity::Error), "a refusal without a reason");
    prop_assert!(problems.iter().all(|problem| !problem.message.is_empty()));
    let shown = input::render(source, problems, false);
    prop_assert!(shown.starts_with("error: ") || shown.starts_with("warning: "), "{}", shown);
    Ok(())
}

/// The files of a strategy, each taken as far as it goes; how many came how far.
fn answered<S: Strategy>(strategy: &S, file: impl Fn(S::Value) -> (String, String)) -> BTreeMap<Came, u32> {
    let cases = std::env::var("COLDSEAM_ROBUSTNESS_CASES").ok().and_then(|cases| cases.parse().ok()).unwrap_or(CASES);
    // the same cases in every run, so that a build that passed does not fail for nothing
    let config = Config { cases, failure_persistence: None, max_shrink_iters: 2_000, ..Config::default() };
    let mut runner = TestRunner::new_with_rng(config, TestRng::deterministic_rng(RngAlgorithm::ChaCha));
    let came = RefCell::new(BTreeMap::new());
    let outcome = runner.run(strategy, |value| {
        let (name, text) = file(value);
        let started = Instant::now();
        let reached = std::panic::catch_unwind(|| taken_through(&name, &text));
        let taken = started.elapsed();
        let reached = match reached {
            Ok(reached) => reached.map_err(|error| TestCaseError::fail(format!("{error}\n{text}")))?,
            Err(_) => return Err(TestCaseError::fail(format!("panicked on\n{text}"))),
        };
        prop_assert!(taken < PATIENCE, "took {taken:?} ({reached:?})\n{text}");
        *came.borrow_mut().entry(reached).or_insert(0) += 1;
        Ok(())
    });
    if let Err(error) = outcome {
        panic!("{error}");
    }
    came.into_inner()
}

#[test]
fn damaged_demo_junctions_get_an_answer_and_no_panic() {
    let demos = demos();
    assert!(demos.len() >= 10);
    let strategy = (any::<Index>(), prop::collection::vec(damage(), 1..4));
    let came = answered(&strategy, |(demo, damages)| {
        let (name, text) = &demos[demo.index(demos.len())];
        (name.clone(), damages.iter().fold(text.clone(), |text, damage| damaged(&text, damage)))
    });
    // damage so heavy that nothing was solved, or so light that nothing was refused, would test nothing
    for stage in [Came::NotRead, Came::NotBuilt, Came::Rated] {
        assert!(came.get(&stage).is_some_and(|&count| count >= CASES / 20), "{came:?}");
    }
}

/// What a box of a random drawing is filled with; solids are the likelier, as they keep airs apart.
const FILLS: [&str; 10] = [
    "material: wool",
    "material: block",
    "material: block",
    "material: steel",
    "material: steel, surface: frame",
    "material: steel, spaced: { area: 50, spacing: 200, along: x }",
    "environment: outdoors",
    "environment: flat",
    "environment: ground",
    "void: adiabatic",
];

const RANDOM_HEAD: &str = "\
title: Boxes at random
plane: vertical
environments:
  outdoors: { kind: external, temperature: -5 }
  flat: { kind: internal, temperature: 20 }
  ground: { kind: external, temperature: 10, surface_resistance: 0 }
materials:
  wool: { conductivity: 0.035 }
  block: { conductivity: 0.5 }
  steel: { conductivity: 50 }
section:
  - { environment: outdoors, x: [-400, 0], y: [0, 800] }
  - { environment: flat, x: [200, 800], y: [0, 800] }
  - { material: block, x: [0, 200], y: [0, 800] }
";

#[test]
fn boxes_at_random_get_an_answer_and_no_panic() {
    let bounds = |from: i32, to: i32| (from..to).prop_flat_map(move |low| (Just(low), low + 1..=to));
    let fill = prop::sample::select(FILLS.to_vec());
    let boxes = prop::collection::vec((fill, bounds(-2, 8), bounds(0, 8)), 1..6);
    let tail = prop::option::of(prop::sample::select(STATEMENTS.to_vec()));
    let came = answered(&(boxes, tail), |(boxes, tail)| {
        let mut text = RANDOM_HEAD.to_owned();
        for (fill, x, y) in boxes {
            let [x, y] = [x, y].map(|(low, high)| format!("[{}, {}]", 100 * low, 100 * high));
            text += &format!("  - {{ {fill}, x: {x}, y: {y} }}\n");
        }
        text += tail.unwrap_or_default();
        ("boxes.yaml".to_owned(), text)
    });
    for stage in [Came::NotBuilt, Came::Rated] {
        assert!(came.get(&stage).is_some_and(|&count| count >= CASES / 20), "{came:?}");
    }
}
