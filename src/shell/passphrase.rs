//! Asks for a passphrase on the terminal without showing it. It keeps nothing and prints nothing.

use std::io;

use crossterm::event::{Event, KeyCode, KeyEvent, KeyEventKind, KeyModifiers, read};
use crossterm::terminal::{disable_raw_mode, enable_raw_mode};
use zeroize::Zeroizing;

/// What the person at the keys did.
#[derive(Debug, PartialEq, Eq)]
pub enum Asked {
    /// Typed this and pressed Enter.
    Typed(Zeroizing<String>),
    /// Broke off.
    BrokenOff,
}

struct Raw;

impl Raw {
    fn enter() -> io::Result<Self> {
        enable_raw_mode().map(|()| Self)
    }
}

impl Drop for Raw {
    fn drop(&mut self) {
        // Nothing better can be done about a terminal that does not go back.
        let _ = disable_raw_mode();
    }
}

/// Reads one hidden line from the terminal.
///
/// # Errors
/// The system's error where there is no terminal.
pub fn ask_hidden() -> io::Result<Asked> {
    let _raw = Raw::enter()?;
    let mut typed = Zeroizing::new(String::with_capacity(256));
    loop {
        let Event::Key(key) = read()? else { continue };
        if key.kind == KeyEventKind::Release {
            continue;
        }
        match meaning(key) {
            Meaning::Character(c) => typed.push(c),
            Meaning::Back => {
                typed.pop();
            }
            Meaning::Done => return Ok(Asked::Typed(typed)),
            Meaning::BreakOff => return Ok(Asked::BrokenOff),
            Meaning::Nothing => {}
        }
    }
}

enum Meaning {
    Character(char),
    Back,
    Done,
    BreakOff,
    Nothing,
}

fn meaning(key: KeyEvent) -> Meaning {
    let control = key.modifiers.contains(KeyModifiers::CONTROL);
    if key.code == KeyCode::Enter {
        Meaning::Done
    } else if key.code == KeyCode::Backspace {
        Meaning::Back
    } else if key.code == KeyCode::Esc || (control && key.code == KeyCode::Char('c')) {
        Meaning::BreakOff
    } else if let (KeyCode::Char(c), false) = (key.code, control) {
        Meaning::Character(c)
    } else {
        Meaning::Nothing
    }
}
