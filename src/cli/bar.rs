//! A bar on a terminal's stderr while much is read.

use std::io::IsTerminal;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::Duration;

use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};

use crate::text::progress;

/// Looks at the progress so often, and shows nothing before so many looks.
const EVERY: Duration = Duration::from_millis(100);
const QUICK: u32 = 5;

/// Runs `work`, with a bar beside it where stderr is a terminal and nobody asked for quiet.
pub(super) fn beside<T>(quiet: bool, work: impl FnOnce() -> T) -> T {
    if quiet || !std::io::stderr().is_terminal() {
        return work();
    }
    let done = Arc::new(AtomicBool::new(false));
    std::thread::scope(|scope| {
        let watched = Arc::clone(&done);
        scope.spawn(move || watch(&watched));
        let result = work();
        done.store(true, Ordering::Relaxed);
        result
    })
}

fn watch(done: &AtomicBool) {
    let bar = ProgressBar::with_draw_target(Some(0), ProgressDrawTarget::stderr());
    let style = "{bar:40} {bytes} of {total_bytes}, {eta} to go";
    bar.set_style(
        ProgressStyle::with_template(style).unwrap_or_else(|_| ProgressStyle::default_bar()),
    );
    let mut looks = 0;
    while !done.load(Ordering::Relaxed) {
        std::thread::sleep(EVERY);
        looks += 1;
        let (announced, read) = progress();
        if looks > QUICK && announced > read {
            bar.set_length(announced);
            bar.set_position(read);
        }
    }
    bar.finish_and_clear();
}
