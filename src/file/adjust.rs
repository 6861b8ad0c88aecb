//! `tolerance.adjust`: what is set once the parts are there, and the measure it is set by.

use std::collections::HashSet;

use super::context::{Raw, example};
use super::fields::Fields;
use super::keys::ADJUST;
use super::limits::measure_kind;
use super::tolerance::tables;
use crate::cavity::{Adjust, Cavity, Entry, Measure, Slot};
use crate::quantity::{Kind, Spread, human};

const FORM: &str = "write it like adjust = [ { set = \"d3.length\", travel = \"1 mm\", hold = \
                    \"margin.tangential\" } ], with `to` where it is not the nominal value";

/// Reads the adjustments; without a cavity, all but their measures.
pub(super) fn read_adjust(tolerance: &Fields<'_, '_>, cavity: Option<&Cavity>) -> Vec<Adjust> {
    let mut taken = HashSet::new();
    let mut held = Vec::new();
    let mut found = Vec::new();
    for fields in tables(tolerance, "adjust", FORM, &ADJUST) {
        fields.refuse_unknown("an adjustment", |key| match key {
            "quantity" | "move" | "address" => Some("the quantity that is moved is `set`"),
            "measure" | "of" | "keep" | "target" => Some("the measure that is held is `hold`"),
            "range" | "within" | "by" | "reach" => {
                Some("how far it moves to either side is `travel`")
            }
            "at" | "value" => Some("where the measure is held is `to`"),
            _ => None,
        });
        let set = read_set(&fields, &mut taken);
        let travel = set.and_then(|set| read_travel(&fields, set));
        if set.is_none() {
            need(&fields, "travel");
        }
        let hold = read_hold(&fields, cavity, &mut held);
        let Some((hold, hold_name)) = hold else {
            continue;
        };
        let to = match fields.find("to") {
            Some(_) => match read_to(&fields, hold) {
                Some(to) => Some(to),
                None => continue,
            },
            None => None,
        };
        if let (Some(set), Some(travel)) = (set, travel) {
            found.push(Adjust {
                set,
                travel,
                hold,
                hold_name,
                to,
            });
        }
    }
    found
}

/// Reports a key that must be there.
fn need(fields: &Fields<'_, '_>, key: &str) -> Option<()> {
    if fields.has(key) {
        return Some(());
    }
    let what = match key {
        "set" => "the quantity that is moved",
        "hold" => "the measure that is held",
        _ => "how far the quantity moves to either side",
    };
    fields.must_have(
        &[key],
        Some(fields.place.clone()),
        format!("an adjustment needs `{key}`, {what}"),
        FORM,
    );
    None
}

fn read_set(fields: &Fields<'_, '_>, taken: &mut HashSet<Slot>) -> Option<Slot> {
    need(fields, "set")?;
    let (address, place) = fields.text("set")?;
    let slot = fields.context.free_slot(&address, &place, "adjusted")?;
    let kind = fields.context.book.borrow().entry(slot).kind;
    if kind.is_reciprocal() || matches!(kind, Kind::Loss | Kind::Damage) {
        fields.report(
            Some(place),
            format!("{address} is {}, and nothing adjusts that", kind.phrase()),
            "adjust what can be moved or set, such as a length, an angle, a temperature or the \
             pump",
        );
        return None;
    }
    if !taken.insert(slot) {
        fields.report(
            Some(place),
            format!("{address} is adjusted twice"),
            "a quantity can hold one measure only; adjust another one for the second",
        );
        return None;
    }
    Some(slot)
}

fn read_travel(fields: &Fields<'_, '_>, set: Slot) -> Option<f64> {
    need(fields, "travel")?;
    let book = fields.context.book.borrow();
    let Entry {
        address,
        kind,
        value,
        ..
    } = book.entry(set);
    let found = fields.find("travel")?;
    let in_celsius =
        |text: &str| *kind == Kind::Temperature && text.trim_end().ends_with(['C', '℃']);
    if let Raw::Text(text, _) = &found.raw
        && in_celsius(text)
    {
        fields.report(
            Some(found.place),
            "`travel` is a difference of temperatures",
            "write it in kelvin, as in travel = \"5 K\"",
        );
        return None;
    }
    let kind_of_travel = match kind {
        Kind::Position => Kind::Length,
        Kind::SlabAngle => Kind::Angle,
        other => *other,
    };
    let place = Some(found.place.clone());
    let quantity = fields.context.quantity("travel", &found, kind_of_travel)?;
    let travel = quantity.value.number()?;
    if quantity.spread != Spread::Exact {
        fields.report(
            place,
            "`travel` has no spread",
            "write one number; it counts to either side",
        );
        return None;
    }
    if travel <= 0.0 {
        fields.report(
            place,
            format!("`travel` lies above zero, and this is {}", quantity.text),
            &format!(
                "it counts to either side: travel = {}",
                example("travel", kind_of_travel)
            ),
        );
        return None;
    }
    let reaches = |what: &str| {
        fields.report(
            place.clone(),
            format!(
                "this travel would take {address}, now {}, {what}",
                human(*value, *kind, 5)
            ),
            "write a shorter travel; it counts to either side",
        );
    };
    if kind.is_never_negative() && value - travel < 0.0 {
        reaches("below zero");
        return None;
    }
    if *kind == Kind::Ratio && value + travel > 1.0 {
        reaches("above 100 %");
        return None;
    }
    Some(travel)
}

fn read_hold(
    fields: &Fields<'_, '_>,
    cavity: Option<&Cavity>,
    held: &mut Vec<Measure>,
) -> Option<(Measure, String)> {
    need(fields, "hold")?;
    let (name, place) = fields.text("hold")?;
    let measure = match Measure::parse(&name, cavity?) {
        Ok(measure) => measure,
        Err(error) => {
            fields.report(Some(place), error.message, &error.help);
            return None;
        }
    };
    if held.contains(&measure) {
        fields.report(
            Some(place),
            format!("{name} is held by another adjustment already"),
            "every adjustment holds a measure of its own",
        );
        return None;
    }
    held.push(measure);
    Some((measure, name))
}

fn read_to(fields: &Fields<'_, '_>, hold: Measure) -> Option<f64> {
    let found = fields.find("to")?;
    let to = fields.context.quantity("to", &found, measure_kind(hold))?;
    if to.spread != Spread::Exact {
        fields.report(
            Some(found.place),
            "`to` has no spread",
            "write the one value that the measure is to have",
        );
        return None;
    }
    to.value.number()
}
