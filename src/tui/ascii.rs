//! The ASCII look: every letter folded to one below 0x80, column for column.

use ratatui::buffer::Buffer;
use unicode_normalization::UnicodeNormalization;

/// Folds a buffer's cells in place.
pub(super) fn fold(buffer: &mut Buffer) {
    for cell in &mut buffer.content {
        if !cell.symbol().is_ascii() {
            let folded = to_ascii(cell.symbol());
            let one = folded.chars().next().unwrap_or('?');
            cell.set_char(one);
        }
    }
}

/// A text with every letter below 0x80: accents dropped, what has no likeness as `?`.
pub fn to_ascii(text: &str) -> String {
    let like = |c: char| match c {
        '±' => "+".to_owned(),
        '·' | '•' => "*".to_owned(),
        '–' | '—' => "-".to_owned(),
        '’' | '‘' => "'".to_owned(),
        '“' | '”' => "\"".to_owned(),
        '²' => "2".to_owned(),
        '³' => "3".to_owned(),
        '…' => ".".to_owned(),
        '°' => "d".to_owned(),
        'ø' => "o".to_owned(),
        'Ø' => "O".to_owned(),
        'ß' => "s".to_owned(),
        'æ' => "a".to_owned(),
        'ł' => "l".to_owned(),
        c if c.is_ascii() => c.to_string(),
        _ => "?".to_owned(),
    };
    let mark = |c: &char| !matches!(u32::from(*c), 0x0300..=0x036f);
    text.nfd().filter(mark).map(like).collect()
}
