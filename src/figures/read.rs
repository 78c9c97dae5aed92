//! From readings to plain numbers: ranges, masses by two routes, the leaning axis, the crown in
//! the wind. What is missing or out of range comes back as a reason, never as a guess.

use crate::figures::input::{Condition, Crown, CrownInput, TreeInput, WoodState};
use crate::figures::model::{Axis, CannotSay, CrownBody, ONE_SIDED_95, Parts, Scale, Tree};
use crate::mechanics::biomass::{dry_mass, shares};
use crate::mechanics::centre::{CrownRadii, PlanOffset, crown_offset, crown_shape};
use crate::mechanics::fall::CROWN_GYRATION;
use crate::mechanics::section::Stem;
use crate::mechanics::stem::{FORM_FACTOR, FORM_FACTOR_SPREAD, PROFILE, green_mass};
use crate::mechanics::wind::{drag, drag_coefficient, frontal_area};
use crate::units::{Length, Reading};

/// The least doubt of a mass, one standard deviation of its logarithm: the form factor's.
const MASS_DOUBT_MIN: f64 = FORM_FACTOR_SPREAD / FORM_FACTOR;

pub(super) fn spread(reading: Option<Reading<Length>>) -> f64 {
    reading.map_or(0.0, |reading| reading.spread.value().abs())
}

fn ranged(
    what: &'static str,
    unit: &'static str,
    value: f64,
    range: (f64, f64),
) -> Result<f64, CannotSay> {
    let (least, most) = range;
    if value < least || value > most {
        return Err(CannotSay::OutOfRange {
            what,
            value,
            unit,
            least,
            most,
        });
    }
    Ok(value)
}

pub(super) fn stump(input: &TreeInput) -> Result<Stem, CannotSay> {
    let along = input
        .stump_along
        .or(input.stump_across)
        .ok_or(CannotSay::Missing("diameter at the cut"))?;
    let across = input.stump_across.unwrap_or(along);
    for reading in [along, across] {
        ranged(
            "diameter at the cut",
            "cm",
            reading.value.in_cm(),
            (5.0, 400.0),
        )?;
    }
    planned_cuts(input, along.value)?;
    let mut stem = Stem::new(along.value, across.value)?;
    for cavity in &input.cavities {
        stem = stem.with_cavity(*cavity)?;
    }
    Ok(stem)
}

/// Depths the plan fixes must leave a face, a hinge and wood behind it.
fn planned_cuts(input: &TreeInput, along: Length) -> Result<(), CannotSay> {
    let cuts = &input.overrides;
    let diameter = along.in_cm();
    let face = cuts.face_depth.map_or(0.0, Length::in_cm);
    if cuts.face_depth.is_some() {
        ranged("face depth", "cm", face, (0.5, 0.9 * diameter))?;
    }
    if let Some(hinge) = cuts.hinge {
        let most = (diameter - face) * 0.9;
        ranged("hinge thickness", "cm", hinge.in_cm(), (0.5, most))?;
    }
    if let Some(strap) = cuts.strap {
        ranged(
            "strap thickness",
            "cm",
            strap.in_cm(),
            (0.5, 0.9 * diameter),
        )?;
    }
    Ok(())
}

pub(super) fn tree(input: &TreeInput) -> Result<Tree, Vec<CannotSay>> {
    let parts = parts(input);
    if let Some(weigh) = &input.weigh {
        let mass = ranged("mass", "kg", weigh.mass.value.value(), (1.0, 500_000.0));
        let height = ranged(
            "height of the centre of weight",
            "m",
            weigh.height.value(),
            (0.1, 120.0),
        );
        let (mass, height) = match (mass, height) {
            (Ok(mass), Ok(height)) => (mass, height),
            (mass, height) => {
                return Err([mass.err(), height.err()].into_iter().flatten().collect());
            }
        };
        return Ok(Tree::Weighed(
            Scale {
                mass,
                mass_doubt: log_spread(weigh.mass.spread.value().abs() / mass),
                offset: weigh.offset.value.value(),
                offset_spread: weigh.offset.spread.value().abs(),
                turn: input.lay.turn_to(weigh.toward).value(),
                height,
            },
            parts.ok(),
        ));
    }
    match (parts, axis(input)) {
        (Ok(parts), Ok(axis)) => Ok(Tree::Built(parts, axis)),
        (parts, axis) => {
            let mut reasons = parts.err().unwrap_or_default();
            reasons.extend(axis.err());
            Err(reasons)
        }
    }
}

/// The standard deviation of the logarithm for a coefficient of variation.
pub(super) fn log_spread(variation: f64) -> f64 {
    libm::log(1.0 + variation * variation).sqrt()
}

fn parts(input: &TreeInput) -> Result<Parts, Vec<CannotSay>> {
    let height = input
        .height
        .ok_or(CannotSay::Missing("height"))
        .and_then(|height| ranged("height", "m", height.value(), (1.5, 120.0)));
    let dbh = input
        .dbh
        .ok_or(CannotSay::Missing("diameter at breast height"))
        .and_then(|dbh| {
            ranged(
                "diameter at breast height",
                "cm",
                dbh.value.in_cm(),
                (2.5, 400.0),
            )
            .map(|_| dbh)
        });
    let crown = match input.crown {
        CrownInput::Measured(crown) => Ok(Some(crown)),
        CrownInput::NoCrown => Ok(None),
        CrownInput::Missing => Err(CannotSay::Missing("crown base with four radii")),
    };
    let (height, dbh, crown) = match (height, dbh, crown) {
        (Ok(height), Ok(dbh), Ok(crown)) => (height, dbh, crown),
        (height, dbh, crown) => {
            return Err([height.err(), dbh.err(), crown.err()]
                .into_iter()
                .flatten()
                .collect());
        }
    };
    let base = crown.map_or(height, |crown: Crown| crown.base.value());
    if let Err(reason) = ranged("crown's base", "m", base, (0.0, height)) {
        return Err(vec![reason]);
    }
    let (total, stem_share, doubt) = masses(input, dbh.value, height).map_err(|it| vec![it])?;
    let shape = crown_shape(input.species.wood_type);
    let stem = total * stem_share;
    Ok(Parts {
        stem,
        crown: if crown.is_some() { total - stem } else { 0.0 },
        stem_height: height / (PROFILE + 2.0),
        crown_height: base + shape.height * (height - base),
        top: height,
        gyration: CROWN_GYRATION * (height - base),
        mass_doubt: doubt,
        dbh_doubt: dbh.spread.value().abs() / dbh.value.value(),
    })
}

/// The green mass by the two routes, each whole with its stem.
fn routes(input: &TreeInput, dbh: Length, height: f64) -> Option<[(f64, f64); 2]> {
    let green = &input.species.green;
    let by_diameter = dry_mass(input.species.group, dbh).ok()?.value() * green.factor;
    let crown = by_diameter * shares(input.species.wood_type, dbh).ok()?.crown();
    let stem = green_mass(green, dbh, Length::m(height)).value();
    Some([(by_diameter, by_diameter - crown), (stem + crown, stem)])
}

/// The larger of the two masses, the stem's share of it, and its doubt.
fn masses(input: &TreeInput, dbh: Length, height: f64) -> Result<(f64, f64, f64), CannotSay> {
    let [one, other] =
        routes(input, dbh, height).ok_or(CannotSay::Missing("diameter of 2.5 cm or more"))?;
    let (larger, smaller) = if one.0 >= other.0 {
        (one, other)
    } else {
        (other, one)
    };
    let apart = libm::log(larger.0 / smaller.0) / ONE_SIDED_95;
    Ok((larger.0, larger.1 / larger.0, apart.max(MASS_DOUBT_MIN)))
}

pub(super) fn two_masses(input: &TreeInput) -> Option<(f64, f64)> {
    let [one, other] = routes(input, input.dbh?.value, input.height?.value())?;
    Some((one.0, other.0))
}

fn axis(input: &TreeInput) -> Result<Axis, CannotSay> {
    let lean = input.lean.ok_or(CannotSay::Missing("lean"))?;
    ranged("lean", "deg", lean.angle.value.in_deg(), (0.0, 45.0))?;
    let (crown, crown_spread) = match input.crown {
        CrownInput::Measured(crown) => offset_along(input, &crown),
        CrownInput::NoCrown | CrownInput::Missing => ((0.0, 0.0), (0.0, 0.0)),
    };
    Ok(Axis {
        lean: lean.angle.value.value(),
        lean_spread: lean.angle.spread.value().abs(),
        turn: input.lay.turn_to(lean.toward).value(),
        turn_spread: lean.toward_spread.value().abs(),
        crown,
        crown_spread,
    })
}

fn radii(crown: &Crown) -> CrownRadii {
    CrownRadii {
        north: crown.north.value,
        east: crown.east.value,
        south: crown.south.value,
        west: crown.west.value,
    }
}

/// The crown's offset along and across the lay, and the spread of each.
fn offset_along(input: &TreeInput, crown: &Crown) -> ((f64, f64), (f64, f64)) {
    let shape = crown_shape(input.species.wood_type);
    let (forward, right) = crown_offset(shape, &radii(crown)).along(input.lay);
    let of = |one: Reading<Length>, other: Reading<Length>| {
        shape.offset * libm::hypot(one.spread.value(), other.spread.value())
    };
    let (east, north) = (of(crown.east, crown.west), of(crown.north, crown.south));
    let (sine, cosine) = input.lay.east_north();
    (
        (forward.value(), right.value()),
        (
            libm::hypot(east * sine, north * cosine),
            libm::hypot(east * cosine, north * sine),
        ),
    )
}

pub(super) fn crown_body(input: &TreeInput) -> Option<CrownBody> {
    let (CrownInput::Measured(crown), Some(height)) = (input.crown, input.height) else {
        return None;
    };
    let length = (height - crown.base).max(Length::ZERO);
    let area = frontal_area(input.species.wood_type, &radii(&crown), length);
    (length > Length::ZERO).then(|| CrownBody {
        base: crown.base.value(),
        length: length.value(),
        width: area.value() / length.value(),
        coefficient: drag_coefficient(input.species.wood_type, crown.leaf),
    })
}

/// The moment of the expected wind along the lay or against it.
pub(super) fn wind_moment(input: &TreeInput, crown: Option<CrownBody>) -> f64 {
    crown.map_or(0.0, |crown| {
        let area = Length::m(crown.width) * Length::m(crown.length);
        let shape = crown_shape(input.species.wood_type);
        drag(crown.coefficient, area, input.wind_expected).value()
            * (crown.base + shape.height * crown.length)
    })
}

pub(super) fn condition(input: &TreeInput) -> Option<CannotSay> {
    [
        (Condition::RotAtHinge, "rot at the hinge"),
        (Condition::Crack, "a crack in the trunk"),
        (Condition::Shake, "ring shake"),
        (Condition::Fork, "a fork or included bark at the cut"),
        (Condition::Hollow, "a hollow beyond the model's range"),
        (Condition::Insects, "insect damage at the cut"),
        (Condition::Roots, "damaged roots"),
    ]
    .into_iter()
    .find(|(condition, _)| input.has(*condition))
    .map(|(_, words)| CannotSay::Condition(words))
}

/// How many times stronger against bending the wood is than its green value says, by its state.
pub(super) fn state_factor(state: WoodState) -> f64 {
    match state {
        WoodState::Live => 1.0,
        // Dry wood is half as strong again: ash 66 to 103 MPa (Wood Handbook, opened).
        WoodState::Dead => 1.5,
        // Green lumber at −18 °C: 1.34 (Wood Handbook, Table 5-16, opened).
        WoodState::Frozen => 1.34,
    }
}

/// A plan offset kept for callers that lay out a line.
pub(super) fn plan_along(input: &TreeInput, east: Length, north: Length) -> (f64, f64) {
    let (forward, right) = PlanOffset { east, north }.along(input.lay);
    (forward.value(), right.value())
}
