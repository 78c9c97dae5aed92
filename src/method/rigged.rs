//! The rigged back cut: a line set and tensioned brings a back leaner over its hinge. It refuses
//! where the line cannot, and never trusts a saw alone.

use crate::figures::{cautious_extras, line_lever};
use crate::mechanics::rigging::{PULL_FACTOR, winch_tension};
use crate::method::bench::{Assessed, Bench};
use crate::method::words::kilonewtons;
use crate::units::Force;

/// The pull below which a hand line or a pole does. Source: our judgement, a man's steady pull.
const HAND_PULL: f64 = 300.0;

/// Why a line brings the tree over; or why not.
pub(super) fn judge(bench: &Bench<'_>, cut: &Assessed) -> Result<Vec<String>, String> {
    let moment = moment(bench, cut);
    let Some(line) = bench.input.line else {
        return Err(format!(
            "it needs a line that turns the tree with {:.1} kN·m (half as much again as the sum); none is set in the plan, and a saw alone will not do",
            PULL_FACTOR * moment / 1000.0
        ));
    };
    let lever = line_lever(bench.input, bench.model, &cut.layout)
        .ok_or("the line cannot turn the tree along the lay from there")?;
    let pull = PULL_FACTOR * moment / lever;
    let winch = winch_tension(Force::si(pull), line.redirects);
    if let Some(limit) = line.load_limit
        && (pull > limit.value() || winch > limit)
    {
        return Err(format!(
            "the line must bring {} at the tree and {} at the winch, and its load limit is {}",
            kilonewtons(pull),
            kilonewtons(winch.value()),
            kilonewtons(limit.value())
        ));
    }
    let mut reasons = vec![format!(
        "the weight stands behind the hinge beyond a wedge's reach: the line brings {} at the tree, {} at the winch",
        kilonewtons(pull),
        kilonewtons(winch.value())
    )];
    if line.redirects > 0 {
        reasons.push(format!(
            "a redirect may carry twice the line: up to {}",
            kilonewtons(2.0 * winch.value())
        ));
    }
    if line.load_limit.is_none() {
        reasons.push(
            "no load limit is given for line, blocks and anchor: check it before tension"
                .to_owned(),
        );
    }
    if pull < HAND_PULL {
        reasons.push("the stem is light: a hand line or a pole gives that pull".to_owned());
    }
    Ok(reasons)
}

/// The moment at the demand's back end: weight behind the hinge, the hinge's own, the wind.
fn moment(bench: &Bench<'_>, cut: &Assessed) -> f64 {
    let (_, down) = cautious_extras(bench.model, cut.centroid);
    (cut.hold - bench.tree.load(down).about(cut.centroid)).max(0.0)
}
