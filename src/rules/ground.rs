//! Distances and sectors on the ground, in metres east and north of the plan's origin. It knows
//! points, courses and bearings, no rules.

use crate::plan::{Feature, Measured};
use crate::units::{Angle, Bearing, Length};

/// A point on the ground.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Spot {
    east: f64,
    north: f64,
}

impl Spot {
    /// A position written in the plan.
    pub fn of(at: &[Measured<Length>; 2]) -> Self {
        let [east, north] = at;
        Self {
            east: east.value().value(),
            north: north.value().value(),
        }
    }

    /// The distance to another point.
    pub fn to(self, other: Self) -> Length {
        Length::m(libm::hypot(
            other.east - self.east,
            other.north - self.north,
        ))
    }

    /// How far this point lies above another on an even slope.
    pub fn above(self, other: Self, downhill: Bearing, slope: Angle) -> Length {
        let (east, north) = downhill.east_north();
        let along = (self.east - other.east) * east + (self.north - other.north) * north;
        Length::m(-along * libm::tan(slope.value()))
    }

    /// The distance to a feature's nearest edge, nothing where it has no place.
    pub fn to_feature(self, feature: &Feature) -> Option<Length> {
        let radius = radius(feature);
        let nearest = segments(feature)
            .map(|(from, to)| self.frame(Bearing::deg(0.0)).distance(from, to))
            .min_by(f64::total_cmp)?;
        Some(Length::m((nearest - radius).max(0.0)))
    }

    /// Whether any part of a feature lies within reach and within the half-angle of a bearing.
    pub fn meets(self, feature: &Feature, sector: &Sector) -> bool {
        let frame = self.frame(sector.along);
        let radius = radius(feature);
        segments(feature).any(|(from, to)| {
            let inside = frame.clip(from, to, sector.half_angle.in_deg().min(89.0));
            let through = inside.is_some_and(|least| least <= sector.reach.value());
            // A round place reaches into the sector from beside it, too.
            let beside = radius > 0.0 && {
                let (forward, right) = frame.local(from);
                let distance = libm::hypot(forward, right);
                let off = libm::atan2(right.abs(), forward);
                let wide = if distance <= radius {
                    std::f64::consts::PI
                } else {
                    sector.half_angle.value() + libm::asin(radius / distance)
                };
                distance - radius <= sector.reach.value() && off <= wide
            };
            through || beside
        })
    }

    /// Whether another point lies within reach and within the half-angle of a bearing.
    pub fn meets_spot(self, other: Self, sector: &Sector) -> bool {
        let (forward, right) = self.frame(sector.along).local(other);
        let off = libm::atan2(right.abs(), forward);
        self.to(other) <= sector.reach && off <= sector.half_angle.value()
    }

    fn frame(self, along: Bearing) -> Frame {
        Frame {
            origin: self,
            along: along.east_north(),
        }
    }
}

/// Ground that a tree may come down on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Sector {
    /// The lay.
    pub along: Bearing,
    /// Half-angle, either side.
    pub half_angle: Angle,
    /// How far.
    pub reach: Length,
}

/// The turn between two bearings, whichever way is shorter: 0 to 180 degrees.
pub fn turn(from: Bearing, to: Bearing) -> Angle {
    from.turn_to(to).abs()
}

struct Frame {
    origin: Spot,
    along: (f64, f64),
}

impl Frame {
    /// Forward along the bearing, then right of it.
    fn local(&self, spot: Spot) -> (f64, f64) {
        let (east, north) = (spot.east - self.origin.east, spot.north - self.origin.north);
        let (along_east, along_north) = self.along;
        (
            east * along_east + north * along_north,
            east * along_north - north * along_east,
        )
    }

    fn distance(&self, from: Spot, to: Spot) -> f64 {
        least_of(self.local(from), self.local(to))
    }

    /// The least distance of the part of a course inside a wedge of less than half a turn.
    fn clip(&self, from: Spot, to: Spot, half_angle_deg: f64) -> Option<f64> {
        let (a, b) = (self.local(from), self.local(to));
        let half = half_angle_deg.to_radians();
        let (sin, cos) = (libm::sin(half), libm::cos(half));
        let (mut low, mut high) = (0.0_f64, 1.0_f64);
        for side in [-1.0, 1.0] {
            let inside = |p: (f64, f64)| p.0 * sin + side * p.1 * cos;
            let (at_a, at_b) = (inside(a), inside(b));
            if at_a < 0.0 && at_b < 0.0 {
                return None;
            }
            if at_a < 0.0 {
                low = low.max(at_a / (at_a - at_b));
            } else if at_b < 0.0 {
                high = high.min(at_a / (at_a - at_b));
            }
        }
        if low > high {
            return None;
        }
        let point = |t: f64| (a.0 + (b.0 - a.0) * t, a.1 + (b.1 - a.1) * t);
        Some(least_of(point(low), point(high)))
    }
}

/// The least distance from the origin to a course between two points.
fn least_of(a: (f64, f64), b: (f64, f64)) -> f64 {
    let (dx, dy) = (b.0 - a.0, b.1 - a.1);
    let length = dx * dx + dy * dy;
    let t = if length > 0.0 {
        (-(a.0 * dx + a.1 * dy) / length).clamp(0.0, 1.0)
    } else {
        0.0
    };
    libm::hypot(a.0 + dx * t, a.1 + dy * t)
}

fn radius(feature: &Feature) -> f64 {
    feature.radius.as_ref().map_or(0.0, |r| r.value().value())
}

/// The courses of a feature; a single point is a course of no length.
fn segments(feature: &Feature) -> impl Iterator<Item = (Spot, Spot)> + '_ {
    let along = feature.along.as_slice();
    let alone = if along.len() == 1 {
        along.first()
    } else {
        None
    };
    let point = feature.at.as_ref().or(alone);
    let course = along.windows(2).filter_map(|pair| match pair {
        [from, to] => Some((Spot::of(from), Spot::of(to))),
        _ => None,
    });
    course.chain(point.map(|at| (Spot::of(at), Spot::of(at))))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn spot(east: f64, north: f64) -> Spot {
        Spot { east, north }
    }

    #[test]
    fn distances_and_sectors_agree_with_plain_geometry() {
        let here = spot(10.0, 20.0);
        assert!((here.to(spot(13.0, 24.0)).value() - 5.0).abs() < 1e-12);
        let frame = here.frame(Bearing::deg(90.0));
        let (forward, right) = frame.local(spot(17.0, 15.0));
        assert!((forward - 7.0).abs() < 1e-12 && (right - 5.0).abs() < 1e-12);
        assert!((frame.distance(spot(5.0, 23.0), spot(15.0, 23.0)) - 3.0).abs() < 1e-12);
        // A course straight across the lay, 10 m off, seen in a wedge of 45 degrees.
        let inside = frame
            .clip(spot(20.0, -100.0), spot(20.0, 100.0), 45.0)
            .unwrap();
        assert!((inside - 10.0).abs() < 1e-12);
        // One that runs alongside, right of the wedge until it crosses its edge at 5, 5.
        let inside = frame
            .clip(spot(11.0, 15.0), spot(40.0, 15.0), 45.0)
            .unwrap();
        assert!((inside - libm::hypot(5.0, 5.0)).abs() < 1e-12);
        assert_eq!(frame.clip(spot(9.0, 10.0), spot(9.0, 40.0), 45.0), None);
    }

    #[test]
    fn level_follows_the_slope() {
        let above = spot(0.0, 10.0).above(spot(0.0, 0.0), Bearing::deg(180.0), Angle::deg(45.0));
        assert!((above.value() - 10.0).abs() < 1e-9);
        let level = spot(7.0, 0.0).above(spot(0.0, 0.0), Bearing::deg(180.0), Angle::deg(45.0));
        assert!(level.value().abs() < 1e-9);
    }
}
