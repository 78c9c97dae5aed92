//! What a tree weighs by its diameter: national biomass equations and their parts.
//! It knows no height: the stem's volume, in `stem`, is the second opinion.

use thiserror::Error;

use crate::species::{BiomassGroup, WoodType};
use crate::units::{Length, Mass};

/// Why the equations cannot be used.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum BiomassError {
    /// Below the smallest diameter behind the equations.
    #[error("the biomass equations begin at 2.5 cm, and this diameter is {} cm", .0.in_cm())]
    TooThin(Length),
}

/// One line of the equations' table.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GroupLine {
    /// The constant.
    pub b0: f64,
    /// The exponent of the diameter in centimetres.
    pub b1: f64,
    /// The largest diameter behind it, centimetres.
    pub largest_cm: f64,
    /// Root mean square error in natural logarithms.
    pub rmse: f64,
}

/// The line of a group.
///
/// # Model
/// `mass = exp(b0 + b1·ln D)`, kg oven-dry, D in cm.
/// # Valid for
/// From 2.5 cm to the line's largest diameter.
/// # Source
/// Jenkins, Chojnacky, Heath and Birdsey 2003, Forest Science 49(1), Table 4 (opened in six
/// copies).
pub const fn group_line(group: BiomassGroup) -> GroupLine {
    let (b0, b1, largest_cm, rmse) = match group {
        BiomassGroup::CedarLarch => (-2.0336, 2.2592, 250.0, 0.294_574),
        BiomassGroup::DouglasFir => (-2.2304, 2.4435, 210.0, 0.218_712),
        BiomassGroup::TrueFirHemlock => (-2.5384, 2.4814, 230.0, 0.182_329),
        BiomassGroup::Pine => (-2.5356, 2.4349, 180.0, 0.253_781),
        BiomassGroup::Spruce => (-2.0773, 2.3323, 250.0, 0.250_424),
        BiomassGroup::AspenAlderCottonwoodWillow => (-2.2094, 2.3867, 70.0, 0.507_441),
        BiomassGroup::SoftMapleBirch => (-1.9123, 2.3651, 66.0, 0.491_685),
        BiomassGroup::MixedHardwood => (-2.4800, 2.4835, 56.0, 0.360_458),
        BiomassGroup::HardMapleOakHickoryBeech => (-2.0127, 2.4342, 73.0, 0.236_483),
        BiomassGroup::JuniperOakMesquite => (-0.7152, 1.7029, 78.0, 0.384_331),
    };
    GroupLine {
        b0,
        b1,
        largest_cm,
        rmse,
    }
}

/// The oven-dry mass above ground.
///
/// # Model
/// `exp(b0 + b1·ln D)`.
/// # Valid for
/// From 2.5 cm; past the group's largest diameter it is drawn out. Wrong by half for a tree
/// short for its diameter.
/// # Errors
/// [`BiomassError::TooThin`].
/// # Source
/// As [`group_line`].
pub fn dry_mass(group: BiomassGroup, dbh: Length) -> Result<Mass, BiomassError> {
    if dbh.in_cm() < 2.5 {
        return Err(BiomassError::TooThin(dbh));
    }
    let line = group_line(group);
    Ok(Mass::si(libm::exp(
        line.b0 + line.b1 * libm::log(dbh.in_cm()),
    )))
}

/// Shares of the mass above ground.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Shares {
    /// Leaves.
    pub foliage: f64,
    /// Wood of the stem.
    pub stem_wood: f64,
    /// Bark of the stem.
    pub stem_bark: f64,
    /// Branches: the rest.
    pub branch: f64,
}

impl Shares {
    /// Leaves and branches.
    pub fn crown(&self) -> f64 {
        self.foliage + self.branch
    }
}

/// The shares of leaves, stem wood, bark and branches.
///
/// # Model
/// `exp(b0 + b1/D)`; branches are what is left of 1.
/// # Valid for
/// A band rather than a point: other equations give half to 1.3 times the crown's share.
/// # Errors
/// [`BiomassError::TooThin`].
/// # Source
/// Jenkins and others 2003, Table 6 (opened in two copies).
pub fn shares(wood_type: WoodType, dbh: Length) -> Result<Shares, BiomassError> {
    if dbh.in_cm() < 2.5 {
        return Err(BiomassError::TooThin(dbh));
    }
    let [foliage, stem_wood, stem_bark] = match wood_type {
        WoodType::Softwood => [(-2.9584, 4.4766), (-0.3737, -1.8055), (-2.0980, -1.1432)],
        WoodType::Hardwood => [(-4.0813, 5.8816), (-0.3065, -5.4240), (-2.0129, -1.6805)],
    }
    .map(|(b0, b1): (f64, f64)| libm::exp(b0 + b1 / dbh.in_cm()));
    Ok(Shares {
        foliage,
        stem_wood,
        stem_bark,
        branch: (1.0 - foliage - stem_wood - stem_bark).max(0.0),
    })
}
