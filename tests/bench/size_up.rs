//! How long one tree's size-up takes: the promise is 20 ms on one core of a laptop.
//! The same sums in a general numerical library are in `tests/scripts/size_up_scipy.py`.

use divan::Bencher;
use stumpside::figures::{Crown, CrownInput, Saw, TreeInput};
use stumpside::mechanics::lean::Lean;
use stumpside::mechanics::wind::Leaf;
use stumpside::method::size_up;
use stumpside::species;
use stumpside::units::{Angle, Bearing, CutRate, Length, Reading};

fn main() {
    divan::main();
}

/// An oak of half a metre that leans so many degrees along the lay.
fn oak(lean: f64) -> TreeInput {
    let oak = species::find("northern red oak").expect("the oak is in the table");
    let mut tree = TreeInput::new(oak, Bearing::deg(110.0));
    let metres = |value: f64, spread: f64| Reading::new(Length::m(value), Length::m(spread));
    tree.stump_along = Some(metres(0.48, 0.01));
    tree.dbh = Some(metres(0.43, 0.01));
    tree.height = Some(Length::m(21.0));
    tree.lean = Some(Lean {
        angle: Reading::new(Angle::deg(lean), Angle::deg(1.0)),
        toward: Bearing::deg(118.0),
        toward_spread: Angle::deg(5.0),
    });
    tree.crown = CrownInput::Measured(Crown {
        base: Length::m(8.0),
        north: metres(2.0, 0.5),
        east: metres(4.0, 0.5),
        south: metres(3.5, 0.5),
        west: metres(2.0, 0.5),
        leaf: Leaf::Bare,
    });
    tree.saw = Some(Saw {
        bar: Length::cm(63.0),
        nose: Length::cm(9.0),
        kerf: Length::mm(8.0),
        rate: Reading::new(CutRate::cm2_s(40.0), CutRate::cm2_s(6.0)),
    });
    tree
}

#[divan::bench(args = [1.0, 3.0, 6.0, 12.0])]
fn one_tree(bencher: Bencher<'_, '_>, lean: f64) {
    let tree = oak(lean);
    bencher.bench_local(|| size_up(divan::black_box(&tree)));
}
