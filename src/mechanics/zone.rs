//! The ring about a tree and the sector of its fall. It knows no roads and no people.

use crate::units::{Angle, Length};

/// The half-angle each side of the lay that is taken as the tree's. Source: training figure of
/// 45 degrees (from memory), widened by the lean: our judgement.
const HALF_SECTOR_DEG: f64 = 45.0;
/// What is added to the lean's own direction.
const BESIDE_LEAN_DEG: f64 = 30.0;

/// The ring's radius.
///
/// # Model
/// A rule set's count of tree heights times the height.
/// # Valid for
/// Flat ground; downhill, what rolls has no ring.
/// # Source
/// 29 CFR 1910.266(h)(1) for two tree lengths (opened); other sets name their own.
pub fn ring_radius(height: Length, tree_heights: f64) -> Length {
    height * tree_heights
}

/// The half-angle of the sector the tree may fall in.
///
/// # Model
/// The larger of 45 degrees and the weight's own direction off the lay plus 30 degrees, at
/// most the whole turn.
/// # Valid for
/// A hinge that steers; without one the whole turn.
/// # Source
/// Our judgement.
pub fn sector_half_angle(weight_off_lay: Angle) -> Angle {
    Angle::deg(
        HALF_SECTOR_DEG
            .max(weight_off_lay.in_deg().abs() + BESIDE_LEAN_DEG)
            .min(180.0),
    )
}

/// How far along level ground a tree lying down a slope reaches.
///
/// # Model
/// `H cos α`.
/// # Valid for
/// Even slopes.
/// # Source
/// Geometry.
pub fn level_reach(height: Length, slope: Angle) -> Length {
    height * libm::cos(slope.value())
}
