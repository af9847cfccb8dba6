//! How a run of the tool ended: the only place that knows exit codes.

use std::process::ExitCode;

/// How a run ended.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Outcome {
    /// 0: all that was asked for was done, within all stated limits.
    #[default]
    Done,
    /// 1: for at least one file there is no result. Its input is at fault, or its results could not be written, or
    /// (said so plainly) a check inside Coldseam failed.
    InputAtFault,
    /// 2: the command line was not understood; nothing was done.
    Usage,
    /// 3: every file has its result, but a stated limit was not met: a bracket is wider than asked, or a published
    /// value was missed by more than its allowed difference.
    LimitNotMet,
}

impl Outcome {
    /// The worse of two outcomes, for several files.
    ///
    /// No result is worse than one whose bracket is too wide: the latter is still true, and says how far it goes. So 1
    /// beats 3, which beats 0. Usage is settled before any file is looked at and beats all.
    pub fn worse(self, other: Self) -> Self {
        let rank = |outcome: Self| match outcome {
            Self::Done => 0,
            Self::LimitNotMet => 1,
            Self::InputAtFault => 2,
            Self::Usage => 3,
        };
        if rank(other) > rank(self) { other } else { self }
    }
}

impl From<Outcome> for ExitCode {
    fn from(outcome: Outcome) -> Self {
        Self::from(match outcome {
            Outcome::Done => 0,
            Outcome::InputAtFault => 1,
            Outcome::Usage => 2,
            Outcome::LimitNotMet => 3,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::Outcome::{self, *};

    #[test]
    fn the_worst_of_several_files_wins() {
        for (all, worst) in [
            (vec![], Done),
            (vec![Done, Done], Done),
            (vec![Done, LimitNotMet, Done], LimitNotMet),
            (vec![InputAtFault, LimitNotMet], InputAtFault),
            (vec![LimitNotMet, InputAtFault, Done], InputAtFault),
        ] {
            assert_eq!(all.iter().copied().fold(Outcome::default(), Outcome::worse), worst, "{all:?}");
        }
    }
}
