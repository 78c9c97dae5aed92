//! Power lines: the whole tree in its fall stays away from them. It knows no cable and no insulation.

use super::positions::features_of;
use super::{Facts, Found, Rule, cite, long};
use crate::parts::{Figures, RuleSet};
use crate::plan::FeatureKind;
use crate::source::Mark;
use crate::units::{Length, Voltage};

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[Rule::us_logging(
    "LOG-23",
    (
        "power line out of reach",
        "A tree is no less a conductor than a person. The whole tree, at the cautious end of its height and whichever way it falls, stays 10 feet from a line of up to 50 kV and 4 inches more for each 10 kV begun above that; the voltage between wires is taken, which is the cautious way to read it. Nearer than that the line's owner takes the voltage off, or a line-clearance crew does the work.",
    ),
    cite("29 CFR 1910.333(c)(3)(i)", Mark::Memory),
    reach,
)];

fn reach(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let (Some(spot), Some(height)) = (tree.spot(), tree.height_high()) else {
            continue;
        };
        for line in features_of(facts, FeatureKind::PowerLine) {
            let voltage = line.voltage.as_ref().map(|v| v.value());
            let away = distance_least(&set.figures, voltage.unwrap_or(Voltage::ZERO));
            let wanted = height + away;
            let Some(distance) = spot.to_feature(line) else {
                continue;
            };
            if distance >= wanted {
                continue;
            }
            let units = facts.plan.units;
            let place = tree
                .tree
                .at
                .as_ref()
                .map_or(tree.tree.id.place, |[east, _]| east.place);
            found.push(Found::stop(
                (place, format!("{}.at", tree.tree.route)),
                format!(
                    "the power line `{}` is {} away; the tree's length and {} more is {}",
                    line.id.value,
                    long(units, distance),
                    long(units, away),
                    long(units, wanted)
                ),
                "ask the line's owner to take the voltage off, or leave the tree to a line-clearance crew",
            ));
        }
    }
    found
}

/// The distance for a voltage; each step begun counts whole.
fn distance_least(figures: &Figures, voltage: Voltage) -> Length {
    let above = voltage - figures.line_voltage.value;
    // A thousandth of a step of room for the rounding of the unit's factor.
    let steps = (above / figures.line_step_voltage.value - 0.001)
        .ceil()
        .max(0.0);
    figures.line_distance.value + figures.line_step.value * steps
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::parts::Parts;

    #[test]
    fn distances_by_voltage_are_the_stepped_ones() {
        let parts = Parts::built_in();
        let figures = &parts.rule_sets["us-logging"].figures;
        // Worked by hand: 10 ft, and 4 in for each 10 kV begun over 50.
        for (kilovolts, feet) in [
            (12.5, 10.0),
            (50.0, 10.0),
            (69.0, 10.6667),
            (115.0, 12.3333),
            (138.0, 13.0),
            (161.0, 14.0),
            (230.0, 16.0),
            (345.0, 20.0),
            (500.0, 25.0),
        ] {
            let least = distance_least(figures, Voltage::si(kilovolts * 1000.0));
            assert!(
                (least.value() / 0.3048 - feet).abs() < 1e-3,
                "{kilovolts} kV: {} ft",
                least.value() / 0.3048
            );
        }
    }
}
