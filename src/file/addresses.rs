//! Addresses that a file names in other places than where their numbers are written.

use super::context::{Context, nearest, shown};
use super::fields::Fields;
use super::parts::knows;
use crate::cavity::Slot;
use crate::diagnostic::Place;
use crate::quantity::{Kind, Spread};

impl Context<'_> {
    /// What to write in place of an address that there is not.
    pub fn instead_of(&self, address: &str) -> String {
        let book = self.book.borrow();
        let known = book.iter().map(|(_, entry)| entry.address.as_str());
        match nearest(address, known) {
            Some(near) => format!("did you mean {near}?"),
            None => {
                "an address is PART.key, such as M3.roc, or wavelength, temperature, pump".into()
            }
        }
    }

    /// The slot of a number that is to be `done` something with, such as "adjusted"; its own
    /// master, not tied.
    pub fn free_slot(&self, address: &str, place: &Place, done: &str) -> Option<Slot> {
        let found = self.book.borrow().find(address);
        if found.is_none() && self.may_exist(address) {
            return None;
        }
        if found.is_none() {
            let of_a_part = address.split_once('.').is_some_and(|(part, key)| {
                let kinds = self.kinds.borrow();
                kinds.get(part).is_some_and(|kind| knows(kind, key))
            });
            let (message, help) = if of_a_part {
                (
                    format!("the file writes no number at {address}"),
                    "write it in its part, with its spread".to_string(),
                )
            } else {
                (
                    format!("there is no quantity {}", shown(address)),
                    self.instead_of(address),
                )
            };
            self.report(Some(place.clone()), message, &help);
        } else if self.is_tied(address) {
            let book = self.book.borrow();
            let tie = book.ties().iter().find(|tie| Some(tie.target) == found);
            let help = tie.map_or("name the quantity that it follows".into(), |tie| {
                format!("name what it follows: its tie is \"{}\"", tie.text)
            });
            self.report(
                Some(place.clone()),
                format!("{address} follows a tie and cannot be {done} by itself"),
                &help,
            );
            return None;
        }
        found
    }
}

impl Fields<'_, '_> {
    /// The slot of a quantity with a spread.
    ///
    /// A spread that the command line has taken away is no mistake of the file's.
    pub fn spread_slot(&self, address: &str, place: &Place, done: &str) -> Option<Slot> {
        let slot = self.context.free_slot(address, place, done)?;
        let book = self.context.book.borrow();
        let entry = book.entry(slot);
        if entry.spread != Spread::Exact {
            return Some(slot);
        }
        let is_told = self.context.lost_general(entry.key);
        if self.context.overridden(address).is_none() && !is_told {
            let example = match entry.kind {
                Kind::Radius | Kind::Face if entry.value == 0.0 => "flat ± 0.003 1/m",
                Kind::Angle | Kind::SlabAngle => "8 deg ± 0.1 deg",
                Kind::Ratio | Kind::Loss => "98.5 % ± 0.1 %",
                Kind::Number => "1.605 ± 0.002",
                _ => "100 mm ± 0.5 mm",
            };
            self.report(
                Some(place.clone()),
                format!("{address} has no spread and cannot be {done}"),
                &format!("a spread stands behind the value, as in \"{example}\", or in `general`"),
            );
        }
        None
    }
}
