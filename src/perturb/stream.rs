//! Streams of random numbers: one a realization, from the seed and its number alone.

use rand::SeedableRng;
use rand::rngs::ChaCha8Rng;

/// The stream of one realization. Streams of the same seed never overlap, whatever the order they are drawn in.
pub fn stream(seed: u64, realization: u32) -> ChaCha8Rng {
    numbered(seed, u64::from(realization))
}

/// The stream that resamples realizations for the Monte Carlo error: beyond those of all realizations.
pub fn resampling_stream(seed: u64) -> ChaCha8Rng {
    numbered(seed, 1 << 32)
}

/// The streams that resample the record: beyond all others.
pub(super) fn record_stream(seed: u64, number: u32) -> ChaCha8Rng {
    numbered(seed, (1 << 33) + u64::from(number))
}

/// The stream by which a generator learns how its own years vary: beyond all others.
pub(super) fn calibration_stream(seed: u64) -> ChaCha8Rng {
    numbered(seed, 1 << 34)
}

/// The stream that decides about the wet days of a realization where warming changes them: beyond all others.
pub(super) fn wet_day_stream(seed: u64, realization: u32) -> ChaCha8Rng {
    numbered(seed, (1 << 35) + u64::from(realization))
}

/// The stream of a searcher for parameters: beyond all others.
pub fn search_stream(seed: u64, searcher: usize) -> ChaCha8Rng {
    numbered(seed, (1 << 36) + searcher as u64)
}

/// The stream that draws the winters of a fit anew: beyond all others.
pub fn winters_stream(seed: u64) -> ChaCha8Rng {
    numbered(seed, 1 << 37)
}

fn numbered(seed: u64, stream: u64) -> ChaCha8Rng {
    let mut random = ChaCha8Rng::seed_from_u64(seed);
    random.set_stream(stream);
    random
}
