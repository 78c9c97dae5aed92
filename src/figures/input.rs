//! What is known of one tree when its figures are asked for. Plain typed values: no text, no
//! places in a file, no answer.

use crate::mechanics::escape::WayState;
use crate::mechanics::holding::Wood;
use crate::mechanics::lean::Lean;
use crate::mechanics::section::Cavity;
use crate::mechanics::splitting::SLIDING_OVER_OPENING;
use crate::mechanics::wind::Leaf;
use crate::plan::step::MethodName;
use crate::species::Species;
use crate::units::{
    Angle, Bearing, CutRate, Density, Force, FractureEnergy, Length, Mass, Reading, Speed, Stress,
};

/// The state of the wood.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum WoodState {
    /// Living.
    Live,
    /// Dead: drier, stronger against bending, brittle.
    Dead,
    /// Frozen: stronger against bending, so it splits sooner.
    Frozen,
}

/// What was seen at the tree that the sums do not cover.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Condition {
    /// Tension wood or other marks of growth stress.
    TensionWood,
    /// A crack in the trunk.
    Crack,
    /// Ring shake.
    Shake,
    /// Rot at the hinge.
    RotAtHinge,
    /// A fork or included bark at the cut.
    Fork,
    /// A hollow beyond the model: it breaks the outline or leaves a thin wall.
    Hollow,
    /// Insect damage at the cut.
    Insects,
    /// Damaged roots.
    Roots,
}

/// What stops the felling whatever the sums say; known to the site, not to the stump.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum SiteStop {
    /// No way out.
    NoWayOut,
    /// A power line within reach.
    PowerLineInReach,
    /// The approval that the rules ask for is missing.
    ApprovalMissing,
}

/// A crown as measured.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Crown {
    /// Height of its base.
    pub base: Length,
    /// Radius towards north.
    pub north: Reading<Length>,
    /// Radius towards east.
    pub east: Reading<Length>,
    /// Radius towards south.
    pub south: Reading<Length>,
    /// Radius towards west.
    pub west: Reading<Length>,
    /// In leaf or bare.
    pub leaf: Leaf,
}

/// What is known of the crown.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum CrownInput {
    /// Measured.
    Measured(Crown),
    /// There is none: a bare stem.
    NoCrown,
    /// Not measured.
    Missing,
}

/// A weight and centre known from elsewhere, such as a pull test; it replaces the computed one.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Weigh {
    /// The whole tree's mass.
    pub mass: Reading<Mass>,
    /// Distance of the centre of weight from the stump's centre, in plan.
    pub offset: Reading<Length>,
    /// Its bearing.
    pub toward: Bearing,
    /// Its height above the cut.
    pub height: Length,
}

/// Values of the wood that replace the species' own, used as given.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct WoodOverride {
    /// Modulus of rupture.
    pub mor: Option<Stress>,
    /// Modulus of elasticity.
    pub moe: Option<Stress>,
    /// Density at 12 % moisture; it gives the fracture energy where that is not given.
    pub density: Option<Density>,
    /// Fracture energy of an opening crack.
    pub g1c: Option<FractureEnergy>,
}

/// The saw.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Saw {
    /// Length of the bar.
    pub bar: Length,
    /// Width of the bar's nose.
    pub nose: Length,
    /// Width of the kerf.
    pub kerf: Length,
    /// Cutting rate with its spread.
    pub rate: Reading<CutRate>,
}

/// The ground's slope.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Slope {
    /// Rise over run, zero or more.
    pub grade: f64,
    /// The bearing straight down.
    pub downhill: Bearing,
}

/// A way out.
#[derive(Debug, Clone, PartialEq)]
pub struct WayOut {
    /// Its name in the plan.
    pub id: String,
    /// Its bearing.
    pub bearing: Bearing,
    /// Its length.
    pub length: Length,
    /// Whether it has been cleared.
    pub state: WayState,
}

/// A line to pull with.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Line {
    /// Height of attachment above the cut.
    pub height: Length,
    /// The anchor, east of the tree.
    pub anchor_east: Length,
    /// The anchor, north of the tree.
    pub anchor_north: Length,
    /// Redirects between tree and winch.
    pub redirects: u8,
    /// The most that line, blocks and anchor may carry.
    pub load_limit: Option<Force>,
}

/// What the plan fixes about the cuts; the rest is worked out.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Overrides {
    /// Depth of the face.
    pub face_depth: Option<Length>,
    /// The face's whole opening.
    pub opening: Option<Angle>,
    /// Thickness of the hinge.
    pub hinge: Option<Length>,
    /// Height of the back cut above the face's apex.
    pub back_cut_height: Option<Length>,
    /// Thickness of the strap.
    pub strap: Option<Length>,
    /// The method, where one is chosen by hand.
    pub method: Option<MethodName>,
}

/// Everything that one tree's figures and method rest on.
#[derive(Debug, Clone, PartialEq)]
pub struct TreeInput {
    /// The species.
    pub species: &'static Species,
    /// Values of the wood that replace the species'.
    pub wood: WoodOverride,
    /// The state of the wood.
    pub wood_state: WoodState,
    /// What was seen that the sums do not cover.
    pub conditions: Vec<Condition>,
    /// Cavities in the stump.
    pub cavities: Vec<Cavity>,
    /// Diameter at the cut along the lay, wood only.
    pub stump_along: Option<Reading<Length>>,
    /// Diameter at the cut across the lay, wood only.
    pub stump_across: Option<Reading<Length>>,
    /// Diameter at breast height.
    pub dbh: Option<Reading<Length>>,
    /// Height of the tree above the cut.
    pub height: Option<Length>,
    /// The trunk's lean.
    pub lean: Option<Lean>,
    /// The crown.
    pub crown: CrownInput,
    /// A weight known from elsewhere.
    pub weigh: Option<Weigh>,
    /// The lay.
    pub lay: Bearing,
    /// The slope; `None` for flat ground.
    pub slope: Option<Slope>,
    /// The saw.
    pub saw: Option<Saw>,
    /// The wind expected, or read at the tree where that is more.
    pub wind_expected: Speed,
    /// Ways out.
    pub ways_out: Vec<WayOut>,
    /// Wedges at hand.
    pub wedges: u8,
    /// A line to pull with.
    pub line: Option<Line>,
    /// How far the face's two cuts cross at the apex, where that was measured: a bypass.
    pub bypass: Option<Length>,
    /// What the plan fixes about the cuts.
    pub overrides: Overrides,
    /// The diameter from which the crew calls a tree large.
    pub large: Length,
    /// The deepest face that every active rule set allows, as a share of the diameter.
    pub face_share_max: f64,
    /// The ring of the rule sets in tree heights.
    pub ring_heights: f64,
    /// What stops the felling whatever the sums say.
    pub site_stops: Vec<SiteStop>,
}

/// The crew's default for a large tree. Source: our judgement, settable in the plan.
pub const LARGE_DEFAULT: Length = Length::cm(50.0);
/// The default for the deepest face. Source: several rule sets' third of the diameter.
pub const FACE_SHARE_MAX_DEFAULT: f64 = 1.0 / 3.0;
/// The default ring. Source: 29 CFR 1910.266(h)(1), two tree lengths (opened).
pub const RING_HEIGHTS_DEFAULT: f64 = 2.0;
/// The default expected wind. Source: our judgement.
pub const WIND_EXPECTED_DEFAULT: Speed = Speed::si(3.0);

impl TreeInput {
    /// A tree of a species and a lay with nothing measured yet and every default in place.
    pub fn new(species: &'static Species, lay: Bearing) -> Self {
        Self {
            species,
            wood: WoodOverride::default(),
            wood_state: WoodState::Live,
            conditions: Vec::new(),
            cavities: Vec::new(),
            stump_along: None,
            stump_across: None,
            dbh: None,
            height: None,
            lean: None,
            crown: CrownInput::Missing,
            weigh: None,
            lay,
            slope: None,
            saw: None,
            wind_expected: WIND_EXPECTED_DEFAULT,
            ways_out: Vec::new(),
            wedges: 0,
            line: None,
            bypass: None,
            overrides: Overrides::default(),
            large: LARGE_DEFAULT,
            face_share_max: FACE_SHARE_MAX_DEFAULT,
            ring_heights: RING_HEIGHTS_DEFAULT,
            site_stops: Vec::new(),
        }
    }

    /// The wood as it enters the sums: the species' values, or the plan's as given.
    pub fn wood_values(&self) -> Wood {
        let g1c = self.wood.g1c.unwrap_or_else(|| match self.wood.density {
            Some(density) => crate::mechanics::splitting::fracture_energy(density)
                .min(self.species.fracture_energy_cap()),
            None => self.species.fracture_energy(),
        });
        Wood {
            mor: self.wood.mor.unwrap_or(self.species.mor),
            moe: self.wood.moe.unwrap_or(self.species.moe),
            g1c,
            g2c: g1c * SLIDING_OVER_OPENING,
        }
    }

    /// Whether a condition was seen.
    pub fn has(&self, condition: Condition) -> bool {
        self.conditions.contains(&condition)
    }
}
