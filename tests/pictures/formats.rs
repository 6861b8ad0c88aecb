//! The files: SVG that a parser accepts, PNG of the right size.

use modewright::report::render::plot;
use resvg::usvg::roxmltree::Document;

use crate::{cavities, drawn};

#[test]
fn svg_is_well_formed_and_says_what_it_shows() {
    for (name, text) in cavities::all() {
        let figure = drawn(&text).figure;
        let page = plot::scene(&figure).unwrap();
        let svg = plot::svg(&figure).unwrap();
        let parsed = Document::parse(&svg).unwrap();
        let root = parsed.root_element();
        assert_eq!(
            root.attribute("width"),
            Some(&*page.width.ceil().to_string())
        );
        let texts: Vec<&str> = parsed
            .descendants()
            .filter(|node| node.has_tag_name("text"))
            .filter_map(|node| node.text())
            .map(str::trim)
            .collect();
        assert!(texts.iter().any(|t| t.ends_with(&figure.verdict)), "{name}");
        for panel in &figure.panels {
            assert!(texts.contains(&panel.x.title.as_str()), "{name}");
        }
        if let Some(axis) = &figure.y {
            assert!(texts.contains(&axis.title.as_str()), "{name}");
        }
    }
}

#[test]
fn png_has_twice_the_pixels_of_the_page() {
    let figure = drawn(&cavities::two()).figure;
    let page = plot::scene(&figure).unwrap();
    let png = plot::png(&figure).unwrap();
    assert_eq!(&png[..8], b"\x89PNG\r\n\x1a\n");
    let number = |at: usize| u32::from_be_bytes(png[at..at + 4].try_into().unwrap());
    assert_eq!(f64::from(number(16)), 2.0 * page.width.ceil());
    assert_eq!(f64::from(number(20)), 2.0 * page.height.ceil());
}

/// The same figure, the same bytes: a picture in a repository changes only when it does.
#[test]
fn pictures_are_reproducible() {
    let bytes = || plot::png(&drawn(&cavities::twelve()).figure).unwrap();
    assert_eq!(bytes(), bytes());
}
