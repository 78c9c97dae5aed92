//! The figures of one tree, as they go to paper and machine output. `None` is CANNOT SAY, and
//! `why` says why.

use crate::figures::doubt::Doubt;
use crate::figures::worst::WorstCase;
use crate::units::{
    Angle, Area, Band, Bearing, CutRate, Duration, Force, Length, Mass, Moment, Speed,
};

/// Where the weight stands.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CentreFigures {
    /// Forward of the stump's centre.
    pub forward: Band<Length>,
    /// Right of it.
    pub right: Band<Length>,
    /// Above the cut.
    pub height: Band<Length>,
}

/// The face.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FaceFigures {
    /// Depth of its apex.
    pub depth: Length,
    /// Its whole opening.
    pub opening: Angle,
    /// Length of the hinge along the apex.
    pub hinge_length: Length,
}

/// The back cut.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BackCutFigures {
    /// Whole section less face and planned hinge.
    pub area: Band<Area>,
    /// Ligament at which the tree commits in a back cut from the rear; zero where it never does.
    pub commit_ligament: Band<Length>,
    /// Splitting over the smaller of asked and held, at commit.
    pub split_ratio_at_commit: Band<f64>,
}

/// The brisk stretch of a back cut from the rear.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BriskFigures {
    /// Ligament between commit and hinge.
    pub stretch: Band<Length>,
    /// Wood between commit and hinge.
    pub area: Band<Area>,
    /// Seconds for it at the crew's rate.
    pub seconds_at_rate: Option<Band<Duration>>,
    /// Rate that keeps the tilt at the hinge under five degrees; `None` where there is no race.
    pub rate_needed: Option<Band<Option<CutRate>>>,
    /// Tilt when the hinge is reached; `None` past 90 degrees.
    pub tilt_at_hinge: Option<Band<Option<Angle>>>,
    /// Seconds from the start of the back cut to commit; to the hinge where the tree waits.
    pub seconds_to_commit: Option<Band<Duration>>,
}

/// The strap.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StrapFigures {
    /// Its tension, at the thickness planned.
    pub tension: Band<Force>,
    /// The least thickness to leave.
    pub thickness_min: Band<Length>,
    /// The thickness planned.
    pub thickness: Length,
}

/// The plunge.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PlungeFigures {
    /// Whether the nose fits between hinge and strap.
    pub fits: bool,
    /// Room left beside nose, hinge, strap and the inch between plunge and hinge.
    pub room: Length,
}

/// The fall.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FallFigures {
    /// Shortest time from commit: no hinge, no drag.
    pub seconds_min: Duration,
    /// The same with the crown's drag: the long end.
    pub seconds_with_drag: Duration,
    /// Speed of the tip, no losses.
    pub tip_speed: Speed,
}

/// Getting away.
#[derive(Debug, Clone, PartialEq)]
pub struct EscapeFigures {
    /// By the fastest way.
    pub seconds: Band<Duration>,
    /// By each way: its name and seconds.
    pub by_way: Vec<(String, Duration)>,
}

/// The state of a plan's margin.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum CaseState {
    /// None of twenty past the limit.
    WithinLimit,
    /// One to five of twenty.
    NearLimit,
    /// Six or more.
    PastLimit,
    /// An input is missing, out of range, or no sum covers what was seen.
    CannotSay,
}

impl CaseState {
    /// The word in machine output.
    pub const fn word(self) -> &'static str {
        match self {
            Self::WithinLimit => "within-limit",
            Self::NearLimit => "near-limit",
            Self::PastLimit => "past-limit",
            Self::CannotSay => "cannot-say",
        }
    }

    /// The words on a screen.
    pub const fn words(self) -> &'static str {
        match self {
            Self::WithinLimit => "WITHIN LIMIT",
            Self::NearLimit => "NEAR LIMIT",
            Self::PastLimit => "PAST LIMIT",
            Self::CannotSay => "CANNOT SAY",
        }
    }

    /// The state by the number of twenty cases past the limit.
    pub const fn of_twenty(past_limit: usize) -> Self {
        match past_limit {
            0 => Self::WithinLimit,
            1..=5 => Self::NearLimit,
            _ => Self::PastLimit,
        }
    }

    /// One class lower; CANNOT SAY stays.
    pub const fn lowered(self) -> Self {
        match self {
            Self::WithinLimit => Self::NearLimit,
            Self::NearLimit | Self::PastLimit => Self::PastLimit,
            Self::CannotSay => Self::CannotSay,
        }
    }
}

/// The twenty equal cases.
#[derive(Debug, Clone, PartialEq)]
pub struct Cases {
    /// How many: always twenty.
    pub of: usize,
    /// How many are past the limit; `None` where they cannot be counted.
    pub past_limit: Option<usize>,
    /// The state.
    pub state: CaseState,
    /// The margins, the worst first; empty where they cannot be said.
    pub margins: Vec<f64>,
    /// What lowered the state by a class, in words.
    pub lowered_by: Vec<&'static str>,
}

/// The worst credible case and what it rests on.
pub type WorstCredible = WorstCase;

/// Why a figure cannot be said.
#[derive(Debug, Clone, PartialEq)]
pub struct Why {
    /// The figure's name in machine output, or `all`.
    pub figure: &'static str,
    /// The reason.
    pub reason: String,
}

/// Where holding and splitting cross, as bands.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CrossingBand {
    /// The moment; an end is `None` where the hinge always bends first.
    pub moment: Band<Option<Moment>>,
    /// The ligament.
    pub ligament: Band<Option<Length>>,
}

/// Every figure of one tree.
#[derive(Debug, Clone, PartialEq)]
pub struct TreeFigures {
    /// Mass of the tree.
    pub mass: Option<Band<Mass>>,
    /// Weight of the tree.
    pub weight: Option<Band<Force>>,
    /// Mass of the stem.
    pub stem_mass: Option<Band<Mass>>,
    /// Mass of the crown.
    pub crown_mass: Option<Band<Mass>>,
    /// Mass by the biomass equation and by the stem's volume with the crown.
    pub mass_by_two_routes: Option<(Mass, Mass)>,
    /// Where the weight stands.
    pub centre: Option<CentreFigures>,
    /// Lean of the weight.
    pub effective_lean: Option<Band<Angle>>,
    /// Bearing of the centre of weight.
    pub lean_toward: Option<Bearing>,
    /// Lean of the weight along the lay.
    pub inline_lean: Option<Band<Angle>>,
    /// Lean of the weight across the lay, right positive.
    pub side_lean: Option<Band<Angle>>,
    /// The weight's moment about the stump's centre, along the lay.
    pub moment_inline: Option<Band<Moment>>,
    /// The weight's moment across the lay.
    pub moment_side: Option<Band<Moment>>,
    /// The expected wind's moment along the lay, either way.
    pub wind_moment: Option<Band<Moment>>,
    /// The face.
    pub face: Option<FaceFigures>,
    /// Thickness of the hinge.
    pub hinge_thickness: Option<Length>,
    /// The back cut.
    pub back_cut: Option<BackCutFigures>,
    /// The brisk stretch.
    pub brisk: Option<BriskFigures>,
    /// The strap.
    pub strap: Option<StrapFigures>,
    /// The plunge.
    pub plunge: Option<PlungeFigures>,
    /// Side strength of the hinge over what the side lean asks; an end is `None` without a side
    /// demand.
    pub side_margin: Option<Band<Option<f64>>>,
    /// Tension the line must bring at the tree.
    pub pull: Option<Band<Force>>,
    /// The same at the winch.
    pub winch: Option<Band<Force>>,
    /// Lift of a wedge; `None` where the weight stands in front of the hinge in every case.
    pub wedge_lift: Option<Band<Length>>,
    /// The fall.
    pub fall: Option<FallFigures>,
    /// Getting away.
    pub escape: Option<EscapeFigures>,
    /// Radius of the ring.
    pub ring: Option<Length>,
    /// Half-angle of the sector the tree may fall in, each side of the lay.
    pub sector: Option<Angle>,
    /// The twenty equal cases.
    pub cases: Cases,
    /// The worst credible case.
    pub worst: Option<WorstCredible>,
    /// The inputs by how much their doubt matters, the most first.
    pub doubts: Vec<Doubt>,
    /// Why figures cannot be said.
    pub why: Vec<Why>,
}
