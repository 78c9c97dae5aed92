//! The stem as a solid: its volume from diameter and height, its green mass, its profile.
//! It never weighs a crown.

use crate::species::GreenWood;
use crate::units::{Length, Mass};

/// Breast-height form factor of the whole stem, bark included.
/// Source: derived from published volumes (0.42 to 0.47 of single trees); 0.42 ± 0.05.
pub const FORM_FACTOR: f64 = 0.42;
/// One standard deviation of the form factor.
pub const FORM_FACTOR_SPREAD: f64 = 0.05;
/// Exponent of the stem's profile: area as `(1 − x/L)^p`. Source: our judgement, band 1 to 1.5.
pub const PROFILE: f64 = 1.25;

/// The green mass of the stem, bark included, from diameter and height.
///
/// # Model
/// `V = f·π/4·d²·H`, parted into wood and bark, each with its green density.
/// # Valid for
/// Whole stems of ordinary form.
/// # Source
/// Form factors derived from published examples; densities as [`GreenWood`].
pub fn green_mass(green: &GreenWood, dbh: Length, height: Length) -> Mass {
    let volume =
        FORM_FACTOR * std::f64::consts::PI / 4.0 * dbh.value() * dbh.value() * height.value();
    let bark = green.bark_volume / (100.0 + green.bark_volume);
    Mass::si(
        volume
            * ((1.0 - bark) * green.wood_density().value() + bark * green.bark_density().value()),
    )
}

/// The height of the stem's own centre of weight.
///
/// # Model
/// `L/(p+2)` for an area that goes as `(1 − x/L)^p`.
/// # Valid for
/// Any solid of that family: rod 0, paraboloid 1, cone 2, neiloid 3.
/// # Source
/// Derived.
pub fn centre_height(height: Length, profile: f64) -> Length {
    height / (profile + 2.0)
}
