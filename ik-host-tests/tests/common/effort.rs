//! How hard the tests try: quick by default; `TOEHOLD_LONG=1` tries longer, and other random cases each time.

use proptest::test_runner::{Config, RngSeed};

/// Whether the long sweeps are asked for.
pub fn long() -> bool {
    std::env::var_os("TOEHOLD_LONG").is_some_and(|v| v == "1")
}

/// `short` cases from a fixed seed, so that the quick run is the same everywhere; or 50 times as many at random.
pub fn cases(short: u32) -> Config {
    let (cases, rng_seed) =
        if long() { (50 * short, RngSeed::Random) } else { (short, RngSeed::Fixed(0x70E_401D)) };
    // Integration tests have no `lib.rs` beside them where proptest could keep what failed; the seed is fixed.
    Config { cases, rng_seed, failure_persistence: None, ..Config::default() }
}

/// `short` rounds of a sweep, or 50 times as many.
pub fn rounds(short: usize) -> usize {
    if long() { 50 * short } else { short }
}
