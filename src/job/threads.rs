//! Work side by side on threads of our own.

use std::sync::atomic::{AtomicUsize, Ordering};

/// `work` on each of `items`, in their order, on threads of our own: a worker of a pool that waits for an inner piece of work
/// takes up the next outer one meanwhile, and some hundred exports deep its stack is full.
pub(super) fn side_by_side<T: Sync, R: Send>(items: &[T], work: impl Fn(&T) -> R + Sync) -> Vec<R> {
    let next = AtomicUsize::new(0);
    let take = || {
        let mut done = Vec::new();
        loop {
            let place = next.fetch_add(1, Ordering::Relaxed);
            let Some(item) = items.get(place) else {
                return done;
            };
            done.push((place, work(item)));
        }
    };
    let mut done: Vec<(usize, R)> = std::thread::scope(|scope| {
        let threads = rayon::current_num_threads().min(items.len());
        let threads: Vec<_> = (0..threads).map(|_| scope.spawn(take)).collect();
        let join = |thread: std::thread::ScopedJoinHandle<'_, Vec<(usize, R)>>| match thread.join()
        {
            Ok(done) => done,
            Err(panic) => std::panic::resume_unwind(panic),
        };
        threads.into_iter().flat_map(join).collect()
    });
    done.sort_by_key(|(place, _)| *place);
    done.into_iter().map(|(_, result)| result).collect()
}
