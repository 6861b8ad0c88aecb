//! How far one quantity may move while all others stay, before the cavity ceases to be stable.
//!
//! The edges of a ring are the roots of h = ±1. A standing cavity has h = AD + BC with the matrix
//! of one way, and its edges are the roots of A, B, C and D: where two of them vanish together
//! the half-trace only *touches* ±1, which a search of h for changes of sign would miss. A touch
//! ends a range all the same, and is named so.

use super::eigenmode::{EDGE, PlaneMode};
use super::lengths::RoundTripLengths;
use super::measures::{Evaluator, Workspace};
use crate::cavity::{Cavity, Form, Slot};
use crate::numeric::roots::{DEGREE, Proxy, bracketed, nodes};
use crate::optics::Plane;
use crate::quantity::Kind;

/// Where a range ends.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum End {
    /// |half-trace| reaches 1 there.
    Edge {
        /// The quantity's value, in SI units (1/R for a radius, 1/f for a focal length).
        at: f64,
        /// The plane that becomes unstable.
        plane: Plane,
        /// Whether the cavity is stable again beyond.
        touch: bool,
    },
    /// A length, its own or a tied one, reaches zero first.
    Zero {
        /// The quantity's value there.
        at: f64,
    },
    /// No edge as far as was searched.
    Open,
}

impl End {
    /// The value of the quantity, if the range ends.
    pub fn value(self) -> Option<f64> {
        match self {
            End::Edge { at, .. } | End::Zero { at } => Some(at),
            End::Open => None,
        }
    }
}

/// A stretch of values of one quantity over which the cavity is stable.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Range {
    /// Its lower end.
    pub from: End,
    /// Its upper end.
    pub to: End,
}

/// What is known about one quantity.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct QuantityRange {
    /// The quantity.
    pub slot: Slot,
    /// Its nominal value, in SI units (1/R for a radius, 1/f for a focal length).
    pub nominal: f64,
    /// The range that holds the nominal value or, where the cavity is not stable, the nearest one;
    /// none where no value of this quantity alone makes it stable.
    pub range: Option<Range>,
    /// How much of a change brings the cavity to the range, relative to the quantity itself; zero
    /// where it is stable.
    pub change_needed: f64,
}

/// The range of every quantity that a builder can move, in the order of the file.
pub fn stable_ranges(cavity: &Cavity) -> Vec<QuantityRange> {
    cavity
        .book()
        .iter()
        .filter(|(slot, entry)| {
            let movable = entry.shapes_the_mode()
                && entry.origin == crate::cavity::Origin::Written
                && (entry.part.is_some() || *slot == Cavity::PUMP);
            movable && cavity.moves_rays(*slot)
        })
        .map(|(slot, _)| stable_range(cavity, slot))
        .collect()
}

/// The range of one quantity.
pub fn stable_range(cavity: &Cavity, slot: Slot) -> QuantityRange {
    let mut probe = Probe::new(cavity, slot);
    let nominal = probe.nominal;
    let (upwards, downwards) = (probe.search(1.0), probe.search(-1.0));
    let stable = probe.margin(nominal) > EDGE;
    let range = if stable {
        // Both searches begin inside the range.
        upwards.zip(downwards).map(|(up, down)| Range {
            from: down.1,
            to: up.1,
        })
    } else {
        let distance = |found: &(End, End)| {
            found
                .0
                .value()
                .map_or(f64::INFINITY, |x| (x - nominal).abs())
        };
        let up = upwards.map(|found| {
            (
                distance(&found),
                Range {
                    from: found.0,
                    to: found.1,
                },
            )
        });
        let down = downwards.map(|found| {
            (
                distance(&found),
                Range {
                    from: found.1,
                    to: found.0,
                },
            )
        });
        match (up, down) {
            (Some(up), Some(down)) => Some(if up.0 <= down.0 { up.1 } else { down.1 }),
            (up, down) => up.or(down).map(|found| found.1),
        }
    };
    let change_needed = match range {
        Some(range) if !stable => {
            let nearest = [range.from, range.to]
                .into_iter()
                .filter_map(End::value)
                .map(|x| (x - nominal).abs())
                .fold(f64::INFINITY, f64::min);
            let own = nominal.abs();
            nearest / if own > 0.0 { own } else { probe.scale }
        }
        _ => 0.0,
    };
    QuantityRange {
        slot,
        nominal,
        range,
        change_needed,
    }
}

/// How far the search for an edge of a stable cavity goes, in multiples of the quantity's natural
/// scale.
const REACH: f64 = 1e9;

/// How far the search for a way back to stability goes: nobody moves a mirror further.
const REACH_BACK: f64 = 10.0;

/// Evaluations spent on one direction of one quantity before the search gives up.
const BUDGET: usize = 8_000;

/// Edges nearer to each other than this share of the scale are one edge: the roots of two
/// functions that vanish together differ by their rounding.
const SAME: f64 = 1e-12;

/// Functions whose roots are the edges: four a plane in a standing cavity, two in a ring.
const FUNCTIONS: usize = 8;

struct Probe<'a> {
    cavity: &'a Cavity,
    slot: Slot,
    /// The walk with everything multiplied out that the quantity leaves alone.
    walk: Evaluator<'a>,
    workspace: Workspace<f64>,
    values: Vec<f64>,
    nominal: f64,
    /// A change that matters: the round trip's length, or its reciprocal for curvatures.
    scale: f64,
    lowest: Bound,
    highest: Bound,
    evaluations: usize,
}

/// Where a search ends.
#[derive(Clone, Copy)]
struct Bound {
    at: f64,
    /// Whether a length, the quantity itself or a tied one, reaches zero there.
    vanishes: bool,
}

/// The functions at one point, and rounding's share of them.
#[derive(Clone, Copy)]
struct Sample {
    functions: [f64; FUNCTIONS],
    rounding: f64,
}

#[derive(Clone, Copy)]
struct Event {
    at: f64,
    plane: Plane,
}

impl<'a> Probe<'a> {
    fn new(cavity: &'a Cavity, slot: Slot) -> Self {
        let values = cavity.book().nominal();
        let nominal = slot.of(&values);
        let entry = cavity.book().entry(slot);
        let length = RoundTripLengths::of(cavity, &values).geometric;
        let is_length = entry.kind == Kind::Length;
        let scale = if is_length {
            length
        } else if slot == Cavity::PUMP {
            nominal.max(1.0)
        } else {
            1.0 / length
        };
        let nowhere = Bound {
            at: nominal,
            vanishes: false,
        };
        let mut probe = Probe {
            cavity,
            slot,
            walk: Evaluator::new(cavity, Vec::new()).varying(&[slot]),
            workspace: Workspace::default(),
            values,
            nominal,
            scale,
            lowest: nowhere,
            highest: nowhere,
            evaluations: 0,
        };
        let reach = if probe.margin(nominal) > EDGE {
            REACH
        } else {
            REACH_BACK
        };
        probe.lowest.at -= reach * scale;
        probe.highest.at += reach * scale;
        if is_length || slot == Cavity::PUMP {
            probe.lowest = Bound {
                at: 0.0,
                vanishes: true,
            };
        }
        probe.stop_where_tied_lengths_vanish();
        probe
    }

    /// A tied length is linear in what it follows: it bounds the search where it reaches zero.
    fn stop_where_tied_lengths_vanish(&mut self) {
        let ties = self.cavity.book().ties();
        let step = self.scale;
        let mut moved = self.values.clone();
        moved[self.slot.index()] = self.nominal + step;
        self.cavity.book().follow_ties(&mut moved);
        for tie in ties {
            if self.cavity.book().entry(tie.target).kind != Kind::Length {
                continue;
            }
            let here = tie.target.of(&self.values);
            let slope = (tie.target.of(&moved) - here) / step;
            let bound = Bound {
                at: self.nominal - here / slope,
                vanishes: true,
            };
            if slope < 0.0 && bound.at < self.highest.at {
                self.highest = bound;
            } else if slope > 0.0 && bound.at > self.lowest.at {
                self.lowest = bound;
            }
        }
    }

    fn sample(&mut self, x: f64) -> (Sample, f64) {
        self.evaluations += 1;
        self.values[self.slot.index()] = x;
        self.cavity.book().follow_ties(&mut self.values);
        let way = self.walk.one_way(&self.values, &mut self.workspace);
        let mut functions = [1.0; FUNCTIONS];
        let mut rounding: f64 = 0.0;
        let mut margin = f64::INFINITY;
        for (plane, four) in Plane::BOTH.into_iter().zip(functions.chunks_exact_mut(4)) {
            let m = way[plane];
            match self.cavity.form() {
                Form::Standing => four.copy_from_slice(&[m.a, m.b, m.c, m.d]),
                Form::Ring => {
                    let h = m.half_trace();
                    four[..2].copy_from_slice(&[h - 1.0, h + 1.0]);
                    // A double root moves the half-trace by no more than its rounding.
                    rounding = rounding.max(1e-13 * (1.0 + m.a.abs() + m.d.abs()));
                }
            }
            margin = margin.min(PlaneMode::of(self.cavity.form(), m).margin);
        }
        (
            Sample {
                functions,
                rounding,
            },
            margin,
        )
    }

    fn margin(&mut self, x: f64) -> f64 {
        self.sample(x).1
    }

    fn function(&mut self, index: usize, x: f64) -> f64 {
        self.sample(x).0.functions[index]
    }

    /// The first stable range in one direction: its near and its far end.
    fn search(&mut self, direction: f64) -> Option<(End, End)> {
        self.evaluations = 0;
        let Bound {
            at: limit,
            vanishes,
        } = if direction > 0.0 {
            self.highest
        } else {
            self.lowest
        };
        let mut near = self.nominal;
        let mut near_end = self.edge_at_nominal(direction);
        let mut width = self.scale * 0.03;
        let mut start = self.nominal;
        while (limit - start) * direction > 0.0 && self.evaluations < BUDGET {
            let reach = start + direction * width;
            let stop = if (limit - reach) * direction > 0.0 {
                reach
            } else {
                limit
            };
            let (events, next) = self.events_between(start, stop, limit);
            for (index, event) in events.iter().enumerate() {
                let beyond = events.get(index + 1).map_or(next, |e| e.at);
                if self.is_stable_between(near, event.at) {
                    if vanishes && event.at == limit {
                        return Some((near_end, End::Zero { at: limit }));
                    }
                    let touch = self.is_stable_between(event.at, beyond);
                    let far_end = End::Edge {
                        at: event.at,
                        plane: event.plane,
                        touch,
                    };
                    return Some((near_end, far_end));
                }
                near = event.at;
                near_end = End::Edge {
                    at: event.at,
                    plane: event.plane,
                    touch: false,
                };
            }
            // Where the functions vary fast, the next step is as short as this one had to be.
            width = 4.0 * (next - start).abs().min(width);
            start = next;
        }
        let far_end = if start == limit && vanishes {
            End::Zero { at: limit }
        } else {
            End::Open
        };
        self.is_stable_between(near, start)
            .then_some((near_end, far_end))
    }

    /// The near end of a range that begins where the search does: an edge, if the cavity is on one.
    fn edge_at_nominal(&mut self, direction: f64) -> End {
        let nominal = self.nominal;
        if self.margin(nominal).abs() > EDGE {
            return End::Open;
        }
        let way = self.cavity.one_way(&self.values);
        let form = self.cavity.form();
        let margin = |plane: &Plane| PlaneMode::of(form, way[*plane]).margin;
        let plane = Plane::BOTH
            .into_iter()
            .min_by(|a, b| f64::total_cmp(&margin(a), &margin(b)))
            .unwrap_or(Plane::Tangential);
        let beside = nominal - direction * 1e-6 * self.scale;
        End::Edge {
            at: nominal,
            plane,
            touch: self.margin(beside) > 0.0,
        }
    }

    fn is_stable_between(&mut self, a: f64, b: f64) -> bool {
        a != b && self.margin(0.5 * (a + b)) > 0.0
    }

    /// All edges from `start` towards `stop`, nearest first, and how far the search has come: less
    /// far where the functions vary too fast, up to `limit` where all of them are straight lines.
    fn events_between(&mut self, start: f64, stop: f64, limit: f64) -> (Vec<Event>, f64) {
        let mut stop = stop;
        loop {
            let (low, high) = (start.min(stop), start.max(stop));
            let samples = nodes(low, high).map(|x| self.sample(x).0.functions);
            let proxies: [Proxy; FUNCTIONS] = std::array::from_fn(|index| {
                let values: [f64; DEGREE + 1] = std::array::from_fn(|k| samples[k][index]);
                Proxy::new(low, high, &values)
            });
            if !proxies.iter().all(Proxy::is_resolved) {
                if self.evaluations >= BUDGET {
                    // Nothing is claimed about what has not been searched.
                    return (Vec::new(), start);
                }
                if (stop - start).abs() > 1e-9 * self.scale {
                    stop = 0.5 * (start + stop);
                    continue;
                }
            }
            let straight = proxies.iter().all(Proxy::is_straight);
            if straight {
                stop = limit;
            }
            let mut events = Vec::new();
            for (index, proxy) in proxies.iter().enumerate() {
                let plane = Plane::BOTH[index / 4];
                if !straight && proxy.has_no_root() {
                    continue;
                }
                let found = if straight {
                    self.root_of_line(index, low, high, proxy)
                } else {
                    self.roots_of(index, proxy)
                };
                events.extend(found.into_iter().map(|at| Event { at, plane }));
            }
            let ahead = (stop - start).signum();
            let same = SAME * self.scale;
            // A root that misses zero by its rounding is there: a flat mirror, no length at all.
            for event in &mut events {
                if event.at.abs() <= same {
                    event.at = 0.0;
                }
            }
            events.retain(|e| (e.at - start) * ahead > 0.0 && (stop - e.at) * ahead >= 0.0);
            events.sort_by(|a, b| f64::total_cmp(&(a.at * ahead), &(b.at * ahead)));
            events.dedup_by(|b, a| (a.at - b.at).abs() <= same.max(SAME * a.at.abs()));
            return (events, stop);
        }
    }

    /// The root of a straight line, sharpened on the function itself.
    fn root_of_line(&mut self, index: usize, low: f64, high: f64, proxy: &Proxy) -> Vec<f64> {
        let slope = proxy.slope();
        if slope == 0.0 {
            return Vec::new();
        }
        let mut root = if low.abs() < high.abs() { low } else { high };
        for _ in 0..3 {
            root -= self.function(index, root) / slope;
        }
        Vec::from_iter(root.is_finite().then_some(root))
    }

    /// All roots and touches of one function where its proxy stands for it.
    fn roots_of(&mut self, index: usize, proxy: &Proxy) -> Vec<f64> {
        let cuts: Vec<(f64, f64)> = proxy
            .cuts()
            .into_iter()
            .map(|x| {
                let (sample, _) = self.sample(x);
                let value = sample.functions[index];
                let vanishes = value == 0.0 || value.abs() <= sample.rounding;
                (x, if vanishes { 0.0 } else { value })
            })
            .collect();
        let mut roots: Vec<f64> = cuts
            .iter()
            .filter(|(_, value)| *value == 0.0)
            .map(|(x, _)| *x)
            .collect();
        for pair in cuts.windows(2) {
            let [(a, fa), (b, fb)] = [pair[0], pair[1]];
            if fa * fb < 0.0 {
                roots.extend(bracketed(|x| self.function(index, x), a, b));
            }
        }
        roots
    }
}
