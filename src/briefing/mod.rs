//! What is asked, of whom, in which form it is answered, and the card of each tree as it is
//! shown. Nothing here knows what has been answered.

mod card;
mod item;
mod job;
mod ladder;
mod size_up;

pub use card::{Card, Figure, Removed, Rung, StumpCard, UnitWord, rung_of};
pub use item::{AskedValue, Field, Form, Item, Kind, Option_, Signs};
pub use job::{Job, JobPerson, JobTree, Tolerance};
pub use ladder::{
    choose, closing, cuts, held_back, hold_line, list, own_hazards, questions, roll_call, signing,
    talk_again,
};
pub use size_up::size_up;
