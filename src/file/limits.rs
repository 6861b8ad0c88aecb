//! Limits: what must hold for the build to be good.

use toml::Spanned;
use toml::de::DeValue;

use super::context::{Context, Raw, kind_of};
use super::fields::Fields;
use super::keys::LIMIT;
use crate::cavity::{Bounds, Cavity, Limit, Measure, Presence};
use crate::quantity::Kind;

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
                "a limit must be a table, and this is {}",
                kind_of(value.get_ref())
            ),
            FORM,
        );
        return None;
    };
    let fields = Fields::new(context, table, value.span()).knowing(&LIMIT);
    fields.refuse_unknown("a limit", |_| None);
    let Some((name, place)) = fields.text("of") else {
        if !fields.has("of") {
            context.report(
                Some(fields.place.clone()),
                "a limit needs `of`, its measure",
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
    let kind = match measure.presence() {
        Presence::Number => Kind::Number,
        Presence::Length => Kind::Length,
        Presence::Position => Kind::Position,
        Presence::Angle => Kind::Angle,
        Presence::Frequency => Kind::Frequency,
    };
    let bounds = read_bounds(&fields, kind)?;
    Some(Limit {
        name,
        measure,
        bounds,
    })
}

/// A whole number of a transverse order.
pub(super) fn read_order(raw: &Raw<'_>) -> Option<usize> {
    match raw {
        Raw::Number(n) if n.fract() == 0.0 && (1.0..=100.0).contains(n) => Some(*n as usize),
        _ => None,
    }
}

fn read_bounds(fields: &Fields<'_, '_>, kind: Kind) -> Option<Bounds> {
    let given: Vec<&str> = ["above", "below", "between"]
        .into_iter()
        .filter(|key| fields.has(key))
        .collect();
    let [key] = given[..] else {
        fields.report(
            Some(fields.place.clone()),
            "a limit has exactly one of `above`, `below` and `between`",
            FORM,
        );
        return None;
    };
    if key != "between" {
        let found = fields.find(key)?;
        let value = fields.context.quantity(key, &found, kind)?.value.number()?;
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
            fields
                .context
                .quantity("between", &found, kind)?
                .value
                .number()
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
