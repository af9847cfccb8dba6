//! Everything the README and the format's description show is run: their junctions rate, their commands work.

#![expect(clippy::unwrap_used, reason = "a test that cannot read its own files has failed")]

use std::path::{Path, PathBuf};
use std::process::Command;

const ROOT: &str = env!("CARGO_MANIFEST_DIR");

/// The fenced blocks of a page in one language, in order.
fn blocks(page: &str, language: &str) -> Vec<String> {
    let text = std::fs::read_to_string(Path::new(ROOT).join(page)).unwrap();
    let mut blocks = Vec::new();
    let mut rest = text.as_str();
    while let Some(start) = rest.find(&format!("```{language}\n")) {
        let body = &rest[start + language.len() + 4..];
        let end = body.find("\n```").expect("every block is closed");
        blocks.push(body[..end].to_string());
        rest = &body[end + 4..];
    }
    blocks
}

/// Whether a block is a whole junction file, not an extract.
fn is_junction(block: &str) -> bool {
    block.starts_with("title:")
}

fn folder(name: &str) -> PathBuf {
    let folder = Path::new(env!("CARGO_TARGET_TMPDIR")).join(name);
    std::fs::create_dir_all(&folder).unwrap();
    folder
}

#[test]
fn junctions_of_the_pages_rate() {
    let folder = folder("pages");
    for page in ["README.md", "docs/input.md"] {
        let junctions: Vec<String> = blocks(page, "yaml").into_iter().filter(|block| is_junction(block)).collect();
        assert!(!junctions.is_empty(), "{page} shows no junction");
        for text in junctions {
            let file = folder.join("shown.yaml");
            std::fs::write(&file, &text).unwrap();
            let output = Command::new(env!("CARGO_BIN_EXE_coldseam")).arg("rate").arg(&file).output().unwrap();
            let complaint = String::from_utf8_lossy(&output.stderr);
            assert_eq!(output.status.code(), Some(0), "{page}:\n{text}\n{complaint}");
        }
    }
}

#[test]
fn commands_of_the_readme_work() {
    let folder = folder("commands");
    let junction = blocks("README.md", "yaml").into_iter().find(|block| is_junction(block)).unwrap();
    std::fs::write(folder.join("corner.yaml"), junction).unwrap();
    let mut run = 0;
    for line in blocks("README.md", "sh").iter().flat_map(|block| block.lines()) {
        let Some(arguments) = line.strip_prefix("coldseam ") else { continue };
        let words = arguments.split('#').next().unwrap_or_default().split_whitespace();
        let output = Command::new(env!("CARGO_BIN_EXE_coldseam")).current_dir(&folder).args(words).output().unwrap();
        assert_eq!(output.status.code(), Some(0), "{line}:\n{}", String::from_utf8_lossy(&output.stderr));
        run += 1;
    }
    assert!(run >= 3, "the README shows commands of the tool");
}

#[test]
fn the_readme_opens_with_the_job_and_names_both_commands() {
    let text = std::fs::read_to_string(Path::new(ROOT).join("README.md")).unwrap();
    assert!(text.starts_with("# Coldseam\n\nColdseam rates thermal bridges."));
    for heading in ["\nRate a junction:\n", "\nRun the tests:\n"] {
        assert!(text.contains(heading), "the check script looks for {heading:?}");
    }
}

#[test]
fn the_report_shown_is_the_report_printed() {
    let shown = blocks("README.md", "text").into_iter().next().unwrap();
    let file = Path::new(ROOT).join("junctions/balcony-slab.yaml");
    let output = Command::new(env!("CARGO_BIN_EXE_coldseam")).arg("rate").arg(file).output().unwrap();
    let printed = String::from_utf8(output.stdout).unwrap();
    assert!(printed.contains(&shown), "README.md shows\n{shown}\nbut the report is\n{printed}");
}

#[test]
fn the_pages_list_the_whole_catalogue() {
    let page = std::fs::read_to_string(Path::new(ROOT).join("docs/input.md")).unwrap();
    for name in coldseam::catalogue::names() {
        assert!(page.contains(name), "docs/input.md does not list {name}");
    }
}
