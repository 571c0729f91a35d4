//! Steps back and forward.

use proptest::prelude::*;
use station::plan::{Earth, EarthConnection, Electrode, Point, Transmitter, WireEnd};

use super::*;
use crate::start;

fn document() -> Document {
    Document::new(start::demo(), None)
}

fn cut(cut_length_m: f64) -> Edit {
    Edit::CutLength { wire: 0, cut_length_m }
}

#[test]
fn a_drag_is_one_step() {
    let mut document = document();
    for length_m in [40.0, 39.0, 38.0] {
        document.edit(&cut(length_m)).unwrap();
    }
    document.end_of_drag();
    document.edit(&cut(30.0)).unwrap();
    document.undo();
    assert_eq!(document.plan().wires[0].cut_length_m.to_bits(), 38.0_f64.to_bits());
    document.undo();
    assert_eq!(*document.plan(), start::demo());
    assert!(!document.can_undo() && document.can_redo());
}

#[test]
fn another_handle_is_another_step() {
    let mut document = document();
    document.edit(&cut(39.0)).unwrap();
    document.edit(&Edit::FeedFraction(0.4)).unwrap();
    document.undo();
    document.undo();
    assert_eq!(*document.plan(), start::demo());
}

#[test]
fn the_star_is_about_the_file() {
    let mut document = document();
    assert!(!document.is_unsaved());
    document.edit(&cut(39.0)).unwrap();
    assert!(document.is_unsaved());
    document.mark_saved("x.ron".into());
    assert!(!document.is_unsaved());
    document.undo();
    assert!(document.is_unsaved());
    document.redo();
    assert!(!document.is_unsaved());
}

#[test]
fn a_refused_edit_leaves_no_trace() {
    let mut document = document();
    let revision = document.revision();
    assert!(document.edit(&cut(f64::NAN)).is_err());
    assert!(document.edit(&Edit::RemoveFeed { feed: 7 }).is_err());
    assert_eq!((document.revision(), document.can_undo(), document.is_unsaved()), (revision, false, false));
}

#[test]
fn revisions_grow_over_files() {
    let mut document = document();
    document.edit(&cut(39.0)).unwrap();
    let before = document.revision();
    document.replace(start::new_station(), Some("y.ron".into()));
    assert!(document.revision() > before && document.first_revision() == document.revision());
    assert!(!document.can_undo() && !document.is_unsaved());
}

/// Edits of every family, sound and unsound.
fn any_edit() -> impl Strategy<Value = Edit> {
    let length = -10.0..120.0_f64;
    prop_oneof![
        length.clone().prop_map(cut),
        length.clone().prop_map(|start_m| Edit::WireBeginning { wire: 0, start_m }),
        (length.clone(), length.clone()).prop_map(|(start_m, cut_length_m)| Edit::WireSpan {
            wire: 0,
            start_m,
            cut_length_m
        }),
        (0..3_usize, length.clone()).prop_map(|(point, height_m)| Edit::PathHeight {
            wire: 0,
            point,
            height_m
        }),
        (-0.5..1.5_f64).prop_map(Edit::FeedFraction),
        (0..3_usize, length.clone(), length.clone())
            .prop_map(|(support, x, y)| Edit::SupportFoot { support, foot: Point::new(x, y, 0.0) }),
        (0..3_usize, length.clone())
            .prop_map(|(support, height_m)| Edit::SupportHeight { support, height_m }),
        Just(Edit::Earth(Earth::Mirror)),
        (0..2_usize, 0.0..3.0_f64).prop_map(|(wire, length_m)| Edit::Earthing {
            wire,
            earthed: vec![EarthConnection {
                end: WireEnd::End,
                electrode: Electrode::Stake { length_m, diameter_m: 0.016 },
            }],
        }),
        (0..3_usize, 0..3_usize, length).prop_map(|(feed, link, length_m)| Edit::LinkLength {
            feed,
            link,
            length_m
        }),
        (0..3_usize).prop_map(|feed| Edit::CopyFeed { feed }),
        (0..3_usize).prop_map(|feed| Edit::RemoveFeed { feed }),
        (0..3_usize, 0..3_usize).prop_map(|(feed, link)| Edit::RemoveLink { feed, link }),
        "[a-z]{1,8}".prop_map(Edit::Name),
        (1.0..2_000.0_f64).prop_map(|power_w| Edit::Transmitter(Transmitter {
            power_w,
            resistance_ohm: 50.0,
            swr_limit: 2.0
        })),
    ]
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    /// Whatever is done can be undone to the last bit, and redone; and every plan on the way is sound.
    #[test]
    fn undo_restores_exactly(edits in prop::collection::vec((any_edit(), any::<bool>()), 1..12)) {
        let mut document = document();
        for (edit, let_go) in &edits {
            let _ = document.edit(edit);
            prop_assert!(station::validate::check(document.plan()).is_ok());
            if *let_go {
                document.end_of_drag();
            }
        }
        let last = document.plan().clone();
        let mut steps = 0;
        while document.can_undo() {
            document.undo();
            steps += 1;
        }
        prop_assert_eq!(document.plan(), &start::demo());
        for _ in 0..steps {
            document.redo();
        }
        prop_assert_eq!(document.plan(), &last);
        prop_assert!(!document.can_redo());
    }
}
