//! How the intervals of `summary.json` are made: one text a kind, found by the names of keys on the way to it.

use serde::Serialize;

/// All kinds, and how to find the one of an interval.
#[derive(Debug, Clone, Copy, Serialize)]
pub(super) struct Methods {
    how_to_find: &'static str,
    kinds: &'static [Method],
}

/// One kind of interval.
#[derive(Debug, Clone, Copy, Serialize)]
pub(super) struct Method {
    /// Keys, or several in a row with dots between, of which one stands on the way to every interval of the kind.
    keys: &'static [&'static str],
    /// What its ends are, of what, and how they are found.
    says: &'static str,
}

/// Every kind. Resamples draw whole realizations again, with replacement, from the study's seed; the same draws for all numbers.
pub(super) const METHODS: Methods = Methods {
    how_to_find: "of the kinds with a key on the way to an interval, the one whose key ends nearest to it, and of these the longest; \
                  an object with value, q05 and q95 counts as a key of that name just before its ends",
    kinds: KINDS,
};

const KINDS: &[Method] = &[
    Method {
        keys: &["monte_carlo_error"],
        says: "one standard deviation over 400 resamples of whole realizations (bootstrap), over 40 of them for bands, \
               exceeded volumes and detection; none where a resample has no number, or of a single realization. Only realizations are \
               resampled: the record's own uncertainty stands under record_range and record_odds",
    },
    Method {
        keys: &["value, q05 and q95"],
        says: "q05 and q95 beside a value: 5 and 95 % quantiles of that value over 400 resamples of whole realizations (percentile \
               bootstrap); none where a resample has no number",
    },
    Method {
        keys: &["outweighs_range", "fails_range", "leaves_spread_range", "offset"],
        says: "5 and 95 % quantiles of the first crossing over resamples of whole realizations; an end is none where it is not reached \
               up to the highest level; falls_back_share is the share of resamples that fall back above",
    },
    Method {
        keys: &["break_even.range_pct"],
        says: "5 and 95 % quantiles over 400 resamples of the precipitation at which the resampled median is back at the resampled \
               reference, by straight lines between the grid's nodes, moved by what these miss of the value, which is a root found on runs \
               to 0.01 %; an end is none beyond the grid",
    },
    Method {
        keys: &["record_range", "record_range.levels.shift", "record_range.outweighs", "record_odds"],
        says: "5 and 95 % quantiles over generators made anew from 20 resampled records, the record's own uncertainty; the few \
               realizations of each add some Monte Carlo error. Under record_odds they are moved together until their median is the \
               study's own number",
    },
    Method {
        keys: &["bound"],
        says: "where none of n realizations has it, the one-sided 95 % bound on its chance from above, 1 - 0.05^(1/n); where all have \
               it, from below, 0.05^(1/n)",
    },
    Method {
        keys: &["wilson_95", "low_95", "high_95"],
        says: "95 % intervals of the record's own years: of a share after Wilson (1927), of a ratio of chances after Katz et al. \
               (1978), which takes the two counts for independent",
    },
    Method {
        keys: &["interval_95_per_year"],
        says: "95 % interval of the Theil-Sen slope of the record, from the order statistics of the slopes of pairs",
    },
    Method {
        keys: &[
            "periods",
            "single_years",
            "shift",
            "precipitation_spread",
            "weather_spread",
            "spread",
            "driest_and_wettest",
            "swe_through_year",
            "tails",
            "band_change",
            "volume_range_hm3",
            "snow_line_range",
        ],
        says: "no uncertainty of a number but a spread that is there: quantiles over realizations (of single_years, weather_spread \
               and tails over single years of all realizations; of swe_through_year over years and realizations)",
    },
    Method {
        keys: &[
            "signal_to_spread_range",
            "snow_line_resampled",
            "snow_line_rise_resampled_m_per_c",
            "volume_resampled_hm3",
            "volume_share_resampled",
            "crossover",
        ],
        says: "5 and 95 % quantiles over 400 resamples of whole realizations; of an elevation an end is none where it lies outside the bands",
    },
    Method {
        keys: &["generator"],
        says: "range of a statistic: 5 and 95 % quantiles over realizations as long as the record, which the record's own number is held \
               against",
    },
    Method {
        keys: &["parameter_spread", "rule_panel"],
        says: "lowest and highest over sets of parameters, or over rules that were tuned: these are chosen, not drawn, so that the \
               range is none of chances",
    },
];
