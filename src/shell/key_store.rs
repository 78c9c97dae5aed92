//! The keys people sign with: made, unlocked for the job, used, and wiped from memory.
//! A private key never leaves this file; no key is ever written over.

use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

use ed25519_dalek::{Signer as _, SigningKey};
use ssh_key::private::KeypairData;
use ssh_key::{Algorithm, LineEnding, PrivateKey};

use super::entropy::OsRng;
use super::files::{self, FileError, Readers};
use crate::record::public_key::{KeyFault, PublicKey};
use crate::record::signature::{Blob, message};
use crate::record::signers::is_id;

/// The folder of the keys in a job folder.
pub const KEYS_DIR: &str = "keys";
const KEY_BYTES_MAX: usize = 64 * 1024;

/// Why a key cannot be used or made.
#[derive(Debug, thiserror::Error)]
pub enum KeyError {
    /// Nobody unlocked it.
    #[error("the key of {0} is not unlocked")]
    Locked(String),
    /// The passphrase is not the key's.
    #[error("{}: wrong passphrase", .0.display())]
    WrongPassphrase(PathBuf),
    /// The key needs a passphrase and none was given.
    #[error("{}: the key is locked with a passphrase", .0.display())]
    PassphraseNeeded(PathBuf),
    /// Not an OpenSSH ed25519 key.
    #[error("{}: not an OpenSSH ed25519 private key: {why}", path.display())]
    NotAKey {
        /// Which file.
        path: PathBuf,
        /// What is wrong.
        why: String,
    },
    /// The public key file.
    #[error("{}: {fault}", path.display())]
    Public {
        /// Which file.
        path: PathBuf,
        /// What is wrong.
        fault: KeyFault,
    },
    /// The crew id cannot be a name in the crew list.
    #[error("\"{0}\" is no crew id: small letters, digits and dashes")]
    Id(String),
    /// The key could not be made.
    #[error("the key could not be made: {0}")]
    Making(String),
    /// A file.
    #[error(transparent)]
    File(#[from] FileError),
}

/// The keys unlocked for the job.
#[derive(Default)]
pub struct KeyStore {
    // The signing keys wipe themselves when they are dropped.
    unlocked: BTreeMap<String, (SigningKey, PublicKey)>,
}

impl KeyStore {
    /// Unlocks a person's key from its file.
    ///
    /// # Errors
    /// [`KeyError::WrongPassphrase`], [`KeyError::PassphraseNeeded`], or what is wrong with the file.
    pub fn unlock(
        &mut self,
        id: &str,
        path: &Path,
        passphrase: Option<&str>,
    ) -> Result<PublicKey, KeyError> {
        if !is_id(id) {
            return Err(KeyError::Id(id.to_owned()));
        }
        let bytes = zeroize::Zeroizing::new(files::read_limited(path, KEY_BYTES_MAX)?);
        let not_a_key = |why: String| KeyError::NotAKey {
            path: path.to_owned(),
            why,
        };
        let mut key =
            PrivateKey::from_openssh(&*bytes).map_err(|fault| not_a_key(fault.to_string()))?;
        if key.is_encrypted() {
            let passphrase =
                passphrase.ok_or_else(|| KeyError::PassphraseNeeded(path.to_owned()))?;
            key = key
                .decrypt(passphrase)
                .map_err(|_| KeyError::WrongPassphrase(path.to_owned()))?;
        }
        let comment = key.comment().to_owned();
        let KeypairData::Ed25519(pair) = key.key_data() else {
            return Err(not_a_key(format!("its kind is {}", key.algorithm())));
        };
        let seed = zeroize::Zeroizing::new(pair.private.to_bytes());
        let signing = SigningKey::from_bytes(&seed);
        if signing.verifying_key().as_bytes() != &pair.public.0 {
            return Err(not_a_key(
                "its public and private parts do not belong together".to_owned(),
            ));
        }
        let public = PublicKey::plain(pair.public.0, &comment);
        self.unlocked
            .insert(id.to_owned(), (signing, public.clone()));
        Ok(public)
    }

    /// Wipes one person's key from memory.
    pub fn lock(&mut self, id: &str) {
        self.unlocked.remove(id);
    }

    /// Wipes every key from memory.
    pub fn lock_all(&mut self) {
        self.unlocked.clear();
    }

    /// Whether a person's key is unlocked.
    pub fn is_unlocked(&self, id: &str) -> bool {
        self.unlocked.contains_key(id)
    }

    /// The public key of an unlocked person.
    pub fn public(&self, id: &str) -> Option<&PublicKey> {
        self.unlocked.get(id).map(|(_, public)| public)
    }

    /// Signs the exact bytes of a line; gives the one-line base64 of the record.
    ///
    /// # Errors
    /// [`KeyError::Locked`] where the person's key is not unlocked.
    pub fn sign(&self, id: &str, line: &[u8]) -> Result<String, KeyError> {
        let (signing, public) = self
            .unlocked
            .get(id)
            .ok_or_else(|| KeyError::Locked(id.to_owned()))?;
        let raw = signing.sign(&message(line)).to_bytes();
        Ok(Blob::plain(public.clone(), raw).base64())
    }
}

/// A new key's wishes.
#[derive(Debug, Clone, Copy)]
pub struct NewKey<'a> {
    /// The crew id.
    pub id: &'a str,
    /// What stands behind the key.
    pub comment: &'a str,
    /// What locks it; `None` leaves it open.
    pub passphrase: Option<&'a str>,
}

/// Makes a new key in a job folder's `keys/`.
///
/// # Errors
/// [`KeyError`]; an existing key is never written over.
pub fn make(job: &Path, new: NewKey<'_>) -> Result<PublicKey, KeyError> {
    let dir = keys_dir(job, new.id)?;
    let making = |fault: ssh_key::Error| KeyError::Making(fault.to_string());
    let mut key = PrivateKey::random(&mut OsRng, Algorithm::Ed25519).map_err(making)?;
    key.set_comment(new.comment);
    let line = key.public_key().to_openssh().map_err(making)?;
    if let Some(passphrase) = new.passphrase {
        key = key.encrypt(&mut OsRng, passphrase).map_err(making)?;
    }
    let text = key.to_openssh(LineEnding::LF).map_err(making)?;
    let public_path = dir.join(format!("{}.pub", new.id));
    let public = PublicKey::read(&line).map_err(|fault| KeyError::Public {
        path: public_path.clone(),
        fault,
    })?;
    files::write_new(&dir.join(new.id), text.as_bytes(), Readers::Owner)?;
    files::write_new(
        &public_path,
        format!("{}\n", public.line()).as_bytes(),
        Readers::Everyone,
    )?;
    Ok(public)
}

/// Takes an existing public key into a job folder's `keys/`.
///
/// # Errors
/// [`KeyError`]; an existing key is never written over.
pub fn adopt(job: &Path, id: &str, file: &Path) -> Result<PublicKey, KeyError> {
    let public = read_public(file)?;
    let dir = keys_dir(job, id)?;
    let line = format!("{}\n", public.line());
    files::write_new(
        &dir.join(format!("{id}.pub")),
        line.as_bytes(),
        Readers::Everyone,
    )?;
    Ok(public)
}

/// Reads a public key file.
///
/// # Errors
/// [`KeyError`] where it cannot be read or is not an accepted key.
pub fn read_public(path: &Path) -> Result<PublicKey, KeyError> {
    let text = files::read_text(path, KEY_BYTES_MAX)?;
    PublicKey::read(&text).map_err(|fault| KeyError::Public {
        path: path.to_owned(),
        fault,
    })
}

fn keys_dir(job: &Path, id: &str) -> Result<PathBuf, KeyError> {
    if !is_id(id) {
        return Err(KeyError::Id(id.to_owned()));
    }
    let dir = job.join(KEYS_DIR);
    files::make_dir(&dir)?;
    for name in [id.to_owned(), format!("{id}.pub")] {
        if files::names(&dir)?.contains(&name) {
            return Err(FileError::Exists {
                path: dir.join(name),
            }
            .into());
        }
    }
    Ok(dir)
}

/// One key of a job.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Listed {
    /// The crew id.
    pub id: String,
    /// The public key.
    pub public: PublicKey,
    /// Whether its private half lies beside it.
    pub private: PrivateHalf,
}

/// Where the private half of a key is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum PrivateHalf {
    /// Not in the job folder.
    Elsewhere,
    /// Beside it, readable by its owner only.
    Here,
    /// Beside it, and others on this machine may read it.
    HereAndOpen,
}

/// Lists the keys of a job.
///
/// # Errors
/// [`KeyError`] where the folder or a key in it cannot be read.
pub fn list(job: &Path) -> Result<Vec<Listed>, KeyError> {
    let dir = job.join(KEYS_DIR);
    let names = files::names(&dir)?;
    let mut keys = Vec::new();
    for id in names
        .iter()
        .filter_map(|name| name.strip_suffix(".pub"))
        .filter(|id| is_id(id))
    {
        let public = read_public(&dir.join(format!("{id}.pub")))?;
        let private = if !names.iter().any(|name| name == id) {
            PrivateHalf::Elsewhere
        } else if files::others_may_read(&dir.join(id))? {
            PrivateHalf::HereAndOpen
        } else {
            PrivateHalf::Here
        };
        keys.push(Listed {
            id: id.to_owned(),
            public,
            private,
        });
    }
    Ok(keys)
}
