//! The one integration binary.
#![allow(clippy::print_stdout, reason = "trials print their figures and say when they skip")]

mod cli;
mod demo;
mod intake;
mod layouts;
mod numerics;
mod real;
mod site;
mod structure;
