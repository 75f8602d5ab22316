//! Mean, standard deviation and correlations of a few numbers, none where they have none.

/// Numbers that lie closer together are the same but for rounding, mm or degC: nothing varies, and nothing correlates.
const SAME: f64 = 1e-9;

/// The mean; of no numbers none.
pub(super) fn mean(numbers: &[f64]) -> Option<f64> {
    (!numbers.is_empty()).then(|| numbers.iter().sum::<f64>() / numbers.len() as f64)
}

/// The sample standard deviation, over n - 1; none of fewer than two numbers.
pub(super) fn standard_deviation(numbers: &[f64]) -> Option<f64> {
    let mean = mean(numbers).filter(|_| numbers.len() > 1)?;
    let squares: f64 = numbers.iter().map(|number| (number - mean) * (number - mean)).sum();
    Some((squares / (numbers.len() as f64 - 1.0)).sqrt())
}

/// Departures from the mean and the sum of their squares; none where the numbers are the same but for rounding.
fn departures(numbers: &[f64]) -> Option<(Vec<f64>, f64)> {
    let mean = mean(numbers)?;
    let departures: Vec<f64> = numbers.iter().map(|number| number - mean).collect();
    let squares: f64 = departures.iter().map(|departure| departure * departure).sum();
    (squares > numbers.len() as f64 * SAME * SAME).then_some((departures, squares))
}

/// Pearson's correlation of paired numbers, -1 to 1; none of fewer than three pairs, and where either do not vary.
pub(super) fn correlation(first: &[f64], second: &[f64]) -> Option<f64> {
    let ((first, first_squares), (second, second_squares)) = (departures(first)?, departures(second)?);
    let products: f64 = first.iter().zip(&second).map(|(first, second)| first * second).sum();
    (first.len() > 2).then(|| products / (first_squares * second_squares).sqrt())
}

/// Lag-1 autocorrelation of yearly numbers, with the sum of squares over all n years as is usual for autocorrelations:
/// where some years do not follow on the one before them, the mean product of the pairs that there are stands for all n - 1.
/// None of fewer than three years, without a pair, and where the numbers do not vary.
pub(super) fn lag1_correlation(numbers: &[f64], follows: &[bool]) -> Option<f64> {
    let (departures, squares) = departures(numbers).filter(|_| numbers.len() > 2)?;
    let (mut products, mut pairs) = (0.0, 0.0);
    for (neighbours, follows) in departures.windows(2).zip(&follows[1..]) {
        if *follows {
            products += neighbours[0] * neighbours[1];
            pairs += 1.0;
        }
    }
    (pairs > 0.0).then(|| products / pairs * (numbers.len() as f64 - 1.0) / squares)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: 2, 4, 9 have the mean 5, departures -3, -1, 4 and squares 26; 26/2 is 13.
    #[test]
    fn means_and_deviations() {
        assert_eq!(mean(&[2.0, 4.0, 9.0]), Some(5.0));
        assert_eq!(standard_deviation(&[2.0, 4.0, 9.0]), Some(13.0_f64.sqrt()));
        assert_eq!([mean(&[]), standard_deviation(&[7.0])], [None, None]);
    }

    /// By hand: departures -3, -1, 4 and -1, 0, 1 have products 3 + 0 + 4 = 7, squares 26 and 2.
    #[test]
    fn correlations_of_pairs() {
        let found = correlation(&[2.0, 4.0, 9.0], &[1.0, 2.0, 3.0]).unwrap();
        assert!((found - 7.0 / 52.0_f64.sqrt()).abs() < 1e-15, "{found}");
        assert_eq!(correlation(&[2.0, 4.0], &[1.0, 2.0]), None, "two points lie on a line");
        assert_eq!(correlation(&[2.0, 4.0, 9.0], &[0.3, 0.1 + 0.2, 0.3]), None, "equal but for rounding");
    }

    /// By hand: 1, 3, 2, 6 have the mean 3, departures -2, 0, -1, 3 and squares 14. Products of neighbours 0, 0, -3: -3/14.
    /// Where the last year does not follow, the mean of 0 and 0 stands for three; where only it follows, -3 does: -9/14.
    #[test]
    fn correlation_with_the_year_before() {
        let found = |follows: [bool; 4]| lag1_correlation(&[1.0, 3.0, 2.0, 6.0], &follows);
        assert_eq!(found([false, true, true, true]), Some(-3.0 / 14.0));
        assert_eq!(found([false, true, true, false]), Some(0.0));
        assert_eq!(found([false, false, false, true]), Some(-9.0 / 14.0));
        assert_eq!(found([false; 4]), None, "no year follows on another");
        assert_eq!(lag1_correlation(&[1.0, 3.0], &[false, true]), None);
    }
}
