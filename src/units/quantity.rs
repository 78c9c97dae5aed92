//! The newtypes. Each holds one finite number in its SI unit; what is not finite cannot be made.

use std::ops::{Add, AddAssign, Div, Mul, Neg, Sub};

use thiserror::Error;

/// A number that is not finite was offered as a quantity.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
#[error("{quantity} must be a finite number")]
pub struct NotFinite {
    /// Which quantity it was to be.
    pub quantity: &'static str,
}

/// A quantity that can be made from a number in its SI unit.
pub trait FromSi: Copy {
    /// Makes it.
    ///
    /// # Errors
    /// [`NotFinite`] where the number is NaN or infinite.
    fn from_si(value: f64) -> Result<Self, NotFinite>;
    /// The number in the SI unit.
    fn to_si(self) -> f64;
}

macro_rules! quantity {
    ($(#[$doc:meta])* $name:ident, $words:literal, $unit:literal) => {
        $(#[$doc])*
        #[derive(Debug, Clone, Copy, PartialEq, PartialOrd, Default)]
        pub struct $name(f64);

        impl $name {
            /// Nothing of it.
            pub const ZERO: Self = Self(0.0);
            /// The symbol of the SI unit.
            pub const UNIT: &'static str = $unit;

            /// Makes the quantity from a number that may come from outside.
            ///
            /// # Errors
            /// [`NotFinite`] where the number is NaN or infinite.
            pub const fn try_si(value: f64) -> Result<Self, NotFinite> {
                if value.is_finite() {
                    Ok(Self(value))
                } else {
                    Err(NotFinite { quantity: $words })
                }
            }

            /// Makes the quantity from a number the program computed, in the SI unit.
            ///
            /// # Panics
            /// Where the number is not finite: computing with finite quantities in range
            /// cannot give that, so it is a fault of the program.
            #[track_caller]
            pub const fn si(value: f64) -> Self {
                assert!(value.is_finite(), concat!($words, " must be finite"));
                Self(value)
            }

            /// The number in the SI unit.
            pub const fn value(self) -> f64 {
                self.0
            }

            /// The magnitude.
            pub const fn abs(self) -> Self {
                Self(self.0.abs())
            }

            /// The smaller of two.
            pub const fn min(self, other: Self) -> Self {
                if other.0 < self.0 { other } else { self }
            }

            /// The larger of two.
            pub const fn max(self, other: Self) -> Self {
                if other.0 > self.0 { other } else { self }
            }
        }

        impl FromSi for $name {
            fn from_si(value: f64) -> Result<Self, NotFinite> {
                Self::try_si(value)
            }
            fn to_si(self) -> f64 {
                self.0
            }
        }

        impl Add for $name {
            type Output = Self;
            fn add(self, other: Self) -> Self {
                Self::si(self.0 + other.0)
            }
        }
        impl AddAssign for $name {
            fn add_assign(&mut self, other: Self) {
                *self = *self + other;
            }
        }
        impl Sub for $name {
            type Output = Self;
            fn sub(self, other: Self) -> Self {
                Self::si(self.0 - other.0)
            }
        }
        impl Neg for $name {
            type Output = Self;
            fn neg(self) -> Self {
                Self(-self.0)
            }
        }
        impl Mul<f64> for $name {
            type Output = Self;
            fn mul(self, factor: f64) -> Self {
                Self::si(self.0 * factor)
            }
        }
        impl Mul<$name> for f64 {
            type Output = $name;
            fn mul(self, quantity: $name) -> $name {
                quantity * self
            }
        }
        impl Div<f64> for $name {
            type Output = Self;
            fn div(self, divisor: f64) -> Self {
                Self::si(self.0 / divisor)
            }
        }
        impl Div for $name {
            type Output = f64;
            fn div(self, other: Self) -> f64 {
                self.0 / other.0
            }
        }
    };
}

quantity!(/// A length, in metres.
    Length, "a length", "m");
quantity!(/// An angle, in radians.
    Angle, "an angle", "rad");
quantity!(/// A mass, in kilograms.
    Mass, "a mass", "kg");
quantity!(/// A force, in newtons.
    Force, "a force", "N");
quantity!(/// A moment, in newton metres.
    Moment, "a moment", "N·m");
quantity!(/// An area, in square metres.
    Area, "an area", "m²");
quantity!(/// A second moment of area, in m⁴.
    SecondMoment, "a second moment of area", "m⁴");
quantity!(/// An elastic section modulus, in m³.
    SectionModulus, "a section modulus", "m³");
quantity!(/// A moment of inertia of mass, in kg·m².
    Inertia, "a moment of inertia", "kg·m²");
quantity!(/// A stress or strength, in pascals.
    Stress, "a stress", "Pa");
quantity!(/// A fracture energy, in J/m².
    FractureEnergy, "a fracture energy", "J/m²");
quantity!(/// A density, in kg/m³.
    Density, "a density", "kg/m³");
quantity!(/// A speed, in m/s.
    Speed, "a speed", "m/s");
quantity!(/// A duration, in seconds.
    Duration, "a duration", "s");
quantity!(/// A saw's cutting rate, in m²/s of cut face.
    CutRate, "a cutting rate", "m²/s");
quantity!(/// A power, in watts.
    Power, "a power", "W");
quantity!(/// An engine's swept volume (displacement), in m³.
    SweptVolume, "a displacement", "m³");
quantity!(/// A voltage, in volts.
    Voltage, "a voltage", "V");

impl Length {
    /// From millimetres.
    pub const fn mm(value: f64) -> Self {
        Self::si(value / 1000.0)
    }
    /// From centimetres.
    pub const fn cm(value: f64) -> Self {
        Self::si(value / 100.0)
    }
    /// From metres.
    pub const fn m(value: f64) -> Self {
        Self::si(value)
    }
    /// In centimetres.
    pub const fn in_cm(self) -> f64 {
        self.0 * 100.0
    }
    /// In millimetres.
    pub const fn in_mm(self) -> f64 {
        self.0 * 1000.0
    }
}

impl Angle {
    /// From degrees.
    pub const fn deg(value: f64) -> Self {
        Self::si(value * std::f64::consts::PI / 180.0)
    }
    /// In degrees.
    pub const fn in_deg(self) -> f64 {
        self.0 * 180.0 / std::f64::consts::PI
    }
}

impl CutRate {
    /// From square centimetres a second.
    pub const fn cm2_s(value: f64) -> Self {
        Self::si(value / 10_000.0)
    }
}

impl Mul<Length> for Length {
    type Output = Area;
    fn mul(self, other: Length) -> Area {
        Area::si(self.0 * other.0)
    }
}

impl Mul<Length> for Force {
    type Output = Moment;
    fn mul(self, arm: Length) -> Moment {
        Moment::si(self.0 * arm.0)
    }
}

impl Mul<SectionModulus> for Stress {
    type Output = Moment;
    fn mul(self, modulus: SectionModulus) -> Moment {
        Moment::si(self.0 * modulus.0)
    }
}

impl Mul<Area> for Stress {
    type Output = Force;
    fn mul(self, area: Area) -> Force {
        Force::si(self.0 * area.0)
    }
}

impl Div<CutRate> for Area {
    type Output = Duration;
    fn div(self, rate: CutRate) -> Duration {
        Duration::si(self.0 / rate.0)
    }
}
