//! The daily table: states and fluxes of every band and the basin on every day of the record.

use crate::calendar::date_of;
use crate::snow::{Engine, Lanes, OpenLedger};
use crate::weather::Series;
use std::io::{self, Write};
use thiserror::Error;

/// Column names, in order. Fluxes are the day's, states stand at its end.
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

/// Runs the record and writes its days: bands by their number from the lowest, 1, then the basin mean, area-weighted.
///
/// Numbers are written in the shortest form that reads back exactly. `lanes` holds one group: the bands. Years after a
/// gap start bare.
///
/// # Errors
/// A ledger that does not close, or what `into` says.
pub fn daily_csv(lanes: &Lanes, weather: &Series, into: &mut impl Write) -> Result<(), DailyError> {
    let mut engine = Engine::new(lanes, true);
    writeln!(into, "{HEADER}")?;
    engine.years(weather, |_, block| {
        let Some(detail) = &block.detail else { return Ok(()) };
        for day in 0..block.days {
            let date = date_of(block.first, day + 1);
            let lane_row =
                |table: &[f64]| day * detail.width..day * detail.width + table.len().min(detail.width);
            let (rain, snow) = (block.row(&block.rain_mm, day), block.row(&block.snow_mm, day));
            let outflow = block.row(&block.outflow_mm, day);
            let bare_ground_rain = block.row(&block.bare_ground_rain_mm, day);
            let rows: [&[f64]; 9] = [
                &detail.mean_c[lane_row(&detail.mean_c)],
                rain,
                snow,
                &detail.melt_mm[lane_row(&detail.melt_mm)],
                &detail.refreeze_mm[lane_row(&detail.refreeze_mm)],
                outflow,
                bare_ground_rain,
                &detail.ice_mm[lane_row(&detail.ice_mm)],
                &detail.liquid_mm[lane_row(&detail.liquid_mm)],
            ];
            for band in 0..lanes.count() {
                write!(into, "{date},{}", band + 1)?;
                write_row(into, rows.map(|row| row[band]))?;
            }
            write!(into, "{date},basin")?;
            write_row(into, rows.map(|row| lanes.mix(0, row)))?;
        }
        Ok(())
    })
}

/// Writes a row's numbers and SWE, ice and liquid together.
fn write_row(into: &mut impl Write, numbers: [f64; 9]) -> io::Result<()> {
    for number in numbers {
        write!(into, ",{number}")?;
    }
    let [.., ice, liquid] = numbers;
    writeln!(into, ",{}", ice + liquid)
}
