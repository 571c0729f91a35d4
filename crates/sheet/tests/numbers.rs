//! What the report says stands in the scenes, and what stands in the scenes can be taken from the PDF again.

#![allow(clippy::unwrap_used)] // A panic is the failure.

mod support;

use std::collections::HashSet;

use lopdf::Document;
use sheet::{Date, Paper, SheetError, SheetRequest, lay_out, pdf_for};
use station::report::FrequencyReport;
use station::units::{self, Units};

/// Words as they stand between spaces; no-break spaces tie a number to its unit.
fn words(text: &str) -> HashSet<String> {
    text.split_whitespace().map(str::to_owned).collect()
}

fn extracted(pdf: &[u8]) -> String {
    let document = Document::load_mem(pdf).unwrap();
    let pages: Vec<u32> = document.get_pages().keys().copied().collect();
    document.extract_text(&pages).unwrap()
}

fn request(paper: Paper, units: Units) -> SheetRequest {
    SheetRequest { paper, units, date: support::DATE }
}

/// The words of the whole sheet, taken from its scenes; the first test takes them from the PDF.
fn sheet_words(station: &support::Station, request: &SheetRequest) -> HashSet<String> {
    let pages = lay_out(&station.plan, &station.report, request).unwrap();
    pages
        .iter()
        .flat_map(|page| page.texts().flat_map(|text| words(&text.text)).collect::<Vec<_>>())
        .collect()
}

fn assert_all(found: &HashSet<String>, text: &str, which: &str) {
    for word in text.split_whitespace() {
        assert!(found.contains(word), "{which}: \"{word}\" of \"{text}\" is missing");
    }
}

#[test]
fn the_pdf_gives_back_every_text_of_the_scenes() {
    for station in support::stations() {
        let request = request(Paper::A4, Units::Feet);
        let found = words(&extracted(&pdf_for(&station.plan, &station.report, &request).unwrap()));
        for page in lay_out(&station.plan, &station.report, &request).unwrap() {
            for text in page.texts() {
                assert_all(&found, &text.text, &station.name);
            }
        }
    }
}

#[test]
fn every_number_of_every_band_is_on_the_sheet() {
    for station in support::stations() {
        for paper in [Paper::A4, Paper::Letter] {
            let found = sheet_words(&station, &request(paper, Units::Metres));
            for band in &station.report.bands {
                let which = format!("{}, {paper:?}, {}", station.name, band.name);
                let point = band.middle_point();
                assert_all(&found, &units::impedance(point.feedpoint_ohm), &which);
                assert_all(&found, &units::megahertz_range(band.low_hz, band.high_hz), &which);
                assert_feeds(&found, point, &which);
                for feed in &band.feeds {
                    assert_all(&found, feed.verdict.kind.words(), &which);
                }
            }
        }
    }
}

fn assert_feeds(found: &HashSet<String>, point: &FrequencyReport, which: &str) {
    for feed in &point.feeds {
        let mut texts = vec![
            units::swr(feed.at_feedpoint.swr),
            units::swr(feed.before_unit.swr),
            units::decibels(feed.loss_db),
            units::watts(feed.watts_to_wire),
        ];
        if let Some(setting) = feed.setting {
            texts.push(units::swr(feed.at_transmitter.swr));
            texts.push(units::henries(setting.inductance_h));
            texts.push(units::farads(setting.capacitance_f));
        }
        if feed.links.len() > 1 {
            texts.extend(feed.links.iter().map(|link| units::fixed(link.loss_db, 2)));
        }
        for text in texts {
            // A comma may follow the unit.
            let text = text.replace("µH", "µH,");
            assert_all(found, &text, which);
        }
    }
}

#[test]
fn cut_lengths_are_on_the_sheet() {
    for station in support::stations() {
        for units in [Units::Metres, Units::Feet] {
            let found = sheet_words(&station, &request(Paper::A4, units));
            let plan = &station.plan;
            let mut lengths = Vec::new();
            for (index, wire) in plan.wires.iter().enumerate() {
                let mut cuts = vec![0.0, 1.0];
                cuts.extend((plan.feedpoint.wire == index).then_some(plan.feedpoint.fraction));
                cuts.extend(plan.loads.iter().filter(|load| load.wire == index).map(|load| load.fraction));
                cuts.sort_by(f64::total_cmp);
                lengths.extend(cuts.windows(2).map(|pair| (pair[1] - pair[0]) * wire.cut_length_m));
            }
            lengths.extend(station.report.hung.ropes.iter().map(|rope| rope.length_m));
            lengths.extend(plan.feeds.iter().flat_map(|feed| &feed.links).filter_map(|link| match link {
                station::plan::Link::Line(piece) => Some(piece.length_m),
                _ => None,
            }));
            for length_m in lengths {
                assert_all(&found, &units.tape(length_m), &format!("{} {units:?}", station.name));
            }
        }
    }
}

/// The row of a mark.
fn row<'a>(rows: &'a [sheet::model::CutRow], mark: &str) -> &'a sheet::model::CutRow {
    rows.iter().find(|row| row.mark == mark).unwrap_or_else(|| panic!("no row {mark}"))
}

#[test]
fn every_wire_is_cut_at_its_feedpoint_and_loads() {
    let station = support::station("traps and arms", support::traps_and_arms());
    let request = request(Paper::A4, Units::Metres);
    let model = sheet::model::SheetModel::new(&station.plan, &station.report, &request).unwrap();
    let rows = &model.cut_list.rows;
    // 40 m of wire, fed in the middle, loads at a fifth from either end; two whole arms of 10.2 m.
    for (mark, plan, detail) in [
        ("W1", "8.00 m", "dam tower to L1"),
        ("W2", "12.00 m", "L1 to feedpoint"),
        ("W3", "12.00 m", "feedpoint to L2"),
        ("W4", "8.00 m", "L2 to weir mast"),
        ("W5", "10.20 m", "its joint with W2 to alder, 5.50 m up"),
        ("W6", "10.20 m", "its joint with W3 to willow, 4.50 m up"),
    ] {
        let row = row(rows, mark);
        assert_eq!((row.plan.replace('\u{a0}', " ").as_str(), row.detail.as_str()), (plan, detail), "{mark}");
    }
    for (mark, detail) in [
        ("L1", "7.060 MHz, 61.0 pF, Q 190; 8.00 m along main wire, between W1 and W2"),
        ("L2", "trap 8.44 µH, Q 210 beside 60.0 pF; 32.00 m along main wire, between W3 and W4"),
    ] {
        let row = row(rows, mark);
        assert_eq!((row.detail.replace('\u{a0}', " ").as_str(), row.cut.as_str()), (detail, ""), "{mark}");
    }
    let found = sheet_words(&station, &request);
    for row in rows {
        for text in [&row.mark, &row.part, &row.detail, &row.plan, &row.cut] {
            assert_all(&found, text, &row.mark);
        }
    }
}

#[test]
fn the_highest_stress_stands_against_its_rating() {
    for station in support::stations() {
        let found = sheet_words(&station, &request(Paper::Letter, Units::Metres));
        for (feed_index, feed) in station.plan.feeds.iter().enumerate() {
            for link in 0..feed.links.len() {
                let points = || station.report.bands.iter().flat_map(|band| &band.points);
                let links = || points().map(|point| point.feeds[feed_index].links[link]);
                let volts = links().map(|link| link.peak_v).fold(0.0, f64::max);
                let amperes = links().map(|link| link.rms_a).fold(0.0, f64::max);
                assert_all(&found, &units::volts(volts), &station.name);
                assert_all(&found, &units::amperes(amperes), &station.name);
            }
        }
    }
}

#[test]
fn the_same_plan_and_date_give_the_same_bytes() {
    let station = support::station("relief post", support::relief_post());
    let again = support::station("relief post", support::relief_post());
    for request in [request(Paper::A4, Units::Metres), request(Paper::Letter, Units::Feet)] {
        let first = pdf_for(&station.plan, &station.report, &request).unwrap();
        assert_eq!(first, pdf_for(&again.plan, &again.report, &request).unwrap(), "{request:?}");
    }
    let today = request(Paper::A4, Units::Metres);
    let later = SheetRequest { date: Date { year: 2027, month: 1, day: 31 }, ..today };
    let first = pdf_for(&station.plan, &station.report, &today).unwrap();
    let second = pdf_for(&station.plan, &station.report, &later).unwrap();
    assert_ne!(first, second);
    assert!(words(&extracted(&second)).contains("2027-01-31"));
}

#[test]
fn the_check_follows_the_plan_and_nothing_else() {
    let plan = support::relief_post();
    let mut longer = plan.clone();
    longer.wires[0].cut_length_m += 0.01;
    assert_eq!(sheet::model::checksum(&plan), sheet::model::checksum(&plan.clone()));
    assert_ne!(sheet::model::checksum(&plan), sheet::model::checksum(&longer));
    // CRC-32 (ISO 3309) of the file that a save writes, so that anyone can check it: here with the polynomial itself.
    let text = station::file::to_text(&plan).unwrap();
    let mut register = !0u32;
    for byte in text.bytes() {
        register ^= u32::from(byte);
        for _ in 0..8 {
            register = if register & 1 == 1 { (register >> 1) ^ 0xedb8_8320 } else { register >> 1 };
        }
    }
    let digits = format!("{:08X}", !register);
    assert_eq!(sheet::model::checksum(&plan), format!("{}-{}", &digits[..4], &digits[4..]));
}

#[test]
fn fonts_are_embedded_and_subset() {
    let station = support::station("relief post", support::relief_post());
    let pdf = pdf_for(&station.plan, &station.report, &request(Paper::A4, Units::Metres)).unwrap();
    let document = Document::load_mem(&pdf).unwrap();
    let mut count = 0;
    for object in document.objects.values() {
        let Ok(descriptor) = object.as_dict() else { continue };
        if !descriptor.has_type(b"FontDescriptor") {
            continue;
        }
        let name = descriptor.get(b"FontName").unwrap().as_name().unwrap();
        assert_eq!(name[6], b'+', "{} is not a subset", String::from_utf8_lossy(name));
        let file = descriptor.get(b"FontFile2").unwrap().as_reference().unwrap();
        let bytes = document.get_object(file).unwrap().as_stream().unwrap().decompressed_content().unwrap();
        assert!(bytes.len() > 1_000 && bytes.len() < 100_000, "{} bytes", bytes.len());
        count += 1;
    }
    assert_eq!(count, 2);
    assert!(pdf.len() < 120_000, "{} bytes", pdf.len());
}

#[test]
fn the_title_is_the_plans() {
    let station = support::station("relief post", support::relief_post());
    let pdf = pdf_for(&station.plan, &station.report, &request(Paper::A4, Units::Metres)).unwrap();
    let document = Document::load_mem(&pdf).unwrap();
    let info = document.trailer.get(b"Info").and_then(lopdf::Object::as_reference).unwrap();
    let info = document.get_object(info).unwrap().as_dict().unwrap();
    let title = String::from_utf8_lossy(info.get(b"Title").unwrap().as_str().unwrap()).into_owned();
    assert!(title.contains("Salt pan relief post"), "{title}");
    let date = String::from_utf8_lossy(info.get(b"CreationDate").unwrap().as_str().unwrap()).into_owned();
    assert!(date.starts_with("D:20261201"), "{date}");
}

#[test]
fn a_report_of_another_plan_is_refused() {
    let station = support::station("relief post", support::relief_post());
    let mut fewer = station.plan.clone();
    fewer.bands.pop();
    let refused = pdf_for(&fewer, &station.report, &request(Paper::A4, Units::Metres));
    assert_eq!(refused, Err(SheetError::Mismatch { what: "bands", plan: 11, report: 12 }));
    let mut other = station.plan.clone();
    other.feeds[0].links.pop();
    assert!(matches!(
        pdf_for(&other, &station.report, &request(Paper::A4, Units::Metres)),
        Err(SheetError::Mismatch { what: "links of a feed", .. })
    ));
}
