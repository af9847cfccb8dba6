//! Demo junctions, damaged at random: whatever a file says, the answer is a rating or a list of problems, never a panic.

use std::fs;
use std::path::PathBuf;
use std::time::{Duration, Instant};

use coldseam::input::{self, Severity, Source};
use coldseam::junction;
use coldseam::rating::{self, Accuracy, RateError, Request};
use proptest::prelude::*;
use proptest::sample::Index;
use proptest::test_runner::{Config, TestCaseError, TestRunner};

/// Damaged files tried; more are tried with `COLDSEAM_ROBUSTNESS_CASES=20000`.
const CASES: u32 = 400;

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
}

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
        Damage::CutOff(at) => text[..places[at.index(places.len())]].to_owned(),
    }
}

/// The demo junctions: name and text.
fn demos() -> Vec<(String, String)> {
    let mut paths: Vec<PathBuf> = fs::read_dir("junctions").unwrap().map(|entry| entry.unwrap().path()).collect();
    paths.retain(|path| path.extension().is_some_and(|extension| extension == "yaml"));
    paths.sort();
    paths.into_iter().map(|path| (path.display().to_string(), fs::read_to_string(path).unwrap())).collect()
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
fn taken_through(name: &str, text: &str, accuracy: f64) -> Result<Came, TestCaseError> {
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
    let request = Request { accuracy: Accuracy::Absolute(accuracy), node_limit: 20_000 };
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

#[test]
fn damaged_demo_junctions_get_an_answer_and_no_panic() {
    let demos = demos();
    assert!(demos.len() >= 10);
    let cases = std::env::var("COLDSEAM_ROBUSTNESS_CASES").ok().and_then(|cases| cases.parse().ok()).unwrap_or(CASES);
    // the same cases in every run, so that a build that passed does not fail for nothing
    let config = Config { cases, failure_persistence: None, max_shrink_iters: 2_000, ..Config::default() };
    let mut runner = TestRunner::new_with_rng(
        config,
        proptest::test_runner::TestRng::deterministic_rng(proptest::test_runner::RngAlgorithm::ChaCha),
    );
    let came = std::cell::RefCell::new(std::collections::BTreeMap::new());
    let strategy = (any::<Index>(), prop::collection::vec(damage(), 1..4));
    let outcome = runner.run(&strategy, |(demo, damages)| {
        let (name, text) = &demos[demo.index(demos.len())];
        let text = damages.iter().fold(text.clone(), |text, damage| damaged(&text, damage));
        let started = Instant::now();
        let reached = std::panic::catch_unwind(|| taken_through(name, &text, 0.02));
        let taken = started.elapsed();
        let reached = match reached {
            Ok(reached) => reached.map_err(|error| TestCaseError::fail(format!("{error}\n{text}")))?,
            Err(_) => return Err(TestCaseError::fail(format!("panicked on\n{text}"))),
        };
        prop_assert!(taken < Duration::from_secs(5), "took {taken:?} ({reached:?})\n{text}");
        *came.borrow_mut().entry(reached).or_insert(0) += 1;
        Ok(())
    });
    if let Err(error) = outcome {
        panic!("{error}");
    }
    let came = came.into_inner();
    // damage so heavy that nothing was solved, or so light that nothing was refused, would test nothing
    for stage in [Came::NotRead, Came::NotBuilt, Came::Rated] {
        assert!(came.get(&stage).copied().unwrap_or(0) > cases / 50, "{came:?}");
    }
}
