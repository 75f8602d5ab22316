//! Water from the pack: sums over windows, before and from stated days and over the year, the largest days, and the
//! centroid of snowpack outflow.

use super::sums::Sums;
use super::{Asked, Kind, LEAST_PEAK_MM, Measure, NONE, Peaks, SeasonSettings, name_of, rows};
use crate::calendar::{MonthDay, day_of_water_year};
use crate::snow::YearBlock;
use chrono::NaiveDate;

/// Water of which every sum is taken, as named in a measure's name and in its title.
const WATERS: [[&str; 2]; 2] = [["outflow", "snowpack outflow"], ["water_input", "water input"]];

/// A part of the year over which water is summed.
enum Part {
    Window([MonthDay; 2]),
    Before(MonthDay),
    From(MonthDay),
    Year,
}

impl Part {
    fn all(settings: &SeasonSettings) -> Vec<Self> {
        let windows = settings.volume_windows.iter().copied().map(Self::Window);
        let around = settings.outflow_before.iter().flat_map(|day| [Self::Before(*day), Self::From(*day)]);
        windows.chain(around).chain([Self::Year]).collect()
    }

    /// How it is said within a measure's name, and at the end of a title.
    fn words(&self) -> [String; 2] {
        match self {
            Self::Window([from, to]) => [
                format!("{}_to_{}", name_of(*from), name_of(*to)),
                format!(", {} to {}", from.words(), to.words()),
            ],
            Self::Before(day) => [format!("before_{}", name_of(*day)), format!(" before {}", day.words())],
            Self::From(day) => [format!("from_{}", name_of(*day)), format!(" from {} on", day.words())],
            Self::Year => ["year".to_owned(), " of the water year".to_owned()],
        }
    }

    /// Its days in a year, counted from 0, the last excluded.
    fn days(&self, first: NaiveDate, days: usize) -> [usize; 2] {
        let at = |day: &MonthDay| day_of_water_year(first, *day) - 1;
        match self {
            Self::Window([from, to]) => [at(from), at(to) + 1],
            Self::Before(day) => [0, at(day)],
            Self::From(day) => [at(day), days],
            Self::Year => [0, days],
        }
    }
}

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let mut list = Vec::new();
    for part in Part::all(settings) {
        let [name, title] = part.words();
        list.extend(WATERS.map(|[water, words]| {
            let name = format!("{water}_{name}_mm");
            Measure::new(Kind::AmountMm, name, format!("{words}{title}")).told_as_volume()
        }));
    }
    for (name, title) in [("1_day", "a day"), ("3_days", "3 days in succession")] {
        list.extend(WATERS.map(|[water, words]| {
            let name = format!("{water}_largest_{name}_mm");
            Measure::new(Kind::AmountMm, name, format!("largest {words} of {title}"))
        }));
    }
    let centroid = "centroid of snowpack outflow";
    list.push(Measure::new(Kind::DayOfWaterYear, "outflow_centroid_day", centroid));
    list
}

pub(super) fn take(block: &mut YearBlock, peaks: &Peaks, asked: &Asked, into: &mut [f64]) {
    let (width, days) = (block.width, block.days);
    let [outflow, bare_ground_rain] =
        [&block.outflow_mm[..days * width], &block.bare_ground_rain_mm[..days * width]];
    let parts: Vec<[usize; 2]> =
        Part::all(&asked.settings).iter().map(|part| part.days(block.first, days)).collect();
    let edges = || parts.iter().copied().flatten();
    let of_outflow = Sums::of(outflow, width, edges());
    let of_rain = Sums::of(bare_ground_rain, width, edges());

    let (sums, rest) = into.split_at_mut(parts.len() * WATERS.len() * width);
    for (pair, [from, to]) in sums.chunks_exact_mut(WATERS.len() * width).zip(&parts) {
        let (outflow, water_input) = pair.split_at_mut(width);
        outflow.fill(0.0);
        of_outflow.add(*from, *to, outflow);
        water_input.copy_from_slice(outflow);
        of_rain.add(*from, *to, water_input);
    }

    let (largest, centroid) = rest.split_at_mut(4 * width);
    rows::largest(outflow, bare_ground_rain, width, largest);

    let mut sum = vec![0.0; width];
    centroid.fill(0.0);
    rows::add_with_moment(outflow, &mut sum, centroid);
    for ((centroid, sum), peak) in centroid.iter_mut().zip(&sum).zip(&peaks.swe_mm) {
        *centroid = if *sum > 0.0 && *peak >= LEAST_PEAK_MM { *centroid / sum } else { NONE };
    }
}
