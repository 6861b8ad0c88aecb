//! What a file may say already although nothing computes with it yet: its values are read and
//! checked, so that a file is right once and for all.

use std::collections::HashSet;

use super::context::shown;
use super::fields::Fields;
use super::keys::{Holds, POLARISATIONS, SOURCE};
use super::limits::read_order;
use super::parts::read_part;
use crate::cavity::{Cavity, Index, Part};
use crate::quantity::Kind;

/// Reads what the top level holds for later work.
pub(super) fn read_plain<'t>(fields: &Fields<'_, 't>, ambient: Index, path: &[Part]) {
    let context = fields.context;
    fields.text("title");
    fields.text("notes");
    fields.word("polarisation", &POLARISATIONS);
    if let Some(found) = fields.find("highest_order")
        && read_order(&found.raw).is_none()
    {
        context.report(
            Some(found.place),
            "`highest_order` is a whole number from 1 to 100",
            "write it like highest_order = 12",
        );
    }
    if let Some(frequencies) = fields.list("sidebands", "write it like sidebands = [\"12 MHz\"]") {
        for frequency in frequencies {
            context.quantity("sidebands", &context.found(frequency), Kind::Frequency);
        }
    }
    if let Some((table, span)) = fields.table(
        "source",
        "write it like { waist = \"350 um\", at = \"-600 mm\" }",
    ) {
        let source = Fields::new(context, table, span)
            .owned_by("source")
            .knowing(&SOURCE);
        source.refuse_unknown("a source", |_| None);
        for key in SOURCE {
            match key.holds {
                Holds::Quantity(_) => drop(source.slot(key.name)),
                _ => drop(source.text(key.name)),
            }
        }
    }
    if let Some(feed) = fields.list("feed", "list the optics between source and input mirror") {
        let mut taken: HashSet<String> = path.iter().map(|part| part.name.clone()).collect();
        for value in feed {
            let Some(part) = read_part(context, value, None, ambient, None) else {
                continue;
            };
            if let Some(name) = taken.replace(part.name) {
                context.report(
                    Some(context.place(value.span())),
                    format!("two parts are named \"{name}\""),
                    "give every part a name of its own, in the feed and in the path",
                );
            }
        }
    }
}

/// Checks that the input mirror exists and is a mirror.
pub(super) fn check_input(fields: &Fields<'_, '_>, cavity: &Cavity) {
    let Some((name, place)) = fields.text("input") else {
        return;
    };
    let part = cavity.parts().iter().find(|part| part.name == name);
    if part.is_none_or(|part| part.kind() != "mirror") {
        fields.report(
            Some(place),
            format!("no mirror is named \"{}\"", shown(&name)),
            "`input` names the mirror by which the source enters",
        );
    }
}
