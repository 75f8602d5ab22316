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
