//! Ties: "d5.length = 146.68 mm - d2.length".

use super::context::{Context, nearest, shown};
use super::reach::{GREATEST_INDEX, number_beyond};
use crate::cavity::{Book, Slot, Tie};
use crate::diagnostic::Place;
use crate::quantity::{self, Kind, Spread, human};

/// A tie as written, split into its sides.
pub(super) struct Written {
    pub target: String,
    terms: Vec<Term>,
    text: String,
    /// Place of the whole text.
    place: Place,
    /// Offset of the text within its place; none where escapes hide it.
    offset: Option<usize>,
}

struct Term {
    sign: f64,
    text: String,
    /// Byte at which it begins in the tie's text.
    at: usize,
}

const FORM: &str = "write it like \"d5.length = 146.68 mm - d2.length\" or \
                    \"d4.length = 0.5 * d3.length\", with spaces around + and -";

/// Splits a tie at its signs; a sign stands between spaces, or first.
pub(super) fn split(
    context: &Context<'_>,
    text: &str,
    place: Place,
    offset: Option<usize>,
) -> Option<Written> {
    let Some((target, sum)) = text.split_once('=') else {
        context.report(Some(place), "a tie says what follows what, with a =", FORM);
        return None;
    };
    let start = target.len() + 1;
    let mut terms = Vec::new();
    let mut sign = 1.0;
    let mut from = 0;
    let bytes = sum.as_bytes();
    let mut push = |from: usize, to: usize, sign: f64| {
        let piece = &sum[from..to];
        let trimmed = piece.trim();
        if !trimmed.is_empty() {
            terms.push(Term {
                sign,
                text: trimmed.to_string(),
                at: start + from + (piece.len() - piece.trim_start().len()),
            });
        }
    };
    for (i, byte) in bytes.iter().enumerate() {
        let is_sign = matches!(byte, b'+' | b'-');
        let opens = i == 0 || bytes[i - 1] == b' ';
        let closes = bytes.get(i + 1).is_some_and(|next| *next == b' ');
        if is_sign && opens && closes {
            push(from, i, sign);
            sign = if *byte == b'-' { -1.0 } else { 1.0 };
            from = i + 1;
        }
    }
    push(from, sum.len(), sign);
    if terms.is_empty() {
        context.report(Some(place), "this tie has nothing after its =", FORM);
        return None;
    }
    Some(Written {
        target: target.trim().to_string(),
        terms,
        text: text.to_string(),
        place,
        offset,
    })
}

impl Written {
    /// The tie over the numbers of a file that has been read.
    pub fn resolve(&self, context: &Context<'_>, book: &Book) -> Option<Tie> {
        let target = self.address(context, book, &self.target, 0)?;
        let kind = book.entry(target).kind;
        if context.overridden(&self.target).is_some() {
            context.report(
                Some(self.place.clone()),
                format!(
                    "{} is tied and cannot be set to a value of its own",
                    self.target
                ),
                "set what it follows instead, or take the tie out of the file",
            );
            return None;
        }
        let mut tie = Tie {
            target,
            terms: Vec::new(),
            constant: 0.0,
            text: self.text.clone(),
        };
        for term in &self.terms {
            let place = self.part(&term.text, term.at);
            let (factor, rest) = match term.text.split_once('*') {
                Some((factor, rest)) => match factor.trim().parse::<f64>() {
                    Ok(factor) if factor.is_finite() => (factor, rest.trim()),
                    _ => {
                        context.report(
                            Some(place),
                            format!("\"{}\" is no number to multiply with", shown(factor.trim())),
                            FORM,
                        );
                        return None;
                    }
                },
                None => (1.0, term.text.as_str()),
            };
            if rest.starts_with('(') || (rest.ends_with(')') && !rest.contains('(')) {
                context.report(
                    Some(place),
                    "a tie has no brackets",
                    "multiply them out: a tie is a sum of terms such as 2 * d1.length + 10 mm",
                );
                return None;
            }
            let begins_with_letter = rest.starts_with(|c: char| c.is_alphabetic());
            if begins_with_letter {
                let slot = self.address(context, book, rest, term.at)?;
                tie.terms.push((term.sign * factor, slot));
            } else {
                tie.constant += term.sign * factor * self.constant(context, rest, kind, place)?;
            }
        }
        self.check_kinds(context, book, &tie)?;
        Some(tie)
    }

    fn constant(&self, context: &Context<'_>, text: &str, kind: Kind, place: Place) -> Option<f64> {
        // A radius or a focal length is added to as a length.
        let kind = match kind {
            Kind::Length | Kind::Radius | Kind::Face | Kind::Focal => Kind::Position,
            other => other,
        };
        match quantity::parse(text, kind) {
            Ok(quantity) if quantity.spread != Spread::Exact => {
                context.report(
                    Some(place),
                    "a constant in a tie has no spread",
                    "give the tolerance to the quantities that are tied",
                );
                None
            }
            Ok(quantity) => {
                let number = quantity.value.number();
                if number.is_none() {
                    context.report(Some(place), "this is no constant to add", FORM);
                }
                number
            }
            Err(error) => {
                context.report(
                    Some(place),
                    error.message,
                    error.help.as_deref().unwrap_or(FORM),
                );
                None
            }
        }
    }

    fn check_kinds(&self, context: &Context<'_>, book: &Book, tie: &Tie) -> Option<()> {
        let target = book.entry(tie.target);
        let is_length = |kind| {
            matches!(
                kind,
                Kind::Length | Kind::Position | Kind::Radius | Kind::Face | Kind::Focal
            )
        };
        let mut radii = 0;
        for (_, slot) in &tie.terms {
            let entry = book.entry(*slot);
            if entry.kind != target.kind && !(is_length(entry.kind) && is_length(target.kind)) {
                context.report(
                    Some(self.place.clone()),
                    format!(
                        "{} and {} are quantities of different kinds",
                        target.address, entry.address
                    ),
                    "a tie adds lengths to lengths, angles to angles",
                );
                return None;
            }
            if entry.is_reciprocal() {
                radii += 1;
                if !target.is_reciprocal() {
                    context.report(
                        Some(self.place.clone()),
                        format!(
                            "{} cannot follow {}, a radius that may be flat",
                            target.address, entry.address
                        ),
                        "tie the radius to the length instead",
                    );
                    return None;
                }
            }
        }
        if radii > 1 {
            context.report(
                Some(self.place.clone()),
                format!("{} can follow one other radius only", target.address),
                "tie it to one radius, with a factor and lengths to add",
            );
            return None;
        }
        Some(())
    }

    fn address(&self, context: &Context<'_>, book: &Book, name: &str, at: usize) -> Option<Slot> {
        let found = book.find(name);
        let begins = |sign| {
            name.split_once(sign)
                .map(|(first, _): (&str, _)| first.trim())
        };
        let unspaced = ['-', '+']
            .into_iter()
            .filter_map(begins)
            .any(|first| book.find(first).is_some());
        if found.is_none() && unspaced {
            context.report(
                Some(self.part(name, at)),
                "a sign in a tie stands between spaces",
                FORM,
            );
        } else if found.is_none() && !context.may_exist(name) {
            let known = book.iter().map(|(_, entry)| entry.address.as_str());
            let help = match nearest(name, known) {
                Some(near) => format!("did you mean {near}?"),
                None => FORM.to_string(),
            };
            context.report(
                Some(self.part(name, at)),
                format!("there is no quantity {} to tie", shown(name)),
                &help,
            );
        }
        found
    }

    fn part(&self, text: &str, at: usize) -> Place {
        let Some(offset) = self.offset else {
            return self.place.clone();
        };
        let start = self.place.span.start + offset + at;
        Place {
            source: self.place.source,
            span: start..start + text.len(),
        }
    }
}

/// A number written although it is tied must agree with its tie within this share.
const AGREES_WITHIN: f64 = 1e-9;

/// Resolves all ties and enters them into the book.
pub(super) fn resolve_all(context: &Context<'_>, written: &[Written]) {
    let mut book = context.book.borrow_mut();
    let before = book.clone();
    let resolved: Option<Vec<Tie>> = written
        .iter()
        .map(|tie| tie.resolve(context, &book))
        .collect();
    let Some(ties) = resolved else { return };
    for (i, tie) in ties.iter().enumerate() {
        if ties[..i].iter().any(|other| other.target == tie.target) {
            context.report(
                Some(written[i].place.clone()),
                format!("{} is tied twice", written[i].target),
                "keep one tie for each quantity",
            );
            return;
        }
    }
    if let Err(index) = book.set_ties(ties.clone()) {
        context.report(
            Some(written[index].place.clone()),
            format!("{} follows itself in the end", written[index].target),
            "a tie must lead to quantities that are not tied back to it",
        );
        return;
    }
    for (tie, written) in ties.iter().zip(written) {
        let old = before.entry(tie.target);
        let new = book.entry(tie.target);
        let stated = old.origin == crate::cavity::Origin::Written;
        let as_written = if new.is_reciprocal() && new.value != 0.0 {
            new.value.recip()
        } else {
            new.value
        };
        if let Some(range) = number_beyond(as_written, new.kind) {
            context.report(
                Some(written.place.clone()),
                format!(
                    "this tie gives {} a value that does not lie {range}",
                    new.address
                ),
                "check its constants and factors",
            );
            continue;
        }
        let is_index = matches!(new.key, "index" | "group_index");
        if is_index && !(1.0..=GREATEST_INDEX).contains(&new.value) {
            context.report(
                Some(written.place.clone()),
                format!("this tie makes {} {}", new.address, new.value),
                "a refractive index lies between 1 and 100",
            );
            continue;
        }
        if stated && (new.value - old.value).abs() > AGREES_WITHIN * old.value.abs() {
            // An override upstream moves a tied number away from what the file says of it, and so
            // does a tie that is not the file's own.
            let moved = written.place.source != 0 || context.overrides.iter().any(|o| o.used.get());
            if !moved {
                context.report(
                    context.places.borrow().get(&old.address).cloned(),
                    format!(
                        "{} is tied to {}, and something else is written for it",
                        old.address,
                        human(as_written, new.kind, 6)
                    ),
                    "leave it out of its part; the tie gives its value",
                );
            }
        }
        let must_not_be_negative = matches!(
            new.kind,
            Kind::Length | Kind::Strength | Kind::Ratio | Kind::Power | Kind::Temperature
        );
        if must_not_be_negative && new.value < 0.0 {
            context.report(
                Some(written.place.clone()),
                format!("this tie makes {} negative", new.address),
                "check its constants and signs",
            );
        }
    }
}
