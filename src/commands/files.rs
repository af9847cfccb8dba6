//! From the paths on the command line to junction files.

use std::path::{Path, PathBuf};

use super::refusal::Refusal;

/// The junction files that a path means, in order: itself, or those in the folder.
///
/// A folder that cannot be read, or has none, is a refusal in its place.
pub(super) fn junction_files(path: &Path) -> Vec<Result<PathBuf, Refusal>> {
    if !path.is_dir() {
        return vec![Ok(path.to_owned())];
    }
    match files_in(path) {
        Err(error) => vec![Err(Refusal::of_path(path, format!("the folder cannot be read: {error}"), None))],
        Ok(files) if files.is_empty() => {
            let help = "junction files end in .yaml or .yml; folders within a folder are not searched, name them too";
            vec![Err(Refusal::of_path(path, "no junction file in this folder".to_owned(), Some(help.to_owned())))]
        }
        Ok(files) => files.into_iter().map(Ok).collect(),
    }
}

fn files_in(folder: &Path) -> std::io::Result<Vec<PathBuf>> {
    let mut files = Vec::new();
    for entry in std::fs::read_dir(folder)? {
        let path = entry?.path();
        let hidden = path.file_name().is_some_and(|name| name.to_string_lossy().starts_with('.'));
        let extension = path.extension().map(|extension| extension.to_string_lossy().to_lowercase());
        if !hidden && matches!(extension.as_deref(), Some("yaml" | "yml")) && path.is_file() {
            files.push(path);
        }
    }
    files.sort();
    Ok(files)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_folder_means_the_junction_files_in_it_by_name() {
        let folder = tempfile::tempdir().unwrap();
        for name in ["b.yml", "a.yaml", "c.YAML", ".hidden.yaml", "notes.txt", "yaml"] {
            std::fs::write(folder.path().join(name), "").unwrap();
        }
        std::fs::create_dir(folder.path().join("folder.yaml")).unwrap();
        let names: Vec<_> = junction_files(folder.path())
            .into_iter()
            .map(|file| file.unwrap().file_name().unwrap().to_string_lossy().into_owned())
            .collect();
        assert_eq!(names, ["a.yaml", "b.yml", "c.YAML"]);
    }

    #[test]
    fn a_folder_without_junctions_is_refused() {
        let folder = tempfile::tempdir().unwrap();
        let refusal = junction_files(folder.path()).remove(0).unwrap_err();
        assert_eq!(refusal.diagnostics[0].message, "no junction file in this folder");
    }

    #[test]
    fn any_other_path_stands_for_itself() {
        assert_eq!(junction_files(Path::new("no/such.file")).remove(0).unwrap(), Path::new("no/such.file"));
    }
}
