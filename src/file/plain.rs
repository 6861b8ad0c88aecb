//! What a file says of the whole cavity in plain words.

use super::fields::Fields;
use super::keys::POLARISATIONS;
use super::limits::read_order;
use crate::cavity::{Cavity, Polarisation};

/// What is said of the whole.
pub(super) struct Plain {
    title: Option<String>,
    polarisation: Polarisation,
    highest_order: Option<usize>,
}

/// Reads it.
pub(super) fn read_plain(fields: &Fields<'_, '_>) -> Plain {
    fields.text("notes");
    let highest_order = fields.find("highest_order").and_then(|found| {
        let order = read_order(&found.raw);
        if order.is_none() {
            fields.report(
                Some(found.place),
                "`highest_order` is a whole number from 1 to 100",
                "write it like highest_order = 12",
            );
        }
        order
    });
    Plain {
        title: fields.text("title").map(|(text, _)| text),
        polarisation: match fields.word("polarisation", &POLARISATIONS) {
            Some(1) => Polarisation::P,
            _ => Polarisation::S,
        },
        highest_order,
    }
}

impl Plain {
    /// Enters it into a cavity that has been put together.
    pub fn enter(self, cavity: &mut Cavity) {
        cavity.title = self.title;
        cavity.polarisation = self.polarisation;
        cavity.highest_order = self.highest_order.unwrap_or(cavity.highest_order);
    }
}
