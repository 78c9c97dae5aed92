//! The wind at which the choice of a method would change. It replaces no limit of the plan: the
//! lower of the two holds.

use crate::figures::{Model, TreeInput};
use crate::method::bench::Bench;
use crate::method::choose::{Choice, choose};
use crate::method::judgement::Judgement;
use crate::units::Speed;

/// The wind past which nothing is looked for. Source: Beaufort 8 begins at 17 m/s (opened).
const STORM: f64 = 17.0;

/// The lowest wind, to a quarter of a metre a second, at which another choice would be made.
pub(super) fn wind_limit(input: &TreeInput, table: &Judgement, choice: Choice) -> Option<Speed> {
    if choice == Choice::Refuse || input.overrides.method.is_some() {
        return None;
    }
    let changes = |wind: f64| {
        let windy = TreeInput {
            wind_expected: Speed::si(wind),
            ..input.clone()
        };
        Model::new(&windy)
            .is_ok_and(|model| choose(&Bench::new(&windy, &model, table)).choice != choice)
    };
    let (mut keeps, mut changed) = (input.wind_expected.value(), STORM);
    if keeps >= changed || !changes(changed) {
        return None;
    }
    while changed - keeps > 0.25 {
        let middle = 0.5 * (keeps + changed);
        if changes(middle) {
            changed = middle;
        } else {
            keeps = middle;
        }
    }
    Some(Speed::si(keeps))
}
