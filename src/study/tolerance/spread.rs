//! How the quantities of a cavity lie: from chance to values.
//!
//! A quantity with limits is rectangular between them or, where the file says so, normal with the
//! limits two standard deviations to either side; a standard uncertainty is normal (JCGM 100:2008,
//! 4.3; JCGM 101:2008, 6.4). Members of a group share a draw, or are tied by a Gaussian copula.
//!
//! The draws of a sample depend on the seed and the sample's number only: every chunk of samples has
//! its own place in the stream of a counter-based generator.

use rand::Rng;
use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::SeedableRng;
use rand_distr::{Distribution, StandardNormal};

use crate::cavity::{Cavity, Entry, Shape, Slot};
use crate::numeric::{LANES, Lanes, Real};
use crate::quantity::Spread;
use crate::study::batch::BLOCKS;

/// One quantity that has a spread.
#[derive(Clone, Debug)]
pub(super) struct Spreading {
    pub(super) slot: Slot,
    /// Middle of its spread, from the nominal value, as written.
    middle: f64,
    /// Half the distance of its limits, or its standard deviation.
    size: f64,
    is_normal: bool,
    /// The factor that moves it.
    pub(super) factor: usize,
    entry: Entry,
}

/// One cause of variation: a quantity, or several that move together.
#[derive(Clone, Debug)]
pub(super) struct Factor {
    /// Its addresses.
    pub(super) name: String,
    /// Coefficient between its members, where there are several.
    correlation: Option<f64>,
    members: Vec<usize>,
}

/// All quantities with a spread that matter to a study.
#[derive(Clone, Debug)]
pub(super) struct Spreads {
    pub(super) quantities: Vec<Spreading>,
    pub(super) factors: Vec<Factor>,
    seed: u64,
}

/// Words of the generator set apart for a chunk, more than it can use.
const WORDS_PER_CHUNK: u128 = 1 << 24;

impl Spreads {
    /// The spreads of the given quantities.
    pub(super) fn new(cavity: &Cavity, slots: &[Slot], seed: u64) -> Spreads {
        let mut spreads = Spreads {
            quantities: Vec::new(),
            factors: Vec::new(),
            seed,
        };
        for &slot in slots {
            let entry = cavity.book().entry(slot);
            let (middle, size, is_normal) = match entry.spread {
                Spread::Exact => continue,
                Spread::Standard { uncertainty } => (0.0, uncertainty, true),
                Spread::Limits { below, above } => {
                    let half = 0.5 * (below + above);
                    let normal = cavity.tolerancing.shape_of(slot) == Shape::Normal;
                    let size = if normal { 0.5 * half } else { half };
                    (0.5 * (above - below), size, normal)
                }
            };
            let group = cavity.tolerancing.group_of(slot);
            let others = group.map_or(&[][..], |group| &group.of[..]);
            let known = spreads
                .quantities
                .iter()
                .find(|known| others.contains(&known.slot))
                .map(|known| known.factor);
            let index = spreads.quantities.len();
            let factor = known.unwrap_or_else(|| {
                spreads.factors.push(Factor {
                    name: String::new(),
                    correlation: group.map(|group| group.correlation),
                    members: Vec::new(),
                });
                spreads.factors.len() - 1
            });
            let cause = &mut spreads.factors[factor];
            if !cause.name.is_empty() {
                cause.name += " + ";
            }
            cause.name += &entry.address;
            cause.members.push(index);
            spreads.quantities.push(Spreading {
                slot,
                middle,
                size,
                is_normal,
                factor,
                entry: entry.clone(),
            });
        }
        spreads
    }

    /// The quantities' slots, in order.
    pub(super) fn slots(&self) -> Vec<Slot> {
        self.quantities.iter().map(|one| one.slot).collect()
    }

    /// Draws a chunk: numbers from −1 to 1 for rectangular quantities, standard normal ones for
    /// normal ones, all quantities of one block after the other. Streams are independent.
    pub(super) fn draw(&self, stream: u64, chunk: u64, draws: &mut [Lanes]) {
        let mut chance = ChaCha8Rng::seed_from_u64(self.seed);
        chance.set_stream(stream);
        chance.set_word_pos(u128::from(chunk) * WORDS_PER_CHUNK);
        let count = self.quantities.len();
        for block in 0..BLOCKS {
            let draws = &mut draws[block * count..(block + 1) * count];
            for factor in &self.factors {
                self.draw_factor(factor, &mut chance, draws);
            }
        }
    }

    fn draw_factor(&self, factor: &Factor, chance: &mut ChaCha8Rng, draws: &mut [Lanes]) {
        let correlation = match factor.correlation {
            Some(correlation) if factor.members.len() > 1 => correlation,
            _ => {
                for &member in &factor.members {
                    draws[member] = match self.quantities[member].is_normal {
                        true => normal(chance),
                        false => even(chance),
                    };
                }
                return;
            }
        };
        let common = normal(chance);
        for &member in &factor.members {
            let mut z = common;
            if correlation < 1.0 {
                let own = normal(chance);
                z = common * correlation.sqrt() + own * (1.0 - correlation).sqrt();
            }
            draws[member] = if self.quantities[member].is_normal {
                z
            } else {
                // Φ(z), from −1 to 1.
                let even = |z: f64| libm::erf(z * std::f64::consts::FRAC_1_SQRT_2);
                Lanes(z.0.map(even))
            };
        }
    }

    /// The value kept of a quantity that was drawn, its spread `scale` times as wide as written.
    #[inline(always)]
    pub(super) fn value<T: Real>(&self, quantity: usize, draw: T, scale: f64) -> T {
        let one = &self.quantities[quantity];
        one.entry
            .displaced(draw * (one.size * scale) + one.middle * scale)
    }

    /// The least and the greatest draw inside a quantity's tolerance: its limits, or two standard
    /// deviations.
    pub(super) fn reach(&self, quantity: usize) -> f64 {
        if self.quantities[quantity].is_normal {
            2.0
        } else {
            1.0
        }
    }

    /// Quantities that can only move together; each of the others alone.
    pub(super) fn movers(&self) -> Vec<Vec<usize>> {
        self.factors
            .iter()
            .flat_map(|factor| match factor.correlation {
                Some(correlation) if correlation >= 1.0 => vec![factor.members.clone()],
                _ => factor.members.iter().map(|one| vec![*one]).collect(),
            })
            .collect()
    }

    /// The spread's standard deviation on the value as written.
    pub(super) fn standard_deviation(&self, quantity: usize) -> f64 {
        let one = &self.quantities[quantity];
        if one.is_normal {
            one.size
        } else {
            one.size / 3_f64.sqrt()
        }
    }
}

/// Numbers from −1 to 1.
fn even(chance: &mut ChaCha8Rng) -> Lanes {
    let mut lanes = [0.0; LANES];
    for lane in &mut lanes {
        *lane = (f64::from(chance.next_u32()) + 0.5) / f64::from(1_u32 << 31) - 1.0;
    }
    Lanes(lanes)
}

fn normal(chance: &mut ChaCha8Rng) -> Lanes {
    let mut lanes = [0.0; LANES];
    for lane in &mut lanes {
        *lane = StandardNormal.sample(chance);
    }
    Lanes(lanes)
}
