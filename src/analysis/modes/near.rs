//! Which modes lie near the fundamental or near a sideband, and why.

use super::NO_LOSS;
use super::result::{Clearance, Coincidence, Fraction, Fractions, Mode, Order, Sideband};
use crate::analysis::spectrum;
use crate::optics::PerPlane;

/// Modes of one order share their place where the planes are alike: what differs by less, in free
/// spectral ranges, is rounding, and the first of them is named.
const SAME: f64 = 1e-9;

/// The largest denominator of a fraction that counts as a cause: more would find one everywhere.
const LARGEST_DENOMINATOR: usize = 12;

/// What is farther from a fraction, in free spectral ranges, is not caused by it, whatever is
/// wanted.
const MOST_OFF: f64 = 0.05;

/// The comb of modes of one polarisation.
#[derive(Clone, Copy, Debug)]
pub(super) struct Comb {
    /// Spacing of neighbouring orders, in free spectral ranges.
    pub(super) spacing: PerPlane<f64>,
    /// Free spectral range, in hertz.
    pub(super) fsr: f64,
    /// Finesse, where it exists.
    pub(super) finesse: Option<f64>,
    /// Highest order m + n.
    pub(super) highest: usize,
}

impl Comb {
    /// Every m and n from the given order on, by order and then by falling m.
    fn each(&self, from: usize) -> impl Iterator<Item = (usize, usize)> + use<> {
        (from..=self.highest).flat_map(|order| (0..=order).map(move |n| (order - n, n)))
    }

    /// Why counts of linewidths are missing.
    fn why(&self) -> Option<&'static str> {
        self.finesse.is_none().then_some(NO_LOSS)
    }

    fn linewidths(&self, turns: f64) -> Option<f64> {
        self.finesse.map(|finesse| turns * finesse)
    }

    fn suppression_db(&self, turns: f64) -> Option<f64> {
        let finesse = self.finesse?;
        Some(10.0 * spectrum::suppression(turns, finesse).log10())
    }

    /// The modes; what clipping and the source make of them is left open.
    pub(super) fn modes(&self) -> Vec<Mode> {
        self.each(1)
            .map(|(m, n)| {
                let turns = spectrum::offset(self.spacing, m, n);
                Mode {
                    m,
                    n,
                    order: m + n,
                    offset_hz: turns * self.fsr,
                    offset_linewidths: self.linewidths(turns),
                    suppression_db: self.suppression_db(turns),
                    clip_loss: None,
                    content: None,
                    why: None,
                }
            })
            .collect()
    }

    /// The mode nearest to a place above the fundamental, in free spectral ranges, among those of
    /// the given order and higher that count; with its distance.
    pub(super) fn nearest(
        &self,
        place: f64,
        from: usize,
        counts: impl Fn(usize, usize) -> bool,
    ) -> Option<(usize, usize, f64)> {
        let mut nearest: Option<(usize, usize, f64)> = None;
        for (m, n) in self.each(from).filter(|(m, n)| counts(*m, *n)) {
            let turns = spectrum::in_one_range(spectrum::offset(self.spacing, m, n) - place);
            if nearest.is_none_or(|(_, _, least)| turns.abs() < least.abs() - SAME) {
                nearest = Some((m, n, turns));
            }
        }
        nearest
    }

    /// A mode at a distance from the fundamental, in free spectral ranges.
    pub(super) fn clearance(&self, (m, n, turns): (usize, usize, f64)) -> Clearance {
        Clearance {
            linewidths: self.linewidths(turns.abs()),
            offset_hz: turns * self.fsr,
            m,
            n,
            why: self.why(),
        }
    }

    /// The nearest mode of every order.
    pub(super) fn by_order(&self) -> Vec<Order> {
        (1..=self.highest)
            .filter_map(|order| {
                let (m, n, turns) = self.nearest(0.0, order, |m, n| m + n == order)?;
                Some(Order {
                    order,
                    m,
                    n,
                    offset_hz: turns * self.fsr,
                    linewidths: self.linewidths(turns.abs()),
                    suppression_db: self.suppression_db(turns),
                    clip_loss: None,
                    why: self.why(),
                })
            })
            .collect()
    }

    /// Both sidebands of every modulation frequency, in hertz.
    pub(super) fn sidebands(&self, frequencies: &[f64]) -> Vec<Sideband> {
        frequencies
            .iter()
            .flat_map(|frequency| [*frequency, -frequency])
            .filter_map(|sideband_hz| {
                let place = spectrum::in_one_range(sideband_hz / self.fsr);
                let (m, n, turns) = self.nearest(place, 0, |_, _| true)?;
                Some(Sideband {
                    sideband_hz,
                    m,
                    n,
                    offset_hz: turns * self.fsr,
                    offset_linewidths: self.linewidths(turns),
                    why: self.why(),
                })
            })
            .collect()
    }

    /// The modes within a distance of the fundamental, in free spectral ranges.
    pub(super) fn coincidences(&self, apart: f64) -> Vec<Coincidence> {
        let fractions = Fractions {
            tangential: fraction(self.spacing.tangential, apart),
            sagittal: fraction(self.spacing.sagittal, apart),
        };
        self.each(1)
            .filter_map(|(m, n)| {
                let turns = spectrum::offset(self.spacing, m, n);
                (turns.abs() < apart).then(|| Coincidence {
                    m,
                    n,
                    offset_hz: turns * self.fsr,
                    offset_linewidths: self.linewidths(turns),
                    fractions: cause(fractions, m, n),
                    why: self.why(),
                })
            })
            .collect()
    }
}

/// The fraction of the least denominator q that a spacing is so nearly that order q itself lies
/// within the given distance of the fundamental.
fn fraction(spacing: f64, apart: f64) -> Option<Fraction> {
    let apart = apart.min(MOST_OFF);
    (1..=LARGEST_DENOMINATOR).find_map(|q| {
        let turns = spacing * q as f64;
        let p = turns.round();
        ((turns - p).abs() < apart).then(|| Fraction {
            p: p.rem_euclid(q as f64) as usize,
            q,
        })
    })
}

/// The fractions in the planes in which a mode has nodes, if with them it would lie exactly on the
/// fundamental.
fn cause(fractions: Fractions, m: usize, n: usize) -> Option<Fractions> {
    const NONE: Fraction = Fraction { p: 0, q: 1 };
    let t = if m > 0 { fractions.tangential? } else { NONE };
    let s = if n > 0 { fractions.sagittal? } else { NONE };
    let whole = (m * t.p * s.q + n * s.p * t.q).is_multiple_of(t.q * s.q);
    whole.then(|| Fractions {
        tangential: (m > 0).then_some(t),
        sagittal: (n > 0).then_some(s),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn comb(tangential: f64, sagittal: f64) -> Comb {
        Comb {
            spacing: PerPlane {
                tangential,
                sagittal,
            },
            fsr: 1e9,
            finesse: Some(1000.0),
            highest: 12,
        }
    }

    #[test]
    fn a_spacing_near_a_fraction_is_named() {
        assert_eq!(fraction(0.2501, 0.005), Some(Fraction { p: 1, q: 4 }));
        assert_eq!(fraction(0.4001, 0.005), Some(Fraction { p: 2, q: 5 }));
        assert_eq!(fraction(0.9999, 0.005), Some(Fraction { p: 0, q: 1 }));
        assert_eq!(fraction(0.5001, 0.005), Some(Fraction { p: 1, q: 2 }));
        assert_eq!(fraction(0.3819, 0.005), None);
    }

    /// Of a quarter in one plane and a half in the other, TEM_21 has 2/4 + 1/2.
    #[test]
    fn planes_of_different_fractions_meet() {
        let found = comb(0.25, 0.5).coincidences(0.005);
        let is_there = |m, n| found.iter().any(|mode| (mode.m, mode.n) == (m, n));
        assert!(is_there(4, 0) && is_there(0, 2) && is_there(2, 1));
        assert!(!is_there(1, 0) && !is_there(1, 1) && !is_there(2, 2));
        assert!(found.iter().all(|mode| mode.fractions.is_some()));
    }

    #[test]
    fn of_modes_at_one_place_the_lowest_is_named() {
        let found = comb(0.25, 0.25).nearest(0.0, 1, |_, _| true);
        assert!(matches!(found, Some((4, 0, turns)) if turns.abs() < 1e-12));
    }
}
