//! The virtual stump: applies a sequence of cuts, centimetre by centimetre, and judges the wood
//! left standing after each. It judges any sequence, its own or one written by hand, and changes
//! none.

mod advance;
mod judge;
mod run;
mod standing;
mod stump;

pub use judge::{PINCH_STRESS, Verdict};
pub use run::{Run, SimulateError, State, run};
pub use standing::StandingPiece;
pub use stump::Stump;
