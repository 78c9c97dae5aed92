//! The screens. Each is a pure function of the view; none keeps anything.

mod compact;
mod gauge;
mod header;
mod ladder;
mod now;
mod overlay;
mod paper;
mod side;
mod stretch;

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use super::ascii;
use super::desk::Desk;
use super::look::{Letters, Look};
use crate::session::{Session, Stage, Stamp};
use paper::Paper;

/// Everything a screen is made from.
#[derive(Debug, Clone, Copy)]
pub struct View<'a> {
    /// The day's state.
    pub session: &'a Session,
    /// What is half typed.
    pub desk: &'a Desk,
    /// Now.
    pub now: &'a Stamp,
    /// Minutes from UTC to local time.
    pub offset_min: i32,
    /// How it is painted.
    pub look: Look,
    /// The record's code.
    pub code: &'a str,
    /// Whether the record holds demo keys.
    pub demo: bool,
}

/// The least size that shows a work screen; below the compact size only a line is shown.
const WIDE: (u16, u16) = (80, 24);
const LEAST: (u16, u16) = (40, 12);

/// Whether a window of this size shows what is asked. In a smaller one only STOP is taken.
pub const fn shows_what_is_asked(width: u16, height: u16) -> bool {
    width >= LEAST.0 && height >= LEAST.1
}

/// Draws the view into a buffer.
pub fn draw(view: &View<'_>, area: Rect, buffer: &mut Buffer) {
    let mut paper = Paper::new(buffer, area, view.look);
    if area.width < LEAST.0 || area.height < LEAST.1 {
        let words = format!(
            "needs {}x{}, has {}x{}; SPACE stops",
            LEAST.0, LEAST.1, area.width, area.height
        );
        paper.bold(0, 0, &words);
    } else if let Some(stretch) = &view.session.stretch {
        stretch::draw(view, stretch, &mut paper);
    } else if area.width < WIDE.0 || area.height < WIDE.1 {
        compact::draw(view, &mut paper);
    } else {
        work(view, &mut paper);
    }
    overlay::draw(view, &mut paper);
    if view.look.letters == Letters::Ascii {
        ascii::fold(buffer);
    }
}

/// Ladder left, now right, pictures where they were.
fn work(view: &View<'_>, paper: &mut Paper<'_>) {
    header::draw(view, paper);
    let (width, height) = paper.size();
    let body = Rect::new(0, 2, width, height - 4);
    const LEFT: u16 = 29;
    let right_edge = if width >= 118 { width - 42 } else { width };
    paper.column_line(LEFT, body);
    let picture = if right_edge == width {
        ladder::Below::Stump
    } else {
        ladder::Below::Words
    };
    ladder::draw(
        view,
        paper,
        (Rect::new(0, body.y, LEFT - 1, body.height), picture),
    );
    now::draw(
        view,
        paper,
        Rect::new(LEFT + 2, body.y, right_edge - LEFT - 3, body.height),
    );
    if right_edge < width {
        paper.column_line(right_edge, body);
        side::draw(
            view,
            paper,
            Rect::new(right_edge + 2, body.y, width - right_edge - 3, body.height),
        );
    }
    header::footer(view, paper);
}

/// Whether the present stage shows the stump below its ladder.
fn shows_stump(session: &Session) -> bool {
    matches!(session.stage, Stage::Cuts | Stage::HoldLine) && session.card().is_some()
}
