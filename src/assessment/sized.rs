//! A tree of the plan sized up: its figures, its method, its steps on the virtual stump, and what
//! lies within its ring. Steps written by hand are judged as they are, never replaced.

use super::inputs::{Since, distance, tree_input};
use crate::figures::{CrossingBand, Model, TreeInput, crossing_band};
use crate::method::{self, Choice, SizeUp};
use crate::plan::step::{Cut, Step, StepAct};
use crate::plan::{FeatureKind, Plan, Tree, TreeState};
use crate::simulate::{Run, SimulateError, run};
use crate::units::Length;

/// A tree sized up.
#[derive(Debug, Clone)]
pub struct SizedTree {
    input: Option<TreeInput>,
    /// What the mechanics say; nothing where the species or the lay is not known.
    pub size_up: Option<SizeUp>,
    /// Why nothing may be cut whatever the sums say, in sentences.
    pub held_back: Vec<String>,
    /// The steps to be carried out: the author's own, or the method's.
    pub steps: Vec<Step>,
    /// Whether the author wrote them.
    pub by_hand: bool,
    /// The steps on the virtual stump, or why they cannot be run.
    pub run: Option<Result<Run, SimulateError>>,
    /// Ids of features within the ring where nobody but the sawyer may be.
    pub ring_conflicts: Vec<String>,
}

impl SizedTree {
    /// Where holding and splitting cross for the face of these steps, as a band over the cases.
    pub fn crossing(&self) -> Option<CrossingBand> {
        let input = self.input.as_ref()?;
        let model = Model::new(input).ok()?;
        let mut layout = self.size_up.as_ref()?.layout?;
        let face = self.steps.iter().rev().find_map(|step| match &step.act {
            StepAct::Cut(Cut::FaceFloor { depth } | Cut::FaceSlope { depth, .. }) => Some(*depth),
            StepAct::Cut(_) | StepAct::Check { .. } | StepAct::Hold { .. } | StepAct::Do(_) => None,
        });
        layout.face_depth = face.unwrap_or(layout.face_depth);
        Some(crossing_band(input, &model, &layout))
    }

    /// The wood along and across the lay as sized up, measured values in the place of planned.
    pub fn stump(&self) -> Option<(Length, Length)> {
        let input = self.input.as_ref()?;
        Some((input.stump_along?.value, input.stump_across?.value))
    }

    /// Whether a sequence may be carried out at all.
    pub fn may_be_cut(&self) -> bool {
        let proposed = self
            .size_up
            .as_ref()
            .is_some_and(|s| s.choice != Choice::Refuse);
        proposed && self.held_back.is_empty() && !self.steps.is_empty()
    }
}

/// Sizes a tree up, with what was measured since the plan was written.
pub fn size_up(plan: &Plan, tree: &Tree, since: &[Since]) -> SizedTree {
    let input = tree_input(plan, tree, since);
    let size_up = input.as_ref().map(method::size_up);
    let by_hand = tree.steps.is_some();
    let steps: Vec<Step> = match (&tree.steps, &size_up) {
        (Some(own), _) => own.iter().map(|s| s.value.clone()).collect(),
        (None, Some(size_up)) => size_up.steps.clone(),
        (None, None) => vec![],
    };
    let run = match (&input, by_hand, &size_up) {
        (Some(input), true, _) => method::stump_of(input)
            .ok()
            .map(|stump| run(&stump, &steps)),
        (_, false, Some(size_up)) => size_up.run.clone().map(Ok),
        _ => None,
    };
    let ring = size_up
        .as_ref()
        .and_then(|s| s.figures.ring)
        .map(|r| r.value());
    SizedTree {
        input,
        held_back: held_back(tree),
        ring_conflicts: ring.map_or(vec![], |ring| conflicts(plan, tree, ring)),
        size_up,
        steps,
        by_hand,
        run,
    }
}

fn held_back(tree: &Tree) -> Vec<String> {
    match tree.state.as_ref().map(|s| s.value) {
        Some(TreeState::Lodged) => vec![
            "It hangs in another tree: no cut is laid out for a lodged tree. Stay out from under both and ask the qualified person.".to_owned(),
        ],
        Some(TreeState::Split) => vec![
            "It is split already: bending is stored in it. Nobody under it or in line with it; ask the qualified person.".to_owned(),
        ],
        Some(TreeState::Live | TreeState::Dead | TreeState::Frozen) | None => vec![],
    }
}

/// Features where people, machines or lines may be, nearer than the ring's radius in metres.
fn conflicts(plan: &Plan, tree: &Tree, ring: f64) -> Vec<String> {
    let matters = |kind: FeatureKind| match kind {
        FeatureKind::PowerLine
        | FeatureKind::Road
        | FeatureKind::Building
        | FeatureKind::WorkArea
        | FeatureKind::Machine
        | FeatureKind::Landing => true,
        FeatureKind::Track
        | FeatureKind::Fence
        | FeatureKind::Water
        | FeatureKind::StandingTree => false,
    };
    plan.site
        .features
        .iter()
        .filter(|f| matters(f.kind.value) && distance(tree, f).is_some_and(|d| d < ring))
        .map(|f| f.id.value.clone())
        .collect()
}
