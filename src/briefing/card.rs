//! The card of one tree as it is shown and recorded: method, state, figures, rungs, stump. Whole
//! numbers in the record's units, so that what is replayed is what was shown.

use super::job::{micro, whole};
use crate::parts::{CutWords, What};
use crate::plan::step::{Cut, Edge, Step, StepAct, Task, Timing};
use crate::units::Length;

/// The unit of a figure on the card.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum UnitWord {
    /// Micrometres.
    Um,
    /// Millidegrees.
    Mdeg,
    /// Milliseconds.
    Ms,
    /// Grams.
    G,
    /// Millinewtons.
    Mn,
    /// Newton millimetres: thousandths of a newton metre.
    MnM,
    /// Parts in a million of a plain ratio.
    Ppm,
    /// Millimetres a second.
    MmS,
}

impl UnitWord {
    /// The ending of a record member that carries it.
    pub const fn suffix(self) -> &'static str {
        match self {
            Self::Um => "um",
            Self::Mdeg => "mdeg",
            Self::Ms => "ms",
            Self::G => "g",
            Self::Mn => "mn",
            Self::MnM => "mn_m",
            Self::Ppm => "ppm",
            Self::MmS => "mm_s",
        }
    }

    /// The unit of an ending.
    pub fn of_suffix(suffix: &str) -> Option<Self> {
        [
            Self::Um,
            Self::Mdeg,
            Self::Ms,
            Self::G,
            Self::Mn,
            Self::MnM,
            Self::Ppm,
            Self::MmS,
        ]
        .into_iter()
        .find(|unit| unit.suffix() == suffix)
    }
}

/// A figure with its band.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Figure {
    /// Its name, as in the machine output.
    pub name: String,
    /// Its unit.
    pub unit: UnitWord,
    /// Low, best, high.
    pub band: [i64; 3],
}

/// The wood a cut takes away along the lay, forward of the stump's centre positive.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Removed {
    /// Rear edge, micrometres.
    pub from_um: i64,
    /// Front edge, micrometres.
    pub to_um: i64,
}

/// The stump on the card, micrometres.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct StumpCard {
    /// Wood along the lay.
    pub along_um: i64,
    /// Wood across the lay.
    pub across_um: i64,
    /// Face depth.
    pub face_um: i64,
    /// Planned hinge.
    pub hinge_um: i64,
}

/// One rung of the cuts.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Rung {
    /// Its id among the rungs, stable while the sequence stays the same.
    pub id: String,
    /// The step word that its wording comes from.
    pub word: String,
    /// How it is paced: `at leisure`, `brisk` or `hold`.
    pub timing: String,
    /// Planned milliseconds, where planned.
    pub planned_ms: Option<i64>,
    /// Planned value of what is measured, micrometres.
    pub planned_um: Option<i64>,
    /// The wood it takes away.
    pub removed: Option<Removed>,
    /// Whether it commits the tree: the hold line stands before it.
    pub commits: bool,
    /// A note.
    pub note: String,
}

/// The card.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Card {
    /// Method word; nothing where no sequence is proposed.
    pub method: Option<String>,
    /// State word of the cases.
    pub state: String,
    /// How many of the cases are past the limit.
    pub past: i64,
    /// How many cases.
    pub of: i64,
    /// Worst credible margin, parts in a million, where it can be said.
    pub worst_ppm: Option<i64>,
    /// The input whose doubt matters most, and how to shrink it.
    pub doubt: String,
    /// Why this method.
    pub reasons: Vec<String>,
    /// What was refused, and why.
    pub refused: Vec<String>,
    /// Codes of the stop findings about this tree.
    pub stops: Vec<String>,
    /// Figures.
    pub figures: Vec<Figure>,
    /// The stump.
    pub stump: StumpCard,
    /// The rungs.
    pub rungs: Vec<Rung>,
}

impl Card {
    /// A figure's band by its name.
    pub fn figure(&self, name: &str) -> Option<&Figure> {
        self.figures.iter().find(|f| f.name == name)
    }
}

/// The rung of a step. `stump` gives the geometry its edges are measured from; `plunged` says
/// whether the sequence opens a slot, so that a back cut is worked from it to the strap.
pub fn rung_of(step: &Step, (stump, plunged): (&StumpCard, bool), words: &CutWords) -> Rung {
    let word = word_of(step, plunged, words);
    let seconds = step.seconds.map(|s| whole(s.value() * 1_000.0));
    let (planned_um, removed) = match &step.act {
        StepAct::Cut(cut) => cut_values(cut, (stump, plunged)),
        StepAct::Check { what } => (check_value(what, stump), None),
        StepAct::Hold { .. } | StepAct::Do(_) => (None, None),
    };
    Rung {
        id: word.clone(),
        word,
        timing: step.timing.word().to_owned(),
        planned_ms: seconds,
        planned_um,
        removed,
        commits: false,
        note: step.note.clone().unwrap_or_default(),
    }
}

fn word_of(step: &Step, plunged: bool, words: &CutWords) -> String {
    let word = match &step.act {
        StepAct::Cut(Cut::BackCut {
            to: Edge::FromRear(_),
        }) => if plunged {
            "back-cut-to-strap"
        } else {
            "back-cut-begun"
        }
        .to_owned(),
        StepAct::Cut(cut) => cut.word().to_owned(),
        StepAct::Check { what } => format!("{what}-check"),
        StepAct::Hold { .. } => "hold".to_owned(),
        StepAct::Do(task) => task_word(*task, step.timing).to_owned(),
    };
    if words.steps.contains_key(&word) || word == "hold" {
        word
    } else {
        "check".to_owned()
    }
}

fn task_word(task: Task, timing: Timing) -> &'static str {
    match (task, timing) {
        (Task::Wedge, Timing::Brisk) => "wedge-over",
        (Task::Wedge, Timing::AtLeisure | Timing::Hold)
        | (Task::Clear | Task::LineTension | Task::Retreat, _) => task.word(),
    }
}

fn check_value(what: &str, stump: &StumpCard) -> Option<i64> {
    match what {
        "face" => Some(stump.face_um),
        "hinge" => Some(stump.hinge_um),
        _ => None,
    }
}

/// The planned value of a cut and the wood it takes away.
fn cut_values(cut: &Cut, (stump, plunged): (&StumpCard, bool)) -> (Option<i64>, Option<Removed>) {
    let half = stump.along_um / 2;
    let apex = half - stump.face_um;
    let at = |edge: &Edge| match edge {
        Edge::FromHinge(behind) => apex - micro(*behind),
        Edge::FromRear(ahead) => micro(*ahead) - half,
    };
    let hinge_edge = apex - stump.hinge_um;
    let strip = |from_um: i64, to_um: i64| Some(Removed { from_um, to_um });
    match cut {
        Cut::FaceSlope { depth, .. } => (Some(micro(*depth)), strip(half - micro(*depth), half)),
        Cut::FaceFloor { depth } => (Some(0), strip(half - micro(*depth), half)),
        Cut::Plunge { front, rear } => (Some(apex - at(front)), strip(at(rear), at(front))),
        Cut::HingeTrim { hinge } => {
            let edge = apex - micro(*hinge);
            (
                Some(micro(*hinge)),
                strip(edge - micro(Length::cm(3.0)), edge),
            )
        }
        Cut::BackCut {
            to: to @ Edge::FromRear(depth),
        } if !plunged => (Some(micro(*depth)), strip(-half, at(to))),
        Cut::BackCut {
            to: Edge::FromRear(strap),
        } => (Some(micro(*strap)), strip(micro(*strap) - half, hinge_edge)),
        Cut::BackCut {
            to: to @ Edge::FromHinge(hinge),
        }
        | Cut::TiltedBackCut {
            to: to @ Edge::FromHinge(hinge),
            ..
        } => (Some(micro(*hinge)), strip(-half, at(to))),
        Cut::TiltedBackCut {
            to: to @ Edge::FromRear(_),
            ..
        } => (None, strip(-half, at(to))),
        Cut::ReliefLeft { .. } | Cut::ReliefRight { .. } => (None, None),
        Cut::StrapRelease => (None, strip(-half, hinge_edge)),
    }
}

/// What is measured by the word of a step, for the planned value's tolerance.
pub(super) fn tolerance_of(what: What, tolerance: &super::Tolerance) -> i64 {
    match what {
        What::Hinge => tolerance.hinge_um,
        What::Stump => tolerance.diameter_um,
        What::FaceDepth
        | What::Strap
        | What::BackCutHeight
        | What::Bypass
        | What::BehindHinge
        | What::BackCutDepth => tolerance.depth_um,
        What::Lean => tolerance.lean_mdeg,
        What::Wind | What::Count => 0,
    }
}
