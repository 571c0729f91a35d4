//! Invented stations with hand-made reports: plausible values of every kind, so that layout can be tested without
//! the physics.

#![allow(dead_code)] // Each test binary uses its part.

use num_complex::Complex64;
use sheet::{Date, Paper, SheetRequest};
use station::hang::{Hung, HungWire, Port, Rope, Vertex, WireEnd};
use station::plan::{
    Band, BandRange, ConductorChoice, ConductorData, Earth, Feed, Feedpoint, LineChoice, LineConstruction,
    LineData, LinePiece, Link, LossLaw, MatchingUnit, PathPoint, Plan, Point, Site, Soil, Support,
    SupportKind, Transformer, Transmitter, Wire,
};
use station::report::{
    BandFeed, BandReport, FeedReport, Finding, FrequencyReport, LinkReport, Model, Place, Report, Seen,
    Sense, Setting, StandingWave, Verdict, VerdictKind, Weight, WireWave,
};
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
    pub name: &'static str,
    pub plan: Plan,
    pub report: Report,
}

/// All fixtures.
pub fn stations() -> Vec<Station> {
    vec![
        station("relief post", relief_post()),
        station("long list", long_list()),
        station("hanging ends", hanging_ends()),
        station("vertical", vertical()),
        station("smallest", smallest()),
    ]
}

fn station(name: &'static str, plan: Plan) -> Station {
    let report = report(&plan);
    Station { name, plan, report }
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
        insulation: None,
        source: String::new(),
    })
}

fn relief_post() -> Plan {
    Plan {
        name: "Salt pan relief post".to_owned(),
        purpose: "District office after the flood: voice and data to the three valley posts and the capital."
            .to_owned(),
        call_sign: "X9RLF".to_owned(),
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

fn long_list() -> Plan {
    let long = "Coast and mountain coordination centre of the seven northern valleys, summer quarters";
    let mut plan = relief_post();
    plan.name = long.to_owned();
    plan.purpose = format!(
        "{} {}",
        plan.purpose,
        "A second sentence says at length who may use it, and when. ".repeat(3)
    );
    plan.call_sign = "X9LONGCALL/PORTABLE".to_owned();
    plan.bands = bands(30);
    for support in &mut plan.site.supports {
        support.name = format!("{} beside the old customs house at the harbour", support.name);
    }
    plan.wires[0].path = vec![on(&plan.site.supports[0].name, 11.5), on(&plan.site.supports[1].name, 9.0)];
    plan.wires[0].name = "main wire of the coordination centre, second edition".to_owned();
    for feed in &mut plan.feeds {
        feed.name = format!(
            "{} through the wall of the radio room, Unbrechbarlangeswort{}",
            feed.name,
            "lang".repeat(12)
        );
    }
    let third = Feed {
        name: "window line, second transmitter".to_owned(),
        links: vec![
            line("window line", 450.0, 0.91, 24.0, Some(900.0)),
            Link::Transformer(Transformer { impedance_ratio: 9.0 }),
            line("thin coax", 50.0, 0.66, 6.0, Some(500.0)),
            unit(),
        ],
    };
    plan.feeds.push(third);
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

fn vertical() -> Plan {
    let mut plan = relief_post();
    plan.name = "Lighthouse spare".to_owned();
    plan.wires[0].path =
        vec![PathPoint::Free(Point::new(0.0, 0.0, 0.5)), PathPoint::Free(Point::new(0.0, 0.0, 18.0))];
    plan.wires[0].start_m = 0.0;
    plan.wires[0].cut_length_m = 17.5;
    plan.feedpoint.fraction = 0.0;
    plan.site.entrance = Point::new(5.0, 0.0, 0.5);
    plan.bands.truncate(3);
    plan
}

fn smallest() -> Plan {
    let mut plan = relief_post();
    plan.name = "Q".to_owned();
    plan.purpose = String::new();
    plan.call_sign = String::new();
    plan.feeds = vec![Feed { name: "direct".to_owned(), links: Vec::new() }];
    plan.bands.truncate(1);
    plan
}

/// The wires as they hang: the same rule as the evaluator's, for paths over two or more points.
fn hung(plan: &Plan) -> Hung {
    let mut ropes = Vec::new();
    let wires: Vec<HungWire> = plan
        .wires
        .iter()
        .enumerate()
        .map(|(index, wire)| {
            let path: Vec<Point> = wire.path.iter().map(|point| place(plan, point)).collect();
            hang_one(wire, &path, index, &mut ropes)
        })
        .collect();
    let arc_m = plan.feedpoint.fraction * wires[plan.feedpoint.wire].length_m();
    let at = wires[plan.feedpoint.wire].point_at(arc_m);
    Hung { wires, ropes, feedpoint: Port { wire: plan.feedpoint.wire, arc_m, at } }
}

fn hang_one(wire: &Wire, path: &[Point], index: usize, ropes: &mut Vec<Rope>) -> HungWire {
    let mut arcs = vec![0.0];
    for pair in path.windows(2) {
        arcs.push(arcs[arcs.len() - 1] + pair[0].distance_m(pair[1]));
    }
    let total = arcs[arcs.len() - 1];
    let (from, to) = (wire.start_m, wire.start_m + wire.cut_length_m);
    let at = |s: f64| {
        let last = path.len() - 1;
        if s < 0.0 {
            return Point { z_m: path[0].z_m + s, ..path[0] };
        }
        if s > total {
            return Point { z_m: path[last].z_m - (s - total), ..path[last] };
        }
        let i = (1..=last).find(|&i| s <= arcs[i]).unwrap_or(last);
        path[i - 1].toward(path[i], (s - arcs[i - 1]) / (arcs[i] - arcs[i - 1]))
    };
    let mut marks = vec![from];
    marks.extend(arcs.iter().copied().filter(|&s| s > from && s < to));
    marks.push(to);
    if from > 0.0 {
        ropes.push(Rope {
            wire: index,
            end: WireEnd::Beginning,
            points: vec![path[0], at(from)],
            length_m: from,
        });
    }
    if to < total {
        let points = vec![path[path.len() - 1], at(to)];
        ropes.push(Rope { wire: index, end: WireEnd::End, points, length_m: total - to });
    }
    let vertices = marks.into_iter().map(|s| Vertex { at: at(s), arc_m: s - from }).collect();
    let ConductorChoice::Own(conductor) = wire.conductor.clone() else {
        panic!("fixtures have their own conductors")
    };
    HungWire { vertices, conductor }
}

fn place(plan: &Plan, point: &PathPoint) -> Point {
    match point {
        PathPoint::Free(at) => *at,
        PathPoint::OnSupport { support, height_m } => {
            let foot = plan.site.supports.iter().find(|s| s.name == *support).unwrap().foot;
            Point { z_m: foot.z_m + height_m, ..foot }
        }
    }
}

/// A report with values of every size, from a simple resonance curve.
pub fn report(plan: &Plan) -> Report {
    let hung = hung(plan);
    let length_m = plan.wires[0].cut_length_m;
    let bands = plan.bands.iter().map(|band| band_report(plan, band, length_m)).collect();
    let finding = |weight, text: &str| Finding { weight, place: Place::Plan, text: text.to_owned() };
    Report {
        revision: 1,
        model: Model::Sketch,
        hung,
        feed_names: plan.feeds.iter().map(|feed| feed.name.clone()).collect(),
        link_names: plan
            .feeds
            .iter()
            .map(|feed| feed.links.iter().map(|_| "link".to_owned()).collect())
            .collect(),
        bands,
        findings: vec![
            finding(Weight::Caution, "The wire's east end hangs 3.1 m over the path to the well."),
            finding(Weight::Note, "Nothing else."),
        ],
    }
}

fn frequencies(range: &BandRange) -> Vec<f64> {
    match range {
        BandRange::Span { low_hz, high_hz } => {
            (0..=20).map(|i| low_hz + (high_hz - low_hz) * f64::from(i) / 20.0).collect()
        }
        BandRange::Channels { frequencies_hz } => {
            let mut sorted = frequencies_hz.clone();
            sorted.sort_by(f64::total_cmp);
            sorted
        }
    }
}

fn band_report(plan: &Plan, band: &Band, length_m: f64) -> BandReport {
    let (low_hz, high_hz) = band.range.edges_hz();
    let points: Vec<FrequencyReport> =
        frequencies(&band.range).into_iter().map(|f| frequency_report(plan, f, length_m)).collect();
    let middle = points.len() / 2;
    let feeds = (0..plan.feeds.len())
        .map(|feed| {
            let worst = (0..points.len())
                .max_by(|&a, &b| points[a].feeds[feed].kind.cmp(&points[b].feeds[feed].kind))
                .unwrap();
            let kind = points[worst].feeds[feed].kind;
            let reason = format!(
                "SWR {} at {}",
                station::units::swr(points[worst].feeds[feed].at_transmitter.swr),
                station::units::megahertz(points[worst].frequency_hz)
            );
            let covered_hz =
                if kind.works() { vec![(low_hz, high_hz)] } else { vec![(low_hz, (low_hz + high_hz) / 2.0)] };
            BandFeed { verdict: Verdict { kind, reason, worst, covered_hz }, profile: Vec::new() }
        })
        .collect();
    let wave = StandingWave {
        frequency_hz: points[middle].frequency_hz,
        wires: plan
            .wires
            .iter()
            .map(|_| WireWave { arc_m: vec![], current_a: vec![], potential_v: vec![], marks: vec![] })
            .collect(),
    };
    BandReport { name: band.name.clone(), low_hz, high_hz, points, middle, feeds, wave }
}

fn seen(z_ohm: Complex64, reference_ohm: f64) -> Seen {
    let gamma = ((z_ohm - reference_ohm) / (z_ohm + reference_ohm)).norm();
    Seen { z_ohm, reference_ohm, swr: (1.0 + gamma) / (1.0 - gamma) }
}

fn frequency_report(plan: &Plan, frequency_hz: f64, length_m: f64) -> FrequencyReport {
    // Half waves on the wire.
    let half_waves = length_m * frequency_hz / 1.43e8;
    let phase = std::f64::consts::PI * half_waves;
    let feedpoint_ohm = Complex64::new(70.0 + 2500.0 * (phase / 2.0).cos().powi(4), -900.0 * phase.sin());
    let feeds = plan
        .feeds
        .iter()
        .enumerate()
        .map(|(index, feed)| feed_report(plan, feed, index, feedpoint_ohm))
        .collect();
    FrequencyReport { frequency_hz, feedpoint_ohm, wire_efficiency: 0.96, feeds }
}

fn feed_report(plan: &Plan, feed: &Feed, index: usize, z: Complex64) -> FeedReport {
    let at_feedpoint = seen(z, if index == 0 { 600.0 } else { 50.0 });
    let before_unit = seen(z / if index == 0 { 9.0 } else { 1.2 }, 50.0);
    let has_unit = feed.links.iter().any(|link| matches!(link, Link::MatchingUnit(_)));
    let kind = match before_unit.swr {
        r if r <= plan.transmitter.swr_limit => VerdictKind::Direct,
        r if r < 9.0 && has_unit => VerdictKind::WithMatchingUnit,
        r if r < 15.0 => VerdictKind::TooLossy,
        r if r < 30.0 => VerdictKind::Overstressed,
        _ => VerdictKind::OutOfRange,
    };
    let is_set = kind == VerdictKind::WithMatchingUnit;
    let at_transmitter = if is_set { seen(Complex64::new(50.4, 1.0), 50.0) } else { before_unit };
    let setting = is_set.then(|| Setting {
        sense: if z.re > 400.0 { Sense::CapacitorAtWire } else { Sense::CapacitorAtTransmitter },
        inductance_h: (before_unit.swr * 1.7) * 1e-6,
        capacitance_f: 2.2e-9 / before_unit.swr,
    });
    let links: Vec<LinkReport> = feed
        .links
        .iter()
        .map(|_| LinkReport {
            loss_db: 0.04 * before_unit.swr,
            watts_lost: 0.01 * before_unit.swr * plan.transmitter.power_w,
            peak_v: (2.0 * plan.transmitter.power_w * 50.0 * before_unit.swr).sqrt(),
            rms_a: (plan.transmitter.power_w / 50.0 * before_unit.swr).sqrt(),
            toward_transmitter: before_unit,
        })
        .collect();
    let loss_db: f64 = links.iter().map(|link| link.loss_db).sum();
    FeedReport {
        at_feedpoint,
        before_unit,
        at_transmitter,
        setting,
        links,
        loss_db,
        watts_to_wire: plan.transmitter.power_w * 10f64.powf(-loss_db / 10.0),
        shortfall: None,
        kind,
    }
}
