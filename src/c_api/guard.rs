//! The guard around every entry point: no panic and no foreign floating-point state crosses it.

use std::cell::Cell;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::atomic::{AtomicBool, Ordering};

use crate::parallel::Threads;
use crate::status::{Code, Failure};

/// Runs the body of an entry point and makes a status of its end.
#[inline(never)]
pub(super) fn guard(body: impl FnOnce() -> Result<Code, Failure>) -> i32 {
    quiet_hook();
    let _state = FloatState::ours();
    let _inside = Inside::enter();
    match catch_unwind(AssertUnwindSafe(body)) {
        Ok(Ok(code)) => code as i32,
        Ok(Err(failure)) => failure.status(),
        Err(_) => Code::Internal as i32,
    }
}

/// Threads of a call: each worker is born with all signals blocked, so that the host's handlers run on the host's own.
///
/// # Errors
/// `OutOfRange` for a count below 0 or above 1024.
pub(super) fn pool(count: i32) -> Result<Threads, Failure> {
    if !(0..=1024).contains(&count) {
        return Err(Failure::new(Code::OutOfRange));
    }
    Ok(Threads { count, before_start: block_signals, after_start: restore_signals, on_start: start_worker })
}

fn start_worker() {
    INSIDE.with(|inside| inside.set(true));
}

/// New threads inherit the mask of the caller, so it blocks all signals while they are started, and no longer: its own
/// handlers go on during the call. Blocking in the worker itself would leave a moment in which it takes a signal.
fn block_signals() {
    #[cfg(unix)]
    {
        let mut all = std::mem::MaybeUninit::<libc::sigset_t>::uninit();
        let mut host = std::mem::MaybeUninit::<libc::sigset_t>::uninit();
        // SAFETY: sigfillset fills the set before it is used; the old mask is read only where the call filled it.
        unsafe {
            libc::sigfillset(all.as_mut_ptr());
            if libc::pthread_sigmask(libc::SIG_SETMASK, all.as_ptr(), host.as_mut_ptr()) == 0 {
                SIGNALS.with(|signals| signals.set(Some(host.assume_init())));
            }
        }
    }
}

fn restore_signals() {
    #[cfg(unix)]
    if let Some(host) = SIGNALS.with(Cell::take) {
        // SAFETY: the mask is one that the system gave; a null old mask is allowed.
        unsafe { libc::pthread_sigmask(libc::SIG_SETMASK, &raw const host, std::ptr::null_mut()) };
    }
}

#[cfg(unix)]
thread_local! {
    static SIGNALS: Cell<Option<libc::sigset_t>> = const { Cell::new(None) };
}

thread_local! {
    static INSIDE: Cell<bool> = const { Cell::new(false) };
}

struct Inside(bool);

impl Inside {
    fn enter() -> Self {
        Self(INSIDE.with(|inside| inside.replace(true)))
    }
}

impl Drop for Inside {
    fn drop(&mut self) {
        INSIDE.with(|inside| inside.set(self.0));
    }
}

/// A caught panic must print nothing into the host; panics elsewhere keep their report.
fn quiet_hook() {
    static SET: AtomicBool = AtomicBool::new(false);
    if SET.load(Ordering::Relaxed) || SET.swap(true, Ordering::Relaxed) {
        return;
    }
    let before = std::panic::take_hook();
    std::panic::set_hook(Box::new(move |report| {
        if !INSIDE.with(Cell::get) {
            before(report);
        }
    }));
}

/// The floating-point state of IEEE 754 (round to nearest, no flush to zero, no traps) for the time of a call; the
/// host's own, with its flags, afterwards. A host built for speed, or one that traps invalid operations, would else
/// change our digits or be killed by our comparisons.
struct FloatState {
    #[cfg(target_arch = "x86_64")]
    host: u32,
    #[cfg(target_arch = "aarch64")]
    host: (u64, u64),
}

#[cfg(target_arch = "x86_64")]
impl FloatState {
    fn ours() -> Self {
        let mut host = 0_u32;
        let default = 0x1F80_u32;
        // SAFETY: both pointers lead to live 4-byte integers; 0x1F80 is the processor's power-on value.
        unsafe {
            std::arch::asm!("stmxcsr [{host}]", "ldmxcsr [{default}]", host = in(reg) &mut host,
                default = in(reg) &default, options(nostack));
        }
        Self { host }
    }
}

#[cfg(target_arch = "x86_64")]
impl Drop for FloatState {
    fn drop(&mut self) {
        // SAFETY: the value was read from the same register by `ours`.
        unsafe { std::arch::asm!("ldmxcsr [{host}]", host = in(reg) &self.host, options(nostack)) }
    }
}

#[cfg(target_arch = "aarch64")]
impl FloatState {
    fn ours() -> Self {
        let (control, flags): (u64, u64);
        // SAFETY: reads and writes the floating-point control register of this thread only.
        unsafe {
            std::arch::asm!("mrs {c}, fpcr", "mrs {f}, fpsr", "msr fpcr, xzr", c = out(reg) control, f = out(reg) flags,
                options(nostack));
        }
        Self { host: (control, flags) }
    }
}

#[cfg(target_arch = "aarch64")]
impl Drop for FloatState {
    fn drop(&mut self) {
        let (control, flags) = self.host;
        // SAFETY: the values were read from the same registers by `ours`.
        unsafe {
            std::arch::asm!("msr fpcr, {c}", "msr fpsr, {f}", c = in(reg) control, f = in(reg) flags, options(nostack))
        }
    }
}

#[cfg(not(any(target_arch = "x86_64", target_arch = "aarch64")))]
impl FloatState {
    fn ours() -> Self {
        Self {}
    }
}
