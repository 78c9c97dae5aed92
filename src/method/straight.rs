//! The straight back cut: the hinge is reached before the tree moves, or so soon after that no
//! hurry is needed. It proposes nothing where the tree would have to be raced.

use crate::method::bench::{Assessed, Bench};
use crate::method::words::{
    angle_keeps, cm, degrees, length_keeps, ratio, ratio_reaches, seconds, tilt, time_keeps,
};
use crate::units::Angle;

/// Why a straight back cut is proposed; or why it is not.
pub(super) fn judge(bench: &Bench<'_>, cut: &Assessed) -> Result<Vec<String>, String> {
    ratios(bench, cut)?;
    tilts(bench, cut)?;
    let hinge = cut.layout.hinge.value();
    let waits = length_keeps(cut.best.commit, hinge);
    let limit = bench.table.straight_stretch_max;
    let reason = if waits {
        format!(
            "the tree waits for the saw: the hinge of {} is reached, and it would go by itself only at {}",
            cm(hinge),
            cm(cut.best.commit)
        )
    } else {
        let worst = cut
            .worst
            .stretch
            .ok_or("the tree moves before the hinge is reached, and without the saw's rate the stretch cannot be timed")?;
        if !time_keeps(worst.seconds, limit) {
            return Err(format!(
                "the tree moves at {} of wood and the saw needs {} at its slow rate to reach the hinge of {}: more than {}",
                cm(cut.worst.commit.value()),
                seconds(worst.seconds),
                cm(hinge),
                seconds(limit)
            ));
        }
        format!(
            "the tree moves only in the last {} of cutting before the hinge of {}",
            seconds(worst.seconds),
            cm(hinge)
        )
    };
    if bench.large() {
        let most = bench.table.straight_lean_large_max;
        if !angle_keeps(Some(Angle::si(bench.lean())), most) {
            return Err(format!(
                "the tree is large ({}) and its weight leans {}: more than {}",
                cm(bench.diameter()),
                degrees(bench.lean()),
                degrees(most.value())
            ));
        }
    }
    if let Some(side) = cut.side_refusal() {
        return Err(side);
    }
    Ok(vec![reason, ratio_reason(cut), face_reason(bench, cut)])
}

/// Both split ratios reach their limits.
pub(super) fn ratios(bench: &Bench<'_>, cut: &Assessed) -> Result<(), String> {
    if !ratio_reaches(cut.worst.split_ratio, 1.0) {
        return Err(format!(
            "in a back cut from the rear the tree commits with {} of wood left, and at worst the stem splits at {} of what it then asks",
            cm(cut.worst.commit.value()),
            ratio(cut.worst.split_ratio)
        ));
    }
    let least = bench.table.central_ratio_min;
    if !ratio_reaches(cut.best.margin, least) {
        return Err(format!(
            "the stem splits at {} times what the tree asks from commit on: less than {}",
            ratio(cut.best.margin),
            ratio(least)
        ));
    }
    Ok(())
}

/// The tilt at the hinge keeps its limits, at the slow rate.
pub(super) fn tilts(bench: &Bench<'_>, cut: &Assessed) -> Result<(), String> {
    let none = "without saw rate, height, diameter and crown the tilt at the hinge cannot be said";
    let central = cut.central.ok_or(none)?;
    let cautious = cut.worst.stretch.ok_or(none)?;
    let limits = [
        (central, bench.table.tilt_central_max, "central"),
        (cautious, bench.table.tilt_cautious_max, "cautious"),
    ];
    for (run, limit, which) in limits {
        if !angle_keeps(run.tilt, limit) {
            return Err(format!(
                "the tree outruns the saw: at the slow rate and the {which} demand it has tilted {} when the hinge is reached, more than {}",
                tilt(run.tilt),
                degrees(limit.value())
            ));
        }
    }
    Ok(())
}

pub(super) fn ratio_reason(cut: &Assessed) -> String {
    format!(
        "the stem splits at {} times what is asked at commit, {} times at worst",
        ratio(cut.best.split_ratio),
        ratio(cut.worst.split_ratio)
    )
}

pub(super) fn face_reason(bench: &Bench<'_>, cut: &Assessed) -> String {
    format!(
        "the face is {} deep, {:.0} % of the wood: deeper holds off splitting, but on a strong leaner it pinches the bar sooner, so the sloping cut goes first",
        cm(cut.layout.face_depth.value()),
        100.0 * cut.layout.face_depth.value() / bench.diameter()
    )
}
