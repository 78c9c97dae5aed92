//! The commands, one file each.

pub mod record;
pub mod crew;

pub mod brief;
pub mod check;
pub mod demo;
pub mod simulate;
pub mod sizeup;
mod sizeup_text;
pub mod why;
