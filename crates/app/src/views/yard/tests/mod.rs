//! The Yard without a screen: an invented site, pointers, arrow keys, and where things stand.

mod layout;
mod moves;
mod wave;

use eframe::egui::{Rect, Vec2, pos2, vec2};
use station::plan::{
    Band, BandRange, Circuit, ConductorChoice, Earth, Feed, Feedpoint, LineChoice, LinePiece, Link, Load,
    PathPoint, Plan, Point, Site, Support, SupportKind, Transmitter, Wire,
};

use crate::start;

use super::layout::{plot, stage};
use super::model::Model;
use super::side_view::{Camera, SideView};

pub fn support(name: &str, x_m: f64, height_m: f64) -> Support {
    Support { name: name.to_owned(), kind: SupportKind::Mast, foot: Point::new(x_m, 0.0, 0.0), height_m }
}

pub fn on(support: &str, height_m: f64) -> PathPoint {
    PathPoint::OnSupport { support: support.to_owned(), height_m }
}

/// 30 m of wire in the middle of 40 m between two masts, 10 m up.
pub fn flat() -> Plan {
    Plan {
        name: "Test yard".to_owned(),
        site: Site {
            supports: vec![support("west mast", 0.0, 11.0), support("east mast", 40.0, 11.0)],
            earth: Earth::Mirror,
            entrance: Point::new(18.0, -5.0, 1.5),
        },
        wires: vec![Wire {
            name: "main wire".to_owned(),
            path: vec![on("west mast", 10.0), on("east mast", 10.0)],
            start_m: 5.0,
            cut_length_m: 30.0,
            conductor: ConductorChoice::Catalogue("copper-2mm".to_owned()),
            earthed: Vec::new(),
        }],
        feedpoint: Feedpoint { wire: 0, fraction: 0.5, gap_m: 0.02 },
        loads: Vec::new(),
        feeds: vec![Feed {
            name: "open line".to_owned(),
            links: vec![Link::Line(LinePiece {
                line: LineChoice::Catalogue("open-wire-600".to_owned()),
                length_m: 15.0,
            })],
        }],
        bands: vec![
            Band { name: "40 m".to_owned(), range: BandRange::Span { low_hz: 7.0e6, high_hz: 7.2e6 } },
            Band { name: "10 m".to_owned(), range: BandRange::Span { low_hz: 28.0e6, high_hz: 29.7e6 } },
        ],
        transmitter: Transmitter { power_w: 100.0, resistance_ohm: 50.0, swr_limit: 2.0 },
        ..start::demo()
    }
}

/// An inverted V over a mast in the middle.
pub fn vee() -> Plan {
    let mut plan = flat();
    plan.site.supports =
        vec![support("west post", 0.0, 4.0), support("mast", 20.0, 13.0), support("east post", 40.0, 4.0)];
    plan.wires[0].path = vec![on("west post", 3.0), on("mast", 12.5), on("east post", 3.0)];
    plan
}

/// Ends that hang down, 3 m and 4 m.
pub fn bent() -> Plan {
    let mut plan = flat();
    (plan.wires[0].start_m, plan.wires[0].cut_length_m) = (-3.0, 47.0);
    plan
}

/// 80 m, fed at its end.
pub fn end_fed() -> Plan {
    let mut plan = flat();
    plan.site.supports[1].foot.x_m = 84.0;
    (plan.wires[0].start_m, plan.wires[0].cut_length_m) = (1.0, 80.0);
    plan.feedpoint.fraction = 0.005;
    plan
}

/// 80 m fed at an end that hangs down, over masts of different height, on 80 m.
pub fn end_fed_with_bends() -> Plan {
    let mut plan = end_fed();
    plan.site.supports = vec![
        support("low mast", 0.0, 8.5),
        support("high mast", 30.0, 14.0),
        support("east mast", 62.0, 9.0),
    ];
    plan.wires[0].path = vec![on("low mast", 12.0), on("high mast", 13.5), on("east mast", 12.0)];
    plan.wires[0].start_m = -9.0;
    let range = BandRange::Span { low_hz: 3.5e6, high_hz: 3.8e6 };
    plan.bands.insert(0, Band { name: "80 m".to_owned(), range });
    plan
}

/// 80 m fed at an end that hangs down at a mast to a metre over the earth, the entrance beside it.
pub fn end_fed_low() -> Plan {
    let mut plan = end_fed();
    plan.wires[0].start_m = -9.0;
    plan.site.entrance = Point::new(0.5, -2.0, 1.2);
    plan
}

fn free(x_m: f64, z_m: f64) -> PathPoint {
    PathPoint::Free(Point::new(x_m, 0.0, z_m))
}

/// The flat wire with two arms from its feedpoint.
pub fn fan() -> Plan {
    crate::edit::apply(&flat(), &crate::command::Edit::AddArms { length_m: 5.0 }).unwrap().plan
}

/// A level wire that goes on as a second one down a mast.
pub fn ell() -> Plan {
    let mut plan = flat();
    let down = Wire {
        name: "drop".to_owned(),
        path: vec![free(35.0, 10.0), free(35.0, 2.0)],
        start_m: 0.0,
        cut_length_m: 8.0,
        ..plan.wires[0].clone()
    };
    plan.wires.push(down);
    plan
}

/// A closed triangle with its tip at the top.
pub fn closed() -> Plan {
    let mut plan = flat();
    plan.wires[0].path = vec![free(10.0, 3.0), free(20.0, 10.5), free(30.0, 3.0), free(10.0, 3.0)];
    (plan.wires[0].start_m, plan.wires[0].cut_length_m) = (0.0, 20.0 + 2.0 * 10.0_f64.hypot(7.5));
    plan.feedpoint.fraction = 0.8;
    plan
}

/// 10 m straight up, fed near its foot.
pub fn vertical() -> Plan {
    let mut plan = flat();
    plan.wires[0].path = vec![free(20.0, 0.5), free(20.0, 10.5)];
    (plan.wires[0].start_m, plan.wires[0].cut_length_m) = (0.0, 10.0);
    plan.feedpoint.fraction = 0.1;
    plan
}

/// The flat wire with one load of each kind.
pub fn loaded() -> Plan {
    let mut plan = flat();
    let load = |name: &str, fraction: f64, circuit: Circuit| Load {
        name: name.to_owned(),
        wire: 0,
        fraction,
        circuit,
    };
    plan.loads = vec![
        load("coil", 0.1, Circuit::Coil { inductance_h: 3e-6, q: Some(200.0) }),
        load(
            "14 MHz trap",
            0.3,
            Circuit::MeasuredTrap { resonance_hz: 14.1e6, capacitance_f: 40e-12, q: 200.0 },
        ),
        load("capacitor", 0.7, Circuit::Capacitor { capacitance_f: 100e-12, q: None }),
        load("end resistor", 0.9, Circuit::Resistor { resistance_ohm: 400.0 }),
    ];
    plan
}

/// The fitted view of a model in a frame of this size.
pub fn view(model: &Model<'_>, size: Vec2) -> SideView {
    let plot = plot(Rect::from_min_size(pos2(0.0, 0.0), size));
    SideView {
        plane: model.plane,
        camera: Camera::fit(model.bounds().unwrap(), stage(plot), plot),
        frame: plot,
    }
}

pub fn usual_view(model: &Model<'_>) -> SideView {
    view(model, vec2(980.0, 460.0))
}
