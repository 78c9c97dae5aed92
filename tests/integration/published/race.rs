//! The brisk stretch against a general-purpose integrator of differential equations.
//! Source: `tests/scripts/size_up_scipy.py`, an explicit rule of order eight at 1e-11.

use std::f64::consts::FRAC_PI_2;

use super::{near, within};
use stumpside::mechanics::holding::{Demand, FacedStem, Wood, meets_at};
use stumpside::mechanics::race::{Race, race};
use stumpside::mechanics::section::Stem;
use stumpside::units::{CutRate, Force, FractureEnergy, Inertia, Length, Moment, Stress};

#[test]
fn races_agree_with_a_general_integrator() {
    for (given, found) in RACES {
        let [d, face, mor, weight, forward, height, inertia, rate, hinge] = given;
        let stem = Stem::new(Length::m(d), Length::m(d)).unwrap();
        let cut = FacedStem {
            stem: &stem,
            face_depth: Length::m(face),
        };
        let demand = Demand {
            weight: Force::si(weight),
            forward: Length::m(forward),
            extra: Moment::ZERO,
        };
        let mor = Stress::si(mor * 1.0e6);
        let wood = Wood {
            mor,
            moe: Stress::si(9.0e9),
            g1c: FractureEnergy::si(350.0),
            g2c: FractureEnergy::si(1_050.0),
        };
        let commit = meets_at(&cut, &wood, &demand, 1.0);
        near(commit.value(), found[0], 1e-9);
        let end = race(&Race {
            cut,
            mor,
            demand,
            height: Length::m(height),
            inertia: Inertia::si(inertia),
            rate: CutRate::cm2_s(rate),
            commit,
            hinge: Length::m(hinge),
        })
        .unwrap();
        let past_flat = found[2] >= FRAC_PI_2 - 1e-6;
        match end.tilt {
            Some(tilt) => {
                assert!(!past_flat);
                within(tilt.value(), found[2], 1e-5);
                near(end.seconds.value(), found[1], 2e-6);
                assert_eq!(end.left, None);
            }
            None => {
                assert!(past_flat);
                // The step that passes the right angle ends within a step of it.
                near(end.left.unwrap().value(), found[3], 1e-3);
            }
        }
    }
}

#[test]
fn no_stretch_is_no_race() {
    let stem = Stem::new(Length::m(0.5), Length::m(0.5)).unwrap();
    let still = Race {
        cut: FacedStem {
            stem: &stem,
            face_depth: Length::m(0.125),
        },
        mor: Stress::si(57.0e6),
        demand: Demand {
            weight: Force::si(15_000.0),
            forward: Length::m(0.3),
            extra: Moment::ZERO,
        },
        height: Length::m(8.0),
        inertia: Inertia::si(140_000.0),
        rate: CutRate::cm2_s(40.0),
        commit: Length::m(0.03),
        hinge: Length::m(0.05),
    };
    let end = race(&still).unwrap();
    assert_eq!(end.seconds.value(), 0.0);
    assert_eq!(end.tilt.unwrap().value(), 0.0);
    let stopped = Race {
        rate: CutRate::ZERO,
        ..still
    };
    assert_eq!(race(&stopped), None);
}

/// Diameter, face, MOR in MPa, weight, forward, height, inertia, rate in cm²/s, hinge; then the
/// ligament at commit, seconds, tilt and ligament left.
const RACES: [([f64; 9], [f64; 4]); 4] = [
    (
        [0.45, 0.15, 57.0, 15_000.0, 1.0, 8.0, 140_000.0, 40.0, 0.045],
        [0.058_931_590_0, 1.558_814_79, 0.020_244_30, 0.045],
    ),
    (
        [0.45, 0.15, 57.0, 15_000.0, 1.4, 8.0, 140_000.0, 20.0, 0.045],
        [0.070_264_818_7, 5.530_151_95, FRAC_PI_2, 0.045_602_86],
    ),
    (
        [0.40, 0.13, 66.0, 14_000.0, 1.1, 7.5, 110_000.0, 30.0, 0.040],
        [0.059_210_949_6, 2.547_106_93, 0.117_783_11, 0.040],
    ),
    (
        [
            0.60, 0.20, 41.0, 30_000.0, 1.9, 10.5, 520_000.0, 25.0, 0.060,
        ],
        [0.118_484_527_6, 7.022_670_42, FRAC_PI_2, 0.089_209_37],
    ),
];
