//! Stories of the feed paths and their editor, and their layout without a screen.

mod invented;

use app::command::{Command, Edit, Show};
use app::views::feed_path::layout;
use app::views::feed_path::model::{self, Column};
use app::views::feed_path::{self, FeedPathState, Picked};
use eframe::egui::{Key, Rect, Role, pos2, vec2};
use egui_kittest::Harness;
use egui_kittest::kittest::Queryable as _;
use invented::stage::Stage;
use sheet::tokens::Ground;
use station::plan::{LineChoice, Link, MatchingUnit, Transformer};
use station::units::{self, Units};

type Desk = Harness<'static, Stage<FeedPathState>>;

fn open(feeds: usize) -> Desk {
    Stage::<FeedPathState>::new(6, feeds).open([300.0, 740.0], feed_path::show)
}

fn pick(desk: &mut Desk, link: &str) {
    desk.get_by_role_and_label(Role::Button, link).click();
    desk.run();
    desk.state_mut().asked.clear();
}

fn edits(desk: &Desk) -> Vec<Edit> {
    desk.state().edits().into_iter().cloned().collect()
}

#[test]
fn a_click_on_a_head_chooses_the_feed() {
    let mut desk = open(2);
    desk.get_by_role_and_label(Role::Button, "feed B open line").click();
    desk.run();
    assert!(desk.state().asked.contains(&Command::Show(Show::Feed(1))));
    assert_eq!(desk.state().state.picked, Some(Picked::Feed(1)));
}

#[test]
fn a_link_reads_its_figures_aloud() {
    let desk = open(2);
    let report = desk.state().report.as_ref().expect("staged");
    let link = report.bands[0].middle_point().feeds[0].links[0];
    let value = desk.get_by_label("feed A link 2: RG-213 coax").value().expect("a link has a value");
    for figure in [
        units::decibels(link.loss_db),
        units::watts(link.watts_lost),
        format!("SWR {}", units::swr(link.toward_transmitter.swr)),
        units::volts(link.peak_v),
        units::amperes(link.rms_a),
    ] {
        assert!(value.contains(&figure), "{figure} in {value}");
    }
    let head = desk.get_by_role_and_label(Role::Button, "feed A coax").value().expect("a head has a value");
    let feed = &report.bands[0].middle_point().feeds[0];
    assert!(head.contains(&units::watts(feed.watts_to_wire)), "{head}");
    assert!(head.contains(report.bands[0].feeds[0].verdict.kind.words()), "{head}");
}

#[test]
fn another_kind_of_line_is_picked_from_the_catalogue() {
    let mut desk = open(2);
    pick(&mut desk, "feed A link 2: RG-213 coax");
    desk.get_by_label("kind").click();
    desk.run();
    desk.get_by_label("RG-58 coax").scroll_to_me();
    desk.run_steps(12);
    desk.get_by_label("RG-58 coax").click();
    desk.run();
    let line = LineChoice::Catalogue("coax-rg-58".to_owned());
    assert_eq!(edits(&desk), [Edit::LineKind { feed: 0, link: 0, line }]);
}

#[test]
fn a_length_is_typed_in_feet() {
    let mut stage = Stage::<FeedPathState>::new(6, 2);
    stage.units = Units::Feet;
    let mut desk = stage.open([300.0, 740.0], feed_path::show);
    pick(&mut desk, "feed A link 2: RG-213 coax");
    desk.get_by_label("length").click();
    desk.run();
    desk.get_by_label("length").type_text("100");
    desk.key_press(Key::Enter);
    desk.run();
    let edits = edits(&desk);
    let [Edit::LinkLength { feed: 0, link: 0, length_m }] = edits[..] else { panic!("{edits:?}") };
    assert!((length_m - 30.48).abs() < 1e-9, "{length_m}");
    assert!(desk.state().asked.contains(&Command::EndOfDrag));
}

#[test]
fn a_line_is_dragged_longer() {
    let mut desk = open(2);
    let block = desk.get_by_label("feed B link 2: Open wire, 2 mm copper, 150 mm apart (589 Ω)").rect();
    desk.drag_at(block.center());
    desk.run();
    desk.hover_at(block.center() + vec2(0.0, 20.0));
    desk.run();
    desk.hover_at(block.center() + vec2(0.0, 40.0));
    desk.run();
    desk.drop_at(block.center() + vec2(0.0, 40.0));
    desk.run();
    let lengths: Vec<f64> = edits(&desk)
        .iter()
        .map(|edit| {
            let Edit::LinkLength { feed: 1, link: 0, length_m } = edit else { panic!("{edit:?}") };
            *length_m
        })
        .collect();
    assert!(!lengths.is_empty() && lengths.iter().all(|m| *m > 25.0), "{lengths:?}");
    assert_eq!(desk.state().asked.last(), Some(&Command::EndOfDrag));
    assert_eq!(desk.state().state.picked, Some(Picked::Link { feed: 1, link: 0 }));
}

#[test]
fn a_ratio_is_chosen_from_the_common_ones() {
    let mut desk = open(3);
    pick(&mut desk, "feed C link 4: transformer");
    desk.get_by_label("9:1").click();
    desk.run();
    let with = Link::Transformer(Transformer { impedance_ratio: 9.0 });
    assert_eq!(edits(&desk), [Edit::SetLink { feed: 2, link: 0, with }]);
}

#[test]
fn the_coil_of_the_matching_unit_is_typed() {
    let mut desk = open(2);
    pick(&mut desk, "feed A link 1: matching unit");
    desk.get_by_label("largest coil").click();
    desk.run();
    desk.get_by_label("largest coil").type_text("12.5");
    desk.key_press(Key::Enter);
    desk.run();
    let Link::MatchingUnit(unit) = invented::unit() else { unreachable!("it is one") };
    let edits = edits(&desk);
    let [Edit::SetLink { feed: 0, link: 1, with: Link::MatchingUnit(set) }] = &edits[..] else {
        panic!("{edits:?}")
    };
    assert!((set.inductance_max_h - 12.5e-6).abs() < 1e-12);
    assert_eq!(*set, MatchingUnit { inductance_max_h: set.inductance_max_h, ..unit });
}

#[test]
fn links_are_inserted_and_removed() {
    let mut desk = open(2);
    pick(&mut desk, "feed A link 2: RG-213 coax");
    desk.get_by_label("Insert below").click();
    desk.run();
    desk.get_by_label("transformer").click();
    desk.run();
    let new = Link::Transformer(Transformer { impedance_ratio: 4.0 });
    assert_eq!(edits(&desk), [Edit::InsertLink { feed: 0, link: 0, new }]);
    pick(&mut desk, "feed A link 1: matching unit");
    desk.get_by_label("Remove").click();
    desk.run();
    assert_eq!(edits(&desk), [Edit::RemoveLink { feed: 0, link: 1 }]);
}

#[test]
fn a_feed_is_copied_renamed_and_removed() {
    let mut desk = open(2);
    pick(&mut desk, "feed B open line");
    desk.get_by_label("Copy").click();
    desk.run();
    assert_eq!(edits(&desk), [Edit::CopyFeed { feed: 1 }]);
    assert_eq!(desk.state().feed, 2, "the copy is chosen");

    pick(&mut desk, "feed B open line");
    desk.get_by_label("name").click();
    desk.run();
    desk.key_combination(&[Key::End]);
    desk.get_by_label("name").type_text(" 2");
    desk.key_press(Key::Enter);
    desk.run();
    assert_eq!(edits(&desk), [Edit::RenameFeed { feed: 1, name: "open line 2".to_owned() }]);

    pick(&mut desk, "feed B open line");
    desk.get_by_label("Remove").click();
    desk.run();
    assert_eq!(edits(&desk), [Edit::RemoveFeed { feed: 1 }]);
}

#[test]
fn a_third_feed_is_added_and_a_fourth_is_not() {
    let mut desk = open(2);
    pick(&mut desk, "feed A coax");
    desk.get_by_label("Add").click();
    desk.run();
    let edits_made = edits(&desk);
    let [Edit::AddFeed(feed)] = &edits_made[..] else { panic!("{edits_made:?}") };
    assert!(!feed.links.is_empty());

    let mut desk = open(3);
    pick(&mut desk, "feed A coax");
    desk.get_by_label("Add").click();
    desk.get_by_label("Copy").click();
    desk.run();
    assert!(edits(&desk).is_empty());
}

#[test]
fn the_transmitters_power_is_typed() {
    let mut desk = open(2);
    pick(&mut desk, "transmitter of feed A coax");
    desk.get_by_label("power").click();
    desk.run();
    desk.get_by_label("power").type_text("400");
    desk.key_press(Key::Enter);
    desk.run();
    let mut wanted = desk.state().plan.transmitter.clone();
    wanted.power_w = 400.0;
    assert_eq!(edits(&desk), [Edit::Transmitter(wanted)]);
}

#[test]
fn without_an_answer_the_chains_stand_without_figures() {
    let mut stage = Stage::<FeedPathState>::new(6, 2);
    stage.report = None;
    let desk = stage.open([300.0, 740.0], feed_path::show);
    let value = desk.get_by_role_and_label(Role::Button, "feed A coax").value();
    assert_eq!(value.as_deref(), Some("being worked out"));
    assert!(desk.query_by_label("feed A link 1: matching unit").is_some());
}

// Layout and model without a screen.

fn with_columns(feeds: usize, check: impl Fn(&Stage<FeedPathState>, &[Column<'_>])) {
    let mut stage = Stage::<FeedPathState>::new(6, feeds);
    for band in 0..6 {
        stage.band = band;
        let snapshot = app::snapshot::Snapshot {
            plan: &stage.plan,
            report: stage.report.as_ref(),
            stale: false,
            band,
            feed: 0,
            units: Units::Metres,
            ground: Ground::Light,
            phase_deg: 0.0,
            moving: false,
            period_s: 4.0,
        };
        check(&stage, &model::columns(&snapshot));
    }
}

#[test]
fn the_watts_along_a_path_add_up() {
    with_columns(3, |stage, columns| {
        for column in columns {
            let wire = column.wire.expect("figures");
            let lost: f64 = column
                .blocks
                .iter()
                .map(|block| {
                    let figures = block.figures.expect("figures");
                    assert!((figures.watts_in - figures.watts_out - figures.link.watts_lost).abs() < 1e-9);
                    figures.link.watts_lost
                })
                .sum();
            assert!((lost + wire.watts - column.given_w).abs() < 1e-9);
            assert!((column.given_w - stage.plan.transmitter.power_w).abs() < 1e-6);
            let ends = column.blocks.windows(2).all(|pair| {
                let (Some(above), Some(below)) = (pair[0].figures, pair[1].figures) else { return false };
                (above.watts_out - below.watts_in).abs() < 1e-9
            });
            assert!(ends, "what leaves a link enters the next one");
        }
    });
}

#[test]
fn a_path_is_as_wide_as_the_watts_that_are_left() {
    with_columns(3, |_, columns| {
        let width = layout::column_width(280.0, columns.len());
        let height = layout::height(columns, width, 500.0);
        let area = Rect::from_min_size(pos2(8.0, 40.0), vec2(280.0, height));
        for (place, column) in columns.iter().enumerate() {
            let path = layout::path(column, place, width, area);
            let share = |half: f32| f64::from(2.0 * half / path.pipe.width());
            let widths: Vec<f64> = path.flow.iter().map(|&(_, half)| share(half)).collect();
            assert!((widths[0] - column.given_w / column.power_w).abs() < 1e-5);
            assert!(widths.windows(2).all(|pair| pair[1] <= pair[0] + 1e-6), "{widths:?}");
            let shed: f64 = widths.windows(2).map(|pair| pair[0] - pair[1]).sum();
            let last = widths[widths.len() - 1];
            assert!((shed + last - widths[0]).abs() < 1e-5);
            let arrives = column.wire.expect("figures").watts / column.power_w;
            // A path never gets thinner than a hairline.
            assert!((last - arrives).abs() < 1e-5 || last < 0.03, "{last} for {arrives}");
            for edge in path.edges() {
                assert!(edge.iter().all(|p| path.pipe.expand(1e-3).contains(*p)));
            }
        }
    });
}

#[test]
fn blocks_stand_below_each_other_and_wires_side_by_side() {
    with_columns(3, |_, columns| {
        for available in [200.0, 500.0, 900.0] {
            let width = layout::column_width(280.0, columns.len());
            let area =
                Rect::from_min_size(pos2(0.0, 0.0), vec2(280.0, layout::height(columns, width, available)));
            let paths: Vec<layout::Path> =
                columns.iter().enumerate().map(|(place, c)| layout::path(c, place, width, area)).collect();
            for path in &paths {
                let mut parts = vec![path.head, path.transmitter];
                parts.extend(&path.blocks);
                parts.push(path.wire);
                assert!(parts.windows(2).all(|pair| pair[0].bottom() <= pair[1].top() + 1e-3), "{parts:?}");
                assert!(parts.iter().all(|part| area.expand(1e-3).y_range().contains(part.bottom())));
                let narrow = layout::is_narrow(width);
                let last = layout::figure_line(path.blocks[0], if narrow { 5 } else { 2 });
                assert!(
                    path.blocks[0].contains_rect(last)
                        && path.blocks[0].contains_rect(layout::name_line(path.blocks[0]))
                );
                assert!((path.wire.top() - paths[0].wire.top()).abs() < 1e-3);
            }
            assert!(paths.windows(2).all(|pair| pair[0].column.right() <= pair[1].column.left()));
        }
    });
}
