//! The words of the briefing, explained.

use super::reader::Reader;
use crate::season::BARE_MM;

/// Terms and their meanings, in a reader's units.
pub(super) fn terms(reader: Reader) -> [(&'static str, String); 15] {
    let water_equivalent = format!("depth of water if the snow were melted, {}", reader.units.depth().word);
    let warming_level = format!(
        "degrees added to the record's temperatures, whose own climate is {}; all levels are compared with the reference",
        reader.level(0.0)
    );
    let bare = reader.limit(BARE_MM);
    let melt_out =
        format!("basin: first day after the peak with at most 5 % of it left; band: first day below {bare}");
    let departure =
        format!("first day after the peak with at most half of it left; last day with {bare} or more");
    let terms: [(&'static str, &str); 15] = [
        ("Snow water equivalent (SWE)", &water_equivalent),
        ("Water year", "starts on the stated day and is named for the calendar year in which it ends"),
        ("Warming level", &warming_level),
        (
            "Realization",
            "one synthetic record of so many water years; each runs under every level, so differences are paired",
        ),
        (
            "Period value",
            "one realization as one number: the mean over its years of an amount, the median of a date",
        ),
        (
            "Precipitation spread",
            "5–95 % range of the period value over realizations at the reference, with the temperatures its years bring",
        ),
        (
            "1 April SWE, survey-date SWE",
            "SWE as that day begins: in the daily table, the state at the end of the day before",
        ),
        ("Half spread", "from the reference's median to the end of its spread that a shift points to"),
        ("Weather spread", "the same range over single years"),
        ("Melt-out", &melt_out),
        (
            "Net melt",
            "melt less refreezing; its dates are those by which 10, 50 and 90 % of the year's have come",
        ),
        ("Half-gone day, last day with snow", &departure),
        (
            "Centroid of snowpack outflow",
            "the day on which the year's outflow balances: sum of day times outflow over outflow",
        ),
        ("Snowpack outflow, water input", "water leaving the pack; the same with rain on bare ground"),
        (
            "± behind a chance or ratio",
            "Monte Carlo error: one standard deviation over resampled realizations",
        ),
    ];
    terms.map(|(term, meaning)| (term, meaning.to_owned()))
}
