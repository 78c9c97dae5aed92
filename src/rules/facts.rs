//! The facts rules look at: the plan, and of each tree what a size-up gives, where there is one.
//! Every value a size-up gives may be missing; the plan's own value goes before it.

use std::collections::BTreeMap;

use chrono::NaiveDate;

use super::ground::Spot;
use super::order::Order;
use crate::diagnostic::Place;
use crate::plan::step::{Cut, Edge, MethodName, StepAct};
use crate::plan::{Defect, DefectKind, Lean, Measured, Plan, Tree, TreeState};
use crate::units::{Angle, Bearing, Duration, Length};

/// What a size-up gives of one tree; nothing where it gave nothing.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct SizeUp {
    /// The method proposed.
    pub method: Option<MethodName>,
    /// Depth of the face.
    pub face_depth: Option<Length>,
    /// Opening of the face.
    pub face_opening: Option<Angle>,
    /// Thickness of the hinge.
    pub hinge: Option<Length>,
    /// Height of the back cut above the face's floor or apex.
    pub back_cut_height: Option<Length>,
    /// Thickness of the strap.
    pub strap: Option<Length>,
    /// Lean of the weight.
    pub effective_lean: Option<Angle>,
    /// The bearing it leans to.
    pub lean_toward: Option<Bearing>,
    /// Lean of the weight across the lay, right positive.
    pub side_lean: Option<Angle>,
    /// Radius of the ring.
    pub ring_radius: Option<Length>,
    /// Seconds on the fastest way out.
    pub escape_seconds: Option<Duration>,
    /// Shortest time of the fall.
    pub fall_seconds: Option<Duration>,
}

/// The facts of one plan.
#[derive(Debug)]
pub struct Facts<'a> {
    /// The plan.
    pub plan: &'a Plan,
    /// The day, where it could be read.
    pub date: Option<NaiveDate>,
    /// Which trees are down before which.
    pub order: Order,
    size_ups: &'a BTreeMap<String, SizeUp>,
}

/// A figure with where it is told.
#[derive(Debug, Clone, PartialEq)]
pub struct Told<T> {
    /// The figure.
    pub value: T,
    /// Where it stands; the tree's id where a size-up tells it.
    pub place: Place,
    /// Its route.
    pub path: String,
}

impl<T> Told<T> {
    /// Place and route, for a finding.
    pub fn at(&self) -> (Place, String) {
        (self.place, self.path.clone())
    }
}

impl<'a> Facts<'a> {
    /// The facts of a plan with the size-ups there are, by tree id.
    pub fn new(plan: &'a Plan, size_ups: &'a BTreeMap<String, SizeUp>) -> Self {
        // A day that could not be read stands as the first there is.
        let date = Some(plan.job.date.value).filter(|date| *date != NaiveDate::MIN);
        Self {
            plan,
            date,
            order: Order::new(&plan.trees),
            size_ups,
        }
    }

    /// The trees in the plan's order.
    pub fn trees(&self) -> impl Iterator<Item = TreeFacts<'a>> + '_ {
        self.plan.trees.iter().map(|tree| TreeFacts {
            tree,
            size_up: self.size_ups.get(&tree.id.value),
        })
    }
}

/// The facts of one tree.
#[derive(Debug, Clone, Copy)]
pub struct TreeFacts<'a> {
    /// The tree.
    pub tree: &'a Tree,
    /// Its size-up, where there is one.
    pub size_up: Option<&'a SizeUp>,
}

impl<'a> TreeFacts<'a> {
    /// The place of its id with the route of one of its keys, for what is missing.
    pub fn at(&self, key: &str) -> (Place, String) {
        (self.tree.id.place, format!("{}.{key}", self.tree.route))
    }

    /// Where it stands.
    pub fn spot(&self) -> Option<Spot> {
        self.tree.at.as_ref().map(Spot::of)
    }

    /// Its height.
    pub fn height(&self) -> Option<Length> {
        self.tree.height.as_ref().map(Measured::value)
    }

    /// The cautious end of its height: 95 % of readings with this spread lie below it.
    pub fn height_high(&self) -> Option<Length> {
        let height = self.tree.height.as_ref()?;
        Some(height.reading.value + height.reading.spread * 1.645)
    }

    /// The lean of its weight where a size-up gives it, of its stem otherwise.
    pub fn lean(&self) -> Option<(Angle, Bearing)> {
        let weight = self
            .size_up
            .and_then(|s| s.effective_lean.zip(s.lean_toward));
        weight.or_else(|| self.tree.lean.as_ref().map(stem_lean))
    }

    /// Depth of its face.
    pub fn face_depth(&self) -> Option<Told<Length>> {
        let planned = self.planned(self.tree.face.depth.as_ref(), "face.depth");
        planned
            .or_else(|| self.face_by_hand())
            .or_else(|| self.sized("face.depth", |s| s.face_depth))
    }

    /// The depth of the face that steps written by hand cut.
    pub fn face_by_hand(&self) -> Option<Told<Length>> {
        self.step_figure(|cut| match cut {
            Cut::FaceSlope { depth, .. } | Cut::FaceFloor { depth } => Some(*depth),
            Cut::Plunge { .. }
            | Cut::HingeTrim { .. }
            | Cut::BackCut { .. }
            | Cut::TiltedBackCut { .. }
            | Cut::ReliefLeft { .. }
            | Cut::ReliefRight { .. }
            | Cut::StrapRelease => None,
        })
    }

    /// Opening of its face.
    pub fn face_opening(&self) -> Option<Told<Angle>> {
        let planned = self.planned(self.tree.face.opening.as_ref(), "face.opening");
        planned.or_else(|| self.sized("face.opening", |s| s.face_opening))
    }

    /// Thickness of its hinge.
    pub fn hinge(&self) -> Option<Told<Length>> {
        let planned = self.planned(self.tree.hinge.as_ref(), "hinge.thickness");
        planned
            .or_else(|| self.hinge_by_hand())
            .or_else(|| self.sized("hinge.thickness", |s| s.hinge))
    }

    /// The hinge that steps written by hand leave: where the last cut from behind stops.
    pub fn hinge_by_hand(&self) -> Option<Told<Length>> {
        self.step_figure(|cut| match cut {
            Cut::HingeTrim { hinge } => Some(*hinge),
            Cut::BackCut {
                to: Edge::FromHinge(left),
            }
            | Cut::TiltedBackCut {
                to: Edge::FromHinge(left),
                ..
            } => Some(*left),
            Cut::FaceSlope { .. }
            | Cut::FaceFloor { .. }
            | Cut::Plunge { .. }
            | Cut::BackCut { .. }
            | Cut::TiltedBackCut { .. }
            | Cut::ReliefLeft { .. }
            | Cut::ReliefRight { .. }
            | Cut::StrapRelease => None,
        })
    }

    /// Height of its back cut above the face.
    pub fn back_cut_height(&self) -> Option<Told<Length>> {
        let planned = self.planned(self.tree.back_cut_height.as_ref(), "back_cut.height");
        planned.or_else(|| self.sized("back_cut.height", |s| s.back_cut_height))
    }

    /// Whether it endangers by its state before any cut: dead, hung or split.
    pub fn is_danger_tree(&self) -> bool {
        let state = self.tree.state.as_ref().map(|s| s.value);
        match state {
            Some(TreeState::Dead | TreeState::Lodged | TreeState::Split) => true,
            Some(TreeState::Live | TreeState::Frozen) | None => {
                self.tree.defects.iter().any(weakens)
            }
        }
    }

    /// The word for what makes it a danger tree.
    pub fn danger(&self) -> &'static str {
        match self.tree.state.as_ref().map(|s| s.value) {
            Some(TreeState::Dead) => "dead",
            Some(TreeState::Lodged) => "hung in another",
            Some(TreeState::Split) => "split",
            Some(TreeState::Live | TreeState::Frozen) | None => "decayed or damaged",
        }
    }

    /// The cuts of its steps, where they are written by hand.
    pub fn cuts_by_hand(&self) -> Option<Vec<&'a Cut>> {
        let steps = self.tree.steps.as_ref()?;
        Some(steps.iter().filter_map(|s| cut_of(&s.value.act)).collect())
    }

    fn planned<T: Copy>(&self, told: Option<&Measured<T>>, key: &str) -> Option<Told<T>> {
        told.map(|measured| Told {
            value: measured.value(),
            place: measured.place,
            path: format!("{}.{key}", self.tree.route),
        })
    }

    fn sized<T>(&self, key: &str, of: impl Fn(&SizeUp) -> Option<T>) -> Option<Told<T>> {
        let (place, path) = self.at(key);
        self.size_up
            .and_then(of)
            .map(|value| Told { value, place, path })
    }

    /// The last figure of its kind in the steps written by hand.
    fn step_figure(&self, of: impl Fn(&Cut) -> Option<Length>) -> Option<Told<Length>> {
        let steps = self.tree.steps.as_ref()?;
        let figure = |(index, step): (usize, &crate::plan::Spanned<crate::plan::step::Step>)| {
            let value = of(cut_of(&step.value.act)?)?;
            Some(Told {
                value,
                place: step.place,
                path: format!("{}.steps[{index}]", self.tree.route),
            })
        };
        steps.iter().enumerate().rev().find_map(figure)
    }
}

/// The cut of an act.
pub(super) fn cut_of(act: &StepAct) -> Option<&Cut> {
    match act {
        StepAct::Cut(cut) => Some(cut),
        StepAct::Check { .. } | StepAct::Hold { .. } | StepAct::Do(_) => None,
    }
}

/// Whether a defect takes strength from stem or roots.
fn weakens(defect: &Defect) -> bool {
    match defect.kind.value {
        DefectKind::Cavity
        | DefectKind::Rot
        | DefectKind::Crack
        | DefectKind::Shake
        | DefectKind::Roots => true,
        DefectKind::Fork | DefectKind::Wound | DefectKind::Insects => false,
    }
}

/// The lean of a stem from either way of measuring it.
fn stem_lean(lean: &Lean) -> (Angle, Bearing) {
    match lean {
        Lean::Toward { angle, toward } => (angle.value(), toward.value),
        Lean::Views {
            view_a,
            view_b,
            facing,
        } => {
            let a = libm::tan(view_a.value().value());
            let b = libm::tan(view_b.value().value());
            let angle = Angle::si(libm::atan(libm::hypot(a, b)));
            // View A sees lean to the right of `facing`; view B, a right angle on, to its right.
            let turn = Angle::si(libm::atan2(b, a));
            (angle, facing.value.turned(Angle::deg(90.0)).turned(turn))
        }
    }
}
