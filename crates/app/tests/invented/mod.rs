//! An invented plan and an invented report for the stories: plausible shapes, no physics worth believing.
#![allow(dead_code)] // Each story uses a part.

pub mod stage;

use num_complex::Complex64;
use station::hang::{Hung, HungWire, Port, Vertex};
use station::plan::{
    Band, BandRange, ConductorChoice, ConductorData, Earth, Feed, Feedpoint, LineChoice, LinePiece, Link,
    MatchingUnit, PathPoint, Plan, Point, Site, Transformer, Transmitter, Wire,
};
use station::report::{
    BandFeed, BandReport, FeedReport, FrequencyReport, LinkReport, Mark, MarkKind, Model, ProfilePoint,
    Report, Seen, Sense, Setting, Shares, StandingWave, Verdict, VerdictKind, WireWave,
};

const WIRE_M: f64 = 40.0;
const POWER_W: f64 = 100.0;

/// Ready bands: name, lower and upper edge in kHz.
const BANDS: [(&str, f64, f64); 14] = [
    ("160 m", 1_810.0, 2_000.0),
    ("80 m", 3_500.0, 3_800.0),
    ("60 m", 5_351.5, 5_366.5),
    ("40 m", 7_000.0, 7_200.0),
    ("30 m", 10_100.0, 10_150.0),
    ("20 m", 14_000.0, 14_350.0),
    ("17 m", 18_068.0, 18_168.0),
    ("15 m", 21_000.0, 21_450.0),
    ("12 m", 24_890.0, 24_990.0),
    ("10 m", 28_000.0, 29_700.0),
    ("6 m", 50_000.0, 52_000.0),
    ("Port 1", 8_291.0, 8_291.0),
    ("Port 2", 12_290.0, 12_359.0),
    ("Port 3", 16_420.0, 16_600.0),
];

pub fn unit() -> Link {
    Link::MatchingUnit(MatchingUnit {
        inductance_max_h: 28e-6,
        capacitance_max_f: 1.0e-9,
        coil_q: 200.0,
        capacitor_q: 1000.0,
        rating_peak_v: Some(3_000.0),
    })
}

pub fn line(id: &str, length_m: f64) -> Link {
    Link::Line(LinePiece { line: LineChoice::Catalogue(id.to_owned()), length_m })
}

/// A plan with so many bands and so many feeds.
pub fn plan(bands: usize, feeds: usize) -> Plan {
    let on = |x_m: f64| PathPoint::Free(Point::new(x_m, 0.0, 10.0));
    let mut bands: Vec<Band> = BANDS[..bands]
        .iter()
        .map(|&(name, low, high)| {
            let range = if name.starts_with("Port") {
                BandRange::Channels {
                    frequencies_hz: vec![low * 1e3, 0.4e3 * low + 0.6e3 * high, high * 1e3],
                }
            } else {
                BandRange::Span { low_hz: low * 1e3, high_hz: high * 1e3 }
            };
            Band { name: name.to_owned(), range }
        })
        .collect();
    if let Some(Band { range: BandRange::Channels { frequencies_hz }, .. }) = bands.get_mut(11) {
        frequencies_hz.truncate(1);
    }
    let all = [
        Feed { name: "coax".to_owned(), links: vec![line("coax-rg-213", 25.0), unit()] },
        Feed { name: "open line".to_owned(), links: vec![line("open-wire-600", 25.0), unit()] },
        Feed {
            name: "4:1 at the wire".to_owned(),
            links: vec![
                Link::Transformer(Transformer { impedance_ratio: 4.0 }),
                line("coax-rg-213", 18.0),
                line("coax-rg-213", 7.0),
                unit(),
            ],
        },
    ];
    Plan {
        name: "Invented yard".to_owned(),
        purpose: String::new(),
        call_sign: String::new(),
        edition: String::new(),
        site: Site { supports: vec![], earth: Earth::NoEarth, entrance: Point::new(0.0, -5.0, 1.0) },
        wires: vec![Wire {
            name: "main wire".to_owned(),
            path: vec![on(0.0), on(WIRE_M)],
            start_m: 0.0,
            cut_length_m: WIRE_M,
            conductor: ConductorChoice::Catalogue("copper-2mm".to_owned()),
            earthed: Vec::new(),
        }],
        feedpoint: Feedpoint { wire: 0, fraction: 0.5, gap_m: 0.02 },
        loads: Vec::new(),
        feeds: all[..feeds].to_vec(),
        bands,
        transmitter: Transmitter { power_w: POWER_W, resistance_ohm: 50.0, swr_limit: 2.0 },
        least_share_to_wire: 0.5,
    }
}

/// A report that goes with [`plan`].
pub fn report(plan: &Plan) -> Report {
    let ends = [Point::new(0.0, 0.0, 10.0), Point::new(WIRE_M, 0.0, 10.0)];
    let conductor = ConductorData {
        name: "copper".to_owned(),
        diameter_m: 2e-3,
        conductivity_s_per_m: 58e6,
        stranding_factor: 1.0,
        relative_permeability: 1.0,
        core: None,
        insulation: None,
        source: String::new(),
    };
    Report {
        revision: 1,
        model: Model::Sketch,
        hung: Hung {
            wires: vec![HungWire {
                vertices: vec![Vertex { at: ends[0], arc_m: 0.0 }, Vertex { at: ends[1], arc_m: WIRE_M }],
                conductor,
            }],
            leads: Vec::new(),
            ropes: vec![],
            feedpoint: Port { wire: 0, arc_m: 0.5 * WIRE_M, at: ends[0].toward(ends[1], 0.5) },
        },
        feed_names: plan.feeds.iter().map(|f| f.name.clone()).collect(),
        link_names: plan.feeds.iter().map(|f| f.links.iter().map(|_| String::new()).collect()).collect(),
        bands: plan.bands.iter().map(|band| band_report(band, plan)).collect(),
        findings: vec![],
    }
}

fn band_report(band: &Band, plan: &Plan) -> BandReport {
    let (low_hz, high_hz) = band.range.edges_hz();
    let frequencies: Vec<f64> = match &band.range {
        BandRange::Channels { frequencies_hz } => frequencies_hz.clone(),
        BandRange::Span { .. } => {
            (0..=100).map(|i| low_hz + (high_hz - low_hz) * f64::from(i) / 100.0).collect()
        }
    };
    let points: Vec<FrequencyReport> = frequencies.iter().map(|&f| frequency_report(f, plan)).collect();
    let middle = points.len() / 2;
    let feeds = (0..plan.feeds.len()).map(|feed| band_feed(&points, feed, plan)).collect();
    let wave = wave(points[middle].frequency_hz);
    BandReport { name: band.name.clone(), low_hz, high_hz, points, middle, feeds, wave }
}

fn feedpoint(frequency_hz: f64) -> Complex64 {
    // An open line with a little loss, seen from its middle.
    let k = std::f64::consts::TAU * frequency_hz / 299_792_458.0;
    let gamma = Complex64::new(0.05 * k.sqrt() / 20.0f64.sqrt(), k);
    900.0 / (gamma * 0.5 * WIRE_M * 1.02).tanh()
}

fn seen(z_ohm: Complex64, reference_ohm: f64) -> Seen {
    let gamma = ((z_ohm - reference_ohm) / (z_ohm + reference_ohm)).norm();
    Seen { z_ohm, reference_ohm, swr: (1.0 + gamma) / (1.0 - gamma) }
}

fn frequency_report(frequency_hz: f64, plan: &Plan) -> FrequencyReport {
    let z = feedpoint(frequency_hz);
    let feeds = plan.feeds.iter().map(|feed| feed_report(z, feed, frequency_hz)).collect();
    FrequencyReport {
        frequency_hz,
        feedpoint_ohm: z,
        shares: Shares { sky: 0.8, earth: 0.17, burnt: 0.03 },
        feeds,
    }
}

fn feed_report(z: Complex64, feed: &Feed, frequency_hz: f64) -> FeedReport {
    let open = feed.name.starts_with("open");
    let at_feedpoint = seen(z, if open { 600.0 } else { 50.0 });
    let matched_db = if open { 0.06 } else { 0.3 * (frequency_hz / 7e6).sqrt() };
    let line_db = matched_db * (1.0 + 0.5 * at_feedpoint.swr.min(60.0));
    // Loss pulls what is seen at the station toward the middle.
    let shrink = 10f64.powf(-0.1 * line_db);
    let gamma = (z - 50.0) / (z + 50.0) * Complex64::from_polar(shrink, -0.2e-6 * frequency_hz);
    let before_unit = seen(50.0 * (1.0 + gamma) / (1.0 - gamma), 50.0);
    let in_range = before_unit.swr < 40.0;
    let used = before_unit.swr > 2.0 && in_range;
    let unit_db = if used { 0.05 * before_unit.swr.ln() + 0.1 } else { 0.0 };
    let at_transmitter = if used { seen(Complex64::new(50.0, 0.0), 50.0) } else { before_unit };
    let setting = used.then_some(Setting {
        sense: if before_unit.z_ohm.re > 50.0 {
            Sense::CapacitorAtWire
        } else {
            Sense::CapacitorAtTransmitter
        },
        inductance_h: 4.3e-6 * 7e6 / frequency_hz,
        capacitance_f: 180e-12 * 7e6 / frequency_hz,
    });
    let lines = feed.links.iter().filter(|l| matches!(l, Link::Line(_))).count() as f64;
    let mut left_w = POWER_W;
    let mut links: Vec<LinkReport> = feed
        .links
        .iter()
        .rev()
        .map(|link| {
            let (loss_db, toward_transmitter) = match link {
                Link::Line(_) => (line_db / lines, at_feedpoint),
                Link::Transformer(_) => (0.0, seen(z / 4.0, 50.0)),
                Link::MatchingUnit(_) => (unit_db, at_transmitter),
            };
            let out_w = left_w * 10f64.powf(-0.1 * loss_db);
            let watts_lost = left_w - out_w;
            left_w = out_w;
            LinkReport {
                loss_db,
                watts_lost,
                peak_v: 30.0 * at_feedpoint.swr.min(60.0),
                rms_a: 1.9,
                toward_transmitter,
            }
        })
        .collect();
    links.reverse();
    let kind = match (in_range, left_w > 0.5 * POWER_W) {
        (false, _) => VerdictKind::OutOfRange,
        (_, false) => VerdictKind::TooLossy,
        _ if used => VerdictKind::WithMatchingUnit,
        _ => VerdictKind::Direct,
    };
    let loss_db = links.iter().map(|l| l.loss_db).sum();
    FeedReport {
        at_feedpoint,
        before_unit,
        at_transmitter,
        setting,
        links,
        loss_db,
        watts_to_wire: left_w,
        shortfall: None,
        kind,
    }
}

fn band_feed(points: &[FrequencyReport], feed: usize, plan: &Plan) -> BandFeed {
    let kind = |p: &FrequencyReport| p.feeds[feed].kind;
    let worst = (0..points.len()).max_by_key(|&i| kind(&points[i])).expect("made above");
    let mut covered_hz: Vec<(f64, f64)> = Vec::new();
    let mut open = false;
    for p in points {
        match (kind(p).works(), open) {
            (true, true) => covered_hz.last_mut().expect("made above").1 = p.frequency_hz,
            (true, false) => covered_hz.push((p.frequency_hz, p.frequency_hz)),
            (false, _) => {}
        }
        open = kind(p).works();
    }
    let swr = points[worst].feeds[feed].before_unit.swr;
    let reason = format!(
        "SWR {} at {}",
        station::units::swr(swr),
        station::units::megahertz(points[worst].frequency_hz)
    );
    let length_m: f64 =
        plan.feeds[feed].links.iter().map(|l| if let Link::Line(p) = l { p.length_m } else { 0.0 }).sum();
    let k = std::f64::consts::TAU * points[points.len() / 2].frequency_hz / 299_792_458.0;
    let profile = (0..=60)
        .map(|i| {
            let from_wire_m = length_m * f64::from(i) / 60.0;
            let (sin, cos) = (k * from_wire_m + 0.4).sin_cos();
            ProfilePoint { from_wire_m, peak_v: 90.0 + 300.0 * sin.abs(), peak_a: 0.4 + 1.8 * cos.abs() }
        })
        .collect();
    BandFeed { verdict: Verdict { kind: kind(&points[worst]), reason, worst, covered_hz }, profile }
}

fn wave(frequency_hz: f64) -> StandingWave {
    let k = std::f64::consts::TAU * frequency_hz / 299_792_458.0;
    let arc_m: Vec<f64> = (0..=160).map(|i| WIRE_M * f64::from(i) / 160.0).collect();
    let turn = Complex64::from_polar(0.1, 0.7);
    let half = 0.5 * WIRE_M;
    let current_a = arc_m.iter().map(|&s| turn * (k * (half - (s - half).abs())).sin()).collect();
    let side = |s: f64| if s < half { 1.0 } else { -1.0 };
    let potential_v = arc_m
        .iter()
        .map(|&s| turn * Complex64::i() * 600.0 * side(s) * (k * (half - (s - half).abs())).cos())
        .collect();
    let marks = vec![Mark { arc_m: half, kind: MarkKind::CurrentLoop }];
    StandingWave { frequency_hz, wires: vec![WireWave { arc_m, current_a, potential_v, marks }] }
}
