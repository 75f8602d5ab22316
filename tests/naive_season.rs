//! The season measures written out a second time, for one column of one water year, straight from their definitions.
//!
//! Days are counted from 1; `swe_mm[d - 1]` is S(d), SWE as day d begins. Only S(1) to S(n) are measured, so the slice
//! holds as many values as the year has days.

/// A date that may not be there.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum When {
    /// Day of the water year, from 1.
    Day(usize),
    /// There is no such day: too little snow.
    None,
    /// Snow lies until the year ends.
    NotGone,
}

/// Whether melt-out is judged for a band or for the basin.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Place {
    /// Gone below 1 mm.
    Band,
    /// Gone at 5 % of the peak.
    Basin,
}

/// Below this peak, timing is none, mm.
const LEAST_PEAK_MM: f64 = 10.0;

/// SWE this close is the same: ice and liquid that only change places round differently, mm.
const SAME_MM: f64 = 1e-9;

/// The year's largest S and the first day it stands.
pub fn peak(swe_mm: &[f64]) -> (f64, usize) {
    let mut largest = swe_mm[0];
    for d in 1..=swe_mm.len() {
        if swe_mm[d - 1] > largest {
            largest = swe_mm[d - 1];
        }
    }
    let mut on_day = 1;
    while swe_mm[on_day - 1] < largest - SAME_MM {
        on_day += 1;
    }
    (largest, on_day)
}

/// The day of the peak.
pub fn peak_day(swe_mm: &[f64]) -> When {
    let (largest, on_day) = peak(swe_mm);
    if largest < LEAST_PEAK_MM { When::None } else { When::Day(on_day) }
}

/// First day on which cumulative net melt reaches a share of its total.
pub fn melt_share_day(swe_mm: &[f64], net_melt_mm: &[f64], share: f64) -> When {
    let mut total = 0.0;
    for melt in net_melt_mm {
        total += melt;
    }
    if total < 1.0 || peak(swe_mm).0 < LEAST_PEAK_MM {
        return When::None;
    }
    let mut sum = 0.0;
    for d in 1..=net_melt_mm.len() {
        sum += net_melt_mm[d - 1];
        if sum >= share * total {
            return When::Day(d);
        }
    }
    When::Day(net_melt_mm.len())
}

/// First day after the peak with half of it or less.
pub fn half_gone(swe_mm: &[f64]) -> When {
    first_after_peak(swe_mm, |swe, largest| swe <= 0.5 * largest)
}

/// First day after the peak on which the snow is gone.
pub fn melt_out(swe_mm: &[f64], place: Place) -> When {
    match place {
        Place::Band => first_after_peak(swe_mm, |swe, _| swe < 1.0),
        Place::Basin => first_after_peak(swe_mm, |swe, largest| swe <= 0.05 * largest),
    }
}

fn first_after_peak(swe_mm: &[f64], is_met: impl Fn(f64, f64) -> bool) -> When {
    let (largest, on_day) = peak(swe_mm);
    if largest < LEAST_PEAK_MM {
        return When::None;
    }
    for d in on_day + 1..=swe_mm.len() {
        if is_met(swe_mm[d - 1], largest) {
            return When::Day(d);
        }
    }
    When::NotGone
}

/// Last day of the year with at least 1 mm. Snow that never goes below 1 mm after the peak is not gone.
pub fn last_snow(swe_mm: &[f64]) -> When {
    let (largest, on_day) = peak(swe_mm);
    if largest < LEAST_PEAK_MM {
        return When::None;
    }
    let mut went = false;
    for d in on_day..=swe_mm.len() {
        if swe_mm[d - 1] < 1.0 {
            went = true;
        }
    }
    if !went {
        return When::NotGone;
    }
    for d in (1..=swe_mm.len()).rev() {
        if swe_mm[d - 1] >= 1.0 {
            return When::Day(d);
        }
    }
    When::None
}

/// Sum of a flux over the days `from..=to`.
pub fn in_window(flux_mm: &[f64], from: usize, to: usize) -> f64 {
    let mut sum = 0.0;
    for d in from..=to {
        sum += flux_mm[d - 1];
    }
    sum
}

/// `sum(t*q)/sum(q)`, a date like the others: none where the peak stays low or nothing flows.
pub fn centroid(swe_mm: &[f64], outflow_mm: &[f64]) -> Option<f64> {
    if peak(swe_mm).0 < LEAST_PEAK_MM {
        return None;
    }
    let (mut moment, mut sum) = (0.0, 0.0);
    for d in 1..=outflow_mm.len() {
        moment += d as f64 * outflow_mm[d - 1];
        sum += outflow_mm[d - 1];
    }
    if sum == 0.0 { None } else { Some(moment / sum) }
}

/// The sum of S over the year's days.
pub fn swe_area(swe_mm: &[f64]) -> f64 {
    let mut sum = 0.0;
    for swe in swe_mm {
        sum += swe;
    }
    sum
}

/// S on a day over the peak.
pub fn over_peak(swe_mm: &[f64], survey: usize) -> Option<f64> {
    let largest = peak(swe_mm).0;
    if largest < LEAST_PEAK_MM { None } else { Some(swe_mm[survey - 1] / largest) }
}

/// Net melt of the days before a day over the year's.
pub fn melt_share_before(swe_mm: &[f64], net_melt_mm: &[f64], day: usize) -> Option<f64> {
    let total = in_window(net_melt_mm, 1, net_melt_mm.len());
    if total < 1.0 || peak(swe_mm).0 < LEAST_PEAK_MM {
        return None;
    }
    Some(in_window(net_melt_mm, 1, day - 1) / total)
}

/// The largest sum of a flux over so many days in succession.
pub fn largest(flux_mm: &[f64], days: usize) -> f64 {
    let mut largest = 0.0;
    for last in days..=flux_mm.len() {
        let sum = in_window(flux_mm, last + 1 - days, last);
        if sum > largest {
            largest = sum;
        }
    }
    largest
}

/// First day by which a flux has brought an amount since the year began.
pub fn arrival(flux_mm: &[f64], amount_mm: f64) -> Option<usize> {
    let mut sum = 0.0;
    for d in 1..=flux_mm.len() {
        sum += flux_mm[d - 1];
        if sum >= amount_mm {
            return Some(d);
        }
    }
    None
}

/// Snowfall over all that fell.
pub fn snowfall_fraction(rain_mm: &[f64], snow_mm: &[f64]) -> Option<f64> {
    let (rain, snow) = (in_window(rain_mm, 1, rain_mm.len()), in_window(snow_mm, 1, snow_mm.len()));
    if rain + snow == 0.0 { None } else { Some(snow / (rain + snow)) }
}

/// All that fell on the days before one.
pub fn fallen_before(rain_mm: &[f64], snow_mm: &[f64], day: usize) -> f64 {
    in_window(rain_mm, 1, day - 1) + in_window(snow_mm, 1, day - 1)
}

/// S on a day over all that fell on the days before it.
pub fn over_precipitation(swe_mm: &[f64], rain_mm: &[f64], snow_mm: &[f64], survey: usize) -> Option<f64> {
    let fallen = in_window(rain_mm, 1, survey - 1) + in_window(snow_mm, 1, survey - 1);
    if fallen == 0.0 { None } else { Some(swe_mm[survey - 1] / fallen) }
}

/// Days with at least 10 mm of rain on at least 10 mm of SWE.
pub fn rain_on_snow_days(swe_mm: &[f64], rain_mm: &[f64]) -> usize {
    let mut count = 0;
    for d in 1..=rain_mm.len() {
        if rain_mm[d - 1] >= 10.0 && swe_mm[d - 1] >= 10.0 {
            count += 1;
        }
    }
    count
}
