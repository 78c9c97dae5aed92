//! The brisk back cut: the tree moves before the hinge is reached, and the saw wins the race with
//! margin. It is never proposed for a large tree.

use crate::method::bench::{Assessed, Bench};
use crate::method::straight::{face_reason, ratio_reason, ratios, tilts};
use crate::method::words::{cm, seconds, tilt, time_keeps};

/// Why a brisk back cut is proposed; or why it is not.
pub(super) fn judge(bench: &Bench<'_>, cut: &Assessed) -> Result<Vec<String>, String> {
    ratios(bench, cut)?;
    tilts(bench, cut)?;
    let worst = cut
        .worst
        .stretch
        .ok_or("without the saw's rate the stretch cannot be timed")?;
    let limit = bench.table.brisk_stretch_max;
    if !time_keeps(worst.seconds, limit) {
        return Err(format!(
            "the brisk stretch takes {} at the slow rate: more than {}",
            seconds(worst.seconds),
            seconds(limit)
        ));
    }
    if bench.large() {
        return Err(format!(
            "the tree is large: {} of wood at the cut, and the crew calls {} large",
            cm(bench.diameter()),
            cm(bench.input.large.value())
        ));
    }
    if let Some(side) = cut.side_refusal() {
        return Err(side);
    }
    Ok(vec![
        format!(
            "the tree commits with {} of wood left, and the saw reaches the hinge of {} within {}: tilt there {} at most",
            cm(cut.worst.commit.value()),
            cm(cut.layout.hinge.value()),
            seconds(worst.seconds),
            tilt(worst.tilt)
        ),
        ratio_reason(cut),
        face_reason(bench, cut),
    ])
}
