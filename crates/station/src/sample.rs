//! A small invented station for the unit tests of this crate.

use crate::plan::{
    Band, BandRange, ConductorChoice, Earth, Feed, Feedpoint, LineChoice, LinePiece, Link, MatchingUnit,
    PathPoint, Plan, Point, Site, Support, SupportKind, Transmitter, Wire,
};

/// 40 m of wire in the middle of 50 m between two masts, fed in the centre through open line or coax.
pub fn plan() -> Plan {
    let mast = |name: &str, x_m: f64| Support {
        name: name.to_owned(),
        kind: SupportKind::Mast,
        foot: Point::new(x_m, 0.0, 0.0),
        height_m: 11.0,
    };
    let on = |support: &str| PathPoint::OnSupport { support: support.to_owned(), height_m: 10.0 };
    let span = |name: &str, low_hz: f64, high_hz: f64| Band {
        name: name.to_owned(),
        range: BandRange::Span { low_hz, high_hz },
    };
    let line = |id: &str, length_m: f64| {
        Link::Line(LinePiece { line: LineChoice::Catalogue(id.to_owned()), length_m })
    };
    let unit = Link::MatchingUnit(MatchingUnit {
        inductance_max_h: 30e-6,
        capacitance_max_f: 1.2e-9,
        coil_q: 200.0,
        capacitor_q: 1000.0,
        rating_peak_v: Some(3_000.0),
    });
    Plan {
        name: "Test yard".to_owned(),
        purpose: String::new(),
        call_sign: String::new(),
        edition: String::new(),
        site: Site {
            supports: vec![mast("west mast", 0.0), mast("east mast", 50.0)],
            earth: Earth::Catalogue("farmland".to_owned()),
            entrance: Point::new(25.0, -8.0, 1.0),
        },
        wires: vec![Wire {
            name: "main wire".to_owned(),
            path: vec![on("west mast"), on("east mast")],
            start_m: 5.0,
            cut_length_m: 40.0,
            conductor: ConductorChoice::Catalogue("copper-2mm".to_owned()),
            earthed: Vec::new(),
        }],
        feedpoint: Feedpoint { wire: 0, fraction: 0.5, gap_m: 0.02 },
        loads: Vec::new(),
        feeds: vec![
            Feed { name: "coax".to_owned(), links: vec![line("coax-rg-213", 20.0)] },
            Feed { name: "open line".to_owned(), links: vec![line("open-wire-600", 20.0), unit] },
        ],
        bands: vec![span("80 m", 3.5e6, 3.8e6), span("40 m", 7.0e6, 7.2e6), span("20 m", 14.0e6, 14.35e6)],
        transmitter: Transmitter { power_w: 100.0, resistance_ohm: 50.0, swr_limit: 2.0 },
        least_share_to_wire: 0.5,
    }
}
