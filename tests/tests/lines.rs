//! Feed lines and matching networks against published values and facts of the trade. Figures and their sources
//! stand in `data/line/*.toml`.

use checks::{Table, assert_relative, data};
use num_complex::Complex64;
use physics::conductor::RoundWire;
use physics::constants::{COPPER_CONDUCTIVITY_S_PER_M, SPEED_OF_LIGHT_M_PER_S};
use physics::line::{
    AttenuationPoint, Coaxial, LineConstants, LossLaw, NominalLine, State, TwoWire, additional_loss_db,
    loss_db,
};
use physics::network::{LMatch, LProblem, Parts, l_network};
use serde::Deserialize;
use station::catalogue;
use station::plan::LineConstruction;

/// Decibels in one neper.
const DB_PER_NEPER: f64 = 8.685_889_638_065_035;

/// dB per 100 m in one dB per 100 ft.
const PER_100_M: f64 = 1.0 / 0.3048;

fn within(what: &str, value: f64, [low, high]: [f64; 2], source: &str) {
    assert!((low..=high).contains(&value), "{what}: {value}, expected {low} to {high} ({source})");
}

/// The constants of a line of the catalogue.
fn catalogue_line(id: &str, frequency_hz: f64) -> LineConstants {
    match catalogue::line_entry(id).expect("the data name lines of the catalogue").data.construction {
        LineConstruction::Published { z0_ohm, velocity_factor, loss } => {
            let loss = LossLaw { k1_db_per_100m: loss.k1_db_per_100m, k2_db_per_100m: loss.k2_db_per_100m };
            NominalLine { z0_ohm, velocity_factor, loss }.constants(frequency_hz)
        }
        LineConstruction::TwoWire {
            wire_diameter_m,
            spacing_m,
            conductivity_s_per_m,
            velocity_factor,
            loss_tangent,
        } => TwoWire { wire_diameter_m, spacing_m, conductivity_s_per_m, velocity_factor, loss_tangent }
            .constants(frequency_hz),
        LineConstruction::Coaxial { .. } => panic!("{id} is not used here"),
    }
    .expect("the catalogue's lines have constants at HF")
}

fn catalogue_law(id: &str) -> (f64, LossLaw) {
    match catalogue::line_entry(id).expect("the data name lines of the catalogue").data.construction {
        LineConstruction::Published { z0_ohm, loss, .. } => {
            (z0_ohm, LossLaw { k1_db_per_100m: loss.k1_db_per_100m, k2_db_per_100m: loss.k2_db_per_100m })
        }
        _ => panic!("{id} has no loss law"),
    }
}

fn bare_copper(diameter_mm: f64, spacing_mm: f64) -> TwoWire {
    TwoWire {
        wire_diameter_m: diameter_mm * 1e-3,
        spacing_m: spacing_mm * 1e-3,
        conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M,
        velocity_factor: 1.0,
        loss_tangent: 0.0,
    }
}

#[derive(Deserialize)]
struct Impedance {
    two_wire: Table<[f64; 3]>,
    two_wire_spacing: Table<[f64; 3]>,
    two_wire_handbook: Table<[f64; 2]>,
    coaxial: Table<[f64; 4]>,
    coaxial_formula: Table<[f64; 4]>,
}

#[test]
fn characteristic_impedance_from_geometry() {
    let data: Impedance = data("line/impedance.toml");
    for table in [&data.two_wire, &data.two_wire_spacing] {
        for &[d, spacing, z0_ohm] in &table.rows {
            let got = bare_copper(d, spacing).lossless_z0_ohm().unwrap();
            table.assert_absolute(&format!("{d} mm at {spacing} mm"), got, z0_ohm);
        }
    }
    for &[d, spacing] in &data.two_wire_handbook.rows {
        let got = bare_copper(d, spacing).lossless_z0_ohm().unwrap();
        let handbook = 276.0 * (2.0 * spacing / d).log10();
        data.two_wire_handbook.assert_relative(&format!("{d} mm at {spacing} mm"), got, handbook);
    }
    for table in [&data.coaxial, &data.coaxial_formula] {
        for &[inner, bore, relative_permittivity, z0_ohm] in &table.rows {
            let line = Coaxial {
                inner_diameter_m: inner * 1e-3,
                outer_diameter_m: bore * 1e-3,
                conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M,
                relative_permittivity,
                loss_tangent: 0.0,
            };
            table.assert_relative(
                &format!("bore {bore} over {inner}"),
                line.lossless_z0_ohm().unwrap(),
                z0_ohm,
            );
        }
    }
}

#[derive(Deserialize)]
struct Lossy {
    lossless: Lossless,
    extra_loss: ExtraLoss,
    full: FullExample,
}

#[derive(Deserialize)]
struct Lossless {
    #[serde(flatten)]
    table: Table<[f64; 5]>,
    z0_ohm: f64,
}

#[derive(Deserialize)]
struct ExtraLoss {
    #[serde(flatten)]
    table: Table<[f64; 7]>,
    swr: [f64; 6],
}

#[derive(Deserialize)]
struct FullExample {
    #[serde(flatten)]
    table: Table<[f64; 5]>,
    z0_ohm: f64,
    velocity_factor: f64,
    length_m: f64,
    matched_loss_db: f64,
    frequency_mhz: f64,
    swr_at_load: Vec<[f64; 3]>,
    swr_in: f64,
}

#[test]
fn a_lossless_line_transforms_as_the_books_say() {
    let Lossless { table, z0_ohm } = data::<Lossy>("line/lossy.toml").lossless;
    let per_wavelength = Complex64::new(0.0, std::f64::consts::TAU);
    let line = LineConstants { z0_ohm: z0_ohm.into(), gamma_per_m: per_wavelength };
    for &[r, x, wavelengths, r_in, x_in] in &table.rows {
        let z_in = line.input_impedance_ohm(Complex64::new(r, x), wavelengths);
        let what = format!("{r} + j{x} through {wavelengths} λ");
        table.assert_absolute(&what, z_in.re, r_in);
        table.assert_absolute(&what, z_in.im, x_in);
    }
}

#[test]
fn a_mismatch_adds_to_the_loss_as_tabulated() {
    let ExtraLoss { table, swr } = data::<Lossy>("line/lossy.toml").extra_loss;
    for &[matched, ref extra @ ..] in &table.rows {
        for (&swr, &extra_db) in swr.iter().zip(extra) {
            let what = format!("{matched} dB at SWR {swr}");
            table.assert_absolute(&what, additional_loss_db(matched, swr), extra_db);
        }
    }
}

#[test]
fn the_full_example_agrees_in_loss_impedance_and_swr() {
    let case = data::<Lossy>("line/lossy.toml").full;
    let beta =
        std::f64::consts::TAU * case.frequency_mhz * 1e6 / (case.velocity_factor * SPEED_OF_LIGHT_M_PER_S);
    let alpha = case.matched_loss_db / DB_PER_NEPER / case.length_m;
    let line = LineConstants { z0_ohm: case.z0_ohm.into(), gamma_per_m: Complex64::new(alpha, beta) };
    for (&[r, x, total_db, r_in, x_in], &[.., swr]) in case.table.rows.iter().zip(&case.swr_at_load) {
        let what = format!("load {r} + j{x}");
        let at_load = State::of_load(Complex64::new(r, x));
        let at_source = line.toward_source(at_load, case.length_m);
        case.table.assert_absolute(&what, loss_db(at_source, at_load), total_db);
        case.table.assert_absolute(&what, at_source.impedance_ohm().re, r_in);
        case.table.assert_absolute(&what, at_source.impedance_ohm().im, x_in);
        case.table.assert_absolute(&what, at_load.swr(case.z0_ohm), swr);
    }
    let at_source = line.toward_source(State::of_load(150.0.into()), case.length_m);
    case.table.assert_absolute("SWR at the input", at_source.swr(case.z0_ohm), case.swr_in);
}

#[derive(Deserialize)]
struct Loss {
    open_wire: OpenWireLoss,
    fit: Fit,
    published: Vec<Published>,
    table_at_10_mhz: Table<(String, f64)>,
    maximum: Maximum,
    parallel: Vec<Parallel>,
    derived: Vec<Derived>,
}

#[derive(Deserialize)]
struct OpenWireLoss {
    source: String,
    tolerance_db_per_100m: f64,
    diameter_mm: f64,
    spacing_mm: f64,
    frequency_mhz: f64,
    db_per_100m: f64,
}

#[derive(Deserialize)]
struct Fit {
    source: String,
    relative_tolerance: f64,
    points: Vec<[f64; 2]>,
    k1: f64,
    k2: f64,
}

#[derive(Deserialize)]
struct Published {
    id: String,
    source: String,
    tolerance: f64,
    tolerance_1_mhz: f64,
    points: Vec<[f64; 2]>,
}

#[derive(Deserialize)]
struct Maximum {
    source: String,
    id: String,
    frequency_mhz: f64,
    db_per_100ft: f64,
}

#[derive(Deserialize)]
struct Parallel {
    id: String,
    source: String,
    relative_tolerance: f64,
    frequency_mhz: f64,
    db_per_100m: f64,
}

#[derive(Deserialize)]
struct Derived {
    id: String,
    source: String,
    relative_tolerance: f64,
    diameter_mm: f64,
    excess: f64,
}

/// The law that fits points of (MHz, attenuation in any unit).
fn fit(points: &[[f64; 2]], unit: f64) -> LossLaw {
    let points: Vec<AttenuationPoint> = points
        .iter()
        .map(|&[f_mhz, attenuation]| AttenuationPoint {
            frequency_hz: f_mhz * 1e6,
            attenuation_db_per_100m: attenuation * unit,
        })
        .collect();
    LossLaw::fit(&points).expect("the data have points at different frequencies")
}

fn matched_db_per_100m(id: &str, frequency_mhz: f64) -> f64 {
    100.0 * catalogue_line(id, frequency_mhz * 1e6).matched_loss_db_per_m()
}

#[test]
fn copper_sets_the_loss_of_open_wire() {
    let case = data::<Loss>("line/loss.toml").open_wire;
    let line = bare_copper(case.diameter_mm, case.spacing_mm).constants(case.frequency_mhz * 1e6).unwrap();
    let got = 100.0 * line.matched_loss_db_per_m();
    let bound = case.tolerance_db_per_100m;
    assert!((got - case.db_per_100m).abs() <= bound, "{got} dB per 100 m ({})", case.source);
}

#[test]
fn two_points_fix_the_loss_law() {
    let Fit { source, relative_tolerance, points, k1, k2 } = data::<Loss>("line/loss.toml").fit;
    let law = fit(&points, 1.0);
    assert_relative(&source, "k1", law.k1_db_per_100m, (k1, relative_tolerance));
    assert_relative(&source, "k2", law.k2_db_per_100m, (k2, relative_tolerance));
}

#[test]
fn the_catalogue_follows_published_attenuation() {
    let data: Loss = data("line/loss.toml");
    for Published { id, source, tolerance, tolerance_1_mhz, points } in &data.published {
        let law = fit(points, PER_100_M);
        let (_, kept) = catalogue_law(id);
        assert!((law.k1_db_per_100m - kept.k1_db_per_100m).abs() < 6e-5, "{id}: {law:?} ({source})");
        assert!((law.k2_db_per_100m - kept.k2_db_per_100m).abs() < 6e-5, "{id}: {law:?} ({source})");
        for &[f_mhz, attenuation] in points {
            let bound = if f_mhz < 2.0 { *tolerance_1_mhz } else { *tolerance };
            let got = matched_db_per_100m(id, f_mhz);
            let what = format!("{id} at {f_mhz} MHz");
            assert_relative(source, &what, got, (attenuation * PER_100_M, bound));
        }
    }
    for (id, attenuation) in &data.table_at_10_mhz.rows {
        data.table_at_10_mhz.assert_relative(id, matched_db_per_100m(id, 10.0), attenuation * PER_100_M);
    }
    let Maximum { source, id, frequency_mhz, db_per_100ft } = &data.maximum;
    let got = matched_db_per_100m(id, *frequency_mhz);
    assert!(got < db_per_100ft * PER_100_M, "{id}: {got} ({source})");
    for Parallel { id, source, relative_tolerance, frequency_mhz, db_per_100m } in &data.parallel {
        let got = matched_db_per_100m(id, *frequency_mhz);
        assert_relative(source, id, got, (*db_per_100m, *relative_tolerance));
    }
}

#[test]
fn coefficients_said_to_be_derived_are_those_of_the_geometry() {
    for Derived { id, source, relative_tolerance, diameter_mm, excess } in
        data::<Loss>("line/loss.toml").derived
    {
        let (z0_ohm, law) = catalogue_law(&id);
        let wire =
            RoundWire { radius_m: diameter_mm * 0.5e-3, conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M };
        for f_mhz in [3.6, 7.1, 14.2] {
            // α = 2R′/(2Z₀)
            let r = wire.internal_impedance_ohm_per_m(f_mhz * 1e6).re;
            let geometry = 100.0 * DB_PER_NEPER * r / z0_ohm * excess;
            let what = format!("{id} at {f_mhz} MHz");
            let conductors = law.k1_db_per_100m * f_mhz.sqrt();
            assert_relative(&source, &what, conductors, (geometry, relative_tolerance));
        }
    }
}

#[derive(Deserialize)]
struct Trade {
    full_wave: FullWave,
    coax: CoaxTrade,
}

#[derive(Deserialize)]
struct FullWave {
    source: String,
    length_m: f64,
    frequencies_mhz: Vec<f64>,
    load_ohm: f64,
    swr: [f64; 2],
    open_wire: String,
    open_wire_most_db: f64,
    thin_clad: String,
    thin_clad_db: [f64; 2],
}

#[derive(Deserialize)]
struct CoaxTrade {
    source: String,
    id: String,
    least_db: f64,
}

#[test]
fn open_wire_carries_a_full_wave_that_thin_clad_window_line_and_coax_do_not() {
    let Trade { full_wave: case, coax } = data("line/trade.toml");
    let at_load = State::of_load(case.load_ohm.into());
    for f_mhz in &case.frequencies_mhz {
        let loss = |id: &str| {
            let line = catalogue_line(id, f_mhz * 1e6);
            let swr = at_load.swr(line.z0_ohm.re);
            (loss_db(line.toward_source(at_load, case.length_m), at_load), swr)
        };
        let (open_db, open_swr) = loss(&case.open_wire);
        let (clad_db, clad_swr) = loss(&case.thin_clad);
        let (coax_db, _) = loss(&coax.id);
        println!("{f_mhz} MHz, 50 m: open wire {open_db:.2}, window line {clad_db:.2}, coax {coax_db:.1} dB");
        within("SWR on open wire", open_swr, case.swr, &case.source);
        within("SWR on window line", clad_swr, case.swr, &case.source);
        assert!(open_db < case.open_wire_most_db, "{f_mhz} MHz: {open_db} dB ({})", case.source);
        within(&format!("window line at {f_mhz} MHz"), clad_db, case.thin_clad_db, &case.source);
        assert!(coax_db > coax.least_db, "{f_mhz} MHz: {coax_db} dB ({})", coax.source);
    }
}

#[derive(Deserialize)]
struct Networks {
    lossless: LosslessNetwork,
    coil_loss: CoilLoss,
    coil_loss_rule: CoilLossRule,
    stress: StressTable,
}

#[derive(Deserialize)]
struct LosslessNetwork {
    #[serde(flatten)]
    table: Table<[f64; 3]>,
    frequency_mhz: f64,
    target_ohm: f64,
}

#[derive(Deserialize)]
struct CoilLoss {
    #[serde(flatten)]
    table: Table<[f64; 2]>,
    coil_q: f64,
}

#[derive(Deserialize)]
struct CoilLossRule {
    source: String,
    rows: Vec<[f64; 3]>,
    coil_q: f64,
}

#[derive(Deserialize)]
struct StressTable {
    #[serde(flatten)]
    table: Table<[f64; 3]>,
    power_w: f64,
}

impl LosslessNetwork {
    fn matched(&self, load_ohm: f64, coil_q: f64) -> LMatch {
        let parts = Parts {
            inductance_max_h: 30e-6,
            capacitance_max_f: 1000e-12,
            coil_q,
            capacitor_q: f64::INFINITY,
        };
        let Self { frequency_mhz, target_ohm, .. } = *self;
        l_network(&LProblem {
            frequency_hz: frequency_mhz * 1e6,
            load_ohm: load_ohm.into(),
            target_ohm,
            parts,
        })
        .expect("the parts are large enough")
    }
}

#[test]
fn l_networks_are_those_of_the_books() {
    let Networks { lossless, coil_loss, coil_loss_rule: rule, stress } = data("line/l_network.toml");
    for &[load_ohm, l_uh, c_pf] in &lossless.table.rows {
        let setting = lossless.matched(load_ohm, f64::INFINITY).setting;
        lossless.table.assert_relative(&format!("L for {load_ohm} Ω"), setting.inductance_h * 1e6, l_uh);
        lossless.table.assert_relative(&format!("C for {load_ohm} Ω"), setting.capacitance_f * 1e12, c_pf);
    }
    for &[load_ohm, loss_db] in &coil_loss.table.rows {
        let found = lossless.matched(load_ohm, coil_loss.coil_q);
        coil_loss.table.assert_relative(&format!("loss for {load_ohm} Ω"), found.loss_db, loss_db);
    }
    for &[load_ohm, loss_db, q] in &rule.rows {
        let got = lossless.matched(load_ohm, rule.coil_q).loss_db;
        assert_relative(&rule.source, &format!("rule for {load_ohm} Ω"), got, (loss_db, q / rule.coil_q));
    }
    for &[load_ohm, peak_v, rms_a] in &stress.table.rows {
        let got = lossless.matched(load_ohm, f64::INFINITY).stress(stress.power_w);
        stress.table.assert_relative(&format!("volts at {load_ohm} Ω"), got.capacitor_peak_v, peak_v);
        stress.table.assert_relative(&format!("amperes at {load_ohm} Ω"), got.coil_rms_a, rms_a);
    }
}
