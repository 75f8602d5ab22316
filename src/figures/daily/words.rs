//! What the figure says.

use super::super::Setting;
use super::super::labels::{band, elevation, is_nothing, size_and_unit};
use crate::calendar::{MONTHS, date_of};
use crate::fit::{ObservedAt, Place, PlaceDays, PlaceYear};
use crate::observed::Kind;
use crate::season::SAME_SWE_MM;
use crate::units::UnitSystem;
use chrono::Datelike;

/// Every text of the figure but the panels' labels.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

impl Words {
    pub fn of(days: &PlaceDays, apart: Option<&str>, setting: &Setting<'_>) -> Self {
        let units = setting.units;
        let title = title(days, apart, units);
        let sample = format!("The record as observed, without any warming. {}", observed(days, setting));
        let observed_line = match days.observed.as_ref().map(|observed| observed.kind) {
            None => "",
            Some(Kind::Pillow) => "; dark line: observed, broken where there is no reading",
            Some(Kind::Course) => "; dark dot: a survey, on its own day",
        };
        let key = format!(
            "Blue line: modelled SWE{observed_line}. Bars: snow and rain that fell on the day, on one scale, and on another \
             what melted before any of it froze again. The numbers stand in daily.csv."
        );
        let described = days.years.iter().map(|year| described(year, units)).collect::<Vec<_>>().join("; ");
        Self {
            caption: format!("{sample} {key} Single years of one model: no interval is drawn."),
            alt: format!(
                "{title}. A line of SWE through each year, and bars of snow, rain and melt below it."
            ),
            description: format!("{described}."),
            title,
            sample,
            key,
        }
    }
}

/// `peak SWE 540 mm, 2 May · snow 612 mm · rain 188 mm · melt 590 mm`: a year in numbers.
pub(super) fn year_note(year: &PlaceYear, units: UnitSystem) -> String {
    let [snow, rain, melt] = sums(year).map(|sum_mm| size_and_unit(units, sum_mm));
    let peak = peak(year, units)
        .map_or("no snow lies".to_owned(), |Peak { size, date, .. }| format!("peak SWE {size}, {date}"));
    format!("{peak} \u{b7} snow {snow} \u{b7} rain {rain} \u{b7} melt {melt}")
}

/// `Band 3 (1 800–2 000 m), water year 2011: SWE peaks at 540 mm on 2 May; the highest reading is 512 mm`.
fn title(days: &PlaceDays, apart: Option<&str>, units: UnitSystem) -> String {
    let apart = apart.map_or(String::new(), |ground| format!(", {ground}"));
    let place = match &days.place {
        Place::Basin => "Basin mean".to_owned(),
        Place::Band { number, band: of } => format!("Band {number} ({}{apart})", band(units, of)),
        Place::Site { name, elevation_m } => format!("{name} ({})", height(*elevation_m, units)),
    };
    if let [year] = days.years.as_slice() {
        let found = peak(year, units).map_or("no snow lies".to_owned(), |Peak { size, date, .. }| {
            format!("SWE peaks at {size} on {date}")
        });
        let reading = highest_reading(year).map_or(String::new(), |reading_mm| {
            format!("; the highest reading is {}", size_and_unit(units, reading_mm))
        });
        return format!("{place}, water year {}: {found}{reading}", year.water_year);
    }
    let peak_mm = |year: &&PlaceYear| peak(year, units).map_or(0.0, |peak| peak.swe_mm);
    let by_peak = |a: &&PlaceYear, b: &&PlaceYear| peak_mm(a).total_cmp(&peak_mm(b));
    let [lowest, highest] =
        [days.years.iter().min_by(by_peak), days.years.iter().max_by(by_peak)].map(|year| {
            year.map_or(String::new(), |year| {
                format!("{} ({})", size_and_unit(units, peak_mm(&year)), year.water_year)
            })
        });
    let [first, last] =
        [days.years.first(), days.years.last()].map(|year| year.map_or(0, |year| year.water_year));
    format!("{place}, water years {first} to {last}: SWE peaks between {lowest} and {highest}")
}

/// Whose observed snow is drawn, or why none is.
fn observed(days: &PlaceDays, setting: &Setting<'_>) -> String {
    let (units, is_fitted) = (setting.units, setting.is_fitted);
    let parameters = if is_fitted { "with fitted parameters" } else { "not fitted to it" };
    match (&days.place, &days.observed) {
        (Place::Basin, _) => {
            "The mean of all bands, weighted by area; snow is observed at sites, never of a whole basin."
                .to_owned()
        }
        (Place::Band { .. }, None) => {
            "No site with observed snow lies within the band's elevations.".to_owned()
        }
        (Place::Site { .. }, None) => String::new(),
        (Place::Site { .. }, Some(ObservedAt { kind, .. })) => {
            format!(
                "The model at the elevation of the site, a {}, {parameters}.{}",
                kind.words(),
                unread(days)
            )
        }
        (Place::Band { band, .. }, Some(ObservedAt { site, elevation_m, kind })) => format!(
            "The model at the band's {}; observed at {site} ({}, {}), which lies within the band's elevations.{}",
            height(band.elevation_m, units),
            kind.words(),
            height(*elevation_m, units),
            unread(days)
        ),
    }
}

/// Where a site has no reading in the years that are drawn.
fn unread(days: &PlaceDays) -> &'static str {
    let is_read = days.years.iter().any(|year| highest_reading(year).is_some());
    if is_read { "" } else { " There is no reading of these days." }
}

/// `2011: peak SWE 540 mm, 2 May, snow 612 mm, rain 188 mm, melt 590 mm, highest reading 512 mm`.
fn described(year: &PlaceYear, units: UnitSystem) -> String {
    let reading = highest_reading(year).map_or(String::new(), |reading_mm| {
        format!(", highest reading {}", size_and_unit(units, reading_mm))
    });
    let note = year_note(year, units).replace(" \u{b7}", ",");
    format!("{}: {note}{reading}", year.water_year)
}

/// A year's highest modelled SWE.
struct Peak {
    swe_mm: f64,
    size: String,
    date: String,
}

/// The peak of a year and its first day; none where no snow is worth a word.
fn peak(year: &PlaceYear, units: UnitSystem) -> Option<Peak> {
    let mut peak: (usize, f64) = (0, 0.0);
    for (day, pair) in year.swe.iter().enumerate() {
        if pair.modelled_mm > peak.1 + SAME_SWE_MM {
            peak = (day, pair.modelled_mm);
        }
    }
    let (day, swe_mm) = peak;
    let date = date_of(year.first, day + 1);
    (!is_nothing(units, swe_mm)).then(|| Peak {
        swe_mm,
        size: size_and_unit(units, swe_mm),
        date: format!("{} {}", date.day(), MONTHS[date.month0() as usize]),
    })
}

fn highest_reading(year: &PlaceYear) -> Option<f64> {
    year.swe.iter().filter_map(|pair| pair.observed_mm).reduce(f64::max)
}

/// Snow, rain and melt of the year, mm.
fn sums(year: &PlaceYear) -> [f64; 3] {
    [&year.snow_mm, &year.rain_mm, &year.melt_mm].map(|days| days.iter().sum())
}

fn height(elevation_m: f64, units: UnitSystem) -> String {
    format!("{} {}", elevation(units, elevation_m), units.elevation().word)
}
