//! Numbers, labels, sentences, explanations and pages.

mod numbers;
mod text;
mod sentences;
mod explained;
mod pages;
