//! The public keys people sign with, as OpenSSH writes them: plain ed25519 and the security-key form.
//! No other kind is accepted, and none of it is secret.

use base64::Engine as _;
use base64::engine::general_purpose::{STANDARD, STANDARD_NO_PAD};
use sha2::{Digest, Sha256};

/// The plain form's name.
pub const PLAIN: &str = "ssh-ed25519";
/// The name of the form held in a security key.
pub const SECURITY_KEY: &str = "sk-ssh-ed25519@openssh.com";

/// A public key with its comment.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct PublicKey {
    form: Form,
    point: [u8; 32],
    comment: String,
}

/// Which of the two accepted forms.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Form {
    /// A plain ed25519 key.
    Plain,
    /// An ed25519 key in a security key, with the application it is bound to.
    SecurityKey(String),
}

/// Why a text is no accepted public key.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum KeyFault {
    /// Not a public key line.
    #[error("not a public key line: kind, base64, comment")]
    Shape,
    /// A kind of key that is not accepted.
    #[error(
        "keys of the kind \"{0}\" are not accepted; use ssh-ed25519 or sk-ssh-ed25519@openssh.com"
    )]
    Kind(String),
    /// The base64 part does not hold what the kind says.
    #[error("the key's base64 part does not hold a key of its kind")]
    Blob,
}

impl PublicKey {
    /// A plain key from its 32 bytes.
    pub fn plain(point: [u8; 32], comment: &str) -> Self {
        Self {
            form: Form::Plain,
            point,
            comment: comment.to_owned(),
        }
    }

    /// A security key from its 32 bytes and its application.
    pub fn security_key(point: [u8; 32], application: &str, comment: &str) -> Self {
        let form = Form::SecurityKey(application.to_owned());
        Self {
            form,
            point,
            comment: comment.to_owned(),
        }
    }

    /// Reads one public key line.
    ///
    /// # Errors
    /// [`KeyFault`] with what is wrong.
    pub fn read(line: &str) -> Result<Self, KeyFault> {
        let mut words = line.trim().splitn(3, [' ', '\t']);
        let (Some(kind), Some(base64)) = (words.next(), words.next()) else {
            return Err(KeyFault::Shape);
        };
        if kind != PLAIN && kind != SECURITY_KEY {
            return Err(KeyFault::Kind(kind.chars().take(40).collect()));
        }
        let blob = STANDARD.decode(base64).map_err(|_| KeyFault::Blob)?;
        let comment = words.next().unwrap_or_default().trim().to_owned();
        let key = Self::from_blob(&blob).ok_or(KeyFault::Blob)?;
        let key = Self { comment, ..key };
        if key.kind() == kind {
            Ok(key)
        } else {
            Err(KeyFault::Blob)
        }
    }

    /// Reads the binary form.
    pub fn from_blob(blob: &[u8]) -> Option<Self> {
        let mut rest = blob;
        let kind = string(&mut rest)?;
        let point: [u8; 32] = string(&mut rest)?.try_into().ok()?;
        let form = if kind == PLAIN.as_bytes() {
            Form::Plain
        } else if kind == SECURITY_KEY.as_bytes() {
            Form::SecurityKey(String::from_utf8(string(&mut rest)?.to_vec()).ok()?)
        } else {
            return None;
        };
        rest.is_empty().then_some(Self {
            form,
            point,
            comment: String::new(),
        })
    }

    /// The binary form.
    pub fn blob(&self) -> Vec<u8> {
        let mut blob = Vec::new();
        put_string(&mut blob, self.kind().as_bytes());
        put_string(&mut blob, &self.point);
        match &self.form {
            Form::Plain => {}
            Form::SecurityKey(application) => put_string(&mut blob, application.as_bytes()),
        }
        blob
    }

    /// The name of its kind.
    pub const fn kind(&self) -> &'static str {
        match self.form {
            Form::Plain => PLAIN,
            Form::SecurityKey(_) => SECURITY_KEY,
        }
    }

    /// Its form.
    pub const fn form(&self) -> &Form {
        &self.form
    }

    /// The 32 bytes of the key.
    pub const fn point(&self) -> &[u8; 32] {
        &self.point
    }

    /// The comment behind the key.
    pub fn comment(&self) -> &str {
        &self.comment
    }

    /// Whether this is a key for demonstrations, which proves nothing.
    pub fn is_demo(&self) -> bool {
        self.comment.starts_with("DEMO")
    }

    /// The fingerprint as stock tools print it.
    pub fn fingerprint(&self) -> String {
        format!(
            "SHA256:{}",
            STANDARD_NO_PAD.encode(Sha256::digest(self.blob()))
        )
    }

    /// Kind and base64 on one line, without the comment.
    pub fn bare_line(&self) -> String {
        format!("{} {}", self.kind(), STANDARD.encode(self.blob()))
    }

    /// The whole public key line, without its line end.
    pub fn line(&self) -> String {
        format!("{} {}", self.bare_line(), self.comment)
            .trim_end()
            .to_owned()
    }
}

/// Takes a length and that many bytes from the front.
pub(super) fn string<'a>(rest: &mut &'a [u8]) -> Option<&'a [u8]> {
    let (length, after) = rest.split_first_chunk::<4>()?;
    let length = usize::try_from(u32::from_be_bytes(*length)).ok()?;
    let (value, after) = after.split_at_checked(length)?;
    *rest = after;
    Some(value)
}

/// Appends a length and the bytes.
pub(super) fn put_string(blob: &mut Vec<u8>, value: &[u8]) {
    let length = u32::try_from(value.len()).expect("a value in a key or signature is short");
    blob.extend_from_slice(&length.to_be_bytes());
    blob.extend_from_slice(value);
}
