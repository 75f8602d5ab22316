//! The daily table: states and fluxes of every band and the basin on every day of the record.

use crate::calendar::date_of;
use crate::snow::{Detail, Engine, Lanes, OpenLedger, YearBlock};
use crate::weather::{Series, YearSpan, YearView};
use std::io::{self, Write};
use thiserror::Error;

/// Columns that every table has, in order. Fluxes are the day's, states stand at its end.
const HEADER: &str = "date,band,tmean_c,rain_mm,snow_mm,melt_mm,refreeze_mm,outflow_mm,bare_ground_rain_mm,ice_mm,\
                      liquid_mm,swe_mm";

/// Why a daily table could not be written.
#[derive(Debug, Error)]
pub enum DailyError {
    /// The engine lost or made water.
    #[error(transparent)]
    Ledger(#[from] OpenLedger),
    /// The table's reader or disk.
    #[error(transparent)]
    Write(#[from] io::Error),
}

/// What a column that an option adds is taken of.
#[derive(Clone, Copy)]
enum Added {
    /// A row of lanes of the detail.
    Detail(fn(&Detail) -> &[f64]),
    /// The share of the ground that the snow covers as the day ends.
    Covered,
    /// Snow that went into the air.
    Sublimation,
    /// The wet bulb's temperature; none on a dry day, when nothing is told apart.
    WetBulb,
    /// What a degree melts on the day.
    MeltFactor,
}

/// Columns that the options add, behind the others.
fn added(lanes: &Lanes) -> Vec<(&'static str, Added)> {
    let mut columns = Vec::new();
    if lanes.has_patches() {
        columns.push(("covered_share", Added::Covered));
    }
    if lanes.has_cold_content() {
        columns.push(("cold_content_mm", Added::Detail(|detail| &detail.cold_mm)));
    }
    if lanes.has_sublimation() {
        columns.push(("sublimation_mm", Added::Sublimation));
    }
    if lanes.has_wet_bulb() {
        columns.push(("wet_bulb_c", Added::WetBulb));
    }
    if lanes.has_ground() {
        columns.push(("melt_factor_mm_per_c_day", Added::MeltFactor));
    }
    columns
}

/// Runs the record and writes its days: bands by their number from the lowest, 1, then the basin mean, area-weighted,
/// then a site by its name, where one is given with a lane of its own.
///
/// Numbers are written in the shortest form that reads back exactly. `lanes` holds one group: the bands. Years after a
/// gap start bare. Options add columns behind those that every table has.
///
/// # Errors
/// A ledger that does not close, or what `into` says.
pub fn daily_csv(
    lanes: &Lanes,
    site: Option<(&str, &Lanes)>,
    weather: &Series,
    into: &mut impl Write,
) -> Result<(), DailyError> {
    let mut engine = Engine::new(lanes, true);
    let mut site =
        site.map(|(name, lanes)| AtSite { name: cell(name), lanes, engine: Engine::new(lanes, true) });
    let added = added(lanes);
    write!(into, "{HEADER}")?;
    for (name, _) in &added {
        write!(into, ",{name}")?;
    }
    writeln!(into)?;
    engine.years(weather, |span, block| {
        let view = weather.view(span);
        let at_site = match &mut site {
            Some(site) => Some(site.year(span, view)?),
            None => None,
        };
        for day in 0..block.days {
            let date = date_of(block.first, day + 1);
            let Some(now) = Day::of(lanes, block, &view, day) else { return Ok(()) };
            for band in 0..lanes.places() {
                write!(into, "{date},{}", band + 1)?;
                now.write(into, &added, Of::Band(band))?;
            }
            write!(into, "{date},basin")?;
            now.write(into, &added, Of::Basin)?;
            if let Some((name, lanes, block)) = &at_site
                && let Some(now) = Day::of(lanes, block, &view, day)
            {
                write!(into, "{date},{name}")?;
                now.write(into, &added, Of::Band(0))?;
            }
        }
        Ok(())
    })
}

/// A site with a lane of its own.
struct AtSite<'l> {
    name: String,
    lanes: &'l Lanes,
    engine: Engine<'l>,
}

impl<'l> AtSite<'l> {
    /// Runs its next year.
    fn year(
        &mut self,
        span: &YearSpan,
        view: YearView<'_>,
    ) -> Result<(&str, &'l Lanes, &YearBlock), OpenLedger> {
        if !span.follows {
            self.engine.restart();
        }
        Ok((&self.name, self.lanes, self.engine.year(view)?))
    }
}

/// A text as a cell, in quotes where it has to be.
fn cell(text: &str) -> String {
    if text.contains([',', '"', '\n', '\r']) {
        format!("\"{}\"", text.replace('"', "\"\""))
    } else {
        text.to_owned()
    }
}

/// What a row is of.
#[derive(Clone, Copy)]
enum Of {
    Band(usize),
    Basin,
}

/// A day of the table.
struct Day<'a> {
    lanes: &'a Lanes,
    block: &'a YearBlock,
    detail: &'a Detail,
    weather: &'a YearView<'a>,
    /// From the year's first, 0.
    day: usize,
}

impl<'a> Day<'a> {
    /// None where the block has no detail.
    fn of(lanes: &'a Lanes, block: &'a YearBlock, weather: &'a YearView<'a>, day: usize) -> Option<Self> {
        let detail = block.detail.as_ref()?;
        Some(Self { lanes, block, detail, weather, day })
    }

    fn write(&self, into: &mut impl Write, added: &[(&str, Added)], of: Of) -> io::Result<()> {
        let (block, detail) = (self.block, self.detail);
        let [ice, liquid] = [&detail.ice_mm, &detail.liquid_mm].map(|table| self.of_lanes(table, of));
        for number in [
            self.of_lanes(&detail.mean_c, of),
            self.of_columns(&block.rain_mm, of),
            self.of_columns(&block.snow_mm, of),
            self.of_lanes(&detail.melt_mm, of),
            self.of_lanes(&detail.refreeze_mm, of),
            self.of_columns(&block.outflow_mm, of),
            self.of_columns(&block.bare_ground_rain_mm, of),
            ice,
            liquid,
            ice + liquid,
        ] {
            write!(into, ",{number}")?;
        }
        for (_, column) in added {
            match column {
                Added::Detail(table) => write!(into, ",{}", self.of_lanes(table(detail), of))?,
                Added::Covered => write!(into, ",{}", self.covered(of))?,
                Added::Sublimation => write!(into, ",{}", self.of_columns(&block.sublimation_mm, of))?,
                Added::WetBulb if self.weather.precipitation_mm[self.day] > 0.0 => {
                    write!(into, ",{}", self.of_lanes(&detail.wet_bulb_c, of))?;
                }
                Added::WetBulb => write!(into, ",")?,
                Added::MeltFactor => {
                    let factors = self.lanes.melt_factors(self.weather.day_of_year[self.day]);
                    write!(into, ",{}", self.of_row(factors, of))?;
                }
            }
        }
        writeln!(into)
    }

    /// A number of the day from a table of lanes.
    fn of_lanes(&self, table: &[f64], of: Of) -> f64 {
        let width = self.detail.width;
        self.of_row(&table[self.day * width..(self.day + 1) * width], of)
    }

    /// A number of the day from a table of all columns.
    fn of_columns(&self, table: &[f64], of: Of) -> f64 {
        self.of_row(self.block.row(table, self.day), of)
    }

    fn of_row(&self, row: &[f64], of: Of) -> f64 {
        match of {
            Of::Band(band) => self.lanes.of_place(0, band, row),
            Of::Basin => self.lanes.mix(0, row),
        }
    }

    /// The covered share as the day ends, over the share of all ground. That is 1 but for its last bits, since shares of area
    /// add up with rounding; both are added in the same order, so that full cover is 1 to the bit.
    fn covered(&self, of: Of) -> f64 {
        let width = self.block.width;
        let next = &self.block.swe_mm[(self.day + 1) * width..(self.day + 2) * width];
        let covers: Vec<f64> = next.iter().map(|swe_mm| crate::snow::cover(*swe_mm)).collect();
        self.of_row(&covers, of) / self.of_row(&vec![1.0; width], of)
    }
}
