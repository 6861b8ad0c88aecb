//! Quantities as a builder writes them: "100 mm ± 0.5 mm" ⇄ a value in SI units and its spread.
//!
//! ```text
//! 100 mm ± 0.5 mm      limits; also +- and +/-, +0.2/-0.5 mm, ± 1 % (relative)
//! 0 ± 50 urad          the unit may stand once, last
//! 100.02(5) mm         a standard uncertainty: the digits in parentheses count in the last places
//! 100 mm ± 1 % convex  a word of sense stands last; -100 mm says the same of a mirror
//! flat ± 0.003 1/m     a flat, with limits of its curvature
//! > 99.9 %             as coaters write it: 99.9 to 100 %, nominal in the middle
//! ```
//!
//! What a number may be is decided by its [`Kind`]: the units accepted, the signs, and whether a
//! spread in % is relative (lengths, indices) or in points (reflectances, losses). [`parse`] reads,
//! [`show`] prints a text that reads back as the very same numbers, [`human`] prints few digits in
//! the unit a reader expects.
//!
//! A written decimal becomes the floating-point number nearest to it: prefixes shift the decimal
//! exponent before the conversion, so that 5 µm is exactly `5e-6`. Concise notation of standard
//! uncertainties: JCGM 100:2008, 7.2.2.
//!
//! Limits: at most [`LONGEST`] bytes of text, and magnitudes in SI units between 1e-30 and 1e30
//! (or zero), so that nothing that comes out of here can overflow where it is used.

mod bound;
mod decimal;
mod distance;
mod error;
mod general;
mod human;
mod kind;
mod meaning;
mod parse;
mod refuse;
mod scan;
mod settle;
mod show;
mod spread;
mod unit;
mod value;

#[cfg(test)]
mod tests;

pub use error::QuantityError;
pub use general::{General, parse_general};
pub use human::{deviation, human, human_spread, in_unit, unit_for};
pub use kind::Kind;
pub use meaning::{from_number, parse};
pub use scan::LONGEST;
pub use show::show;
pub use spread::Spread;
pub use unit::Unit;
pub use value::{Quantity, Sense, Value};
