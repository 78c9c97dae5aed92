//! The job as the day needs it: people, trees, tolerances, sentences. Made from the plan and the
//! parts; it keeps integers in the record's units.

use crate::assessment;
use crate::parts::Parts;
use crate::plan::{DisplayUnits, Lean, Measured, Plan, Role, Tree};
use crate::units::{Angle, FromSi, Length};

/// A person of the job.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct JobPerson {
    /// Id.
    pub id: String,
    /// Name.
    pub name: String,
    /// Roles.
    pub roles: Vec<Role>,
    /// Whether a key is named in the plan.
    pub has_key: bool,
}

/// A tree of the job, as planned.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct JobTree {
    /// Id.
    pub id: String,
    /// Species as written.
    pub species: String,
    /// Its sawyer's id, where named.
    pub sawyer: Option<String>,
    /// Trees that must be down first.
    pub after: Vec<String>,
    /// Lay, millidegrees.
    pub lay_mdeg: Option<i64>,
    /// Height, micrometres.
    pub height_um: Option<i64>,
    /// Wood along the lay at the cut, micrometres.
    pub stump_um: i64,
    /// Lean, millidegrees, with one standard deviation.
    pub lean_mdeg: Option<(i64, i64)>,
    /// Bearing of the lean, millidegrees.
    pub lean_toward_mdeg: Option<i64>,
    /// Ways out: id, bearing in millidegrees, length in micrometres.
    pub ways_out: Vec<(String, i64, i64)>,
    /// Hazards: what, control, owner.
    pub hazards: Vec<(String, String, String)>,
}

/// Tolerances, in the record's units.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Tolerance {
    /// Hinge, micrometres.
    pub hinge_um: i64,
    /// Depths and heights, micrometres.
    pub depth_um: i64,
    /// Diameter, micrometres.
    pub diameter_um: i64,
    /// Lean at least, millidegrees.
    pub lean_mdeg: i64,
}

/// The job.
#[derive(Debug, Clone, PartialEq)]
pub struct Job {
    /// Name.
    pub name: String,
    /// Date.
    pub date: String,
    /// The leader's intent.
    pub intent: String,
    /// The leader's id.
    pub leader: String,
    /// People in the plan's order.
    pub people: Vec<JobPerson>,
    /// Trees in the plan's order.
    pub trees: Vec<JobTree>,
    /// Tolerances.
    pub tolerance: Tolerance,
    /// Wind that stops the work, mm/s.
    pub wind_limit_mm_s: Option<i64>,
    /// Units of the display.
    pub units: DisplayUnits,
    /// What STOP means past the hold line.
    pub stop_means: String,
    /// Who is asked in doubt: name and how to reach.
    pub qualified: Option<(String, String)>,
    /// The emergency card, line by line.
    pub emergency: Vec<String>,
    /// The texts.
    pub parts: Parts,
}

/// What STOP means where the plan says nothing.
const STOP_MEANS: &str = "everyone else stays out; the sawyer alone chooses finish or leave";

impl Job {
    /// The job of a plan with its parts.
    pub fn new(plan: &Plan, parts: Parts) -> Self {
        let person = |p: &crate::plan::Person| JobPerson {
            id: p.id.value.clone(),
            name: p.name.value.clone(),
            roles: p.roles.iter().map(|r| r.value).collect(),
            has_key: p.key.is_some(),
        };
        let qualified = plan
            .emergency
            .as_ref()
            .and_then(|e| e.qualified_person.as_ref());
        Self {
            name: plan.job.name.value.clone(),
            date: plan.job.date.value.to_string(),
            intent: plan
                .job
                .intent
                .as_ref()
                .map_or(String::new(), |i| i.value.clone()),
            leader: plan.job.leader.value.clone(),
            people: plan.crew.iter().map(person).collect(),
            trees: plan.trees.iter().map(tree).collect(),
            tolerance: tolerance(plan),
            wind_limit_mm_s: plan
                .limits
                .wind
                .as_ref()
                .map(|w| thousandths(w.value().value())),
            units: plan.units,
            stop_means: plan
                .stop_means
                .as_ref()
                .map_or(STOP_MEANS.to_owned(), |s| s.value.clone()),
            qualified: qualified.map(|q| (q.name.value.clone(), q.reach.value.clone())),
            emergency: emergency(plan),
            parts,
        }
    }

    /// A person's name, or the id where it is nobody's.
    pub fn name_of<'a>(&'a self, id: &'a str) -> &'a str {
        self.people
            .iter()
            .find(|p| p.id == id)
            .map_or(id, |p| p.name.as_str())
    }

    /// A tree by its id.
    pub fn tree(&self, id: &str) -> Option<&JobTree> {
        self.trees.iter().find(|t| t.id == id)
    }
}

fn tolerance(plan: &Plan) -> Tolerance {
    let um = |q: &Option<Measured<Length>>, default: Length| {
        micro(q.as_ref().map_or(default, Measured::value))
    };
    Tolerance {
        hinge_um: um(&plan.tolerances.hinge, Length::mm(5.0)),
        depth_um: um(&plan.tolerances.depth, Length::mm(10.0)),
        diameter_um: um(&plan.tolerances.diameter, Length::cm(2.0)),
        lean_mdeg: 1_000,
    }
}

fn tree(tree: &Tree) -> JobTree {
    let lean = tree.lean.as_ref().map(total_lean);
    JobTree {
        id: tree.id.value.clone(),
        species: tree.species.value.clone(),
        sawyer: tree.sawyer.as_ref().map(|s| s.value.clone()),
        after: tree.after.iter().map(|a| a.value.clone()).collect(),
        lay_mdeg: tree.lay.as_ref().map(|l| thousandths(l.value.in_deg())),
        height_um: tree.height.as_ref().map(|h| micro(h.value())),
        stump_um: micro(tree.stump.value()),
        lean_mdeg: lean.map(|(angle, spread, _)| (mdeg(angle), mdeg(spread))),
        lean_toward_mdeg: lean.map(|(_, _, toward)| thousandths(toward)),
        ways_out: tree
            .ways_out
            .iter()
            .map(|w| {
                (
                    w.id.value.clone(),
                    thousandths(w.bearing.value.in_deg()),
                    micro(w.length.value()),
                )
            })
            .collect(),
        hazards: tree
            .hazards
            .iter()
            .map(|h| {
                let text = |t: &Option<crate::plan::Spanned<String>>| {
                    t.as_ref().map_or(String::new(), |s| s.value.clone())
                };
                (h.what.value.clone(), text(&h.control), text(&h.owner))
            })
            .collect(),
    }
}

/// Angle, spread and bearing in degrees of a lean, however it was measured.
fn total_lean(lean: &Lean) -> (Angle, Angle, f64) {
    let lean = assessment::lean(lean);
    (lean.angle.value, lean.angle.spread, lean.toward.in_deg())
}

fn emergency(plan: &Plan) -> Vec<String> {
    let Some(emergency) = &plan.emergency else {
        return vec![];
    };
    let mut lines = vec![];
    let mut add = |label: &str, text: Option<&String>| {
        if let Some(text) = text {
            lines.push(format!("{label}: {text}"));
        }
    };
    add("call", emergency.number.as_ref().map(|s| &s.value));
    add("channel", emergency.channel.as_ref().map(|s| &s.value));
    add("backup", emergency.backup.as_ref().map(|s| &s.value));
    add("hospital", emergency.hospital.as_ref().map(|s| &s.value));
    add(
        "landing zone",
        emergency.landing_zone.as_ref().map(|s| &s.value),
    );
    add("muster", emergency.muster.as_ref().map(|s| &s.value));
    let place = &plan.job.location;
    if let (Some(latitude), Some(longitude)) = (&place.latitude, &place.longitude) {
        lines.push(format!("place: {} {}", latitude.value, longitude.value));
    }
    lines
}

/// A length in micrometres.
pub(super) fn micro(length: Length) -> i64 {
    whole(length.to_si() * 1.0e6)
}

/// An angle in millidegrees.
fn mdeg(angle: Angle) -> i64 {
    thousandths(angle.in_deg())
}

/// A number in thousandths.
fn thousandths(value: f64) -> i64 {
    whole(value * 1_000.0)
}

/// A computed number as the record's integer. Plans are limited so that it always fits.
#[expect(
    clippy::cast_possible_truncation,
    reason = "the range is bounded just before"
)]
pub(super) fn whole(value: f64) -> i64 {
    const MOST: f64 = 9.0e15;
    value.round().clamp(-MOST, MOST) as i64
}
