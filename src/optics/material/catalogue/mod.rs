//! The materials, by family.
//!
//! Each entry says what its index is relative to. A prism in a room measures the ratio to air, and
//! unless a paper says otherwise that is what an entry takes it for; silica, germanium and water
//! were settled by comparison with measurements in vacuum (`tests/references/indices.rs`). For
//! data good to no better than 10⁻³ the choice means little.

mod fluids;
mod fluorides;
mod glasses;
mod hosts;
mod nonlinear;
mod semiconductors;

use super::Material;

/// All materials of the catalogue, by family.
pub fn all() -> impl Iterator<Item = &'static Material> {
    let families: [&'static [Material]; 6] = [
        glasses::GLASSES,
        fluorides::FLUORIDES,
        hosts::HOSTS,
        nonlinear::NONLINEAR,
        semiconductors::SEMICONDUCTORS,
        fluids::FLUIDS,
    ];
    families.into_iter().flatten()
}
