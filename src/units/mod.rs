//! Quantities as types: one newtype a quantity, SI inside, finite by construction.
//! This room never reads text and never rounds.

mod band;
mod bearing;
mod quantity;

pub use band::{Band, Reading};
pub use bearing::Bearing;
pub use quantity::{
    Angle, Area, CutRate, Density, Duration, Force, FractureEnergy, FromSi, Inertia, Length, Mass,
    Moment, NotFinite, Power, SecondMoment, SectionModulus, Speed, Stress, SweptVolume, Voltage,
};

/// Standard gravity, m/s². Source: 3rd CGPM (1901), 9.80665 exactly.
pub const GRAVITY: f64 = 9.80665;
