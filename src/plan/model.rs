//! The plan as typed values, each with its place. Nothing here is checked against anything else;
//! `assessment` and `rules` do that.

use chrono::NaiveDate;

use crate::diagnostic::Place;
use crate::plan::step::{MethodName, Step};
use crate::units::{
    Angle, Bearing, CutRate, Density, Duration, Force, FractureEnergy, Length, Mass, Reading,
    Speed, Stress, SweptVolume, Voltage,
};

/// A value with the place it was written at.
#[derive(Debug, Clone, PartialEq)]
pub struct Spanned<T> {
    /// The value.
    pub value: T,
    /// Where it stands in the text.
    pub place: Place,
}

/// A quantity as written: central value, one standard deviation, place, and the words typed.
#[derive(Debug, Clone, PartialEq)]
pub struct Measured<T> {
    /// Central value and spread.
    pub reading: Reading<T>,
    /// Whether the author wrote the spread; otherwise it is the field's own default.
    pub spread_written: bool,
    /// Where it stands.
    pub place: Place,
    /// What was typed.
    pub typed: String,
}

impl<T: Copy> Measured<T> {
    /// The central value.
    pub const fn value(&self) -> T {
        self.reading.value
    }
}

/// Units of the display; the plan itself may mix.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum DisplayUnits {
    /// Metres, centimetres, kilograms.
    Metric,
    /// Feet and inches, pounds.
    Us,
}

/// The whole plan.
#[derive(Debug, Clone, PartialEq)]
pub struct Plan {
    /// Units of the display.
    pub units: DisplayUnits,
    /// The job.
    pub job: Job,
    /// Everyone named.
    pub crew: Vec<Person>,
    /// Language of the texts read to the crew.
    pub language: Option<Spanned<String>>,
    /// What STOP means past the hold line, as agreed.
    pub stop_means: Option<Spanned<String>>,
    /// Signals, name and sign.
    pub signals: Vec<(String, Spanned<String>)>,
    /// A folder that overrides the built-in parts.
    pub parts: Option<Spanned<String>>,
    /// Tolerances of measured against planned.
    pub tolerances: Tolerances,
    /// The emergency plan.
    pub emergency: Option<Emergency>,
    /// Limits of the day.
    pub limits: Limits,
    /// The saws.
    pub saws: Vec<Saw>,
    /// The site.
    pub site: Site,
    /// The trees, in the order written.
    pub trees: Vec<Tree>,
    /// Where the plan's last line ends, for findings about what is missing.
    pub place: Place,
}

/// The job.
#[derive(Debug, Clone, PartialEq)]
pub struct Job {
    /// Its name.
    pub name: Spanned<String>,
    /// The day.
    pub date: Spanned<NaiveDate>,
    /// Rule sets it is checked against.
    pub rules: Vec<Spanned<String>>,
    /// The crew leader's id.
    pub leader: Spanned<String>,
    /// The leader's intent in one line.
    pub intent: Option<Spanned<String>>,
    /// Where it is.
    pub location: Location,
}

/// Where the job is.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Location {
    /// Degrees north.
    pub latitude: Option<Spanned<f64>>,
    /// Degrees east.
    pub longitude: Option<Spanned<f64>>,
    /// How to get there.
    pub directions: Option<Spanned<String>>,
    /// The gate.
    pub gate: Option<Spanned<String>>,
}

/// One person.
#[derive(Debug, Clone, PartialEq)]
pub struct Person {
    /// Its route in the plan, such as `trees[2]`.
    pub route: String,
    /// Short id, `[a-z0-9-]`.
    pub id: Spanned<String>,
    /// Full name.
    pub name: Spanned<String>,
    /// Roles.
    pub roles: Vec<Spanned<Role>>,
    /// Path of the public key, beside the plan.
    pub key: Option<Spanned<String>>,
    /// Largest stump this person may fell.
    pub fells_up_to: Option<Measured<Length>>,
    /// First aid valid until.
    pub first_aid_until: Option<Spanned<NaiveDate>>,
    /// CPR valid until.
    pub cpr_until: Option<Spanned<NaiveDate>>,
    /// Trainings with their dates.
    pub trained: Vec<(String, Spanned<NaiveDate>)>,
    /// Where the entry stands.
    pub place: Place,
}

/// What a person does.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Role {
    /// Leads the crew and keeps the laptop.
    Leader,
    /// Cuts.
    Sawyer,
    /// Watches the tree and the ring.
    Spotter,
    /// Handles lines and wedges.
    Rigger,
    /// Anyone else on the site.
    Hand,
    /// Learning under supervision.
    Trainee,
}

impl Role {
    /// Every role.
    pub const ALL: [Self; 6] = [
        Self::Leader,
        Self::Sawyer,
        Self::Spotter,
        Self::Rigger,
        Self::Hand,
        Self::Trainee,
    ];

    /// The word in the plan.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Leader => "leader",
            Self::Sawyer => "sawyer",
            Self::Spotter => "spotter",
            Self::Rigger => "rigger",
            Self::Hand => "hand",
            Self::Trainee => "trainee",
        }
    }
}

/// Tolerances; where none is written the format's defaults hold.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Tolerances {
    /// Hinge thickness.
    pub hinge: Option<Measured<Length>>,
    /// Depths and heights.
    pub depth: Option<Measured<Length>>,
    /// Diameters.
    pub diameter: Option<Measured<Length>>,
    /// Bearings.
    pub bearing: Option<Measured<Angle>>,
}

/// The emergency plan.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Emergency {
    /// Number to call.
    pub number: Option<Spanned<String>>,
    /// Hospital.
    pub hospital: Option<Spanned<String>>,
    /// Drive to it.
    pub drive: Option<Measured<Duration>>,
    /// Radio channel.
    pub channel: Option<Spanned<String>>,
    /// Second way to call.
    pub backup: Option<Spanned<String>>,
    /// How often contact is made.
    pub check_in: Option<Measured<Duration>>,
    /// Ids of the first aiders.
    pub first_aiders: Vec<Spanned<String>>,
    /// Where first-aid kits are.
    pub kits: Vec<Spanned<String>>,
    /// Id of the one who can bring down a casualty or finish a cut.
    pub rescue_sawyer: Option<Spanned<String>>,
    /// Landing zone.
    pub landing_zone: Option<Spanned<String>>,
    /// Where everyone meets.
    pub muster: Option<Spanned<String>>,
    /// The qualified person: name and how to reach.
    pub qualified_person: Option<QualifiedPerson>,
    /// Where the entry stands.
    pub place: Place,
}

/// Who is asked.
#[derive(Debug, Clone, PartialEq)]
pub struct QualifiedPerson {
    /// Name.
    pub name: Spanned<String>,
    /// Number or channel.
    pub reach: Spanned<String>,
}

/// Limits of the day.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Limits {
    /// Mean wind that stops the work.
    pub wind: Option<Measured<Speed>>,
    /// Gust that stops the work.
    pub gust: Option<Measured<Speed>>,
    /// Wind expected, for the sums.
    pub expected: Option<Measured<Speed>>,
    /// Light that ends the day.
    pub light: Option<Spanned<String>>,
}

/// A saw.
#[derive(Debug, Clone, PartialEq)]
pub struct Saw {
    /// Its route in the plan, such as `trees[2]`.
    pub route: String,
    /// Its id.
    pub id: Spanned<String>,
    /// Bar length.
    pub bar: Measured<Length>,
    /// Width of the bar's nose.
    pub nose: Option<Measured<Length>>,
    /// Kerf.
    pub kerf: Option<Measured<Length>>,
    /// Displacement.
    pub displacement: Option<Measured<SweptVolume>>,
    /// Cutting rate measured on a log.
    pub rate: Option<Measured<CutRate>>,
    /// Where the entry stands.
    pub place: Place,
}

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
