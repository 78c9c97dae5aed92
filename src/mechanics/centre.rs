//! Where the weight of stem and crown stands: forward of the stump, right of it, and how high.
//! It takes the stem straight and says nothing of a stem that bends.

use crate::species::WoodType;
use crate::units::{Angle, Bearing, Length, Mass};

/// The crown's shape as it enters the model: offset and height factors.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CrownShape {
    /// Offset of the centroid over the difference of two opposite radii.
    pub offset: f64,
    /// Height of the centroid over the crown's length, from the base.
    pub height: f64,
}

/// The factors of a broadleaf's and a conifer's crown.
///
/// # Model
/// Four quarter-ellipses as a half-ellipsoid (0.375, 0.375) or a cone (0.32, 0.25).
/// # Valid for
/// Crowns without gaps; no published validation of the offset exists, so it is a model.
/// # Source
/// Derived, checked by Monte Carlo.
pub const fn crown_shape(wood_type: WoodType) -> CrownShape {
    match wood_type {
        WoodType::Hardwood => CrownShape {
            offset: 0.375,
            height: 0.375,
        },
        WoodType::Softwood => CrownShape {
            offset: 0.32,
            height: 0.25,
        },
    }
}

/// The four radii of a crown.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CrownRadii {
    /// Towards north.
    pub north: Length,
    /// Towards east.
    pub east: Length,
    /// Towards south.
    pub south: Length,
    /// Towards west.
    pub west: Length,
}

/// A point in plan, east and north of the stump.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PlanOffset {
    /// East of the stump.
    pub east: Length,
    /// North of the stump.
    pub north: Length,
}

impl PlanOffset {
    /// The same point along a lay: forward of the stump, and right of the lay.
    pub fn along(&self, lay: Bearing) -> (Length, Length) {
        let (east, north) = lay.east_north();
        (
            self.east * east + self.north * north,
            self.east * north - self.north * east,
        )
    }

    /// A point this far along a bearing.
    pub fn towards(bearing: Bearing, distance: Length) -> Self {
        let (east, north) = bearing.east_north();
        Self {
            east: distance * east,
            north: distance * north,
        }
    }
}

/// The offset of the crown's centroid from its four radii.
///
/// # Model
/// `k (r_E − r_W)` east and `k (r_N − r_S)` north.
/// # Valid for
/// As [`crown_shape`].
/// # Source
/// Derived.
pub fn crown_offset(shape: CrownShape, radii: &CrownRadii) -> PlanOffset {
    PlanOffset {
        east: shape.offset * (radii.east - radii.west),
        north: shape.offset * (radii.north - radii.south),
    }
}

/// One part of the tree: its mass, the height of its centre, and its offset from the stem's axis.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Part {
    /// Mass.
    pub mass: Mass,
    /// Height of its centre above the cut.
    pub height: Length,
    /// Offset from the stem's axis at that height.
    pub offset: PlanOffset,
}

/// Where a tree's weight stands.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Centre {
    /// Mass of the whole.
    pub mass: Mass,
    /// In plan, from the stump's centre.
    pub plan: PlanOffset,
    /// Above the cut.
    pub height: Length,
}

/// The centre of weight of stem and crown on a leaning axis; heights are vertical.
///
/// # Model
/// Mass-weighted mean; each part is shifted by its height times the tangent of the lean.
/// # Valid for
/// A straight stem.
/// # Source
/// Statics.
pub fn centre_of_weight(parts: &[Part], lean: Angle, toward: Bearing) -> Option<Centre> {
    let mass: f64 = parts.iter().map(|part| part.mass.value()).sum();
    if mass <= 0.0 {
        return None;
    }
    let shift = libm::tan(lean.value());
    let mean = |of: &dyn Fn(&Part) -> f64| -> f64 {
        parts
            .iter()
            .map(|part| part.mass.value() * of(part))
            .sum::<f64>()
            / mass
    };
    let (east, north) = toward.east_north();
    Some(Centre {
        mass: Mass::si(mass),
        plan: PlanOffset {
            east: Length::si(mean(&|part| {
                part.height.value() * shift * east + part.offset.east.value()
            })),
            north: Length::si(mean(&|part| {
                part.height.value() * shift * north + part.offset.north.value()
            })),
        },
        height: Length::si(mean(&|part| part.height.value())),
    })
}

/// The lean of the weight: the angle at the stump between the vertical and the centre of weight.
///
/// # Model
/// `atan(offset/height)`.
/// # Valid for
/// A centre above the cut.
/// # Source
/// Geometry.
pub fn effective_lean(offset: Length, height: Length) -> Angle {
    Angle::si(libm::atan2(offset.value(), height.value()))
}
