//! The one integration binary.
#![allow(clippy::print_stdout, reason = "trials print their figures and say when they skip")]

#[path = "../bench/mod.rs"]
mod bench;
mod arrival;
mod cli;
mod deliver;
mod demo;
mod fuzz;
mod intake;
mod intake_open;
mod layouts;
mod numerics;
mod real;
mod site;
mod structure;
mod whole_runs;
mod words;
