//! A reservoir: what it may hold and must give, and its water balance day by day.
//!
//! `params` is what is stated of it, `rule` how much it may hold on each day, `day` one day of it, in the usual order of
//! priority. It knows neither snow nor basin: it is given inflow.

mod day;
mod ledger;
mod params;
mod rule;

pub use day::{Day, Outcome, Pool, step};
pub use ledger::{OpenPool, PoolLedger};
pub use params::{Demand, Reservoir};
pub use rule::{FloodRule, RulePoint};
