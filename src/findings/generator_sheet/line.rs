//! What the sheet asks: which statistics, of which part of the year, and what their numbers count.

use crate::calendar::{MONTHS, MonthDay};
use serde::{Serialize, Serializer};

/// What a statistic is about; statistics of one subject stand together.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
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

    /// Its name in tables.
    pub fn name(self) -> &'static str {
        match self {
            Self::SurveySwe => "survey_swe",
            Self::MonthlyPrecipitation => "monthly_precipitation",
            Self::WetDays => "wet_days",
            Self::Totals => "precipitation_totals",
            Self::DailyMinimum => "daily_minimum",
            Self::DailyMaximum => "daily_maximum",
            Self::PrecipitationWithTemperature => "precipitation_with_temperature",
        }
    }

    /// Its name in words: `1 April SWE`.
    pub fn words(self, survey: MonthDay) -> String {
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

impl Serialize for Subject {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_str(self.name())
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

    /// Its name in tables: `january`, `cool_season`.
    pub fn name(self) -> String {
        self.words().to_lowercase().replace(' ', "_")
    }
}

impl Serialize for Period {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_str(&self.name())
    }
}

/// A statistic of one series of weather and of the snow that it brings.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
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
    /// The driest year.
    TotalLowest,
    /// The wettest year.
    TotalHighest,
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

/// What there is to know of a statistic.
struct Known {
    subject: Subject,
    quantity: Quantity,
    name: &'static str,
    words: &'static str,
}

impl Statistic {
    fn known(self) -> Known {
        use Quantity::{Correlation, Days, DepthMm, DifferenceC, Share, TemperatureC, Years};
        use Subject::{
            DailyMaximum, DailyMinimum, MonthlyPrecipitation, PrecipitationWithTemperature, SurveySwe,
            Totals, WetDays,
        };
        let known = |subject, quantity, name, words| Known { subject, quantity, name, words };
        match self {
            Self::SweMean => known(SurveySwe, DepthMm, "survey_swe_mean", "mean"),
            Self::SweDeviation => {
                known(SurveySwe, DepthMm, "survey_swe_standard_deviation", "standard deviation")
            }
            Self::SweLow => known(SurveySwe, DepthMm, "survey_swe_q10", "10 % quantile"),
            Self::SweMedian => known(SurveySwe, DepthMm, "survey_swe_q50", "median"),
            Self::SweHigh => known(SurveySwe, DepthMm, "survey_swe_q90", "90 % quantile"),
            Self::MonthMean => known(MonthlyPrecipitation, DepthMm, "month_mean", "mean"),
            Self::MonthDeviation => {
                known(MonthlyPrecipitation, DepthMm, "month_standard_deviation", "standard deviation")
            }
            Self::WetShare => known(WetDays, Share, "wet_day_share", "share of days that are wet"),
            Self::WetSpell => known(WetDays, Days, "wet_spell_mean_length", "mean length of wet spells"),
            Self::DrySpell => known(WetDays, Days, "dry_spell_mean_length", "mean length of dry spells"),
            Self::LongestDrySpell => {
                known(WetDays, Days, "longest_dry_spell_mean", "longest dry spell of a year")
            }
            Self::WetMean => known(WetDays, DepthMm, "wet_day_mean", "mean of wet days"),
            Self::WetHigh => known(WetDays, DepthMm, "wet_day_q95", "95 % quantile of wet days"),
            Self::LargestDay => known(WetDays, DepthMm, "largest_day_mean", "largest day of a year"),
            Self::TotalMean => known(Totals, DepthMm, "total_mean", "mean"),
            Self::TotalDeviation => known(Totals, DepthMm, "total_standard_deviation", "standard deviation"),
            Self::TotalLowest => known(Totals, DepthMm, "total_driest", "driest of the years"),
            Self::TotalHighest => known(Totals, DepthMm, "total_wettest", "wettest of the years"),
            Self::TotalLag1 => {
                known(Totals, Correlation, "total_lag1_correlation", "correlation with the year before")
            }
            Self::DryRun => known(Totals, Years, "dry_years_in_succession", "longest run of dry years"),
            Self::MinimumMean => known(DailyMinimum, TemperatureC, "tmin_mean", "mean"),
            Self::MinimumDeviation => {
                known(DailyMinimum, DifferenceC, "tmin_standard_deviation", "standard deviation")
            }
            Self::MaximumMean => known(DailyMaximum, TemperatureC, "tmax_mean", "mean"),
            Self::MaximumDeviation => {
                known(DailyMaximum, DifferenceC, "tmax_standard_deviation", "standard deviation")
            }
            Self::WetLessDry => known(
                PrecipitationWithTemperature,
                DifferenceC,
                "wet_less_dry_temperature",
                "wet days less dry days",
            ),
            Self::Correlation => known(
                PrecipitationWithTemperature,
                Correlation,
                "precipitation_temperature_correlation",
                "correlation over years",
            ),
        }
    }

    /// What it is about.
    pub fn subject(self) -> Subject {
        self.known().subject
    }

    /// What its numbers count.
    pub fn quantity(self) -> Quantity {
        self.known().quantity
    }

    /// Its name in tables.
    pub fn name(self) -> &'static str {
        self.known().name
    }

    /// What it is, beside its subject's name.
    pub fn words(self) -> &'static str {
        self.known().words
    }
}

impl Serialize for Statistic {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_str(self.name())
    }
}
