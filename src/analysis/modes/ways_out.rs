//! By what change of one quantity the modes come to lie as far from the fundamental as wanted, and
//! where within its limits they do.

use super::near::Comb;
use super::result::{WayOut, Window};
use super::search::{Aim, Search, State, Stretch};
use crate::analysis::lengths::RoundTripLengths;
use crate::analysis::ranges::stable_range;
use crate::cavity::{Cavity, Entry, Slot};
use crate::quantity::{Kind, Spread};

/// How far a quantity is moved that has no limits, or beyond them: as a share of its value.
const FAR: f64 = 0.1;

/// Looks at a mode that are spent on all quantities together.
const BUDGET: usize = 200_000_000;

/// What was found.
#[derive(Debug, Default)]
pub(super) struct Found {
    pub(super) ways_out: Vec<WayOut>,
    pub(super) windows: Vec<Window>,
    /// Quantities for which there was no time.
    pub(super) left_out: usize,
}

/// Searches along every quantity that has a spread and moves the modes, and along those that are
/// named; `clear` tells whether the modes are far enough now, `stable` whether there is a mode.
pub(super) fn search(cavity: &Cavity, free: &[Slot], aim: Aim, clear: bool, stable: bool) -> Found {
    let book = cavity.book();
    let spread = book
        .spread_slots()
        .map(|(slot, _)| slot)
        .filter(|slot| !free.contains(slot) && cavity.moves_rays(*slot));
    let mut found = Found::default();
    let mut spent = 0;
    for slot in free.iter().copied().chain(spread) {
        if spent > BUDGET {
            found.left_out += 1;
            continue;
        }
        spent += along(cavity, slot, aim, clear, stable, &mut found);
    }
    found
}

/// Searches along one quantity, and gives back what it cost.
fn along(
    cavity: &Cavity,
    slot: Slot,
    aim: Aim,
    clear: bool,
    stable: bool,
    found: &mut Found,
) -> usize {
    let entry = cavity.book().entry(slot);
    let nominal = entry.value;
    let limits = limits(entry);
    let [low, high] = reach(cavity, slot, limits, stable);
    let mut cuts = vec![low, nominal, high];
    cuts.extend(limits.into_iter().flatten());
    cuts.retain(|cut| (low..=high).contains(cut));
    cuts.sort_by(f64::total_cmp);
    cuts.dedup();
    let mut search = Search::new(cavity, slot, aim);
    let stretches = search.between(&cuts);
    if !clear {
        for at in [
            way(stretches.iter().rev(), nominal, -1.0),
            way(stretches.iter(), nominal, 1.0),
        ]
        .into_iter()
        .flatten()
        {
            found
                .ways_out
                .extend(way_out(cavity, &mut search, slot, limits, at));
        }
    }
    let [from, to] = limits.unwrap_or([low, high]);
    for stretch in &stretches {
        let kept = [stretch.from.max(from), stretch.to.min(to)];
        if stretch.state != State::Clear || kept[0] >= kept[1] {
            continue;
        }
        let [written_from, written_to] = written(entry, kept);
        found.windows.push(Window {
            quantity: entry.address.clone(),
            from: written_from,
            to: written_to,
            from_per_m: entry.is_reciprocal().then_some(kept[0]),
            to_per_m: entry.is_reciprocal().then_some(kept[1]),
            whole: kept == [from, to],
            holds_nominal: (kept[0]..=kept[1]).contains(&nominal),
            kind: entry.kind,
            kept,
        });
    }
    search.spent
}

/// The first stretch of values ahead over which the modes are far enough, nearer end first, from stretches in the order in which
/// they are met.
fn way<'s>(
    stretches: impl Iterator<Item = &'s Stretch>,
    nominal: f64,
    direction: f64,
) -> Option<[f64; 2]> {
    let ends = |stretch: &Stretch| match direction > 0.0 {
        true => (stretch.from, stretch.to),
        false => (stretch.to, stretch.from),
    };
    let mut ahead = stretches.filter(|stretch| (ends(stretch).1 - nominal) * direction > 0.0);
    ahead
        .by_ref()
        .enumerate()
        // A cavity on the edge of stability begins where there is no mode.
        .take_while(|(index, stretch)| *index == 0 || stretch.state != State::Empty)
        .find(|(_, stretch)| stretch.state == State::Clear)
        .map(|(_, stretch)| {
            let (near, far) = ends(stretch);
            [near, far]
        })
}

fn way_out(
    cavity: &Cavity,
    search: &mut Search<'_>,
    slot: Slot,
    limits: Option<[f64; 2]>,
    [at, until]: [f64; 2],
) -> Option<WayOut> {
    let entry = cavity.book().entry(slot);
    let sample = search.sample(at);
    let comb = Comb {
        spacing: sample.spacing,
        fsr: sample.fsr,
        finesse: sample.finesse,
        highest: cavity.highest_order,
    };
    let nearest = comb.clearance(comb.nearest(0.0, 1, |_, _| true)?);
    let is_finite = nearest.offset_hz.is_finite() && sample.margin.is_finite();
    if !is_finite || !nearest.linewidths.is_none_or(f64::is_finite) {
        return None;
    }
    let kept = [entry.value, at, until];
    let [from, to, until] = written(entry, kept);
    Some(WayOut {
        quantity: entry.address.clone(),
        from,
        to,
        from_per_m: entry.is_reciprocal().then_some(kept[0]),
        to_per_m: entry.is_reciprocal().then_some(kept[1]),
        until,
        until_per_m: entry.is_reciprocal().then_some(kept[2]),
        within_limits: limits.map(|[low, high]| (low..=high).contains(&at)),
        margin: sample.margin,
        mode_clearance_linewidths: nearest.linewidths,
        mode_clearance_hz: nearest.offset_hz.abs(),
        m: nearest.m,
        n: nearest.n,
        slot,
        kind: entry.kind,
        kept,
    })
}

/// The values as written: radii and focal lengths instead of their reciprocals, none for flat.
fn written<const N: usize>(entry: &Entry, kept: [f64; N]) -> [Option<f64>; N] {
    kept.map(|x| {
        if entry.is_reciprocal() {
            (x != 0.0).then(|| 1.0 / x)
        } else {
            Some(x)
        }
    })
}

/// Least and greatest value kept within the quantity's spread: two standard deviations of a
/// standard uncertainty.
fn limits(entry: &Entry) -> Option<[f64; 2]> {
    match entry.spread {
        Spread::Exact => None,
        Spread::Limits { .. } => entry.kept_limits().map(|(low, high)| [low, high]),
        Spread::Standard { uncertainty } => {
            let (a, b): (f64, f64) = (
                entry.displaced(-2.0 * uncertainty),
                entry.displaced(2.0 * uncertainty),
            );
            Some([a.min(b), a.max(b)])
        }
    }
}

/// How far a quantity is moved: over its limits, lengths and radii a tenth of their value beyond
/// them, and never past an edge of stability.
fn reach(cavity: &Cavity, slot: Slot, limits: Option<[f64; 2]>, stable: bool) -> [f64; 2] {
    let entry = cavity.book().entry(slot);
    let nominal = entry.value;
    let [mut low, mut high] = limits.unwrap_or([nominal; 2]);
    if entry.shapes_the_mode() || limits.is_none() {
        let size = if nominal == 0.0 && entry.is_reciprocal() {
            1.0 / RoundTripLengths::of(cavity, &cavity.book().nominal()).geometric
        } else {
            nominal.abs()
        };
        low = low.min(nominal - FAR * size);
        high = high.max(nominal + FAR * size);
    }
    if entry.kind.is_never_negative() {
        low = low.max(0.0);
    }
    if matches!(entry.kind, Kind::Angle | Kind::SlabAngle) {
        // Nothing is met at a right angle.
        high = high.min(1.5);
    }
    if entry.shapes_the_mode()
        && stable
        && let Some(range) = stable_range(cavity, slot).range
    {
        low = range.from.value().map_or(low, |end| low.max(end));
        high = range.to.value().map_or(high, |end| high.min(end));
    }
    [low, high]
}
