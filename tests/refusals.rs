//! Wrong junction files, each with the whole answer it must get, word for word.
//!
//! `tests/refusals/NAME.yaml` must be answered with `tests/refusals/NAME.expected`. After a change of wording, run
//! with `COLDSEAM_ACCEPT=1` and read every answer as a newcomer would before committing it.

use std::fs;
use std::path::{Path, PathBuf};
use std::time::{Duration, Instant};

use coldseam::input;

/// No refusal may take longer; generous, for a debug build on a busy machine.
const PATIENCE: Duration = Duration::from_secs(3);

/// Reads a file as the commands do: nothing if it is accepted, else what the user is shown.
fn read(path: &Path) -> Result<(), String> {
    match input::load(path) {
        Ok(_) => Ok(()),
        Err((source, diagnostics)) => Err(input::render(&source, &diagnostics, false)),
    }
}

/// What the user is shown for a file that must be refused, and in time.
fn refusal(path: &Path) -> String {
    let start = Instant::now();
    let answer = read(path).expect_err("the file is wrong and must be refused");
    assert!(start.elapsed() < PATIENCE, "{} took {:?}", path.display(), start.elapsed());
    answer
}

#[test]
fn every_wrong_file_gets_its_answer() {
    let accept = std::env::var_os("COLDSEAM_ACCEPT").is_some();
    // relative, as it stands in the answers; tests run in the package's folder
    let mut files: Vec<PathBuf> = fs::read_dir("tests/refusals").unwrap().map(|entry| entry.unwrap().path()).collect();
    files.retain(|path| path.extension().is_some_and(|extension| extension == "yaml"));
    files.sort();
    assert!(!files.is_empty());
    let mut wrong = Vec::new();
    for path in files {
        let answer = refusal(&path);
        let expected_path = path.with_extension("expected");
        if accept {
            fs::write(&expected_path, &answer).unwrap();
        }
        let expected = fs::read_to_string(&expected_path).unwrap_or_default();
        if answer != expected {
            wrong.push(format!("{}\n--- expected\n{expected}--- answered\n{answer}", path.display()));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

/// A junction whose section is `regions`, written to `folder`.
fn junction_of(folder: &Path, regions: impl Iterator<Item = String>) -> PathBuf {
    let mut text = String::from(
        "title: A wall of Fennel Row\nplane: vertical\nenvironments:\n  flat: { kind: internal, temperature: 20 }\nsection:\n",
    );
    regions.for_each(|region| text += &region);
    let path = folder.join("junction.yaml");
    fs::write(&path, text).expect("a temporary folder can be written to");
    path
}

fn box_of_steel(number: usize) -> String {
    format!("  - {{ material: steel, x: [{number}, {number}.5], y: [0, 10] }}\n")
}

#[test]
fn twenty_thousand_regions_load_and_a_hundred_thousand_are_refused() {
    let folder = tempfile::tempdir().unwrap();
    let path = junction_of(folder.path(), (0..20_000).map(box_of_steel));
    assert_eq!(read(&path), Ok(()));
    let path = junction_of(folder.path(), (0..100_000).map(box_of_steel));
    let answer = refusal(&path);
    assert!(answer.starts_with("error: the section has more than 20,000 regions\n"), "{answer}");
    assert!(answer.contains("junction.yaml:20006:5"), "{answer}");
    assert_eq!(answer.matches("error").count(), 1, "{answer}");
}

#[test]
fn a_hundred_thousand_mistakes_are_counted_and_not_all_shown() {
    let folder = tempfile::tempdir().unwrap();
    let wrong = |number: usize| format!("  - {{ material: stel{number}, x: [0, wol], y: [0, 0], colour: red }}\n");
    let path = junction_of(folder.path(), (0..20_000).map(wrong));
    let answer = refusal(&path);
    assert!(answer.lines().count() < 500, "{answer}");
    assert!(answer.contains("79960 more"), "{answer}");
}

#[test]
fn a_file_beyond_the_size_limit_is_not_read() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("large.yaml");
    fs::write(&path, "# a line that says nothing\n".repeat(700_000)).unwrap();
    let answer = refusal(&path);
    assert!(answer.starts_with("error: the file is too large: 18 MB, where 16 MiB are allowed\n"), "{answer}");
}

#[test]
fn hostile_files_within_the_size_limit_are_answered_in_time() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("hostile.yaml");
    let most = 16_000_000;
    let files = [
        "[".repeat(most),
        "{a: ".repeat(most / 4),
        "- ".repeat(most / 2),
        "a: [".to_owned() + &"1,".repeat(most / 2 - 10) + "]",
        "a: [".to_owned() + &"1,".repeat(1_000) + &"[".repeat(200),
        "a: ".to_owned() + &"x".repeat(most - 10),
        "\"".to_owned() + &"x".repeat(most - 10),
        "x".repeat(most - 10) + ": 1",
        "title: [".to_owned() + &" ".repeat(most - 100) + "\nb: 1",
        "parameters:\n  a: ".to_owned() + &"(".repeat(most - 100),
        "parameters:\n  a: ".to_owned() + &"1+".repeat(most / 2 - 100),
        "parameters:\n".to_owned() + &(0..100_000).map(|i| format!("  p{i}: p{} + 1\n", i + 1)).collect::<String>(),
        "parameters:\n".to_owned()
            + &(0..100_000).map(|i| format!("  p{i}: p{}\n", (i + 1) % 100_000)).collect::<String>(),
        "environments:\n".to_owned()
            + &(0..100_000).map(|i| format!("  e{i}: {{same_as: e{}}}\n", (i + 1) % 100_000)).collect::<String>(),
        (0..250_000).map(|i| format!("key{i}: 1\n")).collect(),
        "a: 1\n".repeat(250_000),
    ];
    for text in files {
        fs::write(&path, &text).unwrap();
        let answer = refusal(&path);
        assert!(answer.len() < 100_000, "{}: {} bytes", &text[..20], answer.len());
    }
}
