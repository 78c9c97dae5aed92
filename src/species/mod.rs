//! What is known of each wood: strength, weight and names, each value with its source.
//! Nothing here computes a tree, and no value is changed to suit an answer.

mod entry;
mod find;
mod green;
mod table;

pub use entry::{BiomassGroup, KnownValue, Species, Trait, WoodType};
pub use find::{all, find, nearest};
pub use green::GreenWood;
