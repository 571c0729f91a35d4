//! The editor below the feed paths: what was clicked last can be changed here.

use eframe::egui::{self, RichText};
use sheet::tokens::Ink;
use station::plan::{Feed, LineChoice, LinePiece, Link, MatchingUnit, Transformer};

use super::{FeedPathState, Picked, lines, model};
use crate::command::{Command, Edit, Show};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::theme::color;
use crate::views::fields::{Quantity, button, quantity};
use crate::views::marks;

/// Most letters of a feed's name.
const LONGEST_NAME: usize = 60;
/// Height of the pick list of lines before it scrolls.
const PICK_LIST: f32 = 460.0;
/// Feeds that can stand side by side and still be read.
const MOST_FEEDS: usize = 3;
/// Common practice: impedance ratios that transformers are wound for.
const COMMON_RATIOS: [f64; 8] = [1.0, 2.0, 4.0, 6.0, 9.0, 12.0, 16.0, 49.0];

/// Shows the fields of what is picked.
pub(super) fn show(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    state: &mut FeedPathState,
    out: &mut Vec<Command>,
) {
    ui.spacing_mut().item_spacing.y = 4.0;
    match state.picked {
        Some(Picked::Transmitter) => transmitter(ui, snapshot, out),
        Some(Picked::Link { feed, link }) => link_fields(ui, snapshot, (feed, link), state, out),
        Some(Picked::Feed(feed)) => feed_fields(ui, snapshot, feed, state, out),
        None => feed_fields(ui, snapshot, snapshot.feed, state, out),
    }
}

fn heading(ui: &mut egui::Ui, snapshot: &Snapshot<'_>, feed: Option<usize>, words: &str) {
    ui.horizontal(|ui| {
        if let Some(feed) = feed {
            let letter = RichText::new(marks::letter(feed).to_string());
            ui.label(letter.color(color(Ink::feed(feed), snapshot.ground)));
        }
        ui.add(egui::Label::new(RichText::new(words).strong()).truncate());
    });
}

fn grid<R>(ui: &mut egui::Ui, name: &str, contents: impl FnOnce(&mut egui::Ui) -> R) -> R {
    egui::Grid::new(name).num_columns(2).spacing([10.0, 4.0]).show(ui, contents).inner
}

fn transmitter(ui: &mut egui::Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
    heading(ui, snapshot, None, "transmitter");
    let mut set = snapshot.plan.transmitter.clone();
    let field = |label, sentence, value, suffix, range, speed, decimals| Quantity {
        label,
        sentence,
        value,
        unit: 1.0,
        suffix,
        range,
        speed,
        decimals,
    };
    let power = field(
        "power",
        "Power into a matched load: all watts, volts and amperes are for this power.",
        set.power_w,
        " W",
        0.001..=100_000.0,
        1.0,
        1,
    );
    let resistance = field(
        "resistance",
        "The resistance that the transmitter wants to see at its socket; the SWR there stands on it.",
        set.resistance_ohm,
        " Ω",
        5.0..=1_000.0,
        0.5,
        1,
    );
    let limit = field(
        "SWR limit",
        "The highest standing-wave ratio at which the transmitter still gives full power.",
        set.swr_limit,
        "",
        1.05..=20.0,
        0.02,
        2,
    );
    grid(ui, "transmitter fields", |ui| {
        let mut changed = false;
        let fields =
            [(power, &mut set.power_w), (resistance, &mut set.resistance_ohm), (limit, &mut set.swr_limit)];
        for (shown, place) in fields {
            if let Some(value) = quantity(ui, &shown, out) {
                *place = value;
                changed = true;
            }
        }
        if changed {
            out.push(Command::Edit(Edit::Transmitter(set)));
        }
    });
}

fn feed_fields(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    feed: usize,
    state: &mut FeedPathState,
    out: &mut Vec<Command>,
) {
    let Some(planned) = snapshot.plan.feeds.get(feed) else {
        return;
    };
    heading(ui, snapshot, Some(feed), "feed");
    grid(ui, "feed fields", |ui| name(ui, feed, planned, state, out));
    ui.horizontal_wrapped(|ui| {
        let count = snapshot.plan.feeds.len();
        let room = count < MOST_FEEDS;
        let full = "Three feeds can stand side by side: remove one to make room.";
        let copy = if room { "A second feed like this one, to change a part of it." } else { full };
        if button(ui, room, "Copy", copy) {
            out.push(Command::Edit(Edit::CopyFeed { feed }));
            choose(feed + 1, state, out);
        }
        if button(
            ui,
            room,
            "Add",
            if room { "A new feed: a coaxial line and a matching unit." } else { full },
        ) {
            out.push(Command::Edit(Edit::AddFeed(new_feed(count))));
            choose(count, state, out);
        }
        if button(ui, count > 1, "Remove", "Takes this feed out of the comparison.") {
            out.push(Command::Edit(Edit::RemoveFeed { feed }));
            choose(feed.saturating_sub(1), state, out);
        }
        insert(ui, snapshot, (feed, planned.links.len()), "Insert at transmitter", state, out);
    });
    let hint = RichText::new("Click a link of a path to change it.").small();
    ui.label(hint.color(color(Ink::Faint, snapshot.ground)));
}

fn choose(feed: usize, state: &mut FeedPathState, out: &mut Vec<Command>) {
    state.picked = None;
    state.name = None;
    out.push(Command::Show(Show::Feed(feed)));
}

/// The name while it is typed; the plan gets it when the field is left.
fn name(ui: &mut egui::Ui, feed: usize, planned: &Feed, state: &mut FeedPathState, out: &mut Vec<Command>) {
    let label = ui.label("name");
    let mut text = match &state.name {
        Some((of, typed)) if *of == feed => typed.clone(),
        _ => planned.name.clone(),
    };
    let response = ui
        .add(egui::TextEdit::singleline(&mut text).char_limit(LONGEST_NAME).desired_width(f32::INFINITY))
        .labelled_by(label.id);
    if response.changed() {
        state.name = Some((feed, text.clone()));
    }
    if response.lost_focus() {
        let wanted = text.trim();
        if !wanted.is_empty() && wanted != planned.name {
            out.push(Command::Edit(Edit::RenameFeed { feed, name: wanted.to_owned() }));
            out.push(Command::EndOfDrag);
        }
        state.name = None;
    }
    let _ = response.explain("The name of this feed in lanes, plots and on the sheet.");
    ui.end_row();
}

fn link_fields(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    (feed, link): (usize, usize),
    state: &mut FeedPathState,
    out: &mut Vec<Command>,
) {
    let Some(planned) = snapshot.plan.feeds.get(feed).and_then(|f| f.links.get(link)) else {
        return;
    };
    let words =
        if matches!(planned, Link::Line(_)) { "feed line".to_owned() } else { model::link_name(planned) };
    heading(ui, snapshot, Some(feed), &words);
    match planned {
        Link::Line(piece) => line(ui, snapshot, (feed, link), piece, out),
        Link::Transformer(transformer) => ratio(ui, (feed, link), *transformer, out),
        Link::MatchingUnit(unit) => {
            if let Some(with) = unit_fields(ui, *unit, out) {
                out.push(Command::Edit(Edit::SetLink { feed, link, with: Link::MatchingUnit(with) }));
            }
        }
    }
    ui.horizontal_wrapped(|ui| {
        insert(ui, snapshot, (feed, link + 1), "Insert above", state, out);
        insert(ui, snapshot, (feed, link), "Insert below", state, out);
        if button(ui, true, "Remove", "Takes this link out of the feed.") {
            out.push(Command::Edit(Edit::RemoveLink { feed, link }));
            state.picked = Some(Picked::Feed(feed));
        }
    });
}

fn line(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    (feed, link): (usize, usize),
    piece: &LinePiece,
    out: &mut Vec<Command>,
) {
    grid(ui, "line fields", |ui| {
        let label = ui.label("kind");
        let response = egui::ComboBox::from_id_salt("kind of line")
            .height(PICK_LIST)
            .width(ui.available_width())
            .truncate()
            .selected_text(model::line_name(&piece.line))
            .show_ui(ui, |ui| {
                if let Some(id) = lines::pick(ui, snapshot.ground, &piece.line) {
                    let line = LineChoice::Catalogue(id);
                    out.push(Command::Edit(Edit::LineKind { feed, link, line }));
                }
            })
            .response
            .labelled_by(label.id);
        let _ = response.explain(lines::sentence(&piece.line));
        ui.end_row();
        let unit = snapshot.units.to_metres(1.0);
        let length = Quantity {
            label: "length",
            sentence: "How long this piece of line is.",
            value: piece.length_m,
            unit,
            suffix: if snapshot.units == station::units::Units::Feet { " ft" } else { " m" },
            range: 0.05 / unit..=2_000.0 / unit,
            speed: 0.1 / unit,
            decimals: 2,
        };
        if let Some(length_m) = quantity(ui, &length, out) {
            out.push(Command::Edit(Edit::LinkLength { feed, link, length_m }));
        }
    });
}

fn ratio(ui: &mut egui::Ui, (feed, link): (usize, usize), transformer: Transformer, out: &mut Vec<Command>) {
    let mut wanted = None;
    grid(ui, "transformer fields", |ui| {
        let shown = Quantity {
            label: "ratio",
            sentence: "Impedance on the wire's side over impedance on the transmitter's side.",
            value: transformer.impedance_ratio,
            unit: 1.0,
            suffix: " : 1",
            range: 0.01..=100.0,
            speed: 0.05,
            decimals: 2,
        };
        wanted = quantity(ui, &shown, out);
        ui.label("common ratios");
        ui.horizontal_wrapped(|ui| {
            ui.spacing_mut().item_spacing.x = 2.0;
            for ratio in COMMON_RATIOS {
                let chosen = (transformer.impedance_ratio - ratio).abs() < 1e-9;
                if ui.selectable_label(chosen, format!("{ratio}:1")).clicked() {
                    wanted = Some(ratio);
                }
            }
        });
        ui.end_row();
    });
    if let Some(impedance_ratio) = wanted {
        let with = Link::Transformer(Transformer { impedance_ratio });
        out.push(Command::Edit(Edit::SetLink { feed, link, with }));
    }
}

fn unit_fields(ui: &mut egui::Ui, unit: MatchingUnit, out: &mut Vec<Command>) -> Option<MatchingUnit> {
    let mut set = unit;
    let field = |label, sentence, value, unit, suffix, range, speed| Quantity {
        label,
        sentence,
        value,
        unit,
        suffix,
        range,
        speed,
        decimals: 2,
    };
    let coil = "The coil can be set from nothing to this inductance.";
    let capacitor = "The capacitor can be set from nothing to this capacitance.";
    let q = "Reactance over resistance of the part: the higher, the fewer watts it burns.";
    let fields = [
        field("largest coil", coil, unit.inductance_max_h, 1e-6, " µH", 0.01..=1_000.0, 0.1),
        field("largest capacitor", capacitor, unit.capacitance_max_f, 1e-12, " pF", 1.0..=1e6, 2.0),
        field("Q of the coil", q, unit.coil_q, 1.0, "", 5.0..=10_000.0, 1.0),
        field("Q of the capacitor", q, unit.capacitor_q, 1.0, "", 5.0..=100_000.0, 5.0),
    ];
    let mut changed = false;
    grid(ui, "matching unit fields", |ui| {
        let places =
            [&mut set.inductance_max_h, &mut set.capacitance_max_f, &mut set.coil_q, &mut set.capacitor_q];
        for (shown, place) in fields.iter().zip(places) {
            if let Some(value) = quantity(ui, shown, out) {
                *place = value;
                changed = true;
            }
        }
        changed |= rating(ui, &mut set.rating_peak_v, out);
    });
    changed.then_some(set)
}

/// The voltage rating of the capacitor, where one is known; true when it changes.
fn rating(ui: &mut egui::Ui, rating_peak_v: &mut Option<f64>, out: &mut Vec<Command>) -> bool {
    let sentence = "The highest peak voltage that the capacitor stands; above it the band is overstressed.";
    let mut known = rating_peak_v.is_some();
    let check = ui.checkbox(&mut known, "volts rating");
    let mut changed = check.changed();
    if changed {
        // Common practice: wide-spaced capacitors of matching units for some hundred watts.
        *rating_peak_v = known.then_some(2_000.0);
    }
    if let Some(rating_v) = rating_peak_v {
        let field = egui::DragValue::new(rating_v)
            .range(10.0..=100_000.0)
            .clamp_existing_to_range(false)
            .speed(10.0)
            .max_decimals(0)
            .suffix(" V")
            .update_while_editing(false);
        let response = ui.add(field).labelled_by(check.id);
        changed |= response.changed();
        if response.drag_stopped() || response.lost_focus() {
            out.push(Command::EndOfDrag);
        }
        let _ = response.explain(sentence);
    } else {
        ui.label("not known");
    }
    let _ = check.explain(sentence);
    ui.end_row();
    changed
}

/// A menu that puts a new link at a place of the feed.
fn insert(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    (feed, link): (usize, usize),
    words: &str,
    state: &mut FeedPathState,
    out: &mut Vec<Command>,
) {
    let links = snapshot.plan.feeds.get(feed).map_or(&[][..], |f| &f.links);
    let has_unit = links.iter().any(|l| matches!(l, Link::MatchingUnit(_)));
    let menu = ui.menu_button(words, |ui| {
        let transformer = Link::Transformer(Transformer { impedance_ratio: 4.0 });
        for (words, enabled, sentence, new) in [
            ("feed line", true, "A piece of coaxial cable; its kind can be changed.", new_line()),
            ("transformer", true, "An ideal transformer, 4 : 1 at first.", transformer),
            (
                "matching unit",
                !has_unit,
                if has_unit {
                    "A feed has one matching unit at most."
                } else {
                    "A coil and a capacitor, set for each frequency."
                },
                new_unit(),
            ),
        ] {
            if button(ui, enabled, words, sentence) {
                out.push(Command::Edit(Edit::InsertLink { feed, link, new }));
                state.picked = Some(Picked::Link { feed, link });
                ui.close();
            }
        }
    });
    let sentence = match words {
        "Insert below" => "A new link between this one and the wire.",
        "Insert above" => "A new link between this one and the transmitter.",
        _ => "A new link at the transmitter.",
    };
    let _ = menu.response.explain(sentence);
}

fn new_line() -> Link {
    Link::Line(LinePiece { line: lines::usual(), length_m: 10.0 })
}

/// Common practice: a coil and a capacitor that bring most wires in from 3.5 MHz up.
fn new_unit() -> Link {
    Link::MatchingUnit(MatchingUnit {
        inductance_max_h: 28e-6,
        capacitance_max_f: 1e-9,
        coil_q: 200.0,
        capacitor_q: 1_000.0,
        rating_peak_v: None,
    })
}

fn new_feed(place: usize) -> Feed {
    let line = Link::Line(LinePiece { line: lines::usual(), length_m: 20.0 });
    Feed { name: format!("feed {}", marks::letter(place)), links: vec![line, new_unit()] }
}
