//! Cavity files: from their text to a [`Cavity`], or to everything that is wrong with them.
//!
//! The room gets a name and a text and never touches a disk. It is the only one that knows TOML.

mod addresses;
mod adjust;
mod changes;
mod context;
mod fields;
mod general;
mod keys;
mod limits;
mod medium;
mod mirror;
mod parts;
mod plain;
mod reach;
pub mod schema;
mod sent;
mod slab;
mod source;
pub mod starters;
mod syntax;
mod ties;
mod tolerance;

use std::cell::RefCell;
use std::collections::{HashMap, HashSet};
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use crate::cavity::{Cavity, Draft, Form, Index};
use crate::diagnostic::{Diagnostic, Place, Severity, Source};
pub use changes::{Changes, Setting};
pub(crate) use context::nearest;
use context::{Context, in_order, shown, with_article};
use fields::Fields;
use keys::{FORMS, KINDS, TOP};

/// Largest file that is read, in bytes.
pub const LARGEST_FILE: usize = 1 << 20;

/// Most parts in a path.
pub const MOST_PARTS: usize = 1000;

/// Room temperature, the default of `temperature`, in kelvin.
const ROOM_TEMPERATURE: f64 = 293.15;

/// A file that has been read.
#[derive(Clone, Debug)]
pub struct Loaded {
    /// The cavity.
    pub cavity: Cavity,
    /// Where each address was written.
    pub places: HashMap<String, Place>,
}

/// A file that cannot be used.
#[derive(Clone, Debug)]
pub struct Refused {
    /// Everything that is wrong with it, in the order of the text.
    pub diagnostics: Vec<Diagnostic>,
    /// The texts that the places point into: the file, then each change in the order in which it
    /// was made.
    pub sources: Vec<Source>,
}

/// Reads a cavity file; each of `overrides` is an `ADDRESS=VALUE` that replaces what the file says.
///
/// # Errors
/// Everything that is wrong with the text, all at once.
pub fn load(name: &str, text: &str, overrides: &[String]) -> Result<Loaded, Refused> {
    let changes = overrides
        .iter()
        .fold(Changes::new(), |changes, set| changes.set(set));
    load_changed(name, text, &changes)
}

/// Reads a cavity file with changes from elsewhere.
///
/// # Errors
/// Everything that is wrong with the text and the changes, all at once.
pub fn load_changed(name: &str, text: &str, changes: &Changes) -> Result<Loaded, Refused> {
    let mut sources = vec![Source {
        name: name.into(),
        text: text.into(),
    }];
    sources.extend_from_slice(changes.sources());
    match load_sources(&sources, changes) {
        Ok(loaded) => Ok(loaded),
        Err(mut diagnostics) => {
            let key = |d: &Diagnostic| d.place.as_ref().map(|p| (p.source, p.span.start));
            diagnostics.sort_by_key(key);
            diagnostics.dedup();
            Err(Refused {
                diagnostics,
                sources,
            })
        }
    }
}

fn error(place: Option<Place>, message: String, help: &str) -> Diagnostic {
    Diagnostic {
        severity: Severity::Error,
        message,
        place,
        label: String::new(),
        help: (!help.is_empty()).then(|| help.to_string()),
    }
}

fn load_sources(sources: &[Source], changes: &Changes) -> Result<Loaded, Vec<Diagnostic>> {
    let text = &sources[0].text;
    if text.len() > LARGEST_FILE {
        return Err(vec![error(
            None,
            format!(
                "the file has {} bytes; a cavity file has at most {LARGEST_FILE}",
                text.len()
            ),
            "",
        )]);
    }
    let (table, errors) = DeTable::parse_recoverable(text);
    if !errors.is_empty() {
        return Err(syntax::slips(text, &errors));
    }
    let context = Context {
        sources,
        diagnostics: RefCell::default(),
        overrides: changes.overrides()?,
        book: RefCell::default(),
        places: RefCell::default(),
        tied: HashSet::new(),
        kinds: RefCell::default(),
        general: RefCell::default(),
        general_refused: RefCell::default(),
    };
    read_file(context, &table, changes.ties())
}

fn read_file<'t>(
    mut context: Context<'t>,
    table: &'t Spanned<DeTable<'t>>,
    more_ties: &[usize],
) -> Result<Loaded, Vec<Diagnostic>> {
    let top = table.get_ref();
    let whole = 0..0;
    let mut ties = read_ties(&context, top);
    for source in more_ties {
        let text = &context.sources[*source].text;
        let place = Place {
            source: *source,
            span: 0..text.len(),
        };
        ties.extend(ties::split(&context, text, place, Some(0)));
    }
    context.tied = ties.iter().map(|tie| tie.target.clone()).collect();
    let context = context;
    let fields = Fields::new(&context, top, whole).knowing(&TOP);
    fields.refuse_unknown("a cavity file", |key| match key {
        "lambda" | "lam" => Some("the wavelength in vacuum is `wavelength`"),
        "mirrors" | "parts" | "elements" | "optics" => {
            Some("the parts are listed in `path`, as the beam meets them")
        }
        "type" | "kind" => Some("the form is `form`: \"standing\" or \"ring\""),
        _ => None,
    });
    general::read_general(&fields);
    enter_globals(&fields);
    let form = read_form(&fields);
    let ambient = medium::read_medium(&fields, "ambient", Index::VACUUM);
    let defaults = read_defaults(&fields);
    let parts = read_path(&fields, ambient, defaults);
    let plain = plain::read_plain(&fields);
    let sent = sent::read_sent(&fields, ambient, parts.as_deref().unwrap_or_default());
    ties::resolve_all(&context, &ties);
    if let Some(source) = &sent.source {
        source::check_source(&fields, source);
    }
    report_unused_overrides(&context);

    let (Some(form), Some(parts)) = (form, parts) else {
        tolerance::read_tolerance(&fields, None);
        return Err(context.diagnostics.take());
    };
    let spans = [part_spans(top, "path"), part_spans(top, "feed")];
    let draft = Draft {
        form,
        ambient,
        parts,
        feed: sent.feed,
        book: context.book.borrow().clone(),
    };
    let in_order_so_far = context.diagnostics.borrow().is_empty();
    let mut cavity = Cavity::assemble(draft).map_err(|faults| {
        tolerance::read_tolerance(&fields, None);
        if !in_order_so_far {
            // What follows from a mistake already told is no news.
            return context.diagnostics.take();
        }
        faults
            .into_iter()
            .map(|fault| {
                let list = usize::from(fault.in_feed);
                let (table, span) = match fault.part.and_then(|part| spans[list].get(part)) {
                    Some((table, span)) => (Some(*table), span.clone()),
                    None => (None, key_span(top, ["path", "feed"][list])),
                };
                let span = fault
                    .key
                    .and_then(|key| table?.get(key))
                    .map_or(span, Spanned::span);
                error(Some(context.place(span)), fault.message, &fault.help)
            })
            .chain(context.diagnostics.take())
            .collect::<Vec<_>>()
    })?;
    plain.enter(&mut cavity);
    cavity.input = sent::read_input(&fields, &cavity).unwrap_or(cavity.input);
    cavity.source = sent.source;
    cavity.sidebands = sent.sidebands;
    let limits = fields.list("limits", "limits = [ { of = \"margin\", above = 0.1 } ]");
    cavity.limits = limits
        .into_iter()
        .flatten()
        .filter_map(|limit| limits::read_limit(&context, limit, &cavity))
        .collect();
    cavity.tolerancing = tolerance::read_tolerance(&fields, Some(&cavity));
    let diagnostics = context.diagnostics.take();
    if diagnostics.is_empty() {
        Ok(Loaded {
            cavity,
            places: context.places.take(),
        })
    } else {
        Err(diagnostics)
    }
}

/// The numbers of the whole cavity, in the slots that [`Cavity`] expects them in.
fn enter_globals(fields: &Fields<'_, '_>) {
    let wavelength = fields.slot_or("wavelength", 0.0);
    if !fields.has("wavelength") {
        fields.must_have(
            &["wavelength"],
            None,
            "the file does not give the `wavelength`".into(),
            "add wavelength = \"1064 nm\", the wavelength in vacuum",
        );
    } else if wavelength.of(&fields.context.book.borrow().nominal()) == 0.0
        && fields.context.diagnostics.borrow().is_empty()
    {
        fields.report(
            Some(fields.place_of("wavelength")),
            "the wavelength cannot be zero",
            "write it like wavelength = \"1064 nm\"",
        );
    }
    let temperature = fields.slot_or("temperature", ROOM_TEMPERATURE);
    let pump = fields.slot_or("pump", 0.0);
    debug_assert_eq!(
        [wavelength, temperature, pump],
        [Cavity::WAVELENGTH, Cavity::TEMPERATURE, Cavity::PUMP]
    );
}

fn read_form(fields: &Fields<'_, '_>) -> Option<Form> {
    if !fields.has("form") {
        fields.must_have(
            &["form"],
            None,
            "the file does not give the `form`".into(),
            "add form = \"standing\" (from one end mirror to the other) or form = \"ring\"",
        );
    }
    if let Some((text, place)) = fields.text("form")
        && let Some(meant) = form_meant(&text)
    {
        fields.report(
            Some(place),
            format!("`form` cannot be \"{text}\""),
            &format!("write form = \"{meant}\""),
        );
        return None;
    }
    match fields.word("form", &FORMS)? {
        0 => Some(Form::Standing),
        _ => Some(Form::Ring),
    }
}

/// The form that goes by another word in the trade.
fn form_meant(word: &str) -> Option<&'static str> {
    match word.to_lowercase().as_str() {
        "linear" | "standing-wave" | "standing wave" | "two-mirror" | "v" | "z" | "x" => {
            Some("standing")
        }
        "bow-tie" | "bowtie" | "cyclic" | "travelling" | "traveling" | "triangle" | "circular" => {
            Some("ring")
        }
        _ => None,
    }
}

fn read_defaults<'t>(fields: &Fields<'_, 't>) -> Option<&'t DeTable<'t>> {
    let advice = "write it like defaults = { mirror = { diameter = \"12.7 mm\" } }";
    let (table, _) = fields.table("defaults", advice)?;
    for (kind, span, value) in in_order(table) {
        let place = Some(fields.context.place(span));
        let Some(known) = KINDS.iter().find(|known| known.name == kind) else {
            let names = KINDS.map(|known| known.name);
            let help = match nearest(kind, names) {
                Some(near) => format!("did you mean `{near}`?"),
                None => format!("kinds: {}", names.join(", ")),
            };
            fields.report(
                place,
                format!("`{}` is no kind of part", shown(kind)),
                &help,
            );
            continue;
        };
        match value.get_ref() {
            DeValue::Table(inner) => Fields::new(fields.context, inner, value.span())
                .knowing(&known.keys[1..])
                .refuse_unknown(&with_article(kind), |_| None),
            _ => fields.report(
                place,
                format!("the defaults of {} are a table", with_article(kind)),
                advice,
            ),
        }
    }
    Some(table)
}

fn read_ties<'t>(context: &Context<'t>, top: &'t DeTable<'t>) -> Vec<ties::Written> {
    let advice = "write it like ties = [\"d4.length = d3.length\"]";
    let fields = Fields::new(context, top, 0..0);
    let items = fields.list("ties", advice).unwrap_or_default();
    items
        .into_iter()
        .filter_map(|item| {
            let found = context.found(item);
            match found.raw {
                context::Raw::Text(text, offset) => {
                    ties::split(context, &text, found.place, offset)
                }
                _ => {
                    context.report(Some(found.place), "a tie is a text in quotes", advice);
                    None
                }
            }
        })
        .collect()
}

fn read_path<'t>(
    fields: &Fields<'_, 't>,
    ambient: Index,
    defaults: Option<&'t DeTable<'t>>,
) -> Option<Vec<crate::cavity::Part>> {
    let advice = "write it like path = [ { mirror = \"M1\", … }, { gap = \"d1\", … }, … ], or [[path]] blocks";
    if !fields.has("path") {
        fields.must_have(&["path"], None, "the file has no `path`".into(), advice);
    }
    let items = fields.list("path", advice)?;
    if items.len() > MOST_PARTS {
        fields.report(
            Some(fields.context.place(items[MOST_PARTS].span())),
            format!(
                "the path has {} parts; at most {MOST_PARTS} are read",
                items.len()
            ),
            "a path this long is hardly one cavity; is this the right file?",
        );
        return None;
    }
    let parts: Vec<_> = items
        .into_iter()
        .enumerate()
        .map(|(index, item)| parts::read_part(fields.context, item, Some(index), ambient, defaults))
        .collect();
    parts.into_iter().collect()
}

fn report_unused_overrides(context: &Context<'_>) {
    for set in context.overrides.iter().filter(|set| !set.used.get()) {
        if context.may_exist(&set.address) {
            continue;
        }
        let help = context.instead_of(&set.address);
        let place = Place {
            source: set.place.source,
            span: set.address_at.clone(),
        };
        context.report(
            Some(place),
            format!("there is nothing at the address {}", shown(&set.address)),
            &help,
        );
    }
}

/// Tables of the parts of a list with their places, in order.
fn part_spans<'t>(top: &'t DeTable<'t>, list: &str) -> Vec<(&'t DeTable<'t>, Range<usize>)> {
    let items = top.get(list).and_then(|list| list.get_ref().as_array());
    items
        .into_iter()
        .flat_map(|items| items.iter())
        .filter_map(|item| Some((item.get_ref().as_table()?, item.span())))
        .collect()
}

fn key_span(top: &DeTable<'_>, key: &str) -> Range<usize> {
    top.iter()
        .find(|(name, _)| &**name.get_ref() == key)
        .map_or(0..0, |(name, _)| name.span())
}
