//! Work shared among threads; the results are in the order of the work, whichever thread did it.

use std::sync::Mutex;

/// Applies `work` to each item on at most `threads` threads.
pub(crate) fn share<T: Send, R: Send>(
    items: Vec<T>,
    threads: usize,
    work: impl Fn(usize, T) -> R + Sync,
) -> Vec<R> {
    let count = items.len();
    let waiting = Mutex::new(items.into_iter().enumerate());
    let done: Mutex<Vec<Option<R>>> = Mutex::new((0..count).map(|_| None).collect());
    let next = || match waiting.lock() {
        Ok(mut waiting) => waiting.next(),
        Err(_) => None,
    };
    let worker = || {
        while let Some((at, item)) = next() {
            let result = work(at, item);
            if let Ok(mut done) = done.lock() {
                done[at] = Some(result);
            }
        }
    };
    std::thread::scope(|scope| {
        for _ in 1..threads.clamp(1, count.max(1)) {
            scope.spawn(worker);
        }
        worker();
    });
    done.into_inner().unwrap_or_default().into_iter().flatten().collect()
}
