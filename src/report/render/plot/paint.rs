//! A scene as SVG.
//!
//! The plotting crate writes whole numbers, in which a curve would show steps. Everything is
//! painted ten times as large, and the page then says how small it is to be shown.

use plotters::element::DashedPathElement;
use plotters::prelude::*;
use plotters::style::FontTransform;
use plotters::style::text_anchor::{HPos, Pos, VPos};

use super::PaintError;
use super::cells;
use super::scene::{Anchor, Ink, Item, Scene};
use super::text::{FAMILY, PER_LETTER};

/// How much larger everything is painted.
const ENLARGED: f64 = 10.0;

fn colour(ink: Ink) -> RGBColor {
    // The two curves differ in lightness as well as in hue, and no hue means anything alone.
    match ink {
        Ink::Black => RGBColor(25, 25, 25),
        Ink::Grey => RGBColor(100, 100, 100),
        Ink::Faint => RGBColor(222, 222, 222),
        Ink::Tint => RGBColor(219, 231, 240),
        Ink::Paper => RGBColor(255, 255, 255),
        Ink::Solid => RGBColor(10, 60, 120),
        Ink::Dashed => RGBColor(205, 95, 0),
        Ink::Dotted => RGBColor(0, 118, 92),
        Ink::DashDotted => RGBColor(142, 52, 122),
        Ink::Bar => RGBColor(158, 186, 212),
        Ink::Alarm => RGBColor(165, 20, 20),
    }
}

fn large(x: f64) -> i32 {
    (x * ENLARGED).round() as i32
}

fn point([x, y]: [f64; 2]) -> (i32, i32) {
    (large(x), large(y))
}

/// How much of the ground a wash hides.
const WASH: f64 = 0.22;

/// The scene as the text of an SVG file.
pub(super) fn svg(scene: &Scene) -> Result<String, PaintError> {
    let (width, height) = (scene.width.ceil(), scene.height.ceil());
    let size = (large(width) as u32, large(height) as u32);
    // The plotting crate knows no cells: what lies between them is painted by itself.
    let mut painted = String::new();
    for (index, items) in scene
        .items
        .split_inclusive(|item| matches!(item, Item::Cells { .. }))
        .enumerate()
    {
        let part = page(size, items, index == 0)?;
        match painted.rfind(END) {
            None => painted = part,
            Some(end) => {
                let start = part.find(">\n").map_or(0, |at| at + 2);
                painted.replace_range(end.., &part[start..]);
            }
        }
        if let (
            Some(Item::Cells {
                area,
                columns,
                levels,
            }),
            Some(end),
        ) = (items.last(), painted.rfind(END))
        {
            let cells = cells::svg(*area, *columns, levels, ENLARGED);
            painted.insert_str(end, &cells);
        }
    }
    let enlarged = format!("width=\"{}\" height=\"{}\"", size.0, size.1);
    let shown = format!("width=\"{width}\" height=\"{height}\"");
    Ok(painted.replacen(&enlarged, &shown, 1))
}

/// What ends a picture.
const END: &str = "</svg>";

/// A picture of some of the items, on a ground or on none.
fn page(size: (u32, u32), items: &[Item], with_ground: bool) -> Result<String, PaintError> {
    let mut painted = String::new();
    {
        let page = SVGBackend::with_string(&mut painted, size).into_drawing_area();
        if with_ground {
            page.fill(&colour(Ink::Paper))
                .map_err(PaintError::because)?;
        }
        for item in items {
            paint(&page, item).map_err(PaintError::because)?;
        }
        page.present().map_err(PaintError::because)?;
    }
    Ok(painted)
}

type Page<'a> = DrawingArea<SVGBackend<'a>, plotters::coord::Shift>;
type Painted = Result<(), DrawingAreaErrorKind<std::io::Error>>;

fn paint(page: &Page<'_>, item: &Item) -> Painted {
    match item {
        Item::Line {
            points,
            ink,
            width,
            dashes,
        } => {
            let style = colour(*ink).stroke_width(large(*width).max(1) as u32);
            let points: Vec<(i32, i32)> = points.iter().copied().map(point).collect();
            match dashes {
                None => page.draw(&PathElement::new(points, style)),
                Some((dash, space)) => page.draw(&DashedPathElement::new(
                    points,
                    large(*dash),
                    large(*space),
                    style,
                )),
            }
        }
        // Painted apart.
        Item::Cells { .. } => Ok(()),
        Item::Wash { points, ink } => {
            let points: Vec<(i32, i32)> = points.iter().copied().map(point).collect();
            page.draw(&Polygon::new(points, colour(*ink).mix(WASH)))
        }
        Item::Area { points, ink } => {
            let points: Vec<(i32, i32)> = points.iter().copied().map(point).collect();
            page.draw(&Polygon::new(points, colour(*ink)))
        }
        Item::Dot {
            at,
            radius,
            ink,
            filled,
        } => {
            let style = ShapeStyle {
                color: colour(*ink).to_rgba(),
                filled: *filled,
                stroke_width: large(1.5) as u32,
            };
            page.draw(&Circle::new(point(*at), large(*radius), style))
        }
        Item::Text {
            at,
            anchor,
            upright,
            size,
            ink,
            content,
        } => {
            let horizontal = match anchor {
                Anchor::Start => HPos::Left,
                Anchor::Middle => HPos::Center,
                Anchor::End => HPos::Right,
            };
            let turned = if *upright {
                FontTransform::Rotate270
            } else {
                FontTransform::None
            };
            let style = (FAMILY, size * PER_LETTER * ENLARGED)
                .into_font()
                .transform(turned)
                .color(&colour(*ink))
                .pos(Pos::new(horizontal, VPos::Center));
            page.draw(&Text::new(content.as_str(), point(*at), style))
        }
    }
}
