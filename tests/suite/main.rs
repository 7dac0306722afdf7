//! The one integration binary.
#![allow(clippy::print_stdout, reason = "trials print their figures and say when they skip")]

mod arrival;
mod cli;
mod deliver;
mod demo;
mod fuzz;
mod intake;
mod numerics;
mod real;
mod site;
mod structure;
mod words;
