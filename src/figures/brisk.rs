//! The figures about time: the brisk stretch, the fall and the ways out, put into bands.

use crate::figures::bands::band;
use crate::figures::cases::{Columns, Figures};
use crate::figures::input::TreeInput;
use crate::figures::model::Model;
use crate::figures::tree::{BriskFigures, EscapeFigures, FallFigures};
use crate::mechanics::escape::{
    REACTION_RANGE, escape_time, escape_time_with_reaction, rise_along,
};
use crate::mechanics::fall::{CrownDrag, Pendulum, drag_over_inertia};
use crate::units::{Angle, Area, Band, Bearing, CutRate, Duration, Force, Inertia, Length};

pub(super) fn brisk(columns: &mut Columns, best: &Figures) -> BriskFigures {
    let seconds = |column: &mut Vec<f64>, best: Option<f64>| {
        best.map(|best| band(column, best).map(Duration::si))
    };
    BriskFigures {
        stretch: band(&mut columns.stretch, best.stretch).map(Length::si),
        area: band(&mut columns.stretch_area, best.stretch_area).map(Area::si),
        seconds_at_rate: seconds(&mut columns.seconds, best.seconds),
        rate_needed: best.rate_needed.map(|best| {
            band(&mut columns.rate_needed, best).map(|rate| (rate > 0.0).then(|| CutRate::si(rate)))
        }),
        tilt_at_hinge: best.tilt.map(|best| {
            band(&mut columns.tilt, best).map(|tilt| tilt.is_finite().then(|| Angle::si(tilt)))
        }),
        seconds_to_commit: seconds(&mut columns.to_commit, best.to_commit),
    }
}

/// The ground's rise along a bearing, rise over run.
pub(super) fn rise(input: &TreeInput, bearing: Bearing) -> f64 {
    input.slope.map_or(0.0, |slope| {
        rise_along(slope.grade, slope.downhill.turn_to(bearing))
    })
}

/// The fall about the planned hinge's centroid; `None` where the tree does not go by itself or
/// its stem is not known.
pub(super) fn fall(input: &TreeInput, model: &Model, hinge_centroid: f64) -> Option<FallFigures> {
    let tree = model.central();
    let height = Length::m(model.height?);
    let ahead = tree.forward - hinge_centroid;
    let radius = libm::hypot(ahead, tree.height);
    let inertia = Inertia::si(tree.inertia?);
    let pendulum = Pendulum::new(Force::si(tree.weight()), Length::si(radius), inertia)?;
    let start = Angle::si(libm::atan2(ahead, tree.height));
    let end = Angle::si(std::f64::consts::FRAC_PI_2 - libm::atan(rise(input, input.lay)));
    let seconds_min = pendulum.time(start, end)?;
    let kappa = model.crown.map_or(0.0, |crown| {
        drag_over_inertia(
            &CrownDrag {
                coefficient: crown.coefficient,
                width: Length::m(crown.width),
                from: Length::m(crown.base),
                to: Length::m(crown.base + crown.length),
            },
            inertia,
        )
    });
    Some(FallFigures {
        seconds_min,
        seconds_with_drag: pendulum.time_with_drag(start, end, kappa)?,
        tip_speed: pendulum.tip_speed(start, end, height),
    })
}

/// Getting away by each way; `None` where no way is named.
pub(super) fn escape(input: &TreeInput) -> Option<EscapeFigures> {
    let times: Vec<(Band<Duration>, &str)> = input
        .ways_out
        .iter()
        .map(|way| {
            let rise = rise(input, way.bearing);
            let with = |reaction: f64| {
                escape_time_with_reaction(way.length, way.state, rise, Duration::si(reaction))
            };
            let seconds = Band {
                low: with(REACTION_RANGE.0),
                best: escape_time(way.length, way.state, rise),
                high: with(REACTION_RANGE.1),
            };
            (seconds, way.id.as_str())
        })
        .collect();
    let fastest = times
        .iter()
        .map(|(seconds, _)| *seconds)
        .min_by(|one, other| one.best.value().total_cmp(&other.best.value()))?;
    Some(EscapeFigures {
        seconds: fastest,
        by_way: times
            .into_iter()
            .map(|(seconds, id)| (id.to_owned(), seconds.best))
            .collect(),
    })
}
