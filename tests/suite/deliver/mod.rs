//! Tables, charts, JSON, file names and the output folder.

pub mod sample;
