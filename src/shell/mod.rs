//! The only doors to the outside: files, the record on disk, keys, randomness, the clock.
//! Nothing is decided here; what the pure rooms decided is done, and what happened is told back.

pub mod files;
pub mod entropy;
pub mod clock;
pub mod passphrase;
pub mod key_store;
pub mod watermark;
pub mod record_error;
pub mod record_store;
pub mod record_file;
pub mod record_resume;
pub mod terminal;
pub mod job_folder;
pub mod beginning;
pub mod day;
pub mod brief;
