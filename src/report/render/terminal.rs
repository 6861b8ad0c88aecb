//! A document on a terminal: 80 columns, readable without colour.

use anstyle::{AnsiColor, Style};
use comfy_table::{CellAlignment, ContentArrangement};

use crate::report::document::{Align, Block, Document, Table, Tone};
use crate::report::harmless::harmless;

/// Columns that text is wrapped to.
pub const WIDTH: usize = 80;

/// The document as text, with ANSI colours that the caller may strip.
pub fn render(document: &Document) -> String {
    let mut out = String::new();
    for block in &document.blocks {
        match block {
            Block::Title(text) => {
                let text = harmless(text).replace('\n', " ");
                let bold = Style::new().bold();
                out += &format!("{bold}{text}{bold:#}\n");
            }
            Block::Verdict { word, rest, tone } => {
                let style = style(*tone).bold();
                let lines = textwrap::wrap(rest, WIDTH - word.chars().count() - 3);
                let indent = " ".repeat(word.chars().count() + 3);
                out += &format!(
                    "{style}{word}{style:#}   {}\n",
                    lines.join(&format!("\n{indent}"))
                );
            }
            Block::Heading(text) => {
                let bold = Style::new().bold();
                out += &format!("\n{bold}{text}{bold:#}\n");
            }
            Block::Text(text) => {
                for line in textwrap::wrap(text, WIDTH) {
                    out += &line;
                    out.push('\n');
                }
            }
            Block::Drawing(lines) => {
                for line in lines {
                    out += line;
                    out.push('\n');
                }
            }
            Block::Table(table) => out += &render_table(table),
            Block::Item { mark, text, tone } => {
                let style = style(*tone);
                let indent = mark.chars().count() + 1;
                let lines =
                    textwrap::wrap(text, WIDTH - indent).join(&format!("\n{}", " ".repeat(indent)));
                out += &format!("{style}{mark}{style:#} {lines}\n");
            }
        }
    }
    out
}

fn style(tone: Tone) -> Style {
    match tone {
        Tone::Good => Style::new().fg_color(Some(AnsiColor::Green.into())),
        Tone::Bad => Style::new().fg_color(Some(AnsiColor::Red.into())),
        Tone::Doubt => Style::new().fg_color(Some(AnsiColor::Yellow.into())),
        Tone::Plain => Style::new(),
    }
}

fn render_table(table: &Table) -> String {
    let text = spaced_table(table, 1);
    if text.lines().all(|line| line.chars().count() <= WIDTH) {
        text
    } else {
        spaced_table(table, 0)
    }
}

/// The table with two spaces between columns, or one.
fn spaced_table(table: &Table, right: u16) -> String {
    let mut grid = comfy_table::Table::new();
    grid.load_style(comfy_table::presets::NOTHING);
    grid.set_content_arrangement(ContentArrangement::Disabled);
    grid.set_header(table.columns.iter().map(|column| column.title.as_str()));
    for row in &table.rows {
        grid.add_row(row);
    }
    for (index, column) in table.columns.iter().enumerate() {
        if let Some(rendered) = grid.column_mut(index) {
            rendered.set_padding((if index == 0 { 2 } else { 1 }, right));
            rendered.set_cell_alignment(match column.align {
                Align::Left => CellAlignment::Left,
                Align::Right => CellAlignment::Right,
            });
        }
    }
    let mut text = String::new();
    for line in grid.lines() {
        text += line.trim_end();
        text.push('\n');
    }
    text
}
