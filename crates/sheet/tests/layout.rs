//! Nothing overlaps, nothing leaves the page, and the sheet is as long as promised.

#![allow(clippy::unwrap_used)] // A panic is the failure.

mod support;

use sheet::scene::{Item, Scene, Spot, Text, overlap};
use sheet::{SheetRequest, lay_out};

/// Printers leave about this much of the edge white (common practice: 4 to 6 mm), mm.
const PRINTABLE_MM: f64 = 6.0;

/// Least gap between the boxes of two texts beside each other, mm: a narrow space.
const GAP_MM: f64 = 0.7;

/// The box of a text, wider by the least gap.
fn widened(text: &Text) -> [Spot; 4] {
    let [a, b, c, d] = text.corners();
    let (sin, cos) = text.turn_deg.to_radians().sin_cos();
    let shift = |p: Spot| Spot::new(p.x_mm + GAP_MM * cos, p.y_mm + GAP_MM * sin);
    [a, shift(b), shift(c), d]
}

fn pages(station: &support::Station, request: &SheetRequest) -> Vec<Scene> {
    lay_out(&station.plan, &station.report, request).unwrap()
}

fn every_page(check: impl Fn(&str, &Scene)) {
    for station in support::stations() {
        for request in support::requests() {
            for (index, page) in pages(&station, &request).iter().enumerate() {
                let which = format!("{}, {request:?}, page {}", station.name, index + 1);
                check(&which, page);
            }
        }
    }
}

#[test]
fn no_two_texts_overlap() {
    every_page(|which, page| {
        let boxes: Vec<([Spot; 4], &str)> =
            page.texts().map(|text| (widened(text), text.text.as_str())).collect();
        for (index, (a, words)) in boxes.iter().enumerate() {
            for (b, others) in &boxes[index + 1..] {
                assert!(!overlap(a, b), "{which}: \"{words}\" lies on \"{others}\"");
            }
        }
    });
}

#[test]
fn nothing_leaves_the_page() {
    let is_within = |page: &Scene, spot: &Spot, edge_mm: f64| {
        (edge_mm..=page.width_mm - edge_mm).contains(&spot.x_mm)
            && (edge_mm..=page.height_mm - edge_mm).contains(&spot.y_mm)
    };
    every_page(|which, page| {
        for text in page.texts() {
            for corner in text.corners() {
                assert!(is_within(page, &corner, PRINTABLE_MM), "{which}: \"{}\" at {corner:?}", text.text);
            }
        }
        for item in &page.items {
            if let Item::Line { points, .. } | Item::Area { points, .. } = item {
                for spot in points {
                    assert!(is_within(page, spot, PRINTABLE_MM), "{which}: {item:?}");
                }
            }
        }
    });
}

#[test]
fn no_text_is_smaller_than_eight_points_or_empty() {
    every_page(|which, page| {
        for text in page.texts() {
            assert!(text.style.size_pt() >= 8.0, "{which}: {text:?}");
            assert!(
                !text.text.trim().is_empty() && !text.text.contains(char::is_control),
                "{which}: {text:?}"
            );
        }
    });
}

#[test]
fn twelve_bands_on_two_feeds_take_two_pages() {
    for station in support::stations() {
        if station.plan.bands.len() > 12 || station.plan.feeds.len() > 2 {
            continue;
        }
        for request in support::requests() {
            assert_eq!(pages(&station, &request).len(), 2, "{}, {request:?}", station.name);
        }
    }
}

#[test]
fn thirty_bands_continue_under_repeated_heads() {
    let stations = support::stations();
    let station = stations.iter().find(|station| station.plan.bands.len() == 30).unwrap();
    for request in support::requests() {
        let pages = pages(station, &request);
        let has = |page: &Scene, words: &str| page.texts().any(|text| text.text == words);
        let with_bands: Vec<&Scene> =
            pages.iter().filter(|page| has(page, "Bands") || has(page, "Bands, continued")).collect();
        assert!(with_bands.len() >= 3, "{request:?}: {} pages of bands", with_bands.len());
        for page in &with_bands {
            for head in ["SWR at", "setting of the unit:", "loss"] {
                assert!(has(page, head), "{request:?}: no \"{head}\"");
            }
        }
        for (index, page) in pages.iter().enumerate() {
            let number = format!("page {} of {}", index + 1, pages.len());
            assert!(has(page, &number), "{request:?}: no \"{number}\"");
        }
    }
}

#[test]
fn every_page_says_which_model_and_which_plan() {
    for station in support::stations() {
        let request = support::requests()[0];
        let check = sheet::model::checksum(&station.plan);
        for page in pages(&station, &request) {
            let has = |part: &str| page.texts().any(|text| text.text.contains(part));
            for part in [station.report.model.name(), "2026-12-01", &check] {
                assert!(has(part), "{}: no \"{part}\"", station.name);
            }
        }
    }
}

#[test]
fn no_line_crosses_a_text() {
    every_page(|which, page| {
        let strokes: Vec<[Spot; 4]> = page.items.iter().flat_map(support::strokes).collect();
        for text in page.texts() {
            let corners = text.corners();
            let crossing = strokes.iter().find(|stroke| overlap(&corners, stroke));
            assert!(crossing.is_none(), "{which}: \"{}\" is crossed at {crossing:?}", text.text);
        }
    });
}
