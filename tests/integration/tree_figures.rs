//! The figures of made-up trees: what lowers a state, what a known weight or a cavity changes,
//! what is said where readings are missing.

use stumpside::figures::{
    CaseState, Condition, CrownInput, TreeFigures, TreeInput, Weigh, WoodState,
};
use stumpside::mechanics::section::Cavity;
use stumpside::method::{Choice, size_up};
use stumpside::species;
use stumpside::units::{Angle, Bearing, Length, Mass, Reading};

use crate::sample::{MILD, Sample, input, metres};

const BRISK: Sample = Sample {
    species: "white ash",
    stump_cm: 40.0,
    dbh_cm: 35.0,
    height_m: 19.0,
    lean_deg: 6.0,
    radii_m: [2.5, 3.5, 2.5, 2.0],
    ..MILD
};

#[test]
fn flags_lower_the_state_by_a_class() {
    let state = |change: &dyn Fn(&mut TreeInput)| {
        let mut tree = input(MILD);
        change(&mut tree);
        let cases = size_up(&tree).figures.cases;
        (cases.state, cases.lowered_by.len())
    };
    assert_eq!(state(&|_| {}), (CaseState::WithinLimit, 0));
    let lowered = (CaseState::NearLimit, 1);
    assert_eq!(state(&|tree| tree.wood_state = WoodState::Frozen), lowered);
    assert_eq!(state(&|tree| tree.wood_state = WoodState::Dead), lowered);
    assert_eq!(
        state(&|tree| tree.conditions.push(Condition::TensionWood)),
        lowered
    );
    let beech = species::find("American beech").unwrap();
    let leaning = |lean: f64| {
        let mut tree = input(Sample {
            lean_deg: lean,
            ..MILD
        });
        tree.species = beech;
        size_up(&tree).figures.cases.lowered_by.len()
    };
    assert_eq!((leaning(1.0), leaning(7.0)), (0, 1));
}

#[test]
fn a_known_weight_replaces_the_computed_one() {
    let mut tree = input(MILD);
    tree.weigh = Some(Weigh {
        mass: Reading::new(Mass::si(1_900.0), Mass::si(200.0)),
        offset: metres(0.6, 0.1),
        toward: Bearing::deg(90.0),
        height: Length::m(8.5),
    });
    let figures = size_up(&tree).figures;
    let mass = figures.mass.unwrap();
    assert!((mass.best.value() - 1_900.0).abs() < 1e-9);
    assert!(mass.low.value() < 1_650.0 && mass.high.value() > 2_150.0);
    let centre = figures.centre.unwrap();
    assert!((centre.forward.best.value() - 0.6).abs() < 1e-12);
    assert!((centre.height.high.value() - 8.5).abs() < 1e-12);
    let moment = figures.moment_inline.unwrap().best.value();
    assert!((moment - 1_900.0 * 9.80665 * 0.6).abs() < 1e-6);
    // Stem and crown are scaled to the mass given.
    let parts = figures.stem_mass.unwrap().best + figures.crown_mass.unwrap().best;
    assert!((parts.value() - 1_900.0).abs() < 1e-6);
    tree.crown = CrownInput::Missing;
    let figures = size_up(&tree).figures;
    assert!(figures.mass.is_some());
    assert_eq!(
        (figures.stem_mass, figures.fall, figures.wind_moment),
        (None, None, None)
    );
}

#[test]
fn a_cavity_weakens_the_hinge_and_shifts_nothing_else() {
    let sound = size_up(&input(MILD)).figures;
    let mut tree = input(MILD);
    tree.cavities.push(Cavity {
        diameter: Length::cm(10.0),
        forward: Length::cm(3.0),
        right: Length::cm(-4.0),
    });
    let hollow = size_up(&tree).figures;
    assert_eq!(sound.mass, hollow.mass);
    let area = |figures: &TreeFigures| figures.back_cut.unwrap().area.best;
    assert!(area(&hollow) < area(&sound));
    let ratio = |figures: &TreeFigures| figures.back_cut.unwrap().split_ratio_at_commit.best;
    assert!(ratio(&hollow) < ratio(&sound));
}

#[test]
fn the_same_digits_come_every_time_and_the_doubts_are_ranked() {
    let one = size_up(&input(BRISK));
    assert_eq!(one, size_up(&input(BRISK)));
    let doubts = &one.figures.doubts;
    let all: f64 = doubts.iter().map(|doubt| doubt.share).sum();
    assert!((all - 1.0).abs() < 0.02, "{all}");
    assert!(doubts.windows(2).all(|pair| pair[0].share >= pair[1].share));
    assert!(!doubts[0].input.how_to_shrink().is_empty());
}

#[test]
fn missing_readings_are_named_and_nothing_is_made_up() {
    let oak = species::find("white oak").unwrap();
    let answer = size_up(&TreeInput::new(oak, Bearing::deg(10.0)));
    assert_eq!(answer.choice, Choice::Refuse);
    assert_eq!(answer.figures.cases.state, CaseState::CannotSay);
    assert_eq!(answer.figures.mass, None);
    let said: Vec<&str> = answer
        .figures
        .why
        .iter()
        .map(|why| why.reason.as_str())
        .collect();
    for wanted in ["diameter at the cut", "height", "lean", "crown"] {
        assert!(
            said.iter().any(|reason| reason.contains(wanted)),
            "{said:?}"
        );
    }
    let mut tall = input(MILD);
    tall.height = Some(Length::m(400.0));
    let answer = size_up(&tall);
    assert!(answer.refused[0].reason.contains("400"));
    let mut deep = input(MILD);
    deep.overrides.face_depth = Some(Length::m(0.41));
    let answer = size_up(&deep);
    assert_eq!(answer.choice, Choice::Refuse);
    assert!(answer.refused[0].reason.contains("face depth"));
    let mut without_saw = input(MILD);
    without_saw.saw = None;
    let answer = size_up(&without_saw);
    assert_eq!(answer.figures.plunge, None);
    assert_eq!(answer.figures.brisk.unwrap().seconds_at_rate, None);
}

#[test]
fn a_lean_and_weight_that_no_trunk_carries_are_mis_measured() {
    let mut tree = input(MILD);
    tree.weigh = Some(Weigh {
        mass: Reading::new(Mass::si(9_000.0), Mass::si(500.0)),
        offset: metres(6.0, 0.2),
        toward: Bearing::deg(90.0),
        height: Length::m(9.0),
    });
    let answer = size_up(&tree);
    assert_eq!(answer.choice, Choice::Refuse);
    assert!(answer.refused[0].reason.contains("mis-measured"));
}

#[test]
fn a_face_that_closes_early_no_longer_protects_the_stem() {
    let state = |lean: f64, change: &dyn Fn(&mut TreeInput)| {
        let mut tree = input(Sample {
            lean_deg: lean,
            ..MILD
        });
        change(&mut tree);
        let cases = size_up(&tree).figures.cases;
        (cases.state, cases.lowered_by.len())
    };
    let narrow = |tree: &mut TreeInput| tree.overrides.opening = Some(Angle::deg(25.0));
    let bypass = |tree: &mut TreeInput| tree.bypass = Some(Length::mm(8.0));
    assert_eq!(state(1.0, &narrow), (CaseState::WithinLimit, 0));
    for close in [&narrow as &dyn Fn(&mut TreeInput), &bypass] {
        assert_eq!(state(5.0, close), (CaseState::NearLimit, 1));
        assert_eq!(state(14.0, close).0, CaseState::PastLimit);
    }
    assert_eq!(state(14.0, &|_| {}).1, 0);
}
