//! The ladders: the items of each stage of the day, in order, numbered 1 to 9.

use super::card::{Card, Rung, tolerance_of};
use super::item::{AskedValue, Field, Form, Item, Kind, Option_, Signs};
use super::job::{Job, JobTree};
use crate::parts::{Checklist, Choice, ListItem, Measure, Question, What};
use crate::plan::Role;

/// Numbers a page of items from 1.
fn numbered(mut items: Vec<Item>) -> Vec<Item> {
    for (number, item) in (1..).zip(items.iter_mut()) {
        item.number = number;
    }
    items
}

fn item(id: String, name: String, call: String, asked_of: &str) -> Item {
    Item {
        id,
        number: 0,
        name,
        call,
        asked_of: asked_of.to_owned(),
        blind_with: None,
        form: Form::Sign,
        kind: Kind::Checked,
        signs: Signs::Nobody,
        sentence: None,
        caution: None,
        timing: None,
    }
}

/// What is left to do at a tree that may not be cut as it stands: leave it, its ring guarded.
pub fn held_back(job: &Job, tree: &JobTree, why: &str) -> Item {
    let leave = Option_ {
        leaves: true,
        ..Option_::plain("we leave it, ring guarded")
    };
    let call = format!("{why} Stop, talk, or take back what was measured wrong.");
    Item {
        number: 1,
        form: Form::Choose(vec![leave]),
        kind: Kind::LeftStanding,
        signs: Signs::Keyer,
        caution: Some((
            "WARNING".to_owned(),
            "A cut tree left standing can fall on anyone near. Guard its ring and tell everyone."
                .to_owned(),
        )),
        ..item(
            format!("held-back.{}", tree.id),
            "Not to be cut".to_owned(),
            call,
            &job.leader,
        )
    }
}

/// Who is here, person by person.
pub fn roll_call(job: &Job) -> Vec<Item> {
    job.people
        .iter()
        .map(|person| {
            let must = person.id == job.leader;
            let mut absent = Option_::plain("not here");
            absent.holds =
                must.then(|| "The leader must be here: hand the plan to who leads.".to_owned());
            Item {
                form: Form::Choose(vec![Option_::plain("here"), absent]),
                kind: Kind::RollCall,
                ..item(
                    format!("here.{}", person.id),
                    person.name.clone(),
                    format!("{}?", person.name),
                    &person.id,
                )
            }
        })
        .collect()
}

/// Own hazards, before the prompt list can be seen.
pub fn own_hazards(job: &Job, present: &[String]) -> Vec<Item> {
    present
        .iter()
        .map(|id| {
            let name = job.name_of(id);
            Item {
                form: Form::Words(
                    "what could hurt us here, in own words; or `none seen by me`".to_owned(),
                ),
                kind: Kind::OwnHazard,
                ..item(
                    format!("hazard.{id}"),
                    format!("Hazards: {name}"),
                    format!("{name}: what could hurt us here?"),
                    id,
                )
            }
        })
        .collect()
}

/// The person a role means at a tree: its own sawyer, else the first present with the role, else
/// the first present who is neither leader nor sawyer, else the leader.
fn who(job: &Job, present: &[String], (role, tree): (&str, Option<&JobTree>)) -> String {
    let here = |id: &str| present.iter().any(|p| p == id);
    let with = |role: Role| {
        job.people
            .iter()
            .find(|p| here(&p.id) && p.roles.contains(&role))
            .map(|p| p.id.clone())
    };
    let sawyer = tree
        .and_then(|t| t.sawyer.clone())
        .filter(|id| here(id))
        .or_else(|| with(Role::Sawyer));
    let other = || {
        present
            .iter()
            .find(|id| **id != job.leader && Some(*id) != sawyer.as_ref())
            .cloned()
    };
    match role {
        "sawyer" => sawyer.unwrap_or_else(|| job.leader.clone()),
        "spotter" => with(Role::Spotter)
            .or_else(other)
            .unwrap_or_else(|| job.leader.clone()),
        _ => job.leader.clone(),
    }
}

/// Questions to named people, then what STOP means; everyone is asked at least one.
pub fn questions(job: &Job, present: &[String]) -> Vec<Item> {
    let texts = &job.parts.tailgate;
    let first = job.trees.first();
    let ask = |question: &Question| question_item(job, present, (question, first));
    let mut items: Vec<Item> = texts.questions.iter().map(ask).collect();
    items.extend(texts.stop.iter().map(ask));
    for id in present {
        if items.iter().any(|i| i.asked_of == *id) {
            continue;
        }
        let everyone = &texts.for_everyone_else;
        let mut extra = item(
            format!("{}.{id}", everyone.id),
            everyone.name.clone(),
            everyone.ask.clone(),
            id,
        );
        extra.form = said_it();
        extra.kind = Kind::Question;
        items.push(extra);
    }
    items
}

fn question_item(
    job: &Job,
    present: &[String],
    (question, tree): (&Question, Option<&JobTree>),
) -> Item {
    let asked_of = who(job, present, (&question.to, tree));
    Item {
        form: said_it(),
        kind: Kind::Question,
        ..item(
            question.id.clone(),
            question.name.clone(),
            question.ask.clone(),
            &asked_of,
        )
    }
}

/// The three outcomes of a question; only the first closes it.
fn said_it() -> Form {
    let hold = |say: &str, what: &str| Option_ {
        holds: Some(what.to_owned()),
        ..Option_::plain(say)
    };
    Form::Choose(vec![
        Option_::plain("said it right"),
        hold("part of it", "Ask on."),
        hold("not yet", "Show it and ask again."),
    ])
}

/// The plan signed by its leader, then the briefing by each person.
pub fn signing(job: &Job, present: &[String]) -> Vec<Item> {
    let texts = &job.parts.tailgate;
    let leader = job.name_of(&job.leader);
    let mut plan = signature(
        "plan".to_owned(),
        format!("Plan: {leader}"),
        &job.leader,
        &texts.plan_signing,
    );
    plan.kind = Kind::PlanSigned;
    let mut items = vec![plan];
    for id in present {
        let mut one = signature(
            format!("briefed.{id}"),
            format!("Briefed: {}", job.name_of(id)),
            id,
            &texts.signing,
        );
        one.kind = Kind::BriefSigned;
        items.push(one);
    }
    items
}

/// Everyone signs again after a change.
pub fn talk_again(job: &Job, present: &[String]) -> Vec<Item> {
    let sentence = &job.parts.tailgate.signing_again;
    present
        .iter()
        .map(|id| {
            let mut one = signature(
                format!("again.{id}"),
                format!("Again: {}", job.name_of(id)),
                id,
                sentence,
            );
            one.kind = Kind::SignedAgain;
            one
        })
        .collect()
}

/// Heads counted, each person signed out, then the leader's close.
pub fn closing(job: &Job, present: &[String]) -> Vec<Item> {
    let texts = &job.parts.tailgate;
    let mut held = Option_::plain("someone has not");
    held.holds = Some("Find them before anything else.".to_owned());
    let mut items = vec![Item {
        form: Form::Choose(vec![Option_::plain("everyone answered"), held]),
        kind: Kind::HeadCount,
        ..item(
            "head-count".to_owned(),
            "Everyone counted".to_owned(),
            "Who has answered by name?".to_owned(),
            &job.leader,
        )
    }];
    for id in present {
        let mut one = signature(
            format!("out.{id}"),
            format!("Out: {}", job.name_of(id)),
            id,
            &texts.sign_out,
        );
        one.kind = Kind::SignOut;
        items.push(one);
    }
    let mut close = signature(
        "close".to_owned(),
        "Day closed".to_owned(),
        &job.leader,
        &texts.closing,
    );
    close.kind = Kind::Close;
    items.push(close);
    items
}

fn signature(id: String, name: String, person: &str, sentence: &str) -> Item {
    Item {
        form: Form::Sign,
        signs: Signs::Asked,
        sentence: Some(sentence.to_owned()),
        ..item(id, name, "Read it, then sign.".to_owned(), person)
    }
}

/// Which tree is next. `open` are the trees that may be begun; the others say why not.
pub fn choose(job: &Job, open: &[(String, Option<String>)]) -> Vec<Item> {
    let (begin, wait): (Vec<_>, Vec<_>) = open.iter().partition(|(_, held)| held.is_none());
    let mut options: Vec<Option_> = begin
        .into_iter()
        .chain(wait)
        .take(8)
        .map(|(id, held)| {
            let species = job.tree(id).map_or("", |t| t.species.as_str());
            Option_ {
                holds: held.clone(),
                stands_for: Some(id.clone()),
                ..Option_::plain(format!("{id}, {species}"))
            }
        })
        .collect();
    options.push(Option_::plain("close the day"));
    vec![Item {
        number: 1,
        form: Form::Choose(options),
        kind: Kind::TreeChosen,
        ..item(
            "next-tree".to_owned(),
            "Next tree".to_owned(),
            "Which tree is next?".to_owned(),
            &job.leader,
        )
    }]
}

/// The items of a checklist at a tree. `caller` is who called the stop, where one was called.
pub fn list(
    job: &Job,
    present: &[String],
    (list, tree, caller): (&Checklist, &JobTree, Option<&str>),
) -> Vec<Item> {
    let of = |list_item: &ListItem| {
        let asked_of = match (list_item.to.as_str(), caller) {
            ("caller", Some(caller)) => caller.to_owned(),
            (role, _) => who(job, present, (role, Some(tree))),
        };
        list_item_of(job, present, (list_item, tree, &asked_of))
    };
    numbered(list.items.iter().map(of).collect())
}

fn list_item_of(
    job: &Job,
    present: &[String],
    (from, tree, asked_of): (&ListItem, &JobTree, &str),
) -> Item {
    let form = if from.people {
        Form::Choose(people_options(job, present))
    } else if let Some(wanted) = &from.words {
        Form::Words(wanted.clone())
    } else if from.measure.is_empty() {
        Form::Choose(from.choose.iter().map(option).collect())
    } else {
        Form::Measure(
            from.measure
                .iter()
                .map(|m| field(m, planned_at(job, tree, m.what)))
                .collect(),
        )
    };
    let kind = kind_of(from);
    let blind_with = from.blind.then(|| second_person(job, present, asked_of));
    Item {
        form,
        kind,
        blind_with,
        signs: if matches!(kind, Kind::Go | Kind::AllClear | Kind::StopReason) {
            Signs::Keyer
        } else {
            Signs::Nobody
        },
        sentence: matches!(kind, Kind::Go).then(|| "I say go.".to_owned()),
        caution: from.caution.as_ref().map(|c| (c.word.clone(), c.line())),
        ..item(
            from.id.clone(),
            from.name.clone(),
            from.call.clone(),
            asked_of,
        )
    }
}

/// Whoever is here; before anybody answered the roll, everyone of the crew.
fn people_options(job: &Job, present: &[String]) -> Vec<Option_> {
    let everyone: Vec<String> = job.people.iter().map(|p| p.id.clone()).collect();
    let ids = if present.is_empty() {
        &everyone
    } else {
        present
    };
    let option = |id: &String| Option_ {
        stands_for: Some(id.clone()),
        ..Option_::plain(job.name_of(id))
    };
    ids.iter().take(9).map(option).collect()
}

fn kind_of(from: &ListItem) -> Kind {
    if from.go {
        Kind::Go
    } else if from.own_call {
        Kind::OwnCall
    } else if from.outcome {
        Kind::Outcome
    } else if from.all_clear {
        Kind::AllClear
    } else if from.stop_reason {
        Kind::StopReason
    } else if from.words.is_some() {
        Kind::Note
    } else if from.id == "head-count" {
        Kind::HeadCount
    } else if from
        .measure
        .iter()
        .any(|m| matches!(m.what, What::Hinge | What::BackCutHeight))
    {
        Kind::StumpMeasured
    } else {
        Kind::Checked
    }
}

/// Somebody else than the one asked first: the spotter's place falls to the next person present.
fn second_person(job: &Job, present: &[String], first: &str) -> String {
    let spotter = who(job, present, ("spotter", None));
    if spotter != first {
        return spotter;
    }
    present
        .iter()
        .find(|id| *id != first)
        .cloned()
        .unwrap_or_else(|| job.leader.clone())
}

fn option(choice: &Choice) -> Option_ {
    Option_ {
        holds: choice.holds.clone(),
        talk_again: choice.talk_again,
        leaves: choice.leaves,
        ..Option_::plain(choice.say.clone())
    }
}

/// The plan's own value of what is measured at a tree before the cuts.
fn planned_at(job: &Job, tree: &JobTree, what: What) -> Option<AskedValue> {
    let tolerance = tolerance_of(what, &job.tolerance);
    match what {
        What::Stump => Some(AskedValue {
            value: tree.stump_um,
            tolerance,
        }),
        What::Lean => tree.lean_mdeg.map(|(value, spread)| AskedValue {
            value,
            tolerance: spread.max(tolerance),
        }),
        What::Wind
        | What::Count
        | What::Hinge
        | What::FaceDepth
        | What::Strap
        | What::BackCutHeight
        | What::Bypass
        | What::BehindHinge
        | What::BackCutDepth => None,
    }
}

fn field(measure: &Measure, planned: Option<AskedValue>) -> Field {
    let (least, most) = range(measure.what);
    Field {
        label: measure.label.clone(),
        what: measure.what,
        planned,
        least: measure.least.unwrap_or(least),
        most: measure.most.unwrap_or(most),
    }
}

/// What a person could mean, in the record's units.
const fn range(what: What) -> (i64, i64) {
    match what {
        What::Wind => (0, 60_000),
        What::Count => (0, 99),
        What::Lean => (0, 60_000),
        What::Stump => (30_000, 5_000_000),
        What::Hinge | What::FaceDepth | What::Strap | What::BehindHinge | What::BackCutDepth => {
            (1_000, 3_000_000)
        }
        What::BackCutHeight | What::Bypass => (0, 600_000),
    }
}

/// The hold line's items: its checklist, with the same rules as any list.
pub fn hold_line(job: &Job, present: &[String], tree: &JobTree) -> Vec<Item> {
    let mut items = list(job, present, (&job.parts.hold_line, tree, None));
    for item in &mut items {
        if item.kind == Kind::Checked {
            item.kind = Kind::HoldItem;
        }
    }
    items
}

/// The rungs of the cuts, from the tree's card.
pub fn cuts(job: &Job, present: &[String], (tree, card): (&JobTree, &Card)) -> Vec<Item> {
    let sawyer = who(job, present, ("sawyer", Some(tree)));
    let committed_from = card
        .rungs
        .iter()
        .position(|r| r.commits)
        .unwrap_or(card.rungs.len());
    let rungs = card
        .rungs
        .iter()
        .enumerate()
        .filter(|(_, r)| r.word != "hold");
    let items = rungs.map(|(index, rung)| rung_item(job, (rung, index >= committed_from), &sawyer));
    numbered(items.collect())
}

fn rung_item(job: &Job, (rung, committed): (&Rung, bool), sawyer: &str) -> Item {
    let words = job
        .parts
        .cuts
        .steps
        .get(&rung.word)
        .or_else(|| job.parts.cuts.steps.get("check"));
    let name = words.map_or(rung.word.clone(), |w| w.name.clone());
    let call = words.map_or(String::new(), |w| w.call.clone());
    let measures = words.map_or(&[][..], |w| w.measure.as_slice());
    let form = if committed && measures.is_empty() && words.is_none_or(|w| w.choose.is_empty()) {
        Form::Start
    } else if measures.is_empty() {
        Form::Choose(words.map_or(vec![], |w| w.choose.iter().map(option).collect()))
    } else {
        let planned = |what| {
            rung.planned_um.map(|value| AskedValue {
                value,
                tolerance: tolerance_of(what, &job.tolerance),
            })
        };
        Form::Measure(measures.iter().map(|m| field(m, planned(m.what))).collect())
    };
    Item {
        form,
        kind: Kind::StepDone,
        signs: Signs::Keyer,
        sentence: Some("It was reported to me as keyed.".to_owned()),
        caution: words
            .and_then(|w| w.caution.as_ref())
            .map(|c| (c.word.clone(), c.line())),
        timing: Some(timing_note(rung)),
        ..item(format!("step.{}", rung.id), name, call, sawyer)
    }
}

/// The timing note in words, with its seconds where planned.
fn timing_note(rung: &Rung) -> String {
    let seconds = rung
        .planned_ms
        .map(|ms| format!(", about {} s", (ms + 500) / 1_000));
    let note = if rung.note.is_empty() {
        String::new()
    } else {
        format!(". {}", crate::parts::capital(&rung.note))
    };
    let pace = match rung.timing.as_str() {
        "brisk" => "BRISK: to the hinge without a stop",
        "hold" => "HOLD: only when both have said go",
        _ => "at leisure",
    };
    let hinge = match (rung.word.as_str(), rung.planned_um) {
        ("back-cut" | "tilted-back-cut", Some(um)) => {
            format!(", stop at {} mm of hinge", (um + 500) / 1_000)
        }
        _ => String::new(),
    };
    format!("{pace}{hinge}{}{note}", seconds.unwrap_or_default())
}
