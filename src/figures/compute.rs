//! Puts the figures of one tree together. It chooses nothing: the cuts are given.

use crate::figures::bands::band;
use crate::figures::brisk::{brisk, escape, fall};
use crate::figures::cases::{Columns, Figures, Setting};
use crate::figures::input::TreeInput;
use crate::figures::layout::Layout;
use crate::figures::model::{CannotSay, Model};
use crate::figures::read::plan_along;
use crate::figures::state::{cases, early_close};
use crate::figures::tree::{
    BackCutFigures, CaseState, Cases, CentreFigures, CrossingBand, FaceFigures, PlungeFigures,
    StrapFigures, TreeFigures, Why,
};
use crate::figures::worst::worst_case;
use crate::mechanics::rigging::{Place, lever, winch_tension};
use crate::mechanics::zone::{ring_radius, sector_half_angle};
use crate::units::{Angle, Area, Band, Bearing, Force, GRAVITY, Length, Mass, Moment};

/// How far the plunge stays clear of the final hinge. Source: common practice, about one inch.
pub(crate) const PLUNGE_CLEAR: Length = Length::mm(25.0);
/// The least room for a plunge. Source: our judgement.
pub(crate) const PLUNGE_ROOM_MIN: Length = Length::mm(15.0);

/// Every figure of one tree. Without a model, or without cuts, what rests on them cannot be said.
pub fn figures(
    input: &TreeInput,
    model: Result<&Model, &[CannotSay]>,
    layout: Option<&Layout>,
) -> TreeFigures {
    match (model, layout) {
        (Ok(model), Some(layout)) => whole(input, model, layout),
        (Ok(_), None) => nothing(input, &[]),
        (Err(reasons), Some(_) | None) => nothing(input, reasons),
    }
}

fn whole(input: &TreeInput, model: &Model, layout: &Layout) -> TreeFigures {
    let lever = line_lever(input, model, layout);
    let setting = Setting::new(input, model, layout, lever);
    let best = setting.best();
    let mut columns = setting.run();
    let worst = worst_case(input, model, layout);
    let tree = best.tree;
    let mut figures = nothing(input, &[]);
    figures.why.clear();
    weight_figures(&mut figures, (&mut columns, &best));
    lean_figures(&mut figures, (&mut columns, &best), input);
    // Before any column is reordered: the ranking needs the cases in their own order.
    let early = early_close(input, model, layout);
    let (cases, doubts) = cases(input, model, (&columns, &worst, early));
    figures.cases = cases;
    figures.doubts = doubts;
    cut_figures(&mut figures, (&mut columns, &best), (model, layout));
    figures.brisk = Some(brisk(&mut columns, &best));
    figures.plunge = input.saw.map(|saw| {
        let room = model.stem.along()
            - layout.face_depth
            - layout.hinge
            - PLUNGE_CLEAR
            - saw.nose
            - layout.strap;
        PlungeFigures {
            fits: room.value() >= PLUNGE_ROOM_MIN.value() - 5.0e-4,
            room,
        }
    });
    side_and_lift(&mut figures, (&mut columns, &best));
    figures.pull = best
        .pull
        .map(|best| band(&mut columns.pull, best).map(Force::si));
    figures.winch = input.line.and_then(|line| {
        figures
            .pull
            .map(|pull| pull.map(|force| winch_tension(force, line.redirects)))
    });
    let wind = model.wind;
    figures.wind_moment = model.crown.map(|_| Band {
        low: Moment::si(-wind),
        best: Moment::ZERO,
        high: Moment::si(wind),
    });
    let apex = 0.5 * model.stem.along() - layout.face_depth;
    let centroid = model
        .stem
        .strip(apex - layout.hinge, apex)
        .map(|hinge| hinge.forward.value())
        .unwrap_or(apex.value());
    figures.fall = fall(input, model, centroid);
    figures.mass_by_two_routes = model
        .two_masses
        .map(|(one, other)| (Mass::si(one), Mass::si(other)));
    figures.sector = Some(sector_half_angle(Angle::si(libm::atan2(
        tree.right,
        tree.forward,
    ))));
    figures.worst = Some(worst);
    figures.why = gaps(input, &figures, model);
    figures
}

fn weight_figures(figures: &mut TreeFigures, cases: (&mut Columns, &Figures)) {
    let (columns, best) = cases;
    let mass = band(&mut columns.mass, best.tree.mass).map(Mass::si);
    figures.mass = Some(mass);
    figures.weight = Some(mass.map(|mass| Force::si(mass.value() * GRAVITY)));
    if best.tree.inertia.is_some() {
        figures.stem_mass = Some(band(&mut columns.stem, best.tree.stem).map(Mass::si));
        figures.crown_mass = Some(band(&mut columns.crown, best.tree.crown).map(Mass::si));
    }
    let tree = &best.tree;
    let moment = tree.weight() * tree.forward;
    let sideways = tree.weight() * tree.right;
    figures.moment_inline = Some(band(&mut columns.moment, moment).map(Moment::si));
    figures.moment_side = Some(band(&mut columns.side_moment, sideways).map(Moment::si));
}

fn lean_figures(figures: &mut TreeFigures, cases: (&mut Columns, &Figures), input: &TreeInput) {
    let (columns, best) = cases;
    let tree = &best.tree;
    figures.centre = Some(CentreFigures {
        forward: band(&mut columns.forward, tree.forward).map(Length::si),
        right: band(&mut columns.right, tree.right).map(Length::si),
        height: band(&mut columns.height, tree.height).map(Length::si),
    });
    let angle = |band: Band<f64>| band.map(|slope| Angle::si(libm::atan(slope)));
    let away = libm::hypot(tree.forward, tree.right) / tree.height;
    figures.effective_lean = Some(angle(band(&mut columns.slope, away)));
    figures.inline_lean = Some(angle(band(&mut columns.inline, tree.forward / tree.height)));
    figures.side_lean = Some(angle(band(&mut columns.side, tree.right / tree.height)));
    let turn = libm::atan2(tree.right, tree.forward).to_degrees();
    figures.lean_toward = Some(Bearing::deg(input.lay.in_deg() + turn));
}

fn cut_figures(figures: &mut TreeFigures, cases: (&mut Columns, &Figures), cut: (&Model, &Layout)) {
    let (columns, best) = cases;
    let (model, layout) = cut;
    figures.face = Some(FaceFigures {
        depth: layout.face_depth,
        opening: layout.opening,
        hinge_length: model
            .stem
            .width_at(0.5 * model.stem.along() - layout.face_depth),
    });
    figures.hinge_thickness = Some(layout.hinge);
    figures.back_cut = Some(BackCutFigures {
        area: band(&mut columns.back_area, best.back_area).map(Area::si),
        commit_ligament: band(&mut columns.commit, best.commit).map(Length::si),
        split_ratio_at_commit: band(&mut columns.split, best.split),
    });
    figures.strap = best
        .tension
        .zip(best.strap)
        .map(|(tension, strap)| StrapFigures {
            tension: band(&mut columns.tension, tension).map(Force::si),
            thickness_min: band(&mut columns.strap, strap).map(Length::si),
            thickness: layout.strap,
        });
}

fn side_and_lift(figures: &mut TreeFigures, cases: (&mut Columns, &Figures)) {
    let (columns, best) = cases;
    let margin = band(&mut columns.side_margin, best.side_margin);
    figures.side_margin = Some(margin.map(|ratio| ratio.is_finite().then_some(ratio)));
    let lift = band(&mut columns.lift, best.lift);
    figures.wedge_lift = (lift.high > 0.0).then(|| lift.map(Length::si));
}

/// The line's lever about the planned hinge.
pub(crate) fn line_lever(input: &TreeInput, model: &Model, layout: &Layout) -> Option<f64> {
    let line = input.line?;
    let (lean, turn) = input.lean.map_or((0.0, 0.0), |lean| {
        (
            lean.angle.value.value(),
            input.lay.turn_to(lean.toward).value(),
        )
    });
    let shift = line.height.value() * libm::tan(lean);
    let (forward, right) = plan_along(input, line.anchor_east, line.anchor_north);
    let apex = 0.5 * model.stem.along() - layout.face_depth;
    let hinge = model.stem.strip(apex - layout.hinge, apex).ok()?;
    let place = |forward: f64, right: f64, up: f64| Place {
        forward: Length::si(forward),
        right: Length::si(right),
        up: Length::si(up),
    };
    let (sine, cosine) = libm::sincos(turn);
    let lever = lever(
        place(shift * cosine, shift * sine, line.height.value()),
        place(forward, right, 0.0),
        hinge.forward,
    )?;
    (lever > Length::ZERO).then(|| lever.value())
}

/// What cannot be said although the rest can.
fn gaps(input: &TreeInput, figures: &TreeFigures, model: &Model) -> Vec<Why> {
    let mut why = Vec::new();
    let mut say = |figure: &'static str, reason: &str| {
        why.push(Why {
            figure,
            reason: reason.to_owned(),
        });
    };
    if let Some(concern) = model.concern {
        say("cases", &concern.to_string());
    }
    if input.saw.is_none() {
        say("brisk", "the saw is missing");
        say("plunge", "the saw is missing");
    } else if model.central().inertia.is_none() {
        say(
            "brisk",
            "height, breast-height diameter and crown are needed for the tree's inertia",
        );
    }
    if figures.fall.is_none() {
        say(
            "fall",
            if model.central().inertia.is_none() {
                "height, breast-height diameter and crown are needed for the tree's inertia"
            } else {
                "the weight does not stand in front of the hinge: the tree does not go by itself"
            },
        );
    }
    if figures.escape.is_none() {
        say("escape", "no way out is named");
    }
    if input.line.is_some() && figures.pull.is_none() {
        say(
            "rigging",
            "the line cannot turn the tree along the lay from there",
        );
    }
    if model.crown.is_none() {
        say("wind_moment", "the crown is not measured");
    }
    why
}

/// Nothing can be said of the stump; what rests on other readings is.
fn nothing(input: &TreeInput, reasons: &[CannotSay]) -> TreeFigures {
    TreeFigures {
        mass: None,
        weight: None,
        stem_mass: None,
        crown_mass: None,
        mass_by_two_routes: None,
        centre: None,
        effective_lean: None,
        lean_toward: None,
        inline_lean: None,
        side_lean: None,
        moment_inline: None,
        moment_side: None,
        wind_moment: None,
        face: None,
        hinge_thickness: None,
        back_cut: None,
        brisk: None,
        strap: None,
        plunge: None,
        side_margin: None,
        pull: None,
        winch: None,
        wedge_lift: None,
        fall: None,
        escape: escape(input),
        ring: input
            .height
            .map(|height| ring_radius(height, input.ring_heights)),
        sector: None,
        cases: Cases {
            of: 20,
            past_limit: None,
            state: CaseState::CannotSay,
            margins: Vec::new(),
            lowered_by: Vec::new(),
        },
        worst: None,
        doubts: Vec::new(),
        why: reasons
            .iter()
            .map(|reason| Why {
                figure: "all",
                reason: reason.to_string(),
            })
            .collect(),
    }
}

/// Where holding and splitting cross over the cases, for the face of a layout.
pub fn crossing_band(input: &TreeInput, model: &Model, layout: &Layout) -> CrossingBand {
    let setting = Setting::new(input, model, layout, None);
    let (best, mut moments, mut ligaments) = setting.crossings();
    let moment = band(&mut moments, best.map_or(f64::INFINITY, |best| best.1));
    let ligament = band(&mut ligaments, best.map_or(f64::INFINITY, |best| best.0));
    CrossingBand {
        moment: moment.map(|value| value.is_finite().then(|| Moment::si(value))),
        ligament: ligament.map(|value| value.is_finite().then(|| Length::si(value))),
    }
}
