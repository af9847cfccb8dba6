//! The house: which room may use which, read from the sources.
//!
//! A path `crate::ROOM` (or one that climbs there by `super::`) in the files of a room is an arrow. Arrows must be
//! among those of [`HOUSE`], and [`HOUSE`] must agree with the drawing in `src/lib.rs` and in DEVELOPERS.md. Whoever
//! changes one changes all three.

#![expect(clippy::unwrap_used, reason = "a test that cannot read the sources shall stop there")]

use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};

/// The rooms in the order of the data flow, each with the rooms that it may use. Of those before it, a room leaves out
/// what it must not know: grids and solvers in `report` and `commands`, buildings in `conduction`, YAML from `grid` on
/// (what it takes of `input` are plain words such as a side's name).
const HOUSE: [(&str, &[&str]); 9] = [
    ("catalogue", &[]),
    ("input", &["catalogue"]),
    ("junction", &["catalogue", "input"]),
    ("grid", &["junction"]),
    ("conduction", &["grid"]),
    ("rating", &["input", "junction", "grid", "conduction"]),
    ("verification", &["input", "junction", "rating"]),
    // prints the structs of `verification`
    ("report", &["input", "junction", "rating", "verification"]),
    ("commands", &["input", "junction", "rating", "verification", "report"]),
];

/// Not a room: numbers that know what they count, for everybody.
const FOR_ALL: &str = "index";

/// The arrows drawn: user and used.
const DRAWN: [(&str, &str); 7] = [
    ("input", "catalogue"),
    ("junction", "input"),
    ("grid", "junction"),
    ("conduction", "grid"),
    ("rating", "conduction"),
    ("report", "rating"),
    ("verification", "rating"),
];

fn place(room: &str) -> Option<usize> {
    HOUSE.iter().position(|(name, _)| *name == room)
}

/// Whether files of `user` may use `used`. Tests of a room may set up their cases with any room before it.
fn allowed(user: &str, used: &str, in_tests: bool) -> bool {
    let before = place(used) < place(user);
    used == user || used == FOR_ALL || place(user).is_some_and(|k| HOUSE[k].1.contains(&used)) || (in_tests && before)
}

/// Every Rust file below a folder, by name.
fn rust_files(folder: &Path) -> Vec<PathBuf> {
    let mut files = Vec::new();
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            files.extend(rust_files(&path));
        } else if path.extension().is_some_and(|extension| extension == "rs") {
            files.push(path);
        }
    }
    files.sort();
    files
}

/// The code without comments: a link in a document is no use.
fn without_comments(text: &str) -> String {
    let code = |line: &str| {
        let comment =
            line.match_indices("//").find(|(at, _)| line[..*at].chars().next_back().is_none_or(char::is_whitespace));
        comment.map_or(line, |(at, _)| &line[..at]).to_owned() + "\n"
    };
    text.lines().map(code).collect()
}

/// The first names of what follows a path's `::`, one or a list in braces.
fn first_names(rest: &str) -> Vec<String> {
    let name =
        |text: &str| -> String { text.trim_start().chars().take_while(|c| c.is_alphanumeric() || *c == '_').collect() };
    let Some(list) = rest.trim_start().strip_prefix('{') else { return vec![name(rest)] };
    let (mut names, mut depth) = (vec![name(list)], 0_usize);
    for (at, character) in list.char_indices() {
        match character {
            '{' => depth += 1,
            '}' if depth == 0 => break,
            '}' => depth -= 1,
            ',' if depth == 0 => names.push(name(&list[at + 1..])),
            _ => {}
        }
    }
    names
}

/// The first names of all paths that begin with `root`, such as `crate::` or `super::`; a chain of `super::` is one
/// path.
fn paths(code: &str, root: &str) -> BTreeSet<String> {
    let starts = |at: usize| {
        let before = code[..at].chars().next_back();
        before.is_none_or(|c| !c.is_alphanumeric() && c != '_' && c != ':')
    };
    let mut out = BTreeSet::new();
    for (at, _) in code.match_indices(root).filter(|(at, _)| starts(*at)) {
        let mut rest = &code[at + root.len()..];
        while let Some(further) = rest.strip_prefix(root) {
            rest = further;
        }
        out.extend(first_names(rest).into_iter().filter(|name| !name.is_empty()));
    }
    out
}

/// The rooms that code uses; paths by `super::` count where they name a room that is no module of the room's own.
fn rooms_used(code: &str, own_modules: &BTreeSet<String>) -> BTreeSet<String> {
    let climbing =
        paths(code, "super::").into_iter().filter(|name| place(name).is_some() && !own_modules.contains(name));
    paths(code, "crate::").into_iter().chain(climbing).collect()
}

/// The room that a file below `src` belongs to, or its own name if it lies in no folder.
fn room_of(file: &Path) -> String {
    let first = file.strip_prefix("src").unwrap().components().next().unwrap();
    Path::new(first.as_os_str()).file_stem().unwrap().to_str().unwrap().to_owned()
}

fn own_modules(room: &str) -> BTreeSet<String> {
    let folder = Path::new("src").join(room);
    let files = if folder.is_dir() { rust_files(&folder) } else { Vec::new() };
    files.iter().map(|file| file.file_stem().unwrap().to_str().unwrap().to_owned()).collect()
}

/// Every arrow of the sources: file, room, room used, and whether only tests use it there.
fn arrows() -> Vec<(PathBuf, String, String, bool)> {
    let mut out = Vec::new();
    for file in rust_files(Path::new("src")) {
        let room = room_of(&file);
        if ["lib", "main"].contains(&room.as_str()) {
            continue;
        }
        let modules = own_modules(&room);
        let text = without_comments(&fs::read_to_string(&file).unwrap());
        let test_file = file.iter().any(|part| part == "tests" || part == "tests.rs" || part == "test_draft.rs");
        let (code, tests) = text.split_once("#[cfg(test)]\nmod tests {").unwrap_or((&text, ""));
        for (code, in_tests) in [(code, test_file), (tests, true)] {
            for used in rooms_used(code, &modules) {
                out.push((file.clone(), room.clone(), used, in_tests));
            }
        }
    }
    out
}

#[test]
fn no_room_uses_one_that_the_house_does_not_allow() {
    let arrows = arrows();
    let wrong: Vec<String> = arrows
        .iter()
        .filter(|(_, room, used, in_tests)| !allowed(room, used, *in_tests))
        .map(|(file, room, used, _)| format!("{}: `{room}` uses `{used}`", file.display()))
        .collect();
    assert!(wrong.is_empty(), "not allowed by the table in tests/rooms.rs:\n{}", wrong.join("\n"));
    for (user, used) in DRAWN {
        let found = arrows.iter().any(|(_, room, other, in_tests)| room == user && other == used && !in_tests);
        assert!(found, "`{user}` is drawn as using `{used}`, but no file does: is the drawing out of date?");
    }
}

#[test]
fn the_binary_uses_the_commands_alone() {
    let code = without_comments(&fs::read_to_string("src/main.rs").unwrap());
    assert_eq!(paths(&code, "coldseam::"), BTreeSet::from(["commands".to_owned()]));
}

#[test]
fn uses_are_found_in_every_form() {
    let code = "
use crate::grid::Grid;
use crate::{
    index::{AirId, CellId},
    rating::{self, Rating},
    junction,
};
//! [`document`](crate::report::text)
fn f() -> crate::input::Side { super::super::conduction::solve(super::own()) } // crate::commands
use super::{verification::run, catalogue};
";
    let found = rooms_used(&without_comments(code), &BTreeSet::from(["catalogue".to_owned()]));
    let expected = ["conduction", "grid", "index", "input", "junction", "rating", "verification"];
    assert!(found.iter().eq(expected.iter()), "{found:?}");
}

/// The lines of the drawing: the flow, and the two below it.
fn drawing(text: &str) -> [Vec<char>; 3] {
    let mut lines = text.lines().skip_while(|line| !line.contains("YAML text →"));
    [(); 3].map(|()| lines.next().unwrap_or_default().chars().collect())
}

/// The word of a line that stands at this column.
fn word_at(line: &[char], column: usize) -> String {
    let is_word = |column: &usize| line.get(*column).is_some_and(|c| c.is_alphanumeric());
    let start = (0..=column).rev().take_while(is_word).last().unwrap_or(column);
    (start..).take_while(is_word).map(|column| line[column]).collect()
}

#[test]
fn the_table_is_the_house_as_drawn() {
    for file in ["src/lib.rs", "DEVELOPERS.md"] {
        let text = fs::read_to_string(file).unwrap();
        let [flow, arrows, last] = drawing(&text);
        let chain: String = flow.iter().collect::<String>().trim_start_matches("//!").trim().to_owned();
        let chain: Vec<&str> = chain.split('→').map(str::trim).collect();
        let mut drawn: Vec<(String, String)> =
            chain[1..].windows(2).map(|pair| (pair[1].to_owned(), pair[0].to_owned())).collect();
        let catalogue: String = arrows.iter().collect();
        assert!(catalogue.contains("↑ catalogue"), "{file}: {catalogue}");
        let column = |arrow: char| arrows.iter().position(|&c| c == arrow).expect("both arrows are drawn");
        drawn.push((word_at(&flow, column('↑')), "catalogue".to_owned()));
        drawn.push((word_at(&last, column('↓')), word_at(&flow, column('↓'))));
        drawn.sort();
        let mut expected: Vec<(String, String)> = DRAWN.map(|(user, used)| (user.to_owned(), used.to_owned())).to_vec();
        expected.sort();
        assert_eq!(drawn, expected, "arrows drawn in {file} (left) and in this test (right)");
    }
    for (user, used) in DRAWN {
        assert!(allowed(user, used, false), "`{user}` is drawn as using `{used}`, but the table forbids it");
    }
    for (k, (user, rooms)) in HOUSE.iter().enumerate() {
        for used in *rooms {
            assert!(place(used) < Some(k), "data flows one way: `{user}` cannot use `{used}`");
        }
    }
}

#[test]
fn every_room_is_in_the_table_and_described() {
    let rooms: BTreeSet<String> = HOUSE.iter().map(|(room, _)| (*room).to_owned()).collect();
    let lib = fs::read_to_string("src/lib.rs").unwrap();
    let after = |text: &str, start: &str, end: char| -> BTreeSet<String> {
        let lines = text.lines().filter_map(|line| line.strip_prefix(start)?.split_once(end));
        lines.map(|(name, _)| name.to_owned()).collect()
    };
    let mut modules = after(&lib, "pub mod ", ';');
    assert!(modules.remove(FOR_ALL));
    assert_eq!(modules, rooms, "modules of src/lib.rs (left)");
    assert_eq!(after(&lib, "//! - [`", '`'), rooms, "rooms described in src/lib.rs (left)");
    let developers = fs::read_to_string("DEVELOPERS.md").unwrap();
    assert_eq!(after(&developers, "| `", '`'), rooms, "rooms described in DEVELOPERS.md (left)");
    let folders = fs::read_dir("src").unwrap().map(|entry| entry.unwrap().path()).filter(|path| path.is_dir());
    let folders: BTreeSet<String> =
        folders.map(|path| path.file_name().unwrap().to_str().unwrap().to_owned()).collect();
    assert_eq!(folders, rooms, "folders of src (left)");
}
