//! Lifting a tree over its hinge with a wedge: how far, and how much back lean a published table
//! allows. It never says that the wedge's ground will hold.

use crate::units::Length;

/// The lift at the rear that brings the centre of weight over the hinge.
///
/// # Model
/// `(D − face)·(x̄_hinge − forward)/height`; the kerf is not included.
/// # Valid for
/// Small turns. Negative where the weight already stands in front of the hinge.
/// # Source
/// Similar triangles.
pub fn lift(behind_face: Length, hinge_centroid_ahead: Length, centre_height: Length) -> Length {
    behind_face * (hinge_centroid_ahead / centre_height)
}

/// The largest back lean of the top that two inches of wedging allow.
///
/// # Model
/// Height over diameter gives the line, from 30 to 100 and more; between lines in proportion.
/// # Valid for
/// Two inches (5 cm) of lift. `None` below 30, where the table has no line.
/// # Source
/// OSHA logging advisor, wedge table (opened).
pub fn back_lean_allowed(height: Length, diameter: Length) -> Option<Length> {
    const TABLE: [(f64, f64); 13] = [
        (30.0, 4.0),
        (35.0, 4.5),
        (40.0, 5.5),
        (45.0, 6.0),
        (50.0, 6.5),
        (55.0, 7.0),
        (60.0, 8.0),
        (65.0, 9.0),
        (70.0, 9.5),
        (75.0, 10.0),
        (80.0, 11.0),
        (90.0, 12.0),
        (100.0, 13.0),
    ];
    let segments = height / diameter;
    if !segments.is_finite() || segments < TABLE[0].0 {
        return None;
    }
    let feet = TABLE.windows(2).find(|pair| segments < pair[1].0).map_or(
        TABLE[TABLE.len() - 1].1,
        |pair| {
            let share = (segments - pair[0].0) / (pair[1].0 - pair[0].0);
            pair[0].1 + share * (pair[1].1 - pair[0].1)
        },
    );
    Some(Length::m(feet * 0.3048))
}
