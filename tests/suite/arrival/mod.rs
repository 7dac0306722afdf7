//! What is found out about the data on arrival, on sites made up for it.

mod completeness;
mod dates;
mod page;
mod quality;
mod real;
mod sentinels;
mod simulated;
