//! Wall and CPU seconds of a phase.

use std::time::Instant;

use cpu_time::ProcessTime;
use stook_sampler::answer::Seconds;

/// Does some work and times it. Where the system does not tell the CPU time, the wall time stands for it.
pub(crate) fn timed<R>(work: impl FnOnce() -> R) -> (R, Seconds) {
    let (start, before) = (Instant::now(), ProcessTime::try_now());
    let result = work();
    let wall = start.elapsed().as_secs_f64();
    let spent = before.and_then(|before| before.try_elapsed());
    (result, Seconds { wall, cpu: spent.map_or(wall, |spent| spent.as_secs_f64()) })
}
