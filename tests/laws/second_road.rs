//! The round trip of whole folded cavities, flips included, against rays traced in three dimensions
//! through the real surfaces, by code that shares nothing with the library.

use modewright::analysis::eigenmode::Eigenmode;
use nalgebra::Matrix4;
use proptest::prelude::*;

use crate::spec::{Part, Spec, any_cavity};
use crate::trace3d::{Bench, DOWN, LEFT, RIGHT, UP, angle_behind, deviation};

/// Steps of the ray equation through a duct.
const STEPS: usize = 400;

/// What differences of rays leave of a path of ten optics: each element is good to 1e-12, and
/// defocusing ones multiply that.
const ACCURACY: f64 = 1e-7;

fn side(word: &str) -> f64 {
    match word {
        "left" => LEFT,
        "up" => UP,
        "right" => RIGHT,
        _ => DOWN,
    }
}

fn radius(curvature: f64) -> f64 {
    if curvature == 0.0 {
        f64::INFINITY
    } else {
        1.0 / curvature
    }
}

fn is_vertical(word: &str) -> bool {
    matches!(word, "up" | "down")
}

/// Whether the file's tangential plane is the vertical one.
fn tangential_is_vertical(spec: &Spec) -> bool {
    let mirror = spec.parts.iter().find_map(|part| match part {
        Part::Mirror { aoi_deg, fold, .. } if *aoi_deg != 0.0 => Some(*fold),
        _ => None,
    });
    let slab = spec.parts.iter().find_map(|part| match part {
        Part::Slab { aoi_deg, shift, .. } if *aoi_deg != Some(0.0) => Some(*shift),
        _ => None,
    });
    mirror.or(slab).is_some_and(is_vertical)
}

/// Puts a part on the bench; `back` is the way back through a standing cavity, where left and
/// right of a fold exchange and a slab leans to the other side.
fn put(bench: &mut Bench, part: &Part, back: bool, swapped: bool) {
    // Values in the file's planes, ordered as the bench has them: horizontal, then vertical.
    let order = |pair: [f64; 2]| if swapped { [pair[1], pair[0]] } else { pair };
    match part {
        Part::Mirror {
            curvature,
            aoi_deg,
            fold,
        } => {
            let [horizontal, vertical] = order(*curvature);
            let (in_plane, across) = if is_vertical(fold) && *aoi_deg != 0.0 {
                (vertical, horizontal)
            } else {
                (horizontal, vertical)
            };
            let fold = if *aoi_deg == 0.0 { LEFT } else { side(fold) };
            let fold = if back {
                std::f64::consts::PI - fold
            } else {
                fold
            };
            bench.mirror(radius(in_plane), radius(across), aoi_deg.to_radians(), fold);
        }
        Part::Gap { length, index } => {
            bench.gap(*length, *index);
        }
        Part::Lens { power } => {
            let [t, s] = order(*power);
            bench.lens(1.0 / t, 1.0 / s);
        }
        Part::Slab {
            thickness,
            index,
            aoi_deg,
            shift,
            faces,
            thermal,
        } => {
            let aoi = aoi_deg.map_or(index.atan(), f64::to_radians);
            let lean = if back { -side(shift) } else { side(shift) };
            let inside = angle_behind(aoi, 1.0, *index);
            let path = thickness / inside.cos();
            let faces = if back { [faces[1], faces[0]] } else { *faces };
            // Convex from outside: the centre of the entrance lies ahead, that of the exit behind.
            bench.surface(*index, radius(faces[0]), aoi, lean);
            match thermal {
                None => {
                    bench.gap(path, *index);
                }
                Some((power, place)) => {
                    let power = order(*power);
                    let lens = |bench: &mut Bench| {
                        bench.lens(1.0 / power[0], 1.0 / power[1]);
                    };
                    match (*place, back) {
                        ("spread", _) => {
                            let gamma2 = power.map(|p| p / (index * path));
                            bench.duct(*index, gamma2, path, STEPS);
                        }
                        ("middle", _) => {
                            bench.gap(path / 2.0, *index);
                            lens(bench);
                            bench.gap(path / 2.0, *index);
                        }
                        ("entrance", false) | ("exit", true) => {
                            lens(bench);
                            bench.gap(path, *index);
                        }
                        _ => {
                            bench.gap(path, *index);
                            lens(bench);
                        }
                    }
                }
            }
            bench.surface(1.0, -radius(faces[1]), inside, lean);
        }
        Part::Duct {
            length,
            index,
            strength,
            antiguiding,
        } => {
            let sign = if *antiguiding { -1.0 } else { 1.0 };
            let gamma2 = order(*strength).map(|g| sign * g * g);
            bench.surface(*index, f64::INFINITY, 0.0, LEFT);
            bench.duct(*index, gamma2, *length, STEPS);
            bench.surface(1.0, f64::INFINITY, 0.0, LEFT);
        }
    }
}

fn traced(spec: &Spec) -> Matrix4<f64> {
    let swapped = tangential_is_vertical(spec);
    let mut bench = Bench::new(1.0);
    let last = spec.parts.len() - 1;
    for part in &spec.parts[1..=last] {
        put(&mut bench, part, false, swapped);
    }
    if !spec.ring {
        for part in spec.parts[1..last].iter().rev() {
            put(&mut bench, part, true, swapped);
        }
    }
    put(&mut bench, &spec.parts[0], false, swapped);
    bench.round_trip()
}

fn computed(spec: &Spec) -> Matrix4<f64> {
    let cavity = spec.cavity();
    let mode = Eigenmode::of(&cavity, &cavity.book().nominal());
    let (t, s) = (mode.planes.tangential.matrix, mode.planes.sagittal.matrix);
    let (h, v) = if cavity.tangential_is_horizontal() {
        (t, s)
    } else {
        (s, t)
    };
    Matrix4::new(
        h.a, 0.0, h.b, 0.0, //
        0.0, v.a, 0.0, v.b, //
        h.c, 0.0, h.d, 0.0, //
        0.0, v.c, 0.0, v.d,
    )
}

/// The cavity with air between all parts: a ray beside the axis would meet touching surfaces in
/// another order.
fn spaced(spec: Spec) -> Spec {
    let mut parts = Vec::new();
    for part in spec.parts {
        let is_gap = |part: &Part| matches!(part, Part::Gap { .. });
        if parts.last().is_some_and(|last| !is_gap(last)) && !is_gap(&part) {
            parts.push(Part::Gap {
                length: 0.02,
                index: 1.0,
            });
        }
        parts.push(part);
    }
    if spec.ring {
        parts.push(Part::Gap {
            length: 0.05,
            index: 1.0,
        });
    }
    Spec { parts, ..spec }
}

proptest! {
    #![proptest_config(crate::config(400))]

    #[test]
    fn rays_in_three_dimensions_give_the_same_round_trip(
        spec in any_cavity(9).prop_map(spaced).prop_filter("tame", |spec| computed(spec).amax() < 1e4)
    ) {
        let (found, wanted) = (computed(&spec), traced(&spec));
        let off = deviation(&found, &wanted, 0.3);
        prop_assert!(off < ACCURACY, "{off:e}\n{found}\n{wanted}");
    }
}

/// Every ring of up to six right-angled folds that closes: those that bring the frame back rolled
/// by other than half turns are refused, all others have the traced signs of both axes.
#[test]
fn right_angled_rings_return_the_frame_as_the_traced_ones_do() {
    const SIDES: [&str; 4] = ["left", "right", "up", "down"];
    let (mut rolled, mut planar, mut refused) = (0, 0, 0);
    for count in 3..=6_u32 {
        for code in 0..4_usize.pow(count) {
            let folds: Vec<&str> = (0..count)
                .map(|k| SIDES[code / 4_usize.pow(k) % 4])
                .collect();
            let mut parts = Vec::new();
            for fold in &folds {
                parts.push(Part::Mirror {
                    curvature: [0.0, 0.0],
                    aoi_deg: 45.0,
                    fold,
                });
                parts.push(Part::Gap {
                    length: 0.1,
                    index: 1.0,
                });
            }
            let spec = Spec {
                ring: true,
                wavelength: 1e-6,
                parts,
            };
            let mut bench = Bench::new(1.0);
            // Sides are named in the frame that arrives at the first mirror; with plane mirrors the
            // round trip is the same from there.
            for part in &spec.parts {
                put(&mut bench, part, false, false);
            }
            if bench.closure().1 > 1e-9 {
                continue;
            }
            let half_turns = bench.roll() / std::f64::consts::PI;
            let couples = (half_turns - half_turns.round()).abs() > 1e-9;
            let loaded = modewright::file::load("ring.toml", &spec.text(), &[]);
            if couples {
                let refusal = loaded.unwrap_err();
                assert!(refusal.diagnostics[0].message.contains("non-planar"));
                refused += 1;
                continue;
            }
            assert!(loaded.is_ok(), "{folds:?}");
            let off = deviation(&computed(&spec), &bench.round_trip(), 0.3);
            assert!(off < ACCURACY, "{folds:?}: {off:e}");
            if half_turns.round().abs() == 1.0 {
                rolled += 1;
            } else {
                planar += 1;
            }
        }
    }
    assert!(
        rolled > 0 && planar > 0 && refused > 0,
        "{rolled} {planar} {refused}"
    );
}
