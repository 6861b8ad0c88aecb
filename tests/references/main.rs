//! Checks against the outside: one file a paper, handbook or set of published cavities. Every
//! expected number names its source, and says whether its digits were read there ("published"),
//! recalled ("from memory") or computed independently from a published problem ("recomputed").

mod indices;
mod ishigami;
mod jcgm_101;
mod kids_1972;
mod kogelnik_li;
mod lens_like_media;
mod lens_maker;
mod magni;
mod real_cavities;
mod second_sources;
mod transverse_modes;
