//! Simulations: what the program promises, tried on records whose truth is known.
//!
//! Nothing here is data: every record is drawn from a seeded stream of random numbers, so that a
//! table comes out the same wherever it is run.

pub mod random;
pub mod records;
pub mod reach;
pub mod coverage;
