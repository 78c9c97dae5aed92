//! What is typed for an item, field by field, and its meaning in the record's units.

use crate::briefing::{Form, Item};
use crate::parts::What;
use crate::plan::DisplayUnits;
use crate::session::Typed;

/// One typed field.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Slot {
    /// Its name.
    pub(super) label: String,
    /// The unit printed beside it.
    pub(super) unit: &'static str,
}

/// The fields an item asks for.
pub(super) fn slots(item: &Item, units: DisplayUnits) -> Vec<Slot> {
    match &item.form {
        Form::Choose(_) => vec![Slot {
            label: "seen, by digit".to_owned(),
            unit: "",
        }],
        Form::Measure(fields) => fields
            .iter()
            .flat_map(|field| {
                units_of(field.what, units).iter().map(|unit| Slot {
                    label: field.label.clone(),
                    unit,
                })
            })
            .collect(),
        Form::Words(_) | Form::Sign | Form::Start => vec![],
    }
}

/// The units a thing is typed in: whole numbers only.
fn units_of(what: What, units: DisplayUnits) -> &'static [&'static str] {
    match (what, units) {
        (What::Count, _) => &["people"],
        (What::Lean, _) => &["deg"],
        (What::Wind, DisplayUnits::Metric) => &["km/h"],
        (What::Wind, DisplayUnits::Us) => &["mph"],
        (_, DisplayUnits::Metric) => &["mm"],
        (_, DisplayUnits::Us) => &["in", "sixteenths"],
    }
}

/// The typed answer of an item from its fields and words; nothing where a field is empty or no
/// whole number.
pub(super) fn typed(
    item: &Item,
    fields: &[String],
    words: &str,
    units: DisplayUnits,
) -> Option<Typed> {
    match &item.form {
        Form::Choose(_) => fields.first()?.parse().ok().map(Typed::Digit),
        Form::Measure(asked) => {
            let mut rest = fields;
            let mut numbers = vec![];
            for field in asked {
                let n = units_of(field.what, units).len();
                let (own, after) = rest.split_at_checked(n)?;
                rest = after;
                numbers.push(number(field.what, own, units)?);
            }
            Some(Typed::Numbers(numbers))
        }
        Form::Words(_) => Some(Typed::Words(words.to_owned())),
        Form::Sign | Form::Start => Some(Typed::Nothing),
    }
}

/// One number in the record's unit, with what was typed.
fn number(what: What, own: &[String], units: DisplayUnits) -> Option<(i64, String)> {
    let whole = |text: &String| text.parse::<i64>().ok();
    let words = units_of(what, units);
    match (own, words) {
        ([inches, sixteenths], _) => {
            let all = whole(inches)? * 16 + whole(sixteenths).filter(|s| *s < 16)?;
            Some((all * 25_400 / 16, format!("{inches} in {sixteenths}/16")))
        }
        ([one], [unit]) => {
            let value = whole(one)?;
            let record = match (what, units) {
                (What::Count, _) => value,
                (What::Lean, _) => value * 1_000,
                (What::Wind, DisplayUnits::Metric) => value * 10_000 / 36,
                (What::Wind, DisplayUnits::Us) => value * 447_040 / 1_000,
                (_, _) => value * 1_000,
            };
            Some((record, format!("{one} {unit}")))
        }
        _ => None,
    }
}
