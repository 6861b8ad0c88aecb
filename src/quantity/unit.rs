//! The units known here, and how a number in one of them becomes a number in SI units.

use std::f64::consts::PI;

use super::decimal::Written;

/// What a unit measures.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Dimension {
    None,
    Length,
    Angle,
    Frequency,
    Power,
    Energy,
    Time,
    Temperature,
    PerLength,
    RatioPerLength,
    PerWatt,
    Intensity,
    Fluence,
    Ratio,
}

impl Dimension {
    /// What a number with such a unit is, with its article.
    pub(super) fn phrase(self) -> &'static str {
        match self {
            Dimension::None => "a plain number",
            Dimension::Length => "a length",
            Dimension::Angle => "an angle",
            Dimension::Frequency => "a frequency",
            Dimension::Power => "a power",
            Dimension::Energy => "an energy",
            Dimension::Time => "a time",
            Dimension::Temperature => "a temperature",
            Dimension::PerLength => "a reciprocal length",
            Dimension::RatioPerLength => "a loss per length",
            Dimension::PerWatt => "a ratio per watt",
            Dimension::Intensity => "a power per area",
            Dimension::Fluence => "an energy per area",
            Dimension::Ratio => "a ratio",
        }
    }
}

/// How a number in the unit becomes one in SI units.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Scale {
    /// Times factor · 10^exponent.
    Decimal { factor: i128, exponent: i32 },
    /// Times a factor that is no decimal.
    Irrational(f64),
    /// Plus 273.15.
    Celsius,
}

/// A unit of measurement.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Unit {
    /// The spelling printed, then others that are read.
    names: &'static [&'static str],
    dimension: Dimension,
    scale: Scale,
}

const fn power_of_ten(names: &'static [&'static str], dimension: Dimension, exponent: i32) -> Unit {
    Unit {
        names,
        dimension,
        scale: Scale::Decimal {
            factor: 1,
            exponent,
        },
    }
}

const fn of_angle(names: &'static [&'static str], factor: f64) -> Unit {
    Unit {
        names,
        dimension: Dimension::Angle,
        scale: Scale::Irrational(factor),
    }
}

const ZERO_CELSIUS: Written = Written::new(27315, -2);

macro_rules! units {
    ($($(#[$doc:meta])* $name:ident = $unit:expr;)*) => {
        impl Unit {
            $($(#[$doc])* pub const $name: Unit = $unit;)*
        }
        /// Every unit that is read.
        pub(super) const UNITS: &[Unit] = &[$(Unit::$name),*];
    };
}

// The micro sign is folded to U+00B5 before a name is looked up.
units! {
    /// Metre.
    M = power_of_ten(&["m"], Dimension::Length, 0);
    /// Kilometre.
    KM = power_of_ten(&["km"], Dimension::Length, 3);
    /// Centimetre.
    CM = power_of_ten(&["cm"], Dimension::Length, -2);
    /// Millimetre.
    MM = power_of_ten(&["mm"], Dimension::Length, -3);
    /// Micrometre.
    UM = power_of_ten(&["µm", "um"], Dimension::Length, -6);
    /// Nanometre.
    NM = power_of_ten(&["nm"], Dimension::Length, -9);
    /// Inch, 25.4 mm.
    INCH = Unit {
        names: &["in"],
        dimension: Dimension::Length,
        scale: Scale::Decimal { factor: 254, exponent: -4 },
    };
    /// Radian.
    RAD = power_of_ten(&["rad"], Dimension::Angle, 0);
    /// Milliradian.
    MRAD = power_of_ten(&["mrad"], Dimension::Angle, -3);
    /// Microradian.
    URAD = power_of_ten(&["µrad", "urad"], Dimension::Angle, -6);
    /// Degree.
    DEG = of_angle(&["°", "deg"], PI / 180.0);
    /// Minute of arc.
    ARCMIN = of_angle(&["arcmin"], PI / 10_800.0);
    /// Second of arc.
    ARCSEC = of_angle(&["arcsec"], PI / 648_000.0);
    /// Hertz.
    HZ = power_of_ten(&["Hz"], Dimension::Frequency, 0);
    /// Kilohertz.
    KHZ = power_of_ten(&["kHz"], Dimension::Frequency, 3);
    /// Megahertz.
    MHZ = power_of_ten(&["MHz"], Dimension::Frequency, 6);
    /// Gigahertz.
    GHZ = power_of_ten(&["GHz"], Dimension::Frequency, 9);
    /// Terahertz.
    THZ = power_of_ten(&["THz"], Dimension::Frequency, 12);
    /// Watt.
    W = power_of_ten(&["W"], Dimension::Power, 0);
    /// Milliwatt.
    MILLIWATT = power_of_ten(&["mW"], Dimension::Power, -3);
    /// Kilowatt.
    KILOWATT = power_of_ten(&["kW"], Dimension::Power, 3);
    /// Megawatt.
    MEGAWATT = power_of_ten(&["MW"], Dimension::Power, 6);
    /// Joule.
    J = power_of_ten(&["J"], Dimension::Energy, 0);
    /// Millijoule.
    MJ = power_of_ten(&["mJ"], Dimension::Energy, -3);
    /// Microjoule.
    UJ = power_of_ten(&["µJ", "uJ"], Dimension::Energy, -6);
    /// Second.
    S = power_of_ten(&["s"], Dimension::Time, 0);
    /// Millisecond.
    MS = power_of_ten(&["ms"], Dimension::Time, -3);
    /// Microsecond.
    US = power_of_ten(&["µs", "us"], Dimension::Time, -6);
    /// Nanosecond.
    NS = power_of_ten(&["ns"], Dimension::Time, -9);
    /// Picosecond.
    PS = power_of_ten(&["ps"], Dimension::Time, -12);
    /// Femtosecond.
    FS = power_of_ten(&["fs"], Dimension::Time, -15);
    /// Kelvin.
    K = power_of_ten(&["K"], Dimension::Temperature, 0);
    /// Degree Celsius: 0 °C is 273.15 K; a spread is a difference.
    CELSIUS = Unit {
        names: &["°C", "degC"],
        dimension: Dimension::Temperature,
        scale: Scale::Celsius,
    };
    /// Per metre.
    PER_M = power_of_ten(&["1/m", "m^-1", "m⁻¹", "dpt"], Dimension::PerLength, 0);
    /// Per kilometre.
    PER_KM = power_of_ten(&["1/km", "km^-1", "km⁻¹"], Dimension::PerLength, -3);
    /// Per centimetre.
    PER_CM = power_of_ten(&["1/cm", "cm^-1", "cm⁻¹"], Dimension::PerLength, 2);
    /// Per millimetre.
    PER_MM = power_of_ten(&["1/mm", "mm^-1", "mm⁻¹"], Dimension::PerLength, 3);
    /// Per watt.
    PER_W = power_of_ten(&["1/W", "W^-1", "W⁻¹"], Dimension::PerWatt, 0);
    /// Watt per square centimetre.
    W_PER_CM2 = power_of_ten(&["W/cm²", "W/cm2", "W/cm^2"], Dimension::Intensity, 4);
    /// Kilowatt per square centimetre.
    KW_PER_CM2 = power_of_ten(&["kW/cm²", "kW/cm2", "kW/cm^2"], Dimension::Intensity, 7);
    /// Megawatt per square centimetre.
    MW_PER_CM2 = power_of_ten(&["MW/cm²", "MW/cm2", "MW/cm^2"], Dimension::Intensity, 10);
    /// Gigawatt per square centimetre.
    GW_PER_CM2 = power_of_ten(&["GW/cm²", "GW/cm2", "GW/cm^2"], Dimension::Intensity, 13);
    /// Joule per square centimetre.
    J_PER_CM2 = power_of_ten(&["J/cm²", "J/cm2", "J/cm^2"], Dimension::Fluence, 4);
    /// Per cent.
    PERCENT = power_of_ten(&["%"], Dimension::Ratio, -2);
    /// Parts per million.
    PPM = power_of_ten(&["ppm"], Dimension::Ratio, -6);
    /// Per cent per centimetre.
    PERCENT_PER_CM = power_of_ten(&["%/cm"], Dimension::RatioPerLength, 0);
    /// Per cent per metre.
    PERCENT_PER_M = power_of_ten(&["%/m"], Dimension::RatioPerLength, -2);
    /// Parts per million per centimetre.
    PPM_PER_CM = power_of_ten(&["ppm/cm"], Dimension::RatioPerLength, -4);
}

impl Unit {
    /// The unit of a plain number.
    pub const ONE: Unit = power_of_ten(&[""], Dimension::None, 0);

    /// The unit of this name, such as `mm`, `um` or `degC`.
    pub fn named(name: &str) -> Option<Unit> {
        let folded = name.replace('\u{3bc}', "\u{b5}");
        UNITS
            .iter()
            .find(|unit| unit.names.contains(&folded.as_str()))
            .copied()
    }

    /// Its symbol as printed, such as `µm`; empty for a plain number.
    pub fn symbol(self) -> &'static str {
        self.names.first().copied().unwrap_or_default()
    }

    /// Every spelling that is read, the printed one first; its micro sign is U+00B5, and U+03BC
    /// serves as well.
    pub fn names(self) -> &'static [&'static str] {
        self.names
    }

    /// Its name as typed on a plain keyboard.
    pub(super) fn keyboard_name(self) -> &'static str {
        let plain = self.names.iter().find(|name| name.is_ascii());
        plain.copied().unwrap_or(self.symbol())
    }

    pub(super) fn dimension(self) -> Dimension {
        self.dimension
    }

    /// A number with this unit behind it.
    pub(super) fn behind(self, number: &str) -> String {
        match self.symbol() {
            "" => number.to_owned(),
            "°" => format!("{number}°"),
            symbol => format!("{number} {symbol}"),
        }
    }

    /// A value in this unit, in SI units.
    pub(super) fn to_si(self, number: Written) -> Written {
        match self.scale {
            Scale::Celsius => number.plus(ZERO_CELSIUS),
            _ => self.difference_to_si(number),
        }
    }

    /// A difference of two values in this unit, in SI units.
    pub(super) fn difference_to_si(self, number: Written) -> Written {
        match self.scale {
            Scale::Decimal { factor, exponent } => number.product(Written::new(factor, exponent)),
            Scale::Irrational(factor) => Written::from_f64(number.to_f64() * factor),
            Scale::Celsius => number,
        }
    }

    /// An SI value in this unit; may overflow for values beyond the range of quantities.
    pub(super) fn of_si(self, si: f64) -> f64 {
        match self.scale {
            Scale::Celsius => si - ZERO_CELSIUS.to_f64(),
            _ => self.difference_of_si(si),
        }
    }

    /// An SI difference in this unit; may overflow like [`Unit::of_si`].
    pub(super) fn difference_of_si(self, si: f64) -> f64 {
        match self.scale {
            // A power of ten up to 22 is exact, its reciprocal is not.
            Scale::Decimal { factor, exponent } if exponent < 0 => {
                si * 10_f64.powi(-exponent) / factor as f64
            }
            Scale::Decimal { factor, exponent } => si / 10_f64.powi(exponent) / factor as f64,
            Scale::Irrational(factor) => si / factor,
            Scale::Celsius => si,
        }
    }

    /// The exact decimal of an SI value in this unit, where a shift of the point is all there is.
    pub(super) fn shifted_from_si(self, si: Written) -> Option<Written> {
        match self.scale {
            Scale::Decimal {
                factor: 1,
                exponent,
            } => Some(si.shifted(-i64::from(exponent))),
            _ => None,
        }
    }
}

/// The known name that a builder probably meant, among units of the dimensions wanted.
pub(super) fn nearest(name: &str, wanted: &[Dimension]) -> Option<&'static str> {
    const SPELT_OUT: [(&str, &str); 14] = [
        ("micron", "um"),
        ("microns", "um"),
        ("inch", "in"),
        ("inches", "in"),
        ("meter", "m"),
        ("metre", "m"),
        ("degree", "deg"),
        ("degrees", "deg"),
        ("d", "dpt"),
        ("diopter", "dpt"),
        ("dioptre", "dpt"),
        ("c", "degC"),
        ("percent", "%"),
        ("sec", "s"),
    ];
    let lower = name.to_lowercase();
    let known = || {
        UNITS
            .iter()
            .filter(|unit| wanted.contains(&unit.dimension))
            .flat_map(|unit| unit.names.iter().copied())
    };
    let spelt_out = SPELT_OUT
        .iter()
        .find(|(word, _)| *word == lower)
        .map(|(_, unit)| *unit)
        .filter(|unit| known().any(|name| name == *unit));
    spelt_out
        .or_else(|| known().find(|unit| unit.to_lowercase() == lower))
        .or_else(|| {
            // In short names one letter is the whole difference between two units.
            known().find(|unit| unit.len() > 3 && differ_by_one(&lower, &unit.to_lowercase()))
        })
}

/// Whether one letter put in, left out or changed makes one word of the other.
fn differ_by_one(a: &str, b: &str) -> bool {
    let (a, b): (Vec<char>, Vec<char>) = (a.chars().collect(), b.chars().collect());
    if a.len().abs_diff(b.len()) > 1 {
        return false;
    }
    let same_ahead = a.iter().zip(&b).take_while(|(x, y)| x == y).count();
    let shorter = a.len().min(b.len());
    let same_behind = a
        .iter()
        .rev()
        .zip(b.iter().rev())
        .take(shorter - same_ahead)
        .take_while(|(x, y)| x == y)
        .count();
    same_ahead + same_behind + 1 >= a.len().max(b.len())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_name_stands_for_two_units() {
        let mut names: Vec<_> = UNITS.iter().flat_map(|unit| unit.names).collect();
        let all = names.len();
        names.sort_unstable();
        names.dedup();
        assert_eq!(names.len(), all);
    }

    #[test]
    fn both_micro_signs_are_the_same() {
        assert_eq!(Unit::named("\u{3bc}m"), Some(Unit::UM));
        assert_eq!(Unit::named("\u{b5}m"), Some(Unit::UM));
    }

    #[test]
    fn likely_slips_find_their_unit() {
        let length = [Dimension::Length];
        assert_eq!(nearest("MM", &length), Some("mm"));
        assert_eq!(nearest("micron", &length), Some("um"));
        assert_eq!(nearest("pm", &length), None);
        assert_eq!(nearest("", &length), None);
        assert_eq!(nearest("Mhz", &[Dimension::Frequency]), Some("MHz"));
        assert_eq!(nearest("arcsecs", &[Dimension::Angle]), Some("arcsec"));
    }
}
