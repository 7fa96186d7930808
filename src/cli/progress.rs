//! How far a long run is: one line on a terminal that is rewritten and cleared, nothing anywhere else.

use std::io::{IsTerminal, Write};
use std::sync::Mutex;
use std::time::{Duration, Instant};

/// Time between two lines.
const PAUSE: Duration = Duration::from_millis(200);
/// Back to the start of the line, and clear it.
const CLEAR: &str = "\r\u{1b}[K";

/// The line of one run.
pub(super) struct Progress {
    noun: &'static str,
    total: usize,
    on_terminal: bool,
    /// When the line was written last; the start of the run before that.
    last: Mutex<Instant>,
}

impl Progress {
    /// A run of `total` steps, called `noun`.
    pub(super) fn new(noun: &'static str, total: usize) -> Self {
        let on_terminal = std::io::stderr().is_terminal();
        Self { noun, total, on_terminal, last: Mutex::new(Instant::now()) }
    }

    /// Tells that `done` steps are done.
    pub(super) fn tell(&self, done: usize) {
        // Whoever finds the line in use leaves it to the other.
        let Ok(mut last) = self.last.try_lock() else { return };
        if self.on_terminal && last.elapsed() >= PAUSE {
            *last = Instant::now();
            let (total, noun) = (self.total, self.noun);
            let beyond = done.saturating_sub(total);
            let more = if beyond > 0 { format!(", {beyond} more to locate jumps") } else { String::new() };
            write(&format!("{CLEAR}{} of {total} {noun}{more}", done.min(total)));
        }
    }

    /// Clears the line.
    pub(super) fn finish(&self) {
        if self.on_terminal {
            write(CLEAR);
        }
    }
}

/// A standard error that cannot be written leaves nobody to tell.
fn write(text: &str) {
    let mut stream = std::io::stderr().lock();
    let _ = stream.write_all(text.as_bytes()).and_then(|()| stream.flush());
}
