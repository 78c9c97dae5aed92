//! Runs a sequence of steps on the stump, state by state. An odd cut is judged as it is made; one
//! that means nothing where it stands is an error with the step's number, never a guess.

use thiserror::Error;

use crate::mechanics::holding::FacedStem;
use crate::mechanics::section::Section;
use crate::mechanics::splitting::{Crossing, crossing};
use crate::plan::step::{Cut, Edge, Step, StepAct, Task};
use crate::simulate::advance::{Advance, advance_by, length_of};
use crate::simulate::judge::{Cutting, Judged, Prop, Verdict, judge};
use crate::simulate::standing::{Standing, StandingPiece};
use crate::simulate::stump::Stump;
use crate::units::{Area, Length, Moment};

/// How far apart the states inside a progressive cut are.
const CENTIMETRE: f64 = 0.01;
/// The most states kept of one cut: past it, the cut is no stem's.
const STATES_MAX: u32 = 2_000;

/// Why a sequence cannot be run.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum SimulateError {
    /// A place behind the hinge line before there is a face.
    #[error("step {step}: a place is given from the hinge, and no face has been cut yet")]
    NoFace {
        /// The step, counted from 1.
        step: usize,
    },
    /// A slot whose rear edge is not behind its front edge.
    #[error("step {step}: the plunge's rear edge is not behind its front edge")]
    SlotReversed {
        /// The step, counted from 1.
        step: usize,
    },
    /// A hinge trimmed with nothing open behind it.
    #[error("step {step}: a hinge can be trimmed only from an open slot or back cut")]
    NothingOpen {
        /// The step, counted from 1.
        step: usize,
    },
    /// A strap released where none was left.
    #[error("step {step}: no strap is left to release")]
    NoStrap {
        /// The step, counted from 1.
        step: usize,
    },
    /// A length below zero.
    #[error("step {step}: a length of {} cm is below zero", .length.in_cm())]
    BelowZero {
        /// The step, counted from 1.
        step: usize,
        /// The length.
        length: Length,
    },
}

/// The stump at one moment of the sequence.
#[derive(Debug, Clone, PartialEq)]
pub struct State {
    /// The step, counted from 1.
    pub step: usize,
    /// The cut.
    pub cut: Cut,
    /// How far this cut has come.
    pub progress: Length,
    /// What stands.
    pub standing: Vec<StandingPiece>,
    /// Its area.
    pub remaining_area: Area,
    /// Its section; `None` where nothing stands.
    pub section: Option<Section>,
    /// What the tree asks about the standing wood; `None` where nothing stands.
    pub moment: Option<Moment>,
    /// What the standing wood holds.
    pub hold_moment: Moment,
    /// What splits the stem; `None` where no crack can start.
    pub split_moment: Option<Moment>,
    /// Held over asked; `None` where nothing is asked.
    pub hold_ratio: Option<f64>,
    /// Splitting over the smaller of asked and held; `None` where no crack can start.
    pub split_ratio: Option<f64>,
    /// What becomes of the tree.
    pub verdict: Verdict,
}

/// A sequence judged.
#[derive(Debug, Clone, PartialEq)]
pub struct Run {
    /// Where holding and splitting cross for the face as cut; `None` where they never do.
    pub crossing: Option<Crossing>,
    /// Splits where any state does; else the first that does not hold; else holds.
    pub verdict: Verdict,
    /// Every state, in order.
    pub states: Vec<State>,
}

impl Run {
    /// The first state with a verdict.
    pub fn first(&self, verdict: Verdict) -> Option<&State> {
        self.states.iter().find(|state| state.verdict == verdict)
    }

    /// The smallest split ratio of all states.
    pub fn split_ratio_min(&self) -> Option<f64> {
        self.states
            .iter()
            .filter_map(|state| state.split_ratio)
            .min_by(f64::total_cmp)
    }
}

/// Runs the steps and judges every state.
///
/// # Model
/// Each cut takes wood from the section; after each, and at each centimetre inside it, what the
/// tree asks is compared with what the wood holds and with what splits it. Within a centimetre
/// the one met first is found by halving.
/// # Valid for
/// Level, parallel cuts made slowly. A tilted back cut counts by its level projection.
/// # Errors
/// [`SimulateError`] for a cut that means nothing where it stands.
/// # Source
/// The models of `mechanics`.
pub fn run(stump: &Stump, steps: &[Step]) -> Result<Run, SimulateError> {
    let mut walk = Walk {
        stump,
        standing: Standing::whole(&stump.stem),
        apex: None,
        sloped: false,
        prop: Prop::Nothing,
        propped_next: false,
        past: Verdict::Holds,
        states: Vec::new(),
    };
    for (index, step) in steps.iter().enumerate() {
        match &step.act {
            StepAct::Cut(cut) => {
                walk.propped_next = propped_next(&steps[index + 1..]);
                walk.cut(index + 1, cut)?;
            }
            StepAct::Do(Task::Wedge | Task::LineTension) => walk.prop = Prop::WedgeOrLine,
            StepAct::Do(Task::Clear | Task::Retreat)
            | StepAct::Check { .. }
            | StepAct::Hold { .. } => {}
        }
    }
    let crossing = walk.apex.and_then(|apex| {
        let depth = Length::si(stump.stem.ellipse().a - apex);
        crossing(
            &FacedStem {
                stem: &stump.stem,
                face_depth: depth,
            },
            &stump.wood,
        )
    });
    let verdicts = || walk.states.iter().map(|state| state.verdict);
    let verdict = verdicts()
        .find(|verdict| *verdict == Verdict::Splits)
        .or_else(|| verdicts().find(|verdict| *verdict != Verdict::Holds))
        .unwrap_or(Verdict::Holds);
    Ok(Run {
        crossing,
        verdict,
        states: walk.states,
    })
}

struct Walk<'a> {
    stump: &'a Stump,
    standing: Standing,
    apex: Option<f64>,
    sloped: bool,
    prop: Prop,
    /// Whether a wedge or a line comes before the next cut.
    propped_next: bool,
    past: Verdict,
    states: Vec<State>,
}

/// Whether a wedge is set or a line tensioned before the next cut.
fn propped_next(steps: &[Step]) -> bool {
    steps
        .iter()
        .take_while(|step| !matches!(step.act, StepAct::Cut(_)))
        .any(|step| matches!(step.act, StepAct::Do(Task::Wedge | Task::LineTension)))
}

impl Walk<'_> {
    fn cut(&mut self, step: usize, cut: &Cut) -> Result<(), SimulateError> {
        let advance = self.resolve(step, cut)?;
        let cutting = match cut {
            Cut::FaceFloor { .. } if !self.sloped => Cutting::FloorFirst,
            Cut::BackCut { .. } | Cut::TiltedBackCut { .. } | Cut::StrapRelease => Cutting::Rear,
            Cut::FaceSlope { .. }
            | Cut::FaceFloor { .. }
            | Cut::Plunge { .. }
            | Cut::HingeTrim { .. }
            | Cut::ReliefLeft { .. }
            | Cut::ReliefRight { .. } => Cutting::Other,
        };
        let before = self.standing.clone();
        let whole = length_of(&advance, &before, self.stump);
        let count = libm::ceil(whole / CENTIMETRE - 1.0e-9).max(1.0);
        let count = (count as u32).min(STATES_MAX);
        let mut reached = 0.0;
        for index in 1..=count {
            let last = index == count;
            let progress = if last {
                whole
            } else {
                CENTIMETRE * f64::from(index)
            };
            let now = if last && cutting == Cutting::Rear && !self.propped_next {
                Cutting::RearEnd
            } else {
                cutting
            };
            let (standing, mut judged) = self.at(&before, &advance, (progress, now));
            if judged.verdict != Verdict::Holds && self.past == Verdict::Holds {
                judged.verdict = self.first_met(&before, &advance, (reached, progress, now));
            }
            self.keep(step, cut, (progress, standing, judged));
            reached = progress;
        }
        if let Advance::FromFront(edge) = advance {
            self.apex = Some(self.apex.map_or(edge, |apex| apex.min(edge)));
            self.sloped |= matches!(cut, Cut::FaceSlope { .. });
        }
        Ok(())
    }

    fn at(
        &self,
        before: &Standing,
        advance: &Advance,
        point: (f64, Cutting),
    ) -> (Standing, Judged) {
        let mut standing = before.clone();
        advance_by(&mut standing, advance, point.0, self.stump);
        let judged = judge(self.stump, &standing, (point.1, self.prop));
        (standing, judged)
    }

    /// The verdict met first between a progress that holds and one that does not.
    fn first_met(
        &self,
        before: &Standing,
        advance: &Advance,
        span: (f64, f64, Cutting),
    ) -> Verdict {
        let (mut holds, mut fails, cutting) = span;
        for _ in 0..40 {
            let middle = 0.5 * (holds + fails);
            if self.at(before, advance, (middle, cutting)).1.verdict == Verdict::Holds {
                holds = middle;
            } else {
                fails = middle;
            }
        }
        self.at(before, advance, (fails, cutting)).1.verdict
    }

    /// Keeps a state. A stem that has split stays split, and one that moves does not stop.
    fn keep(&mut self, step: usize, cut: &Cut, state: (f64, Standing, Judged)) {
        let (progress, standing, judged) = state;
        let verdict = match (self.past, judged.verdict) {
            (Verdict::Splits, _) | (Verdict::Moves, Verdict::Splits) => Verdict::Splits,
            (Verdict::Moves, _) => Verdict::Moves,
            (Verdict::Holds | Verdict::Pinches | Verdict::SitsBack, now) => now,
        };
        self.past = match verdict {
            Verdict::Splits | Verdict::Moves => verdict,
            Verdict::Holds | Verdict::Pinches | Verdict::SitsBack => Verdict::Holds,
        };
        self.states.push(State {
            step,
            cut: *cut,
            progress: Length::si(progress),
            standing: standing.shown(&self.stump.stem),
            remaining_area: judged.section.map_or(Area::ZERO, |section| section.area),
            section: judged.section,
            moment: judged.section.map(|_| Moment::si(judged.moment)),
            hold_moment: Moment::si(judged.hold),
            split_moment: judged.split.map(Moment::si),
            hold_ratio: judged.hold_ratio(),
            split_ratio: judged.split_ratio(),
            verdict,
        });
        self.standing = standing;
    }

    fn resolve(&self, step: usize, cut: &Cut) -> Result<Advance, SimulateError> {
        let rear = -self.stump.stem.ellipse().a;
        let depth = |length: Length| not_below_zero(step, length).map(|value| -rear - value);
        match *cut {
            Cut::FaceSlope { depth: face, .. } | Cut::FaceFloor { depth: face } => {
                Ok(Advance::FromFront(depth(face)?))
            }
            Cut::Plunge {
                front,
                rear: behind,
            } => {
                let (front, behind) = (self.edge(step, front)?, self.edge(step, behind)?);
                if behind >= front {
                    return Err(SimulateError::SlotReversed { step });
                }
                Ok(Advance::Slot(behind, front))
            }
            Cut::HingeTrim { hinge } => {
                let to = self.edge(step, Edge::FromHinge(hinge))?;
                match self.standing.pieces.last() {
                    Some((from, _)) if *from > rear => Ok(Advance::Forward(*from, to)),
                    Some(_) | None => Err(SimulateError::NothingOpen { step }),
                }
            }
            Cut::BackCut { to } | Cut::TiltedBackCut { to, .. } => {
                let to = self.edge(step, to)?;
                Ok(match self.standing.pieces.as_slice() {
                    [strap, _, ..] if to < strap.1 => Advance::Rearward(strap.1, to),
                    [first, ..] => Advance::FromRear(first.0, to),
                    [] => Advance::FromRear(rear, to),
                })
            }
            Cut::ReliefLeft { width, to } => {
                let width = not_below_zero(step, width)?;
                Ok(Advance::Left(width, self.edge(step, to)?))
            }
            Cut::ReliefRight { width, to } => {
                let width = not_below_zero(step, width)?;
                Ok(Advance::Right(width, self.edge(step, to)?))
            }
            Cut::StrapRelease => match self.standing.pieces.as_slice() {
                [_, .., hinge] => Ok(Advance::Release(hinge.0)),
                [] | [_] => Err(SimulateError::NoStrap { step }),
            },
        }
    }

    fn edge(&self, step: usize, edge: Edge) -> Result<f64, SimulateError> {
        match edge {
            Edge::FromHinge(length) => {
                let length = not_below_zero(step, length)?;
                self.apex
                    .map(|apex| apex - length)
                    .ok_or(SimulateError::NoFace { step })
            }
            Edge::FromRear(length) => {
                let length = not_below_zero(step, length)?;
                Ok(length - self.stump.stem.ellipse().a)
            }
        }
    }
}

fn not_below_zero(step: usize, length: Length) -> Result<f64, SimulateError> {
    if length < Length::ZERO {
        return Err(SimulateError::BelowZero { step, length });
    }
    Ok(length.value())
}
