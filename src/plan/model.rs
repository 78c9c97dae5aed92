//! The plan as typed values, each with its place. Nothing here is checked against anything else;
//! `assessment` and `rules` do that.

use chrono::NaiveDate;

use crate::diagnostic::Place;
use crate::plan::{Site, Tree};
use crate::units::{Angle, CutRate, Duration, Length, Reading, Speed, SweptVolume};

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
