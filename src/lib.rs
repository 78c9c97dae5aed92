//! The rooms of the house, from the ground up. A room uses only rooms named above it here.

pub mod units;
pub mod geometry;
pub mod source;

pub mod species;
pub mod mechanics;
pub mod drawing;
pub mod diagnostic;

pub mod document;
pub mod plan;
pub mod parts;
pub mod simulate;
pub mod figures;
pub mod method;
pub mod rules;
pub mod assessment;

pub mod briefing;
pub mod session;
pub mod record;
pub mod pictures;

pub mod tui;
pub mod shell;
pub mod cli;
