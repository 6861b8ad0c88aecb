//! Small statistics of counts.

/// Half the width of a 95 % interval of a normal distribution, in standard deviations.
pub const TWO_SIDED_95: f64 = 1.959_963_984_540_054;

/// The 95 % interval of a share of which `hits` out of `count` were seen.
///
/// It lies within 0 and 1 and is honest near both, where the plain normal interval is not.
/// Source: Wilson, J. Am. Stat. Assoc. 22, 209 (1927).
pub fn wilson(hits: u64, count: u64) -> [f64; 2] {
    if count == 0 {
        return [0.0, 1.0];
    }
    let (hits, count) = (hits as f64, count as f64);
    let z = TWO_SIDED_95;
    let share = hits / count;
    let widened = 1.0 + z * z / count;
    let middle = (share + 0.5 * z * z / count) / widened;
    let half = z / widened * (share * (1.0 - share) / count + 0.25 * (z / count).powi(2)).sqrt();
    // At the ends the interval reaches them exactly.
    let low = if hits == 0.0 { 0.0 } else { middle - half };
    let high = if hits == count { 1.0 } else { middle + half };
    [low, high]
}

/// Standard uncertainty of the difference of two shares seen on the same samples, of which `gained`
/// passed only the second time and `lost` only the first.
pub fn paired_uncertainty(gained: u64, lost: u64, count: u64) -> f64 {
    if count == 0 {
        return 1.0;
    }
    let (gained, lost, count) = (gained as f64, lost as f64, count as f64);
    let difference = (gained - lost) / count;
    ((gained + lost) / count - difference * difference)
        .max(0.0)
        .sqrt()
        / count.sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    /// Newcombe, Stat. Med. 17, 857 (1998), table I, method 3 (from memory): 81 of 263 gives 0.2553
    /// to 0.3662, 15 of 148 gives 0.0624 to 0.1605, 0 of 20 gives 0 to 0.1611, 1 of 29 gives 0.0061
    /// to 0.1718.
    #[test]
    fn published_intervals() {
        for (hits, count, low, high) in [
            (81, 263, 0.2553, 0.3662),
            (15, 148, 0.0624, 0.1605),
            (0, 20, 0.0, 0.1611),
            (1, 29, 0.0061, 0.1718),
        ] {
            let [found_low, found_high] = wilson(hits, count);
            assert_abs_diff_eq!(found_low, low, epsilon = 6e-5);
            assert_abs_diff_eq!(found_high, high, epsilon = 6e-5);
        }
    }

    #[test]
    fn nothing_seen_is_nothing_known() {
        assert_eq!(wilson(0, 0), [0.0, 1.0]);
        assert_eq!(wilson(7, 7)[1], 1.0);
        assert_eq!(paired_uncertainty(0, 0, 100), 0.0);
    }
}
