//! The words of the briefing, explained.

use super::reader::Reader;
use crate::season::{BARE_MM, LEAST_PEAK_MM, RAIN_ON_SNOW_MM};

/// Terms and their meanings, in a reader's units.
pub(super) fn terms(reader: Reader) -> [(&'static str, String); 48] {
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
    let area = format!(
        "SWE summed over the year's days, {}: more of it is more snow, or snow that lies longer (the storage-time integral)",
        reader.units.depth_days().word
    );
    let over_peak = format!("none where the peak stays below {}", reader.limit(LEAST_PEAK_MM));
    let rain_on_snow = format!(
        "a day with {0} of rain or more on {0} of SWE or more; the bands tell more than the basin mean, which mixes bare \
         and snowy ground",
        reader.limit(RAIN_ON_SNOW_MM)
    );
    let terms: [(&'static str, &str); 48] = [
        ("Snow water equivalent (SWE)", &water_equivalent),
        ("Water year", "starts on the stated day and is named for the calendar year in which it ends"),
        ("Warming level", &warming_level),
        (
            "Realization",
            "one synthetic record of so many water years; each runs under every level, so differences are paired",
        ),
        (
            "Weather that was made, generator",
            "the realizations' weather, and what makes it from the record; the generator sheet holds the one against the other",
        ),
        (
            "Wet day, spell",
            "a day with more than the stated limit; days in succession that are wet, or that are not",
        ),
        (
            "Correlation with the year before",
            "lag-1 autocorrelation over the years that follow on one another: above 0 where wet years come together",
        ),
        (
            "Period value",
            "one realization as one number: the median over its years of a date, the mean of all else",
        ),
        (
            "Precipitation spread",
            "5–95 % range of the period value over realizations at the reference, with the temperatures its years bring",
        ),
        (
            "1 April SWE, survey-date SWE",
            "SWE as that day begins: in the daily table, the state at the end of the day before",
        ),
        (
            "Reference",
            "the level that all others are compared with: the record's own climate, unless the study states another",
        ),
        ("Median", "the middle one when all are put in order: half of them lie below it, half above"),
        (
            "Monte Carlo",
            "how far a number would move with other realizations of the same kind; not how far the model or the record may be off",
        ),
        ("Half spread", "from the reference's median to the end of its spread that a shift points to"),
        ("Weather spread", "the same range over single years"),
        (
            "Temperature-held spread",
            "the precipitation spread of realizations whose mean temperature of every month is shifted to the record's, so that \
             none is warm or cool by chance",
        ),
        (
            "Chance of exceedance",
            "share of single years that bring at least so much: 90 % reads the dry side, 10 % the wet",
        ),
        (
            "Percent of median, moved normal",
            "snow water over the sum of the bands' medians of the baseline years; a moved normal is the same years' median at \
             the level itself",
        ),
        (
            "Break-even precipitation",
            "change of all precipitation at which the warmed median is back at the reference's",
        ),
        (
            "Response surface",
            "the median under any warming together with any change of all precipitation, from runs at the nodes of a grid",
        ),
        (
            "Elasticity",
            "percent of snow water lost for one degree more, or won for one percent more precipitation; together they need not add",
        ),
        (
            "Low-snow year",
            "less snow water on the survey date than the stated share of the reference's years; the limit stays the reference's at \
             every level",
        ),
        (
            "Dry and warm snow drought",
            "snow water within the reference's lowest 30 % of years, with less precipitation than its median (dry), or as much and more \
             (warm)",
        ),
        (
            "Crossover elevation",
            "where snow water of single years hangs as much on winter temperature as on precipitation: warmth decides below it, \
             precipitation above",
        ),
        (
            "Snow line, snow at risk",
            "lowest elevation with the stated snow water; snow of bands whose winter mean is below freezing now and above it at a \
             level",
        ),
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
        (
            "Driest year, wettest year",
            "of the years of one realization, the one with least and the one with most of what is told: of its snow the one, of \
             its precipitation the other",
        ),
        (
            "Precipitation before a day",
            "rain and snow over the basin from the water year's first day to the day before it",
        ),
        ("Snowpack outflow, water input", "water leaving the pack; the same with rain on bare ground"),
        (
            "Largest of a day, of 3 days in succession",
            "within one water year, without routing through channels or lakes: not a flood peak",
        ),
        (
            "Day by which the stated volume has come",
            "first day of the water year by which so much has come since its first; not reached in a year that brings less",
        ),
        (
            "Water input, routed",
            "water input over the basin, the share of it that runs off, and later by what stores hold back; called inflow only where \
             inflow was observed",
        ),
        (
            "Reliability",
            "by time: share of days on which demand is met in full, those without demand among them; by volume: share of what is demanded that is supplied",
        ),
        ("Resilience", "share of days of shortage that a day without shortage follows"),
        (
            "Vulnerability",
            "mean over shortages, each an unbroken run of days, of the largest share of a day's demand that is missing",
        ),
        (
            "Flood-space rule, encroachment",
            "storage that is not to be exceeded on a day, so that floods find room; storage above it",
        ),
        ("Carry-over", "storage left as the water year ends, for the next"),
        ("Spill", "water that the reservoir cannot hold and that passes beside its outlets"),
        ("Shortage", "demand that is not met, since water lies too low or the outlets pass no more"),
        ("Net melt done before a day", "net melt of the days before it over the year's"),
        ("SWE area", &area),
        ("Survey-date SWE over the peak", &over_peak),
        (
            "Snowfall fraction, SWE over precipitation",
            "the year's snowfall over its rain and snow; SWE as the day begins over the rain and snow of the water year's \
             days before it; none where nothing fell",
        ),
        ("Day of rain on snow", &rain_on_snow),
        (
            "± behind a chance or ratio",
            "Monte Carlo error: one standard deviation over resampled realizations",
        ),
    ];
    terms.map(|(term, meaning)| (term, meaning.to_owned()))
}
