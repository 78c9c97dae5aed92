//! The exit codes, which never change: other programs read them.

use std::process::ExitCode;

/// How a command ended.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Exit {
    /// Good.
    Good,
    /// The answer is no: stop findings, or a record that does not verify.
    No,
    /// Wrong command line.
    Usage,
    /// An input cannot be read.
    Unreadable,
    /// An output cannot be written.
    Unwritable,
    /// A fault of this program.
    Fault,
    /// The record is open: its end may be missing.
    Open,
    /// Interrupted.
    Interrupted,
}

impl Exit {
    /// The number given to the system.
    pub const fn code(self) -> u8 {
        match self {
            Self::Good => 0,
            Self::No => 1,
            Self::Usage => 2,
            Self::Unreadable => 3,
            Self::Unwritable => 4,
            Self::Fault => 5,
            Self::Open => 6,
            Self::Interrupted => 130,
        }
    }

    /// The worse of two over several files, in the order unreadable, no, open, good.
    pub fn worse(self, other: Self) -> Self {
        let rank = |exit: Self| match exit {
            Self::Good => 0,
            Self::Open => 1,
            Self::No => 2,
            Self::Unreadable => 3,
            Self::Usage => 4,
            Self::Unwritable => 5,
            Self::Fault => 6,
            Self::Interrupted => 7,
        };
        if rank(other) > rank(self) {
            other
        } else {
            self
        }
    }
}

impl From<Exit> for ExitCode {
    fn from(exit: Exit) -> Self {
        Self::from(exit.code())
    }
}
