//! Exit statuses.

use std::process::ExitCode;

/// How the program ends.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Exit {
    /// Done.
    Done,
    /// Something named by `--fail-on` was found.
    Found,
    /// Wrong usage.
    Usage,
    /// An input could not be read as a table.
    Unreadable,
    /// The site file is invalid.
    SiteFile,
    /// An output would overwrite what the program did not write.
    WouldOverwrite,
    /// An output could not be written.
    CannotWrite,
    /// A promise broke.
    BrokenPromise,
    /// Interrupted.
    Interrupted,
}

impl Exit {
    /// The number that the shell sees.
    pub fn status(self) -> u8 {
        match self {
            Self::Done => 0,
            Self::Found => 1,
            Self::Usage => 2,
            Self::Unreadable => 3,
            Self::SiteFile => 4,
            Self::WouldOverwrite => 5,
            Self::CannotWrite => 6,
            Self::BrokenPromise => 7,
            Self::Interrupted => 130,
        }
    }

    /// The way to end that has this number.
    pub fn of_status(status: u8) -> Self {
        [
            Self::Done,
            Self::Found,
            Self::Usage,
            Self::Unreadable,
            Self::SiteFile,
            Self::WouldOverwrite,
            Self::CannotWrite,
            Self::Interrupted,
        ]
        .into_iter()
        .find(|exit| exit.status() == status)
        .unwrap_or(Self::BrokenPromise)
    }
}

impl From<Exit> for ExitCode {
    fn from(exit: Exit) -> Self {
        Self::from(exit.status())
    }
}
