//! `modes` for people: the verdict first, then the spectrum, then how to move out.

mod chart;
mod near;
mod strip;
mod ways;

pub use chart::describe as chart;

use crate::analysis::modes::{Clearance, Modes, SURVIVES};
use crate::analysis::spectrum;
use crate::report::describe::measured::frequency;
use crate::report::document::{Block, Document, Table, Tone};
use crate::report::number::{FREQUENCIES, Scale, common, fixed, plain, significant};

/// The transverse modes of a cavity as a document.
pub fn describe(modes: &Modes) -> Document {
    let mut document = Document::default();
    if let Some(title) = &modes.title {
        document.push(Block::Title(title.clone()));
    }
    verdict(&mut document, modes);
    if modes.no_answer.is_none() {
        summary(&mut document, modes);
        spectrum_strip(&mut document, modes);
        by_order(&mut document, modes);
        near::coincidences(&mut document, modes);
        near::sidebands(&mut document, modes);
        ways::ways_out(&mut document, modes);
        ways::windows(&mut document, modes);
    }
    if !modes.cautions.is_empty() {
        document.heading("Cautions");
        for caution in &modes.cautions {
            document.push(Block::Item {
                mark: "  !".into(),
                text: caution.clone(),
                tone: Tone::Doubt,
            });
        }
    }
    document
}

/// TEM_30; TEM_12,0 where a number has two digits.
fn name(m: usize, n: usize) -> String {
    let between = if m > 9 || n > 9 { "," } else { "" };
    format!("TEM_{m}{between}{n}")
}

fn linewidths(count: f64) -> String {
    let text = significant(count, 3);
    let unit = if text == "1.00" {
        "linewidth"
    } else {
        "linewidths"
    };
    format!("{text} {unit}")
}

/// Distances below this share of the free spectral range are none.
const NONE: f64 = 1e-9;

/// "TEM_30 lies 7.20 linewidths (3.12 MHz) above the fundamental".
fn place(modes: &Modes, clearance: &Clearance) -> String {
    let name = name(clearance.m, clearance.n);
    let offset = clearance.offset_hz;
    if offset.abs() < NONE * modes.fsr_hz {
        return format!("{name} lies on the fundamental itself");
    }
    let side = if offset > 0.0 { "above" } else { "below" };
    match clearance.linewidths {
        Some(count) => format!(
            "{name} lies {} ({}) {side} the fundamental",
            linewidths(count),
            short_frequency(offset.abs())
        ),
        None => format!(
            "{name} lies {} {side} the fundamental",
            short_frequency(offset.abs())
        ),
    }
}

fn short_frequency(hertz: f64) -> String {
    let scale = common([hertz], &FREQUENCIES, 1.0);
    format!("{} {}", significant(hertz / scale.size, 3), scale.symbol)
}

/// Whether the nearest mode is as far away as wanted.
fn is_clear(modes: &Modes) -> bool {
    let wanted = modes.apart_hz * (1.0 - NONE);
    let nearest = modes.mode_clearance.as_ref();
    nearest.is_none_or(|nearest| nearest.offset_hz.abs() >= wanted)
}

/// What is wanted, in words.
fn wanted(modes: &Modes) -> String {
    match modes.apart_linewidths {
        Some(count) => format!("{} linewidths", plain(count, 4)),
        None => "1 % of the free spectral range".into(),
    }
}

/// The verdict in one line, without its word.
fn verdict_line(modes: &Modes) -> String {
    let Some(nearest) = &modes.mode_clearance else {
        return "no mode is looked at".into();
    };
    let margin = if modes.on_edge {
        "on the edge of stability".into()
    } else {
        format!("margin {}", significant(modes.margin, 3))
    };
    format!("nearest mode {}; {margin}", place(modes, nearest))
}

fn verdict(document: &mut Document, modes: &Modes) {
    let (word, rest, tone) = match &modes.no_answer {
        Some(why) => {
            let word = if modes.on_edge {
                "ON THE EDGE OF STABILITY"
            } else {
                "UNSTABLE"
            };
            (word, format!("no spectrum: {why}"), Tone::Bad)
        }
        None if is_clear(modes) => ("CLEAR", verdict_line(modes), Tone::Good),
        None => ("NOT CLEAR", verdict_line(modes), Tone::Doubt),
    };
    document.push(Block::Verdict {
        word: word.into(),
        rest,
        tone,
    });
}

fn summary(document: &mut Document, modes: &Modes) {
    let lines = match (modes.finesse, modes.linewidth_hz) {
        (Some(finesse), Some(linewidth)) => format!(
            ", finesse {}, linewidth {}",
            significant(finesse, 4),
            short_frequency(linewidth)
        ),
        _ => String::new(),
    };
    document.text(format!(
        "{} cavity, {} nm, FSR {}{lines}",
        modes.form,
        plain(modes.wavelength_m * 1e9, 6),
        frequency(modes.fsr_hz),
    ));
    let horizontal = if modes.tangential_is_horizontal {
        "horizontal"
    } else {
        "vertical"
    };
    document.text(format!(
        "TEM_mn: m nodes in the tangential plane, here the {horizontal}, n in the sagittal"
    ));
    if let (Some(apart), Some(finesse)) = (modes.apart_linewidths, modes.finesse) {
        document.text(meaning(apart, finesse));
        if !is_clear(modes) && places(modes) as f64 * 2.0 * apart > finesse {
            document.text(
                "At this finesse some of so many modes is nearly always that near: judge it by its \
                 order, and by what the source sends into it.",
            );
        }
    }
    if let Some(surviving) = &modes.mode_clearance_surviving
        && modes
            .mode_clearance
            .as_ref()
            .is_some_and(|nearest| (nearest.m, nearest.n) != (surviving.m, surviving.n))
    {
        document.text(format!(
            "Without modes that lose more than {} % in a round trip by clipping, the nearest mode \
             {}.",
            plain(SURVIVES * 100.0, 2),
            place(modes, surviving)
        ));
    }
    sent(document, modes);
    other_polarisation(document, modes);
}

/// At how many places modes lie; what is nearer to each other than a millionth of a free spectral
/// range is at one.
fn places(modes: &Modes) -> usize {
    let mut offsets: Vec<f64> = modes.modes.iter().map(|mode| mode.offset_hz).collect();
    offsets.sort_by(f64::total_cmp);
    offsets.dedup_by(|b, a| (*b - *a).abs() < 1e-6 * modes.fsr_hz);
    offsets.len()
}

/// What a count of linewidths means for the light in a mode.
fn meaning(apart: f64, finesse: f64) -> String {
    let turns = apart / finesse;
    let count = plain(apart, 4);
    if turns > 0.5 {
        return format!(
            "No mode can lie {count} linewidths away: half a free spectral range is only {}.",
            linewidths(0.5 * finesse)
        );
    }
    let suppression = spectrum::suppression(turns, finesse);
    format!(
        "A mode {count} linewidths away holds 1/{} of the power it would hold on its own resonance \
         ({} dB).",
        significant(suppression, 3),
        fixed(10.0 * suppression.log10(), 1)
    )
}

/// How the source's light is spread over the modes.
fn sent(document: &mut Document, modes: &Modes) {
    let (Some(fundamental), Some(beyond)) = (modes.fundamental_content, modes.content_beyond)
    else {
        return;
    };
    let percent = |share: f64| format!("{} %", significant(share * 100.0, 3));
    let parasitic = match modes.parasitic {
        Some(ratio) => format!(
            "; on resonance the other modes together hold {} of its power",
            if ratio < 1e-8 {
                "less than 0.01 ppm".into()
            } else if ratio < 1e-3 {
                format!("{} ppm", significant(ratio * 1e6, 3))
            } else {
                percent(ratio)
            }
        ),
        None => String::new(),
    };
    let beyond = if beyond > 1e-3 {
        format!(
            " ({} of the source lies beyond order {})",
            percent(beyond),
            modes.highest_order
        )
    } else {
        String::new()
    };
    document.text(format!(
        "Of the source {} is in the fundamental{parasitic}{beyond}.",
        percent(fundamental)
    ));
}

fn other_polarisation(document: &mut Document, modes: &Modes) {
    let Some(other) = &modes.other_polarisation else {
        return;
    };
    let comb = if other.offset_hz == 0.0 {
        "at the same place"
    } else {
        "half a free spectral range away"
    };
    let lines = match (other.finesse, other.linewidth_hz) {
        (Some(finesse), Some(linewidth)) => format!(
            ", with finesse {} and linewidth {}",
            significant(finesse, 4),
            short_frequency(linewidth)
        ),
        _ => String::new(),
    };
    document.text(format!(
        "The figures are for {} light. {} light has its comb {comb}{lines}; of its modes {}.",
        modes.polarisation,
        other.polarisation,
        place(modes, &other.nearest)
    ));
}

fn spectrum_strip(document: &mut Document, modes: &Modes) {
    document.heading("One free spectral range; a sign is an order, 10 is a, 11 is b …");
    let (lines, left_out) = strip::draw(modes);
    document.push(Block::Drawing(lines));
    let mut legend = format!("== within {}", wanted(modes));
    if !modes.sidebands.is_empty() {
        legend += "; ^ sidebands";
    }
    document.aside(legend);
    if let Some(text) = left_out {
        document.aside(text);
    }
    if let Some(spacing) = &modes.spacing_hz {
        document.aside(format!(
            "From order to order: {} in the tangential plane, {} in the sagittal.",
            signed_frequency(spacing.tangential),
            signed_frequency(spacing.sagittal)
        ));
    }
}

fn signed_frequency(hertz: f64) -> String {
    let sign = if hertz < 0.0 { "−" } else { "+" };
    format!("{sign}{}", frequency(hertz.abs()))
}

/// Most orders of a table.
const MOST_ORDERS: usize = 20;

fn by_order(document: &mut Document, modes: &Modes) {
    document.heading("The nearest mode of every order");
    let scale = column(modes, modes.by_order.iter().map(|order| order.offset_hz));
    let lines = modes.finesse.is_some();
    let clips = modes.by_order.iter().any(|order| order.clip_loss.is_some());
    let mut titles = vec![
        "order".to_string(),
        "<nearest".into(),
        format!("offset\n{}", scale.symbol),
    ];
    if lines {
        titles.extend(["line-\nwidths".into(), "suppression\ndB".into()]);
    }
    if clips {
        titles.push("clipped, at least\n%".into());
    }
    let titles: Vec<&str> = titles.iter().map(String::as_str).collect();
    let mut table = Table::new(&titles);
    for order in modes.by_order.iter().take(MOST_ORDERS) {
        let is_none = order.offset_hz.abs() < NONE * modes.fsr_hz;
        let cell = |x: Option<f64>| match x {
            Some(_) if is_none => "0".into(),
            Some(x) => significant(x, 3),
            None => "–".into(),
        };
        let mut row = vec![
            order.order.to_string(),
            name(order.m, order.n),
            offset(order.offset_hz, scale, modes),
        ];
        if lines {
            row.push(cell(order.linewidths));
            row.push(order.suppression_db.map_or("–".into(), |x| fixed(x, 1)));
        }
        if clips {
            row.push(order.clip_loss.map_or("–".into(), percent_lost));
        }
        table.rows.push(row);
    }
    document.push(Block::Table(table));
    if modes.by_order.len() > MOST_ORDERS {
        document.aside(format!(
            "and orders {} to {}, in the JSON and the table of --csv",
            MOST_ORDERS + 1,
            modes.highest_order
        ));
    }
}

fn percent_lost(share: f64) -> String {
    if share < 1e-6 {
        "< 0.0001".into()
    } else {
        significant(share * 100.0, 2)
    }
}

/// The unit of a column of offsets; that of the free spectral range where all of them are nothing.
fn column(modes: &Modes, offsets: impl IntoIterator<Item = f64>) -> Scale {
    let mut sizes: Vec<f64> = offsets
        .into_iter()
        .filter(|offset| offset.abs() > NONE * modes.fsr_hz)
        .collect();
    if sizes.is_empty() {
        sizes.push(modes.fsr_hz);
    }
    common(sizes, &FREQUENCIES, 1.0)
}

/// A signed offset in a column; what is none but for rounding is zero.
fn offset(hertz: f64, scale: Scale, modes: &Modes) -> String {
    if hertz.abs() < NONE * modes.fsr_hz {
        return "0".into();
    }
    let sign = if hertz > 0.0 { "+" } else { "" };
    format!("{sign}{}", significant(hertz / scale.size, 4))
}
