//! Tables, charts, JSON, file names and the output folder.

pub mod sample;
mod sample_run;

mod csv_text;
mod csv_tables;
mod json_outputs;
mod file_names;
mod chart_axes;
mod chart_svg;
mod folder;
mod folder_swap;
