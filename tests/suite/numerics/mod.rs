//! `numerics` against certified, published and independently computed values.
//!
//! W01 … W21 are the worked examples of the methods note; each test names the source of its
//! figures. Tolerances with a name are in `support`.

mod support;
mod doubts_support;

mod alternatives;
mod breaks;
mod censored_slopes;
mod curves;
mod distributions;
mod ends;
mod exact_trends;
mod invented;
mod likelihood;
mod lines;
mod long_series;
mod noncentral;
mod normality_and_groups;
mod plateau_search;
mod points_and_refusals;
mod promises_of_models;
mod promises_of_tests;
mod properties;
mod real_series;
mod resemblance_and_bend;
mod residuals_and_deletion;
mod rounds;
mod seasonal_trends;
mod slopes_of_pairs;
mod small_systems;
mod trends;
mod without_a_point;
mod worked_examples;
