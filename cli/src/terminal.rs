//! Standard output and error: whether they are terminals, how wide, with colours or without.

use std::io::{IsTerminal, Write, stderr, stdout};

/// The narrowest screen that is laid out for.
const NARROWEST: usize = 60;
/// The widest: longer lines are hard to follow.
const WIDEST: usize = 160;
/// Where there is no terminal.
const WITHOUT_TERMINAL: usize = 80;

/// Columns of standard output; without a terminal those of the variable COLUMNS, or 80.
pub(crate) fn width() -> usize {
    let terminal = terminal_size::terminal_size_of(stdout()).map(|(width, _)| usize::from(width.0));
    let variable = || std::env::var("COLUMNS").ok().and_then(|text| text.parse().ok());
    let width = terminal.or_else(variable).unwrap_or(WITHOUT_TERMINAL);
    if width == 0 { WITHOUT_TERMINAL } else { width.clamp(NARROWEST, WIDEST) }
}

/// Whether standard output takes colours.
pub(crate) fn stdout_colour() -> bool {
    stdout().is_terminal() && colours_wanted()
}

/// Whether standard error takes colours.
pub(crate) fn stderr_colour() -> bool {
    stderr().is_terminal() && colours_wanted()
}

/// Whether a progress bar can be shown.
pub(crate) fn shows_progress() -> bool {
    stderr().is_terminal() && std::env::var_os("TERM").is_none_or(|term| term != "dumb")
}

/// The variable NO_COLOR, set and not empty, forbids colours.
fn colours_wanted() -> bool {
    let forbidden = std::env::var_os("NO_COLOR").is_some_and(|value| !value.is_empty());
    !forbidden && std::env::var_os("TERM").is_none_or(|term| term != "dumb")
}

/// Writes to standard output. A reader that has gone away is no error: what it did not want is dropped.
pub(crate) fn print(text: &str) -> std::io::Result<()> {
    let mut out = stdout().lock();
    match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
        Err(error) if error.kind() == std::io::ErrorKind::BrokenPipe => Ok(()),
        other => other,
    }
}

/// Writes to standard error; where that fails there is nobody left to tell.
pub(crate) fn complain(text: &str) {
    let _ = stderr().lock().write_all(text.as_bytes());
}
