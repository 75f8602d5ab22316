//! What the sheet asks: which statistics, of which part of the year, and what their numbers count.

use crate::calendar::{MONTHS, MonthDay};
use serde::{Serialize, Serializer};

/// What a statistic is about; statistics of one subject stand together.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Subject {
    /// SWE on the first survey date, modelled at the reference.
    SurveySwe,
    /// Totals of calendar months.
    MonthlyPrecipitation,
    /// Days above the wet-day limit, and days in succession.
    WetDays,
    /// Totals of the cool season and of water years.
    Totals,
    /// Minima of days.
    DailyMinimum,
    /// Maxima of days.
    DailyMaximum,
    /// What wet and warm have to do with each other.
    PrecipitationWithTemperature,
}

impl Subject {
    /// Every subject, in the order in which a reader meets them: first the one that matters.
    pub const ALL: [Self; 7] = [
        Self::SurveySwe,
        Self::MonthlyPrecipitation,
        Self::WetDays,
        Self::Totals,
        Self::DailyMinimum,
        Self::DailyMaximum,
        Self::PrecipitationWithTemperature,
    ];

    /// Its name: `1 April SWE`.
    pub fn name(self, survey: MonthDay) -> String {
        match self {
            Self::SurveySwe => format!("{} SWE", survey.words()),
            Self::MonthlyPrecipitation => "precipitation of months".to_owned(),
            Self::WetDays => "wet days and spells".to_owned(),
            Self::Totals => "precipitation of seasons and years".to_owned(),
            Self::DailyMinimum => "daily minimum temperature".to_owned(),
            Self::DailyMaximum => "daily maximum temperature".to_owned(),
            Self::PrecipitationWithTemperature => "precipitation with temperature".to_owned(),
        }
    }
}

/// What a statistic's numbers count.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Quantity {
    /// A depth of water, mm.
    DepthMm,
    /// A share, 0 to 1.
    Share,
    /// Days.
    Days,
    /// Years.
    Years,
    /// A temperature, degC.
    TemperatureC,
    /// A difference or a spread of temperatures, degC.
    DifferenceC,
    /// A correlation, -1 to 1.
    Correlation,
}

/// A part of the year.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Period {
    /// A calendar month, 0 for January.
    Month(u8),
    /// From the water year's first day up to the first survey date, that day exclusive.
    CoolSeason,
    /// From the first survey date to the water year's end.
    WarmSeason,
    /// All of it.
    WaterYear,
}

impl Period {
    /// `January`, `cool season`.
    pub fn words(self) -> &'static str {
        match self {
            Self::Month(month) => MONTHS[usize::from(month)],
            Self::CoolSeason => "cool season",
            Self::WarmSeason => "warm season",
            Self::WaterYear => "water year",
        }
    }
}

impl Serialize for Period {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_str(&self.words().to_lowercase().replace(' ', "_"))
    }
}

/// A statistic of one series of weather and of the snow that it brings.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Statistic {
    /// Mean over years.
    SweMean,
    /// Standard deviation over years.
    SweDeviation,
    /// 10 % quantile over years.
    SweLow,
    /// Median over years.
    SweMedian,
    /// 90 % quantile over years.
    SweHigh,
    /// Mean over years of the month's total.
    MonthMean,
    /// Standard deviation over years of the month's total.
    MonthDeviation,
    /// Share of days above the wet-day limit.
    WetShare,
    /// Mean length of runs of wet days.
    WetSpell,
    /// Mean length of runs of days that are not wet.
    DrySpell,
    /// Mean over years of the longest run within the year of days that are not wet.
    LongestDrySpell,
    /// Mean of wet days.
    WetMean,
    /// 95 % quantile of wet days.
    WetHigh,
    /// Mean over years of the year's largest day.
    LargestDay,
    /// Mean over years.
    TotalMean,
    /// Standard deviation over years.
    TotalDeviation,
    /// Correlation of a year with the year before it.
    TotalLag1,
    /// Most years in succession below the median of all.
    DryRun,
    /// Mean of daily minima.
    MinimumMean,
    /// Standard deviation of daily minima.
    MinimumDeviation,
    /// Mean of daily maxima.
    MaximumMean,
    /// Standard deviation of daily maxima.
    MaximumDeviation,
    /// Mean temperature of wet days less that of all others.
    WetLessDry,
    /// Correlation over years of total precipitation and mean temperature.
    Correlation,
}

impl Statistic {
    /// What it is about.
    pub fn subject(self) -> Subject {
        match self {
            Self::SweMean | Self::SweDeviation | Self::SweLow | Self::SweMedian | Self::SweHigh => {
                Subject::SurveySwe
            }
            Self::MonthMean | Self::MonthDeviation => Subject::MonthlyPrecipitation,
            Self::WetShare
            | Self::WetSpell
            | Self::DrySpell
            | Self::LongestDrySpell
            | Self::WetMean
            | Self::WetHigh
            | Self::LargestDay => Subject::WetDays,
            Self::TotalMean | Self::TotalDeviation | Self::TotalLag1 | Self::DryRun => Subject::Totals,
            Self::MinimumMean | Self::MinimumDeviation => Subject::DailyMinimum,
            Self::MaximumMean | Self::MaximumDeviation => Subject::DailyMaximum,
            Self::WetLessDry | Self::Correlation => Subject::PrecipitationWithTemperature,
        }
    }

    /// What its numbers count.
    pub fn quantity(self) -> Quantity {
        match self {
            Self::WetShare => Quantity::Share,
            Self::WetSpell | Self::DrySpell | Self::LongestDrySpell => Quantity::Days,
            Self::DryRun => Quantity::Years,
            Self::MinimumMean | Self::MaximumMean => Quantity::TemperatureC,
            Self::MinimumDeviation | Self::MaximumDeviation | Self::WetLessDry => Quantity::DifferenceC,
            Self::TotalLag1 | Self::Correlation => Quantity::Correlation,
            _ => Quantity::DepthMm,
        }
    }

    /// What it is, beside its subject's name.
    pub fn words(self) -> &'static str {
        match self {
            Self::SweMean | Self::MonthMean | Self::TotalMean | Self::MinimumMean | Self::MaximumMean => {
                "mean"
            }
            Self::SweDeviation
            | Self::MonthDeviation
            | Self::TotalDeviation
            | Self::MinimumDeviation
            | Self::MaximumDeviation => "standard deviation",
            Self::SweLow => "10 % quantile",
            Self::SweMedian => "median",
            Self::SweHigh => "90 % quantile",
            Self::WetShare => "share of days that are wet",
            Self::WetSpell => "length of wet spells",
            Self::DrySpell => "length of dry spells",
            Self::LongestDrySpell => "longest dry spell of a year",
            Self::WetMean => "mean of wet days",
            Self::WetHigh => "95 % quantile of wet days",
            Self::LargestDay => "largest day of a year",
            Self::TotalLag1 => "correlation with the year before",
            Self::DryRun => "longest run of dry years",
            Self::WetLessDry => "wet days less dry days",
            Self::Correlation => "correlation over years",
        }
    }
}
