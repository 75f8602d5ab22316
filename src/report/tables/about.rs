//! What each table holds, in one line: for the workbook's first sheet and the data package.

/// Name of a table and what it holds.
const ABOUT: &[(&str, &str)] = &[
    ("at-risk-snow", "Area and snow water of bands whose winter mean passes freezing by each level."),
    (
        "bands-amounts",
        "Amounts of every band by measure and level: quantiles over realizations, paired shift, percent change.",
    ),
    (
        "bands-dates",
        "Dates of every band by measure and level: quantiles over realizations and paired shift.",
    ),
    (
        "bands-day-counts",
        "Counts of days of every band by measure and level: quantiles over realizations and paired shift.",
    ),
    (
        "bands-shares",
        "Shares of every band by measure and level: quantiles over realizations and paired shift.",
    ),
    (
        "bands-swe-area",
        "Area under the SWE curve of every band by level: quantiles over realizations and paired shift.",
    ),
    (
        "basin-amounts",
        "Amounts of the basin by measure and level: quantiles over realizations, paired shift, percent change, chances.",
    ),
    (
        "basin-dates",
        "Dates of the basin by measure and level: quantiles over realizations, paired shift, chances.",
    ),
    (
        "basin-day-counts",
        "Counts of days of the basin by measure and level: quantiles over realizations, paired shift, chances.",
    ),
    (
        "basin-shares",
        "Shares of the basin by measure and level: quantiles over realizations, paired shift, chances.",
    ),
    (
        "basin-swe-area",
        "Area under the basin's SWE curve by level: quantiles over realizations, paired shift, chances.",
    ),
    ("break-even", "Precipitation that would make up for each level, and whether periods were ever so wet."),
    (
        "break-even-curve",
        "Precipitation that holds the headline at its reference for each warming of the response surface.",
    ),
    (
        "change-against-spread",
        "The change over one standard deviation of chance, by averaging period and level.",
    ),
    ("criteria", "What is to hold, level by level, and from which warming on it fails."),
    ("driest-and-wettest", "Driest and wettest year of a realization beside its mean, by measure and level."),
    (
        "dry-and-warm",
        "Dry or wet and warm or cool years of the realizations by level, and low snow in dry ones.",
    ),
    ("dry-and-warm-record", "Dry or wet and warm or cool years of the record, in all and by period."),
    (
        "elasticities",
        "What one degree and one percent of precipitation do, by level, in the basin and every band.",
    ),
    ("generator-sheet", "Statistics of the record beside those of realizations as long as it."),
    (
        "inflow",
        "Inflow, or water input routed, by measure and level: quantiles over realizations, paired shift, whether warming outweighs.",
    ),
    (
        "inflow-skill",
        "Modelled against observed inflow by routing and years: scores, and the routing's parameters.",
    ),
    ("low-runs", "Chance that a realization holds low years in a row, by length and level."),
    ("low-snow-in-the-record", "Low-snow years among the record's own, run at every level."),
    ("low-snow-odds", "Chance of a low-snow year by level, and its ratio to the reference's."),
    (
        "medians",
        "Medians of the baseline years by survey and band, and whether they are large enough for percentages.",
    ),
    (
        "named-changes",
        "Cases and projections: what each named warming with its precipitation change comes to.",
    ),
    ("observed-by-year", "The model against observed snow, site by site and water year by water year."),
    ("observed-daily", "Observed and modelled SWE, site by site and day by day."),
    (
        "parameter-spread",
        "What other sets of parameters would have answered, beside warming and precipitation.",
    ),
    (
        "percent-of-median",
        "The record's own years at every level in percent of the baseline's median, and of one that moves.",
    ),
    ("record-odds", "Low-snow odds and low years in a row over resampled records."),
    ("record-range", "Shifts, ratios and chances over resampled records."),
    (
        "record-years",
        "Every measure of the record's own water years at the reference, and why years were left out.",
    ),
    ("replayed-years", "Named years of the record at every level."),
    (
        "response-surface",
        "Every node of warming by precipitation change: medians, changes from the reference.",
    ),
    ("response-surface-bands", "Median SWE of every band at every node of warming by precipitation change."),
    (
        "reservoir-performance",
        "Reliability, resilience and vulnerability of whole realizations by level: quantiles, paired shift, whether warming outweighs.",
    ),
    (
        "rule-changes",
        "The reservoir under other rules, by measure and level, and how much of warming's loss each brings back.",
    ),
    ("rule-panel", "The headline under other rules of the model, each tuned to the same snow first."),
    ("seasonal-outlook", "How well the survey date's snow foretells the window's inflow, by level."),
    ("snow-droughts", "Years of dry and of warm snow drought by level."),
    ("snow-lines", "Elevation of the snow line and of freezing by level, and their rise with warming."),
    (
        "storage",
        "Storage, shortage, spill and releases by measure and level: quantiles over realizations, paired shift, whether warming outweighs.",
    ),
    ("swe-change-by-band", "What every band loses or gains by level, as depth, percent and volume."),
    (
        "swe-through-year",
        "SWE of the basin through the water year by level: quantiles over years and realizations.",
    ),
    ("tails", "Low and high years and their variability, by measure and level."),
    (
        "variance-by-averaging-period",
        "How the variance parts between level, realization and year, for means over several years.",
    ),
    (
        "variance-with-parameters",
        "How the variance parts between level, chance and set of parameters, for means over several years.",
    ),
    ("volumes", "Volumes that 90, 70, 50, 30 and 10 % of years bring at least, by level."),
    ("what-decides", "Correlation of each band's snow with temperature and with precipitation, by level."),
    ("worst-years", "How often years as low as the record's lowest come, by level."),
    (
        "yardsticks",
        "The same shifts against other spreads: other periods, other assumed changes, temperatures held.",
    ),
    (
        "year-classes",
        "Years by the study's own classes of inflow: shares by level, and limits that would keep them.",
    ),
    ("year-types", "Years by fifths of the reference: shares by level, and limits that would keep them."),
];

/// What the table of that name holds; empty for a name that has none.
pub fn about(name: &str) -> &'static str {
    ABOUT.iter().find(|(of, _)| *of == name).map_or("", |(_, holds)| holds)
}
