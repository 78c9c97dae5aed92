//! The biomass equations against their printed figures.
//! Source: Jenkins and others 2003, Tables 4 and 6 (opened in copies); the masses worked
//! from them; two examples of a height-aware method, GTR-WO-104 (2024), as cross-checks.

use super::near;
use stumpside::mechanics::biomass::{BiomassError, dry_mass, shares};
use stumpside::mechanics::stem::green_mass;
use stumpside::species::{self, BiomassGroup, WoodType};
use stumpside::units::Length;

#[test]
fn dry_masses_of_the_ten_groups() {
    let diameters = [10.0, 20.0, 30.0, 40.0, 50.0, 60.0, 80.0];
    for (group, row) in BiomassGroup::ALL.into_iter().zip(MASSES) {
        for (diameter, mass) in diameters.into_iter().zip(row) {
            near(
                dry_mass(group, Length::cm(diameter)).unwrap().value(),
                mass,
                0.01,
            );
        }
    }
}

#[test]
fn shares_of_leaves_wood_bark_and_branches() {
    for (diameter, softwood, hardwood) in SHARES {
        for (wood_type, row) in [
            (WoodType::Softwood, softwood),
            (WoodType::Hardwood, hardwood),
        ] {
            let part = shares(wood_type, Length::cm(diameter)).unwrap();
            let found = [
                part.foliage,
                part.stem_wood,
                part.stem_bark,
                part.branch,
                part.crown(),
            ];
            for (value, printed) in found.into_iter().zip(row) {
                near(value, printed, 1e-4);
            }
        }
    }
}

#[test]
fn a_twig_is_refused() {
    let thin = Length::cm(2.0);
    assert_eq!(
        dry_mass(BiomassGroup::Pine, thin),
        Err(BiomassError::TooThin(thin))
    );
    assert!(shares(WoodType::Softwood, thin).is_err());
}

#[test]
fn a_height_aware_method_within_a_quarter_for_a_tall_tree_and_not_for_a_short_one() {
    // GTR-WO-104, example 1: Douglas-fir of 20 in and 110 ft, 3154.554 lb dry in all.
    let tall = dry_mass(BiomassGroup::DouglasFir, Length::cm(50.8)).unwrap();
    let published = 3_154.553_992_672_5 * 0.453_592_37;
    assert!((tall.value() / published - 1.0).abs() < 0.25);
    // Example 2: red maple of 11.1 in and 38 ft, 532.585 lb: diameter alone is 64 % too heavy.
    let short = dry_mass(BiomassGroup::SoftMapleBirch, Length::cm(11.1 * 2.54)).unwrap();
    near(short.value(), 397.4, 0.1);
    let published = 532.584_798_820_042 * 0.453_592_37;
    near(short.value() / published, 1.645, 1e-3);
    // The stem's volume sees the height: wood and bark green were 213.9 + 65.5 kg.
    let maple = species::find("red maple").unwrap();
    let stem = green_mass(
        &maple.green,
        Length::cm(11.1 * 2.54),
        Length::m(38.0 * 0.3048),
    );
    assert!(
        (stem.value() / (213.9 + 65.5) - 1.0).abs() < 0.15,
        "{stem:?}"
    );
}

#[test]
fn stem_volumes_of_thirty_one_black_cherries() {
    // Source: Meyer 1953, Forest Mensuration; Ryan, Joiner and Ryan 1976 (opened in a package of
    // data sets). Timber volume, so the whole stem's form factor lies 8.9 % above it.
    let cherry = species::find("black cherry").unwrap();
    let bark = cherry.green.bark_volume / (100.0 + cherry.green.bark_volume);
    let density = (1.0 - bark) * cherry.green.wood_density().value()
        + bark * cherry.green.bark_density().value();
    let cubic_foot = 0.3048_f64 * 0.3048 * 0.3048;
    let (mut sum, mut published, mut squares) = (0.0, 0.0, 0.0);
    for (inches, feet, volume) in CHERRIES {
        let mass = green_mass(
            &cherry.green,
            Length::cm(inches * 2.54),
            Length::m(feet * 0.3048),
        );
        let found = mass.value() / density / cubic_foot;
        sum += found;
        published += volume;
        squares += (found / volume - 1.0) * (found / volume - 1.0);
    }
    near(published, 935.3, 0.1);
    near(sum / published, 1.089, 1.2e-2);
    assert!((squares / 31.0_f64).sqrt() < 0.15);
}

/// Diameter at breast height in inches, height in feet, volume in cubic feet.
#[rustfmt::skip]
const CHERRIES: [(f64, f64, f64); 31] = [
    (8.3, 70.0, 10.3), (8.6, 65.0, 10.3), (8.8, 63.0, 10.2), (10.5, 72.0, 16.4),
    (10.7, 81.0, 18.8), (10.8, 83.0, 19.7), (11.0, 66.0, 15.6), (11.0, 75.0, 18.2),
    (11.1, 80.0, 22.6), (11.2, 75.0, 19.9), (11.3, 79.0, 24.2), (11.4, 76.0, 21.0),
    (11.4, 76.0, 21.4), (11.7, 69.0, 21.3), (12.0, 75.0, 19.1), (12.9, 74.0, 22.2),
    (12.9, 85.0, 33.8), (13.3, 86.0, 27.4), (13.7, 71.0, 25.7), (13.8, 64.0, 24.9),
    (14.0, 78.0, 34.5), (14.2, 80.0, 31.7), (14.5, 74.0, 36.3), (16.0, 72.0, 38.3),
    (16.3, 77.0, 42.6), (17.3, 81.0, 55.4), (17.5, 82.0, 55.7), (17.9, 80.0, 58.3),
    (18.0, 80.0, 51.5), (18.0, 80.0, 51.0), (20.6, 87.0, 77.0),
];

#[rustfmt::skip]
const MASSES: [[f64; 7]; 10] = [
    [23.77, 113.79, 284.40, 544.74, 901.84, 1361.50, 2607.83],
    [29.84, 162.34, 437.22, 883.05, 1523.29, 2378.28, 4803.41],
    [23.93, 133.65, 365.52, 746.34, 1298.41, 2041.23, 4167.87],
    [21.56, 116.60, 312.93, 630.46, 1085.49, 1692.09, 3409.08],
    [26.92, 135.59, 349.08, 682.85, 1149.07, 1758.01, 3438.88],
    [26.74, 139.84, 368.06, 731.32, 1245.67, 1924.79, 3824.50],
    [34.25, 176.43, 460.30, 908.93, 1540.75, 2371.40, 4682.70],
    [25.49, 142.58, 390.28, 797.38, 1387.85, 2182.67, 4459.37],
    [36.32, 196.27, 526.63, 1060.79, 1826.12, 2846.24, 5733.20],
    [24.68, 80.34, 160.24, 261.54, 382.44, 521.68, 851.46],
];

/// Diameter in cm; leaves, wood, bark, branches, crown for softwoods and for hardwoods.
#[rustfmt::skip]
const SHARES: [(f64, [f64; 5], [f64; 5]); 7] = [
    (10.0, [0.0812, 0.5745, 0.1094, 0.2348, 0.3161], [0.0304, 0.4279, 0.1129, 0.4288, 0.4592]),
    (20.0, [0.0649, 0.6288, 0.1159, 0.1904, 0.2553], [0.0227, 0.5612, 0.1228, 0.2933, 0.3160]),
    (30.0, [0.0603, 0.6480, 0.1181, 0.1736, 0.2339], [0.0205, 0.6143, 0.1263, 0.2389, 0.2594]),
    (40.0, [0.0580, 0.6578, 0.1192, 0.1649, 0.2229], [0.0196, 0.6427, 0.1281, 0.2097, 0.2292]),
    (50.0, [0.0568, 0.6638, 0.1199, 0.1595, 0.2163], [0.0190, 0.6604, 0.1292, 0.1915, 0.2105]),
    (60.0, [0.0559, 0.6678, 0.1204, 0.1559, 0.2118], [0.0186, 0.6724, 0.1299, 0.1791, 0.1977]),
    (80.0, [0.0549, 0.6728, 0.1210, 0.1513, 0.2062], [0.0182, 0.6878, 0.1308, 0.1632, 0.1814]),
];
