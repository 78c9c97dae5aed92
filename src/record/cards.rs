//! A tree's card to the members of an entry, and back: whole numbers, every quantity's member
//! ending in its unit.

use serde_json::{Map, Value as Json, json};

use crate::briefing::{Card, Figure, Removed, Rung, StumpCard, UnitWord};

/// The card as members.
pub(super) fn write(card: &Card) -> Json {
    let figures: Map<String, Json> = card
        .figures
        .iter()
        .map(|f| {
            (
                format!("{}_{}", f.name, f.unit.suffix()),
                f.band.to_vec().into(),
            )
        })
        .collect();
    json!({
        "method": card.method,
        "state": card.state,
        "past_limit": card.past,
        "cases": card.of,
        "worst_ppm": card.worst_ppm,
        "doubt": card.doubt,
        "reasons": card.reasons,
        "refused": card.refused,
        "stops": card.stops,
        "figures": figures,
        "stump": {
            "along_um": card.stump.along_um,
            "across_um": card.stump.across_um,
            "face_um": card.stump.face_um,
            "hinge_um": card.stump.hinge_um,
        },
        "rungs": card.rungs.iter().map(rung).collect::<Vec<_>>(),
    })
}

fn rung(rung: &Rung) -> Json {
    json!({
        "id": rung.id,
        "word": rung.word,
        "timing": rung.timing,
        "planned_ms": rung.planned_ms,
        "planned_um": rung.planned_um,
        "from_um": rung.removed.map(|r| r.from_um),
        "to_um": rung.removed.map(|r| r.to_um),
        "commits": rung.commits,
        "note": rung.note,
    })
}

/// The card of members; nothing where one is missing or malformed.
pub(super) fn read(json: &Json) -> Option<Card> {
    let text = |name: &str| json.get(name)?.as_str().map(str::to_owned);
    let texts = |name: &str| -> Option<Vec<String>> {
        json.get(name)?
            .as_array()?
            .iter()
            .map(|t| t.as_str().map(str::to_owned))
            .collect()
    };
    let stump = json.get("stump")?;
    let length = |name: &str| stump.get(name)?.as_i64();
    Some(Card {
        method: text("method"),
        state: text("state")?,
        past: json.get("past_limit")?.as_i64()?,
        of: json.get("cases")?.as_i64()?,
        worst_ppm: json.get("worst_ppm").and_then(Json::as_i64),
        doubt: text("doubt")?,
        reasons: texts("reasons")?,
        refused: texts("refused")?,
        stops: texts("stops")?,
        figures: json
            .get("figures")?
            .as_object()?
            .iter()
            .map(figure)
            .collect::<Option<_>>()?,
        stump: StumpCard {
            along_um: length("along_um")?,
            across_um: length("across_um")?,
            face_um: length("face_um")?,
            hinge_um: length("hinge_um")?,
        },
        rungs: json
            .get("rungs")?
            .as_array()?
            .iter()
            .map(rung_in)
            .collect::<Option<_>>()?,
    })
}

/// A figure's name and unit are split at the longest unit ending.
fn figure((member, band): (&String, &Json)) -> Option<Figure> {
    let (name, unit) = member
        .char_indices()
        .filter(|(_, c)| *c == '_')
        .find_map(|(at, _)| Some((&member[..at], UnitWord::of_suffix(&member[at + 1..])?)))?;
    let [low, best, high] = band.as_array()?.as_slice() else {
        return None;
    };
    Some(Figure {
        name: name.to_owned(),
        unit,
        band: [low.as_i64()?, best.as_i64()?, high.as_i64()?],
    })
}

fn rung_in(json: &Json) -> Option<Rung> {
    let text = |name: &str| json.get(name)?.as_str().map(str::to_owned);
    let whole = |name: &str| json.get(name).and_then(Json::as_i64);
    let removed = match (whole("from_um"), whole("to_um")) {
        (Some(from_um), Some(to_um)) => Some(Removed { from_um, to_um }),
        _ => None,
    };
    Some(Rung {
        id: text("id")?,
        word: text("word")?,
        timing: text("timing")?,
        planned_ms: whole("planned_ms"),
        planned_um: whole("planned_um"),
        removed,
        commits: json.get("commits")?.as_bool()?,
        note: text("note")?,
    })
}
