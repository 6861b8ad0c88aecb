//! `materials` for people: the catalogue at a glance, or one material's figures with their sources.

use crate::analysis::materials::{
    AxisEntry, AxisReport, Catalogue, Citation, MaterialEntry, MaterialReport,
};
use crate::report::document::{Block, Document, Table, Tone};
use crate::report::number::{fixed, significant};

/// What stands for a figure that is not known.
const UNKNOWN: &str = "–";

/// The catalogue as a document.
pub fn catalogue(catalogue: &Catalogue) -> Document {
    let mut document = Document::default();
    let mut table = Table::new(&[
        "<material",
        "<axes",
        "<wavelength\nµm",
        "<known at\n°C",
        "<source",
    ]);
    for material in &catalogue.materials {
        let mut name = material.name;
        for group in alike(&material.axes) {
            let names: Vec<&str> = group.iter().filter_map(|axis| axis.axis).collect();
            let axis = group[0];
            table.rows.push(vec![
                std::mem::take(&mut name).into(),
                names.join(" "),
                range(axis.wavelength_range_m.map(|metres| metres * 1e6)),
                temperatures(axis),
                format!("{} {}", first_author(&axis.source), axis.source.year),
            ]);
        }
    }
    document.push(Block::Table(table));
    document.text("");
    document.text(
        "A temperature with ± is that of the data: no dn/dT is known there. Figures and full \
         sources: modewright materials BBO --wavelength \"1064 nm\"",
    );
    document
}

/// One material's entry as a document.
pub fn entry(entry: &MaterialEntry) -> Document {
    let mut document = Document::default();
    document.push(Block::Title(title(entry.name, entry.chemistry)));
    if !entry.aliases.is_empty() {
        document.text(format!("also known as {}", entry.aliases.join(", ")));
    }
    if !entry.note.is_empty() {
        document.text(entry.note);
    }
    let mut table = Table::new(&["<axis", "<wavelength\nµm", "<known at\n°C", "<relative to"]);
    for axis in &entry.axes {
        table.rows.push(vec![
            axis.axis.unwrap_or("any").into(),
            range(axis.wavelength_range_m.map(|metres| metres * 1e6)),
            temperatures(axis),
            relative_to(axis),
        ]);
    }
    document.heading("Ranges of the published data");
    document.push(Block::Table(table));
    sources(&mut document, &entry.axes);
    document.text("");
    document.text(format!(
        "Figures: modewright materials \"{}\" --wavelength \"1064 nm\"",
        entry.name
    ));
    document
}

/// One material's figures as a document.
pub fn report(report: &MaterialReport) -> Document {
    let mut document = Document::default();
    document.push(Block::Title(title(report.name, report.chemistry)));
    document.text(format!(
        "{} in vacuum, {}",
        wavelength(report.wavelength_m),
        celsius(report.temperature_k)
    ));
    if !report.note.is_empty() {
        document.text(report.note);
    }
    document.text("");
    document.push(Block::Table(figures(report)));
    let doubts: Vec<_> = report
        .axes
        .iter()
        .filter_map(|axis| Some((axis.entry.axis, axis.why.as_ref()?)))
        .collect();
    if !doubts.is_empty() {
        document.heading("Cautions");
    }
    for (axis, why) in doubts {
        document.push(Block::Item {
            mark: "  !".into(),
            text: match axis {
                Some(axis) => format!("{axis}: {why}"),
                None => why.clone(),
            },
            tone: Tone::Doubt,
        });
    }
    let entries: Vec<AxisEntry> = report.axes.iter().map(|axis| axis.entry.clone()).collect();
    sources(&mut document, &entries);
    document
}

type Figure = fn(&AxisReport) -> Option<String>;

fn figures(report: &MaterialReport) -> Table {
    let mut titles = vec!["<".to_string()];
    titles.extend(
        report
            .axes
            .iter()
            .map(|axis| axis.entry.axis.unwrap_or("value").to_string()),
    );
    let titles: Vec<&str> = titles.iter().map(String::as_str).collect();
    let mut table = Table::new(&titles);
    let rows: [(&str, Figure); 8] = [
        ("index n, absolute", |axis| Some(index(axis.index?))),
        ("index as published", |axis| {
            Some(index(axis.published_index?))
        }),
        ("  relative to", |axis| Some(relative_to(&axis.entry))),
        ("group index", |axis| Some(index(axis.group_index?))),
        ("dn/dλ, 1/µm", |axis| {
            Some(significant(axis.dn_dlambda_per_m? * 1e-6, 4))
        }),
        ("group-velocity dispersion, fs²/mm", |axis| {
            Some(significant(axis.gvd_s2_per_m? * 1e27, 4))
        }),
        ("dn/dT, 1e-6/K", |axis| {
            Some(significant(axis.dn_dt_per_k? * 1e6, 3))
        }),
        ("Brewster's angle from vacuum, deg", |axis| {
            Some(fixed(axis.brewster_rad?.to_degrees(), 3))
        }),
    ];
    for (name, figure) in rows {
        let mut row = vec![name.to_string()];
        row.extend(
            report
                .axes
                .iter()
                .map(|axis| figure(axis).unwrap_or_else(|| UNKNOWN.into())),
        );
        table.rows.push(row);
    }
    table
}

/// An index, with one decimal more than the best formulas are good to.
fn index(index: f64) -> String {
    let is_gas = index < 1.01;
    fixed(index, if is_gas { 9 } else { 6 })
}

fn sources(document: &mut Document, axes: &[AxisEntry]) {
    document.heading("Sources");
    let mut said: Vec<(String, Vec<&str>)> = Vec::new();
    for axis in axes {
        let name = axis.axis.unwrap_or_default();
        let mut texts = vec![cite("index", &axis.source)];
        texts.extend(
            axis.thermal
                .as_ref()
                .map(|thermal| cite("dn/dT", &thermal.source)),
        );
        for text in texts {
            match said.iter_mut().find(|(other, _)| *other == text) {
                Some((_, names)) => names.push(name),
                None => said.push((text, vec![name])),
            }
        }
    }
    for (text, names) in said {
        let all = names.len() == axes.len();
        document.push(Block::Item {
            mark: " ".into(),
            text: if all {
                text
            } else {
                format!("{}: {text}", names.join(", "))
            },
            tone: Tone::Plain,
        });
    }
}

fn cite(what: &str, source: &Citation) -> String {
    match source.note {
        "" => format!("{what}: {source}"),
        note => format!("{what}: {source}; {note}"),
    }
}

/// The first of three authors or more, else all of them.
fn first_author(source: &Citation) -> String {
    match source.authors.split_once(", ") {
        Some((first, _)) => format!("{first} et al."),
        None => source.authors.into(),
    }
}

fn title(name: &str, chemistry: &str) -> String {
    format!("{name}: {chemistry}")
}

/// Neighbouring axes whose line in the catalogue is the same.
fn alike(axes: &[AxisEntry]) -> Vec<Vec<&AxisEntry>> {
    let mut groups: Vec<Vec<&AxisEntry>> = Vec::new();
    for axis in axes {
        let line = |axis: &AxisEntry| {
            (
                range(axis.wavelength_range_m.map(|metres| metres * 1e6)),
                temperatures(axis),
                axis.source,
            )
        };
        match groups.last_mut() {
            Some(group) if line(group[0]) == line(axis) => group.push(axis),
            _ => groups.push(vec![axis]),
        }
    }
    groups
}

fn temperatures(axis: &AxisEntry) -> String {
    match &axis.thermal {
        Some(thermal) => {
            // Whole degrees, none of them outside; the rounding of kelvin is not.
            let [low, high] = thermal.temperature_range_k.map(|kelvin| kelvin - 273.15);
            range([(low - 1e-6).ceil(), (high + 1e-6).floor()])
        }
        None => format!("{} ± 5", short(axis.data_temperature_k - 273.15)),
    }
}

fn relative_to(axis: &AxisEntry) -> String {
    format!("{}, {}", axis.relative_to, celsius(axis.data_temperature_k))
}

fn range([low, high]: [f64; 2]) -> String {
    format!("{}…{}", short(low), short(high))
}

/// A number as it was written before its unit was changed.
fn short(x: f64) -> String {
    let rounded = (x * 1e7).round() / 1e7;
    // Minus zero is nobody's temperature.
    format!("{}", rounded + 0.0).replace('-', "−")
}

fn wavelength(metres: f64) -> String {
    if metres < 2e-6 {
        format!("{} nm", short(metres * 1e9))
    } else {
        format!("{} µm", short(metres * 1e6))
    }
}

fn celsius(kelvin: f64) -> String {
    format!("{} °C", short(kelvin - 273.15))
}
