//! `[findings.warming_rate]`: what turns a warming into a calendar year. It has no default: a level has no date by itself.

use super::super::section::Section;
use crate::findings::WarmingRate;

pub(super) fn read(mut section: Section<'_>) -> Option<WarmingRate> {
    let c_per_decade = section.required_number(
        "c_per_decade",
        0.01..=2.0,
        "degrees that the basin warms a decade, for example 0.3",
    );
    let from_year = section.required_number(
        "from_year",
        1850.0..=2100.0,
        "the year in which the climate is the reference's: the record's mid-year, which check tells",
    );
    section.finish();
    Some(WarmingRate { c_per_decade: c_per_decade?, from_year: from_year? })
}
