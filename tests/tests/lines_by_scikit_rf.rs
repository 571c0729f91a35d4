//! Lines and networks against scikit-rf, a general RF network library: random lines, loads, frequencies and rows of links.
//! `scripts/lines_by_scikit_rf.py` makes the data; it shares no formula with the program.

use std::f64::consts::TAU;

use num_complex::Complex64;
use physics::line::{LineConstants, Piece, State, loss_db};
use physics::network::{Stub, StubEnd, TwoPort};
use serde::Deserialize;

/// Bar on Γ, on the relative error of Z, Z₀ and γ, and on the loss in dB.
const BAR: f64 = 1e-6;

#[derive(Deserialize)]
struct Data {
    source: String,
    lines: Vec<LineCase>,
    networks: Vec<NetworkCase>,
}

#[derive(Deserialize)]
struct PerMetre {
    r: f64,
    l: f64,
    g: f64,
    c: f64,
    length_m: f64,
}

impl PerMetre {
    fn constants(&self, frequency_hz: f64) -> LineConstants {
        let omega = TAU * frequency_hz;
        let (series, shunt) =
            (Complex64::new(self.r, omega * self.l), Complex64::new(self.g, omega * self.c));
        LineConstants::from_per_metre(series, shunt)
    }

    fn piece(&self, frequency_hz: f64) -> Piece {
        Piece::new(self.constants(frequency_hz), self.length_m)
    }
}

#[derive(Deserialize)]
struct Seen {
    frequency_hz: f64,
    load_ohm: [f64; 2],
    gamma_in: [f64; 2],
    z_in_ohm: [f64; 2],
    loss_db: f64,
}

#[derive(Deserialize)]
struct LineCase {
    #[serde(flatten)]
    seen: Seen,
    #[serde(flatten)]
    line: PerMetre,
    z0_ohm: [f64; 2],
    gamma_per_m: [f64; 2],
}

#[derive(Deserialize)]
struct NetworkCase {
    #[serde(flatten)]
    seen: Seen,
    elements: Vec<Element>,
}

#[derive(Deserialize)]
#[serde(tag = "kind", rename_all = "snake_case")]
enum Element {
    Line(PerMetre),
    OpenStub(PerMetre),
    ShortedStub(PerMetre),
    SeriesCoil { henry: f64, ohm: f64 },
    ShuntCoil { henry: f64, ohm: f64 },
    SeriesCapacitor { farad: f64, siemens: f64 },
    ShuntCapacitor { farad: f64, siemens: f64 },
    Turns { turns: f64 },
}

impl Element {
    fn two_port(&self, frequency_hz: f64) -> TwoPort {
        let omega = TAU * frequency_hz;
        match self {
            Self::Line(line) => TwoPort::line(&line.piece(frequency_hz)),
            Self::OpenStub(line) => Stub { piece: line.piece(frequency_hz), end: StubEnd::Open }.shunt(),
            Self::ShortedStub(line) => {
                Stub { piece: line.piece(frequency_hz), end: StubEnd::Shorted }.shunt()
            }
            Self::SeriesCoil { henry, ohm } => TwoPort::series(Complex64::new(*ohm, omega * henry)),
            Self::ShuntCoil { henry, ohm } => TwoPort::shunt(Complex64::new(*ohm, omega * henry).inv()),
            Self::SeriesCapacitor { farad, siemens } => {
                TwoPort::series(Complex64::new(*siemens, omega * farad).inv())
            }
            Self::ShuntCapacitor { farad, siemens } => {
                TwoPort::shunt(Complex64::new(*siemens, omega * farad))
            }
            Self::Turns { turns } => TwoPort::turns(*turns),
        }
    }
}

fn complex([re, im]: [f64; 2]) -> Complex64 {
    Complex64::new(re, im)
}

fn relative(got: Complex64, expected: [f64; 2]) -> f64 {
    (got - complex(expected)).norm() / complex(expected).norm()
}

impl Seen {
    fn at_load(&self) -> State {
        State::of_load(complex(self.load_ohm))
    }

    /// The largest of the differences in Γ, in Z (relative) and in loss (dB).
    fn worst(&self, at_source: State) -> f64 {
        let gamma = (at_source.gamma(50.0) - complex(self.gamma_in)).norm();
        let impedance = relative(at_source.impedance_ohm(), self.z_in_ohm);
        let loss = (loss_db(at_source, self.at_load()) - self.loss_db).abs();
        gamma.max(impedance).max(loss)
    }
}

fn data() -> Data {
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/data/line/scikit_rf.json");
    serde_json::from_str(&std::fs::read_to_string(path).expect("the data are checked in"))
        .expect("they are JSON")
}

#[test]
fn lines_agree_with_scikit_rf() {
    let Data { source, lines, .. } = data();
    assert!(lines.len() >= 100);
    let mut worst = 0.0_f64;
    for (number, LineCase { seen, line, z0_ohm, gamma_per_m }) in lines.iter().enumerate() {
        let constants = line.constants(seen.frequency_hz);
        let piece = line.piece(seen.frequency_hz);
        let off = seen
            .worst(piece.toward_source(seen.at_load()))
            .max(seen.worst(TwoPort::line(&piece).toward_source(seen.at_load())))
            .max(relative(constants.z0_ohm, *z0_ohm))
            .max(relative(constants.gamma_per_m, *gamma_per_m));
        assert!(off < BAR, "line {number}: off by {off} ({source})");
        worst = worst.max(off);
    }
    println!("{} lines: worst difference {worst:.1e}", lines.len());
}

#[test]
fn networks_agree_with_scikit_rf() {
    let Data { source, networks, .. } = data();
    assert!(networks.len() >= 100);
    let mut worst = 0.0_f64;
    for (number, NetworkCase { seen, elements }) in networks.iter().enumerate() {
        let ports: Vec<TwoPort> =
            elements.iter().map(|element| element.two_port(seen.frequency_hz)).collect();
        let off = seen.worst(TwoPort::row(&ports).toward_source(seen.at_load()));
        assert!(off < BAR, "network {number}: off by {off} ({source})");
        worst = worst.max(off);
    }
    println!("{} networks: worst difference {worst:.1e}", networks.len());
}
