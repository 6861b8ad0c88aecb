//! Reading `--vary 'd3.length=18 mm..31 mm'`.
//!
//! Either end is read as the file's own value at that address would be, so that every rule of the
//! format holds for it and a mistake is shown where it was typed.

use std::ops::Range;

use super::Answer;
use super::input::{self, CavityText};
use crate::cavity::{Cavity, Origin};
use crate::file::{Changes, Setting};
use crate::quantity::{self, Spread};
use crate::study::sweep::Vary;

const OPTION: &str = "--vary";
const FORM: &str = "write it like --vary 'd3.length=18 mm..31 mm'";

/// A quantity and both ends of its range, as typed.
#[derive(Debug)]
pub(super) struct Typed<'t> {
    text: &'t str,
    ends: [Setting; 2],
}

impl<'t> Typed<'t> {
    /// Takes the text apart.
    pub(super) fn split(text: &'t str) -> Result<Typed<'t>, Answer> {
        let refuse = |message: &str| {
            let message = message.to_string();
            input::refuse_argument(OPTION, text, 0..text.len(), message, Some(FORM.into()))
        };
        let Some((address, range)) = text.split_once('=') else {
            return Err(refuse("a range needs an address, = and two values"));
        };
        let begin = address.len() + 1;
        let Some((first, last)) = range.split_once("..") else {
            return Err(refuse("a range has .. between its two values"));
        };
        let first_at = trimmed(first, begin);
        let last_at = trimmed(last, begin + first.len() + 2);
        let address_at = trimmed(address, 0);
        let value = |at: &Range<usize>| text.get(at.clone()).unwrap_or_default().to_string();
        let (first, last) = (value(&first_at), value(&last_at));
        if first.is_empty() || last.is_empty() {
            return Err(refuse("a range has a value on either side of its .."));
        }
        let name = value(&address_at);
        let setting = |value: String, value_at: Range<usize>| Setting {
            address: name.clone(),
            address_at: address_at.clone(),
            value,
            value_at,
        };
        Ok(Typed {
            text,
            ends: [
                setting(completed(&first, &last), first_at),
                setting(last, last_at),
            ],
        })
    }

    /// What is wrong with the address, or with the whole.
    pub(super) fn refuse_address(&self, message: String, help: Option<String>) -> Answer {
        let span = self.ends[0].address_at.clone();
        input::refuse_argument(OPTION, self.text, span, message, help)
    }

    /// What is wrong with both values.
    pub(super) fn refuse_range(&self, message: String, help: Option<String>) -> Answer {
        let span = self.ends[0].value_at.start..self.ends[1].value_at.end;
        input::refuse_argument(OPTION, self.text, span, message, help)
    }

    fn refuse_end(&self, end: usize, message: String, help: Option<String>) -> Answer {
        let span = self.ends[end].value_at.clone();
        input::refuse_argument(OPTION, self.text, span, message, help)
    }

    pub(super) fn address(&self) -> &str {
        &self.ends[0].address
    }
}

/// Where a piece of text stands without the blanks around it, given where it begins.
fn trimmed(piece: &str, begin: usize) -> Range<usize> {
    let start = begin + (piece.len() - piece.trim_start().len());
    start..start + piece.trim().len()
}

/// The first value with the unit and the sense of the last one, where it is a bare number.
fn completed(first: &str, last: &str) -> String {
    let behind = behind_number(last);
    match behind_number(first) {
        "" if !behind.is_empty() => format!("{first} {behind}"),
        unit => {
            let sense = ["convex", "concave"]
                .into_iter()
                .find(|sense| behind.ends_with(sense));
            let is_plain = !first.starts_with(['-', '−']) && unit.len() < first.len();
            match sense {
                Some(sense) if is_plain && !unit.contains("con") => format!("{first} {sense}"),
                _ => first.to_string(),
            }
        }
    }
}

/// What stands behind the number that a text begins with; the whole text where there is none.
fn behind_number(text: &str) -> &str {
    let is_digit = |c: char| c.is_ascii_digit() || c == '.' || c == '_';
    let unsigned = text.trim_start_matches(['-', '+', '−']);
    let rest = unsigned.trim_start_matches(is_digit);
    if rest.len() == unsigned.len() {
        return text;
    }
    // An exponent, but no unit that begins with e.
    let exponent = rest.strip_prefix(['e', 'E']).map(|rest| {
        let digits = rest.trim_start_matches(['-', '+']);
        let behind = digits.trim_start_matches(is_digit);
        (behind.len() < digits.len()).then_some(behind)
    });
    exponent.flatten().unwrap_or(rest).trim_start()
}

/// The cavity that is swept and its varied quantities.
///
/// It is the cavity as typed, with each quantity at the beginning of its range: so even what the
/// file says in another way (`"brewster"`) or not at all is there to be varied.
pub(super) fn read(
    text: &CavityText,
    changes: &Changes,
    typed: &[Typed<'_>],
) -> Result<(Cavity, Vec<Vary>), Answer> {
    let designed = text.load(changes)?.cavity;
    for one in typed {
        let book = designed.book();
        let slot = book.find(one.address());
        if let Some(tie) = slot.and_then(|slot| book.ties().iter().find(|tie| tie.target == slot)) {
            let first = tie.terms.first().map(|(_, slot)| book.entry(*slot));
            let help = first.map(|entry| format!("vary {}, which it follows", entry.address));
            let message = format!("{} is tied: {}", one.address(), tie.text);
            return Err(one.refuse_address(message, help));
        }
    }
    // The corners of what is swept: what the reader allows there it allows in between.
    let corners: &[&[usize]] = match typed.len() {
        1 => &[&[0], &[1]],
        _ => &[&[0, 0], &[1, 1], &[0, 1], &[1, 0]],
    };
    let mut cavities = Vec::with_capacity(corners.len());
    for corner in corners {
        let changed = typed
            .iter()
            .zip(*corner)
            .fold(changes.clone(), |changes, (one, end)| {
                changes.set_within(OPTION, one.text, &one.ends[*end])
            });
        cavities.push(text.load(&changed)?.cavity);
    }
    let shape = |cavity: &Cavity| format!("{:?}", cavity.parts());
    let [first, last, ..] = &cavities[..] else {
        return Err(Answer::fault("a sweep without ends".into()));
    };
    let mut vary = Vec::with_capacity(typed.len());
    for one in typed {
        let slot = first.book().find(one.address()).filter(|slot| {
            let entry = first.book().entry(*slot);
            entry.origin == Origin::Written && last.book().find(&entry.address) == Some(*slot)
        });
        let Some(slot) = slot else {
            return Err(one.refuse_address(
                format!("{} is no number that can be swept", one.address()),
                Some(FORM.into()),
            ));
        };
        let kind = first.book().entry(slot).kind;
        for (index, end) in one.ends.iter().enumerate() {
            let spread = quantity::parse(&end.value, kind).map(|read| read.spread);
            if spread.is_ok_and(|spread| spread != Spread::Exact) {
                return Err(one.refuse_end(
                    index,
                    "one value is asked for here, and this one has a spread".into(),
                    Some(FORM.into()),
                ));
            }
        }
        let same_way = shape(&designed) == shape(first);
        let nominal = designed
            .book()
            .find(one.address())
            .filter(|_| same_way)
            .map(|slot| designed.book().entry(slot))
            .filter(|entry| entry.origin == Origin::Written)
            .map(|entry| entry.value);
        vary.push(Vary {
            slot,
            from: slot.of(&first.book().nominal()),
            to: slot.of(&last.book().nominal()),
            nominal,
        });
    }
    if let Some(one) = typed.first()
        && shape(first) != shape(last)
    {
        return Err(one.refuse_range(
            "both ends of a range are written in the same way".into(),
            Some(FORM.into()),
        ));
    }
    Ok((cavities.swap_remove(0), vary))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_unit_may_stand_once_last() {
        for (first, last, whole) in [
            ("0", "20 1/m", "0 1/m"),
            ("1e-3", "2e-3 1/m", "1e-3 1/m"),
            ("18 mm", "31 mm", "18 mm"),
            ("18", "31mm", "18 mm"),
            ("1.4", "1.6", "1.4"),
            ("flat", "200 mm", "flat"),
            ("50", "200 mm convex", "50 mm convex"),
            ("50 mm", "200 mm convex", "50 mm convex"),
            ("50 mm concave", "200 mm convex", "50 mm concave"),
            ("-50 mm", "200 mm convex", "-50 mm"),
            ("flat", "200 mm convex", "flat"),
        ] {
            assert_eq!(completed(first, last), whole);
        }
    }
}
