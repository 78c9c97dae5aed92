//! What several tests share: the demo job in memory, cards made for tests, keys pressed without
//! a terminal or a disk.

use std::process::Command;
use std::sync::Arc;

use stumpside::briefing::{Card, Job, StumpCard, rung_of};
use stumpside::parts::Parts;
use stumpside::plan::step::{Cut, Edge, Step, StepAct, Task, Timing};
use stumpside::plan::{self, Plan};
use stumpside::session::{Act, Effect, Event, Fact, Recorded, Session, Stamp, outstanding, step};
use stumpside::tui::{Desk, Intent, Key};
use stumpside::units::{Angle, Length};

/// How often a test tries: its own number, or the longer gate's.
pub(crate) fn tries(name: &str, usual: u32) -> u32 {
    std::env::var(name)
        .ok()
        .and_then(|n| n.parse().ok())
        .unwrap_or(usual)
}

/// The demo job's plan as text.
pub(crate) const DEMO_PLAN: &str = include_str!("../../demo-jobs/heron-bench/plan.yaml");

/// The demo job's plan.
pub(crate) fn demo_plan() -> Plan {
    let loaded = plan::load(DEMO_PLAN);
    assert_eq!(
        loaded.findings,
        vec![],
        "the demo plan reads without findings"
    );
    loaded.plan.unwrap()
}

/// The demo job.
pub(crate) fn demo_job() -> Arc<Job> {
    Arc::new(Job::new(&demo_plan(), Parts::built_in()))
}

fn step_of(act: StepAct, timing: Timing) -> Step {
    Step {
        act,
        timing,
        seconds: None,
        note: None,
    }
}

fn cut(cut: Cut) -> Step {
    step_of(StepAct::Cut(cut), Timing::AtLeisure)
}

/// A card made for tests: a straight back cut, or a plunge with strap.
pub(crate) fn card(method: &str) -> Card {
    let parts = Parts::built_in();
    let um = |n: i64| Length::si(n as f64 / 1.0e6);
    let stump = StumpCard {
        along_um: 540_000,
        across_um: 540_000,
        face_um: 120_000,
        hinge_um: 50_000,
    };
    let mut steps = vec![
        cut(Cut::FaceSlope {
            depth: um(120_000),
            opening: Angle::deg(70.0),
        }),
        cut(Cut::FaceFloor { depth: um(120_000) }),
    ];
    if method == "plunge-with-strap" {
        steps.push(cut(Cut::Plunge {
            front: Edge::FromHinge(um(75_000)),
            rear: Edge::FromRear(um(150_000)),
        }));
        steps.push(cut(Cut::HingeTrim { hinge: um(50_000) }));
        steps.push(cut(Cut::BackCut {
            to: Edge::FromRear(um(70_000)),
        }));
        steps.push(step_of(StepAct::Cut(Cut::StrapRelease), Timing::Hold));
    } else {
        steps.push(cut(Cut::BackCut {
            to: Edge::FromHinge(um(50_000)),
        }));
        steps.push(step_of(StepAct::Do(Task::Wedge), Timing::Brisk));
    }
    let commits = parts.cuts.methods[method].commits.clone();
    let mut rungs: Vec<_> = steps
        .iter()
        .map(|s| rung_of(s, (&stump, method == "plunge-with-strap"), &parts.cuts))
        .collect();
    for rung in &mut rungs {
        rung.commits = rung.word == commits;
    }
    Card {
        method: Some(method.to_owned()),
        state: "near-limit".to_owned(),
        past: 3,
        of: 20,
        worst_ppm: Some(1_080_000),
        doubt: "the lean reading; sight it again from the other side".to_owned(),
        reasons: vec![],
        refused: vec![],
        stops: vec![],
        figures: vec![],
        stump,
        rungs,
    }
}

/// A day without disk or terminal: facts are recorded at once.
#[derive(Clone)]
pub(crate) struct Bench {
    pub(crate) session: Session,
    pub(crate) desk: Desk,
    pub(crate) facts: Vec<Recorded>,
    seq: u64,
    now_ms: i64,
}

impl Bench {
    /// The demo job before its first act, every tree sized up by the mechanics.
    pub(crate) fn real() -> Self {
        let plan = demo_plan();
        let parts = Parts::built_in();
        Self::with_cards(|tree| stumpside::briefing::size_up(&plan, tree, (&[], &parts)))
    }

    /// The demo job before its first act, every tree with a card made for tests.
    pub(crate) fn new() -> Self {
        Self::with_cards(|tree| {
            card(match tree {
                "T3" => "plunge-with-strap",
                _ => "straight-back-cut",
            })
        })
    }

    fn with_cards(card: impl Fn(&str) -> Card) -> Self {
        let session = Session::new(demo_job());
        let mut bench = Self {
            session,
            desk: Desk::default(),
            facts: vec![],
            seq: 1,
            now_ms: 1_000,
        };
        for tree in ["T1", "T2", "T3"] {
            let fact = Fact::SizedUp {
                tree: tree.to_owned(),
                card: Box::new(card(tree)),
                because: "as planned".to_owned(),
                changes: vec![],
            };
            bench.record(vec![fact]);
        }
        bench.desk.follow(&bench.session);
        bench
    }

    fn stamp(&self) -> Stamp {
        Stamp {
            utc_ms: 1_700_000_000_000 + self.now_ms,
            up_ms: self.now_ms,
            boot: [1; 4],
        }
    }

    fn record(&mut self, facts: Vec<Fact>) {
        let stamp = self.stamp();
        let mut recorded = vec![];
        for fact in facts {
            recorded.push(Recorded {
                seq: self.seq,
                stamp: stamp.clone(),
                fact,
            });
            // A signature line may stand between.
            self.seq += 2;
        }
        self.facts.extend(recorded.clone());
        let next = step(&self.session, &Event::Recorded(recorded)).unwrap();
        self.session = next.next;
        for effect in next.effects {
            self.carry_out(effect);
        }
    }

    fn carry_out(&mut self, effect: Effect) {
        match effect {
            Effect::Record(facts) => self.record(facts),
            Effect::SizeUp { tree, because, .. } => {
                let card = Box::new(self.session.cards[&tree].clone());
                let sized = step(
                    &self.session,
                    &Event::SizedUp {
                        tree,
                        card,
                        because,
                    },
                )
                .unwrap();
                for effect in sized.effects {
                    self.carry_out(effect);
                }
            }
        }
    }

    /// The program killed and opened again.
    pub(crate) fn reopen(&mut self) {
        self.desk = Desk::default();
        self.record(vec![Fact::Reopened]);
        if let Some(held) = self.session.held.clone() {
            self.record(vec![Fact::LookLost { item: held.item }]);
        }
        self.desk.follow(&self.session);
    }

    /// A tree sized up with another card, as after a measured value.
    pub(crate) fn size_up_as(&mut self, tree: &str, card: Card) {
        let event = Event::SizedUp {
            tree: tree.to_owned(),
            card: Box::new(card),
            because: "measured".to_owned(),
        };
        for effect in step(&self.session, &event).unwrap().effects {
            self.carry_out(effect);
        }
        self.desk.follow(&self.session);
    }

    /// An act, as the shell would carry it out.
    pub(crate) fn act(&mut self, mut act: Act) {
        if let Act::Confirm { nonce, .. } = &mut act {
            *nonce = format!("{:032x}", self.seq);
        }
        let held = self.session.held.is_some();
        match step(
            &self.session,
            &Event::Act {
                act: act.clone(),
                now: self.stamp(),
            },
        ) {
            Err(refusal) => self.desk.refused(refusal.to_string()),
            Ok(next) => {
                for effect in next.effects {
                    self.carry_out(effect);
                }
                self.desk.recorded(&self.session);
                if let (Act::Confirm { typed, nonce, .. }, false, true) =
                    (&act, held, self.session.held.is_some())
                {
                    self.desk.hold(typed, nonce.clone());
                }
            }
        }
        assert!(
            outstanding(&self.session).is_empty(),
            "every effect was carried out"
        );
    }

    /// One key.
    pub(crate) fn press(&mut self, key: Key) {
        self.now_ms += 37;
        if let Some(Intent::Act(act)) = self.desk.on_key(&self.session, &key) {
            self.act(act);
        }
    }

    /// Letters and digits one by one; `\n` is Enter, `\t` is Tab.
    pub(crate) fn keys(&mut self, text: &str) {
        for c in text.chars() {
            self.press(match c {
                '\n' => Key::Enter,
                '\t' => Key::Tab,
                c => Key::Char(c),
            });
        }
    }

    /// The sensible answer to whatever is lit; `variant` chooses between answers.
    pub(crate) fn answer(&mut self, variant: usize) {
        use stumpside::briefing::Form;
        if self.session.stretch.is_some() {
            self.keys(if variant.is_multiple_of(3) { "o" } else { "d" });
            return;
        }
        let Some(item) = self.session.lit() else {
            return;
        };
        let n = item.number;
        match item.form {
            Form::Choose(options) => {
                let digit = variant % options.len() + 1;
                self.keys(&format!("{digit}\n{n}\n"));
            }
            Form::Measure(fields) => {
                let mut keys = String::new();
                for field in &fields {
                    let planned = field.planned.map_or(field.least.max(1_000), |p| p.value);
                    let typed = match field.what {
                        stumpside::parts::What::Count => 1,
                        stumpside::parts::What::Wind => 9,
                        _ => planned / 1_000 + i64::try_from(variant % 2).unwrap(),
                    };
                    keys.push_str(&format!("{typed}\n"));
                }
                self.keys(&format!("{keys}{n}\n"));
            }
            Form::Words(_) => self.keys(&format!("wdead limb above\t{n}\n")),
            Form::Sign | Form::Start => self.keys(&format!("{n}\n")),
        }
    }
}

/// Exit code, standard output and standard error of the built program.
pub(crate) fn run(arguments: &[&str]) -> (i32, String, String) {
    let output = Command::new(env!("CARGO_BIN_EXE_stumpside"))
        .args(arguments)
        .output()
        .unwrap();
    (
        output.status.code().unwrap(),
        String::from_utf8(output.stdout).unwrap(),
        String::from_utf8(output.stderr).unwrap(),
    )
}
