//! Where a path is cut into panels: a short stretch in which much happens, beside a kilometre in
//! which little does, would be a hairline on one scale.

use std::ops::Range;

use crate::analysis::profile::{AlongPart, Profile, Shape};
use crate::optics::Plane;

/// A part below this share of the path is short.
const SHORT: f64 = 0.005;
/// Neighbouring short parts above this share of the path can be seen without help.
const VISIBLE: f64 = 0.02;
/// Ratio of the largest to the least radius from which something happens.
const HAPPENS: f64 = 1.2;
/// Most stretches that get a panel of their own.
const MOST: usize = 3;
/// Width of all such panels together, and of one at the most.
const WIDTH: (f64, f64) = (0.6, 0.4);
/// Least width of what lies between.
const LEAST_WIDTH: f64 = 0.1;
/// How much of its surroundings such a panel shows, as a share of its own length; from how far it
/// fetches a focus, likewise; and how much of a gap it may take for that.
const SURROUNDINGS: f64 = 0.6;
const REACH: f64 = 6.0;
const OF_A_GAP: f64 = 0.4;

/// A piece of the path with its own scale.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Section {
    /// The parts whose optics stand in it.
    pub parts: Range<usize>,
    /// Where it begins, in metres.
    pub from_m: f64,
    /// Where it ends, in metres.
    pub to_m: f64,
    /// The part from whose start lengths count.
    pub origin: usize,
    /// Its share of the width.
    pub share: f64,
}

/// The path in pieces, in order; one piece where one scale does.
pub(super) fn of(profile: &Profile) -> Vec<Section> {
    let count = profile.parts.len();
    let magnified: Vec<Range<usize>> = short_runs(profile)
        .into_iter()
        .filter(|run| deserves_a_panel(profile, run))
        .collect();
    if magnified.is_empty() || magnified.len() > MOST {
        return vec![Section {
            parts: 0..count,
            from_m: 0.0,
            to_m: profile.length_m,
            origin: 0,
            share: 1.0,
        }];
    }
    let each = WIDTH.1.min(WIDTH.0 / magnified.len() as f64);
    let mut sections: Vec<Section> = Vec::new();
    let (mut next, mut reached) = (0, 0.0);
    let between = |parts: Range<usize>, from_m: f64, to_m: f64| Section {
        parts,
        from_m,
        to_m,
        origin: 0,
        share: 0.0,
    };
    for run in &magnified {
        let section = magnify(profile, run, each);
        if reached < section.from_m {
            sections.push(between(next..run.start, reached, section.from_m));
        }
        (next, reached) = (run.end, section.to_m);
        sections.push(section);
    }
    if reached < profile.length_m {
        sections.push(between(next..count, reached, profile.length_m));
    }
    share_the_rest(&mut sections, 1.0 - each * magnified.len() as f64);
    sections
}

/// A run of short parts and a little of the gaps around it.
fn magnify(profile: &Profile, run: &Range<usize>, share: f64) -> Section {
    let parts = &profile.parts;
    let (first, last) = (&parts[run.start], &parts[run.end - 1]);
    let (from, to) = (first.at_m, last.at_m + last.length_m);
    let before = run.start.checked_sub(1).and_then(|index| parts.get(index));
    let before = before.map_or(0.0, |gap| surroundings(gap, from, to - from));
    let after = parts.get(run.end);
    let after = after.map_or(0.0, |gap| surroundings(gap, to, to - from));
    let origin = run
        .clone()
        .find(|index| parts[*index].shape != Shape::Gap)
        .unwrap_or(run.start);
    Section {
        parts: run.clone(),
        from_m: from - before,
        to_m: to + after,
        origin,
        share,
    }
}

/// How much of a neighbouring gap is shown beyond the edge of a stretch of the given length.
fn surroundings(gap: &AlongPart, edge: f64, length: f64) -> f64 {
    if gap.shape != Shape::Gap {
        return 0.0;
    }
    let focus = Plane::BOTH
        .into_iter()
        .filter_map(|plane| {
            let samples = gap.radii[plane].iter();
            samples.min_by(|a, b| a.radius_m.total_cmp(&b.radius_m))
        })
        .map(|sample| (sample.at_m - edge).abs())
        .filter(|distance| *distance <= REACH * length)
        .fold(0.0, f64::max);
    (focus + SURROUNDINGS * length).min(OF_A_GAP * gap.length_m)
}

/// Gives the panels of true scale what is left of the width.
fn share_the_rest(sections: &mut [Section], rest: f64) {
    let length: f64 = sections
        .iter()
        .filter(|section| section.share == 0.0)
        .map(|section| section.to_m - section.from_m)
        .sum();
    for section in sections.iter_mut().filter(|section| section.share == 0.0) {
        let share = rest * (section.to_m - section.from_m) / length;
        section.share = share.max(LEAST_WIDTH);
    }
    let sum: f64 = sections.iter().map(|section| section.share).sum();
    for section in sections {
        section.share /= sum;
    }
}

/// Runs of neighbouring short parts.
fn short_runs(profile: &Profile) -> Vec<Range<usize>> {
    let is_short = |part: &AlongPart| part.length_m < SHORT * profile.length_m;
    let mut runs: Vec<Range<usize>> = Vec::new();
    for (index, part) in profile.parts.iter().enumerate() {
        if !is_short(part) {
            continue;
        }
        match runs.last_mut() {
            Some(run) if run.end == index => run.end = index + 1,
            _ => runs.push(index..index + 1),
        }
    }
    runs
}

fn deserves_a_panel(profile: &Profile, run: &Range<usize>) -> bool {
    let parts = &profile.parts[run.clone()];
    let length: f64 = parts.iter().map(|part| part.length_m).sum();
    let something_happens = Plane::BOTH.into_iter().any(|plane| {
        let radii = || {
            parts
                .iter()
                .flat_map(|part| part.radii[plane].iter().map(|sample| sample.radius_m))
        };
        radii().fold(0.0, f64::max) > HAPPENS * radii().fold(f64::INFINITY, f64::min)
    });
    length > 0.0 && length < VISIBLE * profile.length_m && something_happens
}
