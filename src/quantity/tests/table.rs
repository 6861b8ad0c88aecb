//! Accepted texts and exactly what they mean.

use super::super::*;
use super::*;

const DEGREE: f64 = std::f64::consts::PI / 180.0;

#[test]
fn numbers_are_the_nearest_to_what_is_written() {
    use Kind::*;
    for (text, kind, number) in [
        ("100 mm", Length, 0.1),
        ("100mm", Length, 0.1),
        ("1064 nm", Length, 1064e-9),
        ("5 µm", Length, 5e-6),
        ("5 \u{3bc}m", Length, 5e-6),
        ("5 um", Length, 5e-6),
        ("4 km", Length, 4000.0),
        ("1/2 in", Length, 0.0127),
        ("-1/2 in", Position, -0.0127),
        ("1 1/2 in", Length, 0.0381),
        ("2.5 in", Length, 0.0635),
        ("1e-3 m", Length, 1e-3),
        (".5 mm", Length, 0.5e-3),
        ("\u{2212}600 mm", Position, -0.6),
        ("100\u{a0}mm", Length, 0.1),
        ("100\u{202f}mm", Length, 0.1),
        ("100\u{2009}mm", Length, 0.1),
        ("１００ ｍｍ", Length, 0.1),
        ("  100 mm  ", Length, 0.1),
        ("0 mm", Length, 0.0),
        ("100 mm concave", Radius, 0.1),
        ("100 mm convex", Radius, -0.1),
        ("-100 mm", Radius, -0.1),
        ("-75 mm", Focal, -0.075),
        ("8°", Angle, 8.0 * DEGREE),
        ("8 deg", SlabAngle, 8.0 * DEGREE),
        ("30 arcmin", Angle, 30.0 * (std::f64::consts::PI / 10_800.0)),
        ("50 urad", Angle, 50e-6),
        ("50 µrad", Angle, 50e-6),
        ("12 MHz", Frequency, 12e6),
        ("1.5 THz", Frequency, 1.5e12),
        ("10 W", Power, 10.0),
        ("3 mW", Power, 3e-3),
        ("2 MW", Power, 2e6),
        ("7 uJ", Energy, 7e-6),
        ("100 fs", Time, 100e-15),
        ("20 °C", Temperature, 293.15),
        ("20 degC", Temperature, 293.15),
        ("-273.15 °C", Temperature, 0.0),
        ("300 K", Temperature, 300.0),
        ("3.33 1/m", Curvature, 3.33),
        ("3.33 m^-1", Curvature, 3.33),
        ("-3.33 m⁻¹", Curvature, -3.33),
        ("3.33 dpt", Curvature, 3.33),
        ("2 1/km", Curvature, 0.002),
        ("5 1/m", Strength, 5.0),
        ("1e-4 1/W", PerWatt, 1e-4),
        ("1.605", Number, 1.605),
        ("-2", Number, -2.0),
        ("98.5 %", Ratio, 0.985),
        ("98.5%", Ratio, 0.985),
        ("50 ppm", Ratio, 50e-6),
        ("0.985", Ratio, 0.985),
        ("0.2 %", Loss, 0.002),
    ] {
        assert_eq!(
            read(text, kind),
            (Value::Scalar(number), Spread::Exact),
            "{text}"
        );
    }
}

#[test]
fn values_beyond_plain_numbers() {
    let exact = |text, kind| {
        let (value, spread) = read(text, kind);
        assert_eq!(spread, Spread::Exact);
        value
    };
    assert_eq!(exact("flat", Kind::Radius), Value::Flat);
    assert_eq!(exact("flat", Kind::Face), Value::Flat);
    assert_eq!(exact("brewster", Kind::SlabAngle), Value::Brewster);
    assert_eq!(exact("0.1 %/cm", Kind::Loss), Value::PerLength(0.1));
    assert_eq!(exact("0.1 %/m", Kind::Loss), Value::PerLength(0.001));
    assert_eq!(exact("2 1/cm", Kind::Loss), Value::PerLength(200.0));
    assert_eq!(exact("5e6 W/cm2", Kind::Damage), Value::Intensity(5e10));
    assert_eq!(exact("5 MW/cm²", Kind::Damage), Value::Intensity(5e10));
    assert_eq!(exact("10 J/cm²", Kind::Damage), Value::Fluence(1e5));
    let convex = Value::Face {
        radius: 0.0515,
        sense: Sense::Convex,
    };
    assert_eq!(exact("51.5 mm convex", Kind::Face), convex);
    assert_eq!(convex.curvature(), Some(1.0 / 0.0515));
    assert_eq!(Value::Flat.curvature(), Some(0.0));
    assert_eq!(Value::Scalar(-0.1).curvature(), Some(-10.0));
}

#[test]
fn spreads_in_all_spellings() {
    use Kind::*;
    for (text, kind, number, spread) in [
        ("100 mm ± 0.5 mm", Length, 0.1, either(5e-4)),
        ("100 mm +- 0.5 mm", Length, 0.1, either(5e-4)),
        ("100 mm +/- 0.5 mm", Length, 0.1, either(5e-4)),
        ("100mm±0.5mm", Length, 0.1, either(5e-4)),
        ("100 mm+-0.5 mm", Length, 0.1, either(5e-4)),
        ("100 mm +\u{2212} 0.5 mm", Length, 0.1, either(5e-4)),
        ("100 ± 0.5 mm", Length, 0.1, either(5e-4)),
        ("0 ± 50 urad", Angle, 0.0, either(50e-6)),
        ("100 mm ± 1 %", Length, 0.1, either(1e-3)),
        ("100 mm ± 500 ppm", Length, 0.1, either(5e-5)),
        ("100 mm +0.2/-0.5 mm", Length, 0.1, sides(5e-4, 2e-4)),
        ("100 mm +0.2 mm/-0.5 mm", Length, 0.1, sides(5e-4, 2e-4)),
        ("100 mm -0.5/+0.2 mm", Length, 0.1, sides(5e-4, 2e-4)),
        ("100 +0.2/-0.5 mm", Length, 0.1, sides(5e-4, 2e-4)),
        ("100 mm +2 % / -50 µm", Length, 0.1, sides(5e-5, 2e-3)),
        (
            "1 in +1/64/-1/32 in",
            Length,
            0.0254,
            sides(0.00079375, 0.000396875),
        ),
        ("100 mm ± 1 % convex", Radius, -0.1, either(1e-3)),
        (
            "100 mm +0.2/-0.5 mm convex",
            Radius,
            -0.1,
            sides(2e-4, 5e-4),
        ),
        ("-100 mm +0.2/-0.5 mm", Radius, -0.1, sides(5e-4, 2e-4)),
        ("1.605 ± 0.002", Number, 1.605, either(0.002)),
        ("1.605 ± 1 %", Number, 1.605, either(0.01605)),
        ("98.5 % ± 0.1 %", Ratio, 0.985, either(0.001)),
        ("98.5 ± 0.1 %", Ratio, 0.985, either(0.001)),
        ("0.985 ± 0.001", Ratio, 0.985, either(0.001)),
        ("0.1 % ± 50 ppm", Loss, 0.001, either(50e-6)),
        ("99.95 % ± 0.05 %", Ratio, 0.9995, either(0.0005)),
        ("> 99.9 %", Ratio, 0.9995, either(0.0005)),
        (">= 99.9 %", Ratio, 0.9995, either(0.0005)),
        ("≥99.9%", Ratio, 0.9995, either(0.0005)),
        ("< 0.1 %", Ratio, 0.0005, either(0.0005)),
        ("<= 0.1 %", Loss, 0.0005, either(0.0005)),
        ("20 ± 1 °C", Temperature, 293.15, either(1.0)),
        ("20 °C ± 1 K", Temperature, 293.15, either(1.0)),
        ("20 °C ± 1 degC", Temperature, 293.15, either(1.0)),
        ("3.33 ± 0.1 1/m", Curvature, 3.33, either(0.1)),
    ] {
        let (value, found) = read(text, kind);
        assert_eq!(value, Value::Scalar(number), "{text}");
        let close = match (spread, found) {
            (Spread::Limits { below, above }, Spread::Limits { below: b, above: a }) => {
                (below - b).abs() <= 1e-15 && (above - a).abs() <= 1e-15
            }
            _ => false,
        };
        assert!(close, "{text}: {found:?}");
    }
    assert_eq!(
        read("flat ± 0.003 1/m", Kind::Radius),
        (Value::Flat, either(0.003))
    );
    assert_eq!(
        read("0.1 ± 0.02 %/cm", Kind::Loss),
        (Value::PerLength(0.1), either(0.02))
    );
    assert_eq!(
        read("0.1 %/cm ± 10 %", Kind::Loss),
        (Value::PerLength(0.1), either(0.01))
    );
    assert_eq!(read("50 mm ± 1 % concave", Kind::Face).1, either(0.0005),);
}

/// The forms of JCGM 100:2008, 7.2.2, there "m_S = 100.021 47(35) g" and
/// "m_S = 100.021 47(0.000 35) g", with a unit of ours.
#[test]
fn concise_standard_uncertainties() {
    use Kind::*;
    for (text, kind, number, uncertainty) in [
        ("100.02147(35) mm", Length, 0.10002147, 0.35e-6),
        ("100.02147(0.00035) mm", Length, 0.10002147, 0.35e-6),
        ("100.02(5) mm", Length, 0.10002, 5e-5),
        ("100(5) mm", Length, 0.1, 5e-3),
        ("1.605(12)", Number, 1.605, 0.012),
        ("1.064(1)e-6 m", Length, 1.064e-6, 1e-9),
        ("20.0(5) °C", Temperature, 293.15, 0.5),
        ("98.50(5) %", Ratio, 0.985, 5e-4),
        ("100.0(5) mm convex", Radius, -0.1, 5e-4),
    ] {
        assert_eq!(
            read(text, kind),
            (Value::Scalar(number), standard(uncertainty)),
            "{text}"
        );
    }
}

#[test]
fn bare_numbers_are_right_where_no_unit_belongs() {
    let index = from_number(1.45, Kind::Number).map(|q| (q.value, q.text));
    assert_eq!(index, Ok((Value::Scalar(1.45), "1.45".to_owned())));
    assert!(from_number(0.985, Kind::Ratio).is_ok());
    assert!(from_number(0.01, Kind::Loss).is_ok());
    let help = |number, kind| from_number(number, kind).err().and_then(|e| e.help);
    let write = |text: &str| Some(format!("write {text}"));
    assert_eq!(
        help(100.0, Kind::Length),
        write("\"100 mm\", with its unit")
    );
    assert_eq!(
        help(98.5, Kind::Ratio),
        write("\"98.5 %\" if that is meant")
    );
    assert!(from_number(f64::NAN, Kind::Number).is_err());
    assert!(from_number(f64::INFINITY, Kind::Number).is_err());
}

#[test]
fn general_tolerances() {
    let about = |text: &str, kind, value| {
        parse_general(text, kind).and_then(|general| general.about(value, kind))
    };
    let length = Value::Scalar(0.1);
    assert_eq!(about("0.2 mm", Kind::Length, length), Ok(either(2e-4)));
    assert_eq!(about("± 0.2 mm", Kind::Length, length), Ok(either(2e-4)));
    assert_eq!(about("1 %", Kind::Radius, length), Ok(either(1e-3)));
    assert_eq!(about("1 %", Kind::Radius, Value::Flat), Ok(Spread::Exact));
    assert_eq!(
        about("+0.1/-0.2 mm", Kind::Radius, Value::Scalar(-0.1)),
        Ok(sides(1e-4, 2e-4))
    );
    assert_eq!(
        about("0.1 %", Kind::Ratio, Value::Scalar(0.9)),
        Ok(either(0.001))
    );
    assert_eq!(
        about("1 K", Kind::Temperature, Value::Scalar(293.15)),
        Ok(either(1.0))
    );
    assert!(about("1 %", Kind::Temperature, Value::Scalar(293.15)).is_err());
    assert!(about("200 mm", Kind::Length, length).is_err());
    assert!(about("0.2", Kind::Length, length).is_err());
    assert!(about("5 MHz", Kind::Length, length).is_err());
}

#[test]
fn quantities_print_as_a_reader_expects() {
    use Kind::*;
    for (text, kind, printed) in [
        ("100 ± 0.5 mm", Length, "100 mm ± 0.5 mm"),
        ("0.1 m ± 1 % convex", Radius, "100 mm ± 1 mm convex"),
        ("-0.1 m +1 mm/-2 mm", Radius, "100 mm +2 mm/-1 mm convex"),
        ("1/2 in", Length, "12.7 mm"),
        ("0 ± 50 urad", Angle, "0 µrad ± 50 µrad"),
        ("8 deg", Angle, "8°"),
        ("20 ± 1 degC", Temperature, "20 °C ± 1 K"),
        ("> 99.9 %", Ratio, "99.95 % ± 0.05 %"),
        ("100.02(5) mm", Length, "100.02(5) mm"),
        ("100(5) mm", Length, "100(5) mm"),
        ("1.605(12)", Number, "1.605(12)"),
        ("flat ± 0.003 1/m", Radius, "flat ± 0.003 1/m"),
        ("0.1 %/cm", Loss, "0.1 %/cm"),
        ("10 J/cm2", Damage, "10 J/cm²"),
        ("brewster", SlabAngle, "brewster"),
    ] {
        let shown = parse(text, kind).map(|quantity| show(&quantity, kind));
        assert_eq!(shown.as_deref(), Ok(printed), "{text}");
    }
}
