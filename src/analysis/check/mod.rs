//! The whole answer to "is it stable, and what is the beam everywhere": one plain result.

mod cautions;
mod limits;
mod result;
mod view;

pub use result::{
    Check, Leaving, LeavingPlane, LimitCheck, PlaneCheck, Planes, Range, RoundTrip, Spot, Station,
    Waist,
};

use super::eigenmode::{Eigenmode, Stability};
use super::envelope::Envelope;
use super::lengths::RoundTripLengths;
use super::ranges::stable_ranges;
use crate::cavity::Cavity;
use crate::optics::PerPlane;
use cautions::{clipping_caution, data_cautions, mode_cautions, square_on_folds};
pub(in crate::analysis) use cautions::{edge_reason, everything_repeats, without_group_index};
use limits::{describe_range, limits};
use view::View;

/// Why a value is missing where a mode is there.
const TOO_LARGE: &str = "this value is too large or too small to be computed";

const NO_MODE: &str = "this plane holds no mode";

/// Checks a cavity.
pub fn check(cavity: &Cavity) -> Check {
    let values = cavity.book().nominal();
    let mode = Eigenmode::of(cavity, &values);
    let envelope = Envelope::of(cavity, &values, mode.start());
    let lengths = RoundTripLengths::of(cavity, &values);
    let view = View {
        cavity,
        values: &values,
        mode: &mode,
        envelope: &envelope,
        wavelength: Cavity::WAVELENGTH.of(&values),
    };
    let mut cautions = cavity.cautions().to_vec();
    cautions.extend(mode_cautions(&view));
    cautions.extend(data_cautions(cavity));
    cautions.extend(square_on_folds(cavity, &values));
    let stations = view.stations();
    cautions.extend(clipping_caution(&stations));
    Check {
        title: cavity.title.clone(),
        form: cavity.form().name(),
        wavelength_m: view.wavelength,
        stable: mode.stability() == Stability::Stable,
        on_edge: mode.stability() == Stability::OnEdge,
        margin: mode.margin(),
        planes: PerPlane::from_fn(|plane| view.plane(plane)).into(),
        round_trip: RoundTrip {
            length_m: lengths.geometric,
            optical_m: lengths.optical,
            group_m: lengths.group,
            fsr_hz: lengths.free_spectral_range(),
            reflections: cavity.reflections(),
        },
        stations,
        waists: view.waists(),
        leaving: view.leaving(),
        ranges: stable_ranges(cavity)
            .into_iter()
            .map(|found| describe_range(cavity, found, mode.stability()))
            .collect(),
        limits: limits(cavity, &values),
        cautions,
        tangential_is_horizontal: cavity.tangential_is_horizontal(),
    }
}
