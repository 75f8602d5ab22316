//! Made-up studies to draw.

use super::super::{FIGURES, Figure, Setting, Svg};
use crate::basin::Band;
use crate::calendar::{MonthDay, WaterYearStart};
use crate::ensemble::{Seasons, Silent};
use crate::findings::{Findings, Questions, answer};
use crate::season::{Kind, Measure, NONE, NOT_GONE, Place};
use crate::units::UnitSystem;
use ndarray::{Array3, Array4};

/// A made-up study: reference values spread evenly, each level a constant further.
pub struct Study<'a> {
    pub levels_c: &'a [f64],
    pub reference: usize,
    pub realizations: usize,
    /// Median and half-width of 1 April SWE at the reference, and its change a degree, mm.
    pub swe: [f64; 3],
    /// The same for both dates, days.
    pub dates: [f64; 3],
    /// Realizations whose snow never went, and with nothing to time, at every level.
    pub undefined: [usize; 2],
}

/// Five levels, falling.
pub const PLAIN: Study<'static> = Study {
    levels_c: &[0.0, 1.0, 2.0, 3.0, 4.0],
    reference: 0,
    realizations: 60,
    swe: [430.0, 90.0, -60.0],
    dates: [220.0, 9.0, -6.0],
    undefined: [0, 0],
};

impl Study<'_> {
    pub fn findings(&self) -> Findings {
        let measure = |name: &str, title: &str, kind| Measure {
            name: name.to_owned(),
            title: title.to_owned(),
            kind,
            place: Place::BandsAndBasin,
        };
        let measures = vec![
            measure("swe_04_01_mm", "1 April SWE", Kind::AmountMm),
            measure("melt_d50_day", "day with half of the net melt done", Kind::DayOfWaterYear),
            measure("melt_out_day", "melt-out", Kind::DayOfWaterYear),
        ];
        let (levels, count) = (self.levels_c.len(), self.realizations);
        let value = |level: usize, measure: usize, realization: usize| {
            let warming = self.levels_c[level] - self.levels_c[self.reference];
            let place = (realization as f64 + 0.5) / count as f64 * 2.0 - 1.0;
            let [middle, half, change] = if measure == 0 { self.swe } else { self.dates };
            let change = if measure == 2 { 0.7 * change } else { change };
            let value =
                middle + half * place * (0.6 + 0.4 * place * place) + change * warming * (1.0 + 0.1 * place);
            let [not_gone, none] = self.undefined;
            match measure {
                0 => value.max(0.0),
                _ if realization < none => NONE,
                _ if realization + not_gone >= count => NOT_GONE,
                1 => value.round(),
                _ => value.round() + 25.0,
            }
        };
        let basin_periods = Array3::from_shape_fn((levels, 3, count), |(l, m, r)| value(l, m, r));
        let seasons = Seasons {
            measures,
            basin_years: Array4::from_shape_fn((levels, 3, count, 1), |(l, m, r, _)| value(l, m, r)),
            band_periods: Array4::from_shape_fn((levels, 1, 3, count), |(l, _, m, r)| value(l, m, r)),
            band_undefined: Array3::from_elem((levels, 1, 3), [0, 0]),
            basin_periods,
        };
        let band = Band { lower_m: 2000.0, upper_m: 3000.0, area_km2: 40.0, elevation_m: 2500.0 };
        let questions =
            Questions { levels_c: self.levels_c, reference: self.reference, bands: &[band], seed: 7 };
        let record = super::records::PLAIN.findings(self.levels_c, self.reference);
        Findings { years: 30, record: Some(record), ..answer(&seasons, &questions, &Silent).unwrap() }
    }

    pub fn draw(&self, title: &str, month: u32) -> Vec<Svg> {
        self.draw_in(UnitSystem::Metric, title, month)
    }

    pub fn draw_in(&self, units: UnitSystem, title: &str, month: u32) -> Vec<Svg> {
        let setting = Setting {
            study_title: title,
            units,
            water_year_starts: WaterYearStart(MonthDay::new(month, 1).unwrap()),
        };
        let findings = self.findings();
        let draw = |figure: &Figure| (figure.draw)(&findings, &setting).unwrap();
        FIGURES.iter().map(draw).collect()
    }
}

/// Every kind of study that figures must stand.
pub fn studies() -> Vec<(&'static str, Study<'static>)> {
    vec![
        ("plain", PLAIN),
        ("cold", Study { swe: [610.0, 140.0, -9.0], dates: [250.0, 12.0, -1.0], ..PLAIN }),
        ("rising", Study { swe: [430.0, 20.0, 30.0], dates: [220.0, 4.0, 3.0], ..PLAIN }),
        ("two levels", Study { levels_c: &[0.0, 2.0], ..PLAIN }),
        ("one level", Study { levels_c: &[0.0], ..PLAIN }),
        ("colder only", Study { levels_c: &[-2.0, 0.0], reference: 1, ..PLAIN }),
        (
            "nine levels",
            Study { levels_c: &[-2.0, -1.0, 0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0], reference: 2, ..PLAIN },
        ),
        ("uneven levels", Study { levels_c: &[0.0, 0.1, 0.25, 4.0], ..PLAIN }),
        ("tiny", Study { swe: [0.3, 0.2, -0.06], ..PLAIN }),
        ("huge", Study { swe: [12_000.0, 2_000.0, -1_600.0], ..PLAIN }),
        ("nothing", Study { swe: [0.0, 0.0, 0.0], undefined: [0, 60], ..PLAIN }),
        ("no spread", Study { swe: [430.0, 0.0, -50.0], dates: [220.0, 0.0, -4.0], ..PLAIN }),
        ("one realization", Study { realizations: 1, ..PLAIN }),
        ("few realizations", Study { realizations: 6, ..PLAIN }),
        ("few not gone", Study { undefined: [2, 1], ..PLAIN }),
        ("not gone", Study { undefined: [5, 0], ..PLAIN }),
        ("hardly gone", Study { undefined: [40, 4], ..PLAIN }),
        ("shifted reference", Study { levels_c: &[0.5, 1.0, 1.5, 2.0], ..PLAIN }),
    ]
}
