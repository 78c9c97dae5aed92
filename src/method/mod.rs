//! The cutting methods: choose one for a tree, with reasons and refusals, and lay out its cuts as
//! steps. One file a method. A method chosen by hand is judged, never replaced.

mod bench;
mod brisk;
mod choose;
mod judgement;
mod lay_out;
mod plunge;
mod relieved;
mod rigged;
mod size_up;
mod straight;
mod tilted;
mod wedged;
mod wind_limit;
mod words;

pub use choose::{Choice, Refusal};
pub use judgement::{Judgement, JudgementRow, STANDARD};
pub use size_up::{SizeUp, size_up, size_up_with, stump_of};
