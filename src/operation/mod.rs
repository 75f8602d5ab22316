//! Operation: from the water input of a realization to inflow, storage and what they come to, year by year.
//!
//! Water input is routed (`inflow`), stored and released (`reservoir`), and measured: `inflow_measures` of every year's inflow,
//! `year_books` of every year's storage, `all_books` over a whole realization. `run` walks a realization, every level side by
//! side, and beside each level the same reservoir under other rules (`change`).

mod all_books;
mod change;
mod dates;
mod entry;
mod inflow_measures;
mod plan;
mod run;
mod year_books;

pub use all_books::{Better, CHANGED};
pub use change::Change;
pub use plan::{Operation, OperationSettings};
pub use run::Operated;
