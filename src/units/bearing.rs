//! A compass bearing: degrees clockwise from true north, always in 0..360.

use crate::units::{Angle, NotFinite};

/// A bearing in degrees clockwise from true north, 0 included, 360 excluded.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Bearing(f64);

impl Bearing {
    /// A bearing from any finite number of degrees, turned into 0..360.
    ///
    /// # Errors
    /// [`NotFinite`] for NaN or infinity.
    pub fn try_deg(degrees: f64) -> Result<Self, NotFinite> {
        if !degrees.is_finite() {
            return Err(NotFinite {
                quantity: "a bearing",
            });
        }
        Ok(Self::deg(degrees))
    }

    /// A bearing from degrees the program computed.
    ///
    /// # Panics
    /// Where the number is not finite, a fault of the program.
    #[track_caller]
    pub fn deg(degrees: f64) -> Self {
        assert!(degrees.is_finite(), "a bearing must be finite");
        let turned = degrees.rem_euclid(360.0);
        Self(if turned >= 360.0 { 0.0 } else { turned })
    }

    /// Degrees in 0..360.
    pub const fn in_deg(self) -> f64 {
        self.0
    }

    /// The turn from this bearing to another, clockwise positive, in −180..=180 degrees.
    pub fn turn_to(self, other: Self) -> Angle {
        let turn = (other.0 - self.0).rem_euclid(360.0);
        Angle::deg(if turn > 180.0 { turn - 360.0 } else { turn })
    }

    /// East and north parts of the unit vector along the bearing.
    pub fn east_north(self) -> (f64, f64) {
        let radians = self.0.to_radians();
        (libm::sin(radians), libm::cos(radians))
    }

    /// The bearing turned clockwise.
    pub fn turned(self, by: Angle) -> Self {
        Self::deg(self.0 + by.in_deg())
    }
}
