//! The zero of a function between two places where it has different signs.

/// A place in `lo ..= hi` where `f` changes its sign, to the last bit; the nearer end if it does not.
pub(crate) fn bracketed(f: impl Fn(f64) -> f64, mut lo: f64, mut hi: f64) -> f64 {
    let (mut at_lo, mut at_hi) = (f(lo), f(hi));
    if at_lo == 0.0 {
        return lo;
    }
    if at_hi == 0.0 || (at_lo > 0.0) == (at_hi > 0.0) {
        return if at_lo.abs() < at_hi.abs() { lo } else { hi };
    }
    let mut kept = 0;
    for step in 0..300 {
        let middle = 0.5 * lo + 0.5 * hi;
        if middle <= f64::min(lo, hi) || middle >= f64::max(lo, hi) {
            break;
        }
        // The chord, bent when one end stays (Illinois); every third step halves, so that it cannot creep.
        let chord = lo + (hi - lo) * (at_lo / (at_lo - at_hi));
        let inside = chord > f64::min(lo, hi) && chord < f64::max(lo, hi);
        let x = if inside && step % 3 != 2 { chord } else { middle };
        let here = f(x);
        if here == 0.0 {
            return x;
        }
        if (here > 0.0) == (at_lo > 0.0) {
            lo = x;
            at_lo = here;
            at_hi = if kept < 0 { 0.5 * at_hi } else { at_hi };
            kept = -1;
        } else {
            hi = x;
            at_hi = here;
            at_lo = if kept > 0 { 0.5 * at_lo } else { at_lo };
            kept = 1;
        }
    }
    0.5 * lo + 0.5 * hi
}

#[cfg(test)]
mod tests {
    use super::bracketed;

    #[test]
    fn finds_the_change_of_sign() {
        assert_eq!(bracketed(|x| x - 0.3, 0.0, 1.0), 0.3);
        let root = bracketed(|x| x * x * x - 2.0, 0.0, 2.0);
        assert!((root - 1.259_921_049_894_873_2).abs() < 1e-15, "{root}");
        let step = bracketed(|x| if x < 0.7 { 1.0 } else { -1.0 }, 0.0, 1.0);
        assert!((step - 0.7).abs() < 1e-15);
    }

    #[test]
    fn without_a_change_the_nearer_end() {
        assert_eq!(bracketed(|x| x + 1.0, 0.0, 1.0), 0.0);
    }
}
