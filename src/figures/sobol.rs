//! The low-discrepancy points behind the cases: the same on every machine, in every run.
//! Every coordinate's points are the 4,096 middles of equal steps, in another order.

use std::sync::OnceLock;

/// How many cases there are.
pub(super) const CASES: usize = 4096;
/// The coordinates.
pub(super) const DIMENSIONS: usize = 15;
const BITS: usize = 12;

/// Degree and inner coefficients of the primitive polynomials, and the first direction numbers,
/// from the second coordinate on. Source: Joe and Kuo 2008, SIAM J. Sci. Comput. 30.
const POLYNOMIALS: [(usize, u32, [u32; 6]); DIMENSIONS - 1] = [
    (1, 0, [1, 0, 0, 0, 0, 0]),
    (2, 1, [1, 3, 0, 0, 0, 0]),
    (3, 1, [1, 3, 1, 0, 0, 0]),
    (3, 2, [1, 1, 1, 0, 0, 0]),
    (4, 1, [1, 1, 3, 3, 0, 0]),
    (4, 4, [1, 3, 5, 13, 0, 0]),
    (5, 2, [1, 1, 5, 5, 17, 0]),
    (5, 4, [1, 1, 5, 5, 5, 0]),
    (5, 7, [1, 1, 7, 11, 19, 0]),
    (5, 11, [1, 1, 5, 1, 1, 0]),
    (5, 13, [1, 1, 1, 3, 11, 0]),
    (5, 14, [1, 3, 5, 5, 31, 0]),
    (6, 1, [1, 3, 3, 9, 7, 49]),
    (6, 13, [1, 1, 1, 15, 21, 21]),
];

/// Standard normal numbers, one row a case.
pub(super) type Normals = [f64; DIMENSIONS];

/// The standard normal numbers of every case, made once.
pub(super) fn normals() -> &'static [Normals] {
    static ROWS: OnceLock<Vec<Normals>> = OnceLock::new();
    ROWS.get_or_init(|| {
        let quantiles = quantiles();
        let directions = directions();
        let mut at = [0_u32; DIMENSIONS];
        (0..CASES)
            .map(|case| {
                let row = at.map(|place| quantiles[place as usize]);
                let bit = (case + 1).trailing_zeros() as usize;
                if bit < BITS {
                    for (place, direction) in at.iter_mut().zip(&directions) {
                        *place ^= direction[bit];
                    }
                }
                row
            })
            .collect()
    })
}

fn directions() -> [[u32; BITS]; DIMENSIONS] {
    let mut all = [[0_u32; BITS]; DIMENSIONS];
    for (bit, direction) in all[0].iter_mut().enumerate() {
        *direction = 1 << (BITS - 1 - bit);
    }
    for (row, (degree, inner, first)) in all[1..].iter_mut().zip(POLYNOMIALS) {
        for bit in 0..BITS {
            row[bit] = if bit < degree {
                first[bit] << (BITS - 1 - bit)
            } else {
                let mut next = row[bit - degree] ^ (row[bit - degree] >> degree);
                for term in 1..degree {
                    if (inner >> (degree - 1 - term)) & 1 == 1 {
                        next ^= row[bit - term];
                    }
                }
                next
            };
        }
    }
    all
}

/// The standard normal quantiles of the middles of the equal steps.
fn quantiles() -> Vec<f64> {
    let half: Vec<f64> = (0..CASES / 2)
        .map(|step| quantile((step as f64 + 0.5) / CASES as f64))
        .collect();
    half.iter()
        .copied()
        .chain(half.iter().rev().map(|z| -z))
        .collect()
}

/// The standard normal quantile of a chance below one half, by Newton's rule on the tail.
fn quantile(chance: f64) -> f64 {
    let tail = |z: f64| 0.5 * libm::erfc(-z * std::f64::consts::FRAC_1_SQRT_2);
    let density = |z: f64| libm::exp(-0.5 * z * z) / (2.0 * std::f64::consts::PI).sqrt();
    let mut z = -(-2.0 * libm::log(2.0 * chance)).max(0.0).sqrt();
    for _ in 0..60 {
        // Newton on the logarithm of the tail, which is concave: it never overshoots.
        let value = tail(z);
        let change = value / density(z) * libm::log(chance / value);
        z += change;
        if change.abs() < 1.0e-14 {
            break;
        }
    }
    z
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_coordinate_takes_every_step_once_and_is_standard_normal() {
        for dimension in 0..DIMENSIONS {
            let mut values: Vec<f64> = normals().iter().map(|row| row[dimension]).collect();
            let mean: f64 = values.iter().sum::<f64>() / CASES as f64;
            let square: f64 = values.iter().map(|z| z * z).sum::<f64>() / CASES as f64;
            assert!(mean.abs() < 1.0e-12, "{dimension}: {mean}");
            assert!((square - 1.0).abs() < 2.0e-3, "{dimension}: {square}");
            values.sort_by(f64::total_cmp);
            values.dedup();
            assert_eq!(values.len(), CASES, "{dimension}");
        }
    }

    #[test]
    fn known_quantiles() {
        // Source: tables of the normal distribution.
        for (chance, z) in [
            (0.05, -1.644_853_626_951_472_7),
            (0.025, -1.959_963_984_540_054),
            (0.001, -3.090_232_306_167_813_5),
        ] {
            assert!((quantile(chance) - z).abs() < 1.0e-12);
        }
    }

    #[test]
    fn the_first_points_are_those_of_the_published_sequence() {
        // Source: the first points of the unscrambled sequence of Joe and Kuo's numbers, computed
        // once with a general-purpose numerical library.
        let quantiles = quantiles();
        let place = |z: f64| quantiles.iter().position(|q| *q == z).unwrap();
        let row: Vec<usize> = normals()[5].iter().map(|z| place(*z)).collect();
        assert_eq!(row, SIXTH_POINT);
        let row: Vec<usize> = normals()[77].iter().map(|z| place(*z)).collect();
        assert_eq!(row, SEVENTY_EIGHTH_POINT);
    }

    const SIXTH_POINT: [usize; DIMENSIONS] = [
        3584, 3584, 512, 1536, 3584, 2560, 3584, 1536, 1536, 512, 1536, 3584, 3584, 512, 3584,
    ];
    const SEVENTY_EIGHTH_POINT: [usize; DIMENSIONS] = [
        3424, 3424, 32, 3168, 3424, 2080, 928, 2656, 736, 1760, 544, 3232, 2016, 1376, 4064,
    ];
}
