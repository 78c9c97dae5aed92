//! One file a physical model: what a stem weighs, where its weight stands, what its standing wood
//! holds, when it splits, how it falls and who gets away. No job, no method and no verdict here.

mod numeric;

pub mod section;
pub mod holding;
pub mod splitting;
pub mod strap;
pub mod biomass;
pub mod stem;
pub mod centre;
pub mod lean;
pub mod wind;
pub mod saw;
pub mod race;
pub mod fall;
pub mod escape;
pub mod wedge;
pub mod rigging;
pub mod zone;

pub(crate) use numeric::{bisect, integrate, root};
