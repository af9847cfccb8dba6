//! The files of the demo library.

use std::fs;

/// Path from the package's folder (where tests run) and text of every file in `junctions/`, by name.
pub(crate) fn demo_files() -> Vec<(String, String)> {
    let folder = fs::read_dir("junctions").expect("the demo library is there");
    let paths = folder.map(|entry| entry.expect("the demo library can be read").path());
    let mut files: Vec<(String, String)> = paths
        .map(|path| {
            let name = path.file_name().and_then(|name| name.to_str()).expect("a demo's name is plain text");
            let text = fs::read_to_string(&path).expect("a demo can be read");
            (format!("junctions/{name}"), text)
        })
        .collect();
    files.sort();
    files
}
