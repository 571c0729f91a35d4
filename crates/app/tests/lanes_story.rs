//! Stories of the lanes, and their layout without a screen.

mod invented;

use std::collections::BTreeSet;

use app::views::lanes::layout::{self, Columns};
use app::views::lanes::model::{self, Lane, Order};
use app::views::lanes::{self, LanesState};
use eframe::egui::{Key, Rangef, Rect, pos2, vec2};
use egui_kittest::kittest::Queryable as _;
use invented::stage::Stage;
use station::report::{BandReport, FeedReport, VerdictKind};
use station::units;

fn stage(bands: usize, feeds: usize) -> Stage<LanesState> {
    Stage::new(bands, feeds)
}

#[test]
fn a_click_chooses_a_band() {
    let mut harness = stage(6, 2).open([900.0, 400.0], lanes::show);
    harness.get_by_label("lane 40 m").click();
    harness.run();
    assert_eq!(harness.state().band, 3);
    assert!(harness.get_by_label("lane 40 m").is_focused());
}

#[test]
fn arrow_keys_walk_through_the_lanes_as_they_are_ordered() {
    let mut harness = stage(6, 2).open([900.0, 400.0], lanes::show);
    harness.key_press(Key::ArrowDown);
    harness.run();
    assert_eq!(harness.state().band, 1, "without a focus");
    harness.get_by_label("lane 60 m").click();
    harness.run();
    harness.key_press(Key::ArrowUp);
    harness.run();
    harness.key_press(Key::ArrowUp);
    harness.run();
    assert_eq!(harness.state().band, 0);
    assert!(harness.get_by_label("lane 160 m").is_focused(), "the focus goes along");
    harness.key_press(Key::ArrowUp);
    harness.run();
    assert_eq!(harness.state().band, 0, "there is nothing above the first");
    harness.key_press(Key::End);
    harness.run();
    assert_eq!(harness.state().band, 5);
}

#[test]
fn a_lane_reads_its_numbers_aloud() {
    let harness = stage(6, 2).open([900.0, 400.0], lanes::show);
    let report = harness.state().report.as_ref().expect("staged");
    for band in &report.bands {
        let value = harness.get_by_label(&format!("lane {}", band.name)).value().expect("a lane has a value");
        let middle = band.middle_point();
        assert!(value.contains(&units::impedance(middle.feedpoint_ohm)), "{value}");
        for (feed, found) in middle.feeds.iter().zip(&band.feeds) {
            assert!(value.contains(&format!("SWR {}", units::swr(feed.before_unit.swr))), "{value}");
            assert!(value.contains(&units::watts(feed.watts_to_wire)), "{value}");
            assert!(value.contains(found.verdict.kind.words()), "{value}");
            assert!(value.contains(&found.verdict.reason), "{value}");
        }
    }
}

#[test]
fn before_the_first_answer_the_lanes_have_their_names() {
    let mut stage = stage(3, 2);
    stage.report = None;
    let harness = stage.open([900.0, 400.0], lanes::show);
    assert_eq!(harness.get_by_label("lane 80 m").value().as_deref(), Some("being worked out"));
}

#[test]
fn a_pin_keeps_a_lane_on_top() {
    let mut harness = stage(6, 2).open([900.0, 400.0], lanes::show);
    let top = |harness: &egui_kittest::Harness<'_, Stage<LanesState>>, name: &str| {
        harness.get_by_label(&format!("lane {name}")).rect().top()
    };
    assert!(top(&harness, "20 m") > top(&harness, "160 m"));
    harness.get_by_label("pin 20 m").click();
    harness.run();
    assert!(top(&harness, "20 m") < top(&harness, "160 m"));
    harness.get_by_label("pin 20 m").click();
    harness.run();
    assert!(top(&harness, "20 m") > top(&harness, "160 m"));
}

#[test]
fn the_lanes_can_be_ordered_best_first() {
    let mut harness = stage(6, 2).open([900.0, 500.0], lanes::show);
    harness.get_by_label("order of the lanes").click();
    harness.run();
    harness.get_by_label("best first").click();
    harness.run();
    assert_eq!(harness.state().state.order, Order::BestFirst);
    let report = harness.state().report.as_ref().expect("staged");
    let mut kinds: Vec<(f32, VerdictKind)> = report
        .bands
        .iter()
        .map(|b| (harness.get_by_label(&format!("lane {}", b.name)).rect().top(), b.feeds[0].verdict.kind))
        .collect();
    kinds.sort_by(|a, b| a.0.total_cmp(&b.0));
    assert!(kinds.windows(2).all(|pair| pair[0].1 <= pair[1].1), "{kinds:?}");
    assert!(kinds[0].1 < kinds[5].1, "the story needs bands of different worth");
}

#[test]
fn pointing_at_a_strip_reads_it() {
    let mut harness = stage(6, 2).open([900.0, 400.0], lanes::show);
    let lane = harness.get_by_label("lane 80 m").rect();
    let columns = layout::columns(lane.x_range(), 2);
    let strip = layout::cell(lane, columns.strips[1]);
    harness.hover_at(strip.center());
    harness.run_steps(8);
    let report = harness.state().report.as_ref().expect("staged");
    let band = &report.bands[1];
    let point = &band.points[layout::nearest_point(strip, band, strip.center().x).expect("points")];
    let words = format!(
        "open line at {}: SWR {}",
        units::megahertz(point.frequency_hz),
        units::swr(point.feeds[1].before_unit.swr)
    );
    assert!(harness.query_by_label_contains(&words).is_some(), "{words}");
}

#[test]
fn fourteen_bands_scroll_to_the_chosen_one() {
    let mut harness = stage(14, 3).open([640.0, 300.0], lanes::show);
    harness.get_by_label("lane 160 m").click();
    harness.run();
    harness.key_press(Key::End);
    harness.run_steps(20);
    assert_eq!(harness.state().band, 13);
    let lane = harness.get_by_label("lane Port 3").rect();
    assert!(lane.bottom() < 310.0 && lane.top() > 0.0, "{lane:?}");
}

// Layout and model without a screen.

fn all_columns(columns: &Columns) -> Vec<Rangef> {
    let mut all = vec![columns.pin, columns.name, columns.wave, columns.impedance];
    all.extend(&columns.strips);
    all.push(columns.gauge);
    all
}

#[test]
fn columns_stand_side_by_side_in_every_width() {
    for width in (460..1500).step_by(20) {
        for feeds in 1..=3 {
            let x = Rangef::new(300.0, 300.0 + width as f32);
            let columns = all_columns(&layout::columns(x, feeds));
            assert!(columns[0].min >= x.min);
            assert!(
                columns.windows(2).all(|pair| pair[0].max <= pair[1].min),
                "{width}, {feeds}: {columns:?}"
            );
            assert!(columns.iter().all(|column| column.span() > 14.0), "{width}, {feeds}: {columns:?}");
            assert!(columns[columns.len() - 1].max <= x.max, "{width}, {feeds}: {columns:?}");
        }
    }
}

#[test]
fn strips_and_gauges_stay_inside_their_boxes() {
    let plan = invented::plan(14, 3);
    let report = invented::report(&plan);
    let lane = Rect::from_min_size(pos2(10.0, 20.0), vec2(700.0, layout::lane_height(3)));
    let columns = layout::columns(lane.x_range(), 3);
    for band in &report.bands {
        for feed in 0..3 {
            let strip = layout::cell(lane, columns.strips[feed]);
            assert!(lane.contains_rect(strip));
            let ratios: [fn(&FeedReport) -> f64; 2] = [|f| f.before_unit.swr, |f| f.at_transmitter.swr];
            for ratio in ratios {
                let points = layout::strip_points(strip, band, feed, ratio);
                assert_eq!(points.len(), band.points.len());
                assert!(points.iter().all(|p| strip.expand(1e-3).contains(*p)), "{}: {points:?}", band.name);
            }
            let gauge = layout::gauge(lane, columns.gauge, feed, 3);
            assert!(lane.contains_rect(gauge));
            assert!(gauge.contains_rect(layout::gauge_text(gauge)));
            let track = layout::gauge_track(gauge);
            assert!(gauge.contains_rect(track) && !track.intersects(layout::gauge_text(gauge)));
            let watts = band.middle_point().feeds[feed].watts_to_wire;
            let filled = layout::filled(track, watts, plan.transmitter.power_w);
            let share = f64::from(filled.width() / track.width());
            assert!((share - watts / plan.transmitter.power_w).abs() < 1e-5, "{share}");
        }
    }
}

#[test]
fn an_infinite_ratio_lies_on_the_top_edge() {
    let strip = Rect::from_min_size(pos2(0.0, 0.0), vec2(80.0, 40.0));
    assert!((layout::strip_y(strip, f64::INFINITY) - strip.top()).abs() < 1e-4);
    assert!((layout::strip_y(strip, 1.0) - strip.bottom()).abs() < 1e-4);
    assert!(layout::strip_y(strip, 2.0) > layout::strip_y(strip, 3.0));
}

#[test]
fn a_thumbnail_shows_the_signs_of_one_moment() {
    let within = Rect::from_min_size(pos2(5.0, 5.0), vec2(160.0, 40.0));
    let plan = invented::plan(6, 2);
    let report = invented::report(&plan);
    let thumbnail = |band: &BandReport| layout::thumbnail(within, &band.wave, (0, 20.0));
    for band in &report.bands {
        let drawn = thumbnail(band);
        let points = drawn.current[0].iter().chain(&drawn.voltage[0]);
        assert!(points.clone().all(|p| within.expand(1e-3).contains(*p)), "{}", band.name);
        assert!((drawn.feedpoint - within.center()).length() < 1e-3);
        let top = drawn.current[0].iter().map(|p| p.y).fold(f32::INFINITY, f32::min);
        assert!((top - within.top()).abs() < 0.01, "the strongest loop points up: {}", band.name);
        let (first, last) = (drawn.voltage[0][0], drawn.voltage[0][drawn.voltage[0].len() - 1]);
        assert!(
            (first.y - drawn.axis_y) * (last.y - drawn.axis_y) < 0.0,
            "the ends of a centre-fed wire differ in sign"
        );
    }
    // 40 m are about a half wave on 80 m: all current on one side; on 30 m (1.35 λ) both signs stand on the wire.
    let below = |band: &BandReport| {
        let drawn = thumbnail(band);
        drawn.current[0].iter().any(|p| p.y > drawn.axis_y + 1.0)
    };
    assert!(!below(&report.bands[1]));
    assert!(below(&report.bands[4]));
}

fn lanes_of(bands: usize) -> (station::plan::Plan, station::report::Report) {
    let plan = invented::plan(bands, 2);
    let report = invented::report(&plan);
    (plan, report)
}

fn lane<'a>(band: usize, report: &'a BandReport, channels: bool) -> Lane<'a> {
    Lane {
        band,
        name: &report.name,
        edges_hz: (report.low_hz, report.high_hz),
        channels,
        report: Some(report),
    }
}

#[test]
fn pinned_lanes_come_first_in_every_order() {
    let (_, report) = lanes_of(8);
    let pinned: BTreeSet<String> = ["15 m".to_owned(), "80 m".to_owned()].into();
    for order in Order::ALL {
        let mut lanes: Vec<Lane<'_>> =
            report.bands.iter().enumerate().map(|(i, b)| lane(i, b, false)).collect();
        model::sort(&mut lanes, order, &pinned, 0);
        let names: Vec<&str> = lanes.iter().map(|l| l.name).collect();
        assert!(names[..2].contains(&"15 m") && names[..2].contains(&"80 m"), "{order:?}: {names:?}");
        if order == Order::Planned {
            assert_eq!(names, ["80 m", "15 m", "160 m", "60 m", "40 m", "30 m", "20 m", "17 m"]);
        }
    }
}

#[test]
fn what_is_covered_is_said_in_kilohertz_or_channels() {
    let (_, report) = lanes_of(4);
    let mut band = report.bands[3].clone();
    let mut say = |covered_hz: Vec<(f64, f64)>| {
        band.feeds[0].verdict.covered_hz = covered_hz;
        let lane = lane(3, &band, false);
        (lane.covered(0), lane.covered_parts(0))
    };
    assert_eq!(say(vec![(7.0e6, 7.2e6)]), ("all 200 kHz".to_owned(), String::new()));
    assert_eq!(say(vec![]), ("none of 200 kHz".to_owned(), String::new()));
    let part = say(vec![(7.0e6, 7.04e6), (7.1e6, 7.18e6)]);
    assert_eq!(part, ("120 of 200 kHz".to_owned(), "7.000–7.040, 7.100–7.180 MHz".to_owned()));

    let mut channels = band.clone();
    channels.points.truncate(3);
    let at: Vec<f64> = channels.points.iter().map(|p| p.frequency_hz).collect();
    channels.feeds[0].verdict.covered_hz = vec![(at[0], at[0]), (at[2], at[2])];
    assert_eq!(lane(3, &channels, true).covered(0), "2 of 3 channels");
}
