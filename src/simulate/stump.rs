//! What a sequence is run on. It holds values and judges nothing.

use crate::mechanics::holding::{Demand, Wood};
use crate::mechanics::section::Stem;
use crate::units::Length;

/// The stump before the first cut, and what the tree asks of it.
#[derive(Debug, Clone, PartialEq)]
pub struct Stump {
    /// The stem.
    pub stem: Stem,
    /// Its wood.
    pub wood: Wood,
    /// What the tree asks.
    pub demand: Demand,
    /// The depth of back cut from which a wedge can be set behind the bar.
    pub wedge_room: Length,
}
