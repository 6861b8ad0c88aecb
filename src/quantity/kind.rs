//! What a quantity measures.

use super::unit::{Dimension, UNITS, Unit};

/// What a quantity measures: decides the units accepted, the SI unit of its value, which signs it
/// may have, and whether a spread in % is relative or in points.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Kind {
    /// A length in m, not negative.
    Length,
    /// A place along an axis or an offset, in m, of either sign.
    Position,
    /// A mirror's radius of curvature in m, concave positive; "flat"; convex and concave may also
    /// be said in words.
    Radius,
    /// The radius of a face of a slab or substrate in m, without sign, convex or concave always
    /// in words; "flat".
    Face,
    /// A focal length in m, of either sign, not zero.
    Focal,
    /// An angle in rad, of either sign.
    Angle,
    /// An angle in rad, of either sign, or "brewster".
    SlabAngle,
    /// A dioptric power or a wavefront's curvature in 1/m, of either sign.
    Curvature,
    /// The strength of a duct in 1/m, not negative.
    Strength,
    /// A pure number such as an index, of either sign; a spread in % is relative.
    Number,
    /// A ratio from 0 to 1, such as a reflectance; a spread in % is in points.
    Ratio,
    /// A loss: a ratio like [`Kind::Ratio`], or an attenuation per length in 1/m, not negative.
    Loss,
    /// A frequency in Hz, of either sign.
    Frequency,
    /// A power in W, not negative.
    Power,
    /// An energy in J, not negative.
    Energy,
    /// A time in s, not negative.
    Time,
    /// A temperature in K, not negative; its spread is absolute.
    Temperature,
    /// A share per watt in 1/W, not negative.
    PerWatt,
    /// What a coating endures, in W/m² or J/m², not negative.
    Damage,
}

impl Kind {
    /// Every kind.
    pub const ALL: [Kind; 19] = [
        Kind::Length,
        Kind::Position,
        Kind::Radius,
        Kind::Face,
        Kind::Focal,
        Kind::Angle,
        Kind::SlabAngle,
        Kind::Curvature,
        Kind::Strength,
        Kind::Number,
        Kind::Ratio,
        Kind::Loss,
        Kind::Frequency,
        Kind::Power,
        Kind::Energy,
        Kind::Time,
        Kind::Temperature,
        Kind::PerWatt,
        Kind::Damage,
    ];

    /// Its name in messages, with its article: "a radius of curvature".
    pub fn phrase(self) -> &'static str {
        match self {
            Kind::Length | Kind::Position => "a length",
            Kind::Radius => "a radius of curvature",
            Kind::Face => "a face's radius of curvature",
            Kind::Focal => "a focal length",
            Kind::Angle | Kind::SlabAngle => "an angle",
            Kind::Curvature => "a dioptric power or curvature",
            Kind::Strength => "a duct's strength",
            Kind::Number => "a plain number",
            Kind::Ratio => "a ratio",
            Kind::Loss => "a loss",
            Kind::Frequency => "a frequency",
            Kind::Power => "a power",
            Kind::Energy => "an energy",
            Kind::Time => "a time",
            Kind::Temperature => "a temperature",
            Kind::PerWatt => "a share per watt",
            Kind::Damage => "a power or energy per area",
        }
    }

    /// A well-written one.
    pub fn example(self) -> &'static str {
        match self {
            Kind::Length | Kind::Focal => "100 mm",
            Kind::Position => "-100 mm",
            Kind::Radius => "100 mm concave",
            Kind::Face => "100 mm convex",
            Kind::Angle | Kind::SlabAngle => "8 deg",
            Kind::Curvature => "3.3 1/m",
            Kind::Strength => "5 1/m",
            Kind::Number => "1.45",
            Kind::Ratio => "98.5 %",
            Kind::Loss => "0.2 %",
            Kind::Frequency => "12 MHz",
            Kind::Power => "10 W",
            Kind::Energy => "1 mJ",
            Kind::Time => "10 ns",
            Kind::Temperature => "20 degC",
            Kind::PerWatt => "1e-4 1/W",
            Kind::Damage => "10 J/cm2",
        }
    }

    /// The unit proposed to someone who wrote none, as spelt on a keyboard.
    pub(super) fn usual_unit(self) -> &'static str {
        match self {
            Kind::Length | Kind::Position | Kind::Radius | Kind::Face | Kind::Focal => "mm",
            Kind::Angle | Kind::SlabAngle => "deg",
            Kind::Curvature | Kind::Strength => "1/m",
            Kind::Number => "",
            Kind::Ratio | Kind::Loss => "%",
            Kind::Frequency => "MHz",
            Kind::Power => "W",
            Kind::Energy => "mJ",
            Kind::Time => "ns",
            Kind::Temperature => "degC",
            Kind::PerWatt => "1/W",
            Kind::Damage => "J/cm2",
        }
    }

    /// Whether a number without a unit is a quantity of this kind.
    pub fn takes_bare_numbers(self) -> bool {
        matches!(self, Kind::Number | Kind::Ratio | Kind::Loss)
    }

    /// Whether values below zero are refused.
    pub fn is_never_negative(self) -> bool {
        matches!(
            self,
            Kind::Length
                | Kind::Strength
                | Kind::Ratio
                | Kind::Loss
                | Kind::Power
                | Kind::Energy
                | Kind::Time
                | Kind::Temperature
                | Kind::PerWatt
                | Kind::Damage
        )
    }

    /// Whether analysis works with the reciprocal of the number that is written: the curvature of a
    /// radius, the dioptric power of a focal length, which pass through flat without a break.
    pub fn is_reciprocal(self) -> bool {
        matches!(self, Kind::Radius | Kind::Face | Kind::Focal)
    }

    /// Whether its value is divided by somewhere.
    pub(super) fn is_never_zero(self) -> bool {
        self.is_reciprocal()
    }

    /// Whether it can be flat.
    pub(super) fn is_surface(self) -> bool {
        matches!(self, Kind::Radius | Kind::Face)
    }

    /// The dimensions of the units it takes.
    pub(super) fn dimensions(self) -> &'static [Dimension] {
        match self {
            Kind::Length | Kind::Position | Kind::Radius | Kind::Face | Kind::Focal => {
                &[Dimension::Length]
            }
            Kind::Angle | Kind::SlabAngle => &[Dimension::Angle],
            Kind::Curvature | Kind::Strength => &[Dimension::PerLength],
            Kind::Number => &[Dimension::None],
            Kind::Ratio => &[Dimension::Ratio],
            Kind::Loss => &[
                Dimension::Ratio,
                Dimension::RatioPerLength,
                Dimension::PerLength,
            ],
            Kind::Frequency => &[Dimension::Frequency],
            Kind::Power => &[Dimension::Power],
            Kind::Energy => &[Dimension::Energy],
            Kind::Time => &[Dimension::Time],
            Kind::Temperature => &[Dimension::Temperature],
            Kind::PerWatt => &[Dimension::PerWatt],
            Kind::Damage => &[Dimension::Intensity, Dimension::Fluence],
        }
    }

    /// The units it is written in.
    pub fn units(self) -> impl Iterator<Item = Unit> {
        UNITS
            .iter()
            .copied()
            .filter(move |unit| self.accepts(*unit))
    }

    /// Whether a number with this unit can be a quantity of this kind.
    pub(super) fn accepts(self, unit: Unit) -> bool {
        self.dimensions().contains(&unit.dimension())
    }
}
