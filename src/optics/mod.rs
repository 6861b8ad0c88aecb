//! Rays and beams through single optical elements, in plain SI numbers.
