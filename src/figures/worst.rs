//! The worst credible case of a tree and its cuts: weak against splitting, strong in the hinge,
//! the demand at its cautious end, the cuts a little off. It is one case, not a band.

use crate::figures::input::TreeInput;
use crate::figures::layout::{Layout, Release};
use crate::figures::model::Model;
use crate::figures::read::state_factor;
use crate::mechanics::holding::{Faced, Load, Tongue};
use crate::mechanics::race::Course;
use crate::mechanics::section::Shape;
use crate::mechanics::splitting::{Strength, split_at};
use crate::units::{Angle, CutRate, Duration, Length, Moment};

/// What the fracture energies are multiplied by. Source: a code's characteristic over mean value.
const ENERGY_FACTOR: f64 = 0.5;
/// What the modulus of rupture is multiplied by. Source: a load of three seconds (opened).
const STRENGTH_FACTOR: f64 = 1.2;
/// How much thicker the hinge is than planned.
const HINGE_OFF: f64 = 0.005;
/// How much shallower the face is than planned.
const FACE_OFF: f64 = 0.010;
/// How finely the cases solve for the commit, metres.
pub(super) const COMMIT_WIDTH: f64 = 1.0e-7;

/// The step of a single race, in units of the tree's own time.
const RUN_STEP: f64 = 0.02;

/// The worst credible case.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct WorstCase {
    /// Splitting over asked: the least from commit to the hinge.
    pub split_ratio: f64,
    /// Elastic side strength over asked at the planned hinge; `None` without a side demand.
    pub side_ratio: Option<f64>,
    /// The demand's cautious end about the planned hinge, forward.
    pub demand_forward: Moment,
    /// The demand's cautious end about the planned hinge, backward.
    pub demand_back: Moment,
    /// The ligament at which the tree may commit early.
    pub commit: Length,
    /// The brisk stretch from there with the slow rate; `None` with a strap, or where the race
    /// cannot be run.
    pub stretch: Option<Stretch>,
}

/// A brisk stretch.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Stretch {
    /// Time for it at the rate.
    pub seconds: Duration,
    /// Tilt at the hinge; `None` past 90 degrees.
    pub tilt: Option<Angle>,
}

/// The cuts in plain numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Cuts {
    pub face: f64,
    pub hinge: f64,
    pub release: Release,
}

impl Cuts {
    pub(crate) fn of(layout: &Layout) -> Self {
        Self {
            face: layout.face_depth.value(),
            hinge: layout.hinge.value(),
            release: layout.release,
        }
    }

    pub(crate) fn faced<'a>(&self, shape: Shape<'a>) -> Faced<'a> {
        let tongue = match self.release {
            Release::FromRear | Release::Strap => None,
            Release::Tongue { width } => Some(Tongue {
                width: width.value(),
                front: shape.ellipse.a - self.face - self.hinge,
            }),
        };
        Faced::new(shape, self.face, tongue)
    }
}

/// What a state at commit comes to.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct AtCommit {
    /// Where the hinge's holding is met; zero where it never is.
    pub commit: f64,
    /// Splitting over the smaller of asked and held.
    pub split_ratio: f64,
    /// The least of that ratio from commit on to the hinge: the cut goes on while the tree moves,
    /// and the hinge then passes on no more than it holds.
    pub margin: f64,
}

/// The share of the ligament's whole from which the least ratio may lie after commit. Below it
/// the ratio only grows as the cut goes on.
const THICK: f64 = 0.4;

/// Splitting at commit. With a strap the finished hinge is judged alone. A tree that does not go
/// by itself is bent over by wedge or line, so then its hinge's own holding is the demand.
#[inline]
pub(crate) fn at_commit(
    faced: &Faced<'_>,
    cuts: &Cuts,
    strength: &Strength,
    load: (Load, f64),
) -> AtCommit {
    let (load, width) = load;
    let commit = faced.meets(strength.mor, load, width);
    let ligament = match cuts.release {
        Release::Strap => cuts.hinge,
        Release::FromRear | Release::Tongue { .. } => commit.max(cuts.hinge),
    }
    // At the very rear no crack has any width yet; a hair inside, every figure is a number.
    .min(faced.whole() * (1.0 - 1.0e-6));
    let standing = faced.ligament(ligament);
    let hold = strength.mor * standing.modulus;
    let asked = load.about(standing.centroid);
    let demand = if asked > 0.0 { asked.min(hold) } else { hold };
    let split_ratio = split_at(faced, ligament, strength) / demand;
    let margin = if commit > THICK * faced.whole() && cuts.release != Release::Strap {
        split_ratio.min(least_after(faced, strength, ligament))
    } else {
        split_ratio
    };
    AtCommit {
        commit,
        split_ratio,
        margin,
    }
}

/// The least splitting over holding between a thick ligament at commit and a thinner one, by the
/// golden section: over that stretch the ratio falls and then rises, or only falls.
fn least_after(faced: &Faced<'_>, strength: &Strength, commit: f64) -> f64 {
    const GOLDEN: f64 = 0.618_033_988_749_894_9;
    let ratio = |thickness: f64| {
        let held = strength.mor * faced.ligament(thickness).modulus;
        split_at(faced, thickness, strength) / held
    };
    let (mut low, mut high) = (0.75 * THICK * faced.whole(), commit);
    let (mut left, mut right) = (high - GOLDEN * (high - low), low + GOLDEN * (high - low));
    let (mut at_left, mut at_right) = (ratio(left), ratio(right));
    for _ in 0..20 {
        if at_left < at_right {
            high = right;
            (right, at_right) = (left, at_left);
            left = high - GOLDEN * (high - low);
            at_left = ratio(left);
        } else {
            low = left;
            (left, at_left) = (right, at_right);
            right = low + GOLDEN * (high - low);
            at_right = ratio(right);
        }
    }
    at_left.min(at_right)
}

/// A side moment that is none but for rounding, N·m.
const NO_SIDE_MOMENT: f64 = 1.0e-3;

/// Elastic side strength over what a side moment asks of the hinge; infinite without one.
#[inline]
pub(crate) fn side_ratio(faced: &Faced<'_>, hinge: f64, mor: f64, moment: f64) -> f64 {
    let sums = faced.ligament(hinge).sums;
    let reach = faced.shape.half_width(faced.apex - hinge, faced.apex);
    if moment.abs() <= NO_SIDE_MOMENT {
        return f64::INFINITY;
    }
    mor * sums.side() / (moment.abs() * reach)
}

/// Demand's cautious ends about a centroid: extra moments to add to the central load.
pub(crate) fn cautious_extras(model: &Model, centroid: f64) -> (f64, f64) {
    let (up, down) = model.demand_doubt(|tree| tree.load(0.0).about(centroid));
    (up, -down)
}

/// The worst credible case of a layout.
pub fn worst_case(input: &TreeInput, model: &Model, layout: &Layout) -> WorstCase {
    let cuts = Cuts::of(layout);
    let planned = cuts.faced(model.stem.shape());
    let tree = model.central();
    let centroid = planned.ligament(cuts.hinge.min(planned.whole())).centroid;
    let (up, down) = cautious_extras(model, centroid);
    let base = Strength::of(&model.wood);
    let strength = Strength {
        mor: base.mor * STRENGTH_FACTOR * state_factor(input.wood_state),
        g1c: base.g1c * ENERGY_FACTOR,
        g2c: base.g2c * ENERGY_FACTOR,
        ..base
    };
    let off = Cuts {
        face: (cuts.face - FACE_OFF).max(0.0),
        hinge: cuts.hinge + HINGE_OFF,
        release: cuts.release,
    };
    let split = at_commit(
        &off.faced(model.stem.shape()),
        &off,
        &strength,
        (tree.load(up), COMMIT_WIDTH),
    );
    let early = planned.meets(base.mor, tree.load(up), COMMIT_WIDTH);
    let (side_up, side_down) = model.demand_doubt(|tree| tree.weight() * tree.right);
    let sideways = tree.weight() * tree.right;
    let side = (sideways + side_up).abs().max((sideways - side_down).abs());
    let side = side_ratio(&planned, cuts.hinge, base.mor, side);
    WorstCase {
        split_ratio: split.margin,
        side_ratio: side.is_finite().then_some(side),
        demand_forward: Moment::si(tree.load(up).about(centroid)),
        demand_back: Moment::si(tree.load(down).about(centroid)),
        commit: Length::si(early),
        stretch: stretch(input, model, (&planned, cuts.hinge), (tree.load(up), early)),
    }
}

/// The stretch from a commit with the saw's slow rate; `None` where the race cannot be run.
pub(crate) fn stretch(
    input: &TreeInput,
    model: &Model,
    cut: (&Faced<'_>, f64),
    start: (Load, f64),
) -> Option<Stretch> {
    let (faced, hinge) = cut;
    let (load, commit) = start;
    if commit <= hinge {
        return Some(Stretch {
            seconds: Duration::ZERO,
            tilt: Some(Angle::ZERO),
        });
    }
    let tree = model.central();
    let course = Course {
        mor: model.wood.mor.value(),
        load,
        height: tree.height,
        inertia: tree.inertia?,
        rate: slow_rate(input)?.value(),
        commit,
        hinge,
    };
    let seconds = course.area(faced) / course.rate;
    Some(Stretch {
        seconds: Duration::si(seconds),
        tilt: course.run(faced, RUN_STEP).tilt.map(Angle::si),
    })
}

/// The saw's slow rate: the 5 % end of its reading, never below a tenth of it.
pub(crate) fn slow_rate(input: &TreeInput) -> Option<CutRate> {
    let rate = input.saw?.rate;
    let slow = rate.value.value() - super::model::ONE_SIDED_95 * rate.spread.value().abs();
    let slow = slow.max(0.1 * rate.value.value());
    (slow > 0.0).then(|| CutRate::si(slow))
}
