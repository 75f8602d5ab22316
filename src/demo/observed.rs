//! The invented snow site's file: what people or a pillow would have read, with their errors.

use super::errors::Factors;
use super::place::{Hole, Place};
use super::snow_site::{SnowSite, Visits};
use super::weather::draw;
use crate::calendar::days_between;
use crate::perturb::stream;
use crate::snow::OpenLedger;
use chrono::{Datelike, NaiveDate, TimeDelta};
use rand::RngExt;
use std::fmt::Write;

/// Stream of the days on which visits are made.
const VISITS_STREAM: u32 = 0;

/// The readings of a place's snow site as a text table: a pillow's line a day, a course's line a visit that was made.
///
/// # Errors
/// A ledger that does not close in the run that the readings are made of.
pub fn table(place: &Place, site: &SnowSite) -> Result<String, OpenLedger> {
    let layout = &place.layout;
    let mut text = format!(
        "{remark} {site}, {elevation}, in the basin of {basin}: INVENTED for a demo; no such site exists\n\
         {remark} a snow model's run on invented weather with random errors put on; do not use these numbers for \
         anything real\n\
         {remark} {columns}\n\
         {header}\n",
        remark = layout.remark,
        site = site.name,
        elevation = layout.elevation(site.elevation_m),
        basin = place.basin,
        columns = layout.swe_remark,
        header = layout.swe_header,
    );
    for (date, read_mm) in readings(place, site)? {
        let is_lost = place.is_lost(date, &[Hole::SnowWater]);
        let has_line = matches!(site.visits, Visits::Daily) || !is_lost;
        if has_line {
            let cell = layout.cell(layout.depth(read_mm), layout.swe_decimals, is_lost);
            let _ = writeln!(text, "{},{cell}", layout.date(date));
        }
    }
    Ok(text)
}

/// Every visit's date and what was read on it, mm. A lost reading takes its draws, too.
fn readings(place: &Place, site: &SnowSite) -> Result<Vec<(NaiveDate, f64)>, OpenLedger> {
    let days = draw(place);
    let swe_mm = site.swe_mm(place, &days)?;
    let mut factors = Factors::new(place, &site.errors);
    let mut readings = Vec::new();
    for date in visits(place, site) {
        let at = days_between(days[0].date, date);
        readings.push((date, (swe_mm[at] * factors.next(date)).max(0.0)));
    }
    Ok(readings)
}

/// The days on which the site is measured, in order.
fn visits(place: &Place, site: &SnowSite) -> Vec<NaiveDate> {
    match site.visits {
        Visits::Daily => place.dates().collect(),
        Visits::Monthly { months, scatter_days } => {
            let mut random = stream(site.errors.seed, VISITS_STREAM);
            let firsts = place.dates().filter(|date| date.day() == 1 && months.contains(&date.month()));
            firsts
                .map(|date| {
                    let choices = f64::from(2 * scatter_days + 1);
                    let chosen = (random.random::<f64>() * choices).floor() as i64;
                    date + TimeDelta::days(chosen - i64::from(scatter_days))
                })
                .collect()
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::demo::{alder_fork, tamsin_river};
    use crate::table::{DateColumn, DateReader, Format, Table, Tally};

    /// Dates and cells of a snow site's file, read as any table is.
    fn read(text: &str, date: &str, form: &str, swe: &str, format: &Format) -> Vec<(NaiveDate, Option<f64>)> {
        let column = DateColumn { columns: vec![date.to_owned()], format: form.to_owned() };
        let table = Table::open("snow.csv", text, format).unwrap();
        let mut dates = DateReader::new(&table, &column).unwrap();
        let swe = table.column(swe).unwrap();
        let mut tally = Tally::default();
        let rows: Vec<_> = table.rows().map(Result::unwrap).collect();
        let read = rows
            .iter()
            .map(|row| (dates.read(&table, row, &mut tally).unwrap(), table.number(row, swe).unwrap()));
        read.collect()
    }

    /// Readings over what was there, on days with at least 50 mm; rounding moves them by 2 % at most.
    fn factors(place: &Place, site: &SnowSite, read_mm: &[(NaiveDate, Option<f64>)]) -> Vec<(i32, f64)> {
        let days = draw(place);
        let true_mm = site.swe_mm(place, &days).unwrap();
        let known = read_mm.iter().filter_map(|(date, read_mm)| read_mm.map(|read_mm| (date, read_mm)));
        known
            .map(|(date, read_mm)| (date, read_mm, true_mm[days_between(days[0].date, *date)]))
            .filter(|(_, _, true_mm)| *true_mm >= 50.0)
            .map(|(date, read_mm, true_mm)| {
                let began = date.year() - i32::from(*date < place.start_in(date.year()));
                (began, read_mm / true_mm)
            })
            .collect()
    }

    /// Mean and standard deviation of the years' mean factors, 1 and 0.06 as the sites declare. Their standard errors
    /// over forty years are 0.06/sqrt(40) = 0.0095 and 0.06/sqrt(78) = 0.0068; three of them are allowed.
    fn hold_to_declared_errors(factors: &[(i32, f64)]) {
        let years: Vec<f64> = factors
            .chunk_by(|(a, _), (b, _)| a == b)
            .map(|year| year.iter().map(|(_, factor)| factor).sum::<f64>() / year.len() as f64)
            .collect();
        let count = years.len() as f64;
        let mean = years.iter().sum::<f64>() / count;
        let variance =
            years.iter().map(|factor| (factor - mean) * (factor - mean)).sum::<f64>() / (count - 1.0);
        assert!(years.len() >= 39 && (mean - 1.0).abs() < 0.03, "{count} years, mean factor {mean}");
        assert!((variance.sqrt() - 0.06).abs() < 0.021, "standard deviation {}", variance.sqrt());
    }

    #[test]
    fn the_course_is_surveyed_about_the_first_of_the_month() {
        let (place, site) = (&alder_fork::PLACE, &alder_fork::SNOW_SITE);
        let surveys = read(&table(place, site).unwrap(), "date", "%Y-%m-%d", "swe_mm", &Format::default());
        assert_eq!(surveys.len(), 40 * 5 - 9, "nine were not made");
        let days_from_the_first = |date: NaiveDate| {
            let first = date.with_day(1).unwrap();
            let next = (first + TimeDelta::days(31)).with_day(1).unwrap();
            if date.day() <= 15 { (date - first).num_days() } else { (date - next).num_days() }
        };
        let mut came: Vec<i64> = surveys.iter().map(|(date, _)| days_from_the_first(*date)).collect();
        came.sort_unstable();
        came.dedup();
        assert_eq!(
            came,
            [-3, -2, -1, 0, 1, 2, 3],
            "they come on each of these days at times, and on no other"
        );
        assert!(surveys.windows(2).all(|pair| pair[0].0 < pair[1].0));
        assert!(surveys.iter().all(|(_, read_mm)| read_mm.is_some_and(|read_mm| read_mm >= 0.0)));
        hold_to_declared_errors(&factors(place, site, &surveys));
    }

    #[test]
    fn the_pillow_is_read_every_day_but_for_its_gaps() {
        let (place, site) = (&tamsin_river::PLACE, &tamsin_river::SNOW_SITE);
        let format = Format { comment: Some(b'!'), missing: vec!["M".to_owned()], ..Format::default() };
        let text = table(place, site).unwrap();
        let inches = read(&text, "Day", "%m/%d/%Y", "Water in the snow (in)", &format);
        let days: Vec<NaiveDate> = inches.iter().map(|(date, _)| *date).collect();
        assert_eq!(days, place.dates().collect::<Vec<_>>());
        assert_eq!(inches.iter().filter(|(_, read_in)| read_in.is_none()).count(), 21);
        let read_mm: Vec<_> =
            inches.iter().map(|(date, read_in)| (*date, read_in.map(|read_in| read_in * 25.4))).collect();
        assert!(read_mm.iter().all(|(_, read_mm)| read_mm.is_none_or(|read_mm| read_mm >= 0.0)));
        hold_to_declared_errors(&factors(place, site, &read_mm));
        let mean_mm = |month: u32| {
            let of_month = read_mm.iter().filter(|(date, _)| date.month() == month);
            let values: Vec<f64> = of_month.filter_map(|(_, read_mm)| *read_mm).collect();
            values.iter().sum::<f64>() / values.len() as f64
        };
        assert!(mean_mm(9) > 300.0 && mean_mm(2) < 1.0, "the south has its snow in September");
    }
}
