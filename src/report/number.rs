//! Numbers in columns: one unit a column, so that they can be compared at a glance.

/// A unit that a column may have.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scale {
    /// Its symbol.
    pub symbol: &'static str,
    /// How many of the SI unit it is.
    pub size: f64,
}

const fn scale(symbol: &'static str, size: f64) -> Scale {
    Scale { symbol, size }
}

/// Units of lengths, smallest first.
pub const LENGTHS: [Scale; 5] = [
    scale("nm", 1e-9),
    scale("µm", 1e-6),
    scale("mm", 1e-3),
    scale("m", 1.0),
    scale("km", 1e3),
];

/// Units of angles, smallest first.
pub const ANGLES: [Scale; 3] = [scale("µrad", 1e-6), scale("mrad", 1e-3), scale("rad", 1.0)];

/// Units of frequencies, smallest first.
pub const FREQUENCIES: [Scale; 6] = [
    scale("mHz", 1e-3),
    scale("Hz", 1.0),
    scale("kHz", 1e3),
    scale("MHz", 1e6),
    scale("GHz", 1e9),
    scale("THz", 1e12),
];

/// Units of times, smallest first.
pub const TIMES: [Scale; 6] = [
    scale("fs", 1e-15),
    scale("ps", 1e-12),
    scale("ns", 1e-9),
    scale("µs", 1e-6),
    scale("ms", 1e-3),
    scale("s", 1.0),
];

/// Units of powers, smallest first.
pub const POWERS: [Scale; 6] = [
    scale("nW", 1e-9),
    scale("µW", 1e-6),
    scale("mW", 1e-3),
    scale("W", 1.0),
    scale("kW", 1e3),
    scale("MW", 1e6),
];

/// Units of ratios, smallest first.
pub const RATIOS: [Scale; 2] = [scale("ppm", 1e-6), scale("%", 1e-2)];

/// Units of curvatures and of the strengths of lenses and ducts, smallest first.
pub const CURVATURES: [Scale; 3] = [scale("1/km", 1e-3), scale("1/m", 1.0), scale("1/mm", 1e3)];

/// Decibels, whose numbers are already counted in them.
pub const DECIBELS: [Scale; 1] = [scale("dB", 1.0)];

/// Numbers without a unit; powers of ten where they are too large or small to be read.
pub const NUMBERS: [Scale; 9] = [
    scale("10⁻¹²", 1e-12),
    scale("10⁻⁹", 1e-9),
    scale("10⁻⁶", 1e-6),
    scale("10⁻³", 1e-3),
    PLAIN,
    scale("10⁶", 1e6),
    scale("10⁹", 1e9),
    scale("10¹²", 1e12),
    scale("10¹⁵", 1e15),
];

/// A number as it is.
pub const PLAIN: Scale = scale("", 1.0);

/// In SI units, what is rounding and not a size: less than any length or angle in a cavity.
pub const NOTHING: f64 = 1e-13;

/// In SI units, a size to choose a unit by where there is none: millimetres, milliradians.
const USUAL: f64 = 1e-2;

/// The largest unit in which the middle one of the values is at least `least`.
///
/// The middle one, so that a single distant waist does not turn a column of millimetres into
/// kilometres.
pub fn common(values: impl IntoIterator<Item = f64>, scales: &[Scale], least: f64) -> Scale {
    let mut sizes: Vec<f64> = values
        .into_iter()
        .map(f64::abs)
        .filter(|x| *x > NOTHING && x.is_finite())
        .collect();
    sizes.sort_by(f64::total_cmp);
    let middle = sizes.get(sizes.len() / 2).copied().unwrap_or(USUAL);
    scales
        .iter()
        .rev()
        .find(|scale| middle >= least * scale.size)
        .copied()
        .unwrap_or(scales[0])
}

/// A number with the given count of significant digits, without an exponent where it is of a
/// readable size.
pub fn significant(x: f64, digits: usize) -> String {
    if x == 0.0 {
        return "0".into();
    }
    let rounded = format!("{x:.*e}", digits - 1);
    let exponent: i32 = rounded
        .split_once('e')
        .and_then(|(_, e)| e.parse().ok())
        .unwrap_or(0);
    if !(-4..=6).contains(&exponent) {
        return minus(rounded);
    }
    let decimals = (digits as i32 - 1 - exponent).max(0) as usize;
    minus(format!("{x:.decimals$}"))
}

/// The same without zeros at the end, for numbers that somebody wrote.
pub fn plain(x: f64, digits: usize) -> String {
    let text = significant(x, digits);
    if !text.contains('.') || text.contains('e') {
        return text;
    }
    text.trim_end_matches('0').trim_end_matches('.').into()
}

/// A number with the given count of decimals.
pub fn fixed(x: f64, decimals: usize) -> String {
    let text = format!("{x:.decimals$}");
    let is_zero = text.chars().all(|c| matches!(c, '-' | '0' | '.'));
    if is_zero {
        return text.trim_start_matches('-').into();
    }
    minus(text)
}

/// The minus sign of print instead of the keyboard's hyphen.
fn minus(text: String) -> String {
    text.replace('-', "−")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn digits_that_mean_something() {
        assert_eq!(significant(201.2345, 4), "201.2");
        assert_eq!(significant(-0.0345678, 3), "−0.0346");
        assert_eq!(significant(9.9996, 4), "10.00");
        assert_eq!(significant(1.2e-9, 3), "1.20e−9");
        assert_eq!(fixed(-0.0001, 2), "0.00");
        assert_eq!(plain(1064.0, 6), "1064");
        assert_eq!(plain(1200.0, 2), "1200");
    }

    #[test]
    fn a_column_takes_the_unit_of_its_middle() {
        assert_eq!(common([2e-4, 3e-5, 4e-4], &LENGTHS, 1.0).symbol, "µm");
        assert_eq!(common([0.08, 0.02, 1200.0], &LENGTHS, 1.0).symbol, "mm");
        assert_eq!(common([0.0, 1e-17], &LENGTHS, 1.0).symbol, "mm");
    }
}
