//! Made-up studies to draw.

use super::super::{FIGURES, Figure, Setting, Svg};
use crate::basin::{Band, Ground};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::ensemble::{BasinSeasons, COUNTED_DAYS, Seasons, Silent, SweBins, SweDays};
use crate::findings::{ByYear, ByYearQuestions, Findings, Places, PlacesQuestions, Questions, Runs, answer};
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
    /// Edges of the bands, m.
    pub edges_m: &'a [f64],
    /// Bands between two edges, which face other ways.
    pub parts: usize,
    /// What the highest band gains a degree beside what it loses, mm.
    pub highest_gains_mm: f64,
    /// Whether volumes are asked for.
    pub has_window: bool,
    /// Day of the water year on which most snow lies.
    pub peak_day: f64,
    /// Days from there to no snow, before and after.
    pub days_to_none: f64,
}

/// Edges of thirty bands, m.
const THIRTY: [f64; 31] = {
    let mut edges_m = [0.0; 31];
    let mut at = 0;
    while at < edges_m.len() {
        edges_m[at] = 900.0 + 100.0 * at as f64;
        at += 1;
    }
    edges_m
};

/// Five levels, falling.
pub const PLAIN: Study<'static> = Study {
    levels_c: &[0.0, 1.0, 2.0, 3.0, 4.0],
    reference: 0,
    realizations: 60,
    swe: [430.0, 90.0, -60.0],
    dates: [220.0, 9.0, -6.0],
    undefined: [0, 0],
    edges_m: &[2000.0, 2300.0, 2600.0, 2900.0],
    parts: 1,
    highest_gains_mm: 0.0,
    has_window: true,
    peak_day: 180.0,
    days_to_none: 100.0,
};

impl Study<'_> {
    pub fn findings(&self) -> Findings {
        let measure = |name: &str, title: &str, kind| Measure {
            name: name.to_owned(),
            title: title.to_owned(),
            kind,
            place: Place::BandsAndBasin,
            is_volume: name.starts_with("outflow"),
            has_extremes_told: false,
        };
        let mut measures = vec![
            measure("swe_04_01_mm", "1 April SWE", Kind::AmountMm),
            measure("melt_d50_day", "day with half of the net melt done", Kind::DayOfWaterYear),
            measure("melt_out_day", "melt-out", Kind::DayOfWaterYear),
            measure("outflow_04_01_to_07_31_mm", "snowpack outflow, 1 April to 31 July", Kind::AmountMm),
        ];
        measures.truncate(if self.has_window { 4 } else { 3 });
        let (levels, count) = (self.levels_c.len(), self.realizations);
        let is_amount = |measure: usize| matches!(measure, 0 | 3);
        let value = |level: usize, measure: usize, realization: usize| {
            let warming = self.levels_c[level] - self.levels_c[self.reference];
            let place = (realization as f64 + 0.5) / count as f64 * 2.0 - 1.0;
            let [middle, half, change] = if is_amount(measure) { self.swe } else { self.dates };
            let change = if measure == 2 { 0.7 * change } else { change };
            let value =
                middle + half * place * (0.6 + 0.4 * place * place) + change * warming * (1.0 + 0.1 * place);
            let [not_gone, none] = self.undefined;
            match measure {
                _ if is_amount(measure) => value.max(0.0),
                _ if realization < none => NONE,
                _ if realization + not_gone >= count => NOT_GONE,
                1 => value.round(),
                _ => value.round() + 25.0,
            }
        };
        // Amounts grow with elevation: in three bands 40, 100 and 160 % of the basin's.
        let bands_count = (self.edges_m.len() - 1) * self.parts;
        let height = |band: usize| (band as f64 + 0.5) / bands_count as f64;
        let in_band = |level: usize, band: usize, measure: usize, realization: usize| {
            let of_basin = value(level, measure, realization);
            if !is_amount(measure) {
                return of_basin;
            }
            let warming = self.levels_c[level] - self.levels_c[self.reference];
            let gains_mm = if band + 1 == bands_count { self.highest_gains_mm * warming } else { 0.0 };
            (0.1 + 1.8 * height(band)) * of_basin + gains_mm
        };
        let measures_count = measures.len();
        let seasons = Seasons {
            basin: BasinSeasons {
                years: Array4::from_shape_fn((levels, measures_count, count, 1), |(l, m, r, _)| {
                    value(l, m, r)
                }),
                periods: Array3::from_shape_fn((levels, measures_count, count), |(l, m, r)| value(l, m, r)),
                measures,
            },
            band_periods: Array4::from_shape_fn(
                (levels, bands_count, measures_count, count),
                |(l, b, m, r)| in_band(l, b, m, r),
            ),
            band_headline: Array4::from_shape_fn((levels, bands_count, count, 1), |(l, b, r, _)| {
                in_band(l, b, 0, r)
            }),
            band_undefined: Array3::from_elem((levels, bands_count, measures_count), [0, 0]),
            operated: None,
            swe_days: self.swe_days(),
        };
        let bands: Vec<Band> = (0..bands_count)
            .map(|band| {
                let range = band / self.parts;
                let (lower_m, upper_m) = (self.edges_m[range], self.edges_m[range + 1]);
                let elevation_m = (lower_m + upper_m) / 2.0;
                Band {
                    lower_m,
                    upper_m,
                    area_km2: 60.0 - 45.0 * height(band),
                    elevation_m,
                    ground: self.ground(band % self.parts),
                }
            })
            .collect();
        let questions = Questions {
            levels_c: self.levels_c,
            reference: self.reference,
            bands: &bands,
            mean_change_sd_pct: 0.0,
            criteria: &[],
            seed: 7,
        };
        let runs = Runs { study: &seasons, temperature_held: None, other_changes: &[], refits: &[] };
        let record = super::records::PLAIN.findings(self.levels_c, self.reference);
        let generator = Some(super::weathers::PLAIN_SHEET.clone());
        let reference_c = self.levels_c[self.reference];
        let surface =
            super::surfaces::made(&seasons.basin.measures[0], [self.swe[0], self.swe[2]], reference_c);
        let by_year = self.by_year(&seasons.basin, &bands);
        let findings = answer(&runs, &questions, &Silent).unwrap();
        let rule_panel = super::rules::panel(&findings, -50.0, true);
        let operated = super::operated::Operated {
            levels_c: self.levels_c,
            reference: self.reference,
            realizations: count,
            ..super::operated::PLAIN
        };
        let findings = Findings {
            years: 30,
            operations: Some(operated.operations()),
            record: Some(record),
            generator,
            surface: Some(surface),
            by_year,
            rule_panel,
            ..findings
        };
        // Warmth that knows nothing of the amounts; SWE itself stands for precipitation.
        let cool_mean_c = Array3::from_shape_fn((levels, count, 1), |(level, realization, _)| {
            self.levels_c[level] + (realization * 7 % 11) as f64 - 5.0
        });
        let winter_mean_c: Vec<Vec<f64>> = self
            .levels_c
            .iter()
            .map(|c| {
                bands.iter().map(|band| c + 2.0 - 0.006 * (band.elevation_m - bands[0].elevation_m)).collect()
            })
            .collect();
        let places = Places::of(
            &PlacesQuestions {
                study: &seasons,
                bands: &bands,
                seed: 7,
                precipitation: &seasons.basin.measures[0].name,
                cool_mean_c: Some(&cool_mean_c),
                winter_mean_c: &winter_mean_c,
                low_snow_below_quantile: 0.2,
                snow_line_swe_mm: 100.0,
            },
            &findings,
        );
        Findings { places, ..findings }
    }

    /// The same study's realizations with five years each, which vary about the period value.
    fn by_year(&self, basin: &BasinSeasons, bands: &[Band]) -> Option<ByYear> {
        let (levels, measures, realizations, _) = basin.years.dim();
        let one = |at: (usize, usize, usize, usize)| {
            let (level, measure, realization, year) = at;
            let wave = ((realization * 7 + year * 3) % 11) as f64 / 5.0 - 1.0;
            basin.years[[level, measure, realization, 0]] * (1.0 + 0.3 * wave).max(0.0)
        };
        let years = Array4::from_shape_fn((levels, measures, realizations, 5), one);
        let basin = BasinSeasons { years, ..basin.clone() };
        ByYear::of(
            &basin,
            &ByYearQuestions {
                levels_c: self.levels_c,
                reference: self.reference,
                seed: 7,
                low_snow_below_quantile: 0.2,
                warming_rate: None,
                redraws_years: true,
                changes_mean: false,
                // So that either wording is laid out.
                levels_change_precipitation: self.levels_c.len() > 5,
                record: &[],
                bands,
            },
        )
    }

    /// Of a part of a range.
    fn ground(&self, part: usize) -> Ground {
        if self.parts == 1 {
            return Ground::default();
        }
        let of_all = part as f64 / self.parts as f64;
        Ground {
            slope_deg: 45.0 * of_all,
            aspect_deg: 360.0 * of_all,
            canopy_fraction: of_all,
            accumulation_variation: (part > 0).then_some(of_all),
        }
    }

    /// SWE that rises to what the amounts say and falls again, a few years of it.
    fn swe_days(&self) -> SweDays {
        let [middle, half, change] = self.swe;
        let bins = SweBins::up_to(middle + half);
        let mut counts = Array3::zeros((self.levels_c.len(), COUNTED_DAYS, bins.count));
        for (level, level_c) in self.levels_c.iter().enumerate() {
            let highest_mm = middle + change * (level_c - self.levels_c[self.reference]);
            for (day, year) in (0..COUNTED_DAYS).flat_map(|day| (-5..=5).map(move |year| (day, year))) {
                let apart = (day as f64 - self.peak_day).abs();
                let of_highest = 1.0 - apart.min(COUNTED_DAYS as f64 - apart) / self.days_to_none;
                let swe_mm = (of_highest * (highest_mm + half * f64::from(year) / 5.0)).max(0.0);
                counts[[level, day, ((swe_mm / bins.width_mm).round() as usize).min(bins.count - 1)]] += 1;
            }
        }
        SweDays { bins, counts }
    }

    pub fn draw(&self, title: &str, month: u32) -> Vec<Svg> {
        self.draw_in(UnitSystem::Metric, title, month)
    }

    pub fn draw_in(&self, units: UnitSystem, title: &str, month: u32) -> Vec<Svg> {
        let setting = Setting {
            study_title: title,
            units,
            water_year_starts: WaterYearStart(MonthDay::new(month, 1).unwrap()),
            is_fitted: false,
        };
        let findings = self.findings();
        let draw = |figure: &Figure| (figure.draw)(&findings, &setting);
        FIGURES.iter().filter_map(draw).collect()
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
        ("one band", Study { edges_m: &[1800.0, 3300.0], ..PLAIN }),
        ("thirty bands", Study { edges_m: &THIRTY, ..PLAIN }),
        ("uneven bands", Study { edges_m: &[-30.0, 10.0, 1500.0, 1510.0, 1520.0, 1700.0], ..PLAIN }),
        ("bands of one range", Study { parts: 2, ..PLAIN }),
        ("one range", Study { edges_m: &[1800.0, 3300.0], parts: 4, ..PLAIN }),
        ("ninety bands of thirty ranges", Study { edges_m: &THIRTY, parts: 3, ..PLAIN }),
        ("uneven ranges", Study { edges_m: &[-30.0, 10.0, 1500.0, 1510.0, 1700.0], parts: 2, ..PLAIN }),
        (
            "snow only high",
            Study { edges_m: &THIRTY, highest_gains_mm: 90.0, swe: [9.0, 8.0, -2.0], ..PLAIN },
        ),
        ("no window", Study { has_window: false, ..PLAIN }),
        ("snow across the year's end", Study { peak_day: 5.0, ..PLAIN }),
        ("snow late", Study { peak_day: 330.0, ..PLAIN }),
        ("snow all year", Study { days_to_none: 3000.0, ..PLAIN }),
    ]
}
