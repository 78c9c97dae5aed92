//! The commands, one file each.

pub mod record;
pub mod crew;
