//! The result of an analysis of transverse modes: plain, documented, serialisable; SI units, the
//! unit in each name.

use serde::Serialize;

use crate::analysis::check::Planes;
use crate::cavity::Slot;
use crate::quantity::Kind;

/// Where the transverse modes of a cavity resonate.
#[derive(Clone, Debug, Serialize)]
pub struct Modes {
    /// The cavity's title; left out where it has none.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub title: Option<String>,
    /// `standing` or `ring`.
    pub form: &'static str,
    /// Wavelength in vacuum.
    pub wavelength_m: f64,
    /// Whether both planes hold a mode.
    pub stable: bool,
    /// Whether the worse plane has a half-trace of ±1 within 1e-10.
    pub on_edge: bool,
    /// The lesser margin of the planes.
    pub margin: f64,
    /// Why there is no answer; left out where there is one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub no_answer: Option<String>,
    /// Free spectral range.
    pub fsr_hz: f64,
    /// Finesse π√ρ/(1 − ρ); none where nothing is written of any loss.
    pub finesse: Option<f64>,
    /// Free spectral range over finesse.
    pub linewidth_hz: Option<f64>,
    /// Highest order m + n that is looked at.
    pub highest_order: usize,
    /// The wanted mode clearance in linewidths; none where there is no linewidth.
    pub apart_linewidths: Option<f64>,
    /// The same as a difference of frequencies: where no losses are known, 1 % of the free spectral
    /// range.
    pub apart_hz: f64,
    /// Gouy phase of a round trip modulo 2π, flips counted.
    pub gouy_folded_rad: Option<Planes<f64>>,
    /// Spacing of neighbouring orders, folded into half a free spectral range to either side.
    pub spacing_hz: Option<Planes<f64>>,
    /// `s` or `p`.
    pub polarisation: &'static str,
    /// Where the comb of the other polarisation lies; none where there is no answer.
    pub other_polarisation_offset_hz: Option<f64>,
    /// More of the other polarisation, where it differs.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub other_polarisation: Option<OtherPolarisation>,
    /// Every TEM_mn with 1 ≤ m + n ≤ `highest_order`, by order and then by falling m.
    pub modes: Vec<Mode>,
    /// The fundamental's own loss by clipping in a round trip.
    pub fundamental_clip_loss: Option<f64>,
    /// The mode nearest to the fundamental.
    pub mode_clearance: Option<Clearance>,
    /// The same without modes that lose more than 10 % in a round trip by clipping.
    pub mode_clearance_surviving: Option<Clearance>,
    /// The nearest mode of every order.
    pub by_order: Vec<Order>,
    /// Power that the transverse modes hold at the fundamental's resonance, as a share of the
    /// fundamental's, for what the source sends into each.
    pub parasitic: Option<f64>,
    /// Share of the source's power that is in the fundamental.
    pub fundamental_content: Option<f64>,
    /// Share of the source's power that is in none of the modes looked at.
    pub content_beyond: Option<f64>,
    /// What the modulated light meets; two for each modulation frequency.
    pub sidebands: Vec<Sideband>,
    /// Modes nearer to the fundamental than what is wanted.
    pub coincidences: Vec<Coincidence>,
    /// What single quantity brings the clearance to what is wanted, nearest values below and above.
    pub ways_out: Vec<WayOut>,
    /// Where within its limits each quantity keeps the wanted clearance.
    pub windows: Vec<Window>,
    /// Doubts that the reader should know.
    pub cautions: Vec<String>,
    /// Why something is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
    /// Whether the file's tangential plane is the horizontal one.
    pub tangential_is_horizontal: bool,
}

/// The light polarised square to the cavity's own.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct OtherPolarisation {
    /// `s` or `p`.
    pub polarisation: &'static str,
    /// Where its fundamental lies.
    pub offset_hz: f64,
    /// Its finesse.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub finesse: Option<f64>,
    /// Its linewidth.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub linewidth_hz: Option<f64>,
    /// Its mode nearest to the fundamental of the cavity's own polarisation.
    pub nearest: Clearance,
}

/// A transverse mode.
#[derive(Clone, Debug, Serialize)]
pub struct Mode {
    /// Nodes in the tangential plane.
    pub m: usize,
    /// Nodes in the sagittal plane.
    pub n: usize,
    /// m + n.
    pub order: usize,
    /// Above the fundamental, in [−FSR/2, FSR/2).
    pub offset_hz: f64,
    /// The same in linewidths.
    pub offset_linewidths: Option<f64>,
    /// How much less power it holds at the fundamental's resonance than at its own.
    pub suppression_db: Option<f64>,
    /// Share of its power that the openings cut off in a round trip.
    pub clip_loss: Option<f64>,
    /// Share of the source's power that is in this mode.
    pub content: Option<f64>,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<String>,
}

/// A mode and how far it lies from the fundamental.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Clearance {
    /// Distance in linewidths.
    pub linewidths: Option<f64>,
    /// Above the fundamental, in [−FSR/2, FSR/2).
    pub offset_hz: f64,
    /// Nodes in the tangential plane.
    pub m: usize,
    /// Nodes in the sagittal plane.
    pub n: usize,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<&'static str>,
}

/// The mode of an order that lies nearest to the fundamental.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Order {
    /// m + n.
    pub order: usize,
    /// Nodes in the tangential plane.
    pub m: usize,
    /// Nodes in the sagittal plane.
    pub n: usize,
    /// Above the fundamental, in [−FSR/2, FSR/2).
    pub offset_hz: f64,
    /// Distance in linewidths.
    pub linewidths: Option<f64>,
    /// How much less power it holds at the fundamental's resonance than at its own.
    pub suppression_db: Option<f64>,
    /// The least loss by clipping of any mode of the order, in a round trip; left out where it is
    /// not known.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub clip_loss: Option<f64>,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<&'static str>,
}

/// A sideband and the mode nearest to it, the fundamental included.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Sideband {
    /// Its distance from the carrier, which is resonant in the fundamental.
    pub sideband_hz: f64,
    /// Nodes in the tangential plane.
    pub m: usize,
    /// Nodes in the sagittal plane.
    pub n: usize,
    /// Mode − sideband, in [−FSR/2, FSR/2).
    pub offset_hz: f64,
    /// The same in linewidths.
    pub offset_linewidths: Option<f64>,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<&'static str>,
}

/// A mode too near to the fundamental.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Coincidence {
    /// Nodes in the tangential plane.
    pub m: usize,
    /// Nodes in the sagittal plane.
    pub n: usize,
    /// Above the fundamental, in [−FSR/2, FSR/2).
    pub offset_hz: f64,
    /// The same in linewidths.
    pub offset_linewidths: Option<f64>,
    /// The fractions of the free spectral range that the spacings nearly are, where they are why;
    /// left out where they are not.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub fractions: Option<Fractions>,
    /// Why a value is missing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub why: Option<&'static str>,
}

/// Fractions of the free spectral range, of the planes in which a mode has nodes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct Fractions {
    /// Of the tangential plane.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub tangential: Option<Fraction>,
    /// Of the sagittal plane.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub sagittal: Option<Fraction>,
}

/// A fraction p/q.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct Fraction {
    /// Numerator, from 0 to q − 1.
    pub p: usize,
    /// Denominator.
    pub q: usize,
}

/// A value of one quantity at which the mode clearance is what is wanted.
#[derive(Clone, Debug, Serialize)]
pub struct WayOut {
    /// The quantity's address.
    pub quantity: String,
    /// Its value now, as written; left out where it is flat.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from: Option<f64>,
    /// Its value then.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to: Option<f64>,
    /// 1/R or 1/f now; left out for anything else.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from_per_m: Option<f64>,
    /// 1/R or 1/f then.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to_per_m: Option<f64>,
    /// How far it may go on from there until some mode comes too near again, or the search ends.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub until: Option<f64>,
    /// The same as 1/R or 1/f.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub until_per_m: Option<f64>,
    /// Whether `to` is within the quantity's own limits; left out where it has none.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub within_limits: Option<bool>,
    /// The lesser margin of the planes then.
    pub margin: f64,
    /// The mode clearance then; left out where there is no linewidth.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub mode_clearance_linewidths: Option<f64>,
    /// The same as a difference of frequencies.
    pub mode_clearance_hz: f64,
    /// The mode that is nearest then: nodes in the tangential …
    pub m: usize,
    /// … and in the sagittal plane.
    pub n: usize,
    /// The quantity, for readers of the library.
    #[serde(skip)]
    pub slot: Slot,
    /// How it is written.
    #[serde(skip)]
    pub kind: Kind,
    /// `from`, `to` and `until` as kept: 1/R for a radius.
    #[serde(skip)]
    pub kept: [f64; 3],
}

/// A stretch of values of one quantity over which the wanted mode clearance holds.
#[derive(Clone, Debug, Serialize)]
pub struct Window {
    /// The quantity's address.
    pub quantity: String,
    /// One end, as written; left out where it is flat.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from: Option<f64>,
    /// The other end.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to: Option<f64>,
    /// The lesser 1/R or 1/f; left out for anything else.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub from_per_m: Option<f64>,
    /// The greater 1/R or 1/f.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub to_per_m: Option<f64>,
    /// Whether the value now lies within.
    pub holds_nominal: bool,
    /// Whether it is all that was searched: the quantity's limits, or a tenth of its value to
    /// either side.
    pub whole: bool,
    /// How the quantity is written.
    #[serde(skip)]
    pub kind: Kind,
    /// Its ends as kept, rising: 1/R for a radius.
    #[serde(skip)]
    pub kept: [f64; 2],
}
