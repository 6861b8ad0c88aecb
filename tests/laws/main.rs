//! Laws that need no reference: properties over random cavities, and second roads to the same
//! numbers.

mod mode;
mod ranges;
mod second_road;
mod second_type;
mod spec;
mod trace3d;
