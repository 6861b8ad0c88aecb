//! A mirror on a crystal's face: written as a mirror beside a slab with the face's radius, it is a
//! mirror of that radius in the crystal, C = −2n/R.

use modewright::analysis::check::{Check, check};
use modewright::cavity::Cavity;
use modewright::file;
use modewright::optics::Plane;
use proptest::prelude::*;

fn load(text: &str) -> Cavity {
    match file::load("test.toml", text, &[]) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

/// Written as a practitioner writes it; the ties make each face and its mirror one surface.
fn on_the_faces(n: f64, length: f64, faces: [&str; 2]) -> Cavity {
    load(&format!(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          {{ mirror = "A" }},
          {{ slab = "X", index = {n:?}, thickness = "{length:?} m", entrance = "{}", exit = "{}" }},
          {{ mirror = "B" }},
        ]
        ties = ["A.roc = X.entrance", "B.roc = X.exit"]
        "#,
        faces[0], faces[1]
    ))
}

fn in_the_medium(n: f64, length: f64, mirrors: [&str; 2]) -> Cavity {
    load(&format!(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          {{ mirror = "A", roc = "{}" }},
          {{ gap = "X", length = "{length:?} m", medium = {n:?} }},
          {{ mirror = "B", roc = "{}" }},
        ]
        "#,
        mirrors[0], mirrors[1]
    ))
}

/// Two ways of writing one cavity part by rounding, which grows towards the edge.
fn same(found: f64, wanted: f64, within: f64, what: &str) -> Result<(), TestCaseError> {
    prop_assert!(
        (found - wanted).abs() <= within * wanted.abs().max(1e-6),
        "{what}: {found:e} is not {wanted:e}"
    );
    Ok(())
}

fn agree(face: &Cavity, medium: &Cavity, within: f64) -> Result<(), TestCaseError> {
    let [face, medium]: [Check; 2] = [face, medium].map(check);
    for plane in Plane::BOTH {
        let [f, m] = [&face, &medium].map(|c| c.planes.get(plane));
        same(f.half_trace, m.half_trace, within, "half-trace")?;
        prop_assert_eq!(f.stable, m.stable);
        if let (Some(f), Some(m)) = (f.gouy_rad, m.gouy_rad) {
            same(f, m, within, "Gouy phase")?;
        }
        let waist = |c: &Check| {
            let found = c
                .waists
                .iter()
                .find(|w| w.part == "X" && w.plane == plane.name());
            let found = found.unwrap();
            (found.waist_m, found.from_start_m)
        };
        if let ((Some(w0), Some(at)), (Some(w), Some(z))) = (waist(&face), waist(&medium)) {
            same(w0, w, within, "waist")?;
            same(at, z, within, "place of the waist")?;
        }
        for mirror in ["A", "B"] {
            let spot = |c: &Check| {
                let station = c.stations.iter().find(|s| s.part == mirror).unwrap();
                station.spot(plane).map(|spot| spot.spot_m)
            };
            if let (Some(f), Some(m)) = (spot(&face), spot(&medium)) {
                same(f, m, within, "spot")?;
            }
        }
    }
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    #[test]
    fn curved_faces_are_mirrors_in_the_crystal(
        n in 1.3..3.5_f64,
        length in 1e-3..0.1_f64,
        g1 in -2.0..0.95_f64,
        product in 0.02..0.98_f64,
    ) {
        prop_assume!(g1.abs() > 0.05);
        let g2 = product / g1;
        prop_assume!((g2 - 1.0).abs() > 1e-3 && (g1 + g2 - 2.0 * product).abs() > 1e-2);
        let radii = [g1, g2].map(|g| length / (1.0 - g));
        // Convex from outside is concave for the beam inside.
        let faces = radii.map(|r| {
            format!("{:?} m {}", r.abs(), if r > 0.0 { "convex" } else { "concave" })
        });
        let mirrors = radii.map(|r| format!("{r:?} m"));
        let face = on_the_faces(n, length, [&faces[0], &faces[1]]);
        let medium = in_the_medium(n, length, [&mirrors[0], &mirrors[1]]);
        agree(&face, &medium, 1e-9)?;
        // The index leaves the g parameters alone: h = 2 g₁g₂ − 1.
        let h = check(&face).planes.sagittal.half_trace;
        same(h, 2.0 * product - 1.0, 1e-9, "closed form")?;
    }

    #[test]
    fn a_flat_face_is_a_flat_mirror(n in 1.3..3.5_f64, length in 1e-3..0.1_f64, g in 0.02..0.98_f64) {
        let roc = length / (1.0 - g);
        let face = on_the_faces(n, length, ["flat", &format!("{roc:?} m convex")]);
        let medium = in_the_medium(n, length, ["flat", &format!("{roc:?} m")]);
        agree(&face, &medium, 1e-10)?;
    }
}

/// The tie makes one tolerance of the two radii, and one range.
#[test]
fn the_face_and_its_mirror_move_as_one() {
    let cavity = on_the_faces(1.8, 0.01, ["flat", "25 mm convex"]);
    let found = check(&cavity);
    let named: Vec<&str> = found.ranges.iter().map(|r| r.quantity.as_str()).collect();
    assert_eq!(named, ["X.thickness", "X.entrance", "X.exit"]);
    let exit = &found.ranges[2];
    // Flat to as short as the crystal itself.
    assert!(exit.from_per_m.flatten().unwrap().abs() < 1e-9);
    assert!((exit.to_per_m.flatten().unwrap() - 100.0).abs() < 1e-9);
}
