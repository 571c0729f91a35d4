//! Invented stations, evaluated, and the demo stations.

#![allow(dead_code, clippy::unwrap_used)] // Each test binary uses its part; a panic is the failure.

use sheet::{Date, Paper, SheetRequest};
use station::evaluate::Evaluator;
use station::plan::{
    Band, BandRange, ConductorChoice, ConductorData, Earth, Feed, Feedpoint, LineChoice, LineConstruction,
    LineData, LinePiece, Link, LossLaw, MatchingUnit, PathPoint, Plan, Point, Site, Soil, Support,
    SupportKind, Transformer, Transmitter, Wire,
};
use station::report::Report;
use station::units::Units;

pub const DATE: Date = Date { year: 2026, month: 12, day: 1 };

pub fn requests() -> Vec<SheetRequest> {
    let mut out = Vec::new();
    for paper in [Paper::A4, Paper::Letter] {
        for units in [Units::Metres, Units::Feet] {
            out.push(SheetRequest { paper, units, date: DATE });
        }
    }
    out
}

pub struct Station {
    pub name: String,
    pub plan: Plan,
    pub report: Report,
}

/// All fixtures and all demo stations.
pub fn stations() -> Vec<Station> {
    let invented = [
        ("relief post", relief_post()),
        ("long list", long_list()),
        ("hanging ends", hanging_ends()),
        ("end fed", end_fed()),
        ("smallest", smallest()),
        ("far entrance", far_entrance()),
        ("strange letters", strange_letters()),
    ];
    let mut out: Vec<Station> = invented.into_iter().map(|(name, plan)| station(name, plan)).collect();
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("../../demo-projects");
    let mut files: Vec<_> = std::fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path()).collect();
    files.sort();
    assert!(!files.is_empty(), "no demo stations");
    for path in files {
        let name = path.file_stem().unwrap().to_string_lossy().into_owned();
        out.push(station(&name, station::file::load(&path).unwrap()));
    }
    out
}

pub fn station(name: &str, plan: Plan) -> Station {
    let report = Evaluator::new().evaluate(&plan, 1).unwrap_or_else(|error| panic!("{name}: {error}"));
    Station { name: name.to_owned(), plan, report }
}

fn line(name: &str, z0_ohm: f64, velocity_factor: f64, length_m: f64, rating_peak_v: Option<f64>) -> Link {
    let loss = LossLaw { k1_db_per_100m: 0.3, k2_db_per_100m: 0.01 };
    let construction = LineConstruction::Published { z0_ohm, velocity_factor, loss };
    let data = LineData { name: name.to_owned(), construction, rating_peak_v, source: String::new() };
    Link::Line(LinePiece { line: LineChoice::Own(data), length_m })
}

fn unit() -> Link {
    Link::MatchingUnit(MatchingUnit {
        inductance_max_h: 28e-6,
        capacitance_max_f: 500e-12,
        coil_q: 200.0,
        capacitor_q: 1000.0,
        rating_peak_v: Some(1500.0),
    })
}

fn bands(count: usize) -> Vec<Band> {
    let known = [
        ("160 m", 1.81, 2.0),
        ("80 m", 3.5, 3.8),
        ("60 m", 5.3515, 5.3665),
        ("40 m", 7.0, 7.2),
        ("30 m", 10.1, 10.15),
        ("20 m", 14.0, 14.35),
        ("17 m", 18.068, 18.168),
        ("15 m", 21.0, 21.45),
        ("12 m", 24.89, 24.99),
        ("10 m", 28.0, 29.7),
        ("6 m", 50.0, 52.0),
    ];
    let channels = |name: &str, mhz: &[f64]| Band {
        name: name.to_owned(),
        range: BandRange::Channels { frequencies_hz: mhz.iter().map(|f| f * 1e6).collect() },
    };
    let mut out: Vec<Band> = known
        .iter()
        .map(|(name, low, high)| Band {
            name: (*name).to_owned(),
            range: BandRange::Span { low_hz: low * 1e6, high_hz: high * 1e6 },
        })
        .collect();
    out.push(channels("Relief net", &[3.895, 5.371, 7.635]));
    for index in out.len()..count {
        out.push(channels(
            &format!("Coordination of the northern valleys {index}"),
            &[4.0 + index as f64 * 0.5],
        ));
    }
    out.truncate(count);
    out
}

fn support(name: &str, kind: SupportKind, x_m: f64, y_m: f64, height_m: f64) -> Support {
    Support { name: name.to_owned(), kind, foot: Point::new(x_m, y_m, 0.0), height_m }
}

fn on(name: &str, height_m: f64) -> PathPoint {
    PathPoint::OnSupport { support: name.to_owned(), height_m }
}

fn copper() -> ConductorChoice {
    ConductorChoice::Own(ConductorData {
        name: "bare copper 2 mm".to_owned(),
        diameter_m: 0.002,
        conductivity_s_per_m: 5.8e7,
        stranding_factor: 1.0,
        relative_permeability: 1.0,
        core: None,
        insulation: None,
        source: String::new(),
    })
}

pub fn relief_post() -> Plan {
    Plan {
        name: "Salt pan relief post".to_owned(),
        purpose: "District office after the flood: voice and data to the three valley posts and the capital."
            .to_owned(),
        call_sign: "X9RLF".to_owned(),
        edition: "B".to_owned(),
        site: Site {
            supports: vec![
                support("north mast", SupportKind::Mast, 0.0, 0.0, 12.0),
                support("cedar", SupportKind::Tree, 47.0, 6.0, 10.0),
            ],
            earth: Earth::Own(Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 }),
            entrance: Point::new(18.0, -3.0, 1.5),
        },
        wires: vec![Wire {
            name: "main wire".to_owned(),
            path: vec![on("north mast", 11.5), on("cedar", 9.0)],
            start_m: 3.2,
            cut_length_m: 40.8,
            conductor: copper(),
        }],
        feedpoint: Feedpoint { wire: 0, fraction: 0.5, gap_m: 0.02 },
        loads: Vec::new(),
        feeds: vec![
            Feed {
                name: "open line".to_owned(),
                links: vec![
                    line("open wire 2 mm, 150 mm apart", 600.0, 0.97, 28.0, Some(4000.0)),
                    Link::Transformer(Transformer { impedance_ratio: 4.0 }),
                    unit(),
                ],
            },
            Feed {
                name: "coax".to_owned(),
                links: vec![line("solid coax 10 mm", 50.0, 0.66, 31.5, None), unit()],
            },
        ],
        bands: bands(12),
        transmitter: Transmitter { power_w: 400.0, resistance_ohm: 50.0, swr_limit: 2.0 },
        least_share_to_wire: 0.5,
    }
}

fn far_entrance() -> Plan {
    let mut plan = relief_post();
    plan.name = "Quarry".to_owned();
    plan.site.entrance = Point::new(2_400.0, 310.0, -4.0);
    plan.site.supports[0].height_m = 290.0;
    plan
}

/// What people paste into names: other scripts, signs the fonts lack, control characters, markup.
fn strange_letters() -> Plan {
    let mut plan = relief_post();
    plan.name = "Пост \u{5317}\u{4eac} \u{1f680}\u{200d}\ttab & <b>\"bold\"</b>".to_owned();
    plan.purpose = "\u{0645}\u{0648}\u{0642}\u{0639}\nsecond line \u{0301}\u{feff}".to_owned();
    plan.call_sign = "\u{7}".to_owned();
    plan.feeds[0].name = "¿Línea? \\ %s {} $x$".to_owned();
    plan.bands[3].name = "\u{202e}m 04".to_owned();
    plan
}

/// Text of the greatest length that a plan may have there, ending in one long word.
fn longest(text: &str, characters: usize) -> String {
    let words = text.chars().chain(" with WWWWWWWWWWWWWWWW".chars()).chain(std::iter::repeat('m'));
    words.take(characters).collect()
}

pub fn long_list() -> Plan {
    let mut plan = relief_post();
    plan.name = longest("Coast and mountain coordination centre of the northern", 80);
    plan.purpose = longest(&"It serves seven valleys at length, and says so in many words. ".repeat(6), 400);
    plan.call_sign = longest("X9LONGCALL", 40);
    plan.edition = longest("2026-11 after the", 20);
    plan.bands = bands(30);
    for support in &mut plan.site.supports {
        support.name = longest(&format!("{} beside the customs house", support.name), 60);
    }
    plan.wires[0].path = vec![on(&plan.site.supports[0].name, 11.5), on(&plan.site.supports[1].name, 9.0)];
    plan.wires[0].name = longest("main wire of the centre", 60);
    let window = line(&longest("window line", 80), 450.0, 0.91, 24.0, Some(900.0));
    let thin = line("thin coax", 50.0, 0.66, 6.0, Some(500.0));
    let links = vec![window, Link::Transformer(Transformer { impedance_ratio: 9.0 }), thin, unit()];
    plan.feeds.push(Feed { name: "window line, second transmitter".to_owned(), links });
    for feed in &mut plan.feeds {
        feed.name = longest(&feed.name, 60);
    }
    for band in &mut plan.bands[11..] {
        band.name = longest(&band.name, 60);
    }
    plan
}

fn hanging_ends() -> Plan {
    let mut plan = relief_post();
    plan.name = "Ridge hut".to_owned();
    plan.call_sign = String::new();
    plan.purpose = String::new();
    plan.site.supports = vec![
        support("west pole", SupportKind::Mast, 0.0, 0.0, 9.0),
        support("hut", SupportKind::Building, 14.0, 0.0, 7.0),
        support("east pole", SupportKind::Mast, 26.0, 0.0, 8.0),
    ];
    plan.site.supports[2].foot.z_m = 2.5;
    plan.wires[0].path = vec![on("west pole", 9.0), on("hut", 7.0), on("east pole", 8.0)];
    plan.wires[0].start_m = -5.0;
    plan.wires[0].cut_length_m = 38.0;
    plan.feedpoint.fraction = 0.36;
    plan.bands.truncate(6);
    plan.site.entrance = Point::new(13.0, 0.0, 2.0);
    plan
}

fn end_fed() -> Plan {
    let mut plan = relief_post();
    plan.name = "Lighthouse spare".to_owned();
    plan.wires[0].path =
        vec![PathPoint::Free(Point::new(0.0, 0.0, 2.5)), PathPoint::Free(Point::new(12.0, 16.0, 14.0))];
    plan.wires[0].start_m = 0.0;
    plan.wires[0].cut_length_m = 20.0;
    plan.feedpoint.fraction = 0.02;
    plan.site.entrance = Point::new(-3.0, -1.0, 1.0);
    plan.bands.truncate(3);
    plan
}

fn smallest() -> Plan {
    let mut plan = relief_post();
    plan.name = "Q".to_owned();
    plan.edition = String::new();
    plan.purpose = String::new();
    plan.call_sign = String::new();
    plan.feeds = vec![Feed { name: "direct".to_owned(), links: Vec::new() }];
    plan.bands.truncate(1);
    plan
}
