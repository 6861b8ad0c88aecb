//! The names of everything that can be limited, swept or toleranced, and the parts they apply to.
//!
//! Analysis evaluates them; here they are only read and named.

use std::fmt;

use super::{Cavity, Element};
use crate::optics::Plane;

/// A figure of a cavity that has one number.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Measure {
    /// 1 − |half-trace|, of one plane or of the worse.
    Margin(Option<Plane>),
    /// Half the trace of the round-trip matrix, flips included.
    HalfTrace(Plane),
    /// Accumulated Gouy phase of a round trip, in radians.
    Gouy(Plane),
    /// Beam radius at a part, at its middle where it has a length, in metres; bare: the geometric
    /// mean of the planes.
    Spot(usize, Option<Plane>),
    /// Least beam radius inside a gap, slab or duct, in metres; bare: the geometric mean.
    Least(usize, Option<Plane>),
    /// Radius of the waist of the beam in that part, inside it or not, in metres.
    Waist(usize, Option<Plane>),
    /// Distance of that waist from the part's start, in metres; bare: the mean of the planes.
    WaistAt(usize, Option<Plane>),
    /// Tangential over sagittal beam radius at a part.
    Aspect(usize),
    /// Way along the beam from one part's start to another's, in metres.
    Distance(usize, usize),
    /// Geometric length of a round trip, in metres.
    RoundTripLength,
    /// Free spectral range, in hertz.
    Fsr,
    /// π√ρ/(1 − ρ).
    Finesse,
    /// Free spectral range over finesse, in hertz.
    Linewidth,
    /// Time in which the power stored falls to 1/e, in seconds.
    Lifetime,
    /// Spacing of neighbouring transverse orders in hertz, flips included, folded into half a free
    /// spectral range to either side.
    Spacing(Plane),
    /// Linewidths from the fundamental to the nearest TEM_mn.
    ModeClearance {
        /// Highest order m + n that counts.
        up_to: usize,
    },
    /// Least suppression of a TEM_mn at the fundamental's resonance: a ratio of powers, 1 or more.
    Suppression {
        /// Highest order m + n that counts.
        up_to: usize,
    },
}

/// What the number of a measure is, to be read and written with its unit.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Presence {
    /// A pure number.
    Number,
    /// A length in metres.
    Length,
    /// A place along the beam in metres, which may be negative.
    Position,
    /// An angle in radians.
    Angle,
    /// A frequency in hertz, not negative.
    Frequency,
    /// A difference of frequencies in hertz, which may be negative.
    Offset,
    /// A time in seconds.
    Time,
}

/// Why a name is no measure.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct MeasureError {
    /// What is wrong.
    pub message: String,
    /// What to write instead.
    pub help: String,
}

/// Measures that will be named but cannot be computed yet.
const LATER: [&str; 3] = ["buildup", "parasitic", "coupling"];

/// Highest order m + n of transverse modes that is ever looked at.
pub const HIGHEST_ORDER: usize = 100;

/// Measures of a whole cavity and of a part, for suggestions.
const KNOWN: &str = "margin, half_trace.tangential, gouy.tangential, round_trip_length, fsr, \
     finesse, linewidth, lifetime, spacing.tangential, mode_clearance, suppression.12, distance.M1.M2, or a part's spot, least, waist, waist_at or aspect such as M1.spot";

impl Measure {
    /// Reads a measure by its name, such as `margin` or `X1.least.sagittal`.
    ///
    /// # Errors
    /// Says what is wrong with the name and which names there are.
    pub fn parse(name: &str, cavity: &Cavity) -> Result<Measure, MeasureError> {
        let error = |message: String, help: &str| MeasureError {
            message,
            help: help.into(),
        };
        let words: Vec<&str> = name.split('.').map(str::trim).collect();
        if LATER.contains(&words[0]) {
            return Err(error(
                format!("the measure \"{name}\" is not available yet"),
                &format!("available now: {KNOWN}"),
            ));
        }
        let plane_of = |word: Option<&&str>| match word {
            None => Ok(None),
            Some(&"tangential") => Ok(Some(Plane::Tangential)),
            Some(&"sagittal") => Ok(Some(Plane::Sagittal)),
            Some(other) => Err(error(
                format!("\"{other}\" is no plane"),
                "the planes are \"tangential\" and \"sagittal\"",
            )),
        };
        let needs_plane = |plane: Option<Plane>| {
            plane.ok_or_else(|| {
                error(
                    format!("\"{name}\" has a value in either plane"),
                    &format!("write {name}.tangential or {name}.sagittal"),
                )
            })
        };
        let part_named = |word: &str| {
            cavity.part_named(word).ok_or_else(|| {
                error(
                    format!("no part is named \"{word}\""),
                    &format!("known measures: {KNOWN}"),
                )
            })
        };
        let at_most = |count: usize| words.len() <= count;
        let measure = match words[0] {
            "margin" if at_most(2) => Measure::Margin(plane_of(words.get(1))?),
            "half_trace" if at_most(2) => Measure::HalfTrace(needs_plane(plane_of(words.get(1))?)?),
            "gouy" if at_most(2) => Measure::Gouy(needs_plane(plane_of(words.get(1))?)?),
            "round_trip_length" if at_most(1) => Measure::RoundTripLength,
            "fsr" if at_most(1) => Measure::Fsr,
            "finesse" if at_most(1) => Measure::Finesse,
            "linewidth" if at_most(1) => Measure::Linewidth,
            "lifetime" if at_most(1) => Measure::Lifetime,
            "spacing" if at_most(2) => Measure::Spacing(needs_plane(plane_of(words.get(1))?)?),
            "suppression" if at_most(2) => {
                let order = words.get(1).and_then(|word| word.parse().ok());
                let up_to = order
                    .filter(|order| (1..=HIGHEST_ORDER).contains(order))
                    .ok_or_else(|| {
                        error(
                            format!("\"{name}\" does not say up to which order"),
                            "write suppression.12 for orders up to 12; 100 is the most",
                        )
                    })?;
                Measure::Suppression { up_to }
            }
            "mode_clearance" if at_most(1) => Measure::ModeClearance {
                up_to: cavity.highest_order,
            },
            "distance" if words.len() == 3 => {
                Measure::Distance(part_named(words[1])?, part_named(words[2])?)
            }
            _ if (2..=3).contains(&words.len()) => {
                let part = part_named(words[0])?;
                let plane = plane_of(words.get(2))?;
                match words[1] {
                    "spot" => Measure::Spot(part, plane),
                    "least" => Measure::Least(part, plane),
                    "waist" => Measure::Waist(part, plane),
                    "waist_at" => Measure::WaistAt(part, plane),
                    "aspect" if plane.is_none() => Measure::Aspect(part),
                    other => {
                        return Err(error(
                            format!("\"{other}\" is no measure of a part"),
                            "a part has spot, least, waist, waist_at and aspect",
                        ));
                    }
                }
            }
            _ => {
                return Err(error(
                    format!("\"{name}\" is no measure"),
                    &format!("known measures: {KNOWN}"),
                ));
            }
        };
        measure.check_part(cavity)?;
        Ok(measure)
    }

    /// Whether the part can have this measure at all.
    fn check_part(self, cavity: &Cavity) -> Result<(), MeasureError> {
        let (part, needs_waist) = match self {
            Measure::Least(part, _) => (part, false),
            Measure::Waist(part, _) | Measure::WaistAt(part, _) => (part, true),
            _ => return Ok(()),
        };
        let described = &cavity.parts()[part];
        let has_inside = matches!(
            described.element,
            Element::Gap { .. } | Element::Slab(_) | Element::Duct { .. }
        );
        let bends = described.bends_inside();
        let name = &described.name;
        if !has_inside {
            return Err(MeasureError {
                message: format!("the {} {name} has no inside", described.kind()),
                help: format!("write {name}.spot for the beam radius there"),
            });
        }
        if needs_waist && bends {
            return Err(MeasureError {
                message: format!("the beam inside {name} is bent and has no single waist"),
                help: format!("write {name}.least for the least radius inside"),
            });
        }
        Ok(())
    }

    /// What its number is.
    pub fn presence(self) -> Presence {
        match self {
            Measure::Margin(_)
            | Measure::HalfTrace(_)
            | Measure::Aspect(_)
            | Measure::Finesse
            | Measure::ModeClearance { .. }
            | Measure::Suppression { .. } => Presence::Number,
            Measure::Gouy(_) => Presence::Angle,
            Measure::WaistAt(..) => Presence::Position,
            Measure::Fsr | Measure::Linewidth => Presence::Frequency,
            Measure::Spacing(_) => Presence::Offset,
            Measure::Lifetime => Presence::Time,
            Measure::Spot(..)
            | Measure::Least(..)
            | Measure::Waist(..)
            | Measure::Distance(..)
            | Measure::RoundTripLength => Presence::Length,
        }
    }
}

/// Where a measure must lie, in SI units; the bounds themselves are allowed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Bounds {
    /// Not below.
    Above(f64),
    /// Not above.
    Below(f64),
    /// Neither below the first nor above the second.
    Between(f64, f64),
}

impl Bounds {
    /// Whether a value lies within.
    pub fn hold(self, value: f64) -> bool {
        match self {
            Bounds::Above(low) => value >= low,
            Bounds::Below(high) => value <= high,
            Bounds::Between(low, high) => (low..=high).contains(&value),
        }
    }
}

impl fmt::Display for Bounds {
    /// The bounds in SI units.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Bounds::Above(low) => write!(f, "above {low:?}"),
            Bounds::Below(high) => write!(f, "below {high:?}"),
            Bounds::Between(low, high) => write!(f, "between {low:?} and {high:?}"),
        }
    }
}

/// A measure and where it must lie.
#[derive(Clone, Debug, PartialEq)]
pub struct Limit {
    /// The measure's name as written.
    pub name: String,
    /// The measure.
    pub measure: Measure,
    /// Where it must lie.
    pub bounds: Bounds,
}
