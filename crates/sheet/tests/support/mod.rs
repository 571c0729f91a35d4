//! Invented stations, evaluated, and the demo stations.

#![allow(dead_code, clippy::unwrap_used)] // Each test binary uses its part; a panic is the failure.

use sheet::scene::{Item, Spot};
use sheet::{Date, Paper, SheetRequest};
use station::evaluate::Evaluator;
use station::plan::{
    Band, BandRange, Circuit, LineChoice, Link, Load, PathPoint, Plan, Point, Support, SupportKind, Wire,
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

/// The stretches of a line, and of an area's outline, with the width that they are drawn in.
pub fn strokes(item: &Item) -> Vec<[Spot; 4]> {
    let (points, stroke) = match item {
        Item::Line { points, stroke, .. } => (points.clone(), *stroke),
        Item::Area { points, outline: Some((stroke, _)), .. } => {
            (points.iter().chain(points.first()).copied().collect(), *stroke)
        }
        _ => return Vec::new(),
    };
    let ribbon = |pair: &[Spot]| {
        let (dx, dy) = (pair[1].x_mm - pair[0].x_mm, pair[1].y_mm - pair[0].y_mm);
        let half = stroke.width_mm() / 2.0 / dx.hypot(dy).max(f64::MIN_POSITIVE);
        let (x, y) = (-dy * half, dx * half);
        let at = |spot: Spot, side: f64| Spot::new(spot.x_mm + side * x, spot.y_mm + side * y);
        [at(pair[0], 1.0), at(pair[1], 1.0), at(pair[1], -1.0), at(pair[0], -1.0)]
    };
    points.windows(2).map(ribbon).collect()
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
        ("traps and arms", traps_and_arms()),
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

/// The bands of the relief post and single channels with long names.
fn bands(count: usize) -> Vec<Band> {
    let mut out = relief_post().bands;
    for index in out.len()..count {
        let name = longest(&format!("Coordination of the valleys {index}"), 60);
        let frequencies_hz = vec![(4.0 + index as f64 * 0.5) * 1e6];
        out.push(Band { name, range: BandRange::Channels { frequencies_hz } });
    }
    out
}

/// The first support of the relief post, changed.
fn support(name: &str, kind: SupportKind, x_m: f64, height_m: f64) -> Support {
    let mut support = relief_post().site.supports.swap_remove(0);
    name.clone_into(&mut support.name);
    support.kind = kind;
    support.foot = Point::new(x_m, 0.0, 0.0);
    support.height_m = height_m;
    support
}

fn on(name: &str, height_m: f64) -> PathPoint {
    PathPoint::OnSupport { support: name.to_owned(), height_m }
}

/// Two feeds, twelve bands, a mast and a tree.
pub fn relief_post() -> Plan {
    station::file::from_text(include_str!("relief-post.ron")).unwrap()
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
    let mut third = plan.feeds[0].clone();
    third.name = "window line, second transmitter".to_owned();
    third.links.insert(2, plan.feeds[1].links[0].clone());
    rate(&mut third.links[0], &longest("window line", 80), 900.0);
    rate(&mut third.links[2], "thin coax", 500.0);
    plan.feeds.push(third);
    for feed in &mut plan.feeds {
        feed.name = longest(&feed.name, 60);
    }
    plan.bands[11].name = longest(&plan.bands[11].name, 60);
    plan
}

/// Gives a line another name and a rating.
fn rate(link: &mut Link, name: &str, rating_peak_v: f64) {
    let Link::Line(piece) = link else { panic!("not a line") };
    let LineChoice::Own(data) = &mut piece.line else { panic!("not a line of its own") };
    data.name = name.to_owned();
    data.rating_peak_v = Some(rating_peak_v);
}

fn hanging_ends() -> Plan {
    let mut plan = relief_post();
    plan.name = "Ridge hut".to_owned();
    plan.call_sign = String::new();
    plan.purpose = String::new();
    plan.site.supports = vec![
        support("west pole", SupportKind::Mast, 0.0, 9.0),
        support("hut", SupportKind::Building, 14.0, 7.0),
        support("east pole", SupportKind::Mast, 26.0, 8.0),
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

/// Three wires joined at the feedpoint, in the fed one a trap that was measured and one of its parts.
pub fn traps_and_arms() -> Plan {
    let mut plan = relief_post();
    plan.name = "Reservoir gauge".to_owned();
    plan.site.supports = vec![
        support("dam tower", SupportKind::Building, 0.0, 12.0),
        support("weir mast", SupportKind::Mast, 46.0, 12.0),
        support("alder", SupportKind::Tree, 7.0, 6.0),
        support("willow", SupportKind::Tree, 39.0, 5.0),
    ];
    plan.site.supports[2].foot.y_m = 9.0;
    plan.site.supports[3].foot.y_m = -8.0;
    let apex = |x_m: f64| PathPoint::Free(Point::new(x_m, 0.0, 12.0));
    plan.wires[0].path = vec![on("dam tower", 12.0), apex(22.9), apex(23.1), on("weir mast", 12.0)];
    plan.wires[0].start_m = 3.0;
    plan.wires[0].cut_length_m = 40.0;
    plan.feedpoint.fraction = 0.5;
    let arm = |name: &str, x_m: f64, end: PathPoint| Wire {
        name: name.to_owned(),
        path: vec![apex(x_m), end],
        start_m: 0.0,
        cut_length_m: 10.2,
        conductor: plan.wires[0].conductor.clone(),
        earthed: Vec::new(),
    };
    let arms = [arm("left arm", 22.9, on("alder", 5.5)), arm("right arm", 23.1, on("willow", 4.5))];
    plan.wires.extend(arms);
    let coil = Circuit::Coil { inductance_h: 8.44e-6, q: Some(210.0) };
    let capacitor = Circuit::Capacitor { capacitance_f: 6.0e-11, q: None };
    plan.loads = vec![
        load(
            "7 MHz trap, measured",
            0.2,
            Circuit::MeasuredTrap { resonance_hz: 7.06e6, capacitance_f: 6.1e-11, q: 190.0 },
        ),
        load("7 MHz blocker", 0.8, Circuit::Parallel(vec![coil, capacitor])),
    ];
    plan
}

fn load(name: &str, fraction: f64, circuit: Circuit) -> Load {
    Load { name: name.to_owned(), wire: 0, fraction, circuit }
}

fn smallest() -> Plan {
    let mut plan = relief_post();
    plan.name = "Q".to_owned();
    plan.edition = String::new();
    plan.purpose = String::new();
    plan.call_sign = String::new();
    plan.feeds.truncate(1);
    plan.feeds[0].name = "direct".to_owned();
    plan.feeds[0].links.clear();
    plan.bands.truncate(1);
    plan
}
