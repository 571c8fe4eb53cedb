//! How far long work has come: on a terminal, on standard error, and nowhere else.

use std::io::{self, IsTerminal, Write};
use std::sync::Mutex;
use std::time::{Duration, Instant};

/// A line that tells how many parts of some work are done, and is gone when the work is.
pub(super) struct Progress {
    what: &'static str,
    /// Of the line that stands there; `None` where nobody looks.
    line: Option<Mutex<Line>>,
}

struct Line {
    started: Instant,
    length: usize,
}

/// Work that takes no longer than this needs no line.
const SHORT: Duration = Duration::from_millis(250);
/// Letters of the bar.
const BAR: usize = 24;

impl Progress {
    pub(super) fn of(what: &'static str) -> Self {
        let seen = io::stderr().is_terminal();
        let line = Line { started: Instant::now(), length: 0 };
        Self { what, line: seen.then(|| Mutex::new(line)) }
    }

    /// Tells that so many are done. Plain letters without colour; the line writes over itself.
    pub(super) fn show(&self, done: usize, total: usize) {
        let Some(mut line) = self.line.as_ref().and_then(|line| line.lock().ok()) else { return };
        if line.started.elapsed() < SHORT {
            return;
        }
        let full = BAR * done.min(total) / total.max(1);
        let bar = format!("{}{}", "#".repeat(full), "-".repeat(BAR - full));
        let text = format!("{bar}  {done} of {total} {}", self.what);
        let blank = " ".repeat(line.length.saturating_sub(text.len()));
        line.length = text.len();
        // Nothing sensible can be done when standard error is closed.
        let _ = write!(io::stderr().lock(), "\r{text}{blank}");
        let _ = io::stderr().flush();
    }
}

impl Drop for Progress {
    fn drop(&mut self) {
        let length = self.line.as_ref().and_then(|line| Some(line.lock().ok()?.length)).unwrap_or(0);
        if length > 0 {
            let _ = write!(io::stderr().lock(), "\r{}\r", " ".repeat(length));
        }
    }
}
