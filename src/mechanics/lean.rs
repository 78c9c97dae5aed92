//! The trunk's lean from readings. It never adds the crown: that is the centre of weight's work.

use crate::units::{Angle, Bearing, Reading};

/// A lean with its direction and the doubt of both.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Lean {
    /// Angle from the vertical, with its spread.
    pub angle: Reading<Angle>,
    /// Where it leans to.
    pub toward: Bearing,
    /// One standard deviation of that direction.
    pub toward_spread: Angle,
}

/// Two readings of the lean from places at a right angle to each other.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct TwoViews {
    /// The lean seen in the plane of `facing`, towards it positive.
    pub view_a: Reading<Angle>,
    /// The lean seen in the plane 90 degrees clockwise of `facing`, towards it positive.
    pub view_b: Reading<Angle>,
    /// The bearing along which `view_a` counts positive.
    pub facing: Bearing,
}

/// The lean from two views.
///
/// # Model
/// `tan θ = √(tan²a + tan²b)`, direction `atan2(tan b, tan a)` clockwise of the first axis; the
/// spreads are carried along and across the direction found.
/// # Valid for
/// Views square to each other.
/// # Source
/// Geometry; the principle in Grosenbaugh 1980, Forest Science 26 (abstract opened).
pub fn from_two_views(views: &TwoViews) -> Lean {
    let a = libm::tan(views.view_a.value.value());
    let b = libm::tan(views.view_b.value.value());
    let slope = (a * a + b * b).sqrt();
    let turn = if slope > 0.0 { libm::atan2(b, a) } else { 0.0 };
    let (spread_a, spread_b) = (
        views.view_a.spread.value().abs(),
        views.view_b.spread.value().abs(),
    );
    let (cosine, sine) = (libm::cos(turn), libm::sin(turn));
    let along = libm::hypot(spread_a * cosine, spread_b * sine);
    let across = libm::hypot(spread_a * sine, spread_b * cosine);
    let toward_spread = if slope > 0.0 {
        libm::atan2(across, libm::atan(slope))
    } else {
        0.0
    };
    Lean {
        angle: Reading::new(Angle::si(libm::atan(slope)), Angle::si(along)),
        toward: views.facing.turned(Angle::si(turn)),
        toward_spread: Angle::si(toward_spread),
    }
}
