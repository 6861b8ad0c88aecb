//! What a cavity does: plain data in, plain documented results out.

pub mod airy;
pub mod check;
pub mod clipping;
pub mod eigenmode;
pub mod envelope;
pub mod leaving;
pub mod lengths;
pub mod materials;
pub mod measures;
pub mod modes;
pub mod profile;
pub mod ranges;
pub mod spectrum;
