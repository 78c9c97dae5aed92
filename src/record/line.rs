//! One line of format 1: how it is written, and how strictly it is read.
//! The bytes are the truth: a line that would be written differently is refused, never mended.

use std::fmt;

use chrono::{DateTime, NaiveDateTime, Utc};
use serde_json::{Map, Number, Value};
use sha2::{Digest, Sha256};

use super::text::{self, TextFault};
use super::{INTEGER_MAX, LINE_BYTES_MAX};

const UTC_FORM: &str = "%Y-%m-%dT%H:%M:%S%.3fZ";
/// The years a stamp may lie in, as milliseconds since 1970: 1970 up to the end of 9999.
const UTC_MS_MAX: i64 = 253_402_300_799_999;
/// Local time is at most eighteen hours off.
const OFFSET_MIN_MAX: i64 = 18 * 60;

/// One start of the machine: the first four bytes of the SHA-256 of the kernel's boot id.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Default)]
pub struct Boot(pub [u8; 4]);

impl Boot {
    /// Reads the eight lower-case hex digits.
    pub fn read(text: &str) -> Option<Self> {
        unhex::<4>(text).map(Self)
    }
}

impl fmt::Display for Boot {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(&hex(&self.0))
    }
}

/// When an entry was made, by the laptop's word.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct Stamp {
    /// Milliseconds since 1970-01-01T00:00:00Z.
    pub utc_ms: i64,
    /// Local time minus UTC, in minutes.
    pub off_min: i32,
    /// The boot-time clock in milliseconds: it also runs while the lid is closed.
    pub up_ms: i64,
    /// Which start of the machine.
    pub boot: Boot,
}

impl Stamp {
    /// The UTC time as the record writes it.
    pub fn utc(&self) -> String {
        DateTime::<Utc>::from_timestamp_millis(self.utc_ms)
            .map_or_else(|| "?".to_owned(), |at| at.format(UTC_FORM).to_string())
    }

    /// The local time for people: date, time to the second, offset.
    pub fn local(&self) -> String {
        let shifted = self.utc_ms + i64::from(self.off_min) * 60_000;
        let sign = if self.off_min < 0 { '-' } else { '+' };
        let (hours, minutes) = (self.off_min.abs() / 60, self.off_min.abs() % 60);
        DateTime::<Utc>::from_timestamp_millis(shifted).map_or_else(
            || "?".to_owned(),
            |at| {
                format!(
                    "{} {sign}{hours:02}:{minutes:02}",
                    at.format("%Y-%m-%d %H:%M:%S")
                )
            },
        )
    }
}

/// A signature line: which line it signs, whose it is, and the signature.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Sig {
    /// The sequence number of the line before it.
    pub signs: u64,
    /// The crew id.
    pub who: String,
    /// The whole SSHSIG blob in base64 on one line.
    pub sig: String,
}

/// A line as read.
#[derive(Debug, Clone, PartialEq)]
pub struct ParsedLine {
    /// Its number, counted from 0.
    pub seq: u64,
    /// The SHA-256 of the whole line before it.
    pub prev: [u8; 32],
    /// When it was made; a signature line has no time of its own.
    pub stamp: Option<Stamp>,
    /// Its kind.
    pub kind: String,
    /// The members after the kind, in their order.
    pub members: Map<String, Value>,
    /// What a signature line says.
    pub sig: Option<Sig>,
    /// The SHA-256 of this whole line with its newline.
    pub hash: [u8; 32],
}

impl ParsedLine {
    /// The text of a member, where it is a text.
    pub fn text(&self, member: &str) -> Option<&str> {
        self.members.get(member).and_then(Value::as_str)
    }

    /// Who signs this entry: `None` where no member says so, `Some(None)` where it says nobody can.
    pub fn signer(&self) -> Option<Option<&str>> {
        self.members.get("signer").map(Value::as_str)
    }
}

/// Why bytes are no line of format 1.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum LineFault {
    /// Past the limit of one line.
    #[error("the line has {0} bytes; at most {LINE_BYTES_MAX} are allowed")]
    TooLong(usize),
    /// Not UTF-8.
    #[error("the line is not UTF-8")]
    NotUtf8,
    /// Not one JSON object.
    #[error("the line is not one JSON object: {0}")]
    NotJson(String),
    /// It would be written in another way.
    #[error("the line is not in its one written form (spacing, escapes, or a member named twice)")]
    NotCanonical,
    /// Another version of the format.
    #[error("the line does not begin with \"v\":1")]
    Version,
    /// The members every line begins with.
    #[error("the member \"{0}\" is missing, out of its place or malformed")]
    Head(&'static str),
    /// A number that is no whole number within the range.
    #[error("the member \"{0}\" holds a number that is not whole or is past 2^53-1")]
    Number(String),
    /// Text that may not stand in a record.
    #[error("the member \"{member}\": {fault}")]
    Text {
        /// Which member.
        member: String,
        /// What is wrong with its text.
        fault: TextFault,
    },
    /// A signature line has exactly `signs`, `who` and `sig`.
    #[error("a signature line holds exactly \"signs\", \"who\" and \"sig\"")]
    SigMembers,
}

/// What stands in front of an entry's own members.
#[derive(Debug, Clone, Copy)]
pub struct Place {
    /// The number of the line.
    pub seq: u64,
    /// The hash of the line before.
    pub prev: [u8; 32],
}

/// Writes an entry: its place, its stamp, its kind and its members in their order.
///
/// # Errors
/// [`LineFault`] where the result would not be a line of format 1.
pub fn encode(
    place: Place,
    stamp: &Stamp,
    kind: &str,
    members: &Map<String, Value>,
) -> Result<Vec<u8>, LineFault> {
    let mut object = head(place);
    object.insert("utc".into(), stamp.utc().into());
    object.insert("off_min".into(), stamp.off_min.into());
    object.insert("up_ms".into(), stamp.up_ms.into());
    object.insert("boot".into(), stamp.boot.to_string().into());
    object.insert("kind".into(), kind.into());
    for (name, value) in members {
        if object.insert(name.clone(), value.clone()).is_some() {
            return Err(LineFault::NotCanonical);
        }
    }
    finish(object)
}

/// Writes the signature line that follows the line it signs.
///
/// # Errors
/// [`LineFault`] where the result would not be a line of format 1.
pub fn encode_sig(place: Place, sig: &Sig) -> Result<Vec<u8>, LineFault> {
    let mut object = head(place);
    object.insert("kind".into(), "sig".into());
    object.insert("signs".into(), sig.signs.into());
    object.insert("who".into(), sig.who.clone().into());
    object.insert("sig".into(), sig.sig.clone().into());
    finish(object)
}

fn head(place: Place) -> Map<String, Value> {
    let mut object = Map::new();
    object.insert("v".into(), 1.into());
    object.insert("seq".into(), place.seq.into());
    object.insert("prev".into(), hex(&place.prev).into());
    object
}

fn finish(object: Map<String, Value>) -> Result<Vec<u8>, LineFault> {
    let mut bytes =
        serde_json::to_vec(&object).map_err(|fault| LineFault::NotJson(fault.to_string()))?;
    bytes.push(b'\n');
    parse(&bytes)?;
    Ok(bytes)
}

/// Reads one whole line, its newline included.
///
/// # Errors
/// [`LineFault`] with the first thing that is wrong.
pub fn parse(bytes: &[u8]) -> Result<ParsedLine, LineFault> {
    if bytes.len() > LINE_BYTES_MAX {
        return Err(LineFault::TooLong(bytes.len()));
    }
    let text = std::str::from_utf8(bytes).map_err(|_| LineFault::NotUtf8)?;
    let body = text.strip_suffix('\n').ok_or(LineFault::NotCanonical)?;
    let object: Map<String, Value> =
        serde_json::from_str(body).map_err(|fault| LineFault::NotJson(fault.to_string()))?;
    if object.get("v") != Some(&Value::from(1)) {
        return Err(LineFault::Version);
    }
    for (name, value) in &object {
        check_text(name, name)?;
        check_value(name, value)?;
    }
    let again =
        serde_json::to_string(&object).map_err(|fault| LineFault::NotJson(fault.to_string()))?;
    if again != body {
        return Err(LineFault::NotCanonical);
    }
    divide(object, Sha256::digest(bytes).into())
}

fn divide(object: Map<String, Value>, hash: [u8; 32]) -> Result<ParsedLine, LineFault> {
    let mut rest = object.into_iter();
    take(&mut rest, "v")?;
    let seq = take(&mut rest, "seq")?
        .as_u64()
        .ok_or(LineFault::Head("seq"))?;
    let prev = take(&mut rest, "prev")?;
    let prev = prev
        .as_str()
        .and_then(unhex::<32>)
        .ok_or(LineFault::Head("prev"))?;
    let (name, value) = rest.next().ok_or(LineFault::Head("utc"))?;
    if name == "kind" && value == "sig" {
        let members: Map<String, Value> = rest.collect();
        let sig = Some(read_sig(&members)?);
        return Ok(ParsedLine {
            seq,
            prev,
            stamp: None,
            kind: "sig".into(),
            members,
            sig,
            hash,
        });
    }
    if name != "utc" {
        return Err(LineFault::Head("utc"));
    }
    let stamp = Some(read_stamp(&value, &mut rest)?);
    let kind = take(&mut rest, "kind")?;
    let kind = kind
        .as_str()
        .filter(|kind| kind_name(kind))
        .ok_or(LineFault::Head("kind"))?;
    let kind = kind.to_owned();
    Ok(ParsedLine {
        seq,
        prev,
        stamp,
        kind,
        members: rest.collect(),
        sig: None,
        hash,
    })
}

fn kind_name(kind: &str) -> bool {
    !kind.is_empty()
        && kind != "sig"
        && kind
            .bytes()
            .all(|b| b.is_ascii_lowercase() || b.is_ascii_digit() || b == b'_')
}

fn take(
    rest: &mut impl Iterator<Item = (String, Value)>,
    wanted: &'static str,
) -> Result<Value, LineFault> {
    match rest.next() {
        Some((name, value)) if name == wanted => Ok(value),
        Some(_) | None => Err(LineFault::Head(wanted)),
    }
}

fn read_stamp(
    utc: &Value,
    rest: &mut impl Iterator<Item = (String, Value)>,
) -> Result<Stamp, LineFault> {
    let utc_ms = utc
        .as_str()
        .and_then(read_utc)
        .ok_or(LineFault::Head("utc"))?;
    let off = take(rest, "off_min")?
        .as_i64()
        .filter(|off| off.abs() <= OFFSET_MIN_MAX);
    let off = off
        .and_then(|off| i32::try_from(off).ok())
        .ok_or(LineFault::Head("off_min"))?;
    let up_ms = take(rest, "up_ms")?.as_i64().filter(|up| *up >= 0);
    let boot = take(rest, "boot")?;
    Ok(Stamp {
        utc_ms,
        off_min: off,
        up_ms: up_ms.ok_or(LineFault::Head("up_ms"))?,
        boot: boot
            .as_str()
            .and_then(Boot::read)
            .ok_or(LineFault::Head("boot"))?,
    })
}

/// Reads a UTC time exactly in the record's form.
pub fn read_utc(text: &str) -> Option<i64> {
    let at = NaiveDateTime::parse_from_str(text, UTC_FORM)
        .ok()?
        .and_utc();
    let ms = at.timestamp_millis();
    let exact = (0..=UTC_MS_MAX).contains(&ms) && at.format(UTC_FORM).to_string() == text;
    exact.then_some(ms)
}

fn read_sig(members: &Map<String, Value>) -> Result<Sig, LineFault> {
    let mut names = members.keys().map(String::as_str);
    if (names.next(), names.next(), names.next(), names.next())
        != (Some("signs"), Some("who"), Some("sig"), None)
    {
        return Err(LineFault::SigMembers);
    }
    let text = |name: &str| members.get(name).and_then(Value::as_str).map(str::to_owned);
    let signs = members.get("signs").and_then(Value::as_u64);
    match (signs, text("who"), text("sig")) {
        (Some(signs), Some(who), Some(sig)) => Ok(Sig { signs, who, sig }),
        (_, _, _) => Err(LineFault::SigMembers),
    }
}

fn check_value(member: &str, value: &Value) -> Result<(), LineFault> {
    match value {
        Value::Null | Value::Bool(_) => Ok(()),
        Value::Number(number) => check_number(member, number),
        Value::String(text) => check_text(member, text),
        Value::Array(items) => items.iter().try_for_each(|item| check_value(member, item)),
        Value::Object(members) => members.iter().try_for_each(|(name, value)| {
            check_text(member, name)?;
            check_value(member, value)
        }),
    }
}

fn check_number(member: &str, number: &Number) -> Result<(), LineFault> {
    let size = number
        .as_u64()
        .or_else(|| number.as_i64().map(i64::unsigned_abs));
    match size {
        Some(size) if size <= INTEGER_MAX => Ok(()),
        Some(_) | None => Err(LineFault::Number(member.to_owned())),
    }
}

fn check_text(member: &str, value: &str) -> Result<(), LineFault> {
    text::check(value).map_err(|fault| LineFault::Text {
        member: member.to_owned(),
        fault,
    })
}

/// Lower-case hex.
pub fn hex(bytes: &[u8]) -> String {
    const DIGITS: &[u8; 16] = b"0123456789abcdef";
    let mut text = String::with_capacity(bytes.len() * 2);
    for byte in bytes {
        text.push(char::from(DIGITS[usize::from(byte >> 4)]));
        text.push(char::from(DIGITS[usize::from(byte & 15)]));
    }
    text
}

/// Reads lower-case hex of exactly `N` bytes.
pub fn unhex<const N: usize>(text: &str) -> Option<[u8; N]> {
    let digits = text.as_bytes();
    if digits.len() != 2 * N {
        return None;
    }
    let value = |digit: u8| match digit {
        b'0'..=b'9' => Some(digit - b'0'),
        b'a'..=b'f' => Some(digit - b'a' + 10),
        _ => None,
    };
    let mut bytes = [0; N];
    for (byte, pair) in bytes.iter_mut().zip(digits.chunks_exact(2)) {
        *byte = value(pair[0])? << 4 | value(pair[1])?;
    }
    Some(bytes)
}
