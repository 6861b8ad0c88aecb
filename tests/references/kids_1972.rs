//! Kogelnik, Ippen, Dienes & Shank, "Astigmatically Compensated Cavities for CW Dye Lasers", IEEE
//! J. Quantum Electron. 8, 373 (1972): a Brewster plate and the tilt of a mirror undo each other's
//! astigmatism. Formulas from memory, angles recomputed from them.

use approx::assert_relative_eq;
use modewright::analysis::check::{Check, check};
use modewright::analysis::eigenmode::PlaneMode;
use modewright::analysis::ranges::{End, stable_range};
use modewright::cavity::{Cavity, Form};
use modewright::file;
use modewright::optics::{PerPlane, Plane};

/// Index, thickness and radius with the compensating angle for one mirror and for two equal ones,
/// in degrees.
const PLATES: [(f64, f64, f64, f64, f64); 4] = [
    (1.45, 1.5e-3, 0.1, 6.57031005, 4.6484761),
    (1.5, 2e-3, 0.1, 7.63393601, 5.40204254),
    (1.76, 2e-3, 0.1, 7.61162504, 5.38623078),
    (1.76, 5e-3, 0.1, 12.0080013, 8.50688469),
];

/// Beam path inside a crystal of index 1.76, radius and angle for two equal mirrors.
const TITANIUM_SAPPHIRE: [(f64, f64, f64); 6] = [
    (2e-3, 0.05, 7.0988123),
    (3e-3, 0.1, 6.14973737),
    (10e-3, 0.1, 11.2023284),
    (20e-3, 0.1, 15.7902372),
    (3e-3, 0.15, 5.02285799),
    (5e-3, 0.15, 6.4816951),
];

/// The paper's N: the plate's planes part by N times its thickness.
fn astigmatism(n: f64) -> f64 {
    (n * n - 1.0) * (n * n + 1.0).sqrt() / n.powi(4)
}

/// Reduced length of the plate in either plane.
fn effective(n: f64, thickness: f64) -> PerPlane<f64> {
    let root = thickness * (n * n + 1.0).sqrt();
    PerPlane {
        tangential: root / n.powi(4),
        sagittal: root / (n * n),
    }
}

fn load(text: &str) -> Cavity {
    match file::load("test.toml", text, &[]) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

/// A plate between two folding mirrors and long arms to flats; the mirrors stand `beyond` further
/// from the plate than confocal in the sagittal plane.
fn two_mirrors(n: f64, thickness: f64, roc: f64, angle_deg: f64, beyond: f64) -> Cavity {
    let focal = roc / 2.0 / angle_deg.to_radians().cos();
    let gap = focal - effective(n, thickness).sagittal / 2.0 + beyond / 2.0;
    load(&format!(
        r#"
        wavelength = "800 nm"
        form = "standing"
        path = [
          {{ mirror = "A", roc = "flat" }},
          {{ gap = "arm1", length = "0.6 m" }},
          {{ mirror = "F1", roc = "{roc} m", aoi = "{angle_deg} deg", fold = "left" }},
          {{ gap = "d1", length = "{gap:?} m" }},
          {{ slab = "X", index = {n}, thickness = "{thickness:?} m", aoi = "brewster" }},
          {{ gap = "d2" }},
          {{ mirror = "F2", roc = "{roc} m", aoi = "{angle_deg} deg", fold = "right" }},
          {{ gap = "arm2", length = "0.9 m" }},
          {{ mirror = "B", roc = "flat" }},
        ]
        ties = ["d2.length = d1.length"]
        "#
    ))
}

/// A flat behind a plate at the focus of one folding mirror; the arm behind it is long.
fn one_mirror(n: f64, thickness: f64, roc: f64, angle_deg: f64, beyond: f64) -> Cavity {
    let focal = roc / 2.0 / angle_deg.to_radians().cos();
    let gap = focal - effective(n, thickness).sagittal + beyond - 1e-3;
    load(&format!(
        r#"
        wavelength = "600 nm"
        form = "standing"
        path = [
          {{ mirror = "A", roc = "flat" }},
          {{ gap = "d0", length = "1 mm" }},
          {{ slab = "X", index = {n}, thickness = "{thickness:?} m", aoi = "brewster" }},
          {{ gap = "d1", length = "{gap:?} m" }},
          {{ mirror = "F", roc = "{roc} m", aoi = "{angle_deg} deg", fold = "left" }},
          {{ gap = "arm", length = "1.1 m" }},
          {{ mirror = "B", roc = "flat" }},
        ]
        "#
    ))
}

/// The margins of both planes where the range of d1 begins.
fn margins_at_the_edge(cavity: &Cavity) -> PerPlane<f64> {
    let slot = cavity.book().find("d1.length").unwrap();
    let Some(range) = stable_range(cavity, slot).range else {
        panic!("no distance is stable")
    };
    let End::Edge { at, .. } = range.from else {
        panic!("{range:?}")
    };
    let mut values = cavity.book().nominal();
    values[slot.index()] = at;
    cavity.book().follow_ties(&mut values);
    let way = cavity.one_way(&values);
    way.map(|m| PlaneMode::of(Form::Standing, m).margin)
}

/// The angles are printed to nine digits of tens of millimetres' worth of focal length; a metre of
/// arm and f² turn that into this.
const SAME_EDGE: f64 = 1e-6;

fn planes_become_stable_together(build: impl Fn(f64) -> Cavity, angle_deg: f64) {
    let margins = margins_at_the_edge(&build(angle_deg));
    for plane in Plane::BOTH {
        assert!(margins[plane].abs() < SAME_EDGE, "{angle_deg} {margins:?}");
    }
    // A fifth of a degree aside, one plane is well inside when the other becomes stable.
    for aside in [-0.2, 0.2] {
        let margins = margins_at_the_edge(&build(angle_deg + aside));
        let [least, most] = {
            let (t, s) = (margins.tangential, margins.sagittal);
            [t.min(s), t.max(s)]
        };
        assert!(
            least.abs() < SAME_EDGE && most > 1e-3,
            "{angle_deg} {aside}"
        );
    }
}

/// Two equal mirrors: N t = R sin θ tan θ. Both planes become afocal, and so stable, at the same
/// distance.
#[test]
fn two_equal_mirrors_compensate_a_plate() {
    let of_path = |n: f64, path: f64| path * n / (n * n + 1.0).sqrt();
    let crystals =
        TITANIUM_SAPPHIRE.map(|(path, roc, angle)| (1.76, of_path(1.76, path), roc, angle));
    let plates = PLATES.map(|(n, thickness, roc, _, angle)| (n, thickness, roc, angle));
    for (n, thickness, roc, angle) in plates.into_iter().chain(crystals) {
        let theta = angle.to_radians();
        assert_relative_eq!(
            roc * theta.sin() * theta.tan(),
            astigmatism(n) * thickness,
            max_relative = 1e-8
        );
        // A small part of the stable zone's width, f²/0.85 m.
        let beyond = 0.2 * (roc / 2.0).powi(2) / 0.85;
        planes_become_stable_together(|a| two_mirrors(n, thickness, roc, a, beyond), angle);
    }
}

/// One mirror: 2 N t = R sin θ tan θ.
#[test]
fn one_mirror_compensates_a_plate() {
    for (n, thickness, roc, angle, _) in PLATES {
        let theta = angle.to_radians();
        assert_relative_eq!(
            roc * theta.sin() * theta.tan(),
            2.0 * astigmatism(n) * thickness,
            max_relative = 1e-8
        );
        let beyond = 0.2 * (roc / 2.0).powi(2) / 1.05;
        planes_become_stable_together(|a| one_mirror(n, thickness, roc, a, beyond), angle);
    }
}

/// The plate's reduced lengths, t √(n² + 1)/n⁴ and t √(n² + 1)/n².
#[test]
fn effective_lengths_of_a_brewster_plate() {
    for (n, thickness, ..) in PLATES {
        let cavity = load(&format!(
            r#"
            wavelength = "600 nm"
            form = "standing"
            path = [
              {{ mirror = "A", roc = "flat" }},
              {{ slab = "X", index = {n}, thickness = "{thickness:?} m", aoi = "brewster" }},
              {{ mirror = "B", roc = "flat" }},
            ]
            "#
        ));
        let way = cavity.one_way(&cavity.book().nominal());
        let wanted = effective(n, thickness);
        for plane in Plane::BOTH {
            assert_relative_eq!(way[plane].a, 1.0, max_relative = 1e-14);
            assert_relative_eq!(way[plane].b, wanted[plane], max_relative = 1e-14);
            assert_relative_eq!(way[plane].c, 0.0);
        }
    }
}

/// A compensated cavity is round in its arms, well inside the stable zone too.
#[test]
fn the_compensated_mode_is_round_in_the_arms() {
    let (n, thickness, roc, _, angle) = PLATES[3];
    let aspect = |check: &Check| {
        let last = check.stations.iter().find(|s| s.part == "B").unwrap();
        last.tangential.unwrap().spot_m / last.sagittal.unwrap().spot_m
    };
    let beyond = 0.5 * (roc / 2.0).powi(2) / 0.85;
    let round = check(&two_mirrors(n, thickness, roc, angle, beyond));
    let askew = check(&two_mirrors(n, thickness, roc, angle + 1.0, beyond));
    assert!(round.stable && askew.stable);
    let off = |check: &Check| (aspect(check) - 1.0).abs();
    assert!(off(&round) < 0.02, "{}", off(&round));
    assert!(off(&askew) > 5.0 * off(&round), "{}", off(&askew));
}
