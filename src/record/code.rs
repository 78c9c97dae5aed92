//! The record code people carry away, and the square code of the whole hash.
//! It never claims to prove more than that a line with this hash was there.

use std::fmt;

use qrcode::{Color, EcLevel, QrCode};

use super::line::hex;

/// The digits of Crockford's base32: no I, L, O, U.
const DIGITS: &[u8; 32] = b"0123456789ABCDEFGHJKMNPQRSTVWXYZ";

/// The first 80 bits of a line's SHA-256, written in four groups of four.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct RecordCode(u128);

impl RecordCode {
    /// The code of a line with this hash.
    pub fn of(hash: &[u8; 32]) -> Self {
        Self(
            hash.iter()
                .take(10)
                .fold(0, |bits, byte| bits << 8 | u128::from(*byte)),
        )
    }

    /// Reads a code as people write it: small letters, O for 0, I and L for 1, any dashes.
    pub fn read(text: &str) -> Option<Self> {
        let mut bits = 0_u128;
        let mut count = 0;
        for c in text.chars().filter(|c| !matches!(c, '-' | ' ')) {
            let digit = match c.to_ascii_uppercase() {
                'O' => b'0',
                'I' | 'L' => b'1',
                other => u8::try_from(other).ok()?,
            };
            let place = DIGITS.iter().position(|known| *known == digit)?;
            bits = bits.checked_shl(5)? | u128::try_from(place).ok()?;
            count += 1;
            if count > 16 {
                return None;
            }
        }
        (count == 16).then_some(Self(bits))
    }
}

impl fmt::Display for RecordCode {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        for place in 0..16_u32 {
            if place > 0 && place % 4 == 0 {
                out.write_str("-")?;
            }
            let digit = (self.0 >> (75 - 5 * place)) & 31;
            write!(out, "{}", char::from(DIGITS[digit as usize]))?;
        }
        Ok(())
    }
}

/// In which characters the square code is drawn.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Ink {
    /// Half blocks: two rows of the code in one row of text.
    HalfBlocks,
    /// `#` and blanks, two to a cell: any terminal, any printer.
    Ascii,
}

/// Draws the square code of the whole hash (64 hex digits), one text line a row, with its quiet
/// border, dark on light as printed; on a dark screen show it with the colours reversed.
pub fn square(hash: &[u8; 32], ink: Ink) -> Vec<String> {
    let Ok(code) = QrCode::with_error_correction_level(hex(hash), EcLevel::M) else {
        return Vec::new();
    };
    const BORDER: usize = 4;
    let width = code.width();
    let colours = code.to_colors();
    let dark = |row: usize, column: usize| {
        let inside = |n: usize| n.checked_sub(BORDER).filter(|n| *n < width);
        match (inside(row), inside(column)) {
            (Some(row), Some(column)) => colours[row * width + column] == Color::Dark,
            (_, _) => false,
        }
    };
    let side = width + 2 * BORDER;
    let columns = 0..side;
    match ink {
        Ink::Ascii => (0..side)
            .map(|row| {
                columns
                    .clone()
                    .map(|c| if dark(row, c) { "##" } else { "  " })
                    .collect()
            })
            .collect(),
        Ink::HalfBlocks => (0..side)
            .step_by(2)
            .map(|row| {
                columns
                    .clone()
                    .map(|c| half(dark(row, c), dark(row + 1, c)))
                    .collect()
            })
            .collect(),
    }
}

const fn half(upper: bool, lower: bool) -> char {
    match (upper, lower) {
        (true, true) => '█',
        (true, false) => '▀',
        (false, true) => '▄',
        (false, false) => ' ',
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_code_reads_back_as_people_write_it() {
        let hash: [u8; 32] = std::array::from_fn(|n| (n * 37 + 11) as u8);
        let code = RecordCode::of(&hash);
        let text = code.to_string();
        assert_eq!(text.len(), 19);
        assert_eq!(RecordCode::read(&text), Some(code));
        assert_eq!(
            RecordCode::read(&text.to_lowercase().replace('-', " ")),
            Some(code)
        );
        assert_eq!(
            RecordCode::read(&text.replace('0', "o").replace('1', "l")),
            Some(code)
        );
        assert_eq!(RecordCode::read(&text[..18]), None);
        assert_eq!(RecordCode::read(&format!("{text}0")), None);
        assert_eq!(RecordCode::read("UUUU-UUUU-UUUU-UUUU"), None);
    }

    #[test]
    fn the_code_of_known_bits() {
        let mut hash = [0; 32];
        assert_eq!(RecordCode::of(&hash).to_string(), "0000-0000-0000-0000");
        hash[..10].fill(0xff);
        assert_eq!(RecordCode::of(&hash).to_string(), "ZZZZ-ZZZZ-ZZZZ-ZZZZ");
        hash[..10].copy_from_slice(&[0x08, 0x42, 0x10, 0x84, 0x21, 0, 0, 0, 0, 2]);
        assert_eq!(RecordCode::of(&hash).to_string(), "1111-1111-0000-0002");
    }

    #[test]
    fn the_square_is_square_and_both_inks_agree() {
        let rows = square(&[7; 32], Ink::Ascii);
        assert!(rows.iter().all(|row| row.len() == 2 * rows.len()));
        let halves = square(&[7; 32], Ink::HalfBlocks);
        assert_eq!(halves.len(), rows.len().div_ceil(2));
        for (n, line) in halves.iter().enumerate() {
            for (column, c) in line.chars().enumerate() {
                let upper = rows[2 * n].as_bytes()[2 * column] == b'#';
                let lower = rows
                    .get(2 * n + 1)
                    .is_some_and(|r| r.as_bytes()[2 * column] == b'#');
                assert_eq!(c, half(upper, lower));
            }
        }
    }
}
