//! What must hold for every whole tree in range: no number that is none, the same figures after a
//! turn, mirrored ones in the mirror, and more lean never a better margin or a bolder method.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]

use proptest::prelude::*;
use stumpside::figures::{CrownInput, Layout, Model, Release, TreeFigures, TreeInput, figures};
use stumpside::method::{Choice, size_up, stump_of};
use stumpside::plan::step::{Cut, Edge, MethodName, Step, StepAct, Timing};
use stumpside::simulate::{Verdict, run};
use stumpside::species;
use stumpside::units::{Angle, Band, Bearing, CutRate, Length, Reading};

use crate::sample::{MILD, Sample, input};

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

fn close(one: f64, other: f64) -> bool {
    (one - other).abs() <= 1e-6 * one.abs().max(other.abs()).max(1e-3)
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
                prop_assert!(run.verdict != Verdict::Splits);
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
