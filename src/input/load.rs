//! Reading a junction file from disk.

use std::fs::File;
use std::io::{ErrorKind, Read};
use std::path::Path;

use super::diagnostic::Diagnostic;
use super::document::{Document, Source, Span};
use super::problem::{FileProblem, Problem};
use super::read::parse;

/// Larger files are not read; 20,000 regions take about 2 MiB.
pub(super) const SIZE_LIMIT_BYTES: u64 = 16 * 1024 * 1024;

/// Reads and checks a junction file. A byte-order mark at its start is left out.
///
/// # Errors
/// The source as far as it could be read, for [`render`](super::render), with all that is wrong.
pub fn load(path: &Path) -> Result<(Source, Document), (Source, Vec<Diagnostic>)> {
    let name = path.display().to_string();
    let bytes = match read_bytes(path) {
        Ok(bytes) => bytes,
        Err(problem) => return Err((Source { name, text: String::new() }, vec![Problem::from(problem).at(None)])),
    };
    let source = match decode(name, bytes) {
        Ok(source) => source,
        Err((source, diagnostic)) => return Err((*source, vec![*diagnostic])),
    };
    match parse(&source) {
        Ok(document) => Ok((source, document)),
        Err(diagnostics) => Err((source, diagnostics)),
    }
}

fn read_bytes(path: &Path) -> Result<Vec<u8>, FileProblem> {
    let trouble = |error: std::io::Error| match error.kind() {
        ErrorKind::NotFound => FileProblem::NoSuchFile,
        ErrorKind::IsADirectory => FileProblem::Folder,
        ErrorKind::PermissionDenied => FileProblem::Unreadable { reason: "reading it is not permitted".to_owned() },
        _ => FileProblem::Unreadable { reason: error.to_string() },
    };
    let metadata = std::fs::metadata(path).map_err(trouble)?;
    if metadata.is_dir() {
        return Err(FileProblem::Folder);
    }
    if metadata.len() > SIZE_LIMIT_BYTES {
        return Err(FileProblem::TooLarge { bytes: Some(metadata.len()) });
    }
    let mut bytes = Vec::new();
    let file = File::open(path).map_err(trouble)?;
    // what is no plain file has no size to ask for beforehand
    file.take(SIZE_LIMIT_BYTES + 1).read_to_end(&mut bytes).map_err(trouble)?;
    if bytes.len() as u64 > SIZE_LIMIT_BYTES {
        return Err(FileProblem::TooLarge { bytes: None });
    }
    Ok(bytes)
}

/// The text of a file, or the first place where it is not UTF-8.
fn decode(name: String, bytes: Vec<u8>) -> Result<Source, (Box<Source>, Box<Diagnostic>)> {
    let utf16 = bytes.starts_with(&[0xff, 0xfe]) || bytes.starts_with(&[0xfe, 0xff]);
    match String::from_utf8(bytes) {
        Ok(mut text) => {
            if text.starts_with('\u{feff}') {
                text.drain(..'\u{feff}'.len_utf8());
            }
            Ok(Source { name, text })
        }
        Err(error) => {
            let start = error.utf8_error().valid_up_to();
            let text = String::from_utf8_lossy(error.as_bytes()).into_owned();
            let diagnostic = if utf16 {
                Problem::from(FileProblem::Utf16).at(None)
            } else {
                Problem::from(FileProblem::NotUtf8).at(Some(Span { start, end: start + '\u{fffd}'.len_utf8() }))
            };
            Err((Box::new(Source { name, text }), Box::new(diagnostic)))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::input::line_column;

    fn refusal(content: &[u8]) -> (Source, Diagnostic) {
        let file = tempfile::NamedTempFile::new().unwrap();
        std::fs::write(file.path(), content).unwrap();
        let (source, mut diagnostics) = load(file.path()).unwrap_err();
        assert_eq!(diagnostics.len(), 1, "{diagnostics:?}");
        (source, diagnostics.remove(0))
    }

    #[test]
    fn what_is_no_readable_file_is_refused() {
        let folder = tempfile::tempdir().unwrap();
        let message = |path: &Path| load(path).unwrap_err().1[0].message.clone();
        assert_eq!(message(folder.path()), "this is a folder, not a junction file");
        assert_eq!(message(&folder.path().join("none.yaml")), "there is no such file");
    }

    #[test]
    fn a_large_file_is_refused_by_its_size_alone() {
        let file = tempfile::NamedTempFile::new().unwrap();
        // ten gigabytes that take no room on disk
        file.as_file().set_len(10_000_000_000).unwrap();
        let (source, diagnostics) = load(file.path()).unwrap_err();
        assert!(source.text.is_empty());
        assert_eq!(diagnostics[0].message, "the file is too large: 10000 MB, where 16 MiB are allowed");
    }

    #[test]
    fn the_first_byte_that_is_not_utf8_is_shown() {
        let (source, diagnostic) = refusal(b"title: x\nname: W\xe4rme\n");
        assert_eq!(line_column(&source, diagnostic.span.unwrap().start), (2, 8));
        let (_, diagnostic) = refusal(&[0xff, 0xfe, b't', 0, b'i', 0]);
        assert!(diagnostic.message.contains("UTF-16") && diagnostic.span.is_none());
    }

    #[test]
    fn empty_files_are_refused() {
        for content in ["", "\n\n", "# nothing here\n", "---\n", "\u{feff}"] {
            let (_, diagnostic) = refusal(content.as_bytes());
            assert_eq!(diagnostic.message, "the file is empty", "{content:?}");
        }
    }
}
