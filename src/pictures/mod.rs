//! Scenes made from what is known of a tree. They are drawn elsewhere.

use crate::briefing::{Card, Removed};
use crate::drawing::{Ink, Mark, Scene, Strip};

/// The stump from above: what is cut, the next cut, hinge and strap. `done` holds the ids of the
/// rungs cut so far, `next` the lit one.
pub fn stump(card: &Card, done: &[String], next: Option<&str>) -> Scene {
    let stump = &card.stump;
    let metres = |um: i64| um as f64 / 1.0e6;
    let half = metres(stump.along_um) / 2.0;
    let apex = half - metres(stump.face_um);
    let hinge = apex - metres(stump.hinge_um);
    let strip = |removed: &Removed, ink| Strip {
        from: metres(removed.from_um),
        to: metres(removed.to_um),
        ink,
    };
    let mut strips = vec![Strip {
        from: hinge,
        to: apex,
        ink: Ink::Hinge,
    }];
    let mut marks = vec![Mark {
        along: (hinge + apex) / 2.0,
        text: "hinge".to_owned(),
    }];
    let strap_rung = card.rungs.iter().find(|r| r.word == "back-cut-to-strap");
    if let Some(um) = strap_rung.and_then(|r| r.planned_um) {
        let edge = metres(um) - half;
        strips.push(Strip {
            from: -half,
            to: edge,
            ink: Ink::Strap,
        });
        marks.push(Mark {
            along: (edge - half) / 2.0,
            text: "strap".to_owned(),
        });
    }
    let face = |word: &str| matches!(word, "face-slope" | "face-floor");
    for rung in &card.rungs {
        let Some(removed) = &rung.removed else {
            continue;
        };
        if done.contains(&rung.id) {
            strips.push(strip(
                removed,
                if face(&rung.word) {
                    Ink::Face
                } else {
                    Ink::Gone
                },
            ));
        }
    }
    let next_rung = card.rungs.iter().find(|r| Some(r.id.as_str()) == next);
    if let Some(removed) = next_rung.and_then(|r| r.removed.as_ref()) {
        // The next cut covers only what still stands there.
        let strip = strip(removed, Ink::Next);
        let at = strips
            .iter()
            .position(|s| matches!(s.ink, Ink::Gone | Ink::Face))
            .unwrap_or(strips.len());
        strips.insert(at, strip);
        marks.push(Mark {
            along: (strip.from + strip.to) / 2.0,
            text: "< next cut".to_owned(),
        });
    }
    let half_across = metres(stump.across_um) / 2.0;
    Scene {
        half_along: half,
        half_across,
        strips,
        marks,
    }
}
