//! The strong-room: the lines of the record, their chain, their signatures and the verdict on them.
//! Bytes in, verdict out: it opens no file, reads no clock and holds no private key.

pub mod text;
pub mod line;
pub mod kind;
pub mod code;
pub mod public_key;
pub mod signature;
pub mod signers;
pub mod opening;
mod cards;
pub mod draft;
pub mod facts;
pub mod chain;
pub mod sealed;
pub mod duty;
pub mod pace;
pub mod verify;

pub use draft::Draft;
pub use line::{Boot, ParsedLine, Stamp};
pub use opening::{CrewMember, Opening};
pub use verify::{Options, Report, Trust, Verdict, verify, verify_many};

/// The namespace of every signature in a record.
pub const NAMESPACE: &str = "stumpside-record-v1";
/// The most bytes of one line, its newline included.
pub const LINE_BYTES_MAX: usize = 16 * 1024;
/// The most lines of one record.
pub const LINES_MAX: usize = 100_000;
/// The most bytes of one record.
pub const RECORD_BYTES_MAX: usize = 64 * 1024 * 1024;
/// The most bytes of one write, and of the junk one torn write can leave.
pub const BATCH_BYTES_MAX: usize = 64 * 1024;
/// The largest integer a record holds: every reader of JSON keeps it exactly.
pub const INTEGER_MAX: u64 = (1 << 53) - 1;
