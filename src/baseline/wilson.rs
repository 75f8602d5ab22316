//! The interval of a proportion: Wilson (1927).

use super::NORMAL_975;

/// Wilson's 95 % score interval of the chance of what was so in `count` years of `n`, 0 to 1; none of no years, or of
/// more than all.
///
/// `(p + z^2/2n -+ z*sqrt(p(1-p)/n + z^2/4n^2))/(1 + z^2/n)`, p = count/n, z = 1.96. It never leaves 0 to 1, and has a
/// width even where the count is 0 or n. Years are taken for independent.
///
/// ```
/// let [low, high] = thawline::baseline::wilson(0, 30).unwrap();
/// assert_eq!(low, 0.0);
/// assert!((high - 0.1135).abs() < 1e-4);
/// ```
pub fn wilson(count: usize, n: usize) -> Option<[f64; 2]> {
    if n == 0 || count > n {
        return None;
    }
    let (total, square) = (n as f64, NORMAL_975 * NORMAL_975);
    let share = count as f64 / total;
    let middle = share + square / (2.0 * total);
    let spread = share * (1.0 - share) / total + square / (4.0 * total * total);
    let reach = NORMAL_975 * spread.sqrt();
    let scale = 1.0 + square / total;
    // At the ends the formula gives 0 and 1 but for rounding.
    let low = if count == 0 { 0.0 } else { (middle - reach) / scale };
    let high = if count == n { 1.0 } else { (middle + reach) / scale };
    Some([low, high])
}
