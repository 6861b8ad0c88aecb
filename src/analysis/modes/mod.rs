//! Where the transverse modes resonate, which of them disturb the fundamental, and how to move out:
//! one plain result.
//!
//! While the fundamental is resonant, a mode at an offset Δ holds 1/(1 + F_c sin²(πΔ/FSR)) of the
//! power that it would hold on its own resonance (Siegman, *Lasers* (1986), chapters 11 and 19).

pub mod clip;
pub mod content;
mod hermite;
mod near;
mod result;
mod search;
mod ways_out;

pub use result::{
    Clearance, Coincidence, Fraction, Fractions, Mode, Modes, Order, OtherPolarisation, Sideband,
    WayOut, Window,
};

use super::airy;
use super::check::{edge_reason, everything_repeats, without_group_index};
use super::eigenmode::{Eigenmode, Stability};
use super::envelope::Envelope;
use super::lengths::RoundTripLengths;
use crate::cavity::{Cavity, Polarisation, Slot};
use crate::optics::{PerPlane, Plane};
use clip::ClipLosses;
use near::Comb;
use search::Aim;
use std::f64::consts::TAU;

/// The mode clearance that is wanted where none is named, in linewidths.
pub const APART: f64 = 5.0;

/// The distance that is wanted where no losses are known, in free spectral ranges.
pub const APART_WITHOUT_LOSSES: f64 = 0.01;

/// A mode that loses more than this in a round trip by clipping does not survive.
pub const SURVIVES: f64 = 0.1;

/// Analyses the transverse modes of a cavity, up to its highest order.
///
/// `apart` is the wanted mode clearance in linewidths; where no losses are known,
/// [`APART_WITHOUT_LOSSES`] of the free spectral range takes its place. Ways out are sought along
/// every quantity with a spread that moves the modes, and along `free`.
pub fn modes(cavity: &Cavity, apart: f64, free: &[Slot]) -> Modes {
    let values = cavity.book().nominal();
    let eigenmode = Eigenmode::of(cavity, &values);
    let fsr = RoundTripLengths::of(cavity, &values).free_spectral_range();
    let finesse = finesse(cavity, &values, cavity.polarisation);
    let aim = match finesse {
        Some(_) => Aim::Linewidths(apart),
        None => Aim::Share(APART_WITHOUT_LOSSES),
    };
    let stability = eigenmode.stability();
    let mut found = Modes {
        title: cavity.title.clone(),
        form: cavity.form().name(),
        wavelength_m: Cavity::WAVELENGTH.of(&values),
        stable: stability == Stability::Stable,
        on_edge: stability == Stability::OnEdge,
        margin: eigenmode.margin(),
        no_answer: no_answer(cavity, &values, &eigenmode),
        fsr_hz: fsr,
        finesse,
        linewidth_hz: finesse.map(|finesse| fsr / finesse),
        highest_order: cavity.highest_order,
        apart_linewidths: finesse.map(|_| apart),
        apart_hz: aim.turns(finesse) * fsr,
        gouy_folded_rad: None,
        spacing_hz: None,
        polarisation: cavity.polarisation.name(),
        other_polarisation_offset_hz: None,
        other_polarisation: None,
        modes: Vec::new(),
        fundamental_clip_loss: None,
        mode_clearance: None,
        mode_clearance_surviving: None,
        by_order: Vec::new(),
        parasitic: None,
        fundamental_content: None,
        content_beyond: None,
        sidebands: Vec::new(),
        coincidences: Vec::new(),
        ways_out: Vec::new(),
        windows: Vec::new(),
        cautions: cautions(cavity),
        why: None,
        tangential_is_horizontal: cavity.tangential_is_horizontal(),
    };
    if found.no_answer.is_some() {
        found.why.clone_from(&found.no_answer);
        return found;
    }
    if finesse.is_none() {
        found.cautions.push(
            "nothing is written of any loss: there is no linewidth, and modes within 1 % of the \
             free spectral range count as near"
                .into(),
        );
    }
    // There is an answer: the phases exist.
    let gouy = PerPlane::from_fn(|plane| eigenmode.planes[plane].gouy_folded.unwrap_or(0.0));
    let comb = Comb {
        spacing: gouy.map(|phase| phase / TAU),
        fsr,
        finesse,
        highest: cavity.highest_order,
    };
    found.gouy_folded_rad = Some(gouy.into());
    let folded = |turns: f64| super::spectrum::in_one_range(turns) * fsr;
    found.spacing_hz = Some(comb.spacing.map(folded).into());
    let nearest = comb.nearest(0.0, 1, |_, _| true);
    found.modes = comb.modes();
    if finesse.is_none() {
        missing(&mut found, NO_LOSS);
    }
    found.mode_clearance = nearest.map(|nearest| comb.clearance(nearest));
    found.by_order = comb.by_order();
    found.sidebands = comb.sidebands(&cavity.sidebands);
    found.coincidences = comb.coincidences(aim.turns(finesse));
    other_polarisation(cavity, &values, comb, &mut found);
    let envelope = found
        .stable
        .then(|| Envelope::of(cavity, &values, eigenmode.start()));
    clipped(cavity, &values, envelope.as_ref(), comb, &mut found);
    sent(cavity, &values, envelope.as_ref(), comb, &mut found);
    let clear = nearest.is_none_or(|(_, _, turns)| turns.abs() >= aim.turns(finesse));
    let ways = ways_out::search(cavity, free, aim, clear, found.stable);
    found.ways_out = ways.ways_out;
    found.windows = ways.windows;
    if ways.left_out > 0 {
        found.cautions.push(format!(
            "ways out along {} more quantities are not sought: there are too many of them for so \
             high an order",
            ways.left_out
        ));
    }
    found
}

/// Why there is no spectrum: a plane that holds no mode. Where every beam repeats itself, the
/// spectrum is there all the same.
fn no_answer(cavity: &Cavity, values: &[f64], eigenmode: &Eigenmode) -> Option<String> {
    let reasons: Vec<String> = Plane::BOTH
        .into_iter()
        .filter_map(|plane| {
            let name = plane.name();
            match eigenmode.planes[plane].stability {
                Stability::Stable => None,
                Stability::OnEdge if everything_repeats(cavity, values, plane) => None,
                Stability::OnEdge => Some(format!(
                    "{name} plane: {}",
                    edge_reason(cavity, values, plane)
                )),
                Stability::Unstable => Some(format!("the {name} plane is unstable")),
            }
        })
        .collect();
    (!reasons.is_empty()).then(|| reasons.join("; "))
}

fn finesse(cavity: &Cavity, values: &[f64], polarisation: Polarisation) -> Option<f64> {
    let attenuation = airy::round_trip_attenuation(cavity, values, polarisation);
    let (finesse, exists) = airy::finesse(attenuation);
    (exists && finesse.is_finite()).then_some(finesse)
}

fn cautions(cavity: &Cavity) -> Vec<String> {
    let mut cautions = cavity.cautions().to_vec();
    cautions.extend(without_group_index(cavity));
    cautions
}

/// Every reflection turns light polarised in its plane of incidence over: after an odd number of
/// them one polarisation comes back with the other sign.
fn other_polarisation(cavity: &Cavity, values: &[f64], comb: Comb, found: &mut Modes) {
    let odd = cavity.reflections() % 2 == 1;
    let offset = if odd { -0.5 } else { 0.0 };
    found.other_polarisation_offset_hz = Some(offset * comb.fsr);
    let polarisation = cavity.polarisation.other();
    let finesse = finesse(cavity, values, polarisation);
    if !odd && finesse == comb.finesse {
        return;
    }
    // The distance of its modes counts in linewidths of the light that is resonant.
    found.other_polarisation = comb.nearest(-offset, 0, |_, _| true).map(|nearest| {
        let (m, n, turns) = nearest;
        OtherPolarisation {
            polarisation: polarisation.name(),
            offset_hz: offset * comb.fsr,
            finesse,
            linewidth_hz: finesse.map(|finesse| comb.fsr / finesse),
            nearest: comb.clearance((m, n, turns)),
        }
    });
}

/// Why there is no linewidth.
const NO_LOSS: &str = "nothing is written of any loss";

/// Why nothing is known of the beam of a cavity in which every beam repeats itself.
const NO_BEAM: &str = "every beam repeats itself here, and the openings alone set the mode";

/// Adds what the openings do to the modes.
fn clipped(
    cavity: &Cavity,
    values: &[f64],
    envelope: Option<&Envelope<f64>>,
    comb: Comb,
    found: &mut Modes,
) {
    let losses = match envelope {
        Some(envelope) => clip::round_trip(cavity, values, envelope, comb.highest),
        None => Err(NO_BEAM),
    };
    let survives = |m: usize, n: usize| match &losses {
        Ok(Some(losses)) => losses.of(m, n) <= SURVIVES,
        _ => true,
    };
    found.mode_clearance_surviving = match losses {
        Ok(_) => comb
            .nearest(0.0, 1, survives)
            .map(|nearest| comb.clearance(nearest)),
        Err(_) => None,
    };
    if found.mode_clearance_surviving.is_none() && losses.is_ok() {
        add_reason(
            &mut found.why,
            "every mode loses more than 10 % by clipping",
        );
    }
    match &losses {
        Ok(Some(losses)) => note_losses(found, losses),
        Ok(None) => missing(found, "no opening is given"),
        Err(why) => missing(found, why),
    }
}

fn note_losses(found: &mut Modes, losses: &ClipLosses) {
    found.fundamental_clip_loss = Some(losses.of(0, 0));
    for mode in &mut found.modes {
        mode.clip_loss = Some(losses.of(mode.m, mode.n));
    }
    for order in &mut found.by_order {
        let each = (0..=order.order).map(|n| losses.of(order.order - n, n));
        order.clip_loss = Some(each.fold(f64::INFINITY, f64::min));
    }
}

/// Adds what the source sends into the modes.
fn sent(
    cavity: &Cavity,
    values: &[f64],
    envelope: Option<&Envelope<f64>>,
    comb: Comb,
    found: &mut Modes,
) {
    let shares = match envelope {
        Some(envelope) => content::of_source(cavity, values, envelope, comb.highest),
        None => Err(NO_BEAM),
    };
    let shares = match shares {
        Ok(shares) => shares,
        Err(why) => {
            missing(found, why);
            return;
        }
    };
    let of = |m: usize, n: usize| shares.tangential[m] * shares.sagittal[n];
    let fundamental = of(0, 0);
    let (mut all, mut resonant) = (fundamental, comb.finesse.map(|_| 0.0));
    for mode in &mut found.modes {
        let share = of(mode.m, mode.n);
        mode.content = Some(share);
        all += share;
        resonant = resonant
            .zip(mode.suppression_db)
            .map(|(sum, suppression)| sum + share / 10_f64.powf(0.1 * suppression));
    }
    found.fundamental_content = Some(fundamental);
    found.content_beyond = Some((1.0 - all).max(0.0));
    found.parasitic = resonant
        .map(|sum| sum / fundamental)
        .filter(|ratio| ratio.is_finite());
    if comb.finesse.is_some() && found.parasitic.is_none() {
        add_reason(&mut found.why, "the source has no power in the fundamental");
    }
    let quality = cavity.source.as_ref().map(|source| source.m2.of(values));
    if quality.is_some_and(|m2| m2 > 1.0) {
        found.cautions.push(
            "the source has an M² above 1: its content is that of the Gaussian beam within it, an \
             estimate"
                .into(),
        );
    }
}

/// Says of the whole and of every mode why a value is missing, beside what else is.
fn missing(found: &mut Modes, why: &str) {
    add_reason(&mut found.why, why);
    for mode in &mut found.modes {
        add_reason(&mut mode.why, why);
    }
}

/// Adds why a value is missing to other such reasons.
fn add_reason(reasons: &mut Option<String>, why: &str) {
    *reasons = match reasons.take() {
        Some(others) if others.contains(why) => Some(others),
        Some(others) => Some(format!("{others}; {why}")),
        None => Some(why.into()),
    };
}
