//! What stands on the site and what lies under it.

use eframe::egui::{ComboBox, Ui};
use station::plan::{Point, Support, SupportKind};

use super::typed::{TextField, Typed};
use super::{grid, group};
use crate::command::{Command, Edit};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::views::fields::{Quantity, button, quantity};
use crate::views::soil;

/// Reach of a site in any direction, m.
const REACH_M: f64 = 5_000.0;
/// Highest support, m.
const HIGHEST_M: f64 = 300.0;
/// A new support stands this far beyond the last one, m.
const NEXT_SUPPORT_M: f64 = 10.0;

/// A coordinate of a point: label, sentence, value in metres, and the point with another value.
type Coordinate = (&'static str, &'static str, f64, fn(Point, f64) -> Point);

/// A length of the plan in its field.
pub(super) fn length<'a>(
    snapshot: &Snapshot<'_>,
    label: &'a str,
    sentence: &'a str,
    value_m: f64,
) -> Quantity<'a> {
    let unit = snapshot.units.to_metres(1.0);
    let suffix = if snapshot.units == station::units::Units::Feet { " ft" } else { " m" };
    let reach = REACH_M / unit;
    Quantity {
        label,
        sentence,
        value: value_m,
        unit,
        suffix,
        range: -reach..=reach,
        speed: 0.05 / unit,
        decimals: 2,
    }
}

/// Earth; entrance.
pub(super) fn earth_and_entrance(ui: &mut Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
    grid(ui, "earth and entrance", |ui| {
        let label = ui.label("earth").id;
        soil::picker(ui, "earth", &snapshot.plan.site.earth, out).labelled_by(label);
        ui.end_row();
        soil::own_figures(ui, &snapshot.plan.site.earth, out);
        entrance(ui, snapshot, out);
    });
}

fn entrance(ui: &mut Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
    let at = snapshot.plan.site.entrance;
    let fields: [Coordinate; 3] = [
        ("east", "Where the feed line enters the station.", at.x_m, |p, x_m| Point { x_m, ..p }),
        ("north", "Where the feed line enters the station.", at.y_m, |p, y_m| Point { y_m, ..p }),
        ("up", "Height of the entrance over the earth.", at.z_m, |p, z_m| Point { z_m, ..p }),
    ];
    ui.label("entrance");
    group(ui, "entrance", |ui| {
        for (label, sentence, value_m, moved) in fields {
            if let Some(value_m) = quantity(ui, &length(snapshot, label, sentence, value_m), out) {
                out.push(Command::Edit(Edit::Entrance(moved(at, value_m))));
            }
        }
    });
    ui.end_row();
}

/// Masts, trees, buildings: each with its name, kind, place and height.
pub(super) fn supports(ui: &mut Ui, snapshot: &Snapshot<'_>, typed: &mut Typed, out: &mut Vec<Command>) {
    for (index, support) in snapshot.plan.site.supports.iter().enumerate() {
        ui.push_id(("support", index), |ui| one_support(ui, snapshot, (index, support), typed, out));
        ui.add_space(6.0);
    }
    ui.horizontal(|ui| {
        if button(ui, true, "Add a support", "Another mast; its kind, place and height can be changed") {
            out.push(Command::Edit(Edit::AddSupport(next_support(&snapshot.plan.site.supports))));
        }
    });
}

fn one_support(
    ui: &mut Ui,
    snapshot: &Snapshot<'_>,
    (index, support): (usize, &Support),
    typed: &mut Typed,
    out: &mut Vec<Command>,
) {
    ui.horizontal(|ui| {
        let name = format!("name of support {}", index + 1);
        let sentence = "Wires are made fast to a support by its name.";
        let field =
            TextField { name: &name, label: None, sentence, text: &support.name, width: 150.0, rows: 1 };
        if let (_, Some(name)) = typed.show(ui, &field) {
            out.push(Command::Edit(Edit::RenameSupport { support: index, name }));
            out.push(Command::EndOfDrag);
        }
        kind(ui, index, support.kind, out);
        if button(ui, true, "Remove", "Takes this support away; no wire may hang on it") {
            out.push(Command::Edit(Edit::RemoveSupport { support: index }));
        }
    });
    let foot = support.foot;
    group(ui, &support.name, |ui| {
        let place: [Coordinate; 2] = [
            ("east", "Its foot, to the east.", foot.x_m, |p, x_m| Point { x_m, ..p }),
            ("north", "Its foot, to the north.", foot.y_m, |p, y_m| Point { y_m, ..p }),
        ];
        for (label, sentence, value_m, moved) in place {
            if let Some(value_m) = quantity(ui, &length(snapshot, label, sentence, value_m), out) {
                out.push(Command::Edit(Edit::SupportFoot { support: index, foot: moved(foot, value_m) }));
            }
        }
        let unit = snapshot.units.to_metres(1.0);
        let height = length(snapshot, "height", "Its height over its foot.", support.height_m);
        let height = Quantity { range: 0.0..=HIGHEST_M / unit, ..height };
        if let Some(height_m) = quantity(ui, &height, out) {
            out.push(Command::Edit(Edit::SupportHeight { support: index, height_m }));
        }
    });
}

fn kind(ui: &mut Ui, index: usize, kind: SupportKind, out: &mut Vec<Command>) {
    let words = |kind| match kind {
        SupportKind::Mast => "mast",
        SupportKind::Tree => "tree",
        SupportKind::Building => "building",
    };
    let picker = ComboBox::from_id_salt("kind").width(84.0).selected_text(words(kind)).show_ui(ui, |ui| {
        for choice in [SupportKind::Mast, SupportKind::Tree, SupportKind::Building] {
            if ui.selectable_label(kind == choice, words(choice)).clicked() && kind != choice {
                out.push(Command::Edit(Edit::SupportKind { support: index, kind: choice }));
            }
        }
    });
    picker.response.accessible_name(format!("kind of support {}", index + 1)).explain("What it is");
}

/// As high as the last one, a little further on, under a name of its own.
fn next_support(supports: &[Support]) -> Support {
    let name = (1_usize..)
        .map(|number| format!("mast {number}"))
        .find(|name| supports.iter().all(|support| support.name != *name))
        .unwrap_or_default();
    let east_m = supports.iter().map(|support| support.foot.x_m).fold(0.0, f64::max);
    Support {
        name,
        kind: SupportKind::Mast,
        foot: Point::new(east_m + NEXT_SUPPORT_M, 0.0, 0.0),
        height_m: supports.last().map_or(10.0, |support| support.height_m),
    }
}
