//! Sections against closed figures and against a general-purpose polygon library.
//! Source: geometry; the polygons' values by `tests/scripts/section_values.py`.
#![expect(
    clippy::approx_constant,
    reason = "printed figures that happen to look like known constants"
)]

use super::{near, within};
use stumpside::mechanics::section::{Cavity, SectionError, Stem};
use stumpside::units::Length;

#[test]
fn the_half_of_a_circle_of_one_metre() {
    let stem = Stem::new(Length::m(1.0), Length::m(1.0)).unwrap();
    let half = stem.strip(Length::ZERO, Length::m(0.5)).unwrap();
    near(half.area.value(), 0.392699, 1e-6);
    near(half.forward.value(), 0.212207, 1e-6);
    near(half.i_inline.value(), 0.00685981, 1e-8);
}

#[test]
fn hinge_lengths_by_face_depth() {
    // Source: geometry of a straight face in a round stem, L = 2√(d(D−d)).
    let stem = Stem::new(Length::m(1.0), Length::m(1.0)).unwrap();
    for (depth, length) in [
        (0.175, 0.760),
        (0.20, 0.800),
        (0.25, 0.866),
        (0.30, 0.917),
        (1.0 / 3.0, 0.943),
        (0.50, 1.000),
    ] {
        near(stem.width_at(Length::m(0.5 - depth)).value(), length, 1e-3);
    }
}

#[test]
fn areas_still_to_cut() {
    // Source: areas of circle segments, face 0.25 and hinge 0.10 of the diameter.
    for (diameter, whole, face, hinge, back) in [
        (0.30, 706.86, 138.19, 82.29, 486.38),
        (0.50, 1963.50, 383.87, 228.59, 1351.04),
        (0.80, 5026.55, 982.70, 585.18, 3458.67),
    ] {
        let stem = Stem::new(Length::m(diameter), Length::m(diameter)).unwrap();
        let radius = diameter / 2.0;
        let apex = radius - 0.25 * diameter;
        let area = |from: f64, to: f64| {
            stem.strip(Length::m(from), Length::m(to))
                .unwrap()
                .area
                .value()
                * 1.0e4
        };
        near(area(-radius, radius), whole, 0.01);
        near(area(apex, radius), face, 0.01);
        near(area(apex - 0.1 * diameter, apex), hinge, 0.01);
        near(area(-radius, apex - 0.1 * diameter), back, 0.01);
    }
}

#[test]
fn an_oval_with_a_cavity_agrees_with_polygons() {
    let stem = Stem::new(Length::m(0.55), Length::m(0.48))
        .unwrap()
        .with_cavity(Cavity {
            diameter: Length::m(0.12),
            forward: Length::m(0.03),
            right: Length::m(-0.08),
        })
        .unwrap();
    for (from, to, figures) in POLYGONS {
        let section = stem.strip(Length::m(from), Length::m(to)).unwrap();
        within(section.area.value(), figures[0], 1e-7);
        within(section.forward.value(), figures[1], 1e-7);
        within(section.right.value(), figures[2], 1e-7);
        within(section.i_inline.value(), figures[3], 1e-7);
        within(section.i_side.value(), figures[4], 1e-7);
    }
}

#[test]
fn odd_stems_are_refused() {
    assert_eq!(
        Stem::new(Length::ZERO, Length::m(0.5)),
        Err(SectionError::Diameter(Length::ZERO))
    );
    let stem = Stem::new(Length::m(0.5), Length::m(0.5)).unwrap();
    let outside = Cavity {
        diameter: Length::m(0.2),
        forward: Length::m(0.2),
        right: Length::ZERO,
    };
    assert_eq!(
        stem.clone().with_cavity(outside),
        Err(SectionError::Cavity(Length::m(0.2)))
    );
    let empty = stem.strip(Length::m(0.1), Length::m(0.1)).unwrap_err();
    assert!(empty.to_string().contains("no wood"));
}

/// From, to: area, centroid forward and right, second moments along and across the lay.
const POLYGONS: [(f64, f64, [f64; 5]); 3] = [
    (
        0.05,
        0.14,
        [
            3.7005225164e-02,
            9.6469488938e-02,
            7.1343071966e-03,
            2.3964013728e-05,
            6.5116741085e-04,
        ],
    ),
    (
        -0.275,
        0.0,
        [
            1.0146149211e-01,
            -1.1898899739e-01,
            1.7433731056e-03,
            5.2305626370e-04,
            1.4771371548e-03,
        ],
    ),
    (
        -0.275,
        0.275,
        [
            1.9603538158e-01,
            -1.7307692308e-03,
            4.6153846154e-03,
            3.8991738265e-03,
            2.8990327014e-03,
        ],
    ),
];
