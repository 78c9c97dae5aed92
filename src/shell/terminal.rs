//! The terminal: raw mode, keys in, frames out. It is put back exactly once, on every way out:
//! quit, error, panic and signals.

#![expect(
    clippy::disallowed_methods,
    reason = "this file is the door to the screen"
)]

use std::io::{self, Stdout};
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, AtomicUsize, Ordering};
use std::time::Duration;

use crossterm::event::{
    self, DisableBracketedPaste, EnableBracketedPaste, Event, KeyCode, KeyEventKind, KeyModifiers,
};
use crossterm::execute;
use crossterm::terminal::{
    EnterAlternateScreen, LeaveAlternateScreen, disable_raw_mode, enable_raw_mode,
};
use ratatui::Terminal;
use ratatui::backend::CrosstermBackend;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use rustix::event::{PollFd, PollFlags, Timespec, poll};
use signal_hook::consts::{SIGHUP, SIGINT, SIGTERM};

use crate::tui::Key;

/// Whether a screen is taken and must be given back.
static TAKEN: AtomicBool = AtomicBool::new(false);

/// What the terminal says.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Heard {
    /// A key.
    Key(Key),
    /// The window has another size.
    Resized,
    /// Nothing within the time.
    Nothing,
    /// A signal asks the program to end.
    End(i32),
}

/// The terminal while the program has it.
pub struct Screen {
    terminal: Terminal<CrosstermBackend<Stdout>>,
    signal: Arc<AtomicUsize>,
}

impl Screen {
    /// Takes the terminal.
    ///
    /// # Errors
    /// What the system says; the terminal is then as it was.
    pub fn take() -> io::Result<Self> {
        let signal = Arc::new(AtomicUsize::new(0));
        for number in [SIGTERM, SIGHUP, SIGINT] {
            let value = usize::try_from(number).unwrap_or(usize::MAX);
            signal_hook::flag::register_usize(number, Arc::clone(&signal), value)?;
        }
        give_back_on_panic();
        TAKEN.store(true, Ordering::SeqCst);
        let taken = enable_raw_mode()
            .and_then(|()| {
                execute!(
                    io::stdout(),
                    EnterAlternateScreen,
                    EnableBracketedPaste,
                    crossterm::cursor::Hide
                )
            })
            .and_then(|()| Terminal::new(CrosstermBackend::new(io::stdout())));
        match taken {
            Ok(terminal) => Ok(Self { terminal, signal }),
            Err(error) => {
                give_back();
                Err(error)
            }
        }
    }

    /// Draws a frame.
    ///
    /// # Errors
    /// What the system says.
    pub fn draw(&mut self, paint: impl FnOnce(Rect, &mut Buffer)) -> io::Result<()> {
        self.terminal.draw(|frame| {
            let area = frame.area();
            paint(area, frame.buffer_mut());
        })?;
        Ok(())
    }

    /// Columns and rows of the window.
    ///
    /// # Errors
    /// What the system says.
    pub fn size(&self) -> io::Result<(u16, u16)> {
        let size = self.terminal.size()?;
        Ok((size.width, size.height))
    }

    /// Waits for a key, a resize, a signal, or the end of the time.
    ///
    /// # Errors
    /// What the system says.
    pub fn wait(&self, most: Duration) -> io::Result<Heard> {
        let ends = || match self.signal.load(Ordering::SeqCst) {
            0 => None,
            number => Some(Heard::End(i32::try_from(number).unwrap_or(SIGTERM))),
        };
        if let Some(end) = ends() {
            return Ok(end);
        }
        if hung_up(Duration::ZERO)? {
            return Ok(Heard::End(SIGHUP));
        }
        if !event::poll(Duration::ZERO)? {
            if hung_up(most)? {
                return Ok(Heard::End(SIGHUP));
            }
            if let Some(end) = ends() {
                return Ok(end);
            }
            if !event::poll(Duration::ZERO)? {
                return Ok(Heard::Nothing);
            }
        }
        Ok(match event::read()? {
            Event::Key(key) if key.kind != KeyEventKind::Release => {
                key_of(key.code, key.modifiers).map_or(Heard::Nothing, Heard::Key)
            }
            Event::Paste(text) => Heard::Key(Key::Paste(text)),
            Event::Resize(_, _) => Heard::Resized,
            Event::Key(_) | Event::FocusGained | Event::FocusLost | Event::Mouse(_) => {
                Heard::Nothing
            }
        })
    }
}

/// Waits for keys up to a time; true where the terminal is gone. The library that reads keys would
/// read its end for ever, so it is asked only while the terminal is there.
fn hung_up(most: Duration) -> io::Result<bool> {
    let stdin = io::stdin();
    let mut keys = [PollFd::new(&stdin, PollFlags::IN)];
    let time = Timespec::try_from(most).map_err(io::Error::other)?;
    match poll(&mut keys, Some(&time)) {
        Ok(_) => Ok(keys[0]
            .revents()
            .intersects(PollFlags::HUP | PollFlags::ERR | PollFlags::NVAL)),
        Err(rustix::io::Errno::INTR) => Ok(false),
        Err(error) => Err(error.into()),
    }
}

impl Drop for Screen {
    fn drop(&mut self) {
        give_back();
    }
}

/// Puts the terminal back, once.
fn give_back() {
    if TAKEN.swap(false, Ordering::SeqCst) {
        // On the way out there is nobody left to tell of a terminal that is gone.
        let _ = execute!(
            io::stdout(),
            DisableBracketedPaste,
            LeaveAlternateScreen,
            crossterm::cursor::Show
        );
        let _ = disable_raw_mode();
    }
}

fn give_back_on_panic() {
    let before = std::panic::take_hook();
    std::panic::set_hook(Box::new(move |info| {
        give_back();
        before(info);
    }));
}

fn key_of(code: KeyCode, modifiers: KeyModifiers) -> Option<Key> {
    if modifiers.contains(KeyModifiers::CONTROL) {
        return (code == KeyCode::Char('c')).then_some(Key::Interrupt);
    }
    match code {
        KeyCode::Char(c) => Some(Key::Char(c)),
        KeyCode::Enter => Some(Key::Enter),
        KeyCode::Esc => Some(Key::Esc),
        KeyCode::Tab => Some(Key::Tab),
        KeyCode::Backspace => Some(Key::Backspace),
        KeyCode::Up => Some(Key::Up),
        KeyCode::Down => Some(Key::Down),
        KeyCode::Left => Some(Key::Left),
        KeyCode::Right => Some(Key::Right),
        KeyCode::Home
        | KeyCode::End
        | KeyCode::PageUp
        | KeyCode::PageDown
        | KeyCode::BackTab
        | KeyCode::Delete
        | KeyCode::Insert
        | KeyCode::F(_)
        | KeyCode::Null
        | KeyCode::CapsLock
        | KeyCode::ScrollLock
        | KeyCode::NumLock
        | KeyCode::PrintScreen
        | KeyCode::Pause
        | KeyCode::Menu
        | KeyCode::KeypadBegin
        | KeyCode::Media(_)
        | KeyCode::Modifier(_) => None,
    }
}
