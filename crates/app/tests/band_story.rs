//! Stories of the band view, and its curves without a screen.

mod invented;

use app::views::band::layout;
use app::views::band::model::{self, Curves};
use app::views::band::{self, BandState};
use eframe::egui::{Key, Rect, pos2, vec2};
use egui_kittest::Harness;
use egui_kittest::kittest::Queryable as _;
use invented::stage::Stage;
use station::report::{FrequencyReport, ProfilePoint};
use station::units::{self, Units};

type Desk = Harness<'static, Stage<BandState>>;

fn open(band: usize, feeds: usize) -> Desk {
    let mut stage = Stage::<BandState>::new(14, feeds);
    stage.band = band;
    stage.open([980.0, 700.0], band::show)
}

fn read_out(desk: &Desk) -> String {
    desk.get_by_label("at the cursor").value().expect("the read-out has a value")
}

fn points(desk: &Desk) -> &[FrequencyReport] {
    let stage = desk.state();
    &stage.report.as_ref().expect("staged").bands[stage.band].points
}

/// The four plots against frequency.
const AGAINST_FREQUENCY: [&str; 4] = [
    "R and X at the feedpoint, Ω",
    "SWR at the feedpoint",
    "SWR before the matching unit",
    "SWR after the matching unit",
];

fn plot(desk: &Desk, name: &str) -> Rect {
    // The title above a plot has the same words: the plot is the larger one.
    let larger = |a: &Rect, b: &Rect| a.area().total_cmp(&b.area());
    desk.get_all_by_label(name).map(|node| node.rect()).max_by(larger).expect("a plot")
}

#[test]
fn at_first_the_read_out_stands_in_the_middle_of_the_band() {
    let desk = open(3, 2);
    let middle = desk.state().report.as_ref().expect("staged").bands[3].middle_point();
    let value = read_out(&desk);
    assert!(value.starts_with(&units::megahertz(middle.frequency_hz)), "{value}");
    assert!(value.contains(&units::impedance(middle.feedpoint_ohm)), "{value}");
    assert!(
        value.contains(&format!("SWR {} at the feedpoint", units::swr(middle.feeds[1].at_feedpoint.swr))),
        "{value}"
    );
}

#[test]
fn every_plot_moves_the_one_cursor() {
    let mut desk = open(1, 2);
    for (share, name) in [0.2, 0.4, 0.6, 0.8].into_iter().zip(AGAINST_FREQUENCY) {
        let area = plot(&desk, name);
        desk.hover_at(area.left_top() + vec2(share * area.width(), 0.5 * area.height()));
        desk.run_steps(3);
        let cursor_hz = desk.state().state.cursor_hz.expect("a cursor");
        let value = read_out(&desk);
        assert!(value.starts_with(&units::megahertz(cursor_hz)), "{name}: {value}");
        // The axis begins and ends 4 % of the band beyond its edges.
        let expected_hz = 3.5e6 + 0.3e6 * (f64::from(share) * 1.08 - 0.04);
        assert!((cursor_hz - expected_hz).abs() < 2.0e3, "{name}: {cursor_hz} for {expected_hz}");
        let on_it = |p: &&FrequencyReport| (p.frequency_hz - cursor_hz).abs() < 1e-3;
        let point = points(&desk).iter().find(on_it).expect("on a computed frequency");
        assert!(value.contains(&units::watts(point.feeds[0].watts_to_wire)), "{name}: {value}");
    }
}

#[test]
fn the_same_place_of_two_plots_is_the_same_frequency() {
    let mut desk = open(1, 2);
    let mut values = Vec::new();
    for name in AGAINST_FREQUENCY {
        let area = plot(&desk, name);
        desk.hover_at(area.left_top() + vec2(0.3 * area.width(), 0.4 * area.height()));
        desk.run_steps(3);
        values.push(read_out(&desk));
    }
    assert!(values.windows(2).all(|pair| pair[0] == pair[1]), "{values:?}");
}

#[test]
fn arrow_keys_step_the_cursor() {
    let mut desk = open(3, 2);
    desk.get_by_label("cursor").focus();
    desk.run();
    desk.key_press(Key::ArrowRight);
    desk.run();
    let middle = desk.state().report.as_ref().expect("staged").bands[3].middle;
    let next_hz = points(&desk)[middle + 1].frequency_hz;
    assert_eq!(desk.state().state.cursor_hz, Some(next_hz));
    assert!(read_out(&desk).starts_with(&units::megahertz(next_hz)));
}

#[test]
fn the_read_out_says_how_the_matching_unit_is_set() {
    // On 40 m the open line needs its matching unit.
    let desk = open(3, 2);
    let stage = desk.state();
    let middle = stage.report.as_ref().expect("staged").bands[3].middle_point();
    let setting = middle.feeds[1].setting.expect("the story needs a matching unit in use");
    let value = read_out(&desk);
    assert!(value.contains(&units::henries(setting.inductance_h)), "{value}");
    assert!(value.contains(&units::farads(setting.capacitance_f)), "{value}");
    assert!(desk.query_by_label(&units::henries(setting.inductance_h)).is_some(), "the table shows it");
}

#[test]
fn volts_and_amperes_share_a_cursor_along_the_line() {
    let mut desk = open(1, 2);
    let area = plot(&desk, "volts along the line");
    desk.hover_at(area.left_top() + vec2(0.5 * area.width(), 0.5 * area.height()));
    desk.run_steps(3);
    let along_m = desk.state().state.along_m.expect("a cursor along the line");
    // The axis runs from 6 % before the wire to 2 % beyond the longest line, of 25 m.
    assert!((along_m - 12.0).abs() < 0.3, "{along_m}");
    let band = &desk.state().report.as_ref().expect("staged").bands[1];
    let at = model::along(&band.feeds[0].profile, along_m).expect("on the line");
    assert!(desk.query_all_by_label(&units::volts(at.peak_v)).next().is_some());
    assert!(desk.query_all_by_label(&units::amperes(at.peak_a)).next().is_some());
}

#[test]
fn another_band_brings_other_curves() {
    let mut desk = open(1, 2);
    desk.state_mut().band = 4;
    desk.run();
    assert!(read_out(&desk).starts_with("10.125 MHz"), "{}", read_out(&desk));
}

#[test]
fn another_band_is_picked_by_name_or_by_key() {
    let mut desk = open(1, 2);
    desk.get_by_label("band").click();
    desk.run();
    desk.get_by_label("40 m").click();
    desk.run();
    assert_eq!(desk.state().band, 3);
    // The pointer now stands over a plot, so the cursor need not be in the middle.
    assert!(read_out(&desk).starts_with("7."), "{}", read_out(&desk));

    let mut desk = open(1, 2);
    desk.key_press(Key::ArrowDown);
    desk.run();
    assert_eq!(desk.state().band, 2);
    desk.key_press(Key::ArrowUp);
    desk.run();
    assert_eq!(desk.state().band, 1);
}

#[test]
fn a_single_channel_and_no_answer_are_shown_without_harm() {
    let desk = open(11, 3);
    assert!(read_out(&desk).starts_with("8.291 MHz"));
    let mut stage = Stage::<BandState>::new(3, 2);
    stage.report = None;
    let desk = stage.open([980.0, 700.0], band::show);
    assert!(desk.query_by_label("Being worked out.").is_some());
}

// Curves and layout without a screen.

#[test]
fn curves_hold_what_the_report_says() {
    let report = invented::report(&invented::plan(14, 3));
    for (index, band) in report.bands.iter().enumerate() {
        let curves = Curves::new(&report, index, Units::Feet).expect("the band is there");
        assert_eq!(curves.resistance.len(), band.points.len());
        for (point, found) in curves.reactance.iter().zip(&band.points) {
            assert!((point.x * 1e6 - found.frequency_hz).abs() < 1e-3);
            assert!((point.y - found.feedpoint_ohm.im).abs() < 1e-9);
            assert!(curves.ohms.0 < point.y && point.y < curves.ohms.1);
            assert!(curves.mhz.0 < point.x && point.x < curves.mhz.1);
        }
        for feed in &curves.feeds {
            for heights in [&feed.at_feedpoint, &feed.before, &feed.after] {
                assert_eq!(heights.len(), band.points.len());
                assert!(heights.iter().all(|p| (0.0..=1.0).contains(&p.y)));
            }
            assert!(feed.volts.iter().all(|p| p.y <= curves.tops.0 && p.x <= curves.longest));
            assert!(feed.amperes.iter().all(|p| p.y <= curves.tops.1));
        }
        assert!((curves.longest - 25.0 / 0.3048).abs() < 1e-9);
    }
    assert!(Curves::new(&report, 14, Units::Metres).is_none());
}

#[test]
fn a_line_is_read_between_computed_places_but_not_beyond_its_end() {
    let at = |from_wire_m, peak_v| ProfilePoint { from_wire_m, peak_v, peak_a: 1.0 };
    let profile = [at(0.0, 10.0), at(2.0, 20.0), at(4.0, 30.0)];
    let between = model::along(&profile, 1.2).expect("on the line");
    assert!((between.peak_v - 16.0).abs() < 1e-9);
    assert_eq!(model::along(&profile, 4.0), Some(profile[2]));
    assert_eq!(model::along(&profile, 4.5), None);
    assert_eq!(model::along(&[], 0.0), None);
}

#[test]
fn plots_and_read_out_share_the_room() {
    for (width, height) in [(640.0, 560.0), (724.0, 620.0), (980.0, 700.0), (1600.0, 1000.0)] {
        for feeds in 1..=3 {
            let room = Rect::from_min_size(pos2(300.0, 60.0), vec2(width, height));
            let places = layout::places(room, feeds);
            let mut all: Vec<Rect> = places.plots.iter().flat_map(|&(title, plot)| [title, plot]).collect();
            all.push(places.read_out);
            for (index, a) in all.iter().enumerate() {
                assert!(a.width() > 120.0 && a.height() > 10.0, "{width}: {a:?}");
                assert!(room.expand(1e-3).x_range().contains(a.right()), "{width}: {a:?}");
                for b in &all[index + 1..] {
                    assert!(a.intersect(*b).area() < 1e-2 || !a.intersects(*b), "{width}: {a:?} {b:?}");
                }
            }
        }
    }
}
