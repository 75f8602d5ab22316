//! The report: findings as words, tables, a page and a manifest; bytes in memory. `publish` alone writes them.

mod answer;
mod briefing;
mod cautions;
mod checked;
mod columns;
mod daily;
mod data_package;
mod fit;
mod generator_sheet;
mod json;
mod manifest;
mod methods;
mod normal;
pub mod numbers;
mod observed;
mod page;
mod picture;
mod publish;
mod reader;
mod snow_words;
mod study;
mod summary;
mod tables;
mod terms;
mod trends;
mod weather;
mod workbook;

pub use answer::{Answer, answer_in_words, period_name};
pub use briefing::{briefing_html, second_looks};
pub use checked::{Checked, InflowFile};
pub use daily::{DailyError, daily_csv};
pub use data_package::data_package_json;
pub use fit::{FitReport, fit_files, fit_in_words, fit_manifest_json, left_out_lines};
pub use manifest::{daily_manifest_json, manifest_json};
pub use observed::{comparison_json, comparison_words, observed_tables};
pub use picture::{Picture, PictureError, picture_of};
pub use publish::{PublishError, may_replace, publish};
pub use reader::Reader;
pub use study::{FittedFrom, Input, Origin, Record, SetsFrom, Study};
pub use summary::summary_json;
pub use tables::{ReportFile, tables};
pub use weather::weather_csv;
pub use workbook::workbook_xlsx;

/// Version of every JSON document we write: a number removed or renamed raises it.
pub const SCHEMA_VERSION: u32 = 3;
