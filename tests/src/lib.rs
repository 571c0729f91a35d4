//! What several checks share: tables of published values, each with the source and the tolerance that go with it.

pub mod reference;

use std::path::Path;

use num_complex::Complex64;
use serde::Deserialize;
use serde::de::DeserializeOwned;

/// Reads a file of `tests/data/`, for instance `wire/skin.toml`.
///
/// # Panics
/// Where the file is missing or does not say what the check asks for: a check without its data fails.
#[must_use]
pub fn data<T: DeserializeOwned>(name: &str) -> T {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("data").join(name);
    let text = std::fs::read_to_string(&path).unwrap_or_else(|error| panic!("{}: {error}", path.display()));
    toml::from_str(&text).unwrap_or_else(|error| panic!("{name}: {error}"))
}

/// Rows with their tolerance and their source.
#[derive(Debug, Deserialize)]
pub struct Table<Row> {
    /// Where the figures come from.
    pub source: String,
    /// Absolute or relative, as the data's own name for it says.
    #[serde(
        alias = "relative_tolerance",
        alias = "tolerance_ohm",
        alias = "tolerance_ohm_per_m",
        alias = "tolerance_db"
    )]
    pub tolerance: f64,
    /// The figures.
    pub rows: Vec<Row>,
}

impl<Row> Table<Row> {
    /// The tolerance is in the figure's unit.
    ///
    /// # Panics
    /// Where the figure is off.
    pub fn assert_absolute(&self, what: &str, got: f64, expected: f64) {
        let Self { source, tolerance, .. } = self;
        assert!(
            (got - expected).abs() <= *tolerance,
            "{what}: {got} for {expected} ± {tolerance} ({source})"
        );
    }

    /// The tolerance is a share of the figure.
    ///
    /// # Panics
    /// Where the figure is off.
    pub fn assert_relative(&self, what: &str, got: f64, expected: f64) {
        assert_relative(&self.source, what, got, (expected, self.tolerance));
    }

    /// Both parts of an impedance, the tolerance in Ω.
    ///
    /// # Panics
    /// Where one of them is off.
    pub fn assert_ohm(&self, what: &str, got: Complex64, r_ohm: f64, x_ohm: f64) {
        self.assert_absolute(&format!("{what}, R"), got.re, r_ohm);
        self.assert_absolute(&format!("{what}, X"), got.im, x_ohm);
    }
}

/// One figure with its relative tolerance.
///
/// # Panics
/// Where the figure is off.
pub fn assert_relative(source: &str, what: &str, got: f64, (expected, tolerance): (f64, f64)) {
    assert!(
        (got / expected - 1.0).abs() <= tolerance,
        "{what}: {got} for {expected}, {tolerance} ({source})"
    );
}
