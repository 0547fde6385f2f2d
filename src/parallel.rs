//! Rows on several threads, results in the order of the rows.
//!
//! A pool is built and joined within the call: a pool that outlives it would hang a forked child. Each row is computed by
//! one thread in a fixed order of its own, so the results have the same bits for any number of threads.

use rayon::iter::{IntoParallelIterator, ParallelIterator};

/// How many threads a call may use, and what each new one does first.
#[derive(Clone, Copy, Debug)]
pub struct Threads {
    /// 1: the caller's thread only; 0: all that this process may use.
    pub count: i32,
    /// Run by the caller before new threads are started.
    pub before_start: fn(),
    /// Run by the caller as soon as they are.
    pub after_start: fn(),
    /// Run at the start of every new thread.
    pub on_start: fn(),
}

impl Threads {
    /// A number of threads without further ado.
    pub fn new(count: i32) -> Self {
        Self { count, before_start: || {}, after_start: || {}, on_start: || {} }
    }
}

/// Work below which new threads cost more than they bring, in units of `work` (about a microsecond).
const WORTH_A_POOL: usize = 4_000;
const STACK: usize = 2 << 20;

/// `row(0) … row(n − 1)` in order. `work` is a rough count of microseconds that decides whether threads are worth it.
/// Where no thread can be started the caller's does all.
pub fn map_rows<T: Send>(n: usize, work: usize, threads: Threads, row: impl Fn(usize) -> T + Sync) -> Vec<T> {
    let count = match threads.count {
        0 => std::thread::available_parallelism().map_or(1, usize::from),
        count => usize::try_from(count).unwrap_or(1),
    }
    .min(n);
    if count > 1 && work >= WORTH_A_POOL {
        let pooled = rayon::ThreadPoolBuilder::new().num_threads(count).stack_size(STACK);
        (threads.before_start)();
        let results = pooled.build_scoped(
            |thread| {
                (threads.on_start)();
                thread.run();
            },
            |pool| {
                (threads.after_start)();
                pool.install(|| (0..n).into_par_iter().map(&row).collect())
            },
        );
        match results {
            Ok(results) => return results,
            Err(_) => (threads.after_start)(),
        }
    }
    (0..n).map(row).collect()
}
