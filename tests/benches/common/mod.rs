//! What the benchmarks share: a model from its text, and the clock.
#![allow(dead_code, clippy::panic)]

use stook_lang::model::Model;

/// A checked model; a benchmark's own text has no errors.
pub(crate) fn model(text: &str) -> Model {
    match stook_lang::check::check_text(text) {
        (Some(model), _) => model,
        (None, problems) => panic!("{:#?}", problems.reports()),
    }
}

/// The smallest of some repeated timings, in seconds.
pub(crate) fn fastest(times: usize, mut work: impl FnMut()) -> f64 {
    let one = |_| {
        let start = std::time::Instant::now();
        work();
        start.elapsed().as_secs_f64()
    };
    (0..times).map(one).fold(f64::INFINITY, f64::min)
}
