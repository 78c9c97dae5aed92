//! What must hold for every stump in range: more lean never a better margin, a thinner hinge never
//! a worse split ratio, scaling, ovals, and a faster saw never more tilt.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]

use proptest::prelude::*;
use stumpside::mechanics::holding::{
    Demand, FacedStem, Wood, hold_moment, ligament_section, meets_at,
};
use stumpside::mechanics::race::{Race, race, rate_needed};
use stumpside::mechanics::section::Stem;
use stumpside::mechanics::splitting::Slabs;
use stumpside::units::{Angle, CutRate, Force, FractureEnergy, Inertia, Length, Moment, Stress};

fn wood() -> impl Strategy<Value = Wood> {
    (30.0..95.0_f64, 5.0..13.0_f64, 200.0..800.0_f64).prop_map(|(mor, moe, energy)| Wood {
        mor: Stress::si(mor * 1.0e6),
        moe: Stress::si(moe * 1.0e9),
        g1c: FractureEnergy::si(energy),
        g2c: FractureEnergy::si(3.0 * energy),
    })
}

fn hinge_ratio(stem: &Stem, wood: &Wood, depths: (f64, f64)) -> f64 {
    let hinge = ligament_section(stem, Length::m(depths.0), Length::m(depths.1)).unwrap();
    let split = Slabs::at_edge(stem, hinge.rear).split_moment(wood).unwrap();
    split / hold_moment(&hinge, wood.mor)
}

/// Splitting over asked at commit, and the ligament there.
fn commit_ratio(stem: &Stem, wood: &Wood, forward: f64) -> (f64, Length) {
    let cut = FacedStem {
        stem,
        face_depth: stem.along() * 0.25,
    };
    let demand = Demand {
        weight: Force::si(15_000.0),
        forward: Length::m(forward),
        extra: Moment::ZERO,
    };
    let ligament = meets_at(&cut, wood, &demand, 1.0).max(stem.along() * 0.1);
    let standing = ligament_section(stem, cut.face_depth, ligament).unwrap();
    let asked = demand
        .about(standing.forward)
        .min(hold_moment(&standing, wood.mor));
    let split = Slabs::at_edge(stem, standing.rear).split_moment(wood);
    (split.map_or(f64::MAX, |split| split / asked), ligament)
}

fn close(one: f64, other: f64) -> bool {
    (one - other).abs() <= 1e-6 * one.abs().max(other.abs()).max(1e-3)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(48))]

    #[test]
    fn more_lean_is_never_a_better_margin(
        wood in wood(),
        diameter in 0.25..1.0_f64,
        forward in 0.3..1.5_f64,
        more in 0.01..0.5_f64,
    ) {
        let stem = Stem::new(Length::m(diameter), Length::m(diameter)).unwrap();
        let (less, _) = commit_ratio(&stem, &wood, forward);
        let (worse, ligament) = commit_ratio(&stem, &wood, forward + more);
        // A tree near to breaking its trunk commits with half of it uncut: there the ratio at
        // commit alone rises again, and the margin is the least that follows.
        prop_assume!(ligament < stem.along() * 0.45);
        prop_assert!(worse <= less * (1.0 + 1e-9), "{less} {worse}");
    }

    #[test]
    fn a_thinner_hinge_is_never_a_worse_split_ratio(
        wood in wood(),
        diameter in 0.2..1.4_f64,
        face in 0.15..0.34_f64,
        hinge in 0.05..0.15_f64,
    ) {
        let stem = Stem::new(Length::m(diameter), Length::m(diameter)).unwrap();
        let thick = hinge_ratio(&stem, &wood, (face * diameter, hinge * diameter));
        let thin = hinge_ratio(&stem, &wood, (face * diameter, 0.9 * hinge * diameter));
        prop_assert!(thin >= thick, "{thick} {thin}");
    }

    #[test]
    fn a_scaled_hinge_splits_by_the_root_of_its_size(
        wood in wood(),
        diameter in 0.2..0.6_f64,
        scale in 1.1..3.0_f64,
    ) {
        let ratio = |size: f64| {
            let stem = Stem::new(Length::m(size), Length::m(size)).unwrap();
            hinge_ratio(&stem, &wood, (0.25 * size, 0.1 * size))
        };
        prop_assert!(close(ratio(diameter), ratio(scale * diameter) * scale.sqrt()));
    }

    #[test]
    fn an_oval_across_is_a_circle_made_wider(
        wood in wood(),
        along in 0.2..1.0_f64,
        wider in 0.7..1.4_f64,
    ) {
        let round = Stem::new(Length::m(along), Length::m(along)).unwrap();
        let oval = Stem::new(Length::m(along), Length::m(along * wider)).unwrap();
        let depths = (0.25 * along, 0.1 * along);
        prop_assert!(close(hinge_ratio(&round, &wood, depths), hinge_ratio(&oval, &wood, depths)));
    }

    #[test]
    fn a_faster_saw_never_leaves_more_tilt(
        forward in 0.8..1.6_f64,
        rate in 10.0..60.0_f64,
        faster in 1.05..2.0_f64,
    ) {
        let stem = Stem::new(Length::cm(45.0), Length::cm(45.0)).unwrap();
        let tilt = |rate: f64| race(&of_rate(&stem, forward, rate)).unwrap().tilt
            .map_or(f64::MAX, |tilt| tilt.value());
        prop_assert!(tilt(rate * faster) <= tilt(rate) + 1e-12);
        // The rate needed is the one that just keeps the limit.
        if let Some(needed) = rate_needed(&of_rate(&stem, forward, rate), Angle::deg(5.0)) {
            let kept = tilt(needed.value() * 1.0e4);
            prop_assert!((kept - Angle::deg(5.0).value()).abs() < 1e-6, "{kept}");
        }
    }
}

fn of_rate(stem: &Stem, forward: f64, rate: f64) -> Race<'_> {
    let wood = Wood {
        mor: Stress::si(57.0e6),
        moe: Stress::si(9.3e9),
        g1c: FractureEnergy::si(350.0),
        g2c: FractureEnergy::si(1050.0),
    };
    let cut = FacedStem {
        stem,
        face_depth: stem.along() / 3.0,
    };
    let demand = Demand {
        weight: Force::si(15_000.0),
        forward: Length::m(forward),
        extra: Moment::ZERO,
    };
    Race {
        cut,
        mor: wood.mor,
        demand,
        height: Length::m(8.0),
        inertia: Inertia::si(140_000.0),
        rate: CutRate::cm2_s(rate),
        commit: meets_at(&cut, &wood, &demand, 1.0),
        hinge: stem.along() * 0.1,
    }
}
