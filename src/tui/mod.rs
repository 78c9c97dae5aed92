//! The windows: state and desk to a buffer, key to intent. Nothing here touches a file, a clock
//! or a terminal, and nothing here decides what may be done.

mod answer;
mod ascii;
mod desk;
mod key;
mod look;
mod raster;
pub mod screen;
mod words;

pub use ascii::to_ascii;
pub use desk::{Desk, Intent, Overlay};
pub use key::Key;
pub use look::{Ground, Letters, Look};
pub use screen::{View, draw, shows_what_is_asked};
