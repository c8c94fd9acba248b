//! Integrals over smooth pieces: Gauss and Kronrod's pair of 7 and 15 points, halved where they disagree.
//!
//! Nodes and weights: R. Piessens et al., QUADPACK, Springer 1983 (public domain routine qk15), from memory and
//! checked here against integrals known in closed form.

const NODES: [f64; 8] = [
    0.991_455_371_120_812_6,
    0.949_107_912_342_758_5,
    0.864_864_423_359_769_1,
    0.741_531_185_599_394_4,
    0.586_087_235_467_691_1,
    0.405_845_151_377_397_2,
    0.207_784_955_007_898_47,
    0.0,
];
const KRONROD: [f64; 8] = [
    0.022_935_322_010_529_224,
    0.063_092_092_629_978_55,
    0.104_790_010_322_250_18,
    0.140_653_259_715_525_92,
    0.169_004_726_639_267_9,
    0.190_350_578_064_785_4,
    0.204_432_940_075_298_9,
    0.209_482_141_084_727_83,
];
const GAUSS: [f64; 4] =
    [0.129_484_966_168_869_7, 0.279_705_391_489_276_64, 0.381_830_050_505_118_9, 0.417_959_183_673_469_4];

/// Two integrals over the same range.
type Pair = [f64; 2];

/// Pieces looked at before an integral counts as not settled.
const BUDGET: usize = 3_000;

/// Share of the whole at which the two rules must agree.
const AGREE: f64 = 1e-11;

/// Integrates two functions at once over the pieces; `None` where a value is not finite or the integral does not
/// settle.
pub(crate) fn integrate(f: impl Fn(f64) -> Option<Pair>, pieces: &[(f64, f64)]) -> Option<Pair> {
    let mut total = [0.0; 2];
    let mut rough = [0.0; 2];
    let mut open = Vec::new();
    for (lo, hi) in pieces.iter().rev() {
        let first = rules(&f, *lo, *hi)?;
        for (sum, value) in rough.iter_mut().zip(first.0) {
            *sum += value.abs();
        }
        open.push((*lo, *hi, first));
    }
    let mut left = BUDGET;
    while let Some((lo, hi, (fine, apart))) = open.pop() {
        let middle = 0.5 * lo + 0.5 * hi;
        let settled = (0..2).all(|i| apart[i] <= AGREE * f64::max(rough[i], fine[i].abs()));
        if settled || middle <= lo || middle >= hi {
            total[0] += fine[0];
            total[1] += fine[1];
            continue;
        }
        if left == 0 {
            return None;
        }
        left -= 1;
        let (a, b) = (rules(&f, lo, middle)?, rules(&f, middle, hi)?);
        open.push((middle, hi, b));
        open.push((lo, middle, a));
    }
    Some(total)
}

/// The integral by 15 points, and how far that by 7 is off.
fn rules(f: &impl Fn(f64) -> Option<Pair>, lo: f64, hi: f64) -> Option<(Pair, Pair)> {
    let (middle, half) = (0.5 * lo + 0.5 * hi, 0.5 * (hi - lo));
    let mut fine = [0.0; 2];
    let mut coarse = [0.0; 2];
    for (index, node) in NODES.iter().enumerate() {
        let sides: &[f64] = if *node == 0.0 { &[0.0] } else { &[-1.0, 1.0] };
        for side in sides {
            let values = f(middle + side * node * half)?;
            for i in 0..2 {
                if !values[i].is_finite() {
                    return None;
                }
                fine[i] += KRONROD[index] * values[i] * half;
                if index % 2 == 1 {
                    coarse[i] += GAUSS[index / 2] * values[i] * half;
                }
            }
        }
    }
    let apart = [(fine[0] - coarse[0]).abs(), (fine[1] - coarse[1]).abs()];
    Some((fine, apart))
}

#[cfg(test)]
mod tests {
    use super::integrate;

    #[test]
    fn known_integrals() {
        let got = integrate(|x| Some([libm::exp(x), x * x * x]), &[(0.0, 2.0)]).unwrap();
        assert!((got[0] - (libm::exp(2.0) - 1.0)).abs() < 1e-13);
        assert!((got[1] - 4.0).abs() < 1e-13);
        // A steep end and a kink.
        let got = integrate(|x| Some([1.0 / (1.0001 - x), (x - 0.3).abs()]), &[(0.0, 1.0)]).unwrap();
        assert!((got[0] - libm::log(1.0001 / 0.0001)).abs() < 1e-9);
        assert!((got[1] - 0.29).abs() < 1e-10);
    }

    #[test]
    fn an_integral_without_end_is_not_made_up() {
        assert_eq!(integrate(|x| Some([1.0 / x, 0.0]), &[(0.0, 1.0)]), None);
    }
}
