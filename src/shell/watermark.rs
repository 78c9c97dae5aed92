//! The watermark: the last line this laptop was told is on disk, kept outside the job folder.
//! It is a guard against roll-back and damage on the same laptop, never evidence, and never synced.

use std::path::{Path, PathBuf};

use etcetera::{AppStrategy, AppStrategyArgs, choose_app_strategy};

use super::files;
use crate::record::line::{Boot, Place, hex, unhex};

/// Where the watermarks of this laptop lie, or `None` where the system names no home.
pub fn default_dir() -> Option<PathBuf> {
    let args = AppStrategyArgs {
        top_level_domain: String::new(),
        author: String::new(),
        app_name: "stumpside".to_owned(),
    };
    let strategy = choose_app_strategy(args).ok()?;
    Some(strategy.state_dir().unwrap_or_else(|| strategy.data_dir()))
}

/// The watermark of one record.
#[derive(Debug, Clone)]
pub struct Watermark {
    path: PathBuf,
    failed: PathBuf,
}

impl Watermark {
    /// The watermark of a record in a state folder.
    pub fn of(dir: &Path, record: &[u8; 16]) -> Self {
        let name = hex(record);
        Self {
            path: dir.join(format!("{name}.seen")),
            failed: dir.join(format!("{name}.failed")),
        }
    }

    /// Notes the last line on disk. A failure is of no consequence to the record.
    pub fn note(&self, last: Place) {
        let text = format!("{} {}\n", last.seq, hex(&last.prev));
        let made = self
            .path
            .parent()
            .is_some_and(|dir| files::make_dir(dir).is_ok());
        if made {
            let _ = files::replace_unsynced(&self.path, text.as_bytes());
        }
    }

    /// The last line noted: its number, and its hash in `prev`.
    pub fn read(&self) -> Option<Place> {
        let text = files::read_text(&self.path, 256).ok()?;
        let (seq, hash) = text.trim_end().split_once(' ')?;
        Some(Place {
            seq: seq.parse().ok()?,
            prev: unhex(hash)?,
        })
    }

    /// Notes that a write to a file failed in this start of the machine.
    pub fn note_failed(&self, file: &Path, boot: Boot) {
        let made = self
            .failed
            .parent()
            .is_some_and(|dir| files::make_dir(dir).is_ok());
        if made {
            let text = format!("{boot} {}\n", file.display());
            let _ = files::replace_unsynced(&self.failed, text.as_bytes());
        }
    }

    /// Whether a write to this file failed since the machine was started.
    pub fn failed(&self, file: &Path, boot: Boot) -> bool {
        files::read_text(&self.failed, 8192)
            .is_ok_and(|text| text == format!("{boot} {}\n", file.display()))
    }
}
