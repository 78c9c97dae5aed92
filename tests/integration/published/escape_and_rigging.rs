//! Getting away, lines, blocks, wedges and the ring. Source: Tobler 1993 (opened); Arboriculture
//! Australia, tree rescue manual p. 122 (opened); Kimbell 1981 (abstract opened); OSHA logging
//! advisor, wedge table (opened); a woodland magazine's segment rule (opened).
#![expect(
    clippy::approx_constant,
    reason = "printed figures that happen to look like known constants"
)]

use super::near;
use stumpside::mechanics::escape::{WayState, escape_time, rise_along, walking_speed};
use stumpside::mechanics::rigging::{
    PULL_FACTOR, Place, block_load, capstan_ratio, lever, pull, pull_moment, winch_tension,
};
use stumpside::mechanics::wedge::{back_lean_allowed, lift};
use stumpside::mechanics::zone::{level_reach, ring_radius, sector_half_angle};
use stumpside::units::{Angle, Force, Length, Moment};

#[test]
fn walking_speeds() {
    near(walking_speed(0.0).value() * 3.6, 5.0367, 1e-4);
    near(walking_speed(-0.05).value() * 3.6, 6.0, 1e-9);
    for (rise, speed) in [
        (0.0, 1.3991),
        (-0.05, 1.6667),
        (0.2, 0.6948),
        (-0.2, 0.9859),
        (0.4, 0.3450),
        (-0.4, 0.4896),
    ] {
        near(walking_speed(rise).value(), speed, 1.2e-4);
    }
}

#[test]
fn times_of_published_retreats() {
    for (length, time) in [(4.6, 4.34), (6.1, 5.49), (7.6, 6.65)] {
        near(
            escape_time(Length::m(length), WayState::Cleared, 0.0).value(),
            time,
            0.011,
        );
    }
    let level = escape_time(Length::m(6.1), WayState::Cleared, 0.0);
    assert_eq!(escape_time(Length::m(6.1), WayState::Cleared, -0.05), level);
    assert!(escape_time(Length::m(6.1), WayState::Cleared, 0.2) > level);
    assert!(escape_time(Length::m(6.1), WayState::NotCleared, 0.0) > level);
    // Away from downhill it is uphill.
    near(rise_along(0.2, Angle::deg(180.0)), 0.2, 1e-12);
    near(rise_along(0.2, Angle::ZERO), -0.2, 1e-12);
}

#[test]
fn the_moment_of_a_pull() {
    for (angle, moment) in [(30.0, 5_000.0), (45.0, 7_071.0), (90.0, 10_000.0)] {
        let found = pull_moment(Length::m(10.0), Force::si(1_000.0), Angle::deg(angle));
        near(found.value(), moment, 1.0);
    }
}

#[test]
fn a_line_on_a_back_leaner() {
    let attachment = Place {
        forward: Length::m(-0.6289),
        right: Length::ZERO,
        up: Length::m(12.0),
    };
    let anchor = Place {
        forward: Length::m(25.0),
        right: Length::ZERO,
        up: Length::ZERO,
    };
    let arm = lever(attachment, anchor, Length::ZERO).unwrap();
    near(arm.value(), 10.6010, 1e-4);
    let tension = pull(Moment::si(11_768.0), arm).unwrap();
    near(tension.value() / PULL_FACTOR, 1_110.1, 0.1);
    near(winch_tension(Force::si(900.0), 1).value(), 1_000.0, 1e-9);
    assert_eq!(lever(anchor, anchor, Length::ZERO), None);
    assert_eq!(pull(Moment::si(1.0), Length::ZERO), None);
    assert_eq!(pull(Moment::si(-1.0), arm), Some(Force::ZERO));
}

#[test]
fn loads_on_blocks_and_wraps() {
    for (angle, factor) in [
        (0.0, 2.0),
        (30.0, 1.9319),
        (45.0, 1.8478),
        (60.0, 1.7321),
        (90.0, 1.4142),
        (120.0, 1.0),
        (150.0, 0.5176),
        (180.0, 0.0),
    ] {
        near(
            block_load(Force::si(1.0), Angle::deg(angle)).value(),
            factor,
            1e-4,
        );
    }
    let turn = Angle::deg(360.0);
    near(capstan_ratio(0.1768, turn, Angle::deg(180.0)), 3.0370, 1e-4);
    near(capstan_ratio(0.1768, turn, Angle::deg(60.0)), 9.2233, 1e-4);
}

#[test]
fn wedges() {
    // 60 ft over 18 in: 40 segments; 3 ft and 4 ft of back lean need 0.9 in and 1.2 in.
    let foot = 0.3048;
    let inch = 0.0254;
    for (back, inches) in [(3.0, 0.9), (4.0, 1.2)] {
        let found = lift(
            Length::m(18.0 * inch),
            Length::m(back * foot),
            Length::m(60.0 * foot),
        );
        near(found.value() / inch, inches, 1e-9);
    }
    let allowed = |height: f64, inches: f64| {
        back_lean_allowed(Length::m(height * foot), Length::m(inches * inch))
            .map(|lean| lean.value() / foot)
    };
    near(allowed(100.0, 24.0).unwrap(), 6.5, 1e-6);
    near(allowed(100.0, 12.0).unwrap(), 13.0, 1e-6);
    near(allowed(30.0, 12.0).unwrap(), 4.0, 1e-6);
    near(allowed(85.0, 12.0).unwrap(), 11.5, 1e-6);
    assert_eq!(allowed(29.0, 12.0), None);
    assert_eq!(back_lean_allowed(Length::m(20.0), Length::ZERO), None);
}

#[test]
fn ring_sector_and_reach() {
    near(ring_radius(Length::m(24.4), 2.0).value(), 48.8, 1e-9);
    near(sector_half_angle(Angle::deg(5.0)).in_deg(), 45.0, 1e-9);
    near(sector_half_angle(Angle::deg(-40.0)).in_deg(), 70.0, 1e-9);
    near(sector_half_angle(Angle::deg(170.0)).in_deg(), 180.0, 1e-9);
    let reach = |grade: f64| level_reach(Length::m(1.0), Angle::si(libm::atan(grade))).value();
    near(reach(0.30), 0.958, 1e-3);
    near(reach(0.60), 0.857, 1e-3);
}
