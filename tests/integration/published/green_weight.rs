//! Dry to green by the national reference table of species.
//! Source: FIA reference table of species (opened), its own multipliers.

use super::{near, within};
use stumpside::mechanics::biomass::dry_mass;
use stumpside::species;
use stumpside::units::Length;

#[test]
fn the_tables_own_multiplier() {
    // The table's ten digits; the rows here carry moistures rounded to a tenth of a per cent.
    for (name, factor) in [
        ("coast Douglas-fir", 1.431_538_208_5),
        ("red maple", 1.649_996_656),
        ("white oak", 1.709_443_184),
        ("black cherry", 1.575_450_429),
        ("loblolly pine", 1.826_438_849),
    ] {
        let green = species::find(name).unwrap().green;
        near(green.factor, factor, 1.01e-4);
        near(green.reckoned_factor(), factor, 1.0e-3);
    }
}

#[test]
fn every_row_of_the_multiplier_follows_from_its_columns() {
    for one in species::all() {
        if one.green.code != 299 && one.green.code != 998 {
            near(one.green.reckoned_factor(), one.green.factor, 1.0e-3);
        }
    }
}

#[test]
fn densities_of_green_wood() {
    for (name, density) in [
        ("coast Douglas-fir", 609.0),
        ("ponderosa pine", 721.0),
        ("red maple", 801.0),
        ("white oak", 1010.0),
        ("yellow-poplar", 780.0),
        ("black cherry", 721.0),
        ("loblolly pine", 849.0),
    ] {
        near(
            species::find(name).unwrap().green.wood_density().value(),
            density,
            1.0,
        );
    }
}

#[test]
fn worked_green_masses() {
    // Source: worked from the same tables by an independent script.
    for (name, cm, dry, green) in [
        ("northern red oak", 45.0, 1413.01, 2609.24),
        ("loblolly pine", 35.0, 455.46, 831.88),
        ("yellow-poplar", 40.0, 797.38, 1588.11),
        ("black cherry", 40.0, 797.38, 1256.23),
        ("ponderosa pine", 60.0, 1692.09, 3027.32),
        ("quaking aspen", 30.0, 368.06, 825.67),
        ("coast Douglas-fir", 50.8, 1583.53, 2266.89),
    ] {
        let one = species::find(name).unwrap();
        let mass = dry_mass(one.group, Length::cm(cm)).unwrap();
        near(mass.value(), dry, 0.01);
        within(mass.value() * one.green.factor, green, 4e-5);
    }
}
