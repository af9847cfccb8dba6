//! The command line: one file a command; each reads, calls the rooms before it, and prints to the writers it is handed.
//!
//! Holds no formula: whatever computes belongs in another room.

mod args;
mod check;
mod files;
mod outcome;
mod pipeline;
mod progress;
mod rate;
mod refusal;
mod run;
mod terminal;
mod values;
mod verify;

pub use outcome::Outcome;
pub use run::run;
pub use terminal::Terminal;
