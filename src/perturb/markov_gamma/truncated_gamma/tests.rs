use super::super::incomplete_gamma::upper_share;
use super::{Sample, TruncatedGamma, standard_gamma};
use rand::SeedableRng;
use rand::rngs::ChaCha8Rng;
use rand_distr::{Distribution, Gamma};

/// The sample of WG-04: ten amounts, mm.
const TEN: [f64; 10] = [0.5, 1.2, 2.0, 3.1, 4.4, 6.0, 8.3, 11.5, 17.0, 30.0];
/// Thirty amounts above 0.25 mm, read to a tenth.
const THIRTY: [f64; 30] = [
    11.3, 3.5, 2.5, 18.8, 2.1, 6.5, 4.0, 6.5, 0.8, 3.3, 0.7, 11.3, 0.4, 2.6, 0.9, 11.0, 1.9, 2.2, 4.0, 8.5,
    6.7, 0.8, 5.5, 10.9, 2.1, 2.0, 5.0, 61.3, 11.5, 7.5,
];

/// Shape and scale are `scipy.optimize.minimize` (Nelder-Mead, xatol 1e-12, fatol 1e-14, scipy 1.17.1) on
/// `-(gamma.logpdf(x, k, scale=s).sum() - n*gamma.logsf(above, k, scale=s))` in the logarithms of both; the first row is
/// also WG-04's exact likelihood (shape 0.980267, scale 8.569097). A maximum found by its values alone is known to about
/// the root of the rounding, hence 1e-6; its value to 1e-10.
#[test]
fn most_likely_of_stated_samples() {
    let cases = [
        (&TEN[..], 0.0, [0.980_266_70, 8.569_096_53], -31.281_024_524_193_747),
        (&TEN[..], 0.4, [0.595_803_73, 12.088_322_89], -30.493_341_815_552_544),
        (&THIRTY[..], 0.25, [0.670_609_60, 9.746_551_44], -87.503_351_525_074_27),
    ];
    for (sample, above_mm, [shape, scale_mm], likelihood) in cases {
        let (found, reached) = TruncatedGamma::most_likely(sample, above_mm).unwrap();
        assert!((found.shape / shape - 1.0).abs() < 1e-6, "shape {} for {shape}", found.shape);
        assert!((found.scale_mm / scale_mm - 1.0).abs() < 1e-6, "scale {} for {scale_mm}", found.scale_mm);
        assert!((reached - likelihood).abs() < 1e-10, "log-likelihood {reached} for {likelihood}");
    }
}

/// Log-likelihoods away from the maximum, by `gamma.logpdf(TEN, k, scale=s).sum() - 10*gamma.logsf(above, k, scale=s)` of
/// `scipy.stats`, scipy 1.17.1; 1e-10, since sums of ten terms of some tens are rounded at 1e-14 each.
#[test]
fn log_likelihoods() {
    let sample = Sample {
        count: 10.0,
        mean: TEN.iter().sum::<f64>() / 10.0,
        mean_log: TEN.iter().map(|mm| libm::log(*mm)).sum::<f64>() / 10.0,
    };
    let cases = [
        (0.5, 12.0, 0.0, -32.83823315535073),
        (0.5, 12.0, 0.4, -30.55985531954621),
        (1.0, 8.0, 0.25, -30.98191541679836),
        (2.5, 3.0, 0.4, -35.224202858511845),
    ];
    for (shape, scale_mm, above_mm, expected) in cases {
        let found = TruncatedGamma { shape, scale_mm, above_mm }.log_likelihood(sample);
        assert!((found - expected).abs() < 1e-10, "{found} for {expected}");
    }
}

/// Of 20 000 draws of a known law, shape and scale come back within four standard errors. The standard errors of their
/// logarithms are those of the Fisher information of the truncated law, worked numerically with scipy 1.17.1 (squares of
/// the slopes of `gamma.logpdf - gamma.logsf` at 200 000 quantiles of the law).
#[test]
fn known_laws_come_back() {
    let cases = [
        (0.4, 10.0, 0.0, [0.008_09, 0.013_80]),
        (0.4, 10.0, 1.0, [0.040_42, 0.020_13]),
        (0.8, 8.0, 0.25, [0.014_08, 0.014_15]),
        (1.0, 8.0, 0.5, [0.013_99, 0.013_84]),
        (3.0, 4.0, 1.0, [0.010_05, 0.010_75]),
        (3.0, 4.0, 0.0, [0.009_50, 0.010_34]),
    ];
    let mut random = ChaCha8Rng::seed_from_u64(2);
    for (shape, scale_mm, above_mm, [of_shape, of_scale]) in cases {
        let law = TruncatedGamma { shape, scale_mm, above_mm };
        let amounts: Vec<f64> = (0..20_000).map(|_| law.draw(&mut random)).collect();
        assert!(amounts.iter().all(|mm| *mm > above_mm));
        let (found, _) = TruncatedGamma::most_likely(&amounts, above_mm).unwrap();
        let off =
            [libm::log(found.shape / shape) / of_shape, libm::log(found.scale_mm / scale_mm) / of_scale];
        assert!(off.iter().all(|off| off.abs() < 4.0), "{law:?}: {found:?}, {off:?} standard errors off");
    }
}

/// A gamma variable of shape a has mean a, variance a, and a mean square of `(x - a)^2 - a` of `2 a^2 + 6 a` (fourth moment
/// `3 a^2 + 6 a`); four standard errors of 100 000 draws. Its whole distribution is held against the share function by the
/// distance of Kolmogorov and Smirnov, which exceeds `2/sqrt n` once in 1500 times, and against the random-number crate's own
/// gamma, two samples, for which it is `2 sqrt(2/n)`.
#[test]
fn standard_gamma_draws() {
    const DRAWS: usize = 100_000;
    let count = DRAWS as f64;
    let mut random = ChaCha8Rng::seed_from_u64(3);
    for shape in [0.3, 0.5, 1.0, 2.5] {
        let mut own: Vec<f64> = (0..DRAWS).map(|_| standard_gamma(shape, &mut random)).collect();
        let mean = own.iter().sum::<f64>() / count;
        let variance = own.iter().map(|x| (x - shape) * (x - shape)).sum::<f64>() / count;
        let errors = [shape, 2.0 * shape * shape + 6.0 * shape].map(|square| libm::sqrt(square / count));
        assert!((mean - shape).abs() < 4.0 * errors[0], "mean {mean} of shape {shape}");
        assert!((variance - shape).abs() < 4.0 * errors[1], "variance {variance} of shape {shape}");
        own.sort_by(f64::total_cmp);
        let off = |(at, x): (usize, &f64)| (1.0 - upper_share(shape, *x) - (at as f64 + 0.5) / count).abs();
        let distance = own.iter().enumerate().map(off).fold(0.0, f64::max);
        assert!(distance < 2.0 / libm::sqrt(count), "shape {shape}: {distance} from the law");
        let reference = Gamma::new(shape, 1.0).unwrap();
        let mut other: Vec<f64> = (0..DRAWS).map(|_| reference.sample(&mut random)).collect();
        other.sort_by(f64::total_cmp);
        let off = |(at, x): (usize, &f64)| {
            (other.partition_point(|other| other <= x) as f64 - (at + 1) as f64).abs() / count
        };
        let distance = own.iter().enumerate().map(off).fold(0.0, f64::max);
        assert!(distance < 2.0 * libm::sqrt(2.0 / count), "shape {shape}: {distance} from the crate's own");
    }
}

/// Samples that no gamma is meant for: all equal, two values, one far out. What comes is none or finite.
#[test]
fn degenerate_samples() {
    let samples: [&[f64]; 5] =
        [&[2.0; 40], &[0.5, 30.0], &[0.300_001; 30], &[1e6, 1.0, 1.0, 2.0], &[1e-3, 1e-3, 2e-3]];
    for sample in samples {
        for above_mm in [0.0, 0.3] {
            let sample: Vec<f64> = sample.iter().copied().filter(|mm| *mm > above_mm).collect();
            if sample.is_empty() {
                continue;
            }
            if let Some((found, likelihood)) = TruncatedGamma::most_likely(&sample, above_mm) {
                let all = [found.shape, found.scale_mm, likelihood];
                assert!(all.iter().all(|value| value.is_finite()), "{sample:?}: {found:?} {likelihood}");
                let mut random = ChaCha8Rng::seed_from_u64(4);
                assert!(found.draw(&mut random).is_finite());
            }
        }
    }
}

/// Draws that must not change, as this program made them when the test was written: they say nothing about being right.
#[test]
fn first_draws() {
    let mut random = ChaCha8Rng::seed_from_u64(1);
    let drawn: Vec<f64> =
        [0.3, 0.5, 1.0, 2.5, 40.0].iter().map(|shape| standard_gamma(*shape, &mut random)).collect();
    assert_eq!(
        drawn,
        [
            0.036_568_453_976_661_21,
            0.027_114_405_774_204_497,
            0.517_447_429_526_089_7,
            6.563_780_193_271_644,
            39.322_090_803_024_47
        ]
    );
}
