//! One table of every quantity in the plan: its kind of unit, its range, its default spread.
//! Decoding, messages and hints come from it. It never reads a plan.

use crate::plan::quantity::Kind;

/// The spread used where the author wrote none.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum DefaultSpread {
    /// Nothing: a figure that is set, not measured.
    Exact,
    /// One standard deviation in the SI unit.
    Absolute(f64),
    /// One standard deviation as a share of the value.
    Share(f64),
}

/// A quantity's row in the table. Range in the SI unit of its kind, ends included.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Field {
    /// Its route, `[]` for a place in a list.
    pub route: &'static str,
    /// Its kind of unit.
    pub kind: Kind,
    /// Smallest value.
    pub least: f64,
    /// Largest value.
    pub most: f64,
    /// Spread where none is written.
    pub spread: DefaultSpread,
}

const fn field(route: &'static str, kind: Kind, range: (f64, f64), spread: DefaultSpread) -> Field {
    Field {
        route,
        kind,
        least: range.0,
        most: range.1,
        spread,
    }
}

use DefaultSpread::{Absolute, Exact, Share};

const DEG: f64 = std::f64::consts::PI / 180.0;

/// Every quantity of format 1. Ranges are what a person could mean, wide; default spreads are our
/// judgement of careful field measuring (a tape around the stem, a clinometer on a real stem
/// within one degree, heights within five per cent).
pub const FIELDS: &[Field] = &[
    field("tolerances.hinge", Kind::Length, (0.001, 0.05), Exact),
    field("tolerances.depth", Kind::Length, (0.001, 0.1), Exact),
    field("tolerances.diameter", Kind::Length, (0.005, 0.2), Exact),
    field(
        "tolerances.bearing",
        Kind::Angle,
        (0.5 * DEG, 45.0 * DEG),
        Exact,
    ),
    field("emergency.drive", Kind::Time, (0.0, 172_800.0), Exact),
    field("emergency.check_in", Kind::Time, (60.0, 28_800.0), Exact),
    field("limits.wind", Kind::Speed, (0.0, 40.0), Exact),
    field("limits.gust", Kind::Speed, (0.0, 60.0), Exact),
    field("limits.expected", Kind::Speed, (0.0, 40.0), Exact),
    field("saws[].bar", Kind::Length, (0.15, 2.5), Exact),
    field("saws[].nose", Kind::Length, (0.03, 0.2), Exact),
    field("saws[].kerf", Kind::Length, (0.003, 0.02), Exact),
    field(
        "saws[].displacement",
        Kind::SweptVolume,
        (20.0e-6, 200.0e-6),
        Exact,
    ),
    field(
        "saws[].rate",
        Kind::CutRate,
        (2.0e-4, 200.0e-4),
        Share(0.15),
    ),
    field(
        "site.slope.grade",
        Kind::Slope,
        (0.0, 70.0 * DEG),
        Absolute(1.0 * DEG),
    ),
    field(
        "site.features[].voltage",
        Kind::Voltage,
        (0.0, 1.5e6),
        Exact,
    ),
    field(
        "site.features[].radius",
        Kind::Length,
        (0.0, 5_000.0),
        Exact,
    ),
    field(
        "position",
        Kind::Length,
        (-20_000.0, 20_000.0),
        Absolute(1.0),
    ),
    field("trees[].dbh", Kind::Length, (0.03, 4.0), Absolute(0.01)),
    field("trees[].stump", Kind::Length, (0.03, 5.0), Absolute(0.01)),
    field("trees[].height", Kind::Length, (1.5, 120.0), Share(0.05)),
    field(
        "trees[].lean.angle",
        Kind::Angle,
        (0.0, 60.0 * DEG),
        Absolute(1.0 * DEG),
    ),
    field(
        "trees[].lean.view_a",
        Kind::Angle,
        (-60.0 * DEG, 60.0 * DEG),
        Absolute(1.0 * DEG),
    ),
    field(
        "trees[].lean.view_b",
        Kind::Angle,
        (-60.0 * DEG, 60.0 * DEG),
        Absolute(1.0 * DEG),
    ),
    field(
        "trees[].crown.base",
        Kind::Length,
        (0.0, 110.0),
        Share(0.10),
    ),
    field(
        "trees[].crown.radii",
        Kind::Length,
        (0.0, 30.0),
        Share(0.10),
    ),
    field(
        "trees[].defects[].size",
        Kind::Length,
        (0.001, 5.0),
        Absolute(0.02),
    ),
    field(
        "trees[].defects[].offset",
        Kind::Length,
        (-3.0, 3.0),
        Absolute(0.02),
    ),
    field(
        "trees[].weigh.mass",
        Kind::Mass,
        (1.0, 300_000.0),
        Share(0.15),
    ),
    field(
        "trees[].weigh.centre.offset",
        Kind::Length,
        (0.0, 40.0),
        Share(0.15),
    ),
    field(
        "trees[].weigh.centre.height",
        Kind::Length,
        (0.1, 100.0),
        Share(0.05),
    ),
    field("trees[].wood.mor", Kind::Stress, (5.0e6, 250.0e6), Exact),
    field("trees[].wood.moe", Kind::Stress, (1.0e9, 40.0e9), Exact),
    field(
        "trees[].wood.density",
        Kind::Density,
        (180.0, 1_400.0),
        Exact,
    ),
    field(
        "trees[].wood.g1c",
        Kind::FractureEnergy,
        (20.0, 3_000.0),
        Exact,
    ),
    field("trees[].face.depth", Kind::Length, (0.005, 3.0), Exact),
    field(
        "trees[].face.opening",
        Kind::Angle,
        (10.0 * DEG, 130.0 * DEG),
        Exact,
    ),
    field("trees[].hinge.thickness", Kind::Length, (0.003, 1.0), Exact),
    field("trees[].back_cut.height", Kind::Length, (-0.5, 0.6), Exact),
    field("trees[].strap.thickness", Kind::Length, (0.005, 1.5), Exact),
    field(
        "trees[].ways_out[].length",
        Kind::Length,
        (0.5, 200.0),
        Exact,
    ),
    field("trees[].line.height", Kind::Length, (1.0, 100.0), Exact),
    field(
        "trees[].line.load_limit",
        Kind::Force,
        (100.0, 2.0e6),
        Exact,
    ),
    field("crew[].fells_up_to", Kind::Length, (0.03, 5.0), Exact),
    field("trees[].steps[].depth", Kind::Length, (0.001, 5.0), Exact),
    field(
        "trees[].steps[].opening",
        Kind::Angle,
        (10.0 * DEG, 130.0 * DEG),
        Exact,
    ),
    field(
        "trees[].steps[].from_hinge",
        Kind::Length,
        (0.0, 5.0),
        Exact,
    ),
    field("trees[].steps[].from_rear", Kind::Length, (0.0, 5.0), Exact),
    field("trees[].steps[].to_hinge", Kind::Length, (0.0, 5.0), Exact),
    field("trees[].steps[].to_rear", Kind::Length, (0.0, 5.0), Exact),
    field("trees[].steps[].hinge", Kind::Length, (0.0, 5.0), Exact),
    field("trees[].steps[].width", Kind::Length, (0.001, 5.0), Exact),
    field(
        "trees[].steps[].tilt",
        Kind::Angle,
        (0.0, 60.0 * DEG),
        Exact,
    ),
    field("trees[].steps[].seconds", Kind::Time, (0.0, 3_600.0), Exact),
];

/// The row of a route whose list places are written `[]`.
pub fn find(route: &str) -> Option<&'static Field> {
    FIELDS.iter().find(|f| f.route == route)
}
