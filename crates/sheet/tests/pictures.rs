//! The same scene as SVG and as a picture, and a code that a telephone can read.

#![allow(clippy::unwrap_used)] // A panic is the failure.

mod support;

use sheet::scene::Scene;
use sheet::tokens::{Ground, Ink};
use sheet::{Paper, SheetError, SheetRequest, lay_out, png, svg};
use station::units::Units;
use tiny_skia::Pixmap;

fn pages() -> Vec<Scene> {
    let station = support::station("relief post", support::relief_post());
    let request = SheetRequest { paper: Paper::A4, units: Units::Metres, date: support::DATE };
    lay_out(&station.plan, &station.report, &request).unwrap()
}

#[test]
fn the_svg_has_every_text_and_nothing_a_reader_would_trip_over() {
    for page in pages() {
        let svg = svg::write(&page);
        assert!(svg.starts_with("<svg ") && svg.ends_with("</svg>\n"));
        assert!(svg.contains("width=\"210mm\" height=\"297mm\" viewBox=\"0 0 210 297\""));
        assert_eq!(svg.matches("<text ").count(), page.texts().count());
        for text in page.texts() {
            let escaped = text.text.replace('&', "&amp;").replace('<', "&lt;").replace('>', "&gt;");
            assert!(svg.contains(&format!(">{escaped}</text>")), "{}", text.text);
        }
        assert!(!svg.contains("NaN") && !svg.contains("inf"));
        assert_eq!(svg, svg::write(&page));
    }
}

#[test]
fn the_picture_has_the_size_of_the_paper_and_its_ink() {
    for page in pages() {
        let picture = Pixmap::decode_png(&png::write(&page, 72.0).unwrap()).unwrap();
        assert_eq!((picture.width(), picture.height()), (595, 842));
        let corner = picture.pixel(0, 0).unwrap();
        assert_eq!([corner.red(), corner.green(), corner.blue()], Ink::Background.rgb(Ground::Paper));
        let dark = picture.pixels().iter().filter(|pixel| pixel.green() < 128).count();
        let share = dark as f64 / f64::from(picture.width() * picture.height());
        assert!((0.01..0.25).contains(&share), "{share} of the page is dark");
    }
    let refused = png::write(&Scene::new(0.0, 10.0), 72.0);
    assert!(matches!(refused, Err(SheetError::Picture(_))), "{refused:?}");
}

#[test]
fn the_code_reads_back() {
    let plan = support::relief_post();
    let page = &pages()[0];
    let picture = Pixmap::decode_png(&png::write(page, 150.0).unwrap()).unwrap();
    let (width, height) = (picture.width() as usize, picture.height() as usize);
    let mut prepared = rqrr::PreparedImage::prepare_from_greyscale(width, height, |x, y| {
        picture.pixels()[y * width + x].green()
    });
    let grids = prepared.detect_grids();
    assert_eq!(grids.len(), 1);
    let (_, content) = grids[0].decode().unwrap();
    let check = sheet::model::checksum(&plan);
    assert_eq!(content, format!("{}\nrevision {}\n2026-12-01\nplan check {check}", plan.name, plan.edition));
}
