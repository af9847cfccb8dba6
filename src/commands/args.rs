//! The command line's grammar. The document comments here are the help texts.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand, ValueEnum};

use super::values;
use crate::rating::{Accuracy, Request};
use crate::report::Units;

/// Rates thermal bridges: linear thermal transmittance with a guaranteed numerical bracket, and the coldest inside surface
///
/// Coldseam reads one YAML file for each building junction (layers, materials, air on both sides), solves steady heat
/// conduction in the section (ISO 10211), and gives the linear thermal transmittance Ψ for internal, overall internal
/// and external dimensions, each with a bracket that is certain to hold the exact value of the model as drawn; and the
/// temperature factor f_Rsi and the temperature of the coldest inside surface, with its place.
#[derive(Debug, Parser)]
#[command(name = "coldseam", version, max_term_width = 100, after_help = EXAMPLES, after_long_help = LONG_EXAMPLES)]
pub(super) struct Arguments {
    #[command(subcommand)]
    pub(super) command: Command,
}

const EXAMPLES: &str = "\
Examples:
  coldseam rate junctions/balcony-slab.yaml
  coldseam check junctions
  coldseam verify";

const LONG_EXAMPLES: &str = "\
Examples:
  coldseam rate junctions/balcony-slab.yaml   rate one junction
  coldseam check junctions                    what was understood of every file in a folder
  coldseam verify                             published cases beside what is computed here

Exit codes:
  0  done
  1  a file has no result: its input is at fault, or (said so plainly) Coldseam is
  2  the command line was not understood
  3  done, but a stated limit was not met (a bracket wider than asked, a published value missed)
  Of several files the worst counts: 1 before 3 before 0.";

/// What to do.
#[derive(Debug, Subcommand)]
pub(super) enum Command {
    Rate(RateArguments),
    Check(CheckArguments),
    Verify(VerifyArguments),
}

/// Solve junctions and print Ψ, f_Rsi and what they rest on
///
/// Problems in a file are shown on standard error in every format, with the line they stand in; the other files are
/// rated all the same. Results come in the order of the files given, and are the same whatever the number of threads.
#[derive(Args, Debug)]
#[command(after_help = "\
Examples:
  coldseam rate junctions/balcony-slab.yaml
  coldseam rate junctions --format csv > bridges.csv
  coldseam rate corner.yaml --accuracy 0.1% --format json")]
pub(super) struct RateArguments {
    /// Junction files, or folders of them
    ///
    /// A folder means the junction files in it (*.yaml and *.yml, by name), not those in folders within; hidden files
    /// are left out.
    #[arg(required = true, value_name = "FILE")]
    pub(super) files: Vec<PathBuf>,

    /// How to print the results
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub(super) format: Format,

    /// Half-width that every bracket shall reach, in W/(m·K), or in percent of L (as 0.1%)
    ///
    /// From 0.000001 to 0.1 W/(m·K), or 0.001% to 10%. Halving it takes about twice
    /// the nodes. Look afterwards at whether the bracket was met: if not, the node
    /// limit was reached first, and the true, wider bracket is given.
    ///
    ///   0.005    a first look
    ///   0.0005   Ψ to three decimals (the default)
    ///   0.00005  comparing details, checking other calculations
    #[arg(long, value_name = "W", default_value = "0.0005", value_parser = values::accuracy,
        allow_negative_numbers = true, verbatim_doc_comment)]
    pub(super) accuracy: Accuracy,

    /// The most nodes a grid may have
    ///
    /// From 4 to 100000000; 2_000_000 may be written for 2000000. A million nodes take some 600 MB of memory. Where it
    /// is reached before the accuracy, the result says so and the exit code is 3.
    #[arg(long, value_name = "N", default_value = "2000000", value_parser = values::node_limit,
        allow_negative_numbers = true)]
    pub(super) node_limit: usize,

    /// Units of the text report; JSON and CSV are in SI always
    #[arg(long, value_enum, default_value_t = UnitsChoice::Si)]
    pub(super) units: UnitsChoice,

    /// Threads to compute with [default: as many as the machine has]
    #[arg(long, value_name = "N", value_parser = values::threads)]
    pub(super) threads: Option<usize>,
}

impl RateArguments {
    /// What is asked of every rating.
    pub(super) fn request(&self) -> Request {
        Request { accuracy: self.accuracy, node_limit: self.node_limit }
    }
}

/// Check junction files without solving, and print what was understood
///
/// Extents, environments, materials with their sources, surfaces with the rule behind each resistance, the layers
/// crossed at each cut plane, flanks with U and lengths (measured in the drawing or given), probes, and warnings.
#[derive(Args, Debug)]
#[command(after_help = "\
Examples:
  coldseam check junctions/balcony-slab.yaml
  coldseam check junctions")]
pub(super) struct CheckArguments {
    /// Junction files, or folders of them
    ///
    /// A folder means the junction files in it (*.yaml and *.yml, by name), not those in folders within; hidden files
    /// are left out.
    #[arg(required = true, value_name = "FILE")]
    pub(super) files: Vec<PathBuf>,

    /// Units to print in; positions stay in the file's own
    #[arg(long, value_enum, default_value_t = UnitsChoice::Si)]
    pub(super) units: UnitsChoice,
}

/// Compute published cases and compare
///
/// Prints quantity, published value and its source, computed value, difference, allowed difference and verdict. The
/// exit code is 0 only if every comparison holds, else 3.
#[derive(Args, Debug)]
#[command(after_help = "\
Examples:
  coldseam verify
  coldseam verify --format json > evidence.json")]
pub(super) struct VerifyArguments {
    /// How to print the comparisons
    #[arg(long, value_enum, default_value_t = VerifyFormat::Text)]
    pub(super) format: VerifyFormat,
}

/// How to print ratings.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(super) enum Format {
    /// For people
    Text,
    /// For programs: all figures, SI, fields only ever added
    Json,
    /// For a spreadsheet: one row a junction and pair of environments, SI
    Csv,
}

/// How to print comparisons.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(super) enum VerifyFormat {
    /// For people
    Text,
    /// For programs
    Json,
}

/// Units to print in.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(super) enum UnitsChoice {
    /// W, m, K, °C
    Si,
    /// Btu, ft, h, °F
    Ip,
}

impl From<UnitsChoice> for Units {
    fn from(choice: UnitsChoice) -> Self {
        match choice {
            UnitsChoice::Si => Self::Si,
            UnitsChoice::Ip => Self::Ip,
        }
    }
}

#[cfg(test)]
mod tests {
    use clap::CommandFactory;

    use super::*;

    #[test]
    fn grammar_is_sound() {
        Arguments::command().debug_assert();
    }

    #[test]
    fn defaults_are_those_of_a_request() {
        let arguments = Arguments::try_parse_from(["coldseam", "rate", "a.yaml"]).unwrap();
        let Command::Rate(rate) = arguments.command else { panic!("rate was asked") };
        assert_eq!(rate.request(), Request::default());
    }
}
