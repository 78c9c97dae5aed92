//! The twenty equal cases, the state they come to, and what lowers it. It never raises one.

use crate::figures::bands::twenty;
use crate::figures::cases::Columns;
use crate::figures::doubt::{Doubt, ranked};
use crate::figures::input::{Condition, TreeInput, WoodState};
use crate::figures::layout::Layout;
use crate::figures::model::Model;
use crate::figures::tree::{CaseState, Cases};
use crate::figures::worst::WorstCase;
use crate::mechanics::splitting::Slabs;
use crate::units::{Angle, Length};

/// The worst credible side ratio below which side steering enters the margin. Source: our
/// judgement.
const SIDE_MATTERS: f64 = 2.0;
/// The lean from which a species of high growth stress lowers the state. Source: our judgement.
const GROWTH_STRESS_LEAN: Angle = Angle::deg(5.0);
/// The opening below which a face closes while the hinge still holds. Source: derived with the
/// model, the first thirty degrees of the fall.
const EARLY_OPENING: Angle = Angle::deg(30.0);
/// What a moving tree may ask over a standing one. Source: derived with the model, 1 to 2.
const DYNAMIC_FACTOR: f64 = 2.0;

/// The twenty cases, and the doubts ranked.
pub(super) fn cases(
    input: &TreeInput,
    model: &Model,
    sums: (&Columns, &WorstCase, EarlyClose),
) -> (Cases, Vec<Doubt>) {
    let (columns, worst, early) = sums;
    let side_matters = worst.side_ratio.is_some_and(|ratio| ratio < SIDE_MATTERS);
    let mut margins: Vec<f64> = if side_matters {
        columns
            .margin
            .iter()
            .zip(&columns.side_margin)
            .map(|(split, side)| split.min(*side))
            .collect()
    } else {
        columns.margin.clone()
    };
    let doubts = ranked(&margins);
    let quantiles = twenty(&mut margins);
    let past = quantiles.iter().filter(|margin| **margin < 1.0).count();
    let mut lowered_by = lowered_by(input, model);
    let mut state = CaseState::of_twenty(past);
    lowered_by.extend(early.words());
    if !lowered_by.is_empty() {
        state = state.lowered();
    }
    if early == EarlyClose::Splits {
        state = CaseState::PastLimit;
    }
    if model.concern.is_some() {
        state = CaseState::CannotSay;
    }
    let cases = Cases {
        of: quantiles.len(),
        past_limit: Some(past),
        state,
        margins: quantiles.to_vec(),
        lowered_by,
    };
    (cases, doubts)
}

/// What a face that closes early comes to: the hinge no longer limits what the stem must carry.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum EarlyClose {
    /// It does not close early, or the stem carries twice what the tree asks.
    Carries,
    /// The stem carries what the tree asks, but not twice that.
    Near,
    /// The stem splits on what the tree asks.
    Splits,
}

impl EarlyClose {
    fn words(self) -> Option<&'static str> {
        match self {
            Self::Carries => None,
            Self::Near => Some(
                "the face closes early, and the stem does not carry twice the tree's moment without splitting",
            ),
            Self::Splits => Some(
                "the face closes early, and then the tree's whole moment splits the stem: open the face, clear the bypass",
            ),
        }
    }
}

/// Whether the face closes in the first degrees of the fall, by its opening or a bypass, and what
/// the stem then carries.
pub(super) fn early_close(input: &TreeInput, model: &Model, layout: &Layout) -> EarlyClose {
    let bypassed = input.bypass.is_some_and(|bypass| bypass > Length::ZERO);
    if !bypassed && layout.opening >= EARLY_OPENING {
        return EarlyClose::Carries;
    }
    let tree = model.central();
    let asked = tree.weight() * tree.forward;
    let edge = 0.5 * model.stem.along() - layout.face_depth - layout.hinge;
    let split = Slabs::at_edge(&model.stem, edge)
        .split_moment(&model.wood)
        .map_or(f64::INFINITY, |split| split.value());
    if asked >= split {
        EarlyClose::Splits
    } else if DYNAMIC_FACTOR * asked >= split {
        EarlyClose::Near
    } else {
        EarlyClose::Carries
    }
}

fn lowered_by(input: &TreeInput, model: &Model) -> Vec<&'static str> {
    let tree = model.central();
    let lean = libm::atan2(libm::hypot(tree.forward, tree.right), tree.height);
    let leans = lean >= GROWTH_STRESS_LEAN.value();
    let mut words = Vec::new();
    if input.has(Condition::TensionWood) {
        words.push("tension wood was seen: locked-in stress can halve the margin");
    } else if input.species.growth_stress() && leans {
        words.push("this species grows high stress in a leaning stem: it can halve the margin");
    }
    match input.wood_state {
        WoodState::Live => {}
        WoodState::Frozen => words.push("frozen wood holds longer and splits sooner"),
        WoodState::Dead => {
            words.push("dead wood is dry and brittle: it holds longer and splits sooner")
        }
    }
    words
}
