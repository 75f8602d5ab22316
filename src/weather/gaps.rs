//! Short temperature gaps are interpolated; longer ones stay open and cost their water years.

/// A run of days without a full pair of temperatures: first day and length.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Gap {
    pub first: usize,
    pub days: usize,
}

/// Fills every gap of at most `longest_days` between two measured days, minima and maxima each on the straight line
/// between their neighbours. A day that lacks one of the pair is a gap as a whole, so that a pair is never mixed.
///
/// Returns the filled pair (days still open hold NaN) and the gaps that stay open.
pub(super) fn fill(
    tmin_c: &[Option<f64>],
    tmax_c: &[Option<f64>],
    longest_days: usize,
) -> (Vec<f64>, Vec<f64>, Vec<Gap>) {
    let pairs: Vec<Option<(f64, f64)>> =
        tmin_c.iter().zip(tmax_c).map(|(tmin, tmax)| tmin.zip(*tmax)).collect();
    let mut filled: Vec<(f64, f64)> = pairs.iter().map(|pair| pair.unwrap_or((f64::NAN, f64::NAN))).collect();
    let mut open = Vec::new();
    let mut day = 0;
    while day < pairs.len() {
        if pairs[day].is_some() {
            day += 1;
            continue;
        }
        let first = day;
        while day < pairs.len() && pairs[day].is_none() {
            day += 1;
        }
        let gap = Gap { first, days: day - first };
        let before = first.checked_sub(1).and_then(|before| pairs[before]);
        let after = pairs.get(day).copied().flatten();
        let (Some(before), Some(after)) = (before, after) else {
            open.push(gap);
            continue;
        };
        if gap.days > longest_days {
            open.push(gap);
            continue;
        }
        for step in 1..=gap.days {
            let share = step as f64 / (gap.days + 1) as f64;
            let between = |from: f64, to: f64| from + (to - from) * share;
            filled[first + step - 1] = (between(before.0, after.0), between(before.1, after.1));
        }
    }
    let (tmin, tmax) = filled.into_iter().unzip();
    (tmin, tmax, open)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn short_gaps_are_straight_lines_and_edges_stay_open() {
        let tmin = [None, Some(0.0), None, Some(4.0), Some(5.0), None, None, Some(8.0)];
        let tmax = [Some(9.0), Some(10.0), Some(50.0), Some(14.0), None, Some(1.0), None, Some(18.0)];
        let (low, high, open) = fill(&tmin, &tmax, 2);
        assert_eq!(
            (low[2], high[2]),
            (2.0, 12.0),
            "the lone maximum of 50 is not mixed with a filled minimum"
        );
        assert!(low[5].is_nan() && high[0].is_nan());
        assert_eq!(open, [Gap { first: 0, days: 1 }, Gap { first: 4, days: 3 }]);
    }
}
