//! One file per result: which of its figures a reader needs, in which order and units.

mod check;
mod envelope;
pub mod materials;
mod measured;
mod modes;
mod sections;
mod sweep;
mod sweep_chart;
mod tolerance;
mod tolerance_chart;
mod verdict;
mod waists;

pub use check::describe as check;
pub use envelope::describe as envelope;
pub use modes::{chart as modes_chart, describe as modes};
pub use sweep::describe as sweep;
pub use sweep_chart::describe as sweep_chart;
pub use tolerance::describe as tolerance;
pub use tolerance_chart::describe as tolerance_chart;
