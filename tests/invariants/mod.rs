//! Properties that hold for every basin, record, warming and parameter set, tried on random ones.

mod columns;
mod degrees;
mod engine;
mod ensemble;
mod findings;
mod mass;
mod on_the_gauge;
mod operated;
mod operation;
mod options;
mod patches;
mod realizations;
mod same_bits;
mod scenario;
mod season_sums;
mod seasons;
mod storage;
mod sun;
mod wet_days;
mod with_options;

use proptest::test_runner::Config;

/// So many random cases; a failing one is printed, small and whole, and nothing is written into the tree.
fn cases(count: u32) -> Config {
    Config { cases: count, failure_persistence: None, ..Config::default() }
}
