//! Resonators with a variable lens.
//!
//! V. Magni, Appl. Opt. 25, 107 (1986), and J. Opt. Soc. Am. A 4, 1962 (1987): against the dioptric
//! power 1/f of a thin lens within it a resonator has two zones of stability of the same width
//! Δ(1/f); in each of them the spot w₃ in the lens has a stationary minimum w₃₀, the same for
//! both, and Δ(1/f) = 2λ/(π w₃₀²). The statements are published, and cited here from memory; all
//! digits below are recomputed from this derivation of our own:
//!
//! With the lens at L₁ and L₂ from mirrors of radii R₁ and R₂, uᵢ = Lᵢ(1 − Lᵢ/Rᵢ) and
//! x = 1/f − 1/L₁ − 1/L₂ the one-way matrix has g₁g₂ = (1 + xu₁)(1 + xu₂). It lies between 0 and 1
//! in two zones, whose edges are x = 0, −1/u₁, −1/u₂ and −1/u₁ − 1/u₂: both have the width 1/u of
//! the greater |u|. A round trip from the lens has B = 2(u₁ + u₂) + 4u₁u₂x up to its sign, and so
//! with s = u₁ + u₂, p = u₁u₂ and z = sx + px² the lens sees β² = (s² + 4pz)/(−z(1 + z)). That is
//! stationary at z = −s/(2u), u again the greater one, where β = 2|u|, that is
//! w₃₀² = 2λ|u|/π = (2λ/π)/Δ(1/f).

use std::f64::consts::PI;

use approx::assert_relative_eq;
use modewright::cavity::{Cavity, Measure};
use modewright::file;
use modewright::study::sweep::{Options, Sweep, Vary, sweep};

const WAVELENGTH: f64 = 1064e-9;
/// Edges and minima are solved to rounding; a minimum's place to its square root.
const SOLVED: f64 = 1e-11;
const PLACED: f64 = 1e-9;

fn swept(cavity: &Cavity, address: &str, from: f64, to: f64, measure: &str) -> Sweep {
    let slot = cavity.book().find(address).unwrap();
    let options = Options {
        vary: vec![Vary {
            slot,
            from,
            to,
            nominal: None,
        }],
        points: None,
        measures: vec![(measure.into(), Measure::parse(measure, cavity).unwrap())],
    };
    sweep(cavity, &options).unwrap()
}

/// Compares the zones of a resonator with those of the derivation.
fn hold(found: &Sweep, arms: [(f64, f64); 2], spot: &str) {
    let u = arms.map(|(length, curvature)| length * (1.0 - length * curvature));
    let middle: f64 = arms.iter().map(|(length, _)| 1.0 / length).sum();
    let mut edges = [0.0, -1.0 / u[0], -1.0 / u[1], -1.0 / u[0] - 1.0 / u[1]].map(|x| x + middle);
    edges.sort_by(f64::total_cmp);
    let ranges = found.stable_ranges.as_ref().unwrap();
    assert_eq!(ranges.len(), 2, "{ranges:?}");
    let solved: Vec<f64> = ranges.iter().flat_map(|range| range.ends).collect();
    for (solved, edge) in solved.iter().zip(edges) {
        assert_relative_eq!(*solved, edge, max_relative = SOLVED);
    }
    let widths = [solved[1] - solved[0], solved[3] - solved[2]];
    assert_relative_eq!(widths[0], widths[1], max_relative = SOLVED);

    let greater = u[0].abs().max(u[1].abs());
    let w30 = (2.0 * WAVELENGTH * greater / PI).sqrt();
    let points = found.stationary.as_ref().unwrap();
    assert_eq!(points.len(), 2, "{points:?}");
    let (s, p) = (u[0] + u[1], u[0] * u[1]);
    for (point, range) in points.iter().zip(ranges) {
        assert_eq!((point.kind, point.measure.as_str()), ("minimum", spot));
        assert_relative_eq!(point.value, w30, max_relative = SOLVED);
        let width = range.ends[1] - range.ends[0];
        let published = 2.0 * WAVELENGTH / (PI * point.value * point.value);
        assert_relative_eq!(width, published, max_relative = 10.0 * SOLVED);
        let x = point.place.kept().unwrap() - middle;
        let of_greater = if u[0].abs() > u[1].abs() { u[0] } else { u[1] };
        assert_relative_eq!(
            s * x + p * x * x,
            -s / (2.0 * of_greater),
            max_relative = PLACED
        );
    }
}

/// A concave mirror at 300 mm and a flat one at 400 mm: u = 0.12 m and 0.4 m, and the lower zone
/// lies at diverging lenses, beyond no lens at all.
#[test]
fn two_zones_of_a_thin_lens() {
    let cavity = file::load(
        "magni.toml",
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          { mirror = "M1", roc = "500 mm" },
          { gap = "d1", length = "300 mm" },
          { lens = "L", focal = "200 mm" },
          { gap = "d2", length = "400 mm" },
          { mirror = "M2", roc = "flat" },
        ]
        "#,
        &[],
    )
    .unwrap()
    .cavity;
    let found = swept(&cavity, "L.focal", -7.0, 8.0, "L.spot");
    hold(&found, [(0.3, 2.0), (0.4, 0.0)], "L.spot");
}

/// The lens as a thermal one in the middle of a slab: the arms end at its middle, the halves of
/// the slab counting as thickness over index; the spot is the one in the middle.
#[test]
fn two_zones_of_a_thermal_lens() {
    let cavity = file::load(
        "magni.toml",
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          { mirror = "M1", roc = "600 mm convex" },
          { gap = "d1", length = "160 mm" },
          { slab = "X", thickness = "80 mm", index = 2.0, thermal = "3 1/m", thermal_at = "middle" },
          { gap = "d2", length = "480 mm" },
          { mirror = "M2", roc = "900 mm" },
        ]
        "#,
        &[],
    )
    .unwrap()
    .cavity;
    let found = swept(&cavity, "X.thermal", -3.0, 12.0, "X.spot");
    hold(&found, [(0.18, -1.0 / 0.6), (0.5, 1.0 / 0.9)], "X.spot");
}
