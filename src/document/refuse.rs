//! The refusals of the format, each with its code, its words and its way out.

use crate::diagnostic::{Finding, Place, Severity};

/// A refusal of the text.
pub(super) fn refuse(code: &'static str, place: Place, message: String, help: &str) -> Finding {
    Finding {
        code,
        severity: Severity::Stop,
        message,
        place,
        path: String::new(),
        rule: None,
        help: help.to_owned(),
    }
}

/// Looks for characters that can hide what a text says: controls, bidirectional controls,
/// zero-width characters.
pub(super) fn hidden_characters(text: &str) -> Vec<Finding> {
    text.char_indices()
        .filter(|(byte, c)| is_hidden(*c) && !(*byte == 0 && *c == '\u{feff}'))
        .take(20)
        .map(|(byte, c)| {
            refuse(
                "TEXT-02",
                Place::new(byte, byte + c.len_utf8()),
                format!("a hidden character U+{:04X} stands here", u32::from(c)),
                "delete it: it can make a line read differently from what it says",
            )
        })
        .collect()
}

/// A hidden character written as an escape.
pub(super) fn escaped(c: char, place: Place) -> Finding {
    refuse(
        "TEXT-02",
        place,
        format!(
            "an escape stands for the hidden character U+{:04X}",
            u32::from(c)
        ),
        "delete it: it can make a line read differently from what it says",
    )
}

/// Whether a character can hide what a text says.
pub(super) fn is_hidden(c: char) -> bool {
    let control = c.is_control() && !matches!(c, '\n' | '\r' | '\t');
    let bidi = matches!(c, '\u{061c}' | '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}');
    let zero_width = matches!(
        c,
        '\u{200b}'..='\u{200d}' | '\u{2060}' | '\u{feff}' | '\u{00ad}'
    );
    control || bidi || zero_width
}
