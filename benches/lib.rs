//! What the benches share.
#![forbid(unsafe_code)]

use std::time::Duration;

/// Whether the bench runs once as a test, as `cargo bench -- --test` asks: then small meshes and no
/// time at all will do.
#[must_use]
pub fn is_test() -> bool {
    std::env::args().any(|word| word == "--test")
}

/// The time for each row of the benches that print their own: `SECONDS` in the environment, else
/// one second; as a test none.
#[must_use]
pub fn budget() -> Duration {
    if is_test() {
        return Duration::ZERO;
    }
    let seconds = std::env::var("SECONDS").ok().and_then(|seconds| seconds.parse().ok());
    Duration::from_secs_f64(seconds.unwrap_or(1.0))
}
