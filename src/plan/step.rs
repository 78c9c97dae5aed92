//! Cuts and steps: what a sequence is made of, whether written by hand or laid out by a method.
//! Nothing here judges a cut; `simulate` does.

use crate::units::{Angle, Duration, Length};

/// The cutting methods, in the order of the plan format.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum MethodName {
    /// The hinge is reached before the tree moves.
    StraightBackCut,
    /// The tree moves a little before the hinge is reached; the saw wins the race.
    BriskBackCut,
    /// Plunge behind the hinge, strap held at the rear, then released.
    PlungeWithStrap,
    /// An inclined back cut; chosen by hand only.
    TiltedBackCut,
    /// Both rear corners relieved, then cut from behind.
    SideRelievedBackCut,
    /// A mild back leaner, lifted by wedges.
    WedgedBackCut,
    /// A line set and tensioned.
    RiggedBackCut,
}

impl MethodName {
    /// Every method.
    pub const ALL: [Self; 7] = [
        Self::StraightBackCut,
        Self::BriskBackCut,
        Self::PlungeWithStrap,
        Self::TiltedBackCut,
        Self::SideRelievedBackCut,
        Self::WedgedBackCut,
        Self::RiggedBackCut,
    ];

    /// The name in the plan file.
    pub const fn word(self) -> &'static str {
        match self {
            Self::StraightBackCut => "straight-back-cut",
            Self::BriskBackCut => "brisk-back-cut",
            Self::PlungeWithStrap => "plunge-with-strap",
            Self::TiltedBackCut => "tilted-back-cut",
            Self::SideRelievedBackCut => "side-relieved-back-cut",
            Self::WedgedBackCut => "wedged-back-cut",
            Self::RiggedBackCut => "rigged-back-cut",
        }
    }
}

/// Where a cut's edge comes to lie along the lay.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Edge {
    /// This far behind the face's apex line: the hinge's rear edge.
    FromHinge(Length),
    /// This far in front of the stump's rearmost wood.
    FromRear(Length),
}

/// One cut. Lengths are along the lay unless said otherwise.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Cut {
    /// The face's sloping cut, to a depth from the front of the wood.
    FaceSlope {
        /// Depth of the apex from the front.
        depth: Length,
        /// The face's whole opening.
        opening: Angle,
    },
    /// The face's floor cut.
    FaceFloor {
        /// Depth of the apex from the front.
        depth: Length,
    },
    /// The bar plunged through, across the lay: a slot between two edges.
    Plunge {
        /// The slot's front edge.
        front: Edge,
        /// The slot's rear edge.
        rear: Edge,
    },
    /// The slot's front edge worked forward, leaving this hinge.
    HingeTrim {
        /// Hinge thickness left.
        hinge: Length,
    },
    /// The back cut: from the rear towards the hinge, or, once a slot is open, from the slot
    /// towards the rear.
    BackCut {
        /// Where its edge stops.
        to: Edge,
    },
    /// A back cut tilted out of the level.
    TiltedBackCut {
        /// Where its edge stops, in horizontal projection.
        to: Edge,
        /// Tilt out of the level.
        tilt: Angle,
    },
    /// The left rear corner cut in from the side.
    ReliefLeft {
        /// Width taken off, across the lay, from the left of the wood.
        width: Length,
        /// How far forward it reaches.
        to: Edge,
    },
    /// The right rear corner cut in from the side.
    ReliefRight {
        /// Width taken off, across the lay, from the right of the wood.
        width: Length,
        /// How far forward it reaches.
        to: Edge,
    },
    /// The strap cut through.
    StrapRelease,
}

impl Cut {
    /// The word in the plan file.
    pub const fn word(&self) -> &'static str {
        match self {
            Self::FaceSlope { .. } => "face-slope",
            Self::FaceFloor { .. } => "face-floor",
            Self::Plunge { .. } => "plunge",
            Self::HingeTrim { .. } => "hinge-trim",
            Self::BackCut { .. } => "back-cut",
            Self::TiltedBackCut { .. } => "tilted-back-cut",
            Self::ReliefLeft { .. } => "relief-left",
            Self::ReliefRight { .. } => "relief-right",
            Self::StrapRelease => "strap-release",
        }
    }
}

/// How a step is paced.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Timing {
    /// No hurry: the tree waits for the saw.
    AtLeisure,
    /// Without a pause to the end.
    Brisk,
    /// Stop here until go is said.
    Hold,
}

impl Timing {
    /// The words in the plan file.
    pub const fn word(self) -> &'static str {
        match self {
            Self::AtLeisure => "at leisure",
            Self::Brisk => "brisk",
            Self::Hold => "hold",
        }
    }
}

/// Work at the stump that is no cut.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Task {
    /// Set or drive a wedge.
    Wedge,
    /// Clear the stump and the ways out.
    Clear,
    /// Tension the line.
    LineTension,
    /// Leave by the way out.
    Retreat,
}

impl Task {
    /// The word in the plan file.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Wedge => "wedge",
            Self::Clear => "clear",
            Self::LineTension => "line-tension",
            Self::Retreat => "retreat",
        }
    }
}

/// What a step is.
#[derive(Debug, Clone, PartialEq)]
pub enum StepAct {
    /// A cut.
    Cut(Cut),
    /// A value or observation asked for.
    Check {
        /// What is looked at, as a name known to the checklists, such as `hinge`.
        what: String,
    },
    /// The hold line: nobody goes on until these say go.
    Hold {
        /// Roles or crew ids who must say go.
        who: Vec<String>,
    },
    /// Other work.
    Do(Task),
}

/// One step of a sequence.
#[derive(Debug, Clone, PartialEq)]
pub struct Step {
    /// What is done.
    pub act: StepAct,
    /// How it is paced.
    pub timing: Timing,
    /// Planned duration, where one is planned.
    pub seconds: Option<Duration>,
    /// A note in the author's words.
    pub note: Option<String>,
}
