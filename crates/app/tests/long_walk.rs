//! A long walk through everything at once: no order of commands, and no answer that comes late, breaks the window.

#![allow(clippy::unwrap_used)] // A failed step is a failed test.

mod common;

use app::command::{Command, Edit, Motion, Show, Theme, View};
use app::start;
use common::Window;
use proptest::prelude::*;
use proptest::strategy::ValueTree as _;
use proptest::test_runner::{Config, TestRunner};
use station::plan::{Band, BandRange, Earth, Link, MatchingUnit, Point, Support, SupportKind, Transformer};
use station::units::Units;

fn any_link() -> impl Strategy<Value = Link> {
    let unit = MatchingUnit {
        inductance_max_h: 2e-5,
        capacitance_max_f: 1e-9,
        coil_q: 200.0,
        capacitor_q: 1000.0,
        rating_peak_v: None,
    };
    prop_oneof![
        (0.1..20.0_f64).prop_map(|impedance_ratio| Link::Transformer(Transformer { impedance_ratio })),
        Just(Link::MatchingUnit(unit)),
        Just(start::demo().feeds[1].links[0].clone()),
    ]
}

fn any_edit() -> impl Strategy<Value = Edit> {
    let length = -5.0..90.0_f64;
    prop_oneof![
        length.clone().prop_map(|cut_length_m| Edit::CutLength { wire: 0, cut_length_m }),
        length.clone().prop_map(|start_m| Edit::WireBeginning { wire: 0, start_m }),
        (0.0..1.0_f64).prop_map(Edit::FeedFraction),
        (0..4_usize, length.clone(), -9.0..9.0_f64)
            .prop_map(|(support, x, y)| Edit::SupportFoot { support, foot: Point::new(x, y, 0.0) }),
        length.clone().prop_map(|height_m| Edit::SupportHeight { support: 0, height_m }),
        Just(Edit::AddSupport(Support {
            name: "tree".to_owned(),
            kind: SupportKind::Tree,
            foot: Point::new(60.0, 3.0, 0.0),
            height_m: 7.0
        })),
        (0..4_usize).prop_map(|support| Edit::RemoveSupport { support }),
        prop_oneof![Just(Earth::Mirror), Just(Earth::NoEarth), Just(Earth::Catalogue("sea".to_owned()))]
            .prop_map(Edit::Earth),
        (0..4_usize).prop_map(|feed| Edit::CopyFeed { feed }),
        (0..4_usize).prop_map(|feed| Edit::RemoveFeed { feed }),
        (0..4_usize, 0..4_usize, any_link()).prop_map(|(feed, link, new)| Edit::InsertLink {
            feed,
            link,
            new
        }),
        (0..4_usize, 0..4_usize).prop_map(|(feed, link)| Edit::RemoveLink { feed, link }),
        (0..4_usize, 0..4_usize, length).prop_map(|(feed, link, length_m)| Edit::LinkLength {
            feed,
            link,
            length_m
        }),
        prop::collection::vec(2e6..50e6_f64, 1..4).prop_map(|list| {
            let band = |(index, hz): (usize, f64)| Band {
                name: format!("b{index}"),
                range: BandRange::Span { low_hz: hz, high_hz: hz * 1.02 },
            };
            Edit::Bands(list.into_iter().enumerate().map(band).collect())
        }),
        Just(Edit::Whole(Box::new(start::new_station()))),
        Just(Edit::Whole(Box::new(start::demo()))),
    ]
}

fn any_command() -> impl Strategy<Value = Command> {
    let show = prop_oneof![
        prop_oneof![Just(View::Yard), Just(View::Band), Just(View::Sheet), Just(View::Station)]
            .prop_map(Show::View),
        (0..14_usize).prop_map(Show::Band),
        (0..5_usize).prop_map(Show::Feed),
        prop_oneof![Just(Units::Metres), Just(Units::Feet)].prop_map(Show::Units),
        prop_oneof![Just(Theme::Light), Just(Theme::Dark)].prop_map(Show::Theme),
        (0.0..360.0_f64).prop_map(|phase| Show::Motion(Motion::Phase(phase))),
    ];
    prop_oneof![
        6 => any_edit().prop_map(Command::Edit),
        3 => show.prop_map(Command::Show),
        1 => Just(Command::EndOfDrag),
        1 => Just(Command::Undo),
        1 => Just(Command::Redo),
    ]
}

#[test]
fn nothing_breaks_the_window() {
    let mut window = Window::open();
    let mut runner = TestRunner::new_with_rng(
        Config::default(),
        proptest::test_runner::TestRng::deterministic_rng(proptest::test_runner::RngAlgorithm::ChaCha),
    );
    let walk = prop::collection::vec(any_command(), 120);
    let commands = walk.new_tree(&mut runner).unwrap().current();
    for command in commands {
        window.command(command);
        assert!(station::validate::check(window.plan()).is_ok());
    }
    window.settle();
    assert_eq!(window.app().answers().fault(), None);
    while window.app().document().can_undo() {
        window.command(Command::Undo);
    }
    assert_eq!(*window.plan(), start::demo());
}
