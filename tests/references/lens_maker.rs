//! The thick lens of the textbooks: Born & Wolf, *Principles of Optics*, section 4.4; Hecht,
//! *Optics*, chapter 6. Formulas from memory.

use approx::assert_relative_eq;
use modewright::file;
use modewright::optics::Plane;
use modewright::optics::ray::RayMatrix;

/// A slab's ray matrix, square to the beam; faces as written in files.
fn slab(n: f64, thickness: f64, entrance: &str, exit: &str) -> RayMatrix<f64> {
    let text = format!(
        r#"
        wavelength = "1 um"
        form = "standing"
        path = [
          {{ mirror = "A", roc = "flat" }},
          {{ slab = "L", index = {n}, thickness = "{thickness:?} m", entrance = "{entrance}", exit = "{exit}" }},
          {{ mirror = "B", roc = "flat" }},
        ]
        "#
    );
    let cavity = file::load("test.toml", &text, &[]).unwrap().cavity;
    let way = cavity.one_way(&cavity.book().nominal());
    assert_eq!(way[Plane::Tangential], way[Plane::Sagittal]);
    way[Plane::Tangential]
}

/// 1/f = (n − 1)(1/R₁ − 1/R₂ + (n − 1)t/(n R₁ R₂)), radii positive with the centre downstream; the
/// principal planes lie −f(n − 1)t/(n R₂) behind the first vertex and −f(n − 1)t/(n R₁) behind the
/// second.
#[test]
fn focal_length_and_principal_planes() {
    // n, t, faces as in a file, R₁ and R₂ with the textbook's signs.
    let lenses = [
        (1.5, 5e-3, "50 mm convex", "50 mm convex", 0.05, -0.05),
        (
            1.5168,
            3.6e-3,
            "51.7 mm convex",
            "flat",
            0.0517,
            f64::INFINITY,
        ),
        (
            1.5168,
            3.6e-3,
            "flat",
            "51.7 mm convex",
            f64::INFINITY,
            -0.0517,
        ),
        (1.45, 2e-3, "80 mm concave", "40 mm concave", -0.08, 0.04),
        (1.76, 4e-3, "30 mm convex", "90 mm concave", 0.03, 0.09),
        (2.4, 6e-3, "100 mm concave", "60 mm convex", -0.1, -0.06),
    ];
    for (n, t, entrance, exit, r1, r2) in lenses {
        let m = slab(n, t, entrance, exit);
        let power = (n - 1.0) * (1.0 / r1 - 1.0 / r2 + (n - 1.0) * t / (n * r1 * r2));
        assert_relative_eq!(m.c, -power, max_relative = 1e-13);
        let focal = 1.0 / power;
        let first = -focal * (n - 1.0) * t / (n * r2);
        let second = -focal * (n - 1.0) * t / (n * r1);
        assert_relative_eq!(
            (m.d - 1.0) / m.c,
            first,
            max_relative = 1e-10,
            epsilon = 1e-15
        );
        assert_relative_eq!(
            (1.0 - m.a) / m.c,
            second,
            max_relative = 1e-10,
            epsilon = 1e-15
        );
    }
}

/// A ball of diameter D: f = nD/(4(n − 1)), both principal planes at its centre.
#[test]
fn a_ball_lens() {
    let (n, diameter) = (1.5, 4e-3);
    let m = slab(n, diameter, "2 mm convex", "2 mm convex");
    assert_relative_eq!(
        -1.0 / m.c,
        n * diameter / (4.0 * (n - 1.0)),
        max_relative = 1e-13
    );
    assert_relative_eq!((m.d - 1.0) / m.c, 0.5 * diameter, max_relative = 1e-13);
    assert_relative_eq!((1.0 - m.a) / m.c, -0.5 * diameter, max_relative = 1e-13);
}
