//! The site: slope and features, and positions wherever they stand.

use super::reader::Reader;
use crate::document::{Node, NodeKind};
use crate::plan::{Feature, FeatureKind, Measured, Site, Slope};
use crate::units::Length;

/// At most this many features in a plan.
const LIMIT_FEATURES: usize = 2_000;

pub(super) fn site(reader: &mut Reader, node: &Node) -> Site {
    let Some(group) = reader.group(node, "site", &["slope", "features"]) else {
        return Site::default();
    };
    let slope = group.get("slope").and_then(|n| slope(reader, n));
    let features = group
        .get("features")
        .map_or(vec![], |n| features(reader, n));
    Site { slope, features }
}

fn slope(reader: &mut Reader, node: &Node) -> Option<Slope> {
    let group = reader.group(node, "site.slope", &["grade", "downhill"])?;
    let angle = reader
        .need(&group, "grade", "18 %")
        .and_then(|n| reader.quantity(n, "site.slope.grade", "site.slope.grade"));
    let downhill = reader
        .need(&group, "downhill", "205 deg")
        .and_then(|n| reader.bearing(n, "site.slope.downhill"));
    Some(Slope {
        angle: angle?,
        downhill: downhill?,
    })
}

fn features(reader: &mut Reader, node: &Node) -> Vec<Feature> {
    let items = reader.list(node, "site.features");
    if items.len() > LIMIT_FEATURES {
        let message = format!(
            "{} features stand here; at most {LIMIT_FEATURES} are read",
            items.len()
        );
        reader.stop(
            "PLAN-14",
            (node.place, "site.features"),
            (message, "split the job into several plans"),
        );
        return vec![];
    }
    let mut features = vec![];
    for (index, item) in items.iter().enumerate() {
        features.extend(feature(reader, item, &format!("site.features[{index}]")));
    }
    features
}

fn feature(reader: &mut Reader, node: &Node, route: &str) -> Option<Feature> {
    let group = reader.group(
        node,
        route,
        &["id", "kind", "voltage", "along", "at", "radius"],
    )?;
    let words: Vec<_> = FeatureKind::ALL.iter().map(|k| (k.word(), *k)).collect();
    let id = reader
        .need(&group, "id", "line")
        .and_then(|n| reader.id(n, &group.path("id")));
    let kind = reader
        .need(&group, "kind", "track")
        .and_then(|n| reader.word(n, &group.path("kind"), &words));
    let voltage = reader.quantity_at(&group, "voltage", "site.features[].voltage");
    let at = group
        .get("at")
        .and_then(|n| position(reader, n, &group.path("at")));
    let radius = reader.quantity_at(&group, "radius", "site.features[].radius");
    let mut along = vec![];
    if let Some(node) = group.get("along") {
        for (index, item) in reader.list(node, &group.path("along")).iter().enumerate() {
            along.extend(position(reader, item, &format!("{route}.along[{index}]")));
        }
    }
    if group.lacks("at") && group.lacks("along") {
        let message = "this feature has no position".to_owned();
        let help = "add `at: [120 m, -40 m]` (east, north) or `along: [[…], […]]`";
        reader.stop("PLAN-02", (group.place, route), (message, help));
    }
    reader.whole_or_unread(id.as_ref(), kind.is_some());
    Some(Feature {
        route: route.to_owned(),
        id: id?,
        kind: kind?,
        voltage,
        along,
        at,
        radius,
        place: group.place,
    })
}

/// `[east, north]`.
pub(super) fn position(
    reader: &mut Reader,
    node: &Node,
    route: &str,
) -> Option<[Measured<Length>; 2]> {
    pair(reader, node, (route, "position"))
}

/// Two quantities of the same row in a list.
pub(super) fn pair(
    reader: &mut Reader,
    node: &Node,
    (route, row): (&str, &str),
) -> Option<[Measured<Length>; 2]> {
    if let NodeKind::List(items) = &node.kind
        && let [first, second] = items.as_slice()
    {
        let first = reader.quantity(first, &format!("{route}[0]"), row);
        let second = reader.quantity(second, &format!("{route}[1]"), row);
        return Some([first?, second?]);
    }
    reader.shape(node, route, "two lengths, such as `[12 m, -4 m]`");
    None
}
