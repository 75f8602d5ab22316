//! The figure of a place's days, for every kind of place, in wet and dry, long and short years.

use super::super::{DAYS_FIGURES, Setting, Svg, of_days};
use super::{assert_texts_apart, texts};
use crate::basin::{Band, Ground};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::fit::{DayPair, ObservedAt, Place, PlaceDays, PlaceYear};
use crate::observed::Kind;
use crate::units::UnitSystem;

/// A made-up place: SWE rises to `peak_mm` on the year's 150th day and is gone 60 days later; every tenth day a tenth
/// of it falls as snow before that, and half a tenth as rain after it.
#[derive(Clone, Copy)]
struct Made {
    place: &'static str,
    kind: Option<Kind>,
    first_year: i32,
    years: i32,
    month: u32,
    peak_mm: f64,
}

const PLAIN: Made =
    Made { place: "basin", kind: None, first_year: 2010, years: 3, month: 10, peak_mm: 500.0 };
const PEAK_DAY: usize = 150;

impl Made {
    fn year(self, water_year: i32) -> PlaceYear {
        let starts = WaterYearStart(MonthDay::new(self.month, 1).unwrap());
        let days = 1..=starts.days_in(water_year);
        // Each year has a tenth less than the one before it.
        let peak_mm = self.peak_mm * (1.0 - 0.1 * f64::from(water_year - self.first_year));
        let swe_mm = |day: usize| match day {
            ..=PEAK_DAY => peak_mm * day as f64 / PEAK_DAY as f64,
            _ => (peak_mm * (1.0 - (day - PEAK_DAY) as f64 / 60.0)).max(0.0),
        };
        let is_wet = |day: usize| day.is_multiple_of(10);
        let all = |of: &dyn Fn(usize) -> f64| days.clone().map(of).collect::<Vec<f64>>();
        PlaceYear {
            water_year,
            first: starts.first_day(water_year),
            snow_mm: all(&|day| if is_wet(day) && day <= PEAK_DAY { peak_mm / 10.0 } else { 0.0 }),
            rain_mm: all(&|day| if is_wet(day) && day > PEAK_DAY { peak_mm / 20.0 } else { 0.0 }),
            melt_mm: all(&|day| if (151..=210).contains(&day) { peak_mm / 60.0 } else { 0.0 }),
            swe: days
                .clone()
                .map(|day| DayPair {
                    modelled_mm: swe_mm(day),
                    observed_mm: self.kind.filter(|_| day % 40 > 3).map(|_| 0.9 * swe_mm(day)),
                })
                .collect(),
        }
    }

    fn days(self) -> PlaceDays {
        let band = Band {
            lower_m: 1800.0,
            upper_m: 2000.0,
            area_km2: 1.0,
            elevation_m: 1900.0,
            ground: Ground::default(),
        };
        let place = match self.place {
            "basin" => Place::Basin,
            "band" => Place::Band { number: 3, band },
            name => Place::Site { name: name.to_owned(), elevation_m: 2050.0 },
        };
        let observed =
            self.kind.map(|kind| ObservedAt { site: "Heron Meadow".to_owned(), elevation_m: 1950.0, kind });
        let years = (self.first_year..self.first_year + self.years).map(|year| self.year(year));
        PlaceDays { place, observed, years: years.collect() }
    }

    fn draw_in(self, units: UnitSystem) -> Svg {
        let water_year_starts = WaterYearStart(MonthDay::new(self.month, 1).unwrap());
        let setting = Setting { study_title: "Alder Fork", units, water_year_starts, is_fitted: false };
        of_days(&self.days(), None, &setting).remove(0).1
    }

    fn draw(self) -> Svg {
        self.draw_in(UnitSystem::Metric)
    }
}

#[test]
fn text_lies_inside_and_apart_for_every_place() {
    let long = "The snow course at the upper end of Heron Meadow below the pass to the other fork";
    let band = Made { place: "band", ..PLAIN };
    for made in [
        PLAIN,
        Made { years: 1, ..PLAIN },
        Made { years: 2, month: 4, ..PLAIN },
        Made { years: 5, month: 1, ..PLAIN },
        band,
        Made { kind: Some(Kind::Pillow), ..band },
        Made { kind: Some(Kind::Course), years: 5, ..band },
        Made { place: long, kind: Some(Kind::Pillow), peak_mm: 11_000.0, ..PLAIN },
        Made { place: long, kind: Some(Kind::Course), peak_mm: 0.3, years: 1, ..PLAIN },
        Made { peak_mm: 0.0, ..PLAIN },
    ] {
        let svg = made.draw();
        assert_texts_apart(made.place, &svg.text);
        assert_texts_apart(made.place, &made.draw_in(UnitSystem::Us).text);
        let drawn = svg.text.split("</desc>").nth(1).unwrap();
        assert!(["NaN", "inf", "\"-0\""].iter().all(|nonsense| !drawn.contains(nonsense)));
        assert_eq!(svg, made.draw());
        let said = svg.text.split("</desc>").next().unwrap();
        assert!(
            said.contains("aria-labelledby=\"daily-title daily-desc\"") && svg.alt.starts_with(&svg.title)
        );
    }
    assert!(DAYS_FIGURES.iter().all(|figure| figure.question.ends_with('?')));
}

/// By hand: the 150th day of the water year is 27 February, and 28 August where it begins on 1 April; the peak falls by
/// a tenth a year; 500 mm are 19.7 in.
#[test]
fn titles_say_peak_and_place() {
    let title = |made: Made| made.draw().title;
    assert_eq!(
        title(PLAIN),
        "Basin mean, water years 2010 to 2012: SWE peaks between 400 mm (2012) and 500 mm (2010)"
    );
    let band = Made { place: "band", years: 1, ..PLAIN };
    assert_eq!(
        title(band),
        "Band 3 (1\u{2009}800–2\u{2009}000 m), water year 2010: SWE peaks at 500 mm on 27 February"
    );
    let site = Made { place: "Heron Meadow", kind: Some(Kind::Pillow), month: 4, ..band };
    assert_eq!(
        title(site),
        "Heron Meadow (2\u{2009}050 m), water year 2010: SWE peaks at 500 mm on 28 August; the highest reading is 450 mm"
    );
    let us = Made { years: 1, ..PLAIN }.draw_in(UnitSystem::Us);
    assert_eq!(us.title, "Basin mean, water year 2010: SWE peaks at 19.7 in on 27 February");
    assert!(!us.text.contains(" mm"), "{}", us.text);
    assert_eq!(title(Made { years: 1, peak_mm: 0.0, ..PLAIN }), "Basin mean, water year 2010: no snow lies");
}

/// Two bands of one range have titles of their own, and room for them.
#[test]
fn titles_tell_bands_of_one_range_apart() {
    let days = Made { place: "band", years: 1, ..PLAIN }.days();
    let water_year_starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
    let setting =
        Setting { study_title: "Alder Fork", units: UnitSystem::Metric, water_year_starts, is_fitted: false };
    let ground = "facing 180°, slope 25.5°, 45.5 % canopy, no accumulation CV of its own";
    let svg = of_days(&days, Some(ground), &setting).remove(0).1;
    assert_texts_apart(ground, &svg.text);
    let title = format!("Band 3 (1\u{2009}800–2\u{2009}000 m, {ground}), water year 2010: SWE peaks at ");
    assert!(svg.title.starts_with(&title), "{}", svg.title);
}

/// By hand, of 2010: 15 snowfalls of 50 mm, 21 rains of 25 mm and 60 days of melt that bring 500 mm; each snowfall and
/// each rain is a shape of its own, all melt is one.
#[test]
fn each_days_bars_stand_in_their_strips() {
    let svg = Made { years: 1, ..PLAIN }.draw();
    let said: Vec<String> = texts(&svg.text).into_iter().map(|(_, words)| words).collect();
    let note = "peak SWE 500 mm, 27 February \u{b7} snow 750 mm \u{b7} rain 525 mm \u{b7} melt 500 mm";
    assert!(said.iter().any(|words| words == note), "{said:?}");
    for strip in ["snow", "rain", "melt"] {
        assert_eq!(said.iter().filter(|words| *words == strip).count(), 1, "{strip}");
    }
    assert_eq!(svg.text.matches("<polygon").count(), 15 + 21 + 1);
    let dry = Made { years: 1, peak_mm: 0.0, ..PLAIN }.draw();
    assert_eq!(dry.text.matches("<polygon").count(), 0);
}

/// Whose observed snow is drawn is said, and so is that there is none.
#[test]
fn observed_snow_is_named_or_missed() {
    let band = Made { place: "band", ..PLAIN };
    assert!(band.draw().caption.contains("No site with observed snow lies within the band's elevations"));
    let with_site = Made { kind: Some(Kind::Course), ..band }.draw();
    assert!(
        with_site.caption.contains(
            "observed at Heron Meadow (snow course, 1\u{2009}950 m), which lies within the band's elevations."
        ),
        "{}",
        with_site.caption
    );
    let of_years = |svg: &Svg| svg.text.matches("<circle").count();
    // Of every 40 days 4 have no reading: 39 of 2010 and of 2011, and of 2012, a leap year. One dot stands in the key.
    assert_eq!(of_years(&with_site), 326 + 326 + 327 + 1);
    let mut days = Made { place: "Heron Meadow", kind: Some(Kind::Pillow), ..PLAIN }.days();
    for pair in days.years.iter_mut().flat_map(|year| &mut year.swe) {
        pair.observed_mm = None;
    }
    let starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
    let setting = Setting {
        study_title: "Alder Fork",
        units: UnitSystem::Metric,
        water_year_starts: starts,
        is_fitted: false,
    };
    let unread = of_days(&days, None, &setting).remove(0).1;
    assert!(unread.caption.contains("There is no reading of these days."), "{}", unread.caption);
    assert!(of_days(&PlaceDays { years: Vec::new(), ..days }, None, &setting).is_empty());
}
