//! Wrong junction files, each with the whole answer it must get, word for word.
//!
//! `tests/refusals/NAME.yaml` must be answered with `tests/refusals/NAME.expected`. After a change of wording, run
//! with `COLDSEAM_ACCEPT=1` and read every answer as a newcomer would before committing it.

use std::fs;
use std::path::{Path, PathBuf};
use std::sync::{Mutex, PoisonError};
use std::time::{Duration, Instant};

use coldseam::{input, junction};

/// No refusal may take longer; generous, for a debug build on a busy machine.
const PATIENCE: Duration = Duration::from_secs(3);

/// Reads and checks a file as the commands do: nothing if it is accepted, else what the user is shown.
fn read(path: &Path) -> Result<(), String> {
    let (source, document) =
        input::load(path).map_err(|(source, diagnostics)| input::render(&source, &diagnostics, false))?;
    junction::build(&document).map(drop).map_err(|diagnostics| input::render(&source, &diagnostics, false))
}

/// Reads and checks a file, in time.
fn read_in_time(path: &Path) -> Result<(), String> {
    // tests run side by side, and none shall be timed while it shares the machine with another
    static ONE_AT_A_TIME: Mutex<()> = Mutex::new(());
    let alone = ONE_AT_A_TIME.lock().unwrap_or_else(PoisonError::into_inner);
    let start = Instant::now();
    let answer = read(path);
    let taken = start.elapsed();
    drop(alone);
    assert!(taken < PATIENCE, "{} took {taken:?}", path.display());
    answer
}

/// What the user is shown for a file that must be refused.
fn refusal(path: &Path) -> String {
    read_in_time(path).expect_err("the file is wrong and must be refused")
}

/// The file is accepted.
fn accepted(path: &Path) {
    assert_eq!(read_in_time(path), Ok(()));
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

/// A wall of wool between two airs, with `regions` painted over it; written to `folder`.
fn junction_of(folder: &Path, regions: impl Iterator<Item = String>) -> PathBuf {
    let mut text = String::from(
        "\
title: A wall of Fennel Row
plane: vertical
environments:
  outdoors: { kind: external, temperature: -5 }
  flat: { kind: internal, temperature: 20 }
materials:
  wool: { conductivity: 0.035 }
section:
  - { environment: outdoors, x: [-500, 0], y: [0, 1400] }
  - { environment: flat, x: [1400, 2000], y: [0, 1400] }
  - { material: wool, x: [0, 1400], y: [0, 1400] }
",
    );
    regions.for_each(|region| text += &region);
    let path = folder.join("junction.yaml");
    fs::write(&path, text).expect("a temporary folder can be written to");
    path
}

fn rectangle(fill: &str, x: [f64; 2], y: [f64; 2]) -> String {
    format!("  - {{ {fill}, x: [{}, {}], y: [{}, {}] }}\n", x[0], x[1], y[0], y[1])
}

#[test]
fn twenty_thousand_nested_boxes_are_accepted_and_a_hundred_thousand_refused() {
    let folder = tempfile::tempdir().unwrap();
    // 1400 × 1400 fields, each covered by thousands of boxes
    let nested = |number: usize| {
        let inset = (number % 699) as f64;
        let fill = if number.is_multiple_of(2) { "material: steel" } else { "material: wool" };
        rectangle(fill, [inset, 1400.0 - inset], [inset, 1400.0 - inset])
    };
    accepted(&junction_of(folder.path(), (0..19_997).map(nested)));
    let path = junction_of(folder.path(), (0..100_000).map(nested));
    let answer = refusal(&path);
    assert!(answer.starts_with("error: the section has more than 20,000 regions\n"), "{answer}");
    assert!(answer.contains("junction.yaml:20009:5"), "{answer}");
    assert_eq!(answer.matches("error").count(), 1, "{answer}");
}

#[test]
fn ten_thousand_outlines_are_accepted() {
    let folder = tempfile::tempdir().unwrap();
    let bent = |number: usize| {
        let (low, high) = ((number % 690) as f64, 1400.0 - (number % 690) as f64);
        let middle = 0.5 * (low + high);
        format!(
            "  - {{ material: steel, outline: [[{low}, {low}], [{high}, {low}], [{high}, {middle}], [{middle}, {middle}], \
             [{middle}, {high}], [{low}, {high}]] }}\n"
        )
    };
    accepted(&junction_of(folder.path(), (0..10_000).map(bent)));
}

#[test]
fn thousands_of_gaps_are_found_at_once_and_counted() {
    let folder = tempfile::tempdir().unwrap();
    // strips a millimetre apart in both directions leave 490,000 squares unpainted, most of them not beside air
    let strips = |number: usize| {
        let at = 2000.0 + 2.0 * (number / 2) as f64;
        let (along, across) = ([2000.0, 3400.0], [at, at + 1.0]);
        let [x, y] = if number.is_multiple_of(2) { [across, along] } else { [along, across] };
        rectangle("material: wool", x, y.map(|y| y - 2000.0))
    };
    let answer = refusal(&junction_of(folder.path(), (0..1400).map(strips)));
    assert_eq!(answer.matches("error").count(), 11, "{answer}");
    assert!(answer.contains("more of these: unpainted parts of the sheet beside a solid"), "{answer}");
    assert!(answer.contains("error: 48"), "{answer}");
    assert!(answer.lines().count() < 120, "{answer}");
}

#[test]
fn too_many_different_coordinates_are_refused_before_anything_is_drawn() {
    let folder = tempfile::tempdir().unwrap();
    // no two of 3000 boxes share a coordinate
    let scattered = |number: usize| {
        let [x, y] = [2.0_f64, 3.0].map(|square| (number as f64 * 1000.0 * square.sqrt()) % 1300.0);
        rectangle("material: steel", [x, x + 17.3], [y, y + 11.9])
    };
    let answer = refusal(&junction_of(folder.path(), (0..3000).map(scattered)));
    let told = "error: the regions' corners make 6,002 columns × 6,000 rows, which is 36,012,000 fields; 2,000,000 can be \
                handled\n";
    assert!(answer.starts_with(told), "{answer}");
    assert!(answer.contains("junction.yaml:8:1"), "{answer}");
    assert_eq!(answer.matches("error").count(), 1, "{answer}");
}

#[test]
fn piles_of_spaced_bars_are_refused() {
    let folder = tempfile::tempdir().unwrap();
    let bars = |number: usize| {
        let fill = "material: steel, spaced: { area: 0.001, spacing: 200, along: x }";
        rectangle(fill, [0.0, (number % 100 + 1) as f64], [10.0, 60.0])
    };
    let answer = refusal(&junction_of(folder.path(), (0..19_000).map(bars)));
    assert!(answer.starts_with("error: more than 8 rows of spaced bars lie over one another at "), "{answer}");
}

/// Walls side by side with the two airs in turn between them, and flanks without end.
#[test]
fn thousands_of_walls_and_flanks_are_answered_in_time() {
    let folder = tempfile::tempdir().unwrap();
    let walls = |number: usize| {
        let (air, at) = (if number.is_multiple_of(2) { "flat" } else { "outdoors" }, 2000.0 + 20.0 * number as f64);
        let air = rectangle(&format!("environment: {air}"), [at, at + 10.0], [0.0, 1400.0]);
        air + &rectangle("material: wool", [at + 10.0, at + 20.0], [0.0, 1400.0])
    };
    let end = rectangle("environment: flat", [122_000.0, 122_010.0], [0.0, 1400.0]);
    let path = junction_of(folder.path(), (0..6000).map(walls).chain([end]));
    accepted(&path);
    let text = fs::read_to_string(&path).unwrap();
    let flank = |number: usize| format!("  - {{ name: wall {number}, cut: top }}\n");
    let flanks: String = (0..6000).map(flank).collect();
    fs::write(&path, text.clone() + "flanks:\n" + &flanks).unwrap();
    let answer = refusal(&path);
    assert_eq!(answer.matches("error: 6,001 plane elements are cut at the top").count(), 10, "{answer}");
    assert!(answer.contains("5,990 more of these: flanks that do not say which cut plane is theirs"), "{answer}");
    let near = |number: usize| {
        format!("  - {{ name: wall {number}, cut: top, near: [{}, 1400] }}\n", 2015 + 20 * (number / 2))
    };
    let flanks: String = (0..6000).map(near).collect();
    fs::write(&path, text + "flanks:\n" + &flanks).unwrap();
    let answer = refusal(&path);
    assert!(answer.contains("2,990 more of these: flanks whose cut plane is named twice"), "{answer}");
}

#[test]
fn a_hundred_thousand_mistakes_are_counted_and_not_all_shown() {
    let folder = tempfile::tempdir().unwrap();
    let wrong = |number: usize| format!("  - {{ material: stel{number}, x: [0, wol], y: [0, 0], colour: red }}\n");
    let path = junction_of(folder.path(), (0..19_997).map(wrong));
    let answer = refusal(&path);
    assert!(answer.lines().count() < 500, "{answer}");
    assert!(answer.contains("79948 more"), "{answer}");
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
