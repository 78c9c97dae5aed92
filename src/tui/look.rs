//! The looks: sun (black on white) and dusk, its reverse. No grey, no dim, no blink, no green.

use ratatui::style::{Color, Modifier, Style};

/// How the screen is painted.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Look {
    /// Dusk instead of sun.
    pub ground: Ground,
    /// Letters beyond ASCII or not.
    pub letters: Letters,
}

/// The ground the letters stand on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Ground {
    /// Black on white.
    Sun,
    /// White on black.
    Dusk,
    /// The terminal's own colours: weight and reverse alone.
    Plain,
}

/// The letters used.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Letters {
    /// As written.
    Full,
    /// ASCII only.
    Ascii,
}

impl Look {
    /// Plain text.
    pub fn text(self) -> Style {
        match self.ground {
            Ground::Sun => Style::new().fg(Color::Black).bg(Color::White),
            Ground::Dusk => Style::new().fg(Color::White).bg(Color::Black),
            Ground::Plain => Style::new(),
        }
    }

    /// Emphasis by weight.
    pub fn bold(self) -> Style {
        self.text().add_modifier(Modifier::BOLD)
    }

    /// The lit step and alerts: the reverse of the ground, bold.
    pub fn lit(self) -> Style {
        match self.ground {
            Ground::Sun => Style::new()
                .fg(Color::White)
                .bg(Color::Black)
                .add_modifier(Modifier::BOLD),
            Ground::Dusk => Style::new()
                .fg(Color::Black)
                .bg(Color::White)
                .add_modifier(Modifier::BOLD),
            Ground::Plain => Style::new().add_modifier(Modifier::BOLD | Modifier::REVERSED),
        }
    }
}
