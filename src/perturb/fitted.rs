//! What a generator took from its record, to be told.

use serde::Serialize;

/// How many days before it a day's chance of being wet hangs on.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum ChainOrder {
    /// The day before.
    First,
    /// The two days before.
    Second,
}

/// The law of what falls on a wet day.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(rename_all = "kebab-case", tag = "law")]
pub enum AmountLaw {
    /// Gamma, cut off at the wet-day threshold.
    Gamma {
        /// Shape.
        shape: f64,
        /// Scale, mm.
        scale_mm: f64,
    },
    /// What lies above the wet-day threshold is exponential with one of two means.
    MixedExponential {
        /// Share of the days with the smaller mean, 0 to 1.
        smaller_share: f64,
        /// The smaller mean, mm.
        smaller_mean_mm: f64,
        /// The larger mean, mm.
        larger_mean_mm: f64,
    },
}

/// A month as it was fitted.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct FittedMonth {
    /// Order of its chain of wet and dry days.
    pub chain_order: ChainOrder,
    /// Law of its wet amounts.
    #[serde(flatten)]
    pub amounts: AmountLaw,
}

/// What was fitted.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Fitted {
    /// A day counts as wet above this, mm: as stated, or half of the smallest amount that the gauge tells.
    pub wet_above_mm: f64,
    /// January first.
    pub months: [FittedMonth; 12],
    /// Standard deviation of a month's own draw, added to the logarithm of the odds of its wet days.
    pub wet_month_spread: f64,
}
