//! Integrals over smooth pieces: Gauss and Kronrod's pair of 7 and 15 points, halved where they disagree.
//!
//! Nodes and weights: R. Piessens et al., QUADPACK, Springer 1983 (public domain routine qk15), from memory and
//! checked here against integrals known in closed form.

use std::cmp::Ordering;
use std::collections::BinaryHeap;

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

/// Pieces looked at before an integral is taken as it stands.
const BUDGET: usize = 3_000;

/// Share of the whole to which the two rules must agree.
const AGREE: f64 = 1e-11;

/// Share of the whole that may be left open where a curve has more kinks than there are pieces to look at.
const ENOUGH: f64 = 1e-6;

/// A piece with its integrals and how far the two rules are apart.
struct Piece {
    lo: f64,
    hi: f64,
    fine: Pair,
    apart: Pair,
    /// The greater of the two doubts, as a share of the whole.
    doubt: f64,
}

impl PartialEq for Piece {
    fn eq(&self, other: &Self) -> bool {
        self.cmp(other).is_eq()
    }
}

impl Eq for Piece {}

impl PartialOrd for Piece {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}

impl Ord for Piece {
    fn cmp(&self, other: &Self) -> Ordering {
        self.doubt.total_cmp(&other.doubt).then(self.lo.total_cmp(&other.lo))
    }
}

/// Integrates two functions at once over the pieces, halving where the doubt is greatest; `None` where a value is not
/// finite or the integral does not settle.
pub(crate) fn integrate(f: impl Fn(f64) -> Option<Pair>, pieces: &[(f64, f64)]) -> Option<Pair> {
    let mut rough = [0.0; 2];
    let mut first = Vec::with_capacity(pieces.len());
    for (lo, hi) in pieces {
        let (fine, apart) = rules(&f, *lo, *hi)?;
        (0..2).for_each(|i| rough[i] += fine[i].abs());
        first.push((*lo, *hi, fine, apart));
    }
    let doubt = |apart: Pair| {
        (0..2).map(|i| if apart[i] == 0.0 { 0.0 } else { apart[i] / rough[i] }).fold(0.0, f64::max)
    };
    let piece = |lo, hi, (fine, apart): (Pair, Pair)| Piece { lo, hi, fine, apart, doubt: doubt(apart) };
    let mut open: BinaryHeap<Piece> =
        first.into_iter().map(|(lo, hi, fine, apart)| piece(lo, hi, (fine, apart))).collect();
    // Doubts shrink at least eightfold with every halving of a smooth piece: what is below a share of the aim can wait.
    for _ in 0..BUDGET {
        let Some(worst) = open.peek() else { break };
        if worst.doubt <= AGREE / 16.0 {
            break;
        }
        let Some(Piece { lo, hi, .. }) = open.pop() else { break };
        let middle = 0.5 * lo + 0.5 * hi;
        if middle <= lo || middle >= hi {
            return None;
        }
        open.push(piece(lo, middle, rules(&f, lo, middle)?));
        open.push(piece(middle, hi, rules(&f, middle, hi)?));
    }
    let mut all = open.into_vec();
    all.sort_by(|a, b| a.lo.total_cmp(&b.lo));
    let mut total = [0.0; 2];
    let mut left = [0.0; 2];
    for piece in &all {
        for i in 0..2 {
            total[i] += piece.fine[i];
            left[i] += piece.apart[i];
        }
    }
    (0..2).all(|i| left[i] <= ENOUGH * total[i].abs()).then_some(total)
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
