//! What holds for every quantity and every text.

use proptest::prelude::*;

use super::super::settle::settle;
use super::super::*;
use super::{either, sides, standard};

fn any_kind() -> impl Strategy<Value = Kind> {
    prop::sample::select(Kind::ALL.to_vec())
}

/// Magnitudes as they are written, and bit patterns as computations leave them.
fn magnitude() -> impl Strategy<Value = f64> {
    prop_oneof![
        Just(0.0),
        (1..100_000_i32, -12..6_i32)
            .prop_map(|(digits, power)| format!("{digits}e{power}").parse().unwrap_or(1.0)),
        (-20.0..20.0_f64).prop_map(|power| 10_f64.powf(power)),
        (-4.0..4.0_f64).prop_map(|power| 10_f64.powf(power)),
        0.0..1.0_f64,
    ]
    .prop_filter("in the range of quantities", |x| *x == 0.0 || *x >= 1e-30)
}

fn any_quantity() -> impl Strategy<Value = (Kind, Quantity)> {
    let spread = prop_oneof![
        Just(Spread::Exact),
        (magnitude(), 1e-6..0.3_f64).prop_map(|(x, share)| either(x * share)),
        (magnitude(), magnitude()).prop_map(|(below, above)| sides(below, above)),
        magnitude().prop_map(standard),
    ];
    (any_kind(), 0..3_u8, any::<bool>(), magnitude(), spread).prop_filter_map(
        "possible",
        |(kind, variant, is_negative, x, spread)| {
            let signed = if is_negative && x != 0.0 { -x } else { x };
            let in_range = |x: f64| x == 0.0 || x >= 1e-30;
            let is_readable = match spread {
                Spread::Limits { below, above } => in_range(below) && in_range(above),
                _ => true,
            };
            let value = match (kind, variant) {
                (Kind::Radius | Kind::Face, 0) => Value::Flat,
                (Kind::SlabAngle, 0) => Value::Brewster,
                (Kind::Loss, 0) => Value::PerLength(x),
                (Kind::Damage, 0) => Value::Intensity(x),
                (Kind::Damage, _) => Value::Fluence(x),
                (Kind::Face, 1) => Value::Face {
                    radius: x,
                    sense: Sense::Convex,
                },
                (Kind::Face, _) => Value::Face {
                    radius: x,
                    sense: Sense::Concave,
                },
                _ => Value::Scalar(signed),
            };
            let spread = match (value, spread) {
                (Value::Brewster, _) | (Value::Flat, Spread::Standard { .. }) => Spread::Exact,
                (_, spread) => spread,
            };
            let spread = settle(value, spread, kind).ok().filter(|_| is_readable)?;
            Some((
                kind,
                Quantity {
                    value,
                    spread,
                    text: String::new(),
                },
            ))
        },
    )
}

/// Whatever is read is finite.
fn is_sound(quantity: &Quantity) -> bool {
    let is_distance = |x: f64| x.is_finite() && x >= 0.0;
    let spread = match quantity.spread {
        Spread::Exact => true,
        Spread::Limits { below, above } => is_distance(below) && is_distance(above),
        Spread::Standard { uncertainty } => is_distance(uncertainty),
    };
    spread && quantity.value.number().is_none_or(f64::is_finite)
}

fn judge(text: &str, kind: Kind) -> Result<(), TestCaseError> {
    match parse(text, kind) {
        Ok(quantity) => {
            prop_assert!(is_sound(&quantity), "{text}: {quantity:?}");
            let shown = show(&quantity, kind);
            let again = parse(&shown, kind).map(|q| (q.value, q.spread));
            prop_assert_eq!(again, Ok((quantity.value, quantity.spread)), "{}", shown);
        }
        Err(error) => {
            prop_assert!(text.get(error.span.clone()).is_some(), "{text}: {error:?}");
            prop_assert!(!error.message.chars().any(char::is_control));
            let help = error.help.unwrap_or_default();
            prop_assert!(!help.chars().any(char::is_control), "{help:?}");
        }
    }
    if let Err(error) = parse_general(text, kind) {
        prop_assert!(text.get(error.span).is_some());
    }
    Ok(())
}

const FRAGMENTS: &[&str] = &[
    "100",
    "0",
    "1/2",
    "1 1/2",
    "0.5",
    "1e-3",
    "1e400",
    "1e-400",
    "9999999999999999999999",
    "99.95",
    "(5)",
    "(0.05)",
    "(",
    ")",
    "mm",
    "m",
    "µm",
    "in",
    "deg",
    "°",
    "°C",
    "K",
    "1/m",
    "%",
    "ppm",
    "%/cm",
    "1/cm",
    "MHz",
    "W",
    "W/cm2",
    "J/cm²",
    "m^-1",
    "±",
    "+-",
    "+/-",
    "+",
    "-",
    "/",
    "+0.2",
    "-0.5",
    "/-0.5",
    "±0.5",
    " ",
    " ",
    " ",
    "\u{a0}",
    "\u{2212}",
    "convex",
    "concave",
    "flat",
    "brewster",
    "inf",
    "NaN",
    ">",
    "<",
    ">=",
    "≤",
    ",",
    ".",
    "e",
    "′",
    "１",
    "\n",
    "\0",
];

proptest! {
    #![proptest_config(ProptestConfig::with_cases(2000))]

    #[test]
    fn what_is_printed_reads_back_exactly((kind, quantity) in any_quantity()) {
        let shown = show(&quantity, kind);
        let again = parse(&shown, kind).map(|q| (q.value, q.spread));
        prop_assert_eq!(again, Ok((quantity.value, quantity.spread)), "{}", shown);
    }

    #[test]
    fn any_text_is_read_or_refused(text in any::<String>(), kind in any_kind()) {
        judge(&text, kind)?;
    }

    #[test]
    fn any_mix_of_fragments_is_read_or_refused(
        fragments in prop::collection::vec(prop::sample::select(FRAGMENTS), 0..9),
        kind in any_kind(),
    ) {
        judge(&fragments.concat(), kind)?;
    }

    #[test]
    fn likely_mixes_are_read_or_refused(
        parts in (
            prop::sample::select(&["", "-", "> ", "< "][..]),
            prop::sample::select(&["100", "0.5", "1/2", "12.5(3)", "0", "flat", "3e-4"][..]),
            prop::sample::select(&["", " mm", " deg", " degC", " %", " 1/m", " %/cm", " J/cm2", " W"][..]),
            prop::sample::select(&["", " ± 1 %", " ± 0.1", " +0.2/-0.1", " ± 0.3"][..]),
            prop::sample::select(&["", " mm", " deg", " K", " %", " 1/m", " %/cm", " J/cm2", " W"][..]),
            prop::sample::select(&["", " convex", " concave"][..]),
        ),
        kind in any_kind(),
    ) {
        let (sign, number, unit, spread, last, sense) = parts;
        judge(&format!("{sign}{number}{unit}{spread}{last}{sense}"), kind)?;
    }

    #[test]
    fn whatever_is_told_to_readers_is_finite(value in any::<f64>(), kind in any_kind(), digits in 0..30_usize) {
        let texts = [
            human(value, kind, digits),
            deviation(value, kind, digits),
            in_unit(value, unit_for(kind, value), digits),
        ];
        for text in texts {
            prop_assert!(!text.contains("inf") && !text.contains("NaN"), "{text}");
        }
    }

    #[test]
    fn bare_numbers_never_panic(number in any::<f64>(), kind in any_kind()) {
        if let Ok(quantity) = from_number(number, kind) {
            prop_assert!(is_sound(&quantity));
        }
    }
}
