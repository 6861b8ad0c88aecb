//! Broken cavity files: what a builder is told about each mistake, and that no input whatever
//! brings the program down.

mod gallery;
mod grammar;
mod judge;
mod random;
mod robust;
