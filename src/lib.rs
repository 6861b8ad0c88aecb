//! modewright: is a laser or optical cavity stable with the parts you will really get, how large is
//! the beam on every optic, and what comes out?
//!
//! A cavity is read from a text; every analysis takes it and returns a plain result in SI units.
//!
//! ```
//! use modewright::{analysis, file};
//!
//! let text = r#"
//!     wavelength = "1064 nm"
//!     form = "standing"
//!     path = [
//!       { mirror = "M1", roc = "flat" },
//!       { gap = "d", length = "100 mm ± 0.1 mm" },
//!       { mirror = "M2", roc = "250 mm" },
//!     ]
//! "#;
//! let loaded = file::load("cavity.toml", text, &[]).expect("the file is in order");
//! let check = analysis::check::check(&loaded.cavity);
//! assert!(check.stable);
//! let spot = check.stations[0].tangential.expect("there is a mode").spot_m;
//! assert!((spot * 1e6 - 203.67).abs() < 0.01);
//! ```
//!
//! The floors, from the ground up: [`diagnostic`], [`quantity`] and [`numeric`]; [`optics`];
//! [`cavity`] and [`mod@file`]; [`analysis`]; [`report`]; [`cli`]. Each imports downward only.

pub mod analysis;
pub mod cavity;
pub mod cli;
pub mod diagnostic;
pub mod file;
pub mod numeric;
pub mod optics;
pub mod quantity;
pub mod report;
pub mod study;
