//! Quadrature and roots: the little numerics the models need. Nothing of trees here.

/// Positive nodes and weights of the 16-point Gauss-Legendre rule on −1..1.
const GAUSS_16: [(f64, f64); 8] = [
    (0.095_012_509_837_637_44, 0.189_450_610_455_068_64),
    (0.281_603_550_779_258_9, 0.182_603_415_044_923_64),
    (0.458_016_777_657_227_37, 0.169_156_519_395_002_65),
    (0.617_876_244_402_643_8, 0.149_595_988_816_576_7),
    (0.755_404_408_355_003, 0.124_628_971_255_535_07),
    (0.865_631_202_387_831_8, 0.095_158_511_682_492_6),
    (0.944_575_023_073_232_6, 0.062_253_523_938_647_456),
    (0.989_400_934_991_649_9, 0.027_152_459_411_754_176),
];

/// Positive nodes and weights of the 8-point rule.
pub(crate) const GAUSS_8: [(f64, f64); 4] = [
    (0.183_434_642_495_649_78, 0.362_683_783_378_361_8),
    (0.525_532_409_916_329, 0.313_706_645_877_886_9),
    (0.796_666_477_413_626_7, 0.222_381_034_453_374_43),
    (0.960_289_856_497_536_2, 0.101_228_536_290_377_06),
];

/// The integral over an interval by the 16-point Gauss-Legendre rule.
pub(crate) fn integrate(from: f64, to: f64, f: impl Fn(f64) -> f64) -> f64 {
    let middle = 0.5 * (from + to);
    let half = 0.5 * (to - from);
    let sum: f64 = GAUSS_16
        .iter()
        .map(|(node, weight)| weight * (f(middle - half * node) + f(middle + half * node)))
        .sum();
    half * sum
}

/// A root between two ends of opposite sign by halving, to the last bits.
pub(crate) fn bisect(mut low: f64, mut high: f64, f: impl Fn(f64) -> f64) -> f64 {
    let low_sign = f(low) < 0.0;
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        if middle <= low.min(high) || middle >= low.max(high) {
            break;
        }
        if (f(middle) < 0.0) == low_sign {
            low = middle;
        } else {
            high = middle;
        }
    }
    0.5 * (low + high)
}

/// A root between two ends of opposite sign by false position with the end that stays halved
/// (the Illinois rule), to a width given.
pub(crate) fn root(ends: (f64, f64), width: f64, f: impl Fn(f64) -> f64) -> f64 {
    let (mut a, mut b) = ends;
    let (mut fa, mut fb) = (f(a), f(b));
    if fa == 0.0 {
        return a;
    }
    for _ in 0..100 {
        if fb == 0.0 || (b - a).abs() <= width {
            return b;
        }
        let next = b - fb * (b - a) / (fb - fa);
        let value = f(next);
        if (next - b).abs() <= width {
            return next;
        }
        if (value < 0.0) == (fb < 0.0) {
            fa *= 0.5;
        } else {
            a = b;
            fa = fb;
        }
        b = next;
        fb = value;
    }
    b
}
