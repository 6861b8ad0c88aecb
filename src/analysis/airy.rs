//! What remains of the light after one round trip, and the finesse that follows.
//!
//! ρ is the product of all amplitude factors of a round trip. The finesse is π√ρ/(1 − ρ), the
//! usual one of the Lorentzian limit (Siegman, *Lasers* (1986), chapter 11). Clipping at openings
//! does not enter.

use std::f64::consts::PI;

use crate::cavity::{Cavity, Element, Form, Polarisation, SlabLoss, Slot, slab_crossing};
use crate::numeric::Real;

/// −ln ρ² = the sum of −ln of all power factors of one round trip; zero where nothing is lost.
///
/// Formed as a sum of logarithms, so that a loss of a few parts per million keeps its digits.
/// `polarisation` is that of the light, which need not be the cavity's own.
pub fn round_trip_attenuation<T: Real>(
    cavity: &Cavity,
    values: &[T],
    polarisation: Polarisation,
) -> T {
    let count = cavity.parts().len();
    let mut sum = T::constant(0.0);
    for (index, part) in cavity.parts().iter().enumerate() {
        let is_end = index == 0 || index + 1 == count;
        let passes = match cavity.form() {
            Form::Standing if !is_end => 2.0,
            _ => 1.0,
        };
        let attenuation = match &part.element {
            Element::Mirror(mirror) => {
                let coating = mirror.coating(part.swapped, polarisation);
                if coating.is_unknown() {
                    continue;
                }
                -coating.reflectance(values).ln()
            }
            Element::Lens {
                loss: Some(loss), ..
            } => -(-loss.of(values) + 1.0).ln(),
            Element::Slab(slab) => match slab.loss {
                None => continue,
                Some(SlabLoss::PerPass(loss)) => -(-loss.of(values) + 1.0).ln(),
                Some(SlabLoss::PerLength(alpha)) => {
                    let crossing = slab_crossing(slab, part.before.phase(values), values);
                    alpha.of(values) * slab.thickness.of(values) / crossing.cos_to
                }
            },
            _ => continue,
        };
        sum = sum + attenuation * passes;
    }
    sum
}

/// The slots on which the attenuation depends.
pub fn loss_slots(cavity: &Cavity) -> Vec<Slot> {
    let mut slots = Vec::new();
    for part in cavity.parts() {
        match &part.element {
            Element::Mirror(mirror) => {
                let coating = mirror.coating(part.swapped, cavity.polarisation);
                slots.extend([coating.reflectance, coating.transmission, coating.loss]);
            }
            Element::Lens { loss, .. } => slots.push(*loss),
            Element::Slab(slab) => match slab.loss {
                None => {}
                Some(SlabLoss::PerPass(loss)) => slots.push(Some(loss)),
                Some(SlabLoss::PerLength(alpha)) => {
                    slots.push(Some(alpha));
                    slots.extend(part.ray_slots().into_iter().map(Some));
                }
            },
            _ => {}
        }
    }
    slots.into_iter().flatten().collect()
}

/// The finesse π√ρ/(1 − ρ) from −ln ρ², and whether it exists: without losses it does not.
///
/// √ρ/(1 − ρ) = 1/(2 sinh(x/4)) with x = −ln ρ², free of cancellation.
pub fn finesse<T: Real>(attenuation: T) -> (T, T::Mask) {
    let zero = T::constant(0.0);
    let exists = zero.less(attenuation);
    let x = T::select(exists, attenuation, T::constant(1.0)) * 0.25;
    // sinh x = x·sin√(−x²)/√(−x²), the entire form.
    let sinh = x * (-x.squared()).sinc_root();
    (T::constant(0.5 * PI) / sinh, exists)
}
