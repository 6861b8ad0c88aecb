//! `check` for people: the verdict first, then the beam, then how far everything may move.

use super::measured::{frequency, measured, wanted};
use crate::analysis::check::{Check, Leaving, LimitCheck, Range, Station, Waist};
use crate::analysis::eigenmode::EDGE;
use crate::analysis::ranges::{End, Range as Found};
use crate::optics::Plane;
use crate::quantity::Kind;
use crate::report::document::{Block, Document, Table, Tone};
use crate::report::number::{ANGLES, LENGTHS, NOTHING, Scale, common, fixed, plain, significant};

/// The result of a check as a document.
pub fn describe(check: &Check) -> Document {
    let mut document = Document::default();
    if let Some(title) = &check.title {
        document.push(Block::Title(title.clone()));
    }
    verdict(&mut document, check);
    summary(&mut document, check);
    limits(&mut document, &check.limits);
    if check.planes.tangential.stable || check.planes.sagittal.stable {
        optics(&mut document, &check.stations);
        waists(&mut document, &check.waists);
        leaving(&mut document, &check.leaving);
    }
    ranges(&mut document, check);
    round_trip(&mut document, check);
    if !check.cautions.is_empty() {
        document.heading("Cautions");
        for caution in &check.cautions {
            document.push(Block::Item {
                mark: "  !".into(),
                text: caution.clone(),
                tone: Tone::Doubt,
            });
        }
    }
    document
}

const PLANES: [(&str, Plane); 2] = [
    ("tangential", Plane::Tangential),
    ("sagittal", Plane::Sagittal),
];

fn verdict(document: &mut Document, check: &Check) {
    let margins: Vec<String> = PLANES
        .iter()
        .map(|(name, plane)| {
            let margin = check.planes.get(*plane).margin;
            format!("{name} {}", significant(margin, 3))
        })
        .collect();
    let failing = check.limits.iter().filter(|limit| !limit.holds).count();
    let (word, rest, tone) = if check.stable {
        let limits = match (check.limits.len(), failing) {
            (0, _) => String::new(),
            (1, 0) => "; its limit holds".into(),
            (2, 0) => "; both limits hold".into(),
            (n, 0) => format!("; all {n} limits hold"),
            (n, k) => format!("; {k} of {n} limits fail"),
        };
        let word = if failing == 0 {
            "STABLE"
        } else {
            "STABLE, BUT A LIMIT FAILS"
        };
        let tone = if failing == 0 { Tone::Good } else { Tone::Bad };
        (word, format!("margin {}{limits}", margins.join(", ")), tone)
    } else if check.on_edge {
        let reasons: Vec<(&str, &str)> = PLANES
            .iter()
            .filter_map(|(name, plane)| {
                let plane = check.planes.get(*plane);
                let is_on_edge = plane.margin.abs() <= EDGE;
                Some((*name, plane.why.as_deref().filter(|_| is_on_edge)?))
            })
            .collect();
        let reason = match reasons[..] {
            [(_, one), (_, other)] if one == other => format!("both planes: {one}"),
            _ => reasons
                .iter()
                .map(|(name, why)| format!("{name}: {why}"))
                .collect::<Vec<_>>()
                .join("; "),
        };
        ("ON THE EDGE OF STABILITY", reason, Tone::Bad)
    } else {
        let beyond: Vec<String> = PLANES
            .iter()
            .filter(|(_, plane)| check.planes.get(*plane).margin < -EDGE)
            .map(|(name, plane)| {
                let by = significant(-check.planes.get(*plane).margin, 3);
                format!("{name} plane by {by} in the half-trace")
            })
            .collect();
        ("UNSTABLE", beyond.join(", "), Tone::Bad)
    };
    document.push(Block::Verdict {
        word: word.into(),
        rest,
        tone,
    });
}

fn summary(document: &mut Document, check: &Check) {
    let trip = &check.round_trip;
    document.text(format!(
        "{} cavity, {} nm, {} around, FSR {}",
        check.form,
        plain(check.wavelength_m * 1e9, 6),
        length_to(trip.length_m, 6),
        frequency(trip.fsr_hz),
    ));
    let horizontal = if check.tangential_is_horizontal {
        "horizontal"
    } else {
        "vertical"
    };
    document.text(format!(
        "t = tangential, here the {horizontal} plane; s = sagittal"
    ));
}

/// "t / s", or one number where both print alike.
fn pair(t: Option<String>, s: Option<String>) -> String {
    let text = |x: Option<String>| x.unwrap_or_else(|| "–".into());
    let (t, s) = (text(t), text(s));
    if t == s { t } else { format!("{t} / {s}") }
}

fn optics(document: &mut Document, stations: &[Station]) {
    document.heading("Beam on the optics, radius to 1/e² of the intensity");
    // On the way back every radius is the same, and a gap's ends lie on its neighbours.
    let shown: Vec<&Station> = stations
        .iter()
        .filter(|station| station.pass == 1 && station.kind != "gap")
        .collect();
    let spots = || {
        shown
            .iter()
            .flat_map(|station| [station.tangential, station.sagittal])
            .flatten()
    };
    let radius = common(spots().map(|spot| spot.spot_m), &LENGTHS, 10.0);
    let place = common(shown.iter().map(|station| station.at_m), &LENGTHS, 1.0);
    let bend = common(
        spots()
            .map(|spot| 1.0 / spot.curvature_per_m)
            .filter(|radius| radius.abs() < PLANE),
        &LENGTHS,
        1.0,
    );
    let has_inside = shown.iter().any(|station| station.face.is_some());
    let clips = shown.iter().any(|station| station.clip_loss.is_some());
    let oblique = shown.iter().any(|station| {
        let spots = station.tangential.zip(station.sagittal);
        spots.is_some_and(|(t, s)| station.footprint_m != Some([t.spot_m, s.spot_m]))
    });
    let mut titles = vec![
        "<optic".to_string(),
        format!("at\n{}", place.symbol),
        format!("radius t / s\n{}", radius.symbol),
    ];
    if oblique {
        titles.push(format!("on surface t / s\n{}", radius.symbol));
    }
    titles.push(format!("wavefront R t / s\n{}", bend.symbol));
    if clips {
        titles.push("clipped\nppm".into());
    }
    let titles: Vec<&str> = titles.iter().map(String::as_str).collect();
    let mut table = Table::new(&titles);
    for station in shown {
        let spot = |plane| station.spot(plane);
        let both = |f: &dyn Fn(crate::analysis::check::Spot) -> String| {
            pair(spot(Plane::Tangential).map(f), spot(Plane::Sagittal).map(f))
        };
        let name = match station.face {
            Some(face) => format!("{} {face}", station.part),
            None => station.part.clone(),
        };
        let mut row = vec![
            name,
            fixed(station.at_m / place.size, decimals(place)),
            both(&|spot| significant(spot.spot_m / radius.size, 4)),
        ];
        if oblique {
            row.push(match station.footprint_m {
                Some(radii) => {
                    let text = radii.map(|r| significant(r / radius.size, 4));
                    let [t, s] = text.map(Some);
                    pair(t, s)
                }
                None => "–".into(),
            });
        }
        row.push(both(&|spot| wavefront(spot.curvature_per_m, bend)));
        if clips {
            row.push(match station.clip_loss {
                Some(loss) if loss < 1e-9 => "< 0.001".into(),
                Some(loss) => significant(loss * 1e6, 2),
                None => "–".into(),
            });
        }
        table.rows.push(row);
    }
    document.push(Block::Table(table));
    if has_inside {
        document.aside(
            "An entry is seen just outside its part, an exit just inside; at a tilted face the \
             tangential radius changes between them.",
        );
    }
}

/// Decimals that show a few micrometres in millimetres.
fn decimals(scale: Scale) -> usize {
    match scale.symbol {
        "nm" => 1,
        "km" => 4,
        _ => 2,
    }
}

/// A wavefront of a larger radius, in metres, is plane for whoever reads it.
const PLANE: f64 = 1e5;

fn wavefront(curvature_per_m: f64, scale: Scale) -> String {
    let radius = 1.0 / curvature_per_m;
    if radius.is_finite() && radius.abs() < PLANE {
        significant(radius / scale.size, 4)
    } else {
        "plane".into()
    }
}

fn waists(document: &mut Document, waists: &[Waist]) {
    let known: Vec<&Waist> = waists
        .iter()
        .filter(|waist| waist.waist_m.is_some())
        .collect();
    let inside: Vec<&Waist> = known
        .iter()
        .copied()
        .filter(|waist| waist.inside == Some(true))
        .collect();
    if inside.is_empty() {
        return;
    }
    document.heading("Waists");
    let radius = common(inside.iter().filter_map(|w| w.waist_m), &LENGTHS, 10.0);
    let place = common(inside.iter().filter_map(|w| w.from_start_m), &LENGTHS, 1.0);
    let rayleigh = common(inside.iter().filter_map(|w| w.rayleigh_m), &LENGTHS, 1.0);
    let mut table = Table::new(&[
        "<in",
        "<plane",
        &format!("radius\n{}", radius.symbol),
        &format!("from its start\n{}", place.symbol),
        &format!("Rayleigh length\n{}", rayleigh.symbol),
    ]);
    for waist in inside {
        let cell = |x: Option<f64>, scale: Scale| {
            x.map_or("–".into(), |x| significant(x / scale.size, 4))
        };
        table.rows.push(vec![
            waist.part.clone(),
            waist.plane.into(),
            cell(waist.waist_m, radius),
            waist
                .from_start_m
                .map_or("–".into(), |x| fixed(x / place.size, decimals(place))),
            cell(waist.rayleigh_m, rayleigh),
        ]);
    }
    document.push(Block::Table(table));
}

fn leaving(document: &mut Document, beams: &[Leaving]) {
    if beams.is_empty() {
        return;
    }
    document.heading("Beams that leave: waist, its way from the outer face, half divergence");
    let planes = || {
        beams
            .iter()
            .flat_map(|beam| [beam.tangential, beam.sagittal])
            .flatten()
    };
    let radius = common(planes().map(|beam| beam.waist_m), &LENGTHS, 10.0);
    let place = common(planes().map(|beam| beam.from_outer_face_m), &LENGTHS, 1.0);
    let angle = common(planes().map(|beam| beam.divergence_rad), &ANGLES, 0.1);
    let mut table = Table::new(&[
        "<through",
        &format!("waist t / s\n{}", radius.symbol),
        &format!("from face t / s\n{}", place.symbol),
        &format!("divergence t / s\n{}", angle.symbol),
    ]);
    for beam in beams {
        let both = |f: &dyn Fn(crate::analysis::check::LeavingPlane) -> String| {
            pair(beam.tangential.map(f), beam.sagittal.map(f))
        };
        let name = if beam.pass == 1 {
            beam.mirror.clone()
        } else {
            format!("{} way back", beam.mirror)
        };
        table.rows.push(vec![
            name,
            both(&|b| significant(b.waist_m / radius.size, 4)),
            both(&|b| fixed(b.from_outer_face_m / place.size, decimals(place))),
            both(&|b| significant(b.divergence_rad / angle.size, 4)),
        ]);
    }
    document.push(Block::Table(table));
}

fn ranges(document: &mut Document, check: &Check) {
    if check.ranges.is_empty() {
        return;
    }
    if check.stable {
        document.heading("How far each may move alone, and the cavity stays stable");
        document.push(Block::Table(range_table(&check.ranges)));
    } else {
        way_back(document, &check.ranges);
    }
}

fn range_table(ranges: &[Range]) -> Table {
    let mut table = Table::new(&["<quantity", "now", "from", "to", "room, in\ntolerances"]);
    for range in ranges {
        let found = &range.found;
        let (from, to) = match found.range {
            Some(Found { from, to }) => (from, to),
            None => (End::Open, End::Open),
        };
        // A radius runs the other way than its reciprocal.
        let (low, high) = match range.kind {
            Kind::Radius | Kind::Face | Kind::Focal if from_radius_order(found.nominal) => {
                (to, from)
            }
            _ => (from, to),
        };
        table.rows.push(vec![
            range.quantity.clone(),
            value(found.nominal, range.kind),
            end(low, range),
            end(high, range),
            room(range),
        ]);
    }
    table
}

/// Whether the larger curvature is the smaller radius, as it is on either side of flat.
fn from_radius_order(curvature: f64) -> bool {
    curvature != 0.0
}

/// A length in millimetres; in micrometres or metres where those would be too few or too many.
fn length(x: f64) -> String {
    length_to(x, 5)
}

/// The same with the given count of significant digits.
fn length_to(x: f64, digits: usize) -> String {
    if x.abs() < NOTHING {
        "0 mm".into()
    } else if x.abs() < 1e-4 {
        format!("{} µm", plain(x * 1e6, digits))
    } else if x.abs() < 100.0 {
        format!("{} mm", plain(x * 1e3, digits))
    } else {
        format!("{} m", plain(x, digits))
    }
}

/// A value of a quantity in the unit of its kind.
pub(super) fn value(x: f64, kind: Kind) -> String {
    match kind {
        Kind::Length => length(x),
        Kind::Radius if x == 0.0 => "flat".into(),
        Kind::Face if x == 0.0 => "flat".into(),
        Kind::Face => {
            let sense = if x > 0.0 { "convex" } else { "concave" };
            format!("{} {sense}", length(1.0 / x.abs()))
        }
        Kind::Radius | Kind::Focal if x.abs() < 1e-9 => "flat".into(),
        Kind::Radius | Kind::Focal => length(1.0 / x),
        Kind::Power => format!("{} W", plain(x, 5)),
        _ => format!("{} 1/m", plain(x, 5)),
    }
}

fn end(end: End, range: &Range) -> String {
    match end {
        End::Edge { at, touch, .. } => {
            let touch = if touch { " (touch)" } else { "" };
            format!("{}{touch}", beyond_flat(at, range))
        }
        End::Zero { at } => value(at, range.kind),
        End::Open => "any".into(),
    }
}

/// A value of a quantity; on the other side of flat than now, the sense is said in words.
fn beyond_flat(at: f64, range: &Range) -> String {
    let other_side = at * range.found.nominal <= 0.0 && at.abs() > 1e-9;
    match range.kind {
        Kind::Radius if other_side => {
            let sense = if at > 0.0 { "concave" } else { "convex" };
            format!("{} {sense}", length(1.0 / at.abs()))
        }
        kind => value(at, kind),
    }
}

/// Distances to the two ends in multiples of the tolerance.
fn room(range: &Range) -> String {
    match range.room() {
        None => "–".into(),
        Some(room) if room.is_finite() => significant(room, 2),
        Some(_) => "any".into(),
    }
}

/// How many single changes are proposed to someone whose cavity is unstable.
const PROPOSED: usize = 8;

fn way_back(document: &mut Document, ranges: &[Range]) {
    let mut helpful: Vec<&Range> = ranges
        .iter()
        .filter(|range| range.found.range.is_some())
        .collect();
    if helpful.is_empty() {
        document.heading("What would make it stable");
        document.text("No single length, radius or lens does; change two of them together.");
        return;
    }
    helpful.sort_by(|a, b| a.found.change_needed.total_cmp(&b.found.change_needed));
    document.heading("What would make it stable, by changing one quantity alone, nearest first");
    let mut table = Table::new(&["<quantity", "now", "from", "to", "change\nneeded"]);
    for range in helpful.iter().take(PROPOSED) {
        let Some(found) = range.found.range else {
            continue;
        };
        let reversed = range.kind.is_reciprocal();
        let (low, high) = if reversed {
            (found.to, found.from)
        } else {
            (found.from, found.to)
        };
        let nearest = [found.from, found.to]
            .into_iter()
            .filter_map(End::value)
            .min_by(|a, b| {
                let distance = |x: &f64| (x - range.found.nominal).abs();
                distance(a).total_cmp(&distance(b))
            });
        table.rows.push(vec![
            range.quantity.clone(),
            value(range.found.nominal, range.kind),
            end(low, range),
            end(high, range),
            nearest.map_or("–".into(), |at| {
                change(range.found.nominal, at, range.kind)
            }),
        ]);
    }
    document.push(Block::Table(table));
}

/// A change of a quantity, signed, in its unit.
pub(super) fn change(from: f64, to: f64, kind: Kind) -> String {
    if (to - from).abs() <= 1e-9 * from.abs() {
        // It stands on the edge.
        return "any".into();
    }
    let signed = |x: f64, unit: &str| {
        let plus = if x > 0.0 { "+" } else { "" };
        format!("{plus}{} {unit}", significant(x, 3))
    };
    match kind {
        Kind::Length => signed((to - from) * 1e3, "mm"),
        Kind::Radius | Kind::Face | Kind::Focal if from != 0.0 && to != 0.0 && from * to > 0.0 => {
            signed((1.0 / to - 1.0 / from) * 1e3, "mm")
        }
        Kind::Power => signed(to - from, "W"),
        _ => signed(to - from, "1/m"),
    }
}

fn round_trip(document: &mut Document, check: &Check) {
    document.heading("Round trip");
    let mut phases = Table::new(&[
        "<plane",
        "half-trace",
        "margin",
        "Gouy phase\n°",
        "folded, flips\ncounted, °",
    ]);
    let mut matrices = Table::new(&["<matrix", "A", "B\nm", "C\n1/m", "D"]);
    for (name, plane) in PLANES {
        let plane = check.planes.get(plane);
        let degrees = |x: Option<f64>| x.map_or("–".into(), |x| fixed(x.to_degrees(), 2));
        phases.rows.push(vec![
            name.to_string(),
            significant(plane.half_trace, 4),
            significant(plane.margin, 3),
            degrees(plane.gouy_rad),
            degrees(plane.gouy_folded_rad),
        ]);
        let [[a, b], [c, d]] = plane.matrix;
        let mut row = vec![name.to_string()];
        row.extend([a, b, c, d].map(|x| significant(x, 4)));
        matrices.rows.push(row);
    }
    document.push(Block::Table(phases));
    document.push(Block::Table(matrices));
    let trip = &check.round_trip;
    document.aside(format!(
        "{} reflections; {} geometric, {} optical, {} group",
        trip.reflections,
        length_to(trip.length_m, 6),
        length_to(trip.optical_m, 6),
        length_to(trip.group_m, 6),
    ));
}

fn limits(document: &mut Document, limits: &[LimitCheck]) {
    if limits.is_empty() {
        return;
    }
    document.heading("Limits");
    let mut table = Table::new(&["<", "<measure", "value", "<wanted"]);
    for check in limits {
        let presence = check.limit.measure.presence();
        let wanted = wanted(check.limit.bounds, presence);
        table.rows.push(vec![
            if check.holds { "holds" } else { "FAILS" }.into(),
            check.of.clone(),
            check.value.map_or("no value".into(), |value| {
                measured(value, presence, significant)
            }),
            wanted,
        ]);
    }
    document.push(Block::Table(table));
}
