//! The tests that look at thawline from outside: a second, naive implementation of its method, properties that hold
//! for every scenario, and values from outside with their sources.

mod cli;
mod invariants;
mod naive;
mod naive_season;
mod vectors;
