//! The tilted back cut: known to practice, not to the sums. It is laid out only by hand and
//! judged by its level projection.

use crate::method::bench::{Assessed, Bench};
use crate::method::words::ratio;
use crate::plan::step::MethodName;
use crate::units::Angle;

/// The tilt laid out where the plan's own steps give none. Source: common practice, no source.
pub(super) const TILT: Angle = Angle::deg(30.0);

/// The cuts, judged without credit for the tilt.
pub(super) fn by_hand(bench: &Bench<'_>) -> Assessed {
    bench.assess(bench.plain(MethodName::TiltedBackCut))
}

/// What the answer says of it.
pub(super) fn reasons(cut: &Assessed) -> Vec<String> {
    vec![
        "practice knows that tilting the back cut helps; no published model says how much, so it is judged as if level".to_owned(),
        format!(
            "judged so, the stem splits at {} times what is asked at commit, {} at worst",
            ratio(cut.best.split_ratio),
            ratio(cut.worst.split_ratio)
        ),
    ]
}
