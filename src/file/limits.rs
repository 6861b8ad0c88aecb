//! Limits: what must hold for the build to be good.

use toml::Spanned;
use toml::de::DeValue;

use super::context::{Context, Raw, kind_of};
use super::fields::Fields;
use super::keys::LIMIT;
use crate::cavity::{Bounds, Cavity, Limit, Measure, Presence};
use crate::diagnostic::Place;
use crate::quantity::{Kind, Quantity, Spread};

const FORM: &str = "write it like { of = \"M1.spot\", above = \"150 um\" }, with above, below or \
                    between";

/// Reads one limit against a cavity that has been put together.
pub(super) fn read_limit<'t>(
    context: &Context<'t>,
    value: &'t Spanned<DeValue<'t>>,
    cavity: &Cavity,
) -> Option<Limit> {
    let place = context.place(value.span());
    let DeValue::Table(table) = value.get_ref() else {
        context.report(
            Some(place),
            format!(
                "a limit is a table, and this is {}",
                kind_of(value.get_ref())
            ),
            FORM,
        );
        return None;
    };
    let fields = Fields::new(context, table, value.span()).knowing(&LIMIT);
    fields.refuse_unknown("a limit", |key| match key {
        "min" | "minimum" | "least" | "at_least" => Some("a lower bound is `above`"),
        "max" | "maximum" | "most" | "at_most" => Some("an upper bound is `below`"),
        "range" | "within" | "in" => Some("two bounds are `between`"),
        "measure" | "name" | "quantity" => Some("the measure is named by `of`"),
        _ => None,
    });
    let Some((name, place)) = fields.text("of") else {
        if !fields.has("of") {
            fields.must_have(
                &["of"],
                Some(fields.place.clone()),
                "a limit needs `of`, its measure".into(),
                FORM,
            );
        }
        return None;
    };
    let mut measure = match Measure::parse(&name, cavity) {
        Ok(measure) => measure,
        Err(error) => {
            context.report(Some(place), error.message, &error.help);
            return None;
        }
    };
    if let Some(found) = fields.find("up_to") {
        match (&mut measure, read_order(&found.raw)) {
            (Measure::ModeClearance { up_to }, Some(order)) => *up_to = order,
            (Measure::ModeClearance { .. }, None) => context.report(
                Some(found.place),
                "`up_to` must be a whole number from 1 to 100",
                "it is the highest order m + n that counts, such as up_to = 6",
            ),
            _ => context.report(
                Some(found.place),
                "`up_to` belongs to mode_clearance only",
                "leave it out",
            ),
        }
    }
    let bounds = read_bounds(&fields, measure_kind(measure))?;
    Some(Limit {
        name,
        measure,
        bounds,
    })
}

/// How the value of a measure is written.
pub(super) fn measure_kind(measure: Measure) -> Kind {
    match measure.presence() {
        Presence::Number => Kind::Number,
        Presence::Length => Kind::Length,
        Presence::Position => Kind::Position,
        Presence::Angle => Kind::Angle,
        Presence::Frequency | Presence::Offset => Kind::Frequency,
        Presence::Time => Kind::Time,
    }
}

/// A whole number of a transverse order.
pub(super) fn read_order(raw: &Raw<'_>) -> Option<usize> {
    match raw {
        Raw::Number(n) if n.fract() == 0.0 && (1.0..=100.0).contains(n) => Some(*n as usize),
        _ => None,
    }
}

/// A bound, which is one number.
fn exact(fields: &Fields<'_, '_>, bound: Quantity, place: Place) -> Option<f64> {
    if bound.spread != Spread::Exact {
        fields.report(
            Some(place),
            "a bound has no spread",
            "write one number, or between = [\"28 um\", \"36 um\"]",
        );
        return None;
    }
    bound.value.number()
}

fn read_bounds(fields: &Fields<'_, '_>, kind: Kind) -> Option<Bounds> {
    let given: Vec<&str> = ["above", "below", "between"]
        .into_iter()
        .filter(|key| fields.has(key))
        .collect();
    let [key] = given[..] else {
        fields.must_have(
            &["above", "below", "between"],
            Some(fields.place.clone()),
            "a limit has exactly one of `above`, `below` and `between`".into(),
            FORM,
        );
        return None;
    };
    if key != "between" {
        let found = fields.find(key)?;
        let bound = fields.context.quantity(key, &found, kind)?;
        let value = exact(fields, bound, found.place)?;
        return Some(if key == "above" {
            Bounds::Above(value)
        } else {
            Bounds::Below(value)
        });
    }
    let advice = "write it like between = [\"28 um\", \"36 um\"]";
    let items = fields.list("between", advice)?;
    let values: Option<Vec<f64>> = items
        .iter()
        .map(|item| {
            let found = fields.context.found(item);
            if let Raw::Other(_) = found.raw {
                fields.report(Some(found.place), "a bound must be a quantity", advice);
                return None;
            }
            let bound = fields.context.quantity("between", &found, kind)?;
            exact(fields, bound, found.place)
        })
        .collect();
    match values?[..] {
        [low, high] if low <= high => Some(Bounds::Between(low, high)),
        [_, _] => {
            fields.report(
                Some(fields.place_of("between")),
                "the lower bound of `between` comes first",
                "exchange the two bounds",
            );
            None
        }
        _ => {
            fields.report(
                Some(fields.place_of("between")),
                "`between` has two bounds",
                advice,
            );
            None
        }
    }
}
