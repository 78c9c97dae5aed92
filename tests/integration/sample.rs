//! Trees made up for the tests. They stand nowhere.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]

use stumpside::figures::{Crown, CrownInput, Saw, TreeInput, WayOut};
use stumpside::mechanics::escape::WayState;
use stumpside::mechanics::lean::Lean;
use stumpside::mechanics::wind::Leaf;
use stumpside::species;
use stumpside::units::{Angle, Bearing, CutRate, Length, Reading};

/// The few numbers in which the trees of the tests differ.
#[derive(Debug, Clone, Copy)]
pub struct Sample {
    pub species: &'static str,
    pub stump_cm: f64,
    pub dbh_cm: f64,
    pub height_m: f64,
    pub lean_deg: f64,
    /// North, east, south, west.
    pub radii_m: [f64; 4],
    pub base_m: f64,
    pub toward: f64,
    pub lay: f64,
}

/// A length with its spread, in metres.
pub fn metres(value: f64, spread: f64) -> Reading<Length> {
    Reading::new(Length::m(value), Length::m(spread))
}

/// The tree's input with a saw of 40 ± 6 cm²/s and a nose of 9 cm.
pub fn input(sample: Sample) -> TreeInput {
    let mut tree = TreeInput::new(
        species::find(sample.species).unwrap(),
        Bearing::deg(sample.lay),
    );
    tree.stump_along = Some(metres(sample.stump_cm / 100.0, 0.01));
    tree.stump_across = tree.stump_along;
    tree.dbh = Some(metres(sample.dbh_cm / 100.0, 0.01));
    tree.height = Some(Length::m(sample.height_m));
    tree.lean = Some(Lean {
        angle: Reading::new(Angle::deg(sample.lean_deg), Angle::deg(1.0)),
        toward: Bearing::deg(sample.toward),
        toward_spread: Angle::deg(5.0),
    });
    let radius = |index: usize| metres(sample.radii_m[index], 0.5);
    tree.crown = CrownInput::Measured(Crown {
        base: Length::m(sample.base_m),
        north: radius(0),
        east: radius(1),
        south: radius(2),
        west: radius(3),
        leaf: Leaf::Bare,
    });
    tree.saw = Some(Saw {
        bar: Length::cm(63.0),
        nose: Length::cm(9.0),
        kerf: Length::mm(8.0),
        rate: Reading::new(CutRate::cm2_s(40.0), CutRate::cm2_s(6.0)),
    });
    tree.ways_out = vec![
        WayOut {
            id: "A".to_owned(),
            bearing: Bearing::deg(sample.lay + 135.0),
            length: Length::m(8.0),
            state: WayState::Cleared,
        },
        WayOut {
            id: "B".to_owned(),
            bearing: Bearing::deg(sample.lay + 225.0),
            length: Length::m(8.0),
            state: WayState::Cleared,
        },
    ];
    tree.wedges = 3;
    tree
}

/// A mild leaner of middling size.
pub const MILD: Sample = Sample {
    species: "northern red oak",
    stump_cm: 42.0,
    dbh_cm: 37.0,
    height_m: 20.0,
    lean_deg: 2.0,
    radii_m: [3.0, 3.4, 3.0, 3.0],
    base_m: 8.0,
    toward: 90.0,
    lay: 90.0,
};
