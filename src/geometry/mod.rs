//! Points and directions on the ground and in the stump's plane. No trees, no jobs.

/// A point in a plane, in metres: east and north on the site, or forward and right at the stump.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Point {
    /// East, or right of the lay.
    pub x: f64,
    /// North, or forward along the lay.
    pub y: f64,
}
