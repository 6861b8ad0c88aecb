//! Where a label can stand without hiding anything.

use super::scene::Rect;

/// What is already in the way.
#[derive(Clone, Debug, Default)]
pub(super) struct Occupied {
    /// Labels.
    boxes: Vec<Rect>,
    /// Lines from labels to what they name.
    leaders: Vec<[[f64; 2]; 2]>,
    /// Curves, each from point to point.
    curves: Vec<Vec<[f64; 2]>>,
    /// Lines of the ground, which are better not written over.
    edges: Vec<[[f64; 2]; 2]>,
}

/// A possible place of a label.
#[derive(Clone, Copy, Debug)]
pub(super) struct Candidate {
    /// The place.
    pub area: Rect,
    /// The line to what it names, where one is needed.
    pub leader: Option<[[f64; 2]; 2]>,
}

impl Occupied {
    pub(super) fn add_curve(&mut self, points: Vec<[f64; 2]>) {
        self.curves.push(points);
    }

    pub(super) fn add_edge(&mut self, edge: [[f64; 2]; 2]) {
        self.edges.push(edge);
    }

    pub(super) fn add_box(&mut self, area: Rect) {
        self.boxes.push(area);
    }

    /// Whether a label could stand there, curves aside.
    fn is_free(&self, candidate: &Candidate) -> bool {
        let area = candidate.area.grown(1.5);
        !self.boxes.iter().any(|other| area.overlaps(*other))
            && !self.leaders.iter().any(|[a, b]| area.meets(*a, *b))
            && candidate
                .leader
                .is_none_or(|[a, b]| !self.boxes.iter().any(|other| other.meets(a, b)))
    }

    /// Whether a label hides a piece of a curve.
    pub(super) fn hides(&self, area: Rect) -> bool {
        self.covered(area) > 0
    }

    /// How many pieces of curves a label would cover.
    fn covered(&self, area: Rect) -> usize {
        let area = area.grown(2.0);
        self.curves
            .iter()
            .flat_map(|points| points.windows(2))
            .filter(|pair| area.meets(pair[0], pair[1]))
            .count()
    }

    /// Takes the first place that hides nothing; none where there is no such place.
    pub(super) fn take_clear(
        &mut self,
        within: Rect,
        candidates: impl IntoIterator<Item = Candidate>,
    ) -> Option<Candidate> {
        let chosen = candidates.into_iter().find(|candidate| {
            within.contains(candidate.area)
                && self.is_free(candidate)
                && self.covered(candidate.area) == 0
        })?;
        Some(self.claim(chosen))
    }

    fn claim(&mut self, chosen: Candidate) -> Candidate {
        self.boxes.push(chosen.area);
        self.leaders.extend(chosen.leader);
        chosen
    }

    /// Takes the first place that hides nothing, else the one that hides the least of a curve;
    /// none where every place is taken.
    pub(super) fn take(
        &mut self,
        within: Rect,
        candidates: impl IntoIterator<Item = Candidate>,
    ) -> Option<Candidate> {
        let mut best: Option<(usize, Candidate)> = None;
        for candidate in candidates {
            if !within.contains(candidate.area) || !self.is_free(&candidate) {
                continue;
            }
            let edges = self.edges.iter();
            let crossed = edges.filter(|[a, b]| candidate.area.meets(*a, *b)).count();
            let covered = self.covered(candidate.area) + crossed;
            if best.is_none_or(|(least, _)| covered < least) {
                best = Some((covered, candidate));
            }
            if covered == 0 {
                break;
            }
        }
        let (_, chosen) = best?;
        Some(self.claim(chosen))
    }
}
