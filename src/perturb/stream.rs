//! Streams of random numbers: one a realization, from the seed and its number alone.

use rand::SeedableRng;
use rand::rngs::ChaCha8Rng;

/// The stream of one realization. Streams of the same seed never overlap, whatever the order they are drawn in.
pub fn stream(seed: u64, realization: u32) -> ChaCha8Rng {
    let mut random = ChaCha8Rng::seed_from_u64(seed);
    random.set_stream(u64::from(realization));
    random
}

/// The stream that resamples realizations for the Monte Carlo error: beyond those of all realizations.
pub fn resampling_stream(seed: u64) -> ChaCha8Rng {
    let mut random = ChaCha8Rng::seed_from_u64(seed);
    random.set_stream(1 << 32);
    random
}
