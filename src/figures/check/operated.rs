//! Made-up inflow, storage and rules, and tests of the figures that draw them.

use super::super::{FIGURES, Figure, Svg, cost_in_days_above};
use super::studies::PLAIN as STUDY;
use super::{Setting, assert_texts_apart, texts};
use crate::calendar::{COMMON_DATES, MONTHS, MonthDay, WaterYearStart};
use crate::ensemble::OperatedSeasons;
use crate::findings::{Findings, Operations, OperationsQuestions, PoolShown};
use crate::operation::{CHANGED, Change, Operation};
use crate::season::{Kind, Measure};
use crate::units::UnitSystem;
use ndarray::{Array3, Array4};

/// A made-up reservoir below a made-up basin, October first: everything goes linearly with warming and spreads evenly over
/// realizations.
#[derive(Clone, Copy)]
pub struct Operated<'a> {
    pub levels_c: &'a [f64],
    pub reference: usize,
    pub realizations: usize,
    /// Share of the year's water that goes from June to January a degree.
    pub moved: f64,
    /// Days by which the centroid moves a degree.
    pub centroid_days: f64,
    /// Changes of storage on 1 April and 1 September a degree, and half the spread of every date, hm3.
    pub storage_hm3: [f64; 3],
    /// What warming takes of reliability by volume a degree.
    pub taken: f64,
    /// What refill 30 days earlier brings back of it; 15 days earlier half as much.
    pub brought_back: f64,
    /// Spill a year under the rules as stated, and how much more with refill 30 days earlier, hm3.
    pub spill_hm3: [f64; 2],
    /// How much farther years stray from the line of snow and water a degree, as a share.
    pub strays: f64,
    pub is_observed: bool,
    pub keeps_space: bool,
    pub tried: &'a [Change],
}

const SLUGS: [&str; 5] = [
    "inflow-by-month",
    "storage-through-year",
    "refill-rule-changes",
    "shortage-against-spill",
    "seasonal-outlook",
];

const TRIED: [Change; 5] = [
    Change::AsStated,
    Change::RefillMovedDays(-30),
    Change::RefillMovedDays(-15),
    Change::FloodSpaceTimes(0.5),
    Change::DemandTimes(0.9),
];

pub const PLAIN: Operated<'static> = Operated {
    levels_c: &[0.0, 1.0, 2.0, 3.0, 4.0],
    reference: 0,
    realizations: 60,
    moved: 0.02,
    centroid_days: -8.0,
    storage_hm3: [8.0, -11.0, 10.0],
    taken: 0.003,
    brought_back: 0.57,
    spill_hm3: [0.5, 0.5],
    strays: 0.5,
    is_observed: false,
    keeps_space: true,
    tried: &TRIED,
};

/// Shares of the year from October on; they add up to 1.
const SHARES: [f64; 12] = [0.05, 0.06, 0.04, 0.02, 0.02, 0.05, 0.17, 0.28, 0.16, 0.06, 0.05, 0.04];
/// Storage on the first of each month from October on, and at the year's end, hm3.
const STORAGE_HM3: [f64; 13] =
    [104.0, 110.0, 102.0, 101.0, 98.0, 94.0, 101.0, 141.0, 185.0, 186.0, 151.0, 117.0, 103.0];
/// Years of a realization.
const YEARS: usize = 2;

impl Operated<'_> {
    fn word(&self) -> &'static str {
        if self.is_observed { "inflow" } else { "water input, routed" }
    }

    fn yearly(&self) -> Vec<Measure> {
        let month = |at: usize| (at + 9) % 12;
        let mut list = vec![
            Measure::new(
                Kind::VolumeHm3,
                "inflow_04_01_to_07_31_hm3",
                format!("{}, 1 April to 31 July", self.word()),
            )
            .told_as_volume(),
        ];
        list.extend((0..12).map(|at| {
            let name = MONTHS[month(at)].to_lowercase();
            Measure::new(Kind::Share, format!("inflow_in_{name}_share"), format!("share in {name}"))
        }));
        list.push(Measure::new(Kind::DayOfWaterYear, "inflow_centroid_day", "centroid"));
        list.extend((0..12).map(|at| {
            let name = format!("storage_{:02}_01_hm3", month(at) + 1);
            Measure::new(Kind::VolumeHm3, name, "storage")
        }));
        list.push(Measure::new(Kind::VolumeHm3, "storage_year_end_hm3", "storage"));
        list
    }

    /// SWE is 300 or 500 mm in every other realization, the volume half of it, in hm3, and 25 hm3 above or below that in every
    /// other year.
    fn swe_and_volume(&self, warming: f64, realization: usize, year: usize) -> [f64; 2] {
        let swe_mm = 400.0 + if realization.is_multiple_of(2) { 100.0 } else { -100.0 };
        let strays_hm3 = 25.0 * (1.0 + self.strays * warming);
        let strays_hm3 = if year == 0 { strays_hm3 } else { -strays_hm3 };
        [swe_mm, 0.5 * swe_mm + strays_hm3]
    }

    /// A year's measure, the same in both years but for the volume.
    fn of_year(&self, level: usize, measure: usize, realization: usize, year: usize) -> f64 {
        let warming = self.levels_c[level] - self.levels_c[self.reference];
        let place = (realization as f64 + 0.5) / self.realizations as f64 * 2.0 - 1.0;
        let [april, september, half_hm3] = self.storage_hm3;
        match measure {
            0 => self.swe_and_volume(warming, realization, year)[1],
            1..=12 => {
                let change = match MONTHS[(measure + 8) % 12] {
                    "January" => self.moved,
                    "June" => -self.moved,
                    _ => 0.0,
                };
                SHARES[measure - 1] * (1.0 + 0.1 * place) + change * warming
            }
            13 => 205.0 + 5.0 * place + self.centroid_days * warming,
            _ => {
                let change = match measure - 14 {
                    6 => april,
                    11 => september,
                    _ => 0.0,
                };
                STORAGE_HM3[measure - 14] + half_hm3 * place + change * warming
            }
        }
    }

    /// Of a set of rules: reliability by time and volume, shortage, spill, water unused, days above the stated flood-space rule, years not filled.
    fn under(&self, level: usize, change: Change, measure: usize, realization: usize) -> f64 {
        let warming = self.levels_c[level] - self.levels_c[self.reference];
        let place = (realization as f64 + 0.5) / self.realizations as f64 * 2.0 - 1.0;
        let (earlier, back) = match change {
            Change::RefillMovedDays(days) => {
                let earlier = -f64::from(days) / 30.0;
                (earlier, self.brought_back * earlier)
            }
            Change::AsStated => (0.0, 0.0),
            Change::FloodSpaceTimes(_) => (0.0, 0.2),
            Change::DemandTimes(_) => (0.0, 1.1),
        };
        let [spill_hm3, more_hm3] = self.spill_hm3;
        match measure {
            0 | 1 => 0.986 + 0.004 * place - self.taken * warming * (1.0 - back),
            2 => 5.0 + 0.5 * place + 1000.0 / 3.0 * self.taken * warming * (1.0 - back),
            3 => (spill_hm3 + more_hm3 * earlier) * (1.0 + 0.2 * place),
            4 => 60.0 + place,
            5 => 0.6 + 20.0 * earlier + 0.1 * place,
            _ => 0.5,
        }
    }

    pub fn operations(&self) -> Operations {
        let (yearly, levels, count) = (self.yearly(), self.levels_c.len(), self.realizations);
        let measures = yearly.len();
        let years =
            Array4::from_shape_fn((levels, measures, count, YEARS), |(l, m, r, y)| self.of_year(l, m, r, y));
        let periods = Array3::from_shape_fn((levels, measures, count), |(l, m, r)| {
            (self.of_year(l, m, r, 0) + self.of_year(l, m, r, 1)) / 2.0
        });
        let operated = OperatedSeasons {
            yearly,
            years,
            periods,
            over_years: Vec::new(),
            wholes: Array3::zeros((levels, 0, count)),
            tried: self.tried.to_vec(),
            of_changes: Operation::of_changes(),
            changed: Array4::from_shape_fn((levels, self.tried.len(), CHANGED, count), |(l, c, m, r)| {
                self.under(l, self.tried[c], m, r)
            }),
        };
        let swe = Array3::from_shape_fn((levels, count, YEARS), |(l, r, y)| {
            self.swe_and_volume(self.levels_c[l] - self.levels_c[self.reference], r, y)[0]
        });
        // Rises from half to the whole through the year.
        let rule = (0..COMMON_DATES).map(|day| 110.0 + 110.0 * day as f64 / 364.0);
        let pool = PoolShown {
            capacity_hm3: 220.0,
            dead_hm3: 15.0,
            not_above_hm3: if self.keeps_space { rule.collect() } else { Vec::new() },
        };
        Operations::of(
            &operated,
            None,
            &OperationsQuestions {
                foretold_window: Some(0),
                levels_c: self.levels_c,
                reference: self.reference,
                area_km2: 600.0,
                seed: 7,
                inflow_is_observed: self.is_observed,
                year_class_limits_hm3: &[190.0, 260.0],
                word: self.word(),
                reservoir: Some("Lantern Reservoir"),
                pool: Some(&pool),
                headline: (&Measure::april_swe(), swe.view()),
            },
        )
    }

    /// Of a study that is small beside, since its own snow is not drawn here.
    fn findings(&self) -> Findings {
        let study = super::Study {
            levels_c: self.levels_c,
            reference: self.reference,
            realizations: 2,
            edges_m: &[1800.0, 3300.0],
            has_window: false,
            ..STUDY
        };
        Findings { realizations: self.realizations, operations: Some(self.operations()), ..study.findings() }
    }
}

fn figure(slug: &str) -> Figure {
    FIGURES.into_iter().find(|figure| figure.slug == slug).unwrap()
}

fn draw(units: UnitSystem, slug: &str, findings: &Findings) -> Svg {
    let setting = Setting {
        study_title: "Alder Fork",
        units,
        water_year_starts: WaterYearStart(MonthDay::new(10, 1).unwrap()),
        is_fitted: false,
    };
    let svg = (figure(slug).draw)(findings, &setting).unwrap();
    assert_texts_apart(slug, &svg.text);
    svg
}

fn draw_in(units: UnitSystem, slug: &str, operated: &Operated<'_>) -> Svg {
    draw(units, slug, &operated.findings())
}

fn title(slug: &str, operated: &Operated<'_>) -> String {
    draw_in(UnitSystem::Metric, slug, operated).title
}

/// By hand: 2 % a degree go from June to January, so 4.0 % at +2 degC, and the centroid moves by 8 days a degree.
#[test]
fn titles_say_which_months_the_water_moves_from_and_to() {
    let slug = "inflow-by-month";
    assert_eq!(
        title(slug, &PLAIN),
        "At +2 °C, 4.0 % of the year's water input, routed, comes in January instead of June; the centroid comes 16 days earlier"
    );
    assert_eq!(
        title(slug, &Operated { moved: -0.0075, centroid_days: 2.0, is_observed: true, ..PLAIN }),
        "At +2 °C, 1.5 % of the year's inflow comes in June instead of January; the centroid comes 4 days later"
    );
    assert_eq!(
        title(slug, &Operated { moved: 0.0, centroid_days: 0.0, is_observed: true, ..PLAIN }),
        "At +2 °C, the year's inflow keeps its months; the centroid comes on the same day"
    );
    assert_eq!(
        title(slug, &Operated { levels_c: &[0.0], is_observed: true, ..PLAIN }),
        "May brings most of the year's inflow: 28 % at the reference; no other level was run"
    );
}

/// By hand: January's median is 2 % and 5–95 % of its spread about 0.18 points to either side, which 2 points a degree leave from
/// about +0.1 degC on; June's 16 % spread by 1.44 points, left from +0.7 on; ten other months stand still.
#[test]
fn months_whose_shift_outweighs_say_from_where_on() {
    let svg = draw_in(UnitSystem::Metric, "inflow-by-month", &PLAIN);
    let said = texts(&svg.text);
    let count = |word: &str| said.iter().filter(|(_, words)| words == word).count();
    assert_eq!([count("+0.1"), count("+0.7"), count("no")], [1, 1, 10], "{said:?}");
    assert!(svg.caption.contains("No inflow was observed"), "{}", svg.caption);
}

/// By hand: 11 hm3 less on 1 September and 8 more on 1 April a degree are 22 and 16 at +2 degC; the spread's 5–95 % lies 9 hm3 to
/// either side (type 8 of an even spread of 10), with 45 it lies 40.5 away. A hm3 is 0.810713 thousand acre-feet: 17.8 and 13.0.
#[test]
fn titles_say_when_storage_is_lower_and_higher() {
    let slug = "storage-through-year";
    let start = "At +2 °C, median storage is up to 22.0 hm³ lower (on 1 September) and up to 16.0 hm³ higher (on 1 April)";
    assert_eq!(title(slug, &PLAIN), format!("{start}; that outweighs precipitation on 2 of 13 dates"));
    assert_eq!(
        title(slug, &Operated { storage_hm3: [8.0, -11.0, 45.0], ..PLAIN }),
        format!("{start}; precipitation outweighs that on all 13 dates")
    );
    assert_eq!(
        title(slug, &Operated { storage_hm3: [0.0, 11.0, 10.0], keeps_space: false, ..PLAIN }),
        "At +2 °C, median storage is up to 22.0 hm³ higher (on 1 September); that outweighs precipitation on 1 of 13 dates"
    );
    assert_eq!(
        title(slug, &Operated { storage_hm3: [0.0, 0.0, 10.0], ..PLAIN }),
        "At +2 °C, median storage stays what it is at the reference"
    );
    assert_eq!(
        title(slug, &Operated { levels_c: &[0.0], ..PLAIN }),
        "Median storage is highest at 186 hm³ (on 1 July) at the reference; no other level was run"
    );
    assert_eq!(
        draw_in(UnitSystem::Us, slug, &PLAIN).title,
        "At +3.6 °F, median storage is up to 17.8 thousand acre-feet lower (on 1 September) and up to 13.0 thousand acre-feet \
         higher (on 1 April); that outweighs precipitation on 2 of 13 dates"
    );
}

#[test]
fn a_reservoir_without_a_rule_has_no_line_of_it() {
    let named = |operated: &Operated<'_>| {
        let svg = draw_in(UnitSystem::Metric, "storage-through-year", operated);
        texts(&svg.text).into_iter().filter(|(_, words)| words == "flood-space rule").count()
    };
    assert_eq!([true, false].map(|keeps_space| named(&Operated { keeps_space, ..PLAIN })), [1, 0]);
}

/// By hand: 0.3 points a degree leave 98.0 of 98.6 % at +2 degC, of which 57 % come back. Where no date brings back
/// anything, of what is left half the flood space brings back a fifth; a change of demand, which brings no water, is not asked.
#[test]
fn titles_say_what_a_date_brings_back() {
    let slug = "refill-rule-changes";
    let falls = "At +2 °C, reliability by volume falls from 98.6 to 98.0 %";
    let said = title(slug, &PLAIN);
    assert_eq!(
        said,
        format!("{falls}; refill 30 days earlier brings back 57 % of that (5–95 %: 57 to 57 %)")
    );
    let more = title(slug, &Operated { brought_back: 1.2, ..PLAIN });
    assert_eq!(
        more,
        format!("{falls}; refill 30 days earlier brings back all of that (5–95 %: 120 to 120 %)")
    );
    let other = title(slug, &Operated { brought_back: -0.4, ..PLAIN });
    assert_eq!(other, format!("{falls}; flood space × 0.5 brings back 20 % of that (5–95 %: 20 to 20 %)"));
    assert_eq!(
        title(slug, &Operated { brought_back: -0.4, tried: &TRIED[..3], ..PLAIN }),
        format!("{falls}; none of the changes tried brings any of that back")
    );
    assert_eq!(
        title(slug, &Operated { taken: 0.0, ..PLAIN }),
        "At +2 °C, warming takes next to nothing of the reservoir's reliability by volume (98.6 %, 98.6 % at the reference): there is \
         nothing to bring back"
    );
    assert_eq!(
        title(slug, &Operated { levels_c: &[0.0], ..PLAIN }),
        "Reliability by volume is 98.6 % at the reference; no other level was run"
    );
}

/// By hand: shortage grows by 1 hm3 a degree from 5, of which 57 % come back: 7.00 and 5.86 at +2 degC. Where nothing spills, days
/// above the stated rule stand for it, 0.6 and 20 more.
#[test]
fn titles_say_what_less_shortage_costs() {
    let slug = "shortage-against-spill";
    let takes = "At +2 °C, refill 30 days earlier takes shortage from 7.00 to 5.86 hm³ a year";
    assert_eq!(title(slug, &PLAIN), format!("{takes} and spill from 0.50 to 1.00 hm³ a year"));
    assert_eq!(
        title(slug, &Operated { spill_hm3: [0.5, 0.0], ..PLAIN }),
        format!("{takes}; spill stays at 0.50 hm³ a year")
    );
    let dry = draw_in(UnitSystem::Metric, slug, &Operated { spill_hm3: [0.0, 0.0], ..PLAIN });
    assert_eq!(
        dry.title,
        format!("{takes} and days above the stated flood-space rule from 0.6 to 20.6 a year")
    );
    assert!(dry.caption.contains("Hardly any of these rules spills"), "{}", dry.caption);
    assert_eq!(
        title(slug, &Operated { brought_back: -0.4, ..PLAIN }),
        "At +2 °C, no date of refill that was tried makes shortage less than the 7.00 hm³ a year of the rules as stated"
    );
}

/// By hand: 0.6 days and 20 more for refill 30 days earlier, to whole days from ten on; other space for floods costs none here.
#[test]
fn what_a_change_costs_in_room_for_floods_is_said() {
    let cost = |change| cost_in_days_above(&PLAIN.operations(), change, 2);
    let said = " Storage would then stand above the stated flood-space rule on 21 days a year, 0.6 under the stated rules.";
    assert_eq!(cost(Change::RefillMovedDays(-30)).as_deref(), Some(said));
    assert_eq!(cost(Change::FloodSpaceTimes(0.5)), None);
}

/// By hand: years stray by 25 hm3 from a line that SWE moves by 50 hm3 to either side, so that 50²/(50² + 25²) = 80 % of the variance is
/// explained; at +2 degC they stray by twice as much, 50 %, or half as much, 94 %.
#[test]
fn titles_say_how_much_the_snow_explains() {
    let slug = "seasonal-outlook";
    let of = "water input, routed, 1 April to 31 July";
    assert_eq!(
        title(slug, &PLAIN),
        format!("At +2 °C, 1 April SWE explains less of {of}: 50 % of its variance, 80 % at the reference")
    );
    assert_eq!(
        title(slug, &Operated { strays: -0.25, ..PLAIN }),
        format!("At +2 °C, 1 April SWE explains more of {of}: 94 % of its variance, 80 % at the reference")
    );
    assert_eq!(
        title(slug, &Operated { strays: 0.0, is_observed: true, ..PLAIN }),
        "At +2 °C, 1 April SWE explains as much of inflow, 1 April to 31 July: 80 % of its variance, 80 % at the reference"
    );
    assert_eq!(
        title(slug, &Operated { realizations: 1, ..PLAIN }),
        format!("At the reference, 1 April SWE or {of} does not vary: nothing to foretell")
    );
}

/// What was not observed is not called inflow, nor is any foretelling of it called skill.
#[test]
fn water_input_is_called_inflow_only_where_it_was_observed() {
    for slug in ["inflow-by-month", "seasonal-outlook"] {
        let said = |is_observed: bool| {
            let svg = draw_in(UnitSystem::Metric, slug, &Operated { is_observed, ..PLAIN });
            let caption = svg.caption.replace("No inflow was observed", "");
            let words: String = texts(&svg.text).into_iter().map(|(_, words)| words + " ").collect();
            format!("{} {caption} {} {words}", svg.title, svg.alt)
        };
        assert!(!said(false).contains("inflow") && !said(false).contains("skill"), "{}", said(false));
        assert!(said(true).contains("inflow"), "{}", said(true));
    }
}

/// Rules that are many, levels that are many, and marks that lie on each other: words stay apart.
#[test]
fn words_stay_apart_in_every_reservoir() {
    let many: Vec<Change> = [Change::AsStated]
        .into_iter()
        .chain((-12..=12).filter(|step| *step != 0).map(|step| Change::RefillMovedDays(step * 5)))
        .collect();
    let nine = [-2.0, -1.0, 0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0];
    let all = [
        PLAIN,
        Operated { tried: &many, ..PLAIN },
        Operated { levels_c: &nine, reference: 2, ..PLAIN },
        Operated { levels_c: &[0.5, 1.0, 1.5], ..PLAIN },
        Operated { taken: 0.0, spill_hm3: [0.0, 0.0], ..PLAIN },
        Operated { spill_hm3: [9000.0, 900.0], ..PLAIN },
    ];
    for operated in &all {
        let findings = Operated { realizations: 10, ..*operated }.findings();
        for slug in SLUGS {
            for units in [UnitSystem::Metric, UnitSystem::Us] {
                draw(units, slug, &findings);
            }
        }
    }
}

/// Without water that is routed nothing is drawn of it; without a reservoir nothing of that.
#[test]
fn without_a_reservoir_there_is_water_alone() {
    let setting = Setting {
        study_title: "Alder Fork",
        units: UnitSystem::Metric,
        water_year_starts: WaterYearStart(MonthDay::new(10, 1).unwrap()),
        is_fitted: false,
    };
    let findings = PLAIN.findings();
    let operations = PLAIN.operations();
    let water = Operations {
        pool: None,
        reservoir: None,
        storage: Vec::new(),
        rule_changes: Vec::new(),
        ..operations.clone()
    };
    let drawn = |operations: Option<Operations>| -> Vec<&str> {
        let findings = Findings { operations, ..findings.clone() };
        SLUGS.into_iter().filter(|slug| (figure(slug).draw)(&findings, &setting).is_some()).collect()
    };
    assert_eq!(drawn(Some(operations)), SLUGS);
    assert_eq!(drawn(Some(water)), ["inflow-by-month", "seasonal-outlook"]);
    assert!(drawn(None).is_empty());
}
