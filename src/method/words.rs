//! Numbers as a crew reads them, and the rounding that thresholds are compared by.

use crate::units::{Angle, Duration};

/// A length in centimetres with one decimal.
pub(super) fn cm(metres: f64) -> String {
    format!("{:.1} cm", metres * 100.0)
}

/// A ratio with two decimals.
pub(super) fn ratio(value: f64) -> String {
    format!("{value:.2}")
}

/// An angle in degrees with one decimal.
pub(super) fn degrees(radians: f64) -> String {
    format!("{:.1} deg", radians.to_degrees())
}

/// Seconds with one decimal.
pub(super) fn seconds(time: Duration) -> String {
    format!("{:.1} s", time.value())
}

/// A force in kilonewtons with one decimal.
pub(super) fn kilonewtons(newtons: f64) -> String {
    format!("{:.1} kN", newtons / 1000.0)
}

/// A tilt, or that it is past the end.
pub(super) fn tilt(angle: Option<Angle>) -> String {
    angle.map_or_else(
        || "more than 90 deg".to_owned(),
        |angle| degrees(angle.value()),
    )
}

/// Whether a ratio is at least a limit, both to a hundredth.
pub(super) fn ratio_reaches(value: f64, limit: f64) -> bool {
    (value * 100.0).round() >= (limit * 100.0).round()
}

/// Whether an angle is at most a limit, both to a tenth of a degree; past 90 degrees never.
pub(super) fn angle_keeps(angle: Option<Angle>, limit: Angle) -> bool {
    let tenths = |angle: Angle| (angle.in_deg() * 10.0).round();
    angle.is_some_and(|angle| tenths(angle) <= tenths(limit))
}

/// Whether a time is at most a limit, both to a tenth of a second.
pub(super) fn time_keeps(time: Duration, limit: Duration) -> bool {
    (time.value() * 10.0).round() <= (limit.value() * 10.0).round()
}

/// Whether a length is at most a limit, both to a millimetre.
pub(super) fn length_keeps(metres: f64, limit: f64) -> bool {
    (metres * 1000.0).round() <= (limit * 1000.0).round()
}

/// A length a tape can measure: the nearest millimetre.
pub(super) fn on_tape(metres: f64) -> f64 {
    (metres * 1000.0).round() / 1000.0
}

/// The millimetre not above a length; a hair of rounding is forgiven.
pub(super) fn tape_below(metres: f64) -> f64 {
    (metres * 1000.0 + 1.0e-6).floor() / 1000.0
}

/// The millimetre not below a length.
pub(super) fn tape_above(metres: f64) -> f64 {
    (metres * 1000.0 - 1.0e-6).ceil() / 1000.0
}
