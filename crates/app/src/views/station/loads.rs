//! The loads: coils, capacitors, traps and resistors in the wires, each with its place and its values.

use eframe::egui::{ComboBox, Ui};
use station::plan::{Circuit, Load, Plan};
use station::validate::FEED_FRACTION;

use super::group;
use super::site::length;
use super::typed::{TextField, Typed};
use crate::command::{Command, Edit};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::views::fields::{Quantity, button, quantity};
use sheet::model::{LoadKind, load_values};

const NAME_WIDTH: f32 = 150.0;
/// A kind of load that can be picked.
struct Offered {
    name: &'static str,
    sentence: &'static str,
    /// With usual values (common practice).
    circuit: fn() -> Circuit,
}

const OFFERED: [Offered; 5] = [
    Offered {
        name: "trap",
        sentence: "A trap as it was measured: its resonance, its capacitor, its Q there",
        circuit: measured_trap,
    },
    Offered { name: "coil", sentence: "A loading coil", circuit: coil },
    Offered {
        name: "capacitor",
        sentence: "A capacitor in series with the wire",
        circuit: || Circuit::Capacitor { capacitance_f: 100e-12, q: Some(1000.0) },
    },
    Offered {
        name: "trap from parts",
        sentence: "A trap of which coil and capacitor are known",
        circuit: || {
            Circuit::Parallel(vec![
                Circuit::Coil { inductance_h: 8.5e-6, q: Some(200.0) },
                Circuit::Capacitor { capacitance_f: 60e-12, q: Some(1000.0) },
            ])
        },
    },
    Offered {
        name: "resistor",
        sentence: "A resistor: it turns watts into heat",
        circuit: || Circuit::Resistor { resistance_ohm: 400.0 },
    },
];

fn coil() -> Circuit {
    Circuit::Coil { inductance_h: 10e-6, q: Some(200.0) }
}

fn measured_trap() -> Circuit {
    Circuit::MeasuredTrap { resonance_hz: 7.05e6, capacitance_f: 60e-12, q: 150.0 }
}

/// Every load, and one more.
pub(super) fn show(ui: &mut Ui, snapshot: &Snapshot<'_>, typed: &mut Typed, out: &mut Vec<Command>) {
    if snapshot.plan.loads.is_empty() {
        ui.weak("Nothing in the wires: no coil, capacitor, trap or resistor.");
        ui.add_space(6.0);
    }
    for (index, load) in snapshot.plan.loads.iter().enumerate() {
        ui.push_id(("load", index), |ui| one(ui, snapshot, (index, load), typed, out));
        ui.add_space(6.0);
    }
    ui.horizontal(|ui| {
        let place = free_place(snapshot.plan);
        for Offered { name: what, circuit, .. } in &OFFERED[..2] {
            let sentence = if place.is_some() {
                "In the fed wire; its place, kind and values can be changed."
            } else {
                "The fed wire is full of loads."
            };
            if button(ui, place.is_some(), &format!("Add a {what}"), sentence)
                && let Some(fraction) = place
            {
                let name = free_name(snapshot.plan, what);
                let wire = snapshot.plan.feedpoint.wire;
                out.push(Command::Edit(Edit::AddLoad(Load { name, wire, fraction, circuit: circuit() })));
            }
        }
    });
}

fn one(
    ui: &mut Ui,
    snapshot: &Snapshot<'_>,
    (index, load): (usize, &Load),
    typed: &mut Typed,
    out: &mut Vec<Command>,
) {
    let number = index + 1;
    let mut with = load.clone();
    let mut step = false;
    ui.horizontal(|ui| {
        let name = format!("name of load {number}");
        let sentence = "What Yard, sheet and findings call this load.";
        let field =
            TextField { name: &name, label: None, sentence, text: &load.name, width: NAME_WIDTH, rows: 1 };
        if let (_, Some(name)) = typed.show(ui, &field) {
            with.name = name;
            step = true;
        }
        step |= kind(ui, number, &mut with.circuit);
        if button(ui, true, &format!("Remove load {number}"), "Takes this load out; the wire is whole there")
        {
            out.push(Command::Edit(Edit::RemoveLoad { load: index }));
        }
    });
    group(ui, &load.name, |ui| {
        if snapshot.plan.wires.len() > 1 {
            step |= wire(ui, snapshot.plan, number, &mut with.wire);
        }
        place(ui, snapshot, (index, load), out);
    });
    group(ui, &format!("values of {}", load.name), |ui| circuit(ui, &mut with.circuit, out));
    if with != *load {
        out.push(Command::Edit(Edit::SetLoad { load: index, with }));
        if step {
            out.push(Command::EndOfDrag);
        }
    }
}

/// Distance from the wire's beginning.
fn place(ui: &mut Ui, snapshot: &Snapshot<'_>, (index, load): (usize, &Load), out: &mut Vec<Command>) {
    let Some(wire) = snapshot.plan.wires.get(load.wire) else { return };
    let unit = snapshot.units.to_metres(1.0);
    let sentence = "Distance along the wire from its beginning; in the Yard the load can be slid.";
    let shown = length(snapshot, "from the beginning", sentence, load.fraction * wire.cut_length_m);
    let field = Quantity { range: 0.0..=wire.cut_length_m / unit, ..shown };
    if let Some(from_beginning_m) = quantity(ui, &field, out) {
        let fraction = from_beginning_m / wire.cut_length_m;
        let fraction = fraction.clamp(*FEED_FRACTION.start(), *FEED_FRACTION.end());
        out.push(Command::Edit(Edit::LoadFraction { load: index, fraction }));
    }
}

fn wire(ui: &mut Ui, plan: &Plan, number: usize, chosen: &mut usize) -> bool {
    let before = *chosen;
    let name = plan.wires.get(before).map_or("", |wire| wire.name.as_str());
    let picker = ComboBox::from_id_salt("wire").selected_text(name).show_ui(ui, |ui| {
        for (index, wire) in plan.wires.iter().enumerate() {
            ui.selectable_value(chosen, index, &wire.name);
        }
    });
    picker
        .response
        .accessible_name(format!("wire of load {number}"))
        .explain("The wire that this load is in.");
    *chosen != before
}

/// Picks another kind, which begins with usual values.
fn kind(ui: &mut Ui, number: usize, circuit: &mut Circuit) -> bool {
    let shown = words(circuit);
    let mut picked = None;
    let picker = ComboBox::from_id_salt("kind").width(120.0).selected_text(shown).show_ui(ui, |ui| {
        for Offered { name, sentence, circuit } in OFFERED {
            if ui.selectable_label(shown == name, name).explain(sentence).clicked() && shown != name {
                picked = Some(circuit());
            }
        }
    });
    picker.response.accessible_name(format!("kind of load {number}")).explain("What it is made of.");
    let changed = picked.is_some();
    if let Some(made) = picked {
        *circuit = made;
    }
    changed
}

/// The kind's name in the list of kinds.
fn words(circuit: &Circuit) -> &'static str {
    match circuit {
        Circuit::Parallel(_) if LoadKind::of(circuit) == LoadKind::Trap => "trap from parts",
        _ => LoadKind::of(circuit).words(),
    }
}

/// The fields of a circuit's values.
fn circuit(ui: &mut Ui, circuit: &mut Circuit, out: &mut Vec<Command>) {
    match circuit {
        Circuit::Resistor { resistance_ohm } => {
            let sentence = "Its resistance; it must stand the watts it burns.";
            part(ui, ("resistance", sentence, resistance_ohm), &OHMS, out);
        }
        Circuit::Coil { inductance_h, q } => {
            part(ui, ("inductance", "The coil's inductance.", inductance_h), &MICROHENRIES, out);
            quality(ui, ("coil Q", "Reactance over resistance of the coil; 100 to 400 is usual."), q, out);
        }
        Circuit::Capacitor { capacitance_f, q } => {
            part(ui, ("capacitance", "The capacitor's capacitance.", capacitance_f), &PICOFARADS, out);
            let sentence = "Reactance over resistance of the capacitor; 500 and more is usual.";
            quality(ui, ("capacitor Q", sentence), q, out);
        }
        Circuit::MeasuredTrap { resonance_hz, capacitance_f, q } => {
            let sentence = "Where the trap was measured to resonate.";
            part(ui, ("resonance", sentence, resonance_hz), &MEGAHERTZ, out);
            part(ui, ("capacitance", "The trap's capacitor.", capacitance_f), &PICOFARADS, out);
            part(ui, ("Q", "The trap's Q at resonance; 50 to 300 is usual.", q), &QUALITY, out);
        }
        Circuit::Parallel(_) if LoadKind::of(circuit) == LoadKind::Trap => {
            if let Circuit::Parallel(parts) = circuit {
                for part in parts {
                    self::circuit(ui, part, out);
                }
            }
        }
        Circuit::Series(_) | Circuit::Parallel(_) => {
            ui.weak(load_values(circuit));
        }
    }
}

/// How a value stands in its field.
struct Measure {
    unit: f64,
    suffix: &'static str,
    range: std::ops::RangeInclusive<f64>,
    speed: f64,
    decimals: usize,
}

const OHMS: Measure = Measure { unit: 1.0, suffix: " Ω", range: 0.0..=1e6, speed: 1.0, decimals: 1 };
const MICROHENRIES: Measure =
    Measure { unit: 1e-6, suffix: " µH", range: 0.001..=1e4, speed: 0.05, decimals: 3 };
const PICOFARADS: Measure = Measure { unit: 1e-12, suffix: " pF", range: 0.1..=1e4, speed: 0.5, decimals: 1 };
const MEGAHERTZ: Measure =
    Measure { unit: 1e6, suffix: " MHz", range: 0.5..=100.0, speed: 0.005, decimals: 3 };
const QUALITY: Measure = Measure { unit: 1.0, suffix: "", range: 1.0..=1e5, speed: 1.0, decimals: 0 };

fn part(
    ui: &mut Ui,
    (label, sentence, value): (&str, &str, &mut f64),
    measure: &Measure,
    out: &mut Vec<Command>,
) {
    let field = Quantity {
        label,
        sentence,
        value: *value,
        unit: measure.unit,
        suffix: measure.suffix,
        range: measure.range.clone(),
        speed: measure.speed,
        decimals: measure.decimals,
    };
    if let Some(new) = quantity(ui, &field, out) {
        *value = new;
    }
}

/// A part without a Q is lossless; it gets one when it is typed.
fn quality(ui: &mut Ui, (label, sentence): (&str, &str), q: &mut Option<f64>, out: &mut Vec<Command>) {
    match q {
        Some(q) => part(ui, (label, sentence, q), &QUALITY, out),
        None => {
            if button(ui, true, "lossless", "Give this part a Q; without one it burns nothing") {
                *q = Some(200.0);
            }
        }
    }
}

/// A place in the fed wire that is clear of the feedpoint and of other loads.
fn free_place(plan: &Plan) -> Option<f64> {
    const CLEAR: f64 = 0.02;
    let wire = plan.feedpoint.wire;
    let taken = |fraction: f64| {
        let loads = plan.loads.iter().filter(|load| load.wire == wire).map(|load| load.fraction);
        loads.chain([plan.feedpoint.fraction]).any(|other| (other - fraction).abs() < CLEAR)
    };
    [0.25, 0.75, 0.15, 0.85, 0.4, 0.6, 0.33, 0.67, 0.1, 0.9].into_iter().find(|&fraction| !taken(fraction))
}

/// "trap 1", "trap 2", …
fn free_name(plan: &Plan, what: &str) -> String {
    let taken = |name: &String| plan.loads.iter().any(|load| load.name == *name);
    (1_usize..).map(|number| format!("{what} {number}")).find(|name| !taken(name)).unwrap_or_default()
}
