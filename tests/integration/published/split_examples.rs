//! Worked examples of holding, splitting and the strap, by hand and by numerical integration.
//! Source: worked examples 1 to 6 and the black locust, each recomputed without closed forms.

use super::{near, within};
use stumpside::mechanics::holding::{
    Demand, FIRST_MOVEMENT, FacedStem, Wood, hold_moment, ligament_section, meets_at,
};
use stumpside::mechanics::section::{Section, Stem};
use stumpside::mechanics::splitting::{Slabs, crossing, fracture_energy, pure_bending_split};
use stumpside::mechanics::strap::{Slotted, failing_thickness, held};
use stumpside::units::{Density, Force, FractureEnergy, Length, Moment, SecondMoment, Stress};

fn wood(mor: f64, moe: f64, gravity_12: f64) -> Wood {
    let g1c = fracture_energy(Density::si(1120.0 * gravity_12));
    Wood {
        mor: Stress::si(mor * 1.0e6),
        moe: Stress::si(moe * 1.0e9),
        g1c,
        g2c: g1c * 3.0,
    }
}

fn careful(wood: &Wood) -> Wood {
    Wood {
        mor: wood.mor * 1.2,
        g1c: wood.g1c * 0.5,
        g2c: wood.g2c * 0.5,
        ..*wood
    }
}

fn stem(diameter: f64) -> Stem {
    Stem::new(Length::m(diameter), Length::m(diameter)).unwrap()
}

fn demand(moment: f64, weight: f64) -> Demand {
    Demand {
        weight: Force::si(weight),
        forward: Length::ZERO,
        extra: Moment::si(moment),
    }
}

fn cut(stem: &Stem, face: f64, hinge: f64) -> (Section, Slabs) {
    let ligament = ligament_section(stem, Length::m(face), Length::m(hinge)).unwrap();
    let slabs = Slabs::at_edge(stem, ligament.rear);
    (ligament, slabs)
}

#[test]
fn example_1_northern_red_oak_sections() {
    let stem = stem(0.5);
    let (hinge, slabs) = cut(&stem, 0.125, 0.05);
    near(hinge.front.value(), 0.125, 1e-9);
    near(hinge.rear.value(), 0.075, 1e-9);
    near(slabs.width().value(), 0.47697, 1e-5);
    near(stem.width_at(hinge.front).value(), 0.433013, 1e-6);
    let whole = stem.whole().unwrap();
    near(whole.area.value(), 0.1963495, 1e-7);
    near(whole.i_inline.value(), 3.067962e-3, 1e-9);
    near(hinge.area.value(), 2.285857e-2, 1e-8);
    near(hinge.forward.value(), 9.960052e-2, 1e-8);
    near(hinge.i_inline.value(), 4.749488e-6, 1e-12);
    near(hinge.i_side.value(), 3.990493e-4, 1e-10);
    near(hinge.modulus().value(), 1.869916e-4, 1e-10);
    let back = hinge.i_inline.value() / (hinge.forward - hinge.rear).value();
    near(back, 1.930645e-4, 1e-10);
    let (front, rear) = (slabs.front().unwrap(), slabs.back().unwrap());
    near(front.area.value(), 6.124512e-2, 1e-8);
    near(front.forward.value(), 0.1476452, 1e-7);
    near(front.i_inline.value(), 1.305093e-4, 1e-10);
    near(rear.area.value(), 0.1351044, 1e-7);
    near(rear.forward.value(), -6.693007e-2, 1e-8);
    near(rear.i_inline.value(), 9.971448e-4, 1e-10);
}

#[test]
fn example_1_northern_red_oak_moments() {
    let stem = stem(0.5);
    let oak = wood(57.0, 9.3, 0.63);
    near(oak.g1c.value(), 587.82, 0.01);
    near(oak.g2c.value(), 1763.47, 0.01);
    let (hinge, slabs) = cut(&stem, 0.125, 0.05);
    let hold = hold_moment(&hinge, oak.mor);
    near(hold.value(), 10_658.5, 0.1);
    near(hold.value() * FIRST_MOVEMENT, 6_181.9, 0.1);
    let release = slabs.release(&oak, Moment::si(40_000.0));
    near(release.total.value(), 1_323.1, 0.1);
    near(release.opening.value(), 1_221.96, 0.01);
    near(release.sliding.value(), 101.15, 0.01);
    near(release.opening / release.total, 0.9236, 1e-4);
    let weight = Force::si(18_000.0);
    near(
        slabs
            .release_with_weight(&oak, Moment::si(40_000.0), weight)
            .value(),
        1_145.99,
        0.01,
    );
    near(
        demand(40_000.0, 18_000.0).about(hinge.forward).value(),
        38_207.2,
        0.1,
    );
    near(
        slabs.split_moment_total(&oak).unwrap().value(),
        26_661.6,
        0.1,
    );
    let mixed = slabs.split_moment(&oak).unwrap();
    near(mixed.value(), 27_368.1, 0.1);
    near(slabs.split_moment_total(&oak).unwrap() / hold, 2.5014, 1e-4);
    near(mixed / hold, 2.5677, 1e-4);
    let worst = careful(&oak);
    let ratio = slabs.split_moment(&worst).unwrap() / hold_moment(&hinge, worst.mor);
    near(ratio, 1.5130, 1e-4);
}

#[test]
fn example_2_progress_of_a_plain_back_cut() {
    let stem = stem(0.5);
    let oak = wood(57.0, 9.3, 0.63);
    let faced = FacedStem {
        stem: &stem,
        face_depth: Length::m(0.125),
    };
    let light = demand(25_000.0, 0.0);
    near(
        meets_at(&faced, &oak, &light, FIRST_MOVEMENT).value(),
        0.099440,
        1e-6,
    );
    near(meets_at(&faced, &oak, &light, 1.0).value(), 0.076076, 1e-6);
    let heavy = demand(25_000.0, 18_000.0);
    near(
        meets_at(&faced, &oak, &heavy, FIRST_MOVEMENT).value(),
        0.096742,
        1e-6,
    );
    near(meets_at(&faced, &oak, &heavy, 1.0).value(), 0.073683, 1e-6);
    let (_, slabs) = cut(&stem, 0.125, 0.042274);
    within(slabs.split_moment(&oak).unwrap().value(), 25_000.0, 2e-5);
    let star = crossing(&faced, &oak).unwrap();
    near(star.ligament.value(), 0.1088873, 1e-7);
    near(star.moment.value(), 51_839.6, 0.1);
    let star = crossing(&faced, &careful(&oak)).unwrap();
    near(star.ligament.value(), 0.0675632, 1e-7);
    near(star.moment.value(), 23_569.0, 0.1);
}

#[test]
fn example_3_white_ash_splits_first() {
    let stem = stem(0.6);
    let ash = wood(66.0, 9.9, 0.60);
    near(ash.g1c.value(), 552.88, 0.01);
    let faced = FacedStem {
        stem: &stem,
        face_depth: Length::m(0.12),
    };
    let star = crossing(&faced, &ash).unwrap();
    near(star.ligament.value(), 0.0857168, 1e-7);
    near(star.moment.value(), 41_443.6, 0.1);
    let commit = meets_at(&faced, &ash, &demand(95_000.0, 0.0), 1.0);
    near(commit.value(), 0.128439, 1e-6);
    let (hinge, slabs) = cut(&stem, 0.12, 0.177590);
    near(hinge.rear.value(), 0.00240976, 1e-5);
    near(slabs.width().value(), 0.599981, 1e-6);
    within(slabs.front().unwrap().i_inline.value(), 8.657955e-4, 2e-5);
    within(slabs.back().unwrap().i_inline.value(), 9.126750e-4, 2e-5);
    within(hinge.i_inline.value(), 2.570870e-4, 2e-5);
    within(hinge.modulus().value(), 2.797891e-3, 2e-5);
    let hold = hold_moment(&hinge, ash.mor);
    within(hold.value(), 184_660.8, 2e-5);
    let release = slabs.release(&ash, Moment::si(95_000.0));
    within(release.total.value(), 758.05, 3e-5);
    within(release.opening.value(), 450.30, 3e-5);
    within(release.sliding.value(), 307.75, 3e-5);
    within(
        slabs.split_moment_total(&ash).unwrap().value(),
        81_131.8,
        2e-5,
    );
    within(slabs.split_moment(&ash).unwrap().value(), 95_000.0, 2e-5);
    near(slabs.split_moment(&ash).unwrap() / hold, 0.5145, 1e-4);
}

#[test]
fn example_4_douglas_fir() {
    let stem = stem(1.0);
    let fir = wood(53.0, 10.8, 0.48);
    near(fir.g1c.value(), 413.10, 0.01);
    let (hinge, slabs) = cut(&stem, 0.30, 0.09);
    near(slabs.width().value(), 0.9755, 1e-4);
    near(hinge.area.value(), 8.542461e-2, 1e-8);
    near(hinge.forward.value(), 0.1545349, 1e-7);
    near(hinge.i_inline.value(), 5.756656e-5, 1e-11);
    near(hinge.modulus().value(), 1.266169e-3, 1e-9);
    near(hold_moment(&hinge, fir.mor).value(), 67_106.95, 0.01);
    near(slabs.front().unwrap().i_inline.value(), 3.005413e-3, 1e-9);
    near(slabs.back().unwrap().i_inline.value(), 1.305566e-2, 1e-8);
    near(stem.whole().unwrap().i_inline.value(), 4.908739e-2, 1e-8);
    near(
        slabs.split_moment_total(&fir).unwrap().value(),
        166_932.8,
        0.1,
    );
    near(slabs.split_moment(&fir).unwrap().value(), 174_936.0, 0.1);
    near(
        slabs.split_moment(&fir).unwrap() / hold_moment(&hinge, fir.mor),
        2.6068,
        1e-4,
    );
    let worst = careful(&fir);
    near(
        slabs.split_moment(&worst).unwrap() / hold_moment(&hinge, worst.mor),
        1.5361,
        1e-4,
    );
    let faced = FacedStem {
        stem: &stem,
        face_depth: Length::m(0.30),
    };
    let commit = meets_at(&faced, &fir, &demand(120_000.0, 0.0), 1.0);
    near(commit.value(), 0.120018, 1e-6);
    let (there, slabs) = cut(&stem, 0.30, commit.value());
    within(slabs.front().unwrap().i_inline.value(), 3.851592e-3, 1e-6);
    within(there.modulus().value(), 2.264151e-3, 1e-6);
    within(slabs.split_moment(&fir).unwrap().value(), 205_642.3, 1e-6);
    near(
        slabs.split_moment(&fir).unwrap() / hold_moment(&there, fir.mor),
        1.7137,
        1e-4,
    );
    let star = crossing(&faced, &fir).unwrap();
    near(star.ligament.value(), 0.1865888, 1e-7);
    near(star.moment.value(), 292_654.3, 0.1);
}

#[test]
fn example_5_white_ash_plunge_and_strap() {
    let stem = stem(0.6);
    let ash = wood(66.0, 9.9, 0.60);
    let slot = Slotted {
        stem: &stem,
        face_depth: Length::m(0.15),
        hinge: Length::m(0.055),
        strap: Length::m(0.08),
    };
    let strap = stem.strip(Length::m(-0.3), Length::m(-0.22)).unwrap();
    near(strap.area.value(), 2.241122e-2, 1e-8);
    near(strap.forward.value(), -0.2523965, 1e-7);
    near(strap.i_inline.value(), 9.893347e-6, 1e-12);
    let load = demand(95_000.0, 0.0);
    let state = held(&slot, &ash, &load).unwrap();
    near(state.tension.value(), 253_683.5, 0.1);
    near(state.mean_stress.value() / 1e6, 11.3195, 1e-4);
    near(state.tension_together.value(), 251_248.0, 0.1);
    near(state.hinge_moment.value(), 395.08, 0.01);
    near(state.strap_moment.value(), 516.97, 0.01);
    near(state.outer_stress.value() / 1e6, 13.6983, 1e-4);
    near(state.inner_stress.value() / 1e6, 9.5180, 1e-4);
    near(state.release_front.value(), 120.65, 0.01);
    near(state.release_back.value(), 223.37, 0.01);
    near(
        failing_thickness(&slot, ash.mor, &load).value(),
        0.022842,
        1e-6,
    );
    near(
        failing_thickness(&slot, ash.mor * 0.5, &load).value(),
        0.036945,
        1e-6,
    );
    let (hinge, slabs) = cut(&stem, 0.15, 0.055);
    let hold = hold_moment(&hinge, ash.mor);
    near(hinge.modulus().value(), 2.708595e-4, 1e-10);
    near(hold.value(), 17_876.7, 0.1);
    let bare = slabs.release(&ash, Moment::si(95_000.0));
    near(bare.total.value(), 3_084.48, 0.01);
    near(
        slabs.split_moment_total(&ash).unwrap().value(),
        40_220.6,
        0.1,
    );
    near(slabs.split_moment(&ash).unwrap().value(), 41_154.7, 0.1);
    near(slabs.split_moment(&ash).unwrap() / hold, 2.3021, 1e-4);
    let worst = careful(&ash);
    near(
        slabs.split_moment(&worst).unwrap() / hold_moment(&hinge, worst.mor),
        1.3565,
        1e-4,
    );
}

#[test]
fn example_6_a_face_that_closes_early() {
    let stem = stem(0.5);
    let oak = wood(57.0, 9.3, 0.63);
    let (hinge, slabs) = cut(&stem, 0.10, 0.05);
    near(hold_moment(&hinge, oak.mor).value(), 9_989.5, 0.1);
    near(slabs.split_moment(&oak).unwrap().value(), 20_176.8, 0.1);
    // A tie of all the ligament about a contact near the bark.
    let tie = oak.mor.value() * hinge.area.value() * (0.23 - hinge.forward.value());
    near(tie, 129_882.3, 0.1);
}

#[test]
fn black_locust_is_amber_with_a_hinge_of_a_tenth() {
    let stem = stem(0.7);
    let locust = wood(95.0, 12.8, 0.69);
    let (hinge, slabs) = cut(&stem, 0.175, 0.07);
    near(hinge.i_inline.value(), 1.824563e-5, 1e-11);
    near(hinge.modulus().value(), 5.131049e-4, 1e-10);
    near(hold_moment(&hinge, locust.mor).value(), 48_745.0, 0.1);
    near(slabs.front().unwrap().i_inline.value(), 5.013647e-4, 1e-10);
    near(slabs.back().unwrap().i_inline.value(), 3.830631e-3, 1e-9);
    near(locust.g1c.value(), 657.71, 0.01);
    near(
        slabs.split_moment_total(&locust).unwrap().value(),
        76_729.7,
        0.1,
    );
    near(slabs.split_moment(&locust).unwrap().value(), 78_763.1, 0.1);
    let ratio = slabs.split_moment(&locust).unwrap() / hold_moment(&hinge, locust.mor);
    near(ratio, 1.6158, 1e-4);
    let worst = careful(&locust);
    near(
        slabs.split_moment(&worst).unwrap() / hold_moment(&hinge, worst.mor),
        0.9521,
        1e-4,
    );
}

#[test]
fn example_6_the_notched_beam_under_bending_alone() {
    // A rectangle of 0.1 by 0.3 m notched to half, E 11 GPa, G 300 J/m²: 4,605.8968 N·m.
    let (width, depth, share, moe, energy) = (0.1, 0.3, 0.5, 11.0e9, 300.0);
    let inertia = |height: f64| SecondMoment::si(width * height * height * height / 12.0);
    let ours = pure_bending_split(
        Length::m(width),
        (inertia(share * depth), inertia(depth)),
        Stress::si(moe),
        FractureEnergy::si(energy),
    )
    .unwrap();
    near(ours.value(), 4_605.896_8, 1e-4);
    // Gustafsson's formula (from memory) with the load ten thousand depths away: 4,605.68.
    let (shear, beta): (f64, f64) = (moe / 16.0, 1.0e4);
    let by_shear = (0.6 * (share - share * share) / shear).sqrt();
    let by_bending = beta * (6.0 * (1.0 / share - share * share) / moe).sqrt();
    let force = width * share * depth * (energy / depth).sqrt() / (by_shear + by_bending);
    near(force * beta * depth, 4_605.68, 1e-2);
    within(force * beta * depth, ours.value(), 1e-4);
    // A part that is the whole: no crack can run.
    let whole = inertia(depth);
    let none = pure_bending_split(
        Length::m(width),
        (whole, whole),
        Stress::si(moe),
        FractureEnergy::si(energy),
    );
    assert_eq!(none, None);
}
