//! How the invented agencies write their files: one as simply as can be, the other as files often come.

use crate::units::{AreaUnit, LengthUnit};
use chrono::NaiveDate;

/// The looks of an agency's files.
#[derive(Debug)]
pub struct Layout {
    /// Begins every remark above a header, except in the area-elevation table.
    pub remark: &'static str,
    /// The form of dates, in the signs of `strftime`.
    date_form: &'static str,
    /// Stands where nothing was measured.
    pub not_measured: &'static str,
    /// Units of all files.
    units: Units,
    /// What the precipitation column holds.
    pub gauge: Gauge,
    /// Decimals of the precipitation column.
    pub precipitation_decimals: u32,
    /// Decimals of the water in the snow.
    pub swe_decimals: u32,
    /// What the weather columns hold, in a remark.
    pub weather_remark: &'static str,
    /// Names of the weather columns.
    pub weather_header: &'static str,
    /// What the columns of a snow site hold, in a remark.
    pub swe_remark: &'static str,
    /// Names of the columns of a snow site.
    pub swe_header: &'static str,
    /// Units of the area-elevation table, in a remark.
    pub bands_remark: &'static str,
    /// Names of the columns of the area-elevation table.
    pub bands_header: &'static str,
    /// Unit of its elevations.
    pub elevation_unit: LengthUnit,
    /// Unit of its areas.
    pub area_unit: AreaUnit,
}

/// Units of an agency.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Units {
    /// degC, mm, m.
    Metric,
    /// degF, inches, feet.
    Us,
}

/// What a precipitation column holds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Gauge {
    /// Each day's amount.
    Daily,
    /// What had come since the water year began, as the day ends.
    SinceWaterYearBegan,
}

impl Layout {
    /// Metric units, a day's own amounts, short names, ISO dates.
    pub const METRIC: Self = Self {
        remark: "#",
        date_form: "%Y-%m-%d",
        not_measured: "",
        units: Units::Metric,
        gauge: Gauge::Daily,
        precipitation_decimals: 1,
        swe_decimals: 0,
        weather_remark: "daily minimum and maximum in degC, daily precipitation as caught by the gauge in mm, empty: \
                         not measured",
        weather_header: "date,tmin_c,tmax_c,precip_mm",
        swe_remark: "snow water equivalent in mm as the day of the survey begins",
        swe_header: "date,swe_mm",
        bands_remark: "elevations in m, areas in km2",
        bands_header: "lower_m,upper_m,area_km2",
        elevation_unit: LengthUnit::Metre,
        area_unit: AreaUnit::SquareKilometre,
    };

    /// US units, an accumulating gauge, long names with blanks in them, American dates.
    pub const US: Self = Self {
        remark: "!",
        date_form: "%m/%d/%Y",
        not_measured: "M",
        units: Units::Us,
        gauge: Gauge::SinceWaterYearBegan,
        precipitation_decimals: 2,
        swe_decimals: 1,
        weather_remark: "daily minimum and maximum in degF; inches in the gauge as the day ends, emptied as 1 April \
                         begins; M: not measured",
        weather_header: "Day,Lowest of the day (degF),Highest of the day (degF),In the gauge at midnight (in)",
        swe_remark: "snow water equivalent in inches as the day begins; M: not measured",
        swe_header: "Day,Water in the snow (in)",
        bands_remark: "elevations in feet, areas in square miles",
        bands_header: "lower_ft,upper_ft,area_mi2",
        elevation_unit: LengthUnit::Foot,
        area_unit: AreaUnit::SquareMile,
    };

    /// A date as the agency writes it.
    pub fn date(&self, date: NaiveDate) -> String {
        date.format(self.date_form).to_string()
    }

    /// A temperature of `value_c` degC in the agency's unit.
    pub fn temperature(&self, value_c: f64) -> f64 {
        match self.units {
            Units::Metric => value_c,
            Units::Us => value_c * 1.8 + 32.0,
        }
    }

    /// A depth of water of `value_mm` mm in the agency's unit.
    pub fn depth(&self, value_mm: f64) -> f64 {
        match self.units {
            Units::Metric => value_mm,
            Units::Us => value_mm / 25.4,
        }
    }

    /// An elevation with its unit.
    pub fn elevation(&self, value_m: f64) -> String {
        match self.units {
            Units::Metric => format!("{value_m:.0} m"),
            Units::Us => format!("{:.0} feet", value_m / 0.3048),
        }
    }

    /// A cell of so many decimals, never `-0`; the mark for what was not measured where it was lost.
    pub fn cell(&self, value: f64, decimals: u32, is_lost: bool) -> String {
        if is_lost {
            return self.not_measured.to_owned();
        }
        let scale = f64::from(10_u32.pow(decimals));
        format!("{:.*}", decimals as usize, (value * scale).round() / scale + 0.0)
    }
}
