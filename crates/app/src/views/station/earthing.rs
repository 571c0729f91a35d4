//! Ends of a wire that are connected to the earth: by what, and its figures.

use eframe::egui::{ComboBox, Ui};
use station::plan::{EarthConnection, Electrode, Wire, WireEnd};

use super::group;
use super::site::length;
use crate::command::{Command, Edit};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::views::fields::{Quantity, quantity};

/// A kind of electrode that can be picked, with usual figures (common practice).
struct Offered {
    name: &'static str,
    sentence: &'static str,
    electrode: fn() -> Electrode,
}

const OFFERED: [Offered; 3] = [
    Offered {
        name: "earth stake",
        sentence: "A lead of the same wire straight down to a stake in the earth; approximate",
        electrode: || Electrode::Stake { length_m: 1.5, diameter_m: 0.016 },
    },
    Offered {
        name: "a few radials",
        sentence: "A lead of the same wire straight down to a star of bare wires on the earth; approximate",
        electrode: || Electrode::Radials { count: 4, length_m: 10.0, diameter_m: 0.002 },
    },
    Offered {
        name: "stated impedance",
        sentence: "A lead of the same wire straight down to an electrode whose impedance has been measured",
        electrode: || Electrode::Stated { resistance_ohm: 40.0, reactance_ohm: 0.0 },
    },
];

const OHMS: f64 = 1.0;
const MILLIMETRES: f64 = 1e-3;

/// Both ends of a wire.
pub(super) fn show(
    ui: &mut Ui,
    snapshot: &Snapshot<'_>,
    (index, wire): (usize, &Wire),
    out: &mut Vec<Command>,
) {
    for (end, words) in [(WireEnd::Beginning, "beginning"), (WireEnd::End, "end")] {
        let now = wire.earthed.iter().find(|connection| connection.end == end);
        let mut with = now.map(|connection| connection.electrode.clone());
        let name = format!("earth at the {words} of {}", wire.name);
        let mut step = false;
        ui.horizontal(|ui| {
            ui.label(format!("{words} earthed by"));
            step = pick(ui, &name, &mut with);
        });
        if let Some(electrode) = &mut with {
            group(ui, &format!("figures of the {name}"), |ui| figures(ui, snapshot, electrode, out));
        }
        if with.as_ref() != now.map(|connection| &connection.electrode) {
            let others = wire.earthed.iter().filter(|connection| connection.end != end).cloned();
            let earthed = others.chain(with.map(|electrode| EarthConnection { end, electrode })).collect();
            out.push(Command::Edit(Edit::Earthing { wire: index, earthed }));
            if step {
                out.push(Command::EndOfDrag);
            }
        }
    }
}

fn words(electrode: &Electrode) -> &'static str {
    match electrode {
        Electrode::Stake { .. } => OFFERED[0].name,
        Electrode::Radials { .. } => OFFERED[1].name,
        Electrode::Stated { .. } => OFFERED[2].name,
    }
}

/// Picks a kind; true when it has changed.
fn pick(ui: &mut Ui, name: &str, with: &mut Option<Electrode>) -> bool {
    let shown = with.as_ref().map_or("nothing", words);
    let mut picked = None;
    let picker = ComboBox::from_id_salt(name).selected_text(shown).show_ui(ui, |ui| {
        let sentence = "The end is open, as wire ends mostly are";
        if ui.selectable_label(shown == "nothing", "nothing").explain(sentence).clicked() {
            picked = Some(None);
        }
        for Offered { name, sentence, electrode } in OFFERED {
            if ui.selectable_label(shown == name, name).explain(sentence).clicked() && shown != name {
                picked = Some(Some(electrode()));
            }
        }
    });
    let sentence =
        "What connects this end to the earth. What the earth opposes there is known approximately only.";
    picker.response.accessible_name(name.to_owned()).explain(sentence);
    let changed = picked.as_ref().is_some_and(|new| new != with);
    if let Some(new) = picked {
        *with = new;
    }
    changed
}

fn figures(ui: &mut Ui, snapshot: &Snapshot<'_>, electrode: &mut Electrode, out: &mut Vec<Command>) {
    let metres = |label, sentence, value_m: f64, range: std::ops::RangeInclusive<f64>| {
        let unit = snapshot.units.to_metres(1.0);
        Quantity {
            range: range.start() / unit..=range.end() / unit,
            ..length(snapshot, label, sentence, value_m)
        }
    };
    let plain = |label, sentence, value, unit, suffix, range, decimals| Quantity {
        label,
        sentence,
        value,
        unit,
        suffix,
        range,
        speed: 0.1,
        decimals,
    };
    match electrode {
        Electrode::Stake { length_m, diameter_m } => {
            let field = metres("length", "How deep the stake stands in the earth.", *length_m, 0.1..=20.0);
            set(quantity(ui, &field, out), length_m);
            let sentence = "Diameter of the stake.";
            let field = plain("diameter", sentence, *diameter_m, MILLIMETRES, " mm", 1.0..=200.0, 1);
            set(quantity(ui, &field, out), diameter_m);
        }
        Electrode::Radials { count, length_m, diameter_m } => {
            let field = plain("count", "How many radials.", f64::from(*count), 1.0, "", 1.0..=64.0, 0);
            if let Some(new) = quantity(ui, &field, out) {
                *count = new.round() as u32;
            }
            let field = metres("length", "Length of each radial.", *length_m, 0.5..=100.0);
            set(quantity(ui, &field, out), length_m);
            let sentence = "Diameter of the bare wire.";
            let field = plain("diameter", sentence, *diameter_m, MILLIMETRES, " mm", 0.1..=20.0, 1);
            set(quantity(ui, &field, out), diameter_m);
        }
        Electrode::Stated { resistance_ohm, reactance_ohm } => {
            let sentence = "Resistance of the electrode, measured.";
            let field = plain("resistance", sentence, *resistance_ohm, OHMS, " Ω", 0.0..=10_000.0, 1);
            set(quantity(ui, &field, out), resistance_ohm);
            let sentence = "Reactance of the electrode; 0 where it is not known.";
            let field = plain("reactance", sentence, *reactance_ohm, OHMS, " Ω", -10_000.0..=10_000.0, 1);
            set(quantity(ui, &field, out), reactance_ohm);
        }
    }
}

fn set(new: Option<f64>, value: &mut f64) {
    if let Some(new) = new {
        *value = new;
    }
}
