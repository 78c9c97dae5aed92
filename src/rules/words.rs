//! Figures in words, in the plan's own units. It never rounds a figure before it is compared.

use crate::plan::DisplayUnits;
use crate::units::{Angle, Length};

const FOOT: f64 = 0.3048;
const INCH: f64 = 0.0254;

/// A length on the ground or in the tree: metres or feet.
pub fn long(units: DisplayUnits, length: Length) -> String {
    match units {
        DisplayUnits::Metric => format!("{:.1} m", length.value()),
        DisplayUnits::Us => format!("{:.0} ft", length.value() / FOOT),
    }
}

/// A length at the stump: centimetres or inches.
pub fn short(units: DisplayUnits, length: Length) -> String {
    match units {
        DisplayUnits::Metric => format!("{:.1} cm", length.in_cm()),
        DisplayUnits::Us => format!("{:.1} in", length.value() / INCH),
    }
}

/// An angle in whole degrees.
pub fn degrees(angle: Angle) -> String {
    format!("{:.0} deg", angle.in_deg())
}
