//! What must hold for every tree in range: more lean never a better margin, a thinner hinge never
//! a worse split ratio, scaling, mirror image, rotation, and no number that is none.
#![expect(
    clippy::unwrap_used,
    reason = "helpers of tests stand outside the test functions"
)]

use proptest::prelude::*;
use stumpside::figures::{CrownInput, Layout, Model, Release, TreeFigures, TreeInput, figures};
use stumpside::mechanics::holding::{
    Demand, FacedStem, Wood, hold_moment, ligament_section, meets_at,
};
use stumpside::mechanics::race::{Race, race, rate_needed};
use stumpside::mechanics::section::Stem;
use stumpside::mechanics::splitting::Slabs;
use stumpside::method::{Choice, size_up, stump_of};
use stumpside::plan::step::{Cut, Edge, MethodName, Step, StepAct, Timing};
use stumpside::simulate::run;
use stumpside::species;
use stumpside::units::{
    Angle, Band, Bearing, CutRate, Force, FractureEnergy, Inertia, Length, Moment, Reading, Stress,
};

use crate::sample::{MILD, Sample, input};

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

fn plain_layout(along: f64) -> Layout {
    Layout {
        method: MethodName::BriskBackCut,
        face_depth: Length::m(along * 0.3),
        opening: Angle::deg(70.0),
        hinge: Length::m(along * 0.1),
        back_cut_height: Length::cm(3.0),
        strap: Length::m(along * 0.1),
        release: Release::FromRear,
    }
}

fn figures_of(tree: &TreeInput) -> TreeFigures {
    let along = tree.stump_along.unwrap().value.value();
    let model = Model::new(tree).unwrap();
    figures(tree, Ok(&model), Some(&plain_layout(along)))
}

fn close(one: f64, other: f64) -> bool {
    (one - other).abs() <= 1e-6 * one.abs().max(other.abs()).max(1e-3)
}

fn same_band(one: Band<f64>, other: Band<f64>) -> bool {
    close(one.low, other.low) && close(one.best, other.best) && close(one.high, other.high)
}

fn mirrored(band: Band<f64>) -> Band<f64> {
    Band {
        low: -band.high,
        best: -band.best,
        high: -band.low,
    }
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

fn tree() -> impl Strategy<Value = TreeInput> {
    (
        0..species::all().len(),
        20.0..90.0_f64,
        0.0..15.0_f64,
        0.0..360.0_f64,
        (0.0..360.0_f64, 0.5..6.0_f64, 0.5..6.0_f64),
    )
        .prop_map(|(index, stump, lean, toward, (lay, one, other))| {
            input(Sample {
                species: species::all()[index].table_name,
                stump_cm: stump,
                dbh_cm: 0.88 * stump,
                height_m: 8.0 + 0.3 * stump,
                lean_deg: lean,
                radii_m: [one, other, 3.0, 2.0],
                base_m: 4.0,
                toward,
                lay,
            })
        })
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(12))]

    #[test]
    fn no_tree_in_range_gives_a_number_that_is_none(tree in tree()) {
        let answer = size_up(&tree);
        let figures = &answer.figures;
        let mut numbers = Vec::new();
        let mut band = |band: Band<f64>| numbers.extend([band.low, band.best, band.high]);
        band(figures.mass.unwrap().map(|it| it.value()));
        band(figures.moment_inline.unwrap().map(|it| it.value()));
        band(figures.effective_lean.unwrap().map(|it| it.value()));
        let back_cut = figures.back_cut.unwrap();
        band(back_cut.area.map(|it| it.value()));
        band(back_cut.commit_ligament.map(|it| it.value()));
        band(back_cut.split_ratio_at_commit);
        band(figures.brisk.unwrap().seconds_at_rate.unwrap().map(|it| it.value()));
        prop_assert!(numbers.iter().all(|number| number.is_finite()), "{numbers:?}");
        prop_assert!(figures.cases.margins.iter().all(|margin| !margin.is_nan()));
        // What is proposed comes with steps that the virtual stump does not split on.
        match answer.choice {
            Choice::Proposed(_) => {
                let run = answer.run.unwrap();
                prop_assert!(run.verdict != stumpside::simulate::Verdict::Splits);
                prop_assert!(!answer.steps.is_empty() && !answer.reasons.is_empty());
            }
            Choice::Refuse => prop_assert!(!answer.refused.is_empty()),
        }
    }

    #[test]
    fn the_whole_plan_turned_gives_the_same_figures(tree in tree(), quarters in 1..4_i32) {
        let mut turned = tree.clone();
        let by = Angle::deg(90.0 * f64::from(quarters));
        turned.lay = tree.lay.turned(by);
        let mut lean = tree.lean.unwrap();
        lean.toward = lean.toward.turned(by);
        turned.lean = Some(lean);
        let CrownInput::Measured(mut crown) = tree.crown else { panic!("measured") };
        for _ in 0..quarters {
            (crown.north, crown.east, crown.south, crown.west) =
                (crown.west, crown.north, crown.east, crown.south);
        }
        turned.crown = CrownInput::Measured(crown);
        let (one, other) = (figures_of(&tree), figures_of(&turned));
        assert_alike(&one, &other, |band| band);
        prop_assert_eq!(one.cases.state, other.cases.state);
    }

    #[test]
    fn the_mirror_image_has_mirrored_figures(tree in tree()) {
        let mut image = tree.clone();
        let about = |bearing: Bearing| Bearing::deg(-bearing.in_deg());
        image.lay = about(tree.lay);
        let mut lean = tree.lean.unwrap();
        lean.toward = about(lean.toward);
        image.lean = Some(lean);
        let CrownInput::Measured(mut crown) = tree.crown else { panic!("measured") };
        (crown.east, crown.west) = (crown.west, crown.east);
        image.crown = CrownInput::Measured(crown);
        let (one, other) = (figures_of(&tree), figures_of(&image));
        assert_alike(&one, &other, mirrored);
        prop_assert_eq!(one.cases.state, other.cases.state);
    }

    #[test]
    fn cuts_fixed_by_a_plan_never_panic(
        tree in tree(),
        depths in (0.0..1.0_f64, 0.0..0.6_f64, 0.0..0.6_f64),
        method in 0..MethodName::ALL.len(),
    ) {
        let mut tree = tree;
        tree.overrides.face_depth = Some(Length::m(depths.0));
        tree.overrides.hinge = Some(Length::m(depths.1));
        tree.overrides.strap = Some(Length::m(depths.2));
        tree.overrides.method = Some(MethodName::ALL[method]);
        let answer = size_up(&tree);
        match answer.choice {
            Choice::Proposed(by_hand) => prop_assert_eq!(by_hand, MethodName::ALL[method]),
            Choice::Refuse => prop_assert!(!answer.refused.is_empty()),
        }
    }

    #[test]
    fn hand_written_steps_never_panic(
        tree in tree(),
        cuts in prop::collection::vec((0..9_i32, -0.1..1.2_f64, -0.1..1.2_f64), 0..8),
    ) {
        let stump = stump_of(&tree).unwrap();
        let steps: Vec<Step> = cuts.into_iter().map(any_step).collect();
        if let Ok(run) = run(&stump, &steps) {
            for state in &run.states {
                prop_assert!(state.remaining_area.value() >= 0.0);
            }
        }
    }
}

fn any_step((kind, one, other): (i32, f64, f64)) -> Step {
    let (one, other) = (Length::m(one), Length::m(other));
    let opening = Angle::deg(60.0);
    let cut = match kind {
        0 => Cut::FaceSlope {
            depth: one,
            opening,
        },
        1 => Cut::FaceFloor { depth: one },
        2 => Cut::Plunge {
            front: Edge::FromHinge(one),
            rear: Edge::FromRear(other),
        },
        3 => Cut::HingeTrim { hinge: one },
        4 => Cut::BackCut {
            to: Edge::FromHinge(one),
        },
        5 => Cut::TiltedBackCut {
            to: Edge::FromRear(one),
            tilt: opening,
        },
        6 => Cut::ReliefLeft {
            width: one,
            to: Edge::FromHinge(other),
        },
        7 => Cut::ReliefRight {
            width: one,
            to: Edge::FromRear(other),
        },
        _ => Cut::StrapRelease,
    };
    Step {
        act: StepAct::Cut(cut),
        timing: Timing::AtLeisure,
        seconds: None,
        note: None,
    }
}

/// Two trees' figures along the lay are alike, and those across it after a change.
fn assert_alike(one: &TreeFigures, other: &TreeFigures, across: impl Fn(Band<f64>) -> Band<f64>) {
    let along = |figures: &TreeFigures| {
        let back_cut = figures.back_cut.unwrap();
        [
            figures.mass.unwrap().map(|it| it.value()),
            figures.moment_inline.unwrap().map(|it| it.value()),
            figures.centre.unwrap().forward.map(|it| it.value()),
            back_cut.commit_ligament.map(|it| it.value()),
            back_cut.split_ratio_at_commit,
        ]
    };
    for (one, other) in along(one).into_iter().zip(along(other)) {
        assert!(same_band(one, other), "{one:?} {other:?}");
    }
    let side = |figures: &TreeFigures| figures.moment_side.unwrap().map(|it| it.value());
    assert!(
        same_band(across(side(one)), side(other)),
        "{:?} {:?}",
        side(one),
        side(other)
    );
}

#[test]
fn more_lean_never_lets_a_margin_of_the_whole_tree_grow() {
    for stump_cm in [24.0, 42.0, 80.0] {
        let mut before = (f64::MAX, f64::MAX);
        // On to leans at which the trunk itself is near breaking.
        for halves in 0..80 {
            let figures = figures_of(&input(Sample {
                stump_cm,
                dbh_cm: 0.88 * stump_cm,
                lean_deg: 2.0 + 0.5 * f64::from(halves),
                ..MILD
            }));
            let now = (
                figures.worst.unwrap().split_ratio,
                figures.cases.margins[10],
            );
            assert!(
                now.0 <= before.0 * (1.0 + 1e-6) && now.1 <= before.1 * (1.0 + 1e-6),
                "{stump_cm} cm, step {halves}: {now:?} after {before:?}"
            );
            before = now;
        }
    }
}

#[test]
fn no_more_guarded_method_turns_less_guarded_with_more_lean_or_a_slower_saw() {
    let rank = |choice: Choice| match choice {
        Choice::Proposed(MethodName::StraightBackCut) => 0,
        Choice::Proposed(MethodName::BriskBackCut) => 1,
        Choice::Proposed(
            MethodName::PlungeWithStrap
            | MethodName::TiltedBackCut
            | MethodName::SideRelievedBackCut,
        ) => 2,
        Choice::Proposed(MethodName::WedgedBackCut | MethodName::RiggedBackCut)
        | Choice::Refuse => 3,
    };
    for species in ["northern red oak", "coast Douglas-fir", "white ash"] {
        for stump_cm in [22.0, 38.0, 60.0] {
            let tree = |lean_deg: f64, rate: f64| {
                let mut tree = input(Sample {
                    species,
                    stump_cm,
                    dbh_cm: 0.88 * stump_cm,
                    lean_deg,
                    ..MILD
                });
                tree.saw.as_mut().unwrap().rate =
                    Reading::new(CutRate::cm2_s(rate), CutRate::cm2_s(0.15 * rate));
                rank(size_up(&tree).choice)
            };
            let leans = [2.0, 4.0, 7.0, 11.0, 16.0];
            let ranks: Vec<i32> = leans.iter().map(|lean| tree(*lean, 40.0)).collect();
            assert!(ranks.is_sorted(), "{species} {stump_cm}: {ranks:?}");
            assert!(tree(5.0, 25.0) >= tree(5.0, 50.0), "{species} {stump_cm}");
        }
    }
}
