//! Single values: quantities, bearings, dates, whole numbers, ids. Each mistake is one finding with
//! its place and its way out. It never guesses a unit or a sign.

use chrono::NaiveDate;

use super::reader::{Group, Reader, scalar};
use crate::document::Node;
use crate::plan::fields::{self, DefaultSpread, Field};
use crate::plan::quantity::{self, Refused};
use crate::plan::{Measured, Spanned};
use crate::units::{Bearing, FromSi, Reading};

impl Reader {
    /// A quantity of the field named by `row`.
    pub(super) fn quantity<T: FromSi>(
        &mut self,
        node: &Node,
        route: &str,
        row: &str,
    ) -> Option<Measured<T>> {
        let field = fields::find(row).expect("every quantity decoded has its row in the table");
        let text = scalar(node);
        if text.is_empty() || node.is_empty() {
            let wanted = format!("a quantity with its unit ({})", field.kind.unit_words());
            self.shape(node, route, &wanted);
            return None;
        }
        match quantity::read(text, field.kind) {
            Ok(read) => self.in_range(read, node, (route, field)),
            Err(refused) => {
                self.refused_quantity(&refused, node, (route, field));
                None
            }
        }
    }

    /// An optional quantity under a key.
    pub(super) fn quantity_at<T: FromSi>(
        &mut self,
        group: &Group<'_>,
        key: &str,
        row: &str,
    ) -> Option<Measured<T>> {
        let node = group.get(key)?;
        self.quantity(node, &group.path(key), row)
    }

    fn in_range<T: FromSi>(
        &mut self,
        read: quantity::Read,
        node: &Node,
        (route, field): (&str, &Field),
    ) -> Option<Measured<T>> {
        // Written so that whatever is not inside the range is refused.
        if !(field.least <= read.value && read.value <= field.most) {
            let (least, most) = (in_words(field.least, field), in_words(field.most, field));
            let message = format!("this is outside what can be meant here: {least} to {most}");
            self.stop(
                "PLAN-07",
                (node.place, route),
                (message, "look at the number and at its unit"),
            );
            return None;
        }
        let spread = read.spread.unwrap_or(match field.spread {
            DefaultSpread::Exact => 0.0,
            DefaultSpread::Absolute(spread) => spread,
            DefaultSpread::Share(share) => read.value.abs() * share,
        });
        let (value, spread_si) = (T::from_si(read.value).ok()?, T::from_si(spread).ok()?);
        Some(Measured {
            reading: Reading::new(value, spread_si),
            spread_written: read.spread.is_some(),
            place: node.place,
            typed: scalar(node).to_owned(),
        })
    }

    fn refused_quantity(&mut self, refused: &Refused, node: &Node, (route, field): (&str, &Field)) {
        let units = field.kind.unit_words();
        let first = usual_unit(field);
        let (code, help) = match refused {
            Refused::Empty => ("PLAN-02", format!("write a number and a unit ({units})")),
            Refused::Comma => ("PLAN-09", "write a point: `4.5`, not `4,5`".to_owned()),
            Refused::Bare => (
                "PLAN-04",
                format!(
                    "add the unit, for example `{} {first}`; units: {units}",
                    scalar(node).trim()
                ),
            ),
            Refused::NoNumber => ("PLAN-06", format!("write a number and a unit ({units})")),
            Refused::NotFinite => (
                "PLAN-06",
                format!("write a real number and a unit ({units})"),
            ),
            Refused::Unit(_) => ("PLAN-05", format!("units here: {units}")),
            Refused::NegativeSpread => (
                "PLAN-07",
                "the number after ± is one standard deviation, 0 or more".to_owned(),
            ),
        };
        self.stop(code, (node.place, route), (refused.to_string(), &help));
    }

    /// A bearing.
    pub(super) fn bearing(&mut self, node: &Node, route: &str) -> Option<Spanned<Bearing>> {
        let help = "write degrees clockwise from true north, `110 deg`, or a compass word, `ENE`";
        let text = scalar(node);
        if text.is_empty() || node.is_empty() {
            self.shape(node, route, "a bearing");
            return None;
        }
        match quantity::read_bearing(text) {
            Ok(value) => Some(Spanned {
                value,
                place: node.place,
            }),
            Err(refused) => {
                let code = match refused {
                    Refused::Bare => "PLAN-04",
                    Refused::Unit(_) => "PLAN-05",
                    Refused::Comma => "PLAN-09",
                    Refused::Empty => "PLAN-02",
                    Refused::NoNumber | Refused::NotFinite | Refused::NegativeSpread => "PLAN-11",
                };
                let message = match refused {
                    Refused::NoNumber => "no bearing from 0 to 360 degrees stands here".to_owned(),
                    Refused::Empty
                    | Refused::Comma
                    | Refused::Bare
                    | Refused::NotFinite
                    | Refused::Unit(_)
                    | Refused::NegativeSpread => refused.to_string(),
                };
                self.stop(code, (node.place, route), (message, help));
                None
            }
        }
    }

    /// A date, `2026-11-14`.
    pub(super) fn date(&mut self, node: &Node, route: &str) -> Option<Spanned<NaiveDate>> {
        let text = self.text(node, route)?;
        let ten = text.value.len() == 10;
        match NaiveDate::parse_from_str(&text.value, "%Y-%m-%d") {
            Ok(value) if ten => Some(Spanned {
                value,
                place: text.place,
            }),
            Ok(_) | Err(_) => {
                let message = format!("`{}` is not a date", text.value);
                self.stop(
                    "PLAN-12",
                    (text.place, route),
                    (message, "write year-month-day: `2026-11-14`"),
                );
                None
            }
        }
    }

    /// `true` or `false`.
    pub(super) fn truth(&mut self, node: &Node, route: &str) -> Option<Spanned<bool>> {
        self.word(node, route, &[("true", true), ("false", false)])
    }

    /// A whole number up to a limit.
    pub(super) fn whole(&mut self, node: &Node, route: &str, most: u32) -> Option<Spanned<u32>> {
        let text = self.text(node, route)?;
        // Signs and leading zeros are refused: some readers take `010` for eight.
        let plain = text.value.bytes().all(|b| b.is_ascii_digit())
            && (text.value == "0" || !text.value.starts_with('0'));
        match text.value.parse::<u32>() {
            Ok(value) if value <= most && plain => Some(Spanned {
                value,
                place: text.place,
            }),
            Ok(_) | Err(_) => {
                let message = format!("a whole number from 0 to {most} was expected");
                self.stop(
                    "PLAN-06",
                    (text.place, route),
                    (message, "write digits only, without a leading zero"),
                );
                None
            }
        }
    }

    /// A plain number in a range, for degrees of latitude and longitude.
    pub(super) fn number(
        &mut self,
        node: &Node,
        route: &str,
        range: (f64, f64),
    ) -> Option<Spanned<f64>> {
        let text = self.text(node, route)?;
        match text.value.parse::<f64>() {
            Ok(value) if range.0 <= value && value <= range.1 => Some(Spanned {
                value,
                place: text.place,
            }),
            Ok(_) | Err(_) => {
                let message = format!("a number from {} to {} was expected", range.0, range.1);
                self.stop(
                    "PLAN-07",
                    (text.place, route),
                    (message, "write decimal degrees with a point: `44.61`"),
                );
                None
            }
        }
    }

    /// An id: lower and upper case letters, digits, hyphens.
    pub(super) fn id(&mut self, node: &Node, route: &str) -> Option<Spanned<String>> {
        let text = self.text(node, route)?;
        let good = |c: char| c.is_ascii_alphanumeric() || c == '-';
        if text.value.len() <= 32 && text.value.chars().all(good) {
            return Some(text);
        }
        let message = format!("`{}` cannot be used as an id", text.value);
        self.stop(
            "PLAN-08",
            (text.place, route),
            (message, "use letters, digits and hyphens, at most 32"),
        );
        None
    }
}

/// An SI value in the first unit of its field, for messages.
fn in_words(si: f64, field: &Field) -> String {
    let (word, factor) = match field.kind.units() {
        [_, _, metre, ..] if field.kind == quantity::Kind::Length => *metre,
        [first, ..] => *first,
        [] => ("", 1.0),
    };
    let number = (si / factor * 1000.0).round() / 1000.0;
    format!("{number} {word}")
}

/// The unit a person would most likely have meant, for an example.
fn usual_unit(field: &Field) -> &'static str {
    if field.kind == quantity::Kind::Length {
        // What is measured at the stump is at most a few metres wide.
        return if field.most <= 5.0 { "cm" } else { "m" };
    }
    field.kind.units().first().map_or("", |(word, _)| *word)
}
