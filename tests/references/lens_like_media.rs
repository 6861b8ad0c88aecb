//! Ducts and thermal lenses: Kogelnik, "On the Propagation of Gaussian Beams through Lenslike
//! Media Including those with a Loss or Gain Variation", Appl. Opt. 4, 1562 (1965), and the zones
//! of Magni, Appl. Opt. 25, 117 (1986). Formulas from memory.

use std::f64::consts::PI;

use approx::assert_relative_eq;
use modewright::analysis::measures;
use modewright::analysis::ranges::{Range, stable_range};
use modewright::cavity::{Cavity, Measure};
use modewright::file;
use modewright::optics::Plane;
use modewright::optics::ray::RayMatrix;

fn load(parts: &str, top: &str) -> Cavity {
    let text = format!(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        {top}
        path = [
          {parts}
        ]
        "#
    );
    match file::load("test.toml", &text, &[]) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

const END_A: &str = r#"{ mirror = "A", roc = "flat" },"#;
const END_B: &str = r#"{ mirror = "B", roc = "flat" },"#;

fn matrices(parts: &str) -> [RayMatrix<f64>; 2] {
    let cavity = load(&format!("{END_A} {parts} {END_B}"), "");
    let way = cavity.one_way(&cavity.book().nominal());
    Plane::BOTH.map(|plane| way[plane])
}

#[track_caller]
fn same(found: RayMatrix<f64>, wanted: [f64; 4], within: f64) {
    let found = [found.a, found.b, found.c, found.d];
    for (x, y) in found.into_iter().zip(wanted) {
        assert_relative_eq!(x, y, max_relative = within, epsilon = 1e-15);
    }
}

/// cos γL, sin γL/(nγ), −nγ sin γL; cosh and sinh where the profile defocuses; own γ in each plane.
#[test]
fn a_duct_is_cosine_and_hyperbolic_cosine() {
    let (n, length) = (1.6, 0.02_f64);
    let strengths = [37.0, 210.0];
    let duct = |profile: &str| {
        matrices(&format!(
            r#"{{ duct = "D", length = "{length:?} m", index = {n}, profile = "{profile}",
                 strength_tangential = "{} 1/m", strength_sagittal = "{} 1/m" }},"#,
            strengths[0], strengths[1]
        ))
    };
    for (m, g) in duct("guiding").into_iter().zip(strengths) {
        let (s, c) = (g * length).sin_cos();
        same(m, [c, s / (n * g), -n * g * s, c], 1e-13);
    }
    for (m, g) in duct("antiguiding").into_iter().zip(strengths) {
        let (s, c) = ((g * length).sinh(), (g * length).cosh());
        same(m, [c, s / (n * g), n * g * s, c], 1e-13);
    }
}

/// A thermal lens spread along a slab is the duct with γ² = P/(nL).
#[test]
fn a_spread_thermal_lens_is_a_duct() {
    let (n, length, power) = (1.82_f64, 0.08, 5.0);
    let strength = (power / (n * length)).sqrt();
    let slab = matrices(&format!(
        r#"{{ slab = "S", thickness = "{length:?} m", index = {n},
             thermal_tangential = "{power} 1/m", thermal_sagittal = "-{power} 1/m" }},"#
    ));
    for (m, profile) in slab.into_iter().zip(["guiding", "antiguiding"]) {
        let duct = matrices(&format!(
            r#"{{ duct = "D", length = "{length:?} m", index = {n}, profile = "{profile}",
                 strength = "{strength:?} 1/m" }},"#
        ))[0];
        same(m, [duct.a, duct.b, duct.c, duct.d], 1e-14);
    }
}

/// The weak lens: as γL falls, the duct becomes a lens of power nγ²L in its middle, and what is left
/// falls as the square of P L/n.
#[test]
fn a_weak_duct_is_a_lens_in_its_middle() {
    let (n, length) = (1.82, 0.08);
    for power in [1e-1, 1e-3, 1e-5] {
        let lens = |place: &str| {
            matrices(&format!(
                r#"{{ slab = "S", thickness = "{length:?} m", index = {n}, thermal = "{power:?} 1/m",
                     thermal_at = "{place}" }},"#
            ))[0]
        };
        let (spread, middle) = (lens("spread"), lens("middle"));
        let small = power * length / n;
        // C = −P (1 − z/6 + …), z = P L/n; B = (L/n)(1 − z/6), in the middle (L/n)(1 − z/4).
        assert_relative_eq!(
            spread.c,
            -power * (1.0 - small / 6.0),
            max_relative = small * small / 60.0 + 1e-14
        );
        assert_relative_eq!(middle.c, -power, max_relative = 1e-14);
        assert_relative_eq!(
            spread.b,
            middle.b * (1.0 + small / 12.0),
            max_relative = small * small
        );
        assert_relative_eq!(spread.a, middle.a, epsilon = small * small / 20.0);
    }
}

/// The same lens lumped into slices converges to the duct as the square of the slices' length.
#[test]
fn slices_of_a_duct_become_the_duct() {
    let (n, length, strength) = (1.6, 0.02, 90.0);
    let duct = matrices(&format!(
        r#"{{ duct = "D", length = "{length:?} m", index = {n}, strength = "{strength} 1/m" }},"#
    ))[0];
    let sliced = |count: usize| {
        let half = length / count as f64 / 2.0;
        let focal = 1.0 / (n * strength * strength * length / count as f64);
        let slices: String = (0..count)
            .map(|k| {
                format!(
                    r#"{{ gap = "a{k}", length = "{half:?} m", medium = {n} }},
                       {{ lens = "L{k}", focal = "{focal:?} m" }},
                       {{ gap = "b{k}", length = "{half:?} m", medium = {n} }},"#
                )
            })
            .collect();
        let m = matrices(&slices)[0];
        [
            (m.a - duct.a).abs(),
            ((m.b - duct.b) / duct.b).abs(),
            ((m.c - duct.c) / duct.c).abs(),
        ]
    };
    let (coarse, fine) = (sliced(40), sliced(80));
    for (coarse, fine) in coarse.into_iter().zip(fine) {
        assert!(fine < 1e-3, "{fine}");
        assert_relative_eq!(coarse / fine, 4.0, max_relative = 0.01);
    }
}

const D1: f64 = 0.5;
const D2: f64 = 0.8;
const ROD: (f64, f64) = (1.82, 0.1);

/// A rod of 1 dpt per kilowatt between flats; its reduced half length is taken off the gaps.
fn pumped(place: &str, pump: f64) -> Cavity {
    let (n, length) = ROD;
    let [a, b] = [D1, D2].map(|d| d - 0.5 * length / n);
    let parts = format!(
        r#"{END_A} {{ gap = "a", length = "{a:?} m" }},
           {{ slab = "rod", thickness = "{length:?} m", index = {n}, group_index = {n},
              thermal_per_watt = "1e-3 1/m", thermal_at = "{place}" }},
           {{ gap = "b", length = "{b:?} m" }}, {END_B}"#
    );
    load(&parts, &format!("pump = \"{pump:?} W\""))
}

fn pump_range(cavity: &Cavity) -> Range {
    stable_range(cavity, Cavity::PUMP).range.unwrap()
}

/// Two flats 0.5 and 0.8 m from a lens: stable from 0 to 1/d_long and from 1/d_short to
/// 1/d₁ + 1/d₂, that is 0 to 1.25 and 2 to 3.25 dioptres.
#[test]
fn zones_of_a_pumped_rod_between_flats() {
    let first = pump_range(&pumped("middle", 600.0));
    assert_relative_eq!(first.from.value().unwrap(), 0.0);
    assert_relative_eq!(first.to.value().unwrap(), 1250.0, max_relative = 1e-12);
    let second = pump_range(&pumped("middle", 2500.0));
    assert_relative_eq!(second.from.value().unwrap(), 2000.0, max_relative = 1e-12);
    assert_relative_eq!(second.to.value().unwrap(), 3250.0, max_relative = 1e-12);
}

/// The same with the lens spread along the rod, where the edges obey nγ tan γL = 1/d with the gap
/// d alone, and (1 − d₁d₂n²γ²) tan γL + (d₁ + d₂) nγ = 0.
#[test]
fn zones_of_a_spread_lens_between_flats() {
    let (n, length) = ROD;
    let [a, b] = [D1, D2].map(|d| d - 0.5 * length / n);
    let strength = |watts: f64| (1e-3 * watts / (n * length)).sqrt();
    let lens = |watts: f64| {
        let g = strength(watts);
        n * g * (g * length).tan()
    };
    let first = pump_range(&pumped("spread", 600.0));
    assert_relative_eq!(
        lens(first.to.value().unwrap()),
        1.0 / b,
        max_relative = 1e-12
    );
    let second = pump_range(&pumped("spread", 2500.0));
    assert_relative_eq!(
        lens(second.from.value().unwrap()),
        1.0 / a,
        max_relative = 1e-12
    );
    let g = strength(second.to.value().unwrap());
    let rest = (1.0 - a * b * (n * g).powi(2)) * (g * length).tan() + (a + b) * n * g;
    assert!(rest.abs() < 1e-10 * (a + b) * n * g, "{rest}");
    // The principal planes of a long rod move with its power, so the zones part a little.
    assert_relative_eq!(first.to.value().unwrap(), 1250.0, max_relative = 0.05);
}

/// Magni: both zones are Δ(1/f) = 2λ/(π w²) wide, w the spot at the lens where it is stationary, be
/// the mirrors what they may.
#[test]
fn zones_are_as_wide_as_the_stationary_spot_is_small() {
    let wavelength = 1064e-9;
    // Mirrors, distances, a power in each zone, and the published problem's spot where there is one.
    let cavities = [
        ("flat", "flat", [D1, D2], [0.6, 2.5], Some(0.73613229e-3)),
        ("1.5 m convex", "3 m", [0.4, 0.9], [1.0, 3.0], None),
        ("5 m", "2 m convex", [0.25, 0.7], [0.7, 5.0], None),
    ];
    for (roc1, roc2, [d1, d2], powers, printed) in cavities {
        let mut zones = Vec::new();
        for power in powers {
            let parts = format!(
                r#"{{ mirror = "A", roc = "{roc1}" }}, {{ gap = "a", length = "{d1} m" }},
                   {{ lens = "L", focal = "{:?} m" }}, {{ gap = "b", length = "{d2} m" }},
                   {{ mirror = "B", roc = "{roc2}" }},"#,
                1.0 / power
            );
            let cavity = load(&parts, "");
            let slot = cavity.book().find("L.focal").unwrap();
            let range = stable_range(&cavity, slot).range.unwrap();
            let (from, to) = (range.from.value().unwrap(), range.to.value().unwrap());
            assert!(
                from <= power && power <= to,
                "{roc1} {power}: {from} to {to}"
            );
            let measure = Measure::parse("L.spot", &cavity).unwrap();
            let spot = |share: f64| {
                let mut values = cavity.book().nominal();
                values[slot.index()] = from + share * (to - from);
                measures::value(&cavity, &values, measure).unwrap()
            };
            // Flat at its least, so that a scan finds the value to the square of its step.
            const STEPS: usize = 4000;
            let least = (1..STEPS)
                .map(|k| spot(k as f64 / STEPS as f64))
                .fold(f64::INFINITY, f64::min);
            let width = 2.0 * wavelength / (PI * least * least);
            assert_relative_eq!(to - from, width, max_relative = 1e-6);
            if let Some(printed) = printed {
                assert_relative_eq!(least, printed, max_relative = 1e-6);
            }
            zones.push((from, to));
        }
        // Two different zones of the same width.
        let [(f1, t1), (f2, t2)] = zones[..] else {
            panic!("two zones")
        };
        assert!(t1 <= f2 || t2 <= f1, "{zones:?}");
        assert_relative_eq!(t1 - f1, t2 - f2, max_relative = 1e-10);
    }
}
