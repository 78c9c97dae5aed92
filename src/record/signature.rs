//! Signatures in OpenSSH's SSHSIG form, accepted only in the one way they are written.
//! The blob is rebuilt from what it says and compared byte for byte, because the stock verifier
//! lets other versions, reserved bytes and trailing bytes pass. It holds no private key.

use base64::Engine as _;
use base64::engine::general_purpose::STANDARD;
use ed25519_dalek::{Signature, VerifyingKey};
use sha2::{Digest, Sha256, Sha512};

use super::NAMESPACE;
use super::public_key::{Form, PublicKey, put_string, string};

const MAGIC: &[u8; 6] = b"SSHSIG";
const HASH: &[u8] = b"sha512";
/// Longer than the longest accepted form, so that no time is spent on what cannot be one.
const BASE64_MAX: usize = 1024;

/// What a signature says before it is checked: whose key made it, and the raw values.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Blob {
    /// The key that made it.
    pub key: PublicKey,
    raw: [u8; 64],
    touch: Option<Touch>,
}

/// What a security key adds to its signature.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Touch {
    /// Bit 0: the key was touched; bit 2: its number was asked.
    pub flags: u8,
    /// The key's own count of signatures.
    pub counter: u32,
}

/// Why a signature does not hold.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum SignatureFault {
    /// Not base64 in its one written form.
    #[error("the signature is not base64 on one line")]
    Base64,
    /// Not an accepted blob, byte for byte.
    #[error(
        "the signature is not in the one accepted form (version 1, namespace {NAMESPACE}, empty reserved field, sha512, ed25519)"
    )]
    Form,
    /// The check fails.
    #[error("the signature does not fit the line")]
    Check,
    /// The person did not touch the security key.
    #[error("the security key was not touched")]
    NotTouched,
}

impl Blob {
    /// A plain signature's blob from its key and its 64 bytes.
    pub const fn plain(key: PublicKey, raw: [u8; 64]) -> Self {
        Self {
            key,
            raw,
            touch: None,
        }
    }

    /// A security key's blob.
    pub const fn touched(key: PublicKey, raw: [u8; 64], touch: Touch) -> Self {
        Self {
            key,
            raw,
            touch: Some(touch),
        }
    }

    /// Reads the one-line base64 and accepts only what this program would write.
    ///
    /// # Errors
    /// [`SignatureFault`] with what is wrong.
    pub fn read(base64: &str) -> Result<Self, SignatureFault> {
        if base64.len() > BASE64_MAX {
            return Err(SignatureFault::Form);
        }
        let bytes = STANDARD
            .decode(base64)
            .map_err(|_| SignatureFault::Base64)?;
        let blob = Self::divide(&bytes).ok_or(SignatureFault::Form)?;
        if blob.bytes() == bytes {
            Ok(blob)
        } else {
            Err(SignatureFault::Form)
        }
    }

    fn divide(bytes: &[u8]) -> Option<Self> {
        let rest = bytes.strip_prefix(MAGIC)?;
        let (_version, mut rest) = rest.split_first_chunk::<4>()?;
        let key = PublicKey::from_blob(string(&mut rest)?)?;
        let _namespace = string(&mut rest)?;
        let _reserved = string(&mut rest)?;
        let _hash = string(&mut rest)?;
        let mut signature = string(&mut rest)?;
        let _kind = string(&mut signature)?;
        let raw: [u8; 64] = string(&mut signature)?.try_into().ok()?;
        let touch = match key.form() {
            Form::Plain => None,
            Form::SecurityKey(_) => {
                let (flags, counter) = signature.split_first_chunk::<1>()?;
                let counter = u32::from_be_bytes(*counter.first_chunk::<4>()?);
                Some(Touch {
                    flags: flags[0],
                    counter,
                })
            }
        };
        Some(Self { key, raw, touch })
    }

    /// The blob in the one way it is written.
    pub fn bytes(&self) -> Vec<u8> {
        let mut signature = Vec::with_capacity(100);
        put_string(&mut signature, self.key.kind().as_bytes());
        put_string(&mut signature, &self.raw);
        if let Some(touch) = self.touch {
            signature.push(touch.flags);
            signature.extend_from_slice(&touch.counter.to_be_bytes());
        }
        let mut blob = Vec::with_capacity(260);
        blob.extend_from_slice(MAGIC);
        blob.extend_from_slice(&1_u32.to_be_bytes());
        put_string(&mut blob, &self.key.blob());
        put_string(&mut blob, NAMESPACE.as_bytes());
        put_string(&mut blob, b"");
        put_string(&mut blob, HASH);
        put_string(&mut blob, &signature);
        blob
    }

    /// The blob as one line of base64.
    pub fn base64(&self) -> String {
        STANDARD.encode(self.bytes())
    }

    /// The blob between its two armour lines, wrapped at 70, as the stock verifier reads it.
    pub fn armoured(&self) -> String {
        let mut text = String::from("-----BEGIN SSH SIGNATURE-----\n");
        for piece in self.base64().as_bytes().chunks(70) {
            text.extend(piece.iter().map(|byte| char::from(*byte)));
            text.push('\n');
        }
        text.push_str("-----END SSH SIGNATURE-----\n");
        text
    }

    /// Checks the signature over a line's exact bytes.
    ///
    /// # Errors
    /// [`SignatureFault`] where it does not hold.
    pub fn check(&self, line: &[u8]) -> Result<(), SignatureFault> {
        let key = VerifyingKey::from_bytes(self.key.point()).map_err(|_| SignatureFault::Check)?;
        let mut signed = message(line);
        match (self.key.form(), self.touch) {
            (Form::Plain, _) => {}
            (Form::SecurityKey(application), Some(touch)) => {
                if touch.flags & 1 == 0 {
                    return Err(SignatureFault::NotTouched);
                }
                signed = touched_message(application, touch, &signed);
            }
            (Form::SecurityKey(_), None) => return Err(SignatureFault::Form),
        }
        key.verify_strict(&signed, &Signature::from_bytes(&self.raw))
            .map_err(|_| SignatureFault::Check)
    }
}

/// What a plain key signs for a line.
pub fn message(line: &[u8]) -> Vec<u8> {
    let mut signed = Vec::with_capacity(140);
    signed.extend_from_slice(MAGIC);
    put_string(&mut signed, NAMESPACE.as_bytes());
    put_string(&mut signed, b"");
    put_string(&mut signed, HASH);
    put_string(&mut signed, &Sha512::digest(line));
    signed
}

/// What a security key signs for a message.
pub fn touched_message(application: &str, touch: Touch, message: &[u8]) -> Vec<u8> {
    let mut signed = Sha256::digest(application.as_bytes()).to_vec();
    signed.push(touch.flags);
    signed.extend_from_slice(&touch.counter.to_be_bytes());
    signed.extend_from_slice(&Sha256::digest(message));
    signed
}
