//! Work on several processors.

use std::sync::atomic::{AtomicUsize, Ordering};

/// What `work` makes of each item, as many at a time as there are processors; in the order of the
/// items, and the same as one after the other. After each, `done` hears how many are.
pub fn side_by_side<T: Sync, R: Send>(
    items: &[T],
    work: impl Fn(&T) -> R + Sync,
    done: impl Fn(usize) + Sync,
) -> Vec<R> {
    side_by_side_on(processors(), items, work, done)
}

pub(super) fn processors() -> usize {
    std::thread::available_parallelism().map_or(1, usize::from)
}

/// As [`side_by_side`], on so many threads.
pub(super) fn side_by_side_on<T: Sync, R: Send>(
    threads: usize,
    items: &[T],
    work: impl Fn(&T) -> R + Sync,
    done: impl Fn(usize) + Sync,
) -> Vec<R> {
    let workers = threads.min(items.len());
    let (next, finished) = (AtomicUsize::new(0), AtomicUsize::new(0));
    let part = || {
        let mut made = Vec::new();
        loop {
            let i = next.fetch_add(1, Ordering::Relaxed);
            let Some(item) = items.get(i) else { return made };
            made.push((i, work(item)));
            done(finished.fetch_add(1, Ordering::Relaxed) + 1);
        }
    };
    let mut made: Vec<(usize, R)> = std::thread::scope(|scope| {
        let threads: Vec<_> = (1..workers).map(|_| scope.spawn(part)).collect();
        let mut made = part();
        for thread in threads {
            // A thread can only fail by a panic, which is passed on.
            made.extend(thread.join().unwrap_or_else(|panic| std::panic::resume_unwind(panic)));
        }
        made
    });
    made.sort_by_key(|&(i, _)| i);
    made.into_iter().map(|(_, result)| result).collect()
}
