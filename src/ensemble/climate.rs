//! What the record's weather is like band by band, as observed: winter against freezing, snow against rain.

use crate::fault::Unlikely;
use crate::season::{is_seasonal, keeps_snow, longest_cover_days};
use crate::snow::{Engine, Lanes, OpenLedger};
use crate::weather::Series;
use serde::Serialize;

/// The three months of winter, 0 for January.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct WinterMonths(pub [u8; 3]);

impl WinterMonths {
    /// December to February in the north, June to August in the south.
    pub fn of(is_southern: bool) -> Self {
        Self(if is_southern { [5, 6, 7] } else { [11, 0, 1] })
    }
}

/// The record's climate in one band; means over its usable years.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct BandClimate {
    /// Mean temperature of the three winter months, degC.
    pub winter_mean_c: f64,
    /// Share of winter days with a mean below 0 degC, 0 to 1.
    pub winter_freezing_share: f64,
    /// Precipitation of a year, mm.
    pub precipitation_mm: f64,
    /// Snowfall of a year, mm.
    pub snowfall_mm: f64,
    /// Years with a cover of at least 60 days on end.
    pub seasonal_years: usize,
    /// Years in which the snow never went after its peak.
    pub years_not_gone: usize,
}

impl BandClimate {
    /// Share of precipitation that falls as snow; none without precipitation.
    pub fn snow_fraction(&self) -> Option<f64> {
        (self.precipitation_mm > 0.0).then(|| self.snowfall_mm / self.precipitation_mm)
    }
}

/// Runs the record through lanes that hold one level, and looks at each band. Years after a gap start bare.
///
/// # Errors
/// A ledger that does not close.
pub fn band_climates(
    lanes: &Lanes,
    weather: &Series,
    winter: WinterMonths,
) -> Result<Vec<BandClimate>, OpenLedger> {
    let mut engine = Engine::new(lanes, true);
    let mut climates = vec![BandClimate::default(); lanes.places()];
    let mut winter_days = 0;
    engine.years(weather, |span, block| {
        let view = weather.view(span);
        for (band, climate) in climates.iter_mut().enumerate() {
            let column = lanes.column(0, band);
            climate.seasonal_years += usize::from(is_seasonal(longest_cover_days(block, column)));
            climate.years_not_gone += usize::from(keeps_snow(block, column));
        }
        let Some(detail) = &block.detail else { return Ok(()) };
        for (day, month) in view.month.iter().enumerate() {
            let is_winter = winter.0.contains(month);
            winter_days += usize::from(is_winter);
            for (band, climate) in climates.iter_mut().enumerate() {
                let column = lanes.column(0, band);
                let (rain_mm, snow_mm) =
                    (block.row(&block.rain_mm, day)[column], block.row(&block.snow_mm, day)[column]);
                climate.precipitation_mm += rain_mm + snow_mm;
                climate.snowfall_mm += snow_mm;
                if is_winter {
                    let mean_c = detail.mean_c[day * detail.width + lanes.lane(0, band)];
                    climate.winter_mean_c += mean_c;
                    climate.winter_freezing_share += f64::from(u8::from(mean_c < 0.0));
                }
            }
        }
        Ok::<(), OpenLedger>(())
    })?;
    let (years, winter_days) = (weather.years.len() as f64, winter_days as f64);
    for climate in &mut climates {
        climate.precipitation_mm /= years;
        climate.snowfall_mm /= years;
        climate.winter_mean_c /= winter_days;
        climate.winter_freezing_share /= winter_days;
    }
    Ok(climates)
}

/// Says so where the record leaves bands under snow the year round in most of its years, each with its share of the basin's
/// area: what lasts is carried on and piles up from year to year, and a warming then melts what decades have left.
pub fn snow_that_piles_up(climates: &[BandClimate], shares: &[f64], years: usize) -> Option<Unlikely> {
    let of_bands = climates.iter().zip(shares).filter(|(climate, _)| 2 * climate.years_not_gone > years);
    let (bands, share) = of_bands.fold((0, 0.0), |(bands, sum), (_, share)| (bands + 1, sum + share));
    let pct = (100.0 * share).round().max(1.0);
    let which = if bands == 1 { "a band".to_owned() } else { format!("{bands} bands") };
    let why = format!(
        "in most of the record's years the snow never goes from {which} with {pct:.0} % of the basin's area; it is carried into \
         the next year and piles up, and the model makes no ice of it: with snow.start_bare_each_year = true it is taken \
         away as each year ends"
    );
    (bands > 0).then(|| Unlikely::new("snow.start_bare_each_year", why))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: of 4 years more than 2 are most; bands of 20 and 5 % of the area make 25 %.
    #[test]
    fn snow_that_lasts_in_most_years_is_said_with_its_area() {
        let bands = |not_gone: [usize; 3]| {
            not_gone.map(|years_not_gone| BandClimate { years_not_gone, ..BandClimate::default() })
        };
        let shares = [0.75, 0.2, 0.05];
        let said = |not_gone| {
            snow_that_piles_up(&bands(not_gone), &shares, 4).map_or(String::new(), |said| said.why)
        };
        assert_eq!(said([0, 2, 2]), "");
        assert!(said([0, 2, 3]).contains("never goes from a band with 5 % of the basin's area"));
        assert!(said([0, 3, 4]).contains("never goes from 2 bands with 25 % of the basin's area"));
    }
}
