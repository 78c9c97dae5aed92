//! The site as typed values: slope and features, each with its place.

use crate::diagnostic::Place;
use crate::plan::{Measured, Spanned};
use crate::units::{Angle, Bearing, Length, Voltage};

/// The site.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Site {
    /// Slope: angle and the bearing it falls towards.
    pub slope: Option<Slope>,
    /// What stands or lies there.
    pub features: Vec<Feature>,
}

/// The slope of the ground.
#[derive(Debug, Clone, PartialEq)]
pub struct Slope {
    /// Its angle.
    pub angle: Measured<Angle>,
    /// The bearing it falls towards.
    pub downhill: Spanned<Bearing>,
}

/// A feature of the site.
#[derive(Debug, Clone, PartialEq)]
pub struct Feature {
    /// Its route in the plan, such as `trees[2]`.
    pub route: String,
    /// Its id.
    pub id: Spanned<String>,
    /// What it is.
    pub kind: Spanned<FeatureKind>,
    /// Voltage, of a power line.
    pub voltage: Option<Measured<Voltage>>,
    /// A course of points, east and north of the origin.
    pub along: Vec<[Measured<Length>; 2]>,
    /// A point.
    pub at: Option<[Measured<Length>; 2]>,
    /// A radius about the point.
    pub radius: Option<Measured<Length>>,
    /// Where the entry stands.
    pub place: Place,
}

/// Kinds of features.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum FeatureKind {
    /// A power line.
    PowerLine,
    /// A track.
    Track,
    /// A public road.
    Road,
    /// A building.
    Building,
    /// A place where others work.
    WorkArea,
    /// A machine that yards or loads.
    Machine,
    /// A landing.
    Landing,
    /// A fence.
    Fence,
    /// Water.
    Water,
    /// A tree that stays.
    StandingTree,
}

impl FeatureKind {
    /// Every kind.
    pub const ALL: [Self; 10] = [
        Self::PowerLine,
        Self::Track,
        Self::Road,
        Self::Building,
        Self::WorkArea,
        Self::Machine,
        Self::Landing,
        Self::Fence,
        Self::Water,
        Self::StandingTree,
    ];

    /// The word in the plan.
    pub const fn word(self) -> &'static str {
        match self {
            Self::PowerLine => "power-line",
            Self::Track => "track",
            Self::Road => "road",
            Self::Building => "building",
            Self::WorkArea => "work-area",
            Self::Machine => "machine",
            Self::Landing => "landing",
            Self::Fence => "fence",
            Self::Water => "water",
            Self::StandingTree => "standing-tree",
        }
    }
}
