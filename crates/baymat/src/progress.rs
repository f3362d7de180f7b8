//! A sign of life on standard error for work that takes longer than a second.

use std::sync::mpsc::{self, RecvTimeoutError};
use std::thread;
use std::time::Duration;

use indicatif::ProgressBar;

/// Work that ends before this shows nothing.
const PATIENCE: Duration = Duration::from_secs(1);
const TICK: Duration = Duration::from_millis(120);

/// Does some work; where `may_show` and it takes long, says what is being done until it is done.
pub(crate) fn during<T>(may_show: bool, doing: &str, work: impl FnOnce() -> T) -> T {
    if !may_show {
        return work();
    }
    let (done, waiting) = mpsc::channel::<()>();
    let doing = doing.to_owned();
    let watcher = thread::spawn(move || {
        if waiting.recv_timeout(PATIENCE) == Err(RecvTimeoutError::Timeout) {
            let bar = ProgressBar::new_spinner().with_message(doing);
            bar.enable_steady_tick(TICK);
            // Ends when the sender is dropped, also where the work panics.
            let _ = waiting.recv();
            bar.finish_and_clear();
        }
    });
    let result = work();
    drop(done);
    let _ = watcher.join();
    result
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_work_is_done_once_with_and_without_progress() {
        for may_show in [false, true] {
            let mut times = 0;
            assert_eq!(during(may_show, "designing", || times += 1), ());
            assert_eq!(times, 1);
        }
    }
}
