//! A tree of the plan as the input of its size-up, with values measured since in the place of
//! planned ones. It judges nothing; an unknown species is said, never guessed.

use crate::figures::{
    Condition, Crown, CrownInput, Line, Overrides, Saw, SiteStop, Slope, TreeInput, WayOut, Weigh,
    WoodOverride, WoodState,
};
use crate::geometry::Point;
use crate::mechanics::escape::WayState;
use crate::mechanics::lean::{Lean, TwoViews, from_two_views};
use crate::mechanics::saw::{CutWood, cutting_rate, power};
use crate::mechanics::section::Cavity;
use crate::mechanics::wind::Leaf;
use crate::plan::{self, DefectKind, FeatureKind, Measured, Plan, Tree, TreeState};
use crate::species::{self, Species, WoodType};
use crate::units::{Angle, CutRate, Length, Reading, Speed};

/// Something measured since the plan was written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Since {
    /// Wood along the lay at the cut.
    Stump(Length),
    /// Lean of the stem.
    Lean(Angle),
    /// Wind at the tree.
    Wind(Speed),
    /// Face depth as cut.
    FaceDepth(Length),
    /// Hinge as cut, its thinner end.
    Hinge(Length),
    /// Strap as cut, its thinner side.
    Strap(Length),
    /// Back cut above the apex as cut.
    BackCutHeight(Length),
    /// Overlap of the two face cuts.
    Bypass(Length),
}

/// One standard deviation of a length measured at the stump with a tape or caliper. Source: our
/// judgement.
const AT_THE_STUMP: Length = Length::mm(5.0);
/// The nose of a bar where the plan gives none. Source: our judgement of common bars.
const NOSE_DEFAULT: Length = Length::cm(9.0);
/// The kerf where the plan gives none. Source: tree saws of 3/8 inch pitch, 7 to 8 mm (memory).
const KERF_DEFAULT: Length = Length::mm(8.0);

/// The input of a tree; nothing where its species is not known.
pub fn tree_input(plan: &Plan, tree: &Tree, since: &[Since]) -> Option<TreeInput> {
    let species = species::find(&tree.species.value)?;
    let lay = tree.lay.as_ref()?.value;
    let mut input = TreeInput::new(species, lay);
    input.wood = wood(tree);
    input.wood_state = match tree.state.as_ref().map(|s| s.value) {
        Some(TreeState::Dead) => WoodState::Dead,
        Some(TreeState::Frozen) => WoodState::Frozen,
        Some(TreeState::Live | TreeState::Lodged | TreeState::Split) | None => WoodState::Live,
    };
    (input.conditions, input.cavities) = defects(tree);
    input.stump_along = Some(tree.stump.reading);
    input.stump_across = Some(tree.stump_across.as_ref().unwrap_or(&tree.stump).reading);
    input.dbh = reading(tree.dbh.as_ref());
    input.height = tree.height.as_ref().map(Measured::value);
    input.lean = tree.lean.as_ref().map(lean);
    input.crown = crown(tree);
    input.weigh = tree.weigh.as_ref().and_then(weigh);
    input.slope = plan.site.slope.as_ref().map(|slope| Slope {
        grade: libm::tan(slope.angle.value().value()),
        downhill: slope.downhill.value,
    });
    input.saw = saw(plan, tree, species);
    if let Some(expected) = &plan.limits.expected {
        input.wind_expected = expected.value();
    }
    input.ways_out = tree.ways_out.iter().map(way_out).collect();
    input.wedges = tree
        .wedges
        .as_ref()
        .map_or(0, |w| u8::try_from(w.value).unwrap_or(u8::MAX));
    input.line = line(tree);
    input.overrides = Overrides {
        face_depth: tree.face.depth.as_ref().map(Measured::value),
        opening: tree.face.opening.as_ref().map(Measured::value),
        hinge: tree.hinge.as_ref().map(Measured::value),
        back_cut_height: tree.back_cut_height.as_ref().map(Measured::value),
        strap: tree.strap.as_ref().map(Measured::value),
        method: tree.method.as_ref().map(|m| m.value),
    };
    input.site_stops = site_stops(plan, tree);
    for one in since {
        apply(&mut input, *one);
    }
    Some(input)
}

fn apply(input: &mut TreeInput, since: Since) {
    match since {
        Since::Stump(along) => {
            // An oval stem keeps its shape.
            let ratio = match (input.stump_across, input.stump_along) {
                (Some(across), Some(planned)) => across.value / planned.value,
                _ => 1.0,
            };
            input.stump_along = Some(Reading::new(along, AT_THE_STUMP));
            input.stump_across = Some(Reading::new(along * ratio, AT_THE_STUMP));
        }
        Since::Lean(angle) => {
            if let Some(lean) = &mut input.lean {
                lean.angle.value = angle;
            }
        }
        Since::Wind(wind) => input.wind_expected = input.wind_expected.max(wind),
        Since::FaceDepth(depth) => input.overrides.face_depth = Some(depth),
        Since::Hinge(hinge) => input.overrides.hinge = Some(hinge),
        Since::Strap(strap) => input.overrides.strap = Some(strap),
        Since::Bypass(bypass) => input.bypass = Some(bypass),
        Since::BackCutHeight(height) => input.overrides.back_cut_height = Some(height),
    }
}

fn reading(measured: Option<&Measured<Length>>) -> Option<Reading<Length>> {
    measured.map(|m| m.reading)
}

fn wood(tree: &Tree) -> WoodOverride {
    tree.wood
        .as_ref()
        .map_or_else(WoodOverride::default, |wood| WoodOverride {
            mor: wood.mor.as_ref().map(Measured::value),
            moe: wood.moe.as_ref().map(Measured::value),
            density: wood.density.as_ref().map(Measured::value),
            g1c: wood.g1c.as_ref().map(Measured::value),
        })
}

/// Conditions the sums do not cover, and cavities they do.
fn defects(tree: &Tree) -> (Vec<Condition>, Vec<Cavity>) {
    let (mut conditions, mut cavities) = (vec![], vec![]);
    for defect in &tree.defects {
        let cavity = defect.size.as_ref().map(|size| Cavity {
            diameter: size.value(),
            forward: defect
                .offset
                .as_ref()
                .map_or(Length::ZERO, |o| o[0].value()),
            right: defect
                .offset
                .as_ref()
                .map_or(Length::ZERO, |o| o[1].value()),
        });
        match (defect.kind.value, cavity) {
            (DefectKind::Cavity | DefectKind::Rot, Some(cavity)) => cavities.push(cavity),
            (DefectKind::Cavity, None) => conditions.push(Condition::Hollow),
            (DefectKind::Rot, None) => conditions.push(Condition::RotAtHinge),
            (DefectKind::Crack, _) => conditions.push(Condition::Crack),
            (DefectKind::Shake, _) => conditions.push(Condition::Shake),
            (DefectKind::Fork, _) => conditions.push(Condition::Fork),
            (DefectKind::Insects, _) => conditions.push(Condition::Insects),
            (DefectKind::Roots, _) => conditions.push(Condition::Roots),
            // An old wound hides what is behind it: it counts as a crack until it is looked into.
            (DefectKind::Wound, _) => conditions.push(Condition::Crack),
        }
    }
    (conditions, cavities)
}

/// The total lean, however it was measured: straight toward a bearing, or from two views.
pub fn lean(lean: &plan::Lean) -> Lean {
    match lean {
        plan::Lean::Toward { angle, toward } => Lean {
            angle: angle.reading,
            toward: toward.value,
            toward_spread: Angle::ZERO,
        },
        plan::Lean::Views {
            view_a,
            view_b,
            facing,
        } => from_two_views(&TwoViews {
            view_a: view_a.reading,
            view_b: view_b.reading,
            facing: facing.value,
        }),
    }
}

fn crown(tree: &Tree) -> CrownInput {
    let Some(crown) = &tree.crown else {
        return CrownInput::Missing;
    };
    let Some([north, east, south, west]) = &crown.radii else {
        return CrownInput::Missing;
    };
    CrownInput::Measured(Crown {
        base: crown.base.value(),
        north: north.reading,
        east: east.reading,
        south: south.reading,
        west: west.reading,
        leaf: match crown.leaf.as_ref().map(|l| l.value) {
            Some(plan::Leaf::Bare) => Leaf::Bare,
            Some(plan::Leaf::Leafed) | None => Leaf::InLeaf,
        },
    })
}

fn weigh(weigh: &plan::Weigh) -> Option<Weigh> {
    let centre = weigh.centre.as_ref()?;
    Some(Weigh {
        mass: weigh.mass.reading,
        offset: centre.offset.reading,
        toward: centre.toward.value,
        height: centre.height.value(),
    })
}

/// The tree's saw, its rate measured or worked out from its displacement.
fn saw(plan: &Plan, tree: &Tree, species: &Species) -> Option<Saw> {
    let named = tree.saw.as_ref()?;
    let saw = plan.saws.iter().find(|s| s.id.value == named.value)?;
    let from_displacement = |volume: &Measured<crate::units::SweptVolume>| {
        let rate = cutting_rate(power(volume.value()), cut_wood(species));
        // A rate worked out is no rate measured: wide doubt, our judgement.
        Reading::new(rate, CutRate::si(rate.value() * 0.25))
    };
    let rate = saw
        .rate
        .as_ref()
        .map(|r| r.reading)
        .or_else(|| saw.displacement.as_ref().map(from_displacement))?;
    Some(Saw {
        bar: saw.bar.value(),
        nose: saw.nose.as_ref().map_or(NOSE_DEFAULT, Measured::value),
        kerf: saw.kerf.as_ref().map_or(KERF_DEFAULT, Measured::value),
        rate,
    })
}

fn cut_wood(species: &Species) -> CutWood {
    match species.wood_type {
        WoodType::Softwood => CutWood::Softwood,
        WoodType::Hardwood if species.specific_gravity_green > 0.55 => CutWood::DenseHardwood,
        WoodType::Hardwood => CutWood::MediumHardwood,
    }
}

fn way_out(way: &plan::WayOut) -> WayOut {
    let cleared = way.cleared.as_ref().is_some_and(|c| c.value);
    WayOut {
        id: way.id.value.clone(),
        bearing: way.bearing.value,
        length: way.length.value(),
        state: if cleared {
            WayState::Cleared
        } else {
            WayState::NotCleared
        },
    }
}

fn line(tree: &Tree) -> Option<Line> {
    let line = tree.line.as_ref()?;
    let at = tree.at.as_ref()?;
    Some(Line {
        height: line.height.value(),
        anchor_east: line.anchor[0].value() - at[0].value(),
        anchor_north: line.anchor[1].value() - at[1].value(),
        redirects: line
            .redirects
            .as_ref()
            .map_or(0, |r| u8::try_from(r.value).unwrap_or(u8::MAX)),
        load_limit: line.load_limit.as_ref().map(Measured::value),
    })
}

fn site_stops(plan: &Plan, tree: &Tree) -> Vec<SiteStop> {
    let mut stops = vec![];
    if tree.ways_out.is_empty() {
        stops.push(SiteStop::NoWayOut);
    }
    let reached = |feature: &&plan::Feature| {
        let clearance = feature
            .voltage
            .as_ref()
            .map_or(3.05, |v| line_clearance(v.value().value()));
        let reach = tree.height.as_ref().map_or(0.0, |h| h.value().value()) + clearance;
        distance(tree, feature).is_some_and(|d| d <= reach)
    };
    let lines = plan
        .site
        .features
        .iter()
        .filter(|f| f.kind.value == FeatureKind::PowerLine);
    if lines.filter(reached).count() > 0 {
        stops.push(SiteStop::PowerLineInReach);
    }
    stops
}

/// Metres to keep from a line: 10 ft up to 50 kV, 4 in more for each further 10 kV begun. The
/// voltage is taken as between phases and ground, the guarded side.
/// Source: 29 CFR 1910.333(c)(3)(i) (from memory; the formula read on a secondary page).
fn line_clearance(volts: f64) -> f64 {
    let over = (volts - 50_000.0).max(0.0);
    3.048 + 0.1016 * libm::ceil(over / 10_000.0)
}

/// Metres from a tree to a feature's nearest point; nothing where a position is missing.
pub fn distance(tree: &Tree, feature: &plan::Feature) -> Option<f64> {
    let at = point(tree.at.as_ref()?);
    let radius = feature.radius.as_ref().map_or(0.0, |r| r.value().value());
    let points: Vec<Point> = feature.at.iter().chain(&feature.along).map(point).collect();
    let single = points.iter().map(|p| libm::hypot(p.x - at.x, p.y - at.y));
    let course: Vec<Point> = feature.along.iter().map(point).collect();
    let courses = course
        .windows(2)
        .map(|pair| to_segment(at, pair[0], pair[1]));
    single
        .chain(courses)
        .min_by(f64::total_cmp)
        .map(|d| (d - radius).max(0.0))
}

fn point(at: &[Measured<Length>; 2]) -> Point {
    Point {
        x: at[0].value().value(),
        y: at[1].value().value(),
    }
}

fn to_segment(at: Point, a: Point, b: Point) -> f64 {
    let (dx, dy) = (b.x - a.x, b.y - a.y);
    let square = dx * dx + dy * dy;
    let along = if square > 0.0 {
        ((at.x - a.x) * dx + (at.y - a.y) * dy) / square
    } else {
        0.0
    };
    let t = along.clamp(0.0, 1.0);
    libm::hypot(a.x + t * dx - at.x, a.y + t * dy - at.y)
}
