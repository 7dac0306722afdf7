//! Inputs that once failed, made small.
