//! What the standing wood can do against what the tree asks: holding, splitting, sitting back,
//! pinching. The first that is met is the verdict; nothing here remembers an earlier state.

use crate::mechanics::holding::Load;
use crate::mechanics::section::{Section, Stem};
use crate::mechanics::splitting::{Slabs, Strength, split_mixed};
use crate::mechanics::strap::Parts;
use crate::simulate::standing::Standing;
use crate::simulate::stump::Stump;
use crate::units::{Length, Stress};

/// The compression ahead of a level face cut, made before the sloping one, at which the bar is
/// taken to be pinched. Source: our judgement; it is the lean of about nine degrees of a tree of
/// half a metre.
pub const PINCH_STRESS: Stress = Stress::si(2.0e6);

/// By so much a cut may pass the place of a wedge that is set next.
const MILLIMETRE: f64 = 0.001;

/// What becomes of the tree at one state.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Verdict {
    /// The wood holds: nothing moves by itself.
    Holds,
    /// The tree commits over its hinge.
    Moves,
    /// The stem splits upward.
    Splits,
    /// The bar is pinched.
    Pinches,
    /// The tree sits back on the cut.
    SitsBack,
}

impl Verdict {
    /// The word in machine output.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Holds => "holds",
            Self::Moves => "moves",
            Self::Splits => "splits",
            Self::Pinches => "pinches",
            Self::SitsBack => "sits-back",
        }
    }
}

/// Whether something keeps the tree from sitting back.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Prop {
    Nothing,
    WedgeOrLine,
}

/// What is being cut while a state is judged.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Cutting {
    /// The level face cut before any sloping one.
    FloorFirst,
    /// A cut that opens or goes on opening the rear.
    Rear,
    /// The end of such a cut, with no wedge or line to come before the next.
    RearEnd,
    /// Anything else.
    Other,
}

/// The state's numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Judged {
    pub section: Option<Section>,
    pub moment: f64,
    pub hold: f64,
    pub split: Option<f64>,
    pub verdict: Verdict,
}

impl Judged {
    pub(super) fn hold_ratio(&self) -> Option<f64> {
        ratio(self.hold, self.moment)
    }

    pub(super) fn split_ratio(&self) -> Option<f64> {
        ratio(self.split?, self.moment.min(self.hold))
    }
}

fn ratio(over: f64, under: f64) -> Option<f64> {
    let value = over / under;
    (under > 0.0 && value.is_finite()).then_some(value)
}

pub(super) fn judge(stump: &Stump, standing: &Standing, doing: (Cutting, Prop)) -> Judged {
    let Some(section) = standing.section(&stump.stem) else {
        return Judged {
            section: None,
            moment: 0.0,
            hold: 0.0,
            split: None,
            verdict: Verdict::Moves,
        };
    };
    let load = Load::of(&stump.demand);
    let moment = load.about(section.forward.value());
    let hold = stump.wood.mor.value() * section.modulus().value();
    let split = split_moment(stump, standing, load);
    let front = (section.front - section.forward).value();
    let compression = moment * front / section.i_inline.value();
    let verdict = if sits_back(stump, standing, doing) && moment < 0.0 {
        Verdict::SitsBack
    } else if doing.0 == Cutting::FloorFirst && compression >= PINCH_STRESS.value() {
        Verdict::Pinches
    } else if moment > 0.0 && split.is_some_and(|split| moment.min(hold) >= split) {
        Verdict::Splits
    } else if moment >= hold {
        Verdict::Moves
    } else {
        Verdict::Holds
    };
    Judged {
        section: Some(section),
        moment,
        hold,
        split,
        verdict,
    }
}

/// Whether a tree that leans back would close the cut: past the depth at which a wedge fits
/// behind the bar, or at the cut's end, with neither wedge nor line set or coming next.
fn sits_back(stump: &Stump, standing: &Standing, doing: (Cutting, Prop)) -> bool {
    let (cutting, prop) = doing;
    let rear = -stump.stem.ellipse().a;
    let depth = standing
        .pieces
        .first()
        .map_or(0.0, |piece| (piece.0 - rear).max(0.0));
    prop == Prop::Nothing
        && match cutting {
            Cutting::Rear => depth > stump.wedge_room.value() + MILLIMETRE,
            Cutting::RearEnd => depth > 0.0,
            Cutting::FloorFirst | Cutting::Other => false,
        }
}

/// The moment that splits: from the rear edge of one piece, or from either edge of the slot
/// between a hinge and a strap. `None` where no edge of a cut could start a crack.
fn split_moment(stump: &Stump, standing: &Standing, load: Load) -> Option<f64> {
    let strength = Strength::of(&stump.wood);
    let stem = &stump.stem;
    match standing.pieces.as_slice() {
        [] => None,
        [piece] => {
            let mut slabs = Slabs::at_edge(stem, Length::si(piece.0));
            slabs.width = standing.rear_width(stem, *piece);
            let split = split_mixed(&slabs, &strength);
            (split.is_finite() && piece.0 > -stem.ellipse().a).then_some(split)
        }
        [strap, .., hinge] => {
            held_split(&Held { stem, standing }, (*strap, *hinge), (load, strength))
        }
    }
}

struct Held<'a> {
    stem: &'a Stem,
    standing: &'a Standing,
}

/// While the strap holds: what the slot's edges would release grows as the square of the moment,
/// so the moment that splits is the moment times the root of what is wanted over released.
fn held_split(
    held: &Held<'_>,
    pieces: ((f64, f64), (f64, f64)),
    loaded: (Load, Strength),
) -> Option<f64> {
    let (strap, hinge) = pieces;
    let (load, strength) = loaded;
    let a = held.stem.ellipse().a;
    if held.standing.piece_sums(held.stem, strap).area <= 0.0 {
        return None;
    }
    let edges = (a - hinge.1, hinge.1 - hinge.0, strap.1 + a);
    let parts = Parts::new(held.stem.shape(), edges);
    let together = parts.together(load);
    let moment = load.about(together.centroid);
    let (front, back) = parts.releases(&together, strength.moe);
    let by_front = (strength.g1c / front).sqrt();
    let by_back = (strength.g2c / back).sqrt();
    let split = moment * by_front.min(by_back);
    (moment > 0.0 && split.is_finite()).then_some(split)
}
