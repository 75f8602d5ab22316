use super::MixedExponential;
use rand::SeedableRng;
use rand::rngs::ChaCha8Rng;

/// The mixture of WG-05.
const LAW: MixedExponential =
    MixedExponential { smaller_share: 0.4, smaller_mean_mm: 3.0, larger_mean_mm: 15.0, above_mm: 0.0 };

/// Thirty amounts above 0.25 mm, a few of them much larger than the rest.
const THIRTY: [f64; 30] = [
    11.3, 3.5, 2.5, 18.8, 2.1, 6.5, 4.0, 6.5, 0.8, 3.3, 0.7, 11.3, 0.4, 2.6, 0.9, 11.0, 1.9, 2.2, 4.0, 8.5,
    6.7, 0.8, 5.5, 10.9, 2.1, 2.0, 5.0, 61.3, 11.5, 7.5,
];
/// Amounts above 0.25 mm of two kinds of days, with means of about 1 and 14 mm.
const TWO_KINDS: [f64; 39] = [
    0.31, 4.11, 11.15, 1.39, 1.08, 1.48, 0.8, 1.58, 24.7, 0.31, 34.48, 19.25, 3.22, 0.81, 32.05, 6.65, 13.72,
    4.89, 26.33, 12.12, 0.75, 43.66, 1.32, 0.55, 10.66, 2.17, 15.32, 5.86, 0.88, 41.51, 0.32, 0.38, 30.49,
    1.22, 4.56, 12.66, 0.56, 1.82, 0.95,
];

/// WG-05 (Wilks 1999, Agric. For. Meteor. 93:153): share 0.4, means 3 and 15 give mean 10.2, variance 173.16 and
/// P(X > 20) = 0.158667, the last to the digits given. The density is summed by Simpson's rule in steps of 0.01 mm up to
/// 600 mm, beyond which 1e-17 lies; its own error is below 1e-9.
#[test]
fn moments_of_the_density() {
    const STEP: f64 = 0.01;
    let sum_from = |from: f64, of: &dyn Fn(f64) -> f64| -> f64 {
        let steps = ((600.0 - from) / STEP).round() as usize;
        let term = |at: usize| {
            let x = from + STEP * at as f64;
            let [a, b] = LAW.densities(x);
            let weight = if at == 0 || at == steps { 1.0 } else { 2.0 + 2.0 * (at % 2) as f64 };
            weight * of(x) * (a + b)
        };
        (0..=steps).map(term).sum::<f64>() * STEP / 3.0
    };
    let mean = sum_from(0.0, &|x| x);
    assert!((sum_from(0.0, &|_| 1.0) - 1.0).abs() < 1e-9);
    assert!((mean - 10.2).abs() < 1e-7, "{mean}");
    assert!((sum_from(0.0, &|x| (x - mean) * (x - mean)) - 173.16).abs() < 1e-5);
    assert!((sum_from(20.0, &|_| 1.0) - 0.158_667).abs() < 1e-6);
}

/// The same of 200 000 draws, within four standard errors: of the mean `sqrt(173.16/n)`; of the share `sqrt(p (1-p)/n)`;
/// of the variance from the fourth moment about the mean, 295 443 (raw moments `k! (0.4*3^k + 0.6*15^k)`).
#[test]
fn moments_of_draws() {
    let mut random = ChaCha8Rng::seed_from_u64(5);
    let draws: Vec<f64> = (0..200_000).map(|_| LAW.draw(&mut random)).collect();
    let count = draws.len() as f64;
    let mean = draws.iter().sum::<f64>() / count;
    let variance = draws.iter().map(|x| (x - 10.2) * (x - 10.2)).sum::<f64>() / count;
    let share = draws.iter().filter(|x| **x > 20.0).count() as f64 / count;
    let raw = |k: f64, factorial: f64| factorial * (0.4 * libm::pow(3.0, k) + 0.6 * libm::pow(15.0, k));
    let m = 10.2;
    let fourth = raw(4.0, 24.0) - 4.0 * m * raw(3.0, 6.0) + 6.0 * m * m * raw(2.0, 2.0) - 3.0 * m * m * m * m;
    let within = |found: f64, expected: f64, square: f64| {
        assert!((found - expected).abs() < 4.0 * libm::sqrt(square / count), "{found} for {expected}");
    };
    within(mean, 10.2, 173.16);
    within(variance, 173.16, fourth - 173.16 * 173.16);
    within(share, 0.158_667, 0.158_667 * (1.0 - 0.158_667));
    let above = MixedExponential { above_mm: 1.0, ..LAW };
    assert!((0..1000).all(|_| above.draw(&mut random) >= 1.0));
}

/// Share, means and log-likelihood by `scipy.optimize.minimize` (Nelder-Mead from 27 starts, xatol 1e-12, fatol 1e-14,
/// scipy 1.17.1) on the sum of log densities in the logit of the share and the logarithms of the means. The likelihood is
/// flat about its maximum: it is held to 1e-8, the parameters to 1e-4.
#[test]
fn most_likely_of_stated_samples() {
    let cases = [
        (&THIRTY[..], [0.939_617_91, 4.962_622_29, 37.931_185_77], -85.200_838_744_243_91),
        (&TWO_KINDS[..], [0.422_165_54, 0.767_679_60, 15.694_343_68], -113.964_715_031_616_24),
    ];
    for (sample, [share, smaller, larger], likelihood) in cases {
        let (found, reached) = MixedExponential::most_likely(sample, 0.25);
        assert!((reached - likelihood).abs() < 1e-8, "log-likelihood {reached} for {likelihood}");
        let off =
            [found.smaller_share / share, found.smaller_mean_mm / smaller, found.larger_mean_mm / larger];
        assert!(
            off.iter().all(|ratio| (ratio - 1.0).abs() < 1e-4),
            "{found:?} for {share} {smaller} {larger}"
        );
    }
}

/// Of 20 000 draws the parameters come back within four standard errors. Those of the logit of the share and of the
/// logarithms of the means are from the Fisher information, integrated numerically with numpy 2.4.6.
#[test]
fn known_laws_come_back() {
    let cases = [
        (LAW, [0.048_81, 0.031_32, 0.014_81]),
        (
            MixedExponential {
                smaller_share: 0.45,
                smaller_mean_mm: 1.0,
                larger_mean_mm: 14.0,
                above_mm: 0.25,
            },
            [0.021_63, 0.018_03, 0.011_35],
        ),
    ];
    let mut random = ChaCha8Rng::seed_from_u64(6);
    for (law, errors) in cases {
        let draws: Vec<f64> = (0..20_000).map(|_| law.draw(&mut random)).collect();
        let (found, _) = MixedExponential::most_likely(&draws, law.above_mm);
        for ((found, law), error) in found.free().iter().zip(law.free()).zip(errors) {
            assert!((found - law).abs() < 4.0 * error, "{found} for {law}, standard error {error}");
        }
    }
}

/// Samples that are no mixture: all equal, two values, one exponential alone (its quantiles), one far out. What comes is
/// finite and draws finite amounts, and its mean is the sample's: each step of expectation and maximization keeps it, up
/// to the bounds of shares and means.
#[test]
fn degenerate_samples() {
    let exponential: Vec<f64> =
        (0..200).map(|at| 0.3 - 6.0 * libm::log(1.0 - (f64::from(at) + 0.5) / 200.0)).collect();
    let samples: [&[f64]; 5] =
        [&[2.0; 40], &[0.5, 30.0, 0.5, 30.0], &exponential, &[1e6, 1.0, 1.0, 2.0], &[0.300_001; 30]];
    let mut random = ChaCha8Rng::seed_from_u64(7);
    for sample in samples {
        let (found, likelihood) = MixedExponential::most_likely(sample, 0.3);
        let MixedExponential { smaller_share, smaller_mean_mm, larger_mean_mm, .. } = found;
        let all = [smaller_share, smaller_mean_mm, larger_mean_mm, likelihood];
        assert!(all.iter().all(|value| value.is_finite()), "{found:?} {likelihood}");
        assert!((0.0..=1.0).contains(&smaller_share) && 0.0 < smaller_mean_mm);
        assert!(smaller_mean_mm <= larger_mean_mm);
        assert!((0..100).all(|_| found.draw(&mut random).is_finite()));
        let mean = smaller_share * smaller_mean_mm + (1.0 - smaller_share) * larger_mean_mm;
        let of_sample = sample.iter().map(|mm| mm - 0.3).sum::<f64>() / sample.len() as f64;
        assert!((mean / of_sample - 1.0).abs() < 0.01, "mean {mean} for {of_sample}");
    }
}
