//! From arguments to an outcome.

use std::ffi::OsString;
use std::io::{self, ErrorKind, Write};

use clap::Parser;

use super::args::{Arguments, Command};
use super::outcome::Outcome;
use super::terminal::Terminal;
use super::{check, rate, verify};

/// Where results and messages go.
pub(super) struct Output<'a> {
    out: &'a mut dyn Write,
    err: &'a mut dyn Write,
}

impl Output<'_> {
    /// Writes results.
    ///
    /// A pipe that is closed at the other end (`| head`) is not an error: whoever closed it has seen enough.
    pub(super) fn results(&mut self, text: &str) -> io::Result<()> {
        match self.out.write_all(text.as_bytes()).and_then(|()| self.out.flush()) {
            Err(error) if error.kind() == ErrorKind::BrokenPipe => Ok(()),
            done => done,
        }
    }

    /// Writes messages. If even that fails there is nobody left to tell.
    pub(super) fn messages(&mut self, text: &str) {
        let _ = self.err.write_all(text.as_bytes()).and_then(|()| self.err.flush());
    }
}

/// Runs the tool: `arguments` start with the program's name; results go to `out`, messages to `err`.
pub fn run(
    arguments: impl IntoIterator<Item = OsString>,
    out: &mut dyn Write,
    err: &mut dyn Write,
    terminal: &Terminal,
) -> Outcome {
    let mut output = Output { out, err };
    let done = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => dispatch(&arguments, terminal, &mut output),
        Err(answer) => answered(&answer, terminal, &mut output),
    };
    match done {
        Ok(outcome) => outcome,
        Err(error) => {
            output.messages(&format!("error: the results cannot be written: {error}\n"));
            Outcome::InputAtFault
        }
    }
}

fn dispatch(arguments: &Arguments, terminal: &Terminal, output: &mut Output<'_>) -> io::Result<Outcome> {
    match &arguments.command {
        Command::Rate(arguments) => rate::rate(arguments, terminal, output),
        Command::Check(arguments) => check::check(arguments, terminal, output),
        Command::Verify(arguments) => verify::verify(arguments, terminal, output),
    }
}

/// Help and version are results; all else the parser says is a complaint.
fn answered(answer: &clap::Error, terminal: &Terminal, output: &mut Output<'_>) -> io::Result<Outcome> {
    let text = answer.render();
    let dressed = |colour: bool| if colour { text.ansi().to_string() } else { text.to_string() };
    if answer.use_stderr() {
        output.messages(&dressed(terminal.colour_messages));
        return Ok(Outcome::Usage);
    }
    output.results(&dressed(terminal.colour_results))?;
    Ok(Outcome::Done)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A writer that fails in one way.
    struct Failing(ErrorKind);

    impl Write for Failing {
        fn write(&mut self, _: &[u8]) -> io::Result<usize> {
            Err(self.0.into())
        }

        fn flush(&mut self) -> io::Result<()> {
            Ok(())
        }
    }

    fn help_into(out: &mut dyn Write) -> (Outcome, String) {
        let mut err = Vec::new();
        let arguments = ["coldseam", "--help"].map(OsString::from);
        let outcome = run(arguments, out, &mut err, &Terminal::default());
        (outcome, String::from_utf8(err).unwrap())
    }

    #[test]
    fn help_is_a_result() {
        let mut out = Vec::new();
        assert_eq!(help_into(&mut out), (Outcome::Done, String::new()));
        assert!(String::from_utf8(out).unwrap().contains("Examples:"));
    }

    #[test]
    fn a_closed_pipe_is_not_an_error() {
        assert_eq!(help_into(&mut Failing(ErrorKind::BrokenPipe)), (Outcome::Done, String::new()));
    }

    #[test]
    fn a_full_disk_is() {
        let (outcome, messages) = help_into(&mut Failing(ErrorKind::StorageFull));
        assert_eq!(outcome, Outcome::InputAtFault);
        assert!(messages.starts_with("error: the results cannot be written: "), "{messages}");
    }
}
