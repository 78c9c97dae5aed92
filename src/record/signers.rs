//! The crew list with keys: the file `allowed_signers` that stock tools read, written and read in
//! a narrow form. Wildcards, certificate authorities and revocation lists are refused, not guessed.

use chrono::{DateTime, NaiveDate, NaiveDateTime, Utc};

use super::NAMESPACE;
use super::public_key::{KeyFault, PublicKey};

/// One line of the crew list: a person and one of their keys.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Signer {
    /// The crew id.
    pub id: String,
    /// The key.
    pub key: PublicKey,
    /// Not valid for entries before this time, in milliseconds since 1970.
    pub valid_after_ms: Option<i64>,
    /// Not valid for entries after this time.
    pub valid_before_ms: Option<i64>,
}

/// Why a crew list cannot be read.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum SignersFault {
    /// A name that is no plain crew id.
    #[error("line {line}: \"{name}\" is no crew id (small letters, digits and dashes)")]
    Name {
        /// The line of the file.
        line: usize,
        /// What stands there.
        name: String,
    },
    /// An option that is not understood.
    #[error("line {line}: the option \"{option}\" is not understood")]
    Option {
        /// The line of the file.
        line: usize,
        /// What stands there.
        option: String,
    },
    /// A time that is not in UTC.
    #[error("line {line}: \"{time}\" is no time in UTC; write YYYYMMDDZ or YYYYMMDDHHMMSSZ")]
    Time {
        /// The line of the file.
        line: usize,
        /// What stands there.
        time: String,
    },
    /// The key on the line.
    #[error("line {line}: {fault}")]
    Key {
        /// The line of the file.
        line: usize,
        /// What is wrong.
        fault: KeyFault,
    },
    /// No person at all.
    #[error("the crew list names nobody")]
    Empty,
}

/// Whether a text is a plain crew id.
pub fn is_id(text: &str) -> bool {
    (1..=64).contains(&text.len())
        && !text.starts_with('-')
        && text
            .bytes()
            .all(|b| b.is_ascii_lowercase() || b.is_ascii_digit() || b == b'-')
}

/// Writes the crew list, one line a key.
pub fn write(signers: &[Signer]) -> String {
    let mut text = String::new();
    for signer in signers {
        text.push_str(&format!("{} namespaces=\"{NAMESPACE}\"", signer.id));
        for (name, at) in [
            ("valid-after", signer.valid_after_ms),
            ("valid-before", signer.valid_before_ms),
        ] {
            let at = at.and_then(DateTime::<Utc>::from_timestamp_millis);
            if let Some(at) = at {
                text.push_str(&format!(",{name}=\"{}\"", at.format("%Y%m%d%H%M%SZ")));
            }
        }
        text.push_str(&format!(" {}\n", signer.key.line()));
    }
    text
}

/// Reads a crew list. Lines for other namespaces only are passed over.
///
/// # Errors
/// [`SignersFault`] with the line and what is wrong.
pub fn read(text: &str) -> Result<Vec<Signer>, SignersFault> {
    let mut signers = Vec::new();
    for (number, line) in text.lines().enumerate() {
        let line_text = line.trim();
        if line_text.is_empty() || line_text.starts_with('#') {
            continue;
        }
        if let Some(signer) = read_line(number + 1, line_text)? {
            signers.push(signer);
        }
    }
    if signers.is_empty() {
        Err(SignersFault::Empty)
    } else {
        Ok(signers)
    }
}

fn read_line(line: usize, text: &str) -> Result<Option<Signer>, SignersFault> {
    let (name, rest) = text.split_once([' ', '\t']).unwrap_or((text, ""));
    if !is_id(name) {
        return Err(SignersFault::Name {
            line,
            name: name.to_owned(),
        });
    }
    let rest = rest.trim_start();
    let starts_with_key = rest.starts_with("ssh-") || rest.starts_with("sk-");
    let (options, key) = if starts_with_key {
        ("", rest)
    } else {
        split_options(rest)
    };
    let mut signer = Signer {
        id: name.to_owned(),
        key: PublicKey::read(key).map_err(|fault| SignersFault::Key { line, fault })?,
        valid_after_ms: None,
        valid_before_ms: None,
    };
    let mut ours = true;
    for option in divide_options(options) {
        let (option_name, value) = option.split_once('=').unwrap_or((option, ""));
        let value = value.trim_matches('"');
        match option_name {
            "namespaces" => ours = value.split(',').any(|space| space.trim() == NAMESPACE),
            "valid-after" => signer.valid_after_ms = Some(read_time(line, value)?),
            "valid-before" => signer.valid_before_ms = Some(read_time(line, value)?),
            _ => {
                return Err(SignersFault::Option {
                    line,
                    option: option.to_owned(),
                });
            }
        }
    }
    Ok(ours.then_some(signer))
}

/// The options end at the first blank outside quotes.
fn split_options(text: &str) -> (&str, &str) {
    let mut quoted = false;
    for (at, c) in text.char_indices() {
        match c {
            '"' => quoted = !quoted,
            ' ' | '\t' if !quoted => return (&text[..at], text[at..].trim_start()),
            _ => {}
        }
    }
    (text, "")
}

fn divide_options(options: &str) -> Vec<&str> {
    let mut quoted = false;
    options
        .split(|c| {
            quoted ^= c == '"';
            c == ',' && !quoted
        })
        .filter(|option| !option.is_empty())
        .collect()
}

fn read_time(line: usize, text: &str) -> Result<i64, SignersFault> {
    let fault = || SignersFault::Time {
        line,
        time: text.to_owned(),
    };
    let digits = text.strip_suffix('Z').ok_or_else(fault)?;
    if !digits.bytes().all(|b| b.is_ascii_digit()) {
        return Err(fault());
    }
    let at = match digits.len() {
        8 => NaiveDate::parse_from_str(digits, "%Y%m%d")
            .ok()
            .and_then(|d| d.and_hms_opt(0, 0, 0)),
        12 => NaiveDateTime::parse_from_str(&format!("{digits}00"), "%Y%m%d%H%M%S").ok(),
        14 => NaiveDateTime::parse_from_str(digits, "%Y%m%d%H%M%S").ok(),
        _ => None,
    };
    Ok(at.ok_or_else(fault)?.and_utc().timestamp_millis())
}

impl Signer {
    /// Whether the key was valid at an entry's own time, to the second as the stock verifier counts.
    pub fn valid_at(&self, utc_ms: i64) -> bool {
        let second = |ms: i64| ms.div_euclid(1000);
        self.valid_after_ms
            .is_none_or(|after| second(utc_ms) >= second(after))
            && self
                .valid_before_ms
                .is_none_or(|before| second(utc_ms) <= second(before))
    }
}
