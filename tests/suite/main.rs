//! The one integration binary.

mod cli;
mod demo;
mod intake;
mod numerics;
mod real;
mod site;
mod structure;
