//! The size-up for people: one screenful a tree, every figure with its band, what was refused and
//! why, what the sums leave out.

use std::fmt::Write as _;

use crate::assessment::SizedTree;
use crate::diagnostic::Finding;
use crate::figures::TreeFigures;
use crate::method::{Choice, SizeUp};
use crate::plan::Tree;
use crate::plan::step::{Step, StepAct};
use crate::units::{Angle, Band, FromSi};

/// The text of one tree.
pub(super) fn tree(tree: &Tree, sized: &SizedTree, findings: &[&Finding]) -> String {
    let mut text = String::new();
    let t = &mut text;
    line(t, &format!("{}  {}", tree.id.value, tree.species.value));
    for held in &sized.held_back {
        line(t, &format!("  HELD BACK  {held}"));
    }
    match &sized.size_up {
        None => line(t, "  CANNOT SAY: the species or the lay is not known"),
        Some(size_up) => tree_figures(t, sized, size_up),
    }
    if !sized.ring_conflicts.is_empty() {
        line(
            t,
            &format!("  inside the ring: {}", sized.ring_conflicts.join(", ")),
        );
    }
    for finding in findings {
        line(
            t,
            &format!(
                "  {} {}: {}",
                finding.severity.word(),
                finding.code,
                finding.message
            ),
        );
    }
    t.push('\n');
    text
}

fn line(text: &mut String, words: &str) {
    text.push_str(words);
    text.push('\n');
}

fn tree_figures(t: &mut String, sized: &SizedTree, size_up: &SizeUp) {
    let figures = &size_up.figures;
    let proposed = match size_up.choice {
        Choice::Proposed(method) => method.word(),
        Choice::Refuse => "none: not with a chainsaw alone, or not on these readings",
    };
    line(t, &format!("  method proposed: {proposed}"));
    for reason in &size_up.reasons {
        line(t, &format!("    because {reason}"));
    }
    for refused in &size_up.refused {
        let method = refused.method.map_or("every method", |m| m.word());
        line(t, &format!("    refused {method}: {}", refused.reason));
    }
    state(t, figures);
    line(t, "  figure                      low      best      high");
    weight(t, figures);
    cuts(t, figures);
    around(t, figures);
    for why in &figures.why {
        line(t, &format!("  CANNOT SAY {}: {}", why.figure, why.reason));
    }
    if !sized.steps.is_empty() {
        line(
            t,
            if sized.by_hand {
                "  steps, written by hand:"
            } else {
                "  steps:"
            },
        );
        for (number, step) in (1..).zip(&sized.steps) {
            line(t, &format!("    {number}  {}", step_words(step)));
        }
    }
    match &sized.run {
        Some(Ok(run)) => line(
            t,
            &format!("  on the virtual stump: {}", run.verdict.word()),
        ),
        Some(Err(error)) => line(t, &format!("  on the virtual stump: {error}")),
        None => {}
    }
    for wanted in &size_up.approval_needed {
        line(t, &format!("  ask: {wanted}"));
    }
}

fn state(t: &mut String, figures: &TreeFigures) {
    let cases = &figures.cases;
    let counted = cases.past_limit.map_or(String::new(), |n| {
        format!(", {n} of {} equal cases past the limit", cases.of)
    });
    line(t, &format!("  state: {}{counted}", cases.state.words()));
    for lowered in &cases.lowered_by {
        line(t, &format!("    lowered by one class: {lowered}"));
    }
    if let Some(worst) = &figures.worst {
        line(
            t,
            &format!(
                "    worst credible: splitting over asked {:.2}",
                worst.split_ratio
            ),
        );
    }
    if let Some(doubt) = figures.doubts.first() {
        line(
            t,
            &format!(
                "    most doubt: the {}; {}",
                doubt.input.words(),
                doubt.input.how_to_shrink()
            ),
        );
    }
}

fn weight(t: &mut String, f: &TreeFigures) {
    row(t, ("mass, kg", 1.0), f.mass);
    row(t, ("stem, kg", 1.0), f.stem_mass);
    row(t, ("crown, kg", 1.0), f.crown_mass);
    if let Some(centre) = &f.centre {
        row(t, ("centre forward, m", 1.0), Some(centre.forward));
        row(t, ("centre right, m", 1.0), Some(centre.right));
        row(t, ("centre height, m", 1.0), Some(centre.height));
    }
    angle(t, "lean by weight, deg", f.effective_lean);
    angle(t, "  along the lay, deg", f.inline_lean);
    angle(t, "  to the right, deg", f.side_lean);
    row(t, ("moment along, kN m", 1.0e-3), f.moment_inline);
    row(t, ("moment across, kN m", 1.0e-3), f.moment_side);
    row(t, ("wind moment, kN m", 1.0e-3), f.wind_moment);
}

fn cuts(t: &mut String, f: &TreeFigures) {
    if let Some(face) = &f.face {
        single(t, "face depth, cm", face.depth.in_cm());
        single(t, "face opening, deg", face.opening.in_deg());
        single(t, "hinge length, cm", face.hinge_length.in_cm());
    }
    if let Some(hinge) = f.hinge_thickness {
        single(t, "hinge, cm", hinge.in_cm());
    }
    if let Some(back_cut) = &f.back_cut {
        row(
            t,
            ("commits at wood left, cm", 100.0),
            Some(back_cut.commit_ligament),
        );
        let r = back_cut.split_ratio_at_commit;
        numbers(t, "splitting over asked", [r.low, r.best, r.high]);
    }
    if let Some(brisk) = &f.brisk {
        row(t, ("seconds to commit", 1.0), brisk.seconds_to_commit);
        row(t, ("brisk stretch, cm", 100.0), Some(brisk.stretch));
        row(t, ("brisk stretch, s", 1.0), brisk.seconds_at_rate);
        if let Some(tilt) = brisk.tilt_at_hinge {
            gaps(
                t,
                "tilt at the hinge, deg",
                [tilt.low, tilt.best, tilt.high].map(|a| a.map(Angle::in_deg)),
            );
        }
    }
    if let Some(strap) = &f.strap {
        row(t, ("strap at least, cm", 100.0), Some(strap.thickness_min));
        row(t, ("strap tension, kN", 1.0e-3), Some(strap.tension));
    }
    if let Some(plunge) = &f.plunge {
        single(t, "room for the plunge, cm", plunge.room.in_cm());
    }
    if let Some(side) = f.side_margin {
        gaps(
            t,
            "side strength over asked",
            [side.low, side.best, side.high],
        );
    }
}

fn around(t: &mut String, f: &TreeFigures) {
    row(t, ("wedge lift, cm", 100.0), f.wedge_lift);
    row(t, ("pull at the tree, kN", 1.0e-3), f.pull);
    if let Some(fall) = &f.fall {
        single(t, "falls in at least, s", fall.seconds_min.value());
        single(t, "tip speed, m/s", fall.tip_speed.value());
    }
    if let Some(escape) = &f.escape {
        for (id, seconds) in &escape.by_way {
            single(t, &format!("out by {id}, s"), seconds.value());
        }
    }
    if let Some(ring) = f.ring {
        single(t, "ring, m", ring.value());
    }
}

fn row<T: FromSi>(t: &mut String, (name, scale): (&str, f64), band: Option<Band<T>>) {
    match band {
        Some(b) => numbers(t, name, [b.low, b.best, b.high].map(|v| v.to_si() * scale)),
        None => line(t, &format!("  {name:<24} CANNOT SAY")),
    }
}

fn angle(t: &mut String, name: &str, band: Option<Band<Angle>>) {
    match band {
        Some(b) => numbers(t, name, [b.low, b.best, b.high].map(Angle::in_deg)),
        None => line(t, &format!("  {name:<24} CANNOT SAY")),
    }
}

fn numbers(t: &mut String, name: &str, band: [f64; 3]) {
    gaps(t, name, band.map(Some));
}

fn gaps(t: &mut String, name: &str, band: [Option<f64>; 3]) {
    let _ = write!(t, "  {name:<24}");
    for end in band {
        let words = end.map_or("-".to_owned(), digits);
        let _ = write!(t, " {words:>9}");
    }
    t.push('\n');
}

fn single(t: &mut String, name: &str, value: f64) {
    line(t, &format!("  {name:<24} {:>9} {:>9}", "", digits(value)));
}

/// Two figures are all that the inputs bear; a whole number keeps its digits up to the tens.
fn digits(value: f64) -> String {
    let size = value.abs();
    if size >= 100.0 {
        let step = if size >= 1_000.0 { 10.0 } else { 1.0 };
        format!("{}", (value / step).round() * step)
    } else if size >= 10.0 {
        format!("{value:.0}")
    } else {
        format!("{value:.1}")
    }
}

fn step_words(step: &Step) -> String {
    let what = match &step.act {
        StepAct::Cut(cut) => super::simulate::cut_words(cut),
        StepAct::Check { what } => format!("check {what}"),
        StepAct::Hold { who } => format!("HOLD LINE: {} say go", who.join(" and ")),
        StepAct::Do(task) => task.word().to_owned(),
    };
    let seconds = step
        .seconds
        .map_or(String::new(), |s| format!(", about {:.0} s", s.value()));
    let note = step
        .note
        .as_ref()
        .map_or(String::new(), |n| format!(" ({n})"));
    format!("{what}, {}{seconds}{note}", step.timing.word())
}
