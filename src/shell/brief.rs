//! The loop of the terminal program: draw, wait, take a key, until it is left. Time moves only
//! what is drawn, never the state.

use std::io;
use std::time::Duration;

use thiserror::Error;

use super::beginning::{DayError, Ground};
use super::day::Day;
use super::terminal::{Heard, Screen};
use crate::tui::{self, Key, Look, View};

/// How the program was left.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Left {
    /// By the person at the keys.
    Quit,
    /// By a signal.
    Signal(i32),
    /// With the record unable to take anything more.
    OnPaper,
}

/// Why it ended otherwise.
#[derive(Debug, Error)]
pub enum BriefError {
    /// The day.
    #[error(transparent)]
    Day(#[from] DayError),
    /// The terminal.
    #[error("the terminal: {0}")]
    Terminal(#[from] io::Error),
}

/// Opens the day and runs it until it is left; gives how, and the record's code.
///
/// # Errors
/// [`BriefError`]; the terminal is then as it was.
pub fn run(ground: Ground, look: Look) -> Result<(Left, String), BriefError> {
    let mut day = Day::open(ground)?;
    let mut screen = Screen::take()?;
    let left = turn(&mut day, &mut screen, look)?;
    drop(screen);
    Ok((left, day.code().to_owned()))
}

fn turn(day: &mut Day, screen: &mut Screen, look: Look) -> Result<Left, BriefError> {
    let mut failed: Option<io::Error> = None;
    loop {
        paint(screen, day, look)?;
        match screen.wait(until_next_change(day))? {
            Heard::End(number) => return Ok(Left::Signal(number)),
            Heard::Nothing => day.on_quiet()?,
            Heard::Resized => {}
            Heard::Key(key) if !is_taken(screen.size()?, &key) => {}
            Heard::Key(key) => {
                let mut redraw = |day: &Day| {
                    if let Err(error) = paint(screen, day, look) {
                        failed.get_or_insert(error);
                    }
                };
                if day.on_key(&key, &mut redraw)? {
                    return Ok(if day.on_paper {
                        Left::OnPaper
                    } else {
                        Left::Quit
                    });
                }
            }
        }
        if let Some(error) = failed.take() {
            return Err(error.into());
        }
    }
}

/// Where the window cannot show what is asked nothing is answered; STOP and leaving are taken.
fn is_taken((width, height): (u16, u16), key: &Key) -> bool {
    tui::shows_what_is_asked(width, height) || matches!(key, Key::Char(' ') | Key::Interrupt)
}

/// The time to the next full second, when the clock on the screen changes; never long enough for
/// a signal to wait.
fn until_next_change(day: &Day) -> Duration {
    let (now, _) = day.now();
    let rest = 1_000 - now.utc_ms.rem_euclid(1_000);
    Duration::from_millis(u64::try_from(rest).unwrap_or(1_000).min(250))
}

fn paint(screen: &mut Screen, day: &Day, look: Look) -> io::Result<()> {
    let (now, offset_min) = day.now();
    screen.draw(|area, buffer| {
        let view = View {
            session: &day.session,
            desk: &day.desk,
            now: &now,
            offset_min,
            look,
            code: day.code(),
            demo: day.demo(),
        };
        tui::draw(&view, area, buffer);
    })
}
