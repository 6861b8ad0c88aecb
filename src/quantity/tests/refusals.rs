//! Texts that are refused, and what the refusals say.

use super::super::LONGEST;
use super::*;

#[test]
fn refusals_name_what_was_found_and_the_way_out() {
    use Kind::*;
    for (text, kind, message, help) in [
        (
            "100",
            Length,
            "\"100\" has no unit",
            "write \"100 mm\", with its unit",
        ),
        ("100 ± 1 %", Length, "has no unit", "\"100 mm\""),
        ("100 mm ± 0.5", Length, "\"0.5\" has no unit", "\"0.5 mm\""),
        (
            "5 MHz",
            Length,
            "a length is wanted here, and \"MHz\" is a frequency",
            "\"100 mm\"",
        ),
        (
            "300 mm",
            Curvature,
            "this is a dioptric power; a 300 mm lens is \"3.33 1/m\"",
            "3.33",
        ),
        ("2 1/m", Radius, "radius of \"500 mm\"", "500 mm"),
        ("2 dpt", Focal, "\"500 mm\"", "500 mm"),
        ("5 MM", Length, "\"MM\" is not a unit", "write mm"),
        ("5 micron", Length, "not a unit", "write um"),
        ("5 furlong", Length, "not a unit", "µm, nm or in"),
        ("100,5 mm", Length, "point", "write 100.5 for 100,5"),
        ("1,000 mm", Length, "thousands", "\"1000\" or \"1.000\""),
        ("1,000,000 mm", Length, "group", "\"1000000\""),
        ("100 200 mm", Length, "side by side", "together"),
        ("1'000 mm", Length, "not grouped", "together"),
        ("0 ± 0.1 1/m", Radius, "no curvature", "flat ± 0.003 1/m"),
        ("10 kHz ± 1 km", Frequency, "\"km\" is a length", "kHz"),
        ("8′", Angle, "degree or an inch", "arcmin, arcsec or in"),
        ("1\"", Length, "degree or an inch", "arcmin, arcsec or in"),
        ("", Length, "nothing is written", "\"100 mm\""),
        ("± 5 mm", Length, "nominal value is missing", "\"100 mm\""),
        ("inf", Radius, "flat", "\"flat\""),
        ("plano", Radius, "flat", "\"flat\""),
        ("inf mm", Length, "no value", "\"100 mm\""),
        ("NaN mm", Length, "\"NaN\"", "\"100 mm\""),
        ("1e400 m", Length, "beyond 1e30", "\"100 mm\""),
        ("1e-400 m", Length, "closer to zero", "\"100 mm\""),
        ("100 mm ± -1 mm", Length, "no sign", "± 0.5 mm"),
        ("5 mm ± 1 GHz", Length, "\"GHz\" is a frequency", "mm"),
        ("100 mm +0.2/+0.5 mm", Length, "same side", "+0.2/-0.5"),
        (
            "100 mm +0.2 mm",
            Length,
            "other side is missing",
            "+0.2/-0 mm",
        ),
        ("100 mm ±", Length, "missing", "±"),
        ("100.0(5) mm ± 1 mm", Length, "two spreads", "either"),
        ("1/2(1) in", Length, "last digit", "12.70(5)"),
        ("1/0 in", Length, "divide by 0", "0.5"),
        ("-5 mm", Length, "never negative", ""),
        ("1 mm ± 2 mm", Length, "1 mm below zero", "-0"),
        ("0 mm", Radius, "never zero", "\"flat\""),
        ("100 mm ± 100 %", Radius, "reach zero", ""),
        ("100 mm ± 100 mm convex", Radius, "reach zero", ""),
        ("-100 mm convex", Radius, "both tell", "positive"),
        ("100 mm", Face, "sense of this face is missing", "convex"),
        ("-100 mm", Face, "no sign", "convex"),
        ("100", Face, "no unit", "\"100 mm convex\""),
        ("100 mm convex", Length, "says nothing about a length", ""),
        ("flat convex", Radius, "a flat is not convex", "alone"),
        ("flat ± 1 mm", Radius, "curvature", "0.003 1/m"),
        ("flat ± 1 %", Radius, "curvature", "0.003 1/m"),
        ("100 mm convex ± 1 %", Radius, "left over", "stands last"),
        ("flat", Length, "does not begin with a number", "\"100 mm\""),
        ("brewster", Angle, "only a slab", "8 deg"),
        ("brewster ± 1 deg", SlabAngle, "stands alone", "brewster"),
        ("98.5", Ratio, "between 0 and 1", "\"98.5 %\""),
        ("120 %", Ratio, "between 0 and 1", ""),
        ("99.95 % ± 0.1 %", Ratio, "above 100 %", "\"> 99.85 %\""),
        (
            "0.985 ± 0.1 %",
            Ratio,
            "not clear",
            "\"0.985 %\" or \"98.5 %\"",
        ),
        ("> 120 %", Ratio, "between 0 and 1", ""),
        ("> 100 mm", Length, "no limit to the other side", "±"),
        ("> 0.1 %/cm", Loss, "no limit to the other side", "±"),
        ("0.1 %/cm ± 0.1 1/W", Loss, "\"1/W\"", "%"),
        ("20 °C ± 1 %", Temperature, "scale", "± 1 K"),
        ("-300 °C", Temperature, "absolute zero", ""),
        ("0 mm ± 1 %", Position, "share of zero", "unit"),
        (
            "1.45 mm",
            Number,
            "a plain number is wanted here",
            "\"1.45\"",
        ),
        (
            "5 W/cm2 ± 1 J/cm2",
            Damage,
            "not an energy per area",
            "same unit",
        ),
        ("1.064×10^-6 m", Length, "power of ten", "1.064e-6"),
        ("98–99 %", Ratio, "sign or a range", "±"),
    ] {
        let error = refusal(text, kind);
        assert!(error.message.contains(message), "{text}: {error}");
        let found = error.help.as_deref().unwrap_or_default();
        assert!(found.contains(help), "{text}: {error}");
        assert!(text.get(error.span.clone()).is_some(), "{text}: {error:?}");
    }
}

#[test]
fn spans_point_at_the_fault() {
    for (text, kind, piece) in [
        ("100 mm ± 5 MHz", Kind::Length, "5 MHz"),
        ("100 µm ± 5 furlong", Kind::Length, "furlong"),
        ("100 mm rest", Kind::Length, "rest"),
        (" 98.5 ", Kind::Ratio, "98.5"),
        ("1 mm ± 2 mm", Kind::Length, "± 2 mm"),
    ] {
        assert_eq!(&text[refusal(text, kind).span], piece, "{text}");
    }
}

#[test]
fn long_texts_are_refused_by_their_length() {
    let text = "1".repeat(LONGEST + 1);
    assert!(refusal(&text, Kind::Number).message.contains("200"));
    let text = "1".repeat(LONGEST);
    assert!(refusal(&text, Kind::Number).message.contains("1e30"));
}
