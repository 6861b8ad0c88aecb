//! What holds for every material.

use super::*;
use approx::{assert_abs_diff_eq, assert_relative_eq};

fn every_axis() -> impl Iterator<Item = (&'static str, &'static Axis)> {
    all().flat_map(|material| material.axes.iter().map(|axis| (material.name, axis)))
}

/// Wavelengths across an axis' range, in metres.
fn across(axis: &Axis) -> impl Iterator<Item = f64> {
    let Interval { low, high } = axis.wavelength;
    (1..20).map(move |k| low * (high / low).powf(f64::from(k) / 20.0))
}

#[test]
fn derivatives_are_those_of_the_index() {
    for (_, axis) in every_axis() {
        let t = axis.temperature;
        for l in across(axis) {
            let h = 1e-4 * l;
            let [below, at, above] = [l - h, l, l + h].map(|x| axis.index(x, t));
            let slope = (above - below) / (2.0 * h);
            // The difference itself is good to h² times the third derivative.
            assert_relative_eq!(axis.group_index(l, t), at - l * slope, max_relative = 1e-6);
            let curvature = (axis.slope(l + h, t) - axis.slope(l - h, t)) / (2.0 * h);
            let light = 299_792_458.0_f64;
            let expected = l.powi(3) / (std::f64::consts::TAU * light * light) * curvature;
            assert_relative_eq!(
                axis.group_velocity_dispersion(l, t),
                expected,
                max_relative = 1e-4,
                epsilon = 1e-30
            );
        }
    }
}

#[test]
fn at_the_temperature_of_the_data_the_index_is_the_published_one() {
    for (_, axis) in every_axis() {
        for l in across(axis) {
            let t = axis.temperature;
            let ratio = axis.index(l, t) / axis.published(l);
            let expected = match axis.medium {
                Medium::Vacuum => 1.0,
                Medium::Air => air::index(l, t, air::STANDARD_PRESSURE),
            };
            assert_relative_eq!(ratio, expected, max_relative = 1e-12);
        }
    }
}

#[test]
fn dn_dt_is_of_a_sane_size_wherever_it_is_claimed() {
    for (name, axis) in every_axis() {
        let Some(thermal) = axis.thermal else {
            continue;
        };
        for l in across(axis).filter(|&l| thermal.wavelength.contains(l)) {
            for share in [0.0, 0.5, 1.0] {
                let Interval { low, high } = thermal.temperature;
                let rate = axis.dn_dt(l, low + share * (high - low)).unwrap();
                assert!(rate.abs() < 8e-4, "{name} {} at {l}: {rate}", axis.name);
            }
        }
    }
}

#[test]
fn every_range_refuses_what_lies_outside_and_names_its_source() {
    for (_, axis) in every_axis() {
        let Interval { low, high } = axis.wavelength;
        assert_eq!(axis.check_wavelength(low), Ok(()));
        assert_eq!(axis.check_wavelength(high), Ok(()));
        for outside in [low * 0.9999, high * 1.0001, f64::NAN] {
            let said = axis.check(outside, axis.temperature).unwrap_err();
            assert!(said.to_string().contains(axis.source.authors));
        }
        let middle = low.midpoint(high);
        assert_eq!(axis.check(middle, axis.temperature), Ok(()));
        assert!(axis.check(middle, 1000.0).is_err());
    }
}

#[test]
fn laboratory_temperature_is_covered_at_nanometre_round_numbers() {
    for (name, axis) in every_axis() {
        let middle = axis.wavelength.low.midpoint(axis.wavelength.high);
        assert_eq!(axis.check(middle, 293.15), Ok(()), "{name}");
    }
    for name in ["LBO", "BBO", "KTP"] {
        for axis in find(name).unwrap().axes {
            assert_eq!(axis.check(1064e-9, 313.15), Ok(()), "{name}");
        }
    }
}

#[test]
fn messages_read_as_sentences() {
    let bbo = find("bbo").unwrap();
    assert_eq!(
        bbo.axis(None).unwrap_err().to_string(),
        "BBO is birefringent: name the axis the light is polarised along (o, e)"
    );
    assert_eq!(
        bbo.axis(Some("z")).unwrap_err().to_string(),
        "BBO has no axis \"z\"; its axes are o, e"
    );
    assert_eq!(
        find("YAG")
            .unwrap()
            .axis(Some("o"))
            .unwrap_err()
            .to_string(),
        "YAG is isotropic: it has no axis to name"
    );
    assert_eq!(
        find("N-BK8").unwrap_err().to_string(),
        "no material is known as \"N-BK8\"; near it are N-BK7"
    );
    assert_eq!(
        find("unobtainium").unwrap_err().to_string(),
        "no material is known as \"unobtainium\""
    );
    let e = bbo.axis(Some("Extraordinary")).unwrap();
    assert_eq!(
        e.check(6e-6, 293.15).unwrap_err().to_string(),
        "a wavelength of 6 µm lies outside 188 nm to 5.2 µm, the range of Tamošauskas et al., \
         Opt. Mater. Express 8, 1410 (2018)"
    );
    assert_eq!(
        e.check(1064e-9, 373.15).unwrap_err().to_string(),
        "dn/dT is known from 20 °C to 80 °C and from 400 nm to 1.1 µm (Eimerl et al., J. Appl. \
         Phys. 62, 1968 (1987)), which leaves out 100 °C"
    );
    let o = find("MgF2").unwrap().axis(Some("o")).unwrap();
    assert_eq!(
        o.check(1064e-9, 313.15).unwrap_err().to_string(),
        "the index is known at 19 °C (Dodge, Appl. Opt. 23, 1980 (1984)), and no dn/dT to reach \
         40 °C"
    );
}

#[test]
fn no_two_materials_answer_to_one_name() {
    for material in all() {
        for name in std::iter::once(&material.name).chain(material.aliases) {
            for written in [
                (*name).to_owned(),
                name.to_uppercase(),
                name.replace(' ', "-"),
            ] {
                assert_eq!(find(&written).unwrap().name, material.name, "{written}");
            }
        }
    }
}

#[test]
fn brewsters_angle_follows_the_index() {
    let silica = find("silica").unwrap().axis(None).unwrap();
    let angle: f64 = silica.brewster(800e-9, 293.15, 1.0);
    assert_abs_diff_eq!(angle.tan(), silica.index(800e-9, 293.15), epsilon = 1e-14);
}
