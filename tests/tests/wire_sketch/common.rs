//! Tables with their sources, and the wires that several checks share.

use std::path::Path;

use num_complex::Complex64;
use physics::constants::{COPPER_CONDUCTIVITY_S_PER_M, SPEED_OF_LIGHT_M_PER_S};
use physics::sinusoid::{CentreFedWire, SketchWire, self_impedance};
use serde::Deserialize;
use serde::de::DeserializeOwned;

/// λ = 1 m, so that lengths in wavelengths are lengths in metres.
pub const METRE_WAVE_HZ: f64 = SPEED_OF_LIGHT_M_PER_S;

/// Stands for a vanishing radius, in wavelengths.
pub const VANISHING: f64 = 1e-9;

pub fn data<T: DeserializeOwned>(name: &str) -> T {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("data/wire").join(name);
    let text = std::fs::read_to_string(&path).unwrap_or_else(|error| panic!("{}: {error}", path.display()));
    toml::from_str(&text).unwrap_or_else(|error| panic!("{name}: {error}"))
}

/// Rows with the tolerance and the source that go with them.
#[derive(Deserialize)]
pub struct Table<Row> {
    pub source: String,
    #[serde(alias = "relative_tolerance", alias = "tolerance_ohm", alias = "tolerance_ohm_per_m")]
    pub tolerance: f64,
    pub rows: Vec<Row>,
}

impl<Row> Table<Row> {
    pub fn assert_absolute(&self, what: &str, got: f64, expected: f64) {
        let Self { source, tolerance, .. } = self;
        assert!(
            (got - expected).abs() <= *tolerance,
            "{what}: {got} for {expected} ± {tolerance} ({source})"
        );
    }

    pub fn assert_relative(&self, what: &str, got: f64, expected: f64) {
        let Self { source, tolerance, .. } = self;
        assert!(
            (got / expected - 1.0).abs() <= *tolerance,
            "{what}: {got} for {expected}, {tolerance} ({source})"
        );
    }

    pub fn assert_ohm(&self, what: &str, got: Complex64, r_ohm: f64, x_ohm: f64) {
        self.assert_absolute(&format!("{what}, R"), got.re, r_ohm);
        self.assert_absolute(&format!("{what}, X"), got.im, x_ohm);
    }
}

/// Loop-referred impedance of a thin wire, length in wavelengths.
pub fn thin(length: f64) -> Complex64 {
    self_impedance(&CentreFedWire { half_length_m: 0.5 * length, radius_m: VANISHING }, METRE_WAVE_HZ)
}

/// 2 mm of bare copper in free space.
pub fn bare(arm_a_m: f64, arm_b_m: f64) -> SketchWire {
    SketchWire {
        arm_a_m,
        arm_b_m,
        radius_m: 1e-3,
        velocity_factor: 1.0,
        conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M,
        resistance_factor: 1.0,
        image: None,
    }
}
