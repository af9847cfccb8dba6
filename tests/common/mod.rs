//! Runs the built binary on files written for one test, and compares what it says.

#![expect(clippy::unwrap_used, reason = "a test that cannot write its files or read the output shall stop there")]

use std::path::PathBuf;
use std::process::{Command, Stdio};

use tempfile::TempDir;

/// One run of the binary: files in a folder of its own, arguments, and what is expected.
pub(crate) struct Case {
    folder: TempDir,
    arguments: Vec<String>,
    stdout: Vec<String>,
    stderr: Vec<String>,
    exit: i32,
}

/// What a run printed.
pub(crate) struct Printed {
    pub(crate) stdout: String,
    pub(crate) stderr: String,
}

impl Case {
    /// A run with these arguments, in an empty folder; exit code 0 is expected.
    pub(crate) fn args<const N: usize>(arguments: [&str; N]) -> Self {
        Self {
            folder: tempfile::tempdir().unwrap(),
            arguments: arguments.map(str::to_owned).to_vec(),
            stdout: Vec::new(),
            stderr: Vec::new(),
            exit: 0,
        }
    }

    /// One more argument.
    pub(crate) fn arg(mut self, argument: &str) -> Self {
        self.arguments.push(argument.to_owned());
        self
    }

    /// Writes a file into the folder; folders on its way are made.
    pub(crate) fn file(self, name: &str, text: &str) -> Self {
        let path: PathBuf = self.folder.path().join(name);
        std::fs::create_dir_all(path.parent().unwrap()).unwrap();
        std::fs::write(path, text).unwrap();
        self
    }

    /// Standard output shall contain this.
    pub(crate) fn stdout(mut self, part: &str) -> Self {
        self.stdout.push(part.to_owned());
        self
    }

    /// Standard error shall contain this.
    pub(crate) fn stderr(mut self, part: &str) -> Self {
        self.stderr.push(part.to_owned());
        self
    }

    /// The exit code shall be this.
    pub(crate) fn exit(mut self, code: i32) -> Self {
        self.exit = code;
        self
    }

    /// Runs and compares.
    #[track_caller]
    pub(crate) fn run(self) -> Printed {
        let output = Command::new(env!("CARGO_BIN_EXE_coldseam"))
            .current_dir(self.folder.path())
            .args(&self.arguments)
            .stdin(Stdio::null())
            .output()
            .unwrap();
        let printed = Printed {
            stdout: String::from_utf8(output.stdout).unwrap(),
            stderr: String::from_utf8(output.stderr).unwrap(),
        };
        let told = format!("--- stdout\n{}\n--- stderr\n{}", printed.stdout, printed.stderr);
        assert_eq!(output.status.code(), Some(self.exit), "exit code\n{told}");
        for part in &self.stdout {
            assert!(printed.stdout.contains(part), "stdout lacks {part:?}\n{told}");
        }
        for part in &self.stderr {
            assert!(printed.stderr.contains(part), "stderr lacks {part:?}\n{told}");
        }
        printed
    }

    /// Runs, compares, and reads standard output as JSON.
    #[track_caller]
    pub(crate) fn run_json(self) -> serde_json::Value {
        serde_json::from_str(&self.run().stdout).unwrap()
    }
}
