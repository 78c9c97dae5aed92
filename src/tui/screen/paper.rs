//! A sheet to write on: lines of text at places, nothing past its edges.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;
use unicode_normalization::UnicodeNormalization;

use crate::tui::look::{Letters, Look};

/// The sheet.
pub(super) struct Paper<'a> {
    buffer: &'a mut Buffer,
    area: Rect,
    /// How it is painted.
    pub(super) look: Look,
}

impl<'a> Paper<'a> {
    /// A clean sheet: both colours set everywhere.
    pub(super) fn new(buffer: &'a mut Buffer, area: Rect, look: Look) -> Self {
        let mut paper = Self { buffer, area, look };
        paper.clear(Rect::new(0, 0, area.width, area.height));
        paper
    }

    /// Width and height.
    pub(super) const fn size(&self) -> (u16, u16) {
        (self.area.width, self.area.height)
    }

    /// Blanks a part.
    pub(super) fn clear(&mut self, part: Rect) {
        let blank = " ".repeat(usize::from(part.width));
        for row in 0..part.height {
            self.styled((part.x, part.y + row), &blank, self.look.text());
        }
    }

    /// Plain text.
    pub(super) fn text(&mut self, x: u16, y: u16, words: &str) {
        self.styled((x, y), words, self.look.text());
    }

    /// Bold text.
    pub(super) fn bold(&mut self, x: u16, y: u16, words: &str) {
        self.styled((x, y), words, self.look.bold());
    }

    /// Reversed bold text.
    pub(super) fn lit(&mut self, x: u16, y: u16, words: &str) {
        self.styled((x, y), words, self.look.lit());
    }

    fn styled(&mut self, (x, y): (u16, u16), words: &str, style: Style) {
        if x >= self.area.width || y >= self.area.height {
            return;
        }
        let composed: String = words.nfc().filter(|c| !c.is_control()).collect();
        let most = usize::from(self.area.width - x);
        self.buffer
            .set_stringn(self.area.x + x, self.area.y + y, composed, most, style);
    }

    /// A line across.
    pub(super) fn rule(&mut self, y: u16) {
        let sign = match self.look.letters {
            Letters::Full => "\u{2500}",
            Letters::Ascii => "-",
        };
        self.text(0, y, &sign.repeat(usize::from(self.area.width)));
    }

    /// A line down the body.
    pub(super) fn column_line(&mut self, x: u16, body: Rect) {
        let sign = match self.look.letters {
            Letters::Full => "\u{2502}",
            Letters::Ascii => "|",
        };
        for row in 0..body.height {
            self.text(x, body.y + row, sign);
        }
    }

    /// Text wrapped at words into a part; gives the rows used.
    pub(super) fn wrapped(&mut self, part: Rect, words: &str) -> u16 {
        self.wrapped_styled(part, words, self.look.text())
    }

    /// Bold text wrapped at words into a part; gives the rows used.
    pub(super) fn wrapped_bold(&mut self, part: Rect, words: &str) -> u16 {
        self.wrapped_styled(part, words, self.look.bold())
    }

    fn wrapped_styled(&mut self, part: Rect, words: &str, style: Style) -> u16 {
        let mut row = 0;
        for line in wrap(words, usize::from(part.width)) {
            if row >= part.height {
                break;
            }
            self.styled((part.x, part.y + row), &line, style);
            row += 1;
        }
        row
    }
}

/// Lines of at most `width` letters, broken at spaces where that can be done.
pub(super) fn wrap(words: &str, width: usize) -> Vec<String> {
    let mut lines = vec![];
    for paragraph in words.lines() {
        let mut line = String::new();
        for word in paragraph.split(' ') {
            let mut rest: String = word.to_owned();
            let needed =
                line.chars().count() + usize::from(!line.is_empty()) + rest.chars().count();
            if needed > width && !line.is_empty() {
                lines.push(std::mem::take(&mut line));
            }
            while rest.chars().count() > width && width > 0 {
                lines.push(rest.chars().take(width).collect());
                rest = rest.chars().skip(width).collect();
            }
            if !line.is_empty() {
                line.push(' ');
            }
            line.push_str(&rest);
        }
        lines.push(line);
    }
    lines
}
