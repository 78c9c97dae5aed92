//! Keys as this program knows them.

/// A key.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Key {
    /// A character; SPACE is the character ' '.
    Char(char),
    /// Enter.
    Enter,
    /// Escape.
    Esc,
    /// Tab.
    Tab,
    /// Backspace.
    Backspace,
    /// An arrow up.
    Up,
    /// An arrow down.
    Down,
    /// An arrow to the left.
    Left,
    /// An arrow to the right.
    Right,
    /// Pasted text.
    Paste(String),
    /// Ctrl-C.
    Interrupt,
}
