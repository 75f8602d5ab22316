//! What `--draw-years` and `--draw-band` ask for: some water years of one place, to be drawn.

use super::super::failure::Failure;
use super::super::ready::{Ready, quoted};
use crate::basin::told_apart;
use crate::figures::MOST_YEARS_OF_DAYS;
use crate::fit::{Model, ObservedAt, Place, PlaceDays, Site, place_years, site_lanes};
use crate::snow::{Lanes, OpenLedger};
use std::ops::RangeInclusive;
use std::str::FromStr;

/// What was typed.
#[derive(Debug, Clone)]
pub(in super::super) struct Asked {
    pub years: WaterYears,
    /// The basin mean where it was left out.
    pub place: Option<String>,
}

/// Water years in a row: `2011`, `2010-2012`.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(in super::super) struct WaterYears(RangeInclusive<i32>);

impl FromStr for WaterYears {
    type Err = String;

    fn from_str(text: &str) -> Result<Self, String> {
        let year = |text: &str| {
            let is_year = text.len() == 4 && text.bytes().all(|byte| byte.is_ascii_digit());
            let year = text.parse().ok().filter(|_| is_year);
            year.ok_or_else(|| format!("'{text}' is not a water year of four digits; 2011 or 2010-2012"))
        };
        let (first, last) = text.split_once('-').unwrap_or((text, text));
        let (first, last) = (year(first)?, year(last)?);
        if first > last {
            return Err(format!("{first} comes after {last}; write {last}-{first}"));
        }
        Ok(Self(first..=last))
    }
}

impl WaterYears {
    fn words(&self) -> String {
        match (self.0.start(), self.0.end()) {
            (first, last) if first == last => first.to_string(),
            (first, last) => format!("{first}-{last}"),
        }
    }
}

/// A place and years that there are.
pub(in super::super) struct Picture<'r> {
    ready: &'r Ready,
    /// The years that were asked for and are in use.
    years: Vec<i32>,
    /// The years that were asked for and are not.
    not_in_use: Vec<i32>,
    place: Place,
    /// What of its ground tells a band from the others of its range.
    apart: Option<String>,
    /// The site whose observed snow is drawn.
    site: Option<Site<'r>>,
    flags: String,
}

impl<'r> Picture<'r> {
    /// Checks what was asked for against the record, the bands and the sites.
    pub fn of(asked: &Asked, ready: &'r Ready) -> Result<Self, Failure> {
        let [years, not_in_use] = years_in_use(&asked.years, ready)?;
        let (place, site) = place_of(asked.place.as_deref(), ready)?;
        let apart = match &place {
            Place::Band { number, .. } => told_apart(&ready.basin.bands).swap_remove(number - 1),
            Place::Basin | Place::Site { .. } => None,
        };
        let flag =
            asked.place.as_deref().map_or(String::new(), |place| format!(" --draw-band {}", quoted(place)));
        let flags = format!(" --draw-years {}{flag}", asked.years.words());
        Ok(Self { ready, years, not_in_use, place, apart, site, flags })
    }

    /// The flags that ask for it again.
    pub fn flags(&self) -> &str {
        &self.flags
    }

    /// What of its ground tells the band that is drawn from the others of its range.
    pub fn apart(&self) -> Option<&str> {
        self.apart.as_deref()
    }

    /// Which of the years that were asked for are not drawn; none where all are.
    pub fn left_out(&self) -> Option<String> {
        let years = runs(&self.not_in_use);
        match self.not_in_use.len() {
            0 => None,
            1 => Some(format!("not drawn, since it is not in use: water year {years}\n")),
            _ => Some(format!("not drawn, since they are not in use: water years {years}\n")),
        }
    }

    /// The site's name and a lane at its elevation, where a site is drawn.
    pub fn lanes_of_site(&self) -> Option<(&'r str, Lanes)> {
        let site = self.site.filter(|_| matches!(self.place, Place::Site { .. }))?;
        let scenario = &self.ready.scenario;
        let model = Model {
            basin: &self.ready.basin,
            station_m: scenario.weather.station_elevation_m,
            snow: &scenario.snow,
            weather: &self.ready.weather,
            season: &scenario.season,
        };
        Some((site.name, site_lanes(&[site], &model)))
    }

    /// Runs the record over the bands' lanes, or over the site's, and takes the days.
    pub fn days(&self, bands: &Lanes, of_site: Option<&Lanes>) -> Result<PlaceDays, OpenLedger> {
        let observations = self.site.map(|site| site.observations);
        let is_taken = |water_year: i32| self.years.contains(&water_year);
        let lanes = of_site.unwrap_or(bands);
        let years = place_years(lanes, &self.place, &self.ready.weather, is_taken, observations)?;
        let observed = self.site.map(|site| ObservedAt {
            site: site.name.to_owned(),
            elevation_m: site.elevation_m,
            kind: site.observations.kind,
        });
        Ok(PlaceDays { place: self.place.clone(), observed, years })
    }
}

/// The years that are in use, if there are some and not too many, and those that are not.
fn years_in_use(asked: &WaterYears, ready: &Ready) -> Result<[Vec<i32>; 2], Failure> {
    let in_use: Vec<i32> = ready.weather.years.iter().map(|year| year.water_year).collect();
    let (drawn, missing): (Vec<i32>, Vec<i32>) = asked.0.clone().partition(|year| in_use.contains(year));
    let complain =
        |what: String| Err(Failure::CommandLine(format!("--draw-years {}: {what}", asked.words())));
    let count = drawn.len();
    if count > MOST_YEARS_OF_DAYS {
        return complain(format!("{count} water years; at most {MOST_YEARS_OF_DAYS} fit into one figure"));
    }
    match missing.as_slice() {
        _ if count > 0 => Ok([drawn, missing]),
        [one] => complain(format!("water year {one} is not in use; in use are {}", runs(&in_use))),
        several => {
            complain(format!("none of water years {} is in use; in use are {}", runs(several), runs(&in_use)))
        }
    }
}

/// `1992-2015, 2017`: years in ascending order, those in a row put together.
fn runs(years: &[i32]) -> String {
    let runs = years.chunk_by(|year, next| next - year == 1);
    let words = runs.map(|run| match run {
        [first, .., last] => format!("{first}-{last}"),
        alone => alone.iter().map(i32::to_string).collect(),
    });
    words.collect::<Vec<String>>().join(", ")
}

/// The place, and the site whose observed snow belongs to it: the site itself, or the one nearest to where a band is
/// run among those that lie within the band.
fn place_of<'r>(asked: Option<&str>, ready: &'r Ready) -> Result<(Place, Option<Site<'r>>), Failure> {
    let bands = &ready.basin.bands;
    let asked = asked.unwrap_or("basin");
    if asked == "basin" {
        return Ok((Place::Basin, None));
    }
    let number = asked.parse::<usize>().ok().filter(|number| (1..=bands.len()).contains(number));
    if let Some(number) = number {
        let band = bands[number - 1];
        let off = |site: &Site<'_>| (site.elevation_m - band.elevation_m).abs();
        let within = ready
            .sites()
            .into_iter()
            .filter(|site| (band.lower_m..=band.upper_m).contains(&site.elevation_m));
        let site = within.min_by(|a, b| off(a).total_cmp(&off(b)));
        return Ok((Place::Band { number, band }, site));
    }
    let site = ready.sites().into_iter().find(|site| site.name == asked).ok_or_else(|| {
        let names: Vec<String> = ready.sites().iter().map(|site| format!("'{}'", site.name)).collect();
        let sites = if names.is_empty() {
            "the scenario has no site with observed snow".to_owned()
        } else {
            format!("or a site with observed snow: {}", names.join(", "))
        };
        Failure::CommandLine(format!(
            "--draw-band '{asked}' is no place of the basin; expected basin, a band from 1, the lowest, to {}; {sites}",
            bands.len()
        ))
    })?;
    Ok((Place::Site { name: site.name.to_owned(), elevation_m: site.elevation_m }, Some(site)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn years_are_read_one_or_from_to() {
        assert_eq!("2011".parse(), Ok(WaterYears(2011..=2011)));
        assert_eq!("2010-2012".parse(), Ok(WaterYears(2010..=2012)));
        for wrong in ["", "11", "2010-", "-2010", "2010-12", "2010-2011-2012", "+201", "2010, 2011"] {
            assert!(wrong.parse::<WaterYears>().is_err(), "{wrong}");
        }
        assert_eq!(
            "2012-2010".parse::<WaterYears>(),
            Err("2012 comes after 2010; write 2010-2012".to_owned())
        );
    }

    #[test]
    fn years_in_a_row_are_put_together() {
        assert_eq!(runs(&[1990, 1992, 1993, 1994, 1996, 1997]), "1990, 1992-1994, 1996-1997");
    }
}
