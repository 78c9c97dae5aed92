//! The trees.

use super::reader::{Group, Reader};
use super::site::{pair, position};
use super::steps::steps;
use crate::document::{MERGE, Node, NodeKind};
use crate::plan::step::MethodName;
use crate::plan::{
    Crown, Defect, DefectKind, Face, FaceKind, Hazard, Leaf, Lean, Line, Measured, Spanned, Tree,
    TreeState, WayOut, Weigh, WeighCentre, WoodValues,
};
use crate::units::Length;

/// At most this many trees in a plan.
const LIMIT_TREES: usize = 2_000;

const KNOWN: &[&str] = &[
    "id", "species", "at", "dbh", "stump", "height", "lean", "crown", "defects", "state", "weigh",
    "wood", "lay", "sawyer", "saw", "method", "face", "hinge", "back_cut", "strap", "ways_out",
    "wedges", "line", "hazards", "after", "approval", "steps",
];

pub(super) fn trees(reader: &mut Reader, node: &Node) -> Vec<Tree> {
    let items = reader.list(node, "trees");
    if items.len() > LIMIT_TREES {
        let message = format!(
            "{} trees stand here; at most {LIMIT_TREES} are read",
            items.len()
        );
        reader.stop(
            "PLAN-14",
            (node.place, "trees"),
            (message, "split the job into several plans"),
        );
        return vec![];
    }
    let mut seen = std::collections::BTreeSet::new();
    let mut trees: Vec<Tree> = vec![];
    for (index, item) in items.iter().enumerate() {
        let route = format!("trees[{index}]");
        let Some(tree) = tree(reader, item, &route) else {
            continue;
        };
        if !seen.insert(tree.id.value.clone()) {
            let message = format!("the id `{}` stands twice among the trees", tree.id.value);
            reader.stop(
                "PLAN-10",
                (tree.id.place, &format!("{route}.id")),
                (message, "give each tree an id of its own"),
            );
        }
        trees.push(tree);
    }
    trees
}

fn tree(reader: &mut Reader, node: &Node, route: &str) -> Option<Tree> {
    let group = reader.group(node, route, KNOWN)?;
    let group = &group;
    let id = reader
        .need(group, "id", "T1")
        .and_then(|n| reader.id(n, &group.path("id")));
    let species = reader
        .need(group, "species", "northern red oak")
        .and_then(|n| reader.text(n, &group.path("species")));
    let stump = reader
        .need(group, "stump", "52 cm")
        .and_then(|n| stump(reader, n, &group.path("stump")));
    let lay = group
        .get("lay")
        .and_then(|n| reader.bearing(n, &group.path("lay")));
    reader.whole_or_unread(id.as_ref(), species.is_some() && stump.is_some());
    let states: Vec<_> = TreeState::ALL.iter().map(|s| (s.word(), *s)).collect();
    let tree = Tree {
        at: group
            .get("at")
            .and_then(|n| position(reader, n, &group.path("at"))),
        dbh: reader.quantity_at(group, "dbh", "trees[].dbh"),
        height: reader.quantity_at(group, "height", "trees[].height"),
        lean: group
            .get("lean")
            .and_then(|n| lean(reader, n, &group.path("lean"))),
        crown: group
            .get("crown")
            .and_then(|n| crown(reader, n, &group.path("crown"))),
        defects: each(reader, group, "defects", defect),
        state: group
            .get("state")
            .and_then(|n| reader.word(n, &group.path("state"), &states)),
        weigh: group
            .get("weigh")
            .and_then(|n| weigh(reader, n, &group.path("weigh"))),
        wood: group
            .get("wood")
            .and_then(|n| wood(reader, n, &group.path("wood"))),
        lay,
        sawyer: reader.text_at(group, "sawyer"),
        saw: reader.text_at(group, "saw"),
        method: method(reader, group),
        face: group
            .get("face")
            .map(|n| face(reader, n, &group.path("face")))
            .unwrap_or_default(),
        hinge: single(reader, group, ("hinge", "thickness")),
        back_cut_height: single(reader, group, ("back_cut", "height")),
        strap: single(reader, group, ("strap", "thickness")),
        ways_out: each(reader, group, "ways_out", way_out),
        wedges: group
            .get("wedges")
            .and_then(|n| reader.whole(n, &group.path("wedges"), 50)),
        line: group
            .get("line")
            .and_then(|n| line(reader, n, &group.path("line"))),
        hazards: each(reader, group, "hazards", hazard),
        after: reader.texts_at(group, "after"),
        approval: reader.text_at(group, "approval"),
        steps: hand_steps(reader, group),
        place: group.place,
        route: route.to_owned(),
        id: id?,
        species: species?,
        stump: stump.as_ref()?.0.clone(),
        stump_across: stump?.1,
    };
    Some(tree)
}

type Stump = (Measured<Length>, Option<Measured<Length>>);

fn stump(reader: &mut Reader, node: &Node, route: &str) -> Option<Stump> {
    match &node.kind {
        NodeKind::List(_) => {
            let [along, across] = pair(reader, node, (route, "trees[].stump"))?;
            Some((along, Some(across)))
        }
        NodeKind::Scalar { .. } | NodeKind::Map(_) | NodeKind::Refused => {
            Some((reader.quantity(node, route, "trees[].stump")?, None))
        }
    }
}

/// A list under a key, each item decoded by `one`.
fn each<T>(
    reader: &mut Reader,
    group: &Group<'_>,
    key: &str,
    one: fn(&mut Reader, &Node, &str) -> Option<T>,
) -> Vec<T> {
    let Some(node) = group.get(key) else {
        return vec![];
    };
    let route = group.path(key);
    let mut all = vec![];
    for (index, item) in reader.list(node, &route).iter().enumerate() {
        all.extend(one(reader, item, &format!("{route}[{index}]")));
    }
    all
}

/// A group of one quantity, such as `hinge: {thickness: 5 cm}`.
fn single(
    reader: &mut Reader,
    group: &Group<'_>,
    (key, inner): (&str, &'static str),
) -> Option<Measured<Length>> {
    let node = group.get(key)?;
    let inner_group = reader.group(node, &group.path(key), &[inner])?;
    let row = format!("trees[].{key}.{inner}");
    let value = reader.need(&inner_group, inner, "5 cm")?;
    reader.quantity(value, &inner_group.path(inner), &row)
}

fn method(reader: &mut Reader, group: &Group<'_>) -> Option<Spanned<MethodName>> {
    let node = group.get("method")?;
    let mut words: Vec<(&'static str, Option<MethodName>)> = MethodName::ALL
        .iter()
        .map(|m| (m.word(), Some(*m)))
        .collect();
    words.insert(0, ("auto", None));
    let word = reader.word(node, &group.path("method"), &words)?;
    word.value.map(|value| Spanned {
        value,
        place: word.place,
    })
}

fn hand_steps(
    reader: &mut Reader,
    group: &Group<'_>,
) -> Option<Vec<Spanned<crate::plan::step::Step>>> {
    let node = group.get("steps")?;
    if let NodeKind::Scalar { text, .. } = &node.kind
        && text == "auto"
    {
        return None;
    }
    Some(steps(reader, node, &group.path("steps")))
}

fn lean(reader: &mut Reader, node: &Node, route: &str) -> Option<Lean> {
    let group = reader.group(
        node,
        route,
        &["angle", "toward", "view_a", "view_b", "facing"],
    )?;
    let views = ["view_a", "view_b", "facing"]
        .iter()
        .any(|k| group.get(k).is_some() || !group.lacks(k));
    if views && group.get(MERGE).is_none() {
        let quantity = |reader: &mut Reader, key: &str| {
            let node = reader.need(&group, key, "3 deg")?;
            reader.quantity(node, &group.path(key), &format!("trees[].lean.{key}"))
        };
        let (view_a, view_b) = (quantity(reader, "view_a"), quantity(reader, "view_b"));
        let facing = reader
            .need(&group, "facing", "110 deg")
            .and_then(|n| reader.bearing(n, &group.path("facing")));
        return Some(Lean::Views {
            view_a: view_a?,
            view_b: view_b?,
            facing: facing?,
        });
    }
    let angle = reader
        .need(&group, "angle", "6 ± 1 deg")
        .and_then(|n| reader.quantity(n, &group.path("angle"), "trees[].lean.angle"));
    let toward = reader
        .need(&group, "toward", "118 deg")
        .and_then(|n| reader.bearing(n, &group.path("toward")));
    Some(Lean::Toward {
        angle: angle?,
        toward: toward?,
    })
}

fn crown(reader: &mut Reader, node: &Node, route: &str) -> Option<Crown> {
    let group = reader.group(node, route, &["base", "radii", "leaf"])?;
    let base = reader
        .need(&group, "base", "8 m")
        .and_then(|n| reader.quantity(n, &group.path("base"), "trees[].crown.base"));
    let radii = group
        .get("radii")
        .and_then(|n| radii(reader, n, &group.path("radii")));
    let words = [("bare", Leaf::Bare), ("leafed", Leaf::Leafed)];
    let leaf = group
        .get("leaf")
        .and_then(|n| reader.word(n, &group.path("leaf"), &words));
    Some(Crown {
        base: base?,
        radii,
        leaf,
    })
}

fn radii(reader: &mut Reader, node: &Node, route: &str) -> Option<[Measured<Length>; 4]> {
    let group = reader.group(node, route, &["n", "e", "s", "w"])?;
    let mut radius = |key: &str| {
        let node = reader.need(&group, key, "3 m")?;
        reader.quantity(node, &group.path(key), "trees[].crown.radii")
    };
    let all = [radius("n"), radius("e"), radius("s"), radius("w")];
    let [n, e, s, w] = all;
    Some([n?, e?, s?, w?])
}

fn defect(reader: &mut Reader, node: &Node, route: &str) -> Option<Defect> {
    let group = reader.group(node, route, &["kind", "at", "size", "offset"])?;
    let words: Vec<_> = DefectKind::ALL.iter().map(|k| (k.word(), *k)).collect();
    let kind = reader
        .need(&group, "kind", "cavity")
        .and_then(|n| reader.word(n, &group.path("kind"), &words));
    let at = reader.text_at(&group, "at");
    let size = reader.quantity_at(&group, "size", "trees[].defects[].size");
    let offset = group.get("offset").and_then(|n| {
        pair(
            reader,
            n,
            (&group.path("offset"), "trees[].defects[].offset"),
        )
    });
    Some(Defect {
        route: route.to_owned(),
        place: group.place,
        kind: kind?,
        at,
        size,
        offset,
    })
}

fn weigh(reader: &mut Reader, node: &Node, route: &str) -> Option<Weigh> {
    let group = reader.group(node, route, &["mass", "centre"])?;
    let mass = reader
        .need(&group, "mass", "1900 ± 200 kg")
        .and_then(|n| reader.quantity(n, &group.path("mass"), "trees[].weigh.mass"));
    let centre = group
        .get("centre")
        .and_then(|n| centre(reader, n, &group.path("centre")));
    Some(Weigh {
        mass: mass?,
        centre,
    })
}

fn centre(reader: &mut Reader, node: &Node, route: &str) -> Option<WeighCentre> {
    let group = reader.group(node, route, &["offset", "toward", "height"])?;
    let offset = reader
        .need(&group, "offset", "1.4 m")
        .and_then(|n| reader.quantity(n, &group.path("offset"), "trees[].weigh.centre.offset"));
    let toward = reader
        .need(&group, "toward", "112 deg")
        .and_then(|n| reader.bearing(n, &group.path("toward")));
    let height = reader
        .need(&group, "height", "8.5 m")
        .and_then(|n| reader.quantity(n, &group.path("height"), "trees[].weigh.centre.height"));
    Some(WeighCentre {
        offset: offset?,
        toward: toward?,
        height: height?,
    })
}

fn wood(reader: &mut Reader, node: &Node, route: &str) -> Option<WoodValues> {
    let group = reader.group(node, route, &["mor", "moe", "density", "g1c"])?;
    Some(WoodValues {
        mor: reader.quantity_at(&group, "mor", "trees[].wood.mor"),
        moe: reader.quantity_at(&group, "moe", "trees[].wood.moe"),
        density: reader.quantity_at(&group, "density", "trees[].wood.density"),
        g1c: reader.quantity_at(&group, "g1c", "trees[].wood.g1c"),
    })
}

fn face(reader: &mut Reader, node: &Node, route: &str) -> Face {
    let Some(group) = reader.group(node, route, &["kind", "depth", "opening"]) else {
        return Face::default();
    };
    let words: Vec<_> = FaceKind::ALL.iter().map(|k| (k.word(), *k)).collect();
    Face {
        kind: group
            .get("kind")
            .and_then(|n| reader.word(n, &group.path("kind"), &words)),
        depth: reader.quantity_at(&group, "depth", "trees[].face.depth"),
        opening: reader.quantity_at(&group, "opening", "trees[].face.opening"),
        place: Some(group.place),
    }
}

fn way_out(reader: &mut Reader, node: &Node, route: &str) -> Option<WayOut> {
    let group = reader.group(node, route, &["id", "bearing", "length", "cleared"])?;
    let id = reader
        .need(&group, "id", "A")
        .and_then(|n| reader.id(n, &group.path("id")));
    let bearing = reader
        .need(&group, "bearing", "245 deg")
        .and_then(|n| reader.bearing(n, &group.path("bearing")));
    let length = reader
        .need(&group, "length", "8 m")
        .and_then(|n| reader.quantity(n, &group.path("length"), "trees[].ways_out[].length"));
    let cleared = group
        .get("cleared")
        .and_then(|n| reader.truth(n, &group.path("cleared")));
    Some(WayOut {
        route: route.to_owned(),
        id: id?,
        bearing: bearing?,
        length: length?,
        cleared,
        place: group.place,
    })
}

fn line(reader: &mut Reader, node: &Node, route: &str) -> Option<Line> {
    let group = reader.group(
        node,
        route,
        &["height", "anchor", "redirects", "load_limit"],
    )?;
    let height = reader
        .need(&group, "height", "9 m")
        .and_then(|n| reader.quantity(n, &group.path("height"), "trees[].line.height"));
    let anchor = reader
        .need(&group, "anchor", "[25 m, 4 m]")
        .and_then(|n| position(reader, n, &group.path("anchor")));
    let redirects = group
        .get("redirects")
        .and_then(|n| reader.whole(n, &group.path("redirects"), 20));
    let load_limit = reader.quantity_at(&group, "load_limit", "trees[].line.load_limit");
    Some(Line {
        height: height?,
        anchor: anchor?,
        redirects,
        load_limit,
    })
}

fn hazard(reader: &mut Reader, node: &Node, route: &str) -> Option<Hazard> {
    let group = reader.group(node, route, &["id", "what", "control", "owner"])?;
    let id = reader
        .need(&group, "id", "H1")
        .and_then(|n| reader.id(n, &group.path("id")));
    let what = reader
        .need(&group, "what", "dead top in T3")
        .and_then(|n| reader.text(n, &group.path("what")));
    let control = reader.text_at(&group, "control");
    let owner = reader.text_at(&group, "owner");
    Some(Hazard {
        route: route.to_owned(),
        id: id?,
        what: what?,
        control,
        owner,
        place: group.place,
    })
}
