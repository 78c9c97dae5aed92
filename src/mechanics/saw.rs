//! A saw's cutting rate from its engine, for want of one measured at a log.
//! A measured rate is always better, and its slowest of three is the one to plan with.

use crate::units::{Area, CutRate, Duration, Power, SweptVolume};

/// How hard the wood is on the chain.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum CutWood {
    /// Softwood.
    Softwood,
    /// Hardwood of middling weight.
    MediumHardwood,
    /// Hardwood of basic specific gravity above 0.55.
    DenseHardwood,
}

/// Share of the rated power that is used in a cut. Source: derived, consistent with test reports.
const POWER_SHARE: f64 = 0.7;

/// The power of a petrol engine from its displacement.
///
/// # Model
/// `0.05865·cc − 0.2694` kW.
/// # Valid for
/// 30 to 122 cc; within 0.24 kW.
/// # Source
/// 48 test reports of a forestry testing institute (opened), fitted here.
pub fn power(displacement: SweptVolume) -> Power {
    let cubic_centimetres = displacement.value() * 1.0e6;
    Power::si(((0.05865 * cubic_centimetres - 0.2694) * 1000.0).max(0.0))
}

/// The cutting rate of a sharp chain at full throttle.
///
/// # Model
/// `0.7·P/e_A` with `e_A` 40, 50 or 65 J/cm².
/// # Valid for
/// Sharp chain, kerf of 7 to 8 mm, green wood; a dull chain halves it.
/// # Source
/// Derived from bench and test-report figures (Nevrkla and others 2025, abstract opened).
pub fn cutting_rate(power: Power, wood: CutWood) -> CutRate {
    let energy = match wood {
        CutWood::Softwood => 40.0,
        CutWood::MediumHardwood => 50.0,
        CutWood::DenseHardwood => 65.0,
    };
    CutRate::cm2_s(POWER_SHARE * power.value() / energy)
}

/// The time a saw takes for an area.
///
/// # Model
/// `area/q`.
/// # Valid for
/// A rate above zero; `None` otherwise.
/// # Source
/// The definition of the rate.
pub fn cutting_time(area: Area, rate: CutRate) -> Option<Duration> {
    (rate > CutRate::ZERO).then(|| area / rate)
}
