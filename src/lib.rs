//! Thawline: how much snow water is left, and how much earlier it melts, as a basin warms, and whether that answer
//! stands although nobody knows which way precipitation will go.
//!
//! The rooms stand on floors; each knows only the floors below it. `cli` reads what was typed through `scenario`,
//! `ensemble` runs the `snow` engine over every warming level and realization of `perturb`, `season` measures its year
//! blocks, `findings` answers questions, `figures` and `report` turn the answers into bytes.
#![forbid(unsafe_code)]
#![deny(clippy::print_stdout, clippy::print_stderr)]

pub mod baseline;
pub mod basin;
pub mod calendar;
pub mod cli;
pub mod defaults;
pub mod demo;
pub mod ensemble;
pub mod fault;
pub mod figures;
pub mod findings;
pub mod fit;
pub mod inflow;
mod normal;
pub mod observed;
pub mod operation;
pub mod perturb;
pub mod report;
pub mod reservoir;
pub mod scenario;
pub mod season;
pub mod snow;
pub mod table;
pub mod units;
pub mod weather;
