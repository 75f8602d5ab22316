//! The report: findings as words, tables, a page and a manifest; bytes in memory. `publish` alone writes them.

mod daily;

pub use daily::{DailyError, daily_csv};

/// Version of every JSON document we write: a number removed or renamed raises it.
pub const SCHEMA_VERSION: u32 = 1;
