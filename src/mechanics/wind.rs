//! The wind on a crown. It takes no shelter and no gust: the speed given is the speed used.

use crate::mechanics::centre::CrownRadii;
use crate::species::WoodType;
use crate::units::{Area, Force, Length, Speed};

/// Density of air at 15 °C and sea level, kg/m³. Source: the standard atmosphere.
pub const AIR_DENSITY: f64 = 1.225;

/// Whether a broadleaf's crown carries leaves.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Leaf {
    /// In leaf; a conifer always.
    InLeaf,
    /// Leafless.
    Bare,
}

/// The drag coefficient at felling winds, on the still-air area.
///
/// # Model
/// Conifers 0.6, broadleaves 0.4 in leaf and 0.2 bare.
/// # Valid for
/// Below 11 m/s; wind-tunnel values at 20 m/s are lower (0.15 to 0.47).
/// # Source
/// Our judgement above Rudnicki and others 2004 and Vollsinger and others 2005 (abstracts opened).
pub const fn drag_coefficient(wood_type: WoodType, leaf: Leaf) -> f64 {
    match (wood_type, leaf) {
        (WoodType::Softwood, Leaf::InLeaf | Leaf::Bare) => 0.6,
        (WoodType::Hardwood, Leaf::InLeaf) => 0.4,
        (WoodType::Hardwood, Leaf::Bare) => 0.2,
    }
}

/// The area a crown shows to the wind in still air.
///
/// # Model
/// Mean width times length, times π/4 for a broadleaf (an oval) and ½ for a conifer (a triangle).
/// # Valid for
/// Crowns without gaps.
/// # Source
/// Geometry.
pub fn frontal_area(wood_type: WoodType, radii: &CrownRadii, length: Length) -> Area {
    let width = 0.5 * (radii.north + radii.east + radii.south + radii.west);
    let shape = match wood_type {
        WoodType::Hardwood => std::f64::consts::FRAC_PI_4,
        WoodType::Softwood => 0.5,
    };
    Area::si(shape * (width * length).value())
}

/// The drag on an area.
///
/// # Model
/// `½ ρ C_d A U²`.
/// # Valid for
/// Steady wind.
/// # Source
/// Cullen 2005, Arboriculture and Urban Forestry 31(3) (abstract opened).
pub fn drag(coefficient: f64, area: Area, wind: Speed) -> Force {
    Force::si(0.5 * AIR_DENSITY * coefficient * area.value() * wind.value() * wind.value())
}
