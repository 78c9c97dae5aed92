//! The crew and the emergency plan.

use super::reader::{Group, Reader};
use crate::document::Node;
use crate::plan::{Emergency, Person, QualifiedPerson, Role, Spanned};

/// At most this many people in a plan.
const LIMIT_PEOPLE: usize = 200;

pub(super) fn crew(reader: &mut Reader, node: &Node) -> Vec<Person> {
    let items = reader.list(node, "crew");
    if items.len() > LIMIT_PEOPLE {
        let message = format!(
            "{} people stand here; at most {LIMIT_PEOPLE} are read",
            items.len()
        );
        reader.stop(
            "PLAN-14",
            (node.place, "crew"),
            (message, "split the job into several plans"),
        );
        return vec![];
    }
    let mut crew: Vec<Person> = vec![];
    for (index, item) in items.iter().enumerate() {
        let route = format!("crew[{index}]");
        let Some(person) = person(reader, item, &route) else {
            continue;
        };
        if crew.iter().any(|other| other.id.value == person.id.value) {
            let message = format!("the id `{}` stands twice in the crew", person.id.value);
            reader.stop(
                "PLAN-10",
                (person.id.place, &format!("{route}.id")),
                (message, "give each person an id of their own"),
            );
        }
        crew.push(person);
    }
    crew
}

fn person(reader: &mut Reader, node: &Node, route: &str) -> Option<Person> {
    let known = &[
        "id",
        "name",
        "roles",
        "key",
        "fells_up_to",
        "first_aid_until",
        "cpr_until",
        "trained",
    ];
    let group = reader.group(node, route, known)?;
    let id = reader
        .need(&group, "id", "short-name")
        .and_then(|n| person_id(reader, n, &group));
    let name = reader
        .need(&group, "name", "Full Name")
        .and_then(|n| reader.text(n, &group.path("name")));
    let roles = roles(reader, &group);
    let key = reader.text_at(&group, "key");
    let fells_up_to = reader.quantity_at(&group, "fells_up_to", "crew[].fells_up_to");
    let first_aid_until = group
        .get("first_aid_until")
        .and_then(|n| reader.date(n, &group.path("first_aid_until")));
    let cpr_until = group
        .get("cpr_until")
        .and_then(|n| reader.date(n, &group.path("cpr_until")));
    let trained = trainings(reader, &group);
    reader.whole_or_unread(id.as_ref(), name.is_some());
    Some(Person {
        route: route.to_owned(),
        id: id?,
        name: name?,
        roles,
        key,
        fells_up_to,
        first_aid_until,
        cpr_until,
        trained,
        place: group.place,
    })
}

/// A person's id is also a name in the list of keys, so it is lower case.
fn person_id(reader: &mut Reader, node: &Node, group: &Group<'_>) -> Option<Spanned<String>> {
    let route = group.path("id");
    let id = reader.id(node, &route)?;
    if id.value.chars().any(|c| c.is_ascii_uppercase()) {
        let message = format!("the id `{}` has capital letters", id.value);
        let help = format!(
            "write `{}`: the id is also the name of the person's key",
            id.value.to_lowercase()
        );
        reader.stop("PLAN-08", (id.place, &route), (message, &help));
        return None;
    }
    Some(id)
}

fn roles(reader: &mut Reader, group: &Group<'_>) -> Vec<Spanned<Role>> {
    let words: Vec<(&'static str, Role)> = Role::ALL.iter().map(|r| (r.word(), *r)).collect();
    let route = group.path("roles");
    let Some(node) = reader.need(group, "roles", "[sawyer]") else {
        return vec![];
    };
    let mut roles = vec![];
    for (index, item) in reader.list(node, &route).iter().enumerate() {
        roles.extend(reader.word(item, &format!("{route}[{index}]"), &words));
    }
    roles
}

fn trainings(reader: &mut Reader, group: &Group<'_>) -> Vec<(String, Spanned<chrono::NaiveDate>)> {
    let Some(node) = group.get("trained") else {
        return vec![];
    };
    let Some(inner) = reader.open_group(node, &group.path("trained")) else {
        return vec![];
    };
    let mut trained = vec![];
    for entry in inner.entries() {
        if let Some(date) = reader.date(&entry.value, &inner.path(&entry.key)) {
            trained.push((entry.key.clone(), date));
        }
    }
    trained
}

pub(super) fn emergency(reader: &mut Reader, node: &Node) -> Option<Emergency> {
    let known = &[
        "number",
        "hospital",
        "drive",
        "radio",
        "check_in",
        "first_aiders",
        "kits",
        "rescue_sawyer",
        "landing_zone",
        "muster",
        "qualified_person",
    ];
    let group = reader.group(node, "emergency", known)?;
    let radio = group
        .get("radio")
        .and_then(|n| reader.group(n, "emergency.radio", &["channel", "backup"]));
    let channel = radio
        .as_ref()
        .and_then(|radio| reader.text_at(radio, "channel"));
    let backup = radio
        .as_ref()
        .and_then(|radio| reader.text_at(radio, "backup"));
    Some(Emergency {
        number: reader.text_at(&group, "number"),
        hospital: reader.text_at(&group, "hospital"),
        drive: reader.quantity_at(&group, "drive", "emergency.drive"),
        channel,
        backup,
        check_in: reader.quantity_at(&group, "check_in", "emergency.check_in"),
        first_aiders: reader.texts_at(&group, "first_aiders"),
        kits: reader.texts_at(&group, "kits"),
        rescue_sawyer: reader.text_at(&group, "rescue_sawyer"),
        landing_zone: reader.text_at(&group, "landing_zone"),
        muster: reader.text_at(&group, "muster"),
        qualified_person: group
            .get("qualified_person")
            .and_then(|n| qualified(reader, n)),
        place: group.place,
    })
}

fn qualified(reader: &mut Reader, node: &Node) -> Option<QualifiedPerson> {
    let route = "emergency.qualified_person";
    let group = reader.group(node, route, &["name", "reach"])?;
    let name = reader
        .need(&group, "name", "Full Name")
        .and_then(|n| reader.text(n, &group.path("name")));
    let reach = reader
        .need(&group, "reach", "number or channel")
        .and_then(|n| reader.text(n, &group.path("reach")));
    Some(QualifiedPerson {
        name: name?,
        reach: reach?,
    })
}
