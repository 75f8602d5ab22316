//! Totals and means as standard scores: precipitation by its square root, temperature as it is.

/// Mean and standard deviation of a quantity that is taken for normal.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Normal {
    /// Mean.
    pub mean: f64,
    /// Standard deviation.
    pub spread: f64,
}

impl Normal {
    /// Of values, the standard deviation with n - 1; of one value it is 0.
    pub fn of(values: &[f64]) -> Self {
        let count = values.len() as f64;
        let mean = values.iter().sum::<f64>() / count;
        let squares: f64 = values.iter().map(|value| (value - mean) * (value - mean)).sum();
        let variance = if values.len() > 1 { squares / (count - 1.0) } else { 0.0 };
        Self { mean, spread: libm::sqrt(variance) }
    }

    /// The normal root whose square has the mean and the standard deviation of a total: from `E[y^2] = m^2 + s^2` and
    /// `Var[y^2] = 4 m^2 s^2 + 2 s^4` follows `m^4 = M^2 - V/2`. A total that varies more than such a square can, beyond
    /// `V = 2 M^2`, is given as much as it can have.
    pub fn root_of(total: Self) -> Self {
        let square = (total.mean * total.mean - total.spread * total.spread / 2.0).max(0.0);
        let mean_square = libm::sqrt(square);
        Self { mean: libm::sqrt(mean_square), spread: libm::sqrt((total.mean - mean_square).max(0.0)) }
    }

    /// The standard score of a value; 0 where nothing varies.
    pub fn score(&self, value: f64) -> f64 {
        if self.spread > 0.0 { (value - self.mean) / self.spread } else { 0.0 }
    }

    /// The value of a standard score.
    pub fn value(&self, score: f64) -> f64 {
        self.mean + self.spread * score
    }
}

/// The square of a root of a total; a root below 0 is nothing.
pub fn squared(root: f64) -> f64 {
    let root = root.max(0.0);
    root * root
}

/// Mean product of two columns of standard scores.
pub fn mean_product(pairs: impl Iterator<Item = (f64, f64)>) -> f64 {
    let (mut sum, mut count) = (0.0, 0.0);
    for (a, b) in pairs {
        sum += a * b;
        count += 1.0;
    }
    if count > 0.0 { sum / count } else { 0.0 }
}

#[cfg(test)]
mod tests;
