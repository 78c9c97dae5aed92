//! What text may stand in a record: NFC, and nothing that turns the reading direction.
//! It never changes a text on its own; [`clean`] is for the place where people type.

use unicode_normalization::{IsNormalized, UnicodeNormalization, is_nfc_quick};

/// Why a text may not stand in a record.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum TextFault {
    /// It is not in Normalization Form C.
    #[error("text is not in Normalization Form C")]
    NotNfc,
    /// It holds a control that turns the reading direction.
    #[error("text holds the direction control U+{0:04X}, which can show it in another order")]
    Direction(u32),
}

/// Says whether a text may stand in a record.
///
/// # Errors
/// [`TextFault`] with what is wrong.
pub fn check(text: &str) -> Result<(), TextFault> {
    if text.is_ascii() {
        return Ok(());
    }
    if let Some(turn) = text.chars().find(|c| turns_direction(*c)) {
        return Err(TextFault::Direction(u32::from(turn)));
    }
    match is_nfc_quick(text.chars()) {
        IsNormalized::Yes => Ok(()),
        IsNormalized::No => Err(TextFault::NotNfc),
        IsNormalized::Maybe => {
            if text.nfc().eq(text.chars()) {
                Ok(())
            } else {
                Err(TextFault::NotNfc)
            }
        }
    }
}

/// Brings typed text into the form a record takes: NFC, without direction controls, without
/// control characters except the line end and the tab.
pub fn clean(typed: &str) -> String {
    typed
        .nfc()
        .filter(|c| !turns_direction(*c) && (!c.is_control() || *c == '\n' || *c == '\t'))
        .collect()
}

/// The text as it may be put on a terminal: controls and unseen characters are written out.
pub fn visible(text: &str) -> String {
    let mut shown = String::with_capacity(text.len());
    for c in text.chars() {
        if c.is_control() || turns_direction(c) || unseen(c) {
            shown.push_str(&format!("\\u{{{:x}}}", u32::from(c)));
        } else {
            shown.push(c);
        }
    }
    shown
}

/// Whether a text holds characters nobody sees.
pub fn holds_unseen(text: &str) -> bool {
    !text.is_ascii() && text.chars().any(unseen)
        || text
            .chars()
            .any(|c| c.is_control() && c != '\n' && c != '\t')
}

const fn turns_direction(c: char) -> bool {
    matches!(c, '\u{061C}' | '\u{200E}' | '\u{200F}' | '\u{202A}'..='\u{202E}' | '\u{2066}'..='\u{2069}')
}

const fn unseen(c: char) -> bool {
    matches!(c, '\u{00AD}' | '\u{200B}'..='\u{200D}' | '\u{2060}'..='\u{2064}' | '\u{FEFF}'
        | '\u{2028}' | '\u{2029}' | '\u{FFF9}'..='\u{FFFB}' | '\u{E0000}'..='\u{E007F}')
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn composed_text_stands_and_decomposed_text_does_not() {
        assert_eq!(check("chêne"), Ok(()));
        assert_eq!(check("che\u{302}ne"), Err(TextFault::NotNfc));
        assert_eq!(check("a\u{202e}b"), Err(TextFault::Direction(0x202e)));
        assert_eq!(clean("che\u{302}ne\u{202e}\u{7}\n"), "chêne\n");
        assert_eq!(check(&clean("che\u{302}ne\u{202e}\u{7}\n")), Ok(()));
    }

    #[test]
    fn a_terminal_never_gets_a_control_from_a_record() {
        assert_eq!(visible("a\u{1b}[2Jb\u{200b}"), "a\\u{1b}[2Jb\\u{200b}");
    }
}
