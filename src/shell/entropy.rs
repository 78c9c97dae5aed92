//! The door to randomness: the system's own source, nothing seeded, nothing home-made.

pub use ssh_key::rand_core::OsRng;

/// The system gave no random bytes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
#[error("the system gives no random bytes: {0}")]
pub struct NoEntropy(getrandom::Error);

/// Random bytes.
///
/// # Errors
/// [`NoEntropy`] where the system gives none.
pub fn bytes<const N: usize>() -> Result<[u8; N], NoEntropy> {
    let mut bytes = [0; N];
    getrandom::fill(&mut bytes).map_err(NoEntropy)?;
    Ok(bytes)
}
