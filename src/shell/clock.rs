//! The door to the clocks: wall time with its local offset, and the machine's own running clock,
//! which also counts while the lid is closed. It never corrects either.

use std::path::Path;

use chrono::{DateTime, Local, Offset, Utc};
use rustix::time::{ClockId, Timespec, clock_gettime};
use sha2::{Digest, Sha256};

use super::files::{FileError, read_limited};
pub use crate::record::line::{Boot, Stamp};

const BOOT_ID: &str = "/proc/sys/kernel/random/boot_id";

/// The clocks of this machine since its start.
#[derive(Debug, Clone, Copy)]
pub struct Clock {
    boot: Boot,
}

impl Clock {
    /// Finds out which start of the machine this is.
    ///
    /// # Errors
    /// [`FileError`] where the kernel does not say.
    pub fn start() -> Result<Self, FileError> {
        let id = read_limited(Path::new(BOOT_ID), 256)?;
        let hash = Sha256::digest(id.trim_ascii());
        Ok(Self {
            boot: Boot([hash[0], hash[1], hash[2], hash[3]]),
        })
    }

    /// The stamp of this moment.
    pub fn now(&self) -> Stamp {
        let utc_ms = milliseconds(&clock_gettime(ClockId::Realtime));
        let wall = DateTime::<Utc>::from_timestamp_millis(utc_ms);
        let off = wall.map(|at| at.with_timezone(&Local).offset().fix().local_minus_utc() / 60);
        Stamp {
            utc_ms,
            off_min: off.unwrap_or(0),
            up_ms: milliseconds(&clock_gettime(ClockId::Boottime)),
            boot: self.boot,
        }
    }
}

fn milliseconds(at: &Timespec) -> i64 {
    at.tv_sec * 1000 + at.tv_nsec / 1_000_000
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_clocks_of_one_start_run_forwards_together() {
        let clock = Clock::start().unwrap();
        let (first, then) = (clock.now(), clock.now());
        assert_eq!(first.boot, then.boot);
        assert!(first.up_ms > 0 && then.up_ms >= first.up_ms);
        assert!(first.off_min.abs() <= 18 * 60);
        assert_eq!(
            crate::record::line::read_utc(&first.utc()),
            Some(first.utc_ms)
        );
    }
}
