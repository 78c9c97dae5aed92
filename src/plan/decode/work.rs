//! The job, the saws, the limits and the tolerances.

use chrono::NaiveDate;

use super::reader::Reader;
use crate::diagnostic::Place;
use crate::document::Node;
use crate::plan::{Job, Limits, Location, Saw, Spanned, Tolerances};

/// The job. What is missing or bad has its finding and stands as a blank: such a plan is looked
/// through for more mistakes and never used.
pub(super) fn job(reader: &mut Reader, node: &Node) -> Option<Job> {
    let known = &["name", "date", "rules", "leader", "intent", "place"];
    let group = reader.group(node, "job", known)?;
    let name = reader
        .need(&group, "name", "Lower bench, windthrow")
        .and_then(|n| reader.text(n, "job.name"));
    let date = reader
        .need(&group, "date", "2026-11-14")
        .and_then(|n| reader.date(n, "job.date"));
    let leader = reader
        .need(&group, "leader", "id of the leader")
        .and_then(|n| reader.id(n, "job.leader"));
    let rules = reader.texts_at(&group, "rules");
    let intent = reader.text_at(&group, "intent");
    let location = group
        .get("place")
        .map(|n| location(reader, n))
        .unwrap_or_default();
    Some(Job {
        name: name.unwrap_or_else(|| blank(group.place)),
        date: date.unwrap_or(Spanned {
            value: NaiveDate::MIN,
            place: group.place,
        }),
        rules,
        leader: leader.unwrap_or_else(|| blank(group.place)),
        intent,
        location,
    })
}

/// A job of which nothing can be read.
pub(super) fn no_job(place: Place) -> Job {
    Job {
        name: blank(place),
        date: Spanned {
            value: NaiveDate::MIN,
            place,
        },
        rules: vec![],
        leader: blank(place),
        intent: None,
        location: Location::default(),
    }
}

fn blank(place: Place) -> Spanned<String> {
    Spanned {
        value: String::new(),
        place,
    }
}

fn location(reader: &mut Reader, node: &Node) -> Location {
    let known = &["latitude", "longitude", "directions", "gate"];
    let Some(group) = reader.group(node, "job.place", known) else {
        return Location::default();
    };
    Location {
        latitude: group
            .get("latitude")
            .and_then(|n| reader.number(n, "job.place.latitude", (-90.0, 90.0))),
        longitude: group
            .get("longitude")
            .and_then(|n| reader.number(n, "job.place.longitude", (-180.0, 180.0))),
        directions: reader.text_at(&group, "directions"),
        gate: reader.text_at(&group, "gate"),
    }
}

pub(super) fn saws(reader: &mut Reader, node: &Node) -> Vec<Saw> {
    let mut saws = vec![];
    for (index, item) in reader.list(node, "saws").iter().enumerate() {
        saws.extend(saw(reader, item, &format!("saws[{index}]")));
    }
    saws
}

fn saw(reader: &mut Reader, node: &Node, route: &str) -> Option<Saw> {
    let group = reader.group(
        node,
        route,
        &["id", "bar", "nose", "kerf", "displacement", "rate"],
    )?;
    let id = reader
        .need(&group, "id", "big")
        .and_then(|n| reader.id(n, &group.path("id")));
    let bar = reader
        .need(&group, "bar", "63 cm")
        .and_then(|n| reader.quantity(n, &group.path("bar"), "saws[].bar"));
    let saw = (
        reader.quantity_at(&group, "nose", "saws[].nose"),
        reader.quantity_at(&group, "kerf", "saws[].kerf"),
        reader.quantity_at(&group, "displacement", "saws[].displacement"),
        reader.quantity_at(&group, "rate", "saws[].rate"),
    );
    let (nose, kerf, displacement, rate) = saw;
    reader.whole_or_unread(id.as_ref(), bar.is_some());
    Some(Saw {
        route: route.to_owned(),
        id: id?,
        bar: bar?,
        nose,
        kerf,
        displacement,
        rate,
        place: group.place,
    })
}

pub(super) fn tolerances(reader: &mut Reader, node: &Node) -> Tolerances {
    let known = &["hinge", "depth", "diameter", "bearing"];
    let Some(group) = reader.group(node, "tolerances", known) else {
        return Tolerances::default();
    };
    Tolerances {
        hinge: reader.quantity_at(&group, "hinge", "tolerances.hinge"),
        depth: reader.quantity_at(&group, "depth", "tolerances.depth"),
        diameter: reader.quantity_at(&group, "diameter", "tolerances.diameter"),
        bearing: reader.quantity_at(&group, "bearing", "tolerances.bearing"),
    }
}

pub(super) fn limits(reader: &mut Reader, node: &Node) -> Limits {
    let Some(group) = reader.group(node, "limits", &["wind", "gust", "expected", "light"]) else {
        return Limits::default();
    };
    Limits {
        wind: reader.quantity_at(&group, "wind", "limits.wind"),
        gust: reader.quantity_at(&group, "gust", "limits.gust"),
        expected: reader.quantity_at(&group, "expected", "limits.expected"),
        light: reader.text_at(&group, "light"),
    }
}
