//! The wires: each with its name, conductor and cut length; more of them; where the first is fed.

use eframe::egui::{ComboBox, Ui};
use station::catalogue;
use station::plan::{ConductorChoice, PathPoint, Plan, Point, Wire};

use super::group;
use super::site::length;
use super::typed::{TextField, Typed};
use crate::command::{Command, Edit};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::views::fields::{Quantity, button, quantity};

const NAME_WIDTH: f32 = 150.0;
/// Height of a pick list, points.
const PICK_LIST: f32 = 420.0;
/// Length of a new wire, and how far beside the first one it hangs, m.
const NEW_WIRE_M: f64 = 10.0;
const ASIDE_M: f64 = 5.0;

/// Every wire, what can be added, and the place of the feedpoint.
pub(super) fn show(ui: &mut Ui, snapshot: &Snapshot<'_>, typed: &mut Typed, out: &mut Vec<Command>) {
    let several = snapshot.plan.wires.len() > 1;
    for (index, wire) in snapshot.plan.wires.iter().enumerate() {
        ui.push_id(("wire", index), |ui| one(ui, snapshot, (index, wire), typed, out));
        ui.add_space(6.0);
    }
    fed_at(ui, snapshot, several, out);
    ui.add_space(6.0);
    ui.horizontal(|ui| {
        if button(
            ui,
            true,
            "Add a wire",
            "Another wire beside the first, on two free points; pull them where they belong",
        ) {
            out.push(Command::Edit(Edit::AddWire(new_wire(snapshot.plan))));
        }
        let sentence =
            "Two more wires, one from either side of the feedpoint, half as long as the fed one: a fan";
        if button(ui, true, "Add two arms at the feedpoint", sentence) {
            let fed = snapshot.plan.wires.get(snapshot.plan.feedpoint.wire);
            let length_m = fed.map_or(NEW_WIRE_M, |wire| arm_m(wire.cut_length_m));
            out.push(Command::Edit(Edit::AddArms { length_m }));
        }
    });
}

fn one(
    ui: &mut Ui,
    snapshot: &Snapshot<'_>,
    (index, wire): (usize, &Wire),
    typed: &mut Typed,
    out: &mut Vec<Command>,
) {
    let number = index + 1;
    ui.horizontal(|ui| {
        let name = format!("name of wire {number}");
        let sentence = "What cut list, Yard and findings call this wire.";
        let field =
            TextField { name: &name, label: None, sentence, text: &wire.name, width: NAME_WIDTH, rows: 1 };
        if let (_, Some(name)) = typed.show(ui, &field) {
            out.push(Command::Edit(Edit::RenameWire { wire: index, name }));
            out.push(Command::EndOfDrag);
        }
        let is_fed = snapshot.plan.feedpoint.wire == index;
        let sentence =
            if is_fed { "The wire that is fed stays." } else { "Takes this wire away, and the loads in it." };
        let words = format!("Remove wire {number}");
        if button(ui, !is_fed, &words, sentence) {
            out.push(Command::Edit(Edit::RemoveWire { wire: index }));
        }
    });
    group(ui, &wire.name, |ui| {
        conductor(ui, index, &wire.conductor, out);
        let sentence = "Electrical length of wire between its two ends; the sheet adds what knots need.";
        let field =
            Quantity { range: 0.5..=1e6, ..length(snapshot, "cut length", sentence, wire.cut_length_m) };
        if let Some(cut_length_m) = quantity(ui, &field, out) {
            out.push(Command::Edit(Edit::CutLength { wire: index, cut_length_m }));
        }
    });
    super::earthing::show(ui, snapshot, (index, wire), out);
}

fn fed_at(ui: &mut Ui, snapshot: &Snapshot<'_>, several: bool, out: &mut Vec<Command>) {
    let feedpoint = snapshot.plan.feedpoint;
    let fed_at = Quantity {
        label: "fed at",
        sentence: "Share of the wire between its beginning and the feedpoint: 50 % is the centre.",
        value: feedpoint.fraction,
        unit: 0.01,
        suffix: " %",
        range: 0.0..=100.0,
        speed: 0.1,
        decimals: 1,
    };
    ui.horizontal(|ui| {
        if let Some(fraction) = quantity(ui, &fed_at, out) {
            out.push(Command::Edit(Edit::FeedFraction(fraction)));
        }
        if several && let Some(wire) = snapshot.plan.wires.get(feedpoint.wire) {
            ui.weak(format!("of {}", wire.name));
        }
    });
}

fn conductor(ui: &mut Ui, wire: usize, chosen: &ConductorChoice, out: &mut Vec<Command>) {
    let (name, sentence) = match chosen {
        ConductorChoice::Own(data) => {
            (data.name.clone(), format!("{}, the station's own figures", data.name))
        }
        ConductorChoice::Catalogue(id) => match catalogue::conductor_entry(id) {
            Ok(entry) => (entry.data.name.clone(), format!("{}. Figures: {}", entry.hint, entry.data.source)),
            Err(error) => (id.clone(), error.to_string()),
        },
    };
    let picker =
        ComboBox::from_id_salt(("conductor", wire)).selected_text(name).height(PICK_LIST).show_ui(ui, |ui| {
            for entry in catalogue::conductors() {
                let is_chosen = matches!(chosen, ConductorChoice::Catalogue(id) if *id == entry.id);
                if ui.selectable_label(is_chosen, &entry.data.name).explain(&entry.hint).clicked()
                    && !is_chosen
                {
                    let conductor = ConductorChoice::Catalogue(entry.id.clone());
                    out.push(Command::Edit(Edit::Conductor { wire, conductor }));
                }
            }
        });
    picker.response.accessible_name(format!("conductor of wire {}", wire + 1)).explain(sentence);
}

/// A quarter of the fed wire's length, to the decimetre: half of one of its sides.
fn arm_m(cut_length_m: f64) -> f64 {
    ((0.25 * cut_length_m * 10.0).round() / 10.0).max(1.0)
}

/// A level wire beside the first one, clear of all others.
fn new_wire(plan: &Plan) -> Wire {
    let taken = |name: &String| plan.wires.iter().any(|wire| wire.name == *name);
    let name = (2_usize..).map(|number| format!("wire {number}")).find(|name| !taken(name));
    let hung = station::hang::hang(plan).ok();
    let at = |point: fn(&station::hang::HungWire) -> Option<Point>| {
        hung.as_ref().and_then(|hung| point(hung.wires.first()?))
    };
    let first = at(|wire| wire.vertices.first().map(|v| v.at)).unwrap_or(Point::new(0.0, 0.0, 8.0));
    let toward = at(|wire| wire.vertices.get(1).map(|v| v.at)).unwrap_or(Point::new(1.0, 0.0, 8.0));
    let (dx, dy) = (toward.x_m - first.x_m, toward.y_m - first.y_m);
    let run_m = dx.hypot(dy);
    let (east, north) = if run_m > 0.01 { (dx / run_m, dy / run_m) } else { (1.0, 0.0) };
    let aside_m = ASIDE_M * plan.wires.len() as f64;
    let from = Point::new(first.x_m - north * aside_m, first.y_m + east * aside_m, first.z_m.max(2.0));
    let to = Point { x_m: from.x_m + NEW_WIRE_M * east, y_m: from.y_m + NEW_WIRE_M * north, ..from };
    Wire {
        name: name.unwrap_or_default(),
        path: vec![PathPoint::Free(from), PathPoint::Free(to)],
        start_m: 0.0,
        cut_length_m: NEW_WIRE_M,
        earthed: Vec::new(),
        conductor: plan.wires.first().map_or_else(
            || ConductorChoice::Catalogue("copper-2mm".to_owned()),
            |wire| wire.conductor.clone(),
        ),
    }
}
