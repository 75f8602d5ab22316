//! The tests that look at thawline from outside: a second, naive implementation of its method, properties that hold
//! for every scenario, and values from outside with their sources.

#![allow(clippy::unwrap_used, reason = "a test that cannot go on should say where")]

mod browser;
mod cli;
mod golden;
mod invariants;
mod naive;
mod naive_operation;
mod naive_season;
mod parameters;
mod plausibility;
mod record;
mod rooms;
mod vectors;
