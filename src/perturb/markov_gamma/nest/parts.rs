//! How the parts of a year are nested: what each is like in the chain and in the record.

use super::super::common_year::CommonYear;
use super::super::lag_one::LagOne;
use super::super::scores::Normal;
use super::super::sums::{DrawnPart, RecordPart};
use super::sequence::Sequence;
use super::{PartNest, Stage};

/// The spread of daily temperature within a part is changed by a factor within these.
const SPREADS: [f64; 2] = [0.5, 2.0];
/// Fits the parts.
pub(super) fn part_nests(
    year: &CommonYear,
    wet_above_mm: f64,
    record: &[Vec<RecordPart>],
    follows: &[bool],
    drawn: &[Vec<DrawnPart>],
) -> Vec<PartNest> {
    let count = year.parts.len();
    let zero = Stage {
        own: [Normal::default(); 2],
        own_memory: LagOne::NONE,
        target: [Normal::default(); 2],
        target_memory: LagOne::NONE,
    };
    let mut parts: Vec<PartNest> = (0..count)
        .map(|at| {
            let (days, is_cool) = year.parts[at];
            PartNest {
                days: days as f64,
                season: usize::from(!is_cool),
                spread: spread_factor(
                    days as f64,
                    record.iter().map(|year| year[at]),
                    drawn.iter().map(|year| year[at]),
                ),
                stage: zero.clone(),
                excess_factor: 1.0,
                shift_c: 0.0,
            }
        })
        .collect();
    let of_drawn = |year: &Vec<DrawnPart>| -> Vec<[f64; 2]> {
        let of_part = |(part, drawn): (&PartNest, &DrawnPart)| {
            [libm::sqrt(wet_above_mm * drawn.wet_days + drawn.excess_mm), part.mean_c(drawn)]
        };
        parts.iter().zip(year).map(of_part).collect()
    };
    let own = Sequence::of(&drawn.iter().map(of_drawn).collect::<Vec<_>>(), &vec![true; drawn.len()]);
    let roots = |year: &Vec<RecordPart>| -> Vec<[f64; 2]> {
        year.iter().map(|part| [libm::sqrt(part.precipitation_mm), part.mean_c]).collect()
    };
    let of_record = Sequence::of(&record.iter().map(roots).collect::<Vec<_>>(), follows).steadied();
    for (at, part) in parts.iter_mut().enumerate() {
        let before = (at + count - 1) % count;
        let total = Normal::of(&record.iter().map(|year| year[at].precipitation_mm).collect::<Vec<_>>());
        part.stage = Stage {
            own: own.normal[at],
            own_memory: LagOne::of(&own.m0[at], &own.m0[before], &own.m1[at]),
            target: [Normal::root_of(total), of_record.normal[at][1]],
            target_memory: LagOne::of(&of_record.m0[at], &of_record.m0[before], &of_record.m1[at]),
        };
    }
    parts
}

/// The factor on departures with which daily temperature varies as much within a part as in the record; how much it
/// varies from year to year is the nesting's.
fn spread_factor(
    days: f64,
    record: impl ExactSizeIterator<Item = RecordPart>,
    drawn: impl Iterator<Item = DrawnPart>,
) -> f64 {
    let years = record.len() as f64;
    let wanted = record.map(|part| part.variance_c2).sum::<f64>() / years;
    let within = |sum: f64, squares: f64| squares / days - (sum / days) * (sum / days);
    let (mut usual, mut departures, mut count) = (0.0, 0.0, 0.0);
    for part in drawn {
        usual += within(part.usual_c, part.squares_c2[0]);
        departures += within(part.departure_c, part.squares_c2[1]);
        count += 1.0;
    }
    if departures <= 0.0 {
        return 1.0;
    }
    libm::sqrt(((wanted - usual / count) / (departures / count)).max(0.0)).clamp(SPREADS[0], SPREADS[1])
}
