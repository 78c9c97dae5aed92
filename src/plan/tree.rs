//! A tree as typed values, each with its place: what was measured, what is planned.

use crate::diagnostic::Place;
use crate::plan::step::{MethodName, Step};
use crate::plan::{Measured, Spanned};
use crate::units::{Angle, Bearing, Density, Force, FractureEnergy, Length, Mass, Stress};

/// One tree.
#[derive(Debug, Clone, PartialEq)]
pub struct Tree {
    /// Its route in the plan, such as `trees[2]`.
    pub route: String,
    /// Its id.
    pub id: Spanned<String>,
    /// Species as written.
    pub species: Spanned<String>,
    /// Position, east and north of the origin.
    pub at: Option<[Measured<Length>; 2]>,
    /// Diameter at breast height, over bark.
    pub dbh: Option<Measured<Length>>,
    /// Diameter of the wood at the cut, along the lay.
    pub stump: Measured<Length>,
    /// Across the lay, of an oval stem.
    pub stump_across: Option<Measured<Length>>,
    /// Height.
    pub height: Option<Measured<Length>>,
    /// Lean of the stem.
    pub lean: Option<Lean>,
    /// Crown.
    pub crown: Option<Crown>,
    /// Defects.
    pub defects: Vec<Defect>,
    /// Live, dead, frozen, lodged, split.
    pub state: Option<Spanned<TreeState>>,
    /// Weight known from elsewhere.
    pub weigh: Option<Weigh>,
    /// Wood values known from elsewhere.
    pub wood: Option<WoodValues>,
    /// The lay.
    pub lay: Option<Spanned<Bearing>>,
    /// Id of the sawyer.
    pub sawyer: Option<Spanned<String>>,
    /// Id of the saw.
    pub saw: Option<Spanned<String>>,
    /// The method chosen by hand; nothing where `auto`.
    pub method: Option<Spanned<MethodName>>,
    /// The face.
    pub face: Face,
    /// Planned hinge thickness.
    pub hinge: Option<Measured<Length>>,
    /// Height of the back cut above the face's floor or apex.
    pub back_cut_height: Option<Measured<Length>>,
    /// Planned strap thickness.
    pub strap: Option<Measured<Length>>,
    /// Ways out.
    pub ways_out: Vec<WayOut>,
    /// How many wedges are at hand.
    pub wedges: Option<Spanned<u32>>,
    /// A line in the tree.
    pub line: Option<Line>,
    /// Hazards.
    pub hazards: Vec<Hazard>,
    /// Trees that must be down first.
    pub after: Vec<Spanned<String>>,
    /// Id of the supervisor who approves.
    pub approval: Option<Spanned<String>>,
    /// Steps written by hand; nothing where `auto`.
    pub steps: Option<Vec<Spanned<Step>>>,
    /// Where the entry stands.
    pub place: Place,
}

/// Lean of the stem as measured.
#[derive(Debug, Clone, PartialEq)]
pub enum Lean {
    /// Angle from plumb and bearing it leans towards.
    Toward {
        /// Angle.
        angle: Measured<Angle>,
        /// Bearing.
        toward: Spanned<Bearing>,
    },
    /// Two views at right angles.
    Views {
        /// Lean in the plane of `facing`, towards it positive.
        view_a: Measured<Angle>,
        /// Lean in the plane a right angle clockwise of `facing`, towards it positive.
        view_b: Measured<Angle>,
        /// The bearing along which view A counts positive.
        facing: Spanned<Bearing>,
    },
}

/// The crown.
#[derive(Debug, Clone, PartialEq)]
pub struct Crown {
    /// Height of its base.
    pub base: Measured<Length>,
    /// Radii to north, east, south, west.
    pub radii: Option<[Measured<Length>; 4]>,
    /// Leaf.
    pub leaf: Option<Spanned<Leaf>>,
}

/// State of the leaf.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Leaf {
    /// Leafless.
    Bare,
    /// In leaf.
    Leafed,
}

/// State of the tree.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum TreeState {
    /// Live.
    Live,
    /// Dead.
    Dead,
    /// Frozen.
    Frozen,
    /// Hung in another.
    Lodged,
    /// Split already.
    Split,
}

impl TreeState {
    /// Every state.
    pub const ALL: [Self; 5] = [
        Self::Live,
        Self::Dead,
        Self::Frozen,
        Self::Lodged,
        Self::Split,
    ];

    /// The word in the plan.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Live => "live",
            Self::Dead => "dead",
            Self::Frozen => "frozen",
            Self::Lodged => "lodged",
            Self::Split => "split",
        }
    }
}

/// A defect of the stem.
#[derive(Debug, Clone, PartialEq)]
pub struct Defect {
    /// Its route in the plan, such as `trees[2]`.
    pub route: String,
    /// Where the entry stands.
    pub place: Place,
    /// What it is, as a word of the format.
    pub kind: Spanned<DefectKind>,
    /// Where or of which form.
    pub at: Option<Spanned<String>>,
    /// Size: a diameter.
    pub size: Option<Measured<Length>>,
    /// Offset forward, then right of the lay.
    pub offset: Option<[Measured<Length>; 2]>,
}

/// Kinds of defects.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum DefectKind {
    /// A hollow.
    Cavity,
    /// Rot.
    Rot,
    /// A crack.
    Crack,
    /// Ring shake.
    Shake,
    /// Fork or included bark.
    Fork,
    /// An old wound.
    Wound,
    /// Damaged roots.
    Roots,
    /// Insect damage.
    Insects,
}

impl DefectKind {
    /// Every kind.
    pub const ALL: [Self; 8] = [
        Self::Cavity,
        Self::Rot,
        Self::Crack,
        Self::Shake,
        Self::Fork,
        Self::Wound,
        Self::Roots,
        Self::Insects,
    ];

    /// The word in the plan.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Cavity => "cavity",
            Self::Rot => "rot",
            Self::Crack => "crack",
            Self::Shake => "shake",
            Self::Fork => "fork",
            Self::Wound => "wound",
            Self::Roots => "roots",
            Self::Insects => "insects",
        }
    }
}

/// Weight known from a pull test or another estimate.
#[derive(Debug, Clone, PartialEq)]
pub struct Weigh {
    /// Mass above the cut.
    pub mass: Measured<Mass>,
    /// Centre of gravity: horizontal offset, bearing, height above the cut.
    pub centre: Option<WeighCentre>,
}

/// A centre of gravity known from elsewhere.
#[derive(Debug, Clone, PartialEq)]
pub struct WeighCentre {
    /// Horizontal offset.
    pub offset: Measured<Length>,
    /// Bearing of the offset.
    pub toward: Spanned<Bearing>,
    /// Height above the cut.
    pub height: Measured<Length>,
}

/// Wood values that replace the species' own.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct WoodValues {
    /// Green modulus of rupture.
    pub mor: Option<Measured<Stress>>,
    /// Green modulus of elasticity.
    pub moe: Option<Measured<Stress>>,
    /// Density at 12 % moisture.
    pub density: Option<Measured<Density>>,
    /// Fracture energy of mode I.
    pub g1c: Option<Measured<FractureEnergy>>,
}

/// The face as planned.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Face {
    /// Kind.
    pub kind: Option<Spanned<FaceKind>>,
    /// Depth from the front of the wood.
    pub depth: Option<Measured<Length>>,
    /// Whole opening.
    pub opening: Option<Measured<Angle>>,
    /// Where the entry stands.
    pub place: Option<Place>,
}

/// Kinds of faces.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum FaceKind {
    /// Both cuts slope; opening of 70 degrees or more.
    Open,
    /// Level floor, sloping roof.
    Conventional,
    /// Level roof, sloping floor.
    Humboldt,
}

impl FaceKind {
    /// Every kind.
    pub const ALL: [Self; 3] = [Self::Open, Self::Conventional, Self::Humboldt];

    /// The word in the plan.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Open => "open",
            Self::Conventional => "conventional",
            Self::Humboldt => "humboldt",
        }
    }
}

/// A way out.
#[derive(Debug, Clone, PartialEq)]
pub struct WayOut {
    /// Its route in the plan, such as `trees[2]`.
    pub route: String,
    /// Its id.
    pub id: Spanned<String>,
    /// Bearing from the stump.
    pub bearing: Spanned<Bearing>,
    /// Length.
    pub length: Measured<Length>,
    /// Whether it is cleared.
    pub cleared: Option<Spanned<bool>>,
    /// Where the entry stands.
    pub place: Place,
}

/// A line in the tree.
#[derive(Debug, Clone, PartialEq)]
pub struct Line {
    /// Height of the attachment.
    pub height: Measured<Length>,
    /// Anchor, east and north of the origin.
    pub anchor: [Measured<Length>; 2],
    /// How many redirects.
    pub redirects: Option<Spanned<u32>>,
    /// Working load limit.
    pub load_limit: Option<Measured<Force>>,
}

/// A hazard with its control and owner.
#[derive(Debug, Clone, PartialEq)]
pub struct Hazard {
    /// Its route in the plan, such as `trees[2]`.
    pub route: String,
    /// Its id.
    pub id: Spanned<String>,
    /// What it is.
    pub what: Spanned<String>,
    /// What is done about it.
    pub control: Option<Spanned<String>>,
    /// Who sees to it.
    pub owner: Option<Spanned<String>>,
    /// Where the entry stands.
    pub place: Place,
}
