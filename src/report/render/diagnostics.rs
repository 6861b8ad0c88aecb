//! Diagnostics beside the line they speak of.

use annotate_snippets::{AnnotationKind, Group, Level, Origin, Renderer, Snippet};

use crate::diagnostic::{Diagnostic, Severity, Source};
use crate::report::harmless::harmless;

/// Most diagnostics that are shown; the rest is counted.
const SHOWN: usize = 20;

/// The diagnostics as text, with ANSI colours that the caller may strip.
pub fn render(diagnostics: &[Diagnostic], sources: &[Source]) -> String {
    let renderer = Renderer::styled().term_width(100);
    let sources: Vec<Source> = sources
        .iter()
        .map(|source| Source {
            name: harmless(&source.name).into(),
            text: harmless(&source.text).into(),
        })
        .collect();
    let mut out = String::new();
    for diagnostic in diagnostics.iter().take(SHOWN) {
        let diagnostic = Diagnostic {
            message: brief(&diagnostic.message),
            help: diagnostic.help.as_deref().map(brief),
            ..diagnostic.clone()
        };
        out += &renderer.render(&[group(&diagnostic, &sources)]);
        out += "\n\n";
    }
    if diagnostics.len() > SHOWN {
        out += &format!("… and {} more\n", diagnostics.len() - SHOWN);
    }
    out
}

/// A sentence for one line or a few: harmless, and not longer than anyone reads.
fn brief(text: &str) -> String {
    const MOST: usize = 600;
    let one_line = harmless(text).replace(['\n', '\t'], " ");
    match one_line.char_indices().nth(MOST) {
        Some((end, _)) => format!("{}…", &one_line[..end]),
        None => one_line,
    }
}

fn group<'a>(diagnostic: &'a Diagnostic, sources: &'a [Source]) -> Group<'a> {
    let level = match diagnostic.severity {
        Severity::Error => Level::ERROR,
        Severity::Caution => Level::WARNING.with_name("caution"),
    };
    let mut group = level.primary_title(diagnostic.message.as_str()).elements(
        // A group begins empty.
        std::iter::empty::<Origin<'_>>(),
    );
    match &diagnostic.place {
        Some(place) => {
            if let Some(source) = sources.get(place.source) {
                let span = on_boundaries(&source.text, &place.span);
                let mut mark = AnnotationKind::Primary.span(span);
                if !diagnostic.label.is_empty() {
                    mark = mark.label(diagnostic.label.as_str());
                }
                group = group.element(
                    Snippet::source(source.text.as_str())
                        .path(source.name.as_str())
                        .annotation(mark),
                );
            }
        }
        None => {
            if let Some(source) = sources.first() {
                group = group.element(Origin::path(source.name.as_str()));
            }
        }
    }
    if let Some(help) = &diagnostic.help {
        group = group.element(Level::HELP.message(help.as_str()));
    }
    group
}

/// The span within the text and between its characters, on one line.
fn on_boundaries(text: &str, span: &std::ops::Range<usize>) -> std::ops::Range<usize> {
    let floor = |mut at: usize| {
        at = at.min(text.len());
        while !text.is_char_boundary(at) {
            at -= 1;
        }
        at
    };
    let start = floor(span.start);
    let line_end = text[start..]
        .find('\n')
        .map_or(text.len(), |offset| start + offset);
    start..floor(span.end).clamp(start, line_end)
}
