//! The functions whose roots are the edges, and the search for them along one quantity.

use super::End;
use crate::analysis::eigenmode::{EDGE, PlaneMode};
use crate::analysis::lengths::RoundTripLengths;
use crate::analysis::measures::{Evaluator, Workspace};
use crate::cavity::{Cavity, Form, Slot};
use crate::numeric::roots::{DEGREE, Proxy, bracketed, nodes};
use crate::optics::Plane;
use crate::quantity::Kind;

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

pub(super) struct Probe<'a> {
    cavity: &'a Cavity,
    slot: Slot,
    /// The walk with everything multiplied out that the quantity leaves alone.
    walk: Evaluator<'a>,
    workspace: Workspace<f64>,
    values: Vec<f64>,
    pub(super) nominal: f64,
    /// A change that matters: the round trip's length, or its reciprocal for curvatures.
    pub(super) scale: f64,
    lowest: Bound,
    highest: Bound,
    evaluations: usize,
    /// Evaluations that may be spent on one search.
    pub(super) budget: usize,
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

/// A root: an edge of one plane.
#[derive(Clone, Copy)]
pub(super) struct Event {
    pub(super) at: f64,
    pub(super) plane: Plane,
}

impl<'a> Probe<'a> {
    /// A probe from the nominal value as far as anybody would go.
    pub(super) fn new(cavity: &'a Cavity, slot: Slot) -> Self {
        let mut probe = Probe::unbounded(cavity, slot);
        let (nominal, scale) = (probe.nominal, probe.scale);
        let reach = if probe.margin(nominal) > EDGE {
            REACH
        } else {
            REACH_BACK
        };
        probe.lowest.at -= reach * scale;
        probe.highest.at += reach * scale;
        if cavity.book().entry(slot).kind == Kind::Length || slot == Cavity::PUMP {
            probe.lowest = Bound {
                at: 0.0,
                vanishes: true,
            };
        }
        probe.stop_where_tied_lengths_vanish();
        probe
    }

    /// A probe without bounds of its own.
    pub(super) fn unbounded(cavity: &'a Cavity, slot: Slot) -> Self {
        let values = cavity.book().nominal();
        let nominal = slot.of(&values);
        let length = RoundTripLengths::of(cavity, &values).geometric;
        let scale = if cavity.book().entry(slot).kind == Kind::Length {
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
        Probe {
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
            budget: BUDGET,
        }
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

    pub(super) fn margin(&mut self, x: f64) -> f64 {
        self.sample(x).1
    }

    fn function(&mut self, index: usize, x: f64) -> f64 {
        self.sample(x).0.functions[index]
    }

    /// The first stable range in one direction: its near and its far end.
    pub(super) fn search(&mut self, direction: f64) -> Option<(End, End)> {
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
        let mut near_end = self.edge_at(self.nominal, direction);
        let mut width = self.scale * 0.03;
        let mut start = self.nominal;
        while (limit - start) * direction > 0.0 && self.evaluations < self.budget {
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
    pub(super) fn edge_at(&mut self, at: f64, direction: f64) -> End {
        if self.margin(at).abs() > EDGE {
            return End::Open;
        }
        let way = self.cavity.one_way(&self.values);
        let form = self.cavity.form();
        let margin = |plane: &Plane| PlaneMode::of(form, way[*plane]).margin;
        let plane = Plane::BOTH
            .into_iter()
            .min_by(|a, b| f64::total_cmp(&margin(a), &margin(b)))
            .unwrap_or(Plane::Tangential);
        let beside = at - direction * 1e-6 * self.scale;
        End::Edge {
            at,
            plane,
            touch: self.margin(beside) > 0.0,
        }
    }

    pub(super) fn is_stable_between(&mut self, a: f64, b: f64) -> bool {
        a != b && self.margin(0.5 * (a + b)) > 0.0
    }

    /// All edges from `start` towards `stop`, nearest first, and how far the search has come: less
    /// far where the functions vary too fast, up to `limit` where all of them are straight lines.
    pub(super) fn events_between(
        &mut self,
        start: f64,
        stop: f64,
        limit: f64,
    ) -> (Vec<Event>, f64) {
        let mut stop = stop;
        loop {
            let (low, high) = (start.min(stop), start.max(stop));
            let samples = nodes(low, high).map(|x| self.sample(x).0.functions);
            let proxies: [Proxy; FUNCTIONS] = std::array::from_fn(|index| {
                let values: [f64; DEGREE + 1] = std::array::from_fn(|k| samples[k][index]);
                Proxy::new(low, high, &values)
            });
            if !proxies.iter().all(Proxy::is_resolved) {
                if self.evaluations >= self.budget {
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
            self.merge(&mut events);
            return (events, stop);
        }
    }

    /// Keeps one of those edges in order that are one edge.
    pub(super) fn merge(&self, events: &mut Vec<Event>) {
        let same = SAME * self.scale;
        events.dedup_by(|b, a| (a.at - b.at).abs() <= same.max(SAME * a.at.abs()));
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
