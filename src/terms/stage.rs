//! The parts of a run that take time.

/// What a run is doing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stage {
    /// Reading a file.
    Reading,
    /// Grouping rows into series.
    Grouping,
    /// Fitting series.
    Fitting,
    /// Writing files.
    Writing,
}
