//! The brisk stretch: from the ligament at which the tree commits to the planned hinge the saw
//! cuts while the tree turns. It gives times and tilts, and never says that a hand is quick enough.

use crate::mechanics::holding::{Demand, Faced, FacedStem, Load};
use crate::mechanics::numeric::GAUSS_8;
use crate::mechanics::root;
use crate::units::{Angle, Area, CutRate, Duration, Inertia, Length, Stress};

/// The race between saw and tree.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Race<'a> {
    /// The stem and its face.
    pub cut: FacedStem<'a>,
    /// Modulus of rupture.
    pub mor: Stress,
    /// What the tree asks.
    pub demand: Demand,
    /// Height of the centre of weight.
    pub height: Length,
    /// The tree's inertia about the hinge.
    pub inertia: Inertia,
    /// The saw's rate.
    pub rate: CutRate,
    /// The ligament at which the tree commits.
    pub commit: Length,
    /// The planned hinge.
    pub hinge: Length,
}

/// How the race ends.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct RaceEnd {
    /// Wood between commit and hinge.
    pub area: Area,
    /// Seconds for it at the rate.
    pub seconds: Duration,
    /// How far the tree has turned when the hinge is reached; `None` past 90 degrees.
    pub tilt: Option<Angle>,
    /// The ligament left when the tree lies at 90 degrees, where it outruns the saw.
    pub left: Option<Length>,
}

/// Runs the race. Where the hinge is reached before the tree commits there is none: all zero.
///
/// # Model
/// `I θ'' = W[(x_cg − x̄(h)) cos θ + z_cg sin θ] + M_extra − MOR·S(h)`, `dh/dt = −q/b(h)`, from
/// rest at commit; the tree never turns back.
/// # Valid for
/// A saw that keeps its rate; `None` where it has none.
/// # Source
/// Newton's law, integrated by the fourth-order Runge-Kutta rule.
pub fn race(input: &Race<'_>) -> Option<RaceEnd> {
    let faced = input.cut.plain();
    let plain = Course::of(input)?;
    if plain.commit <= plain.hinge {
        return Some(RaceEnd {
            area: Area::ZERO,
            seconds: Duration::ZERO,
            tilt: Some(Angle::ZERO),
            left: None,
        });
    }
    let area = plain.area(&faced);
    let end = plain.run(&faced, FINE);
    Some(RaceEnd {
        area: Area::si(area),
        seconds: Duration::si(area / plain.rate),
        tilt: end.tilt.map(Angle::si),
        left: end.left.map(Length::si),
    })
}

/// The rate that keeps the tilt at the hinge under a limit; `None` where there is no race.
///
/// # Model
/// [`race`] solved for the rate.
/// # Valid for
/// Limits well below 90 degrees.
/// # Source
/// As [`race`].
pub fn rate_needed(input: &Race<'_>, limit: Angle) -> Option<CutRate> {
    let faced = input.cut.plain();
    let plain = Course::of(input)?;
    plain
        .rate_needed(&faced, limit.value())
        .map(|rate| CutRate::si(rate.0))
}

/// The step of the reference run, in units of the tree's own time `√(I/(W z))`.
const FINE: f64 = 0.02;
/// The step of the runs over many cases; it agrees with the fine one to a part in a thousand.
pub(crate) const COARSE: f64 = 0.4;

/// Plain numbers of [`Race`], without the stem.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Course {
    pub mor: f64,
    pub load: Load,
    pub height: f64,
    pub inertia: f64,
    pub rate: f64,
    pub commit: f64,
    pub hinge: f64,
}

/// How a run ends, in plain numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct CourseEnd {
    pub tilt: Option<f64>,
    pub left: Option<f64>,
}

impl Course {
    fn of(input: &Race<'_>) -> Option<Self> {
        let ready = input.rate > CutRate::ZERO
            && input.inertia > Inertia::ZERO
            && input.height > Length::ZERO;
        ready.then(|| Self {
            mor: input.mor.value(),
            load: Load::of(&input.demand),
            height: input.height.value(),
            inertia: input.inertia.value(),
            rate: input.rate.value(),
            commit: input.commit.value(),
            hinge: input.hinge.value(),
        })
    }

    pub(crate) fn area(&self, faced: &Faced<'_>) -> f64 {
        (faced.ligament(self.commit).sums.area - faced.ligament(self.hinge).sums.area).max(0.0)
    }

    /// Time of the tree: growth rate of a small tilt.
    fn growth(&self) -> f64 {
        (self.load.weight * self.height / self.inertia).sqrt()
    }

    pub(crate) fn run(&self, faced: &Faced<'_>, step: f64) -> CourseEnd {
        let seconds = self.area(faced) / self.rate;
        let steps = libm::ceil(seconds * self.growth() / step).clamp(4.0, 100_000.0);
        let cut = (self.commit - self.hinge) / steps;
        let (mut tilt, mut speed) = (0.0_f64, 0.0_f64);
        let mut thickness = self.commit;
        let mut here = self.standing(faced, thickness);
        for index in 1..=(steps as u32) {
            let next = self.commit - cut * f64::from(index);
            let middle = self.standing(faced, 0.5 * (thickness + next));
            let end = self.standing(faced, next);
            let (turned, faster) = step_on((tilt, speed), cut, [here, middle, end], self);
            tilt = turned.max(0.0);
            speed = if turned > 0.0 {
                faster
            } else {
                faster.max(0.0)
            };
            if tilt >= std::f64::consts::FRAC_PI_2 {
                return CourseEnd {
                    tilt: None,
                    left: Some(next),
                };
            }
            thickness = next;
            here = end;
        }
        CourseEnd {
            tilt: Some(tilt),
            left: None,
        }
    }

    #[inline]
    fn standing(&self, faced: &Faced<'_>, thickness: f64) -> Standing {
        let ligament = faced.ligament(thickness);
        Standing {
            arm: self.load.forward - ligament.centroid,
            held: self.mor * ligament.modulus - self.load.extra,
            per_metre: ligament.width / self.rate,
        }
    }

    /// The rate that ends at a tilt, and that rate by the small-angle sum.
    pub(crate) fn rate_needed(&self, faced: &Faced<'_>, limit: f64) -> Option<(f64, f64)> {
        let small = self.rate_needed_small(faced, limit)?;
        let over = |log_rate: f64| {
            let run = Self {
                rate: libm::exp(log_rate),
                ..*self
            }
            .run(faced, FINE);
            run.tilt.unwrap_or(std::f64::consts::FRAC_PI_2) - limit
        };
        let middle = libm::log(small);
        let (mut low, mut high) = (middle - 0.1, middle + 0.1);
        for _ in 0..40 {
            if over(low) > 0.0 {
                break;
            }
            low -= 0.5;
        }
        for _ in 0..40 {
            if over(high) < 0.0 {
                break;
            }
            high += 0.5;
        }
        Some((libm::exp(root((low, high), 1.0e-9, over)), small))
    }

    /// The same for small angles: `θ(T) = v/(μI) Σ w a b sinh(μ s v)` with `v = 1/q`, `s` the
    /// area still to cut and `a` the moment left over when the tree stands.
    pub(crate) fn rate_needed_small(&self, faced: &Faced<'_>, limit: f64) -> Option<f64> {
        if self.commit <= self.hinge {
            return None;
        }
        let growth = self.growth();
        let half = 0.5 * (self.commit - self.hinge);
        let centre = 0.5 * (self.commit + self.hinge);
        let hinge_area = faced.ligament(self.hinge).sums.area;
        let mut nodes = [(0.0_f64, 0.0_f64); 8];
        for (index, (node, weight)) in GAUSS_8.iter().enumerate() {
            for (side, sign) in [-1.0, 1.0].into_iter().enumerate() {
                let ligament = faced.ligament(centre + sign * half * node);
                let over = self.load.about(ligament.centroid) - self.mor * ligament.modulus;
                nodes[2 * index + side] = (
                    growth * (ligament.sums.area - hinge_area),
                    weight * half * over * ligament.width,
                );
            }
        }
        let target = limit * growth * self.inertia;
        let first: f64 = nodes.iter().map(|(s, share)| s * share).sum();
        if first <= 0.0 {
            return None;
        }
        // Newton on the logarithms from the start of slow growth, which lies beyond the root.
        let mut v = (target / first).sqrt();
        for _ in 0..30 {
            let (mut sum, mut slope) = (0.0, 0.0);
            for (s, share) in nodes {
                let grown = libm::exp((s * v).min(300.0));
                let (sinh, cosh) = (0.5 * (grown - 1.0 / grown), 0.5 * (grown + 1.0 / grown));
                sum += share * sinh;
                slope += share * s * cosh;
            }
            let change = libm::log(target / (v * sum)) / (1.0 + v * slope / sum);
            v *= libm::exp(change);
            if change.abs() < 1.0e-6 {
                break;
            }
        }
        Some(1.0 / v)
    }
}

/// What stands at one ligament: the weight's arm, the moment held, and seconds a metre of cut.
#[derive(Clone, Copy)]
struct Standing {
    arm: f64,
    held: f64,
    per_metre: f64,
}

impl Standing {
    #[inline]
    fn change(&self, state: (f64, f64), course: &Course) -> (f64, f64) {
        let (sine, cosine) = turn(state.0);
        let moment = course.load.weight * (self.arm * cosine + course.height * sine) - self.held;
        (
            state.1 * self.per_metre,
            moment / course.inertia * self.per_metre,
        )
    }
}

/// Sine and cosine by their series: a run ends at a right angle, where both are good to a part
/// in a hundred million, and a table of many cases asks for them tens of thousands of times.
#[inline]
fn turn(angle: f64) -> (f64, f64) {
    // Inverse factorials with their signs: of 3, 5 … 13 and of 2, 4 … 12.
    const SINE: [f64; 6] = [
        -1.0 / 6.0,
        1.0 / 120.0,
        -1.0 / 5_040.0,
        1.0 / 362_880.0,
        -1.0 / 39_916_800.0,
        1.0 / 6_227_020_800.0,
    ];
    const COSINE: [f64; 6] = [
        -1.0 / 2.0,
        1.0 / 24.0,
        -1.0 / 720.0,
        1.0 / 40_320.0,
        -1.0 / 3_628_800.0,
        1.0 / 479_001_600.0,
    ];
    let square = angle * angle;
    let sum = |terms: &[f64; 6]| {
        1.0 + square
            * terms
                .iter()
                .rev()
                .fold(0.0, |sum, term| term + square * sum)
    };
    (angle * sum(&SINE), sum(&COSINE))
}

/// One Runge-Kutta step over a length of cut.
#[inline]
fn step_on(state: (f64, f64), cut: f64, at: [Standing; 3], course: &Course) -> (f64, f64) {
    let ahead = |rate: (f64, f64), by: f64| (state.0 + by * rate.0, state.1 + by * rate.1);
    let k1 = at[0].change(state, course);
    let k2 = at[1].change(ahead(k1, 0.5 * cut), course);
    let k3 = at[1].change(ahead(k2, 0.5 * cut), course);
    let k4 = at[2].change(ahead(k3, cut), course);
    (
        state.0 + cut / 6.0 * (k1.0 + 2.0 * k2.0 + 2.0 * k3.0 + k4.0),
        state.1 + cut / 6.0 * (k1.1 + 2.0 * k2.1 + 2.0 * k3.1 + k4.1),
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::mechanics::section::Stem;

    #[test]
    fn coarse_runs_and_small_angles_stand_for_the_fine_ones() {
        let stem = Stem::new(Length::cm(45.0), Length::cm(45.0)).unwrap();
        let faced = Faced::new(stem.shape(), 0.15, None);
        for (forward, rate) in [(0.9, 0.0045), (1.0, 0.0030), (1.2, 0.0050)] {
            let load = Load {
                weight: 15_000.0,
                forward,
                extra: 0.0,
            };
            let course = Course {
                mor: 57.0e6,
                load,
                height: 8.0,
                inertia: 140_000.0,
                rate,
                commit: faced.meets(57.0e6, load, 1.0e-13),
                hinge: 0.045,
            };
            let tilt = |step: f64| course.run(&faced, step).tilt.unwrap();
            let (fine, coarse) = (tilt(FINE), tilt(COARSE));
            assert!((coarse / fine - 1.0).abs() < 2.0e-3, "{coarse} {fine}");
            let (exact, small) = course.rate_needed(&faced, Angle::deg(5.0).value()).unwrap();
            assert!((small / exact - 1.0).abs() < 5.0e-3, "{small} {exact}");
        }
    }
}
