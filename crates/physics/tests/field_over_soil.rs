//! Near fields above soil: limits, the condition at the surface, and the sources that stand for wires.

use num_complex::Complex64;
use physics::constants::{SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use physics::earth::{HalfSpace, Soil};
use physics::field::{Direction, FarFieldSource, NearField, NearFieldOverSoil, NearFieldSource, Region};
use physics::wire::{Boundary, EndCurrents, Material, PortPlace, Structure, WireModel, WireShape};

/// Wires above soil with the currents of 1 V.
struct Fed {
    model: WireModel,
    soil: Soil,
    frequency_hz: f64,
    currents: Vec<EndCurrents>,
}

impl Fed {
    fn new(vertices_m: &[[f64; 3]], soil: Soil, frequency_hz: f64) -> Self {
        let wires =
            vec![WireShape { vertices_m: vertices_m.to_vec(), radius_m: 1e-3, material: Material::PERFECT }];
        let ports = vec![PortPlace { wire: 0, arc_m: 2.0, gap_m: 0.02 }];
        let structure = Structure { wires, ports, boundary: Boundary::Soil(soil) };
        let model = WireModel::new(structure, frequency_hz).expect("a sound structure");
        let solution = model.solve(frequency_hz).expect("within the mesh");
        let currents = model.end_currents(&solution.coefficients_a_per_v, &[Complex64::ONE]);
        Self { model, soil, frequency_hz, currents }
    }

    /// Above the soil.
    fn fields(&self, points_m: &[[f64; 3]]) -> Vec<NearField> {
        let corner = |pick: fn(f64, f64) -> f64| {
            let both = |a: [f64; 3], b: &[f64; 3]| std::array::from_fn(|axis| pick(a[axis], b[axis]));
            points_m.iter().fold(points_m[0], both)
        };
        let region = Region { low_m: corner(f64::min), high_m: corner(f64::max) };
        let reach = region.reach(self.model.segments());
        let earth = HalfSpace::for_wires(&self.soil, self.frequency_hz, &reach).expect("a soil");
        let source = NearFieldOverSoil::new(self.model.segments(), &self.currents, &earth);
        points_m.iter().map(|at_m| source.field(*at_m)).collect()
    }

    /// The same currents above another boundary.
    fn fields_above(&self, boundary: Boundary, points_m: &[[f64; 3]]) -> Vec<NearField> {
        let source = NearFieldSource::new(self.model.segments(), &self.currents, boundary, self.frequency_hz)
            .expect("not over soil");
        points_m.iter().map(|at_m| source.field(*at_m)).collect()
    }
}

fn norm(vector: [Complex64; 3]) -> f64 {
    vector.iter().map(Complex64::norm_sqr).sum::<f64>().sqrt()
}

/// Difference of the complex vectors of E and of ηH, over the sum of both of a third field.
fn apart(a: &NearField, b: &NearField, whole: &NearField) -> [f64; 2] {
    let whole = norm(whole.e_v_per_m) + VACUUM_IMPEDANCE_OHM * norm(whole.h_a_per_m);
    let of = |a: [Complex64; 3], b: [Complex64; 3]| norm([0, 1, 2].map(|axis| a[axis] - b[axis])) / whole;
    [of(a.e_v_per_m, b.e_v_per_m), VACUUM_IMPEDANCE_OHM * of(a.h_a_per_m, b.h_a_per_m)]
}

fn worst(a: &[NearField], b: &[NearField]) -> [f64; 2] {
    a.iter()
        .zip(b)
        .map(|(a, b)| apart(a, b, b))
        .fold([0.0; 2], |worst, [e, h]| [worst[0].max(e), worst[1].max(h)])
}

const AVERAGE: Soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
const SEA: Soil = Soil { relative_permittivity: 81.0, conductivity_s_per_m: 5.0 };

/// Level and low, bent, sloping, standing on the soil.
fn shapes() -> [Vec<[f64; 3]>; 4] {
    [
        vec![[-12.0, 0.0, 1.0], [12.0, 0.0, 1.0]],
        vec![[-8.0, 0.0, 3.0], [0.0, 0.0, 9.0], [7.0, 5.0, 2.0]],
        vec![[0.0, 1.0, 1.5], [9.0, 1.0, 8.0]],
        vec![[0.0, 0.0, 0.0], [0.0, 0.0, 8.0], [6.0, 0.0, 7.0]],
    ]
}

/// Where people stand, on the ground, and high up.
const POINTS: [[f64; 3]; 7] = [
    [1.5, 0.3, 0.0],
    [0.0, 0.0, 1.9],
    [-12.2, 0.1, 0.2],
    [7.3, 4.0, 1.7],
    [4.0, -3.0, 11.0],
    [20.0, 25.0, 1.7],
    [0.7, -0.4, 0.0],
];

/// εr = 1, σ = 0 is no earth.
#[test]
fn soil_of_air_is_free_space() {
    let air = Soil { relative_permittivity: 1.0, conductivity_s_per_m: 0.0 };
    for vertices_m in &shapes()[..3] {
        let fed = Fed::new(vertices_m, air, 7.1e6);
        let error = worst(&fed.fields(&POINTS), &fed.fields_above(Boundary::FreeSpace, &POINTS));
        assert!(error.iter().all(|error| *error < 1e-9), "{vertices_m:?}: {error:?}");
    }
}

/// σ → ∞ is a mirror: what is left falls as 1/√σ and, beside the field of the wires alone, is about 2/|k1|, 2.7 cm, over
/// heights of a metre or more.
#[test]
fn metal_is_a_mirror() {
    let metal = |conductivity_s_per_m| Soil { relative_permittivity: 1.0, conductivity_s_per_m };
    for vertices_m in &shapes() {
        let mut fed = Fed::new(vertices_m, metal(100.0), 7.1e6);
        let mirror = fed.fields_above(Boundary::Mirror, &POINTS);
        let alone = fed.fields_above(Boundary::FreeSpace, &POINTS);
        let best = fed.fields(&POINTS);
        fed.soil = metal(10.0);
        let worse = fed.fields(&POINTS);
        for (index, mirror) in mirror.iter().enumerate() {
            let [best, worse] = [&best, &worse].map(|fields| apart(&fields[index], mirror, &alone[index]));
            for (best, worse) in best.into_iter().zip(worse) {
                assert!(best < 0.35 * worse + 1e-5, "{vertices_m:?}: {worse} at 10 S/m, {best} at 100 S/m");
                assert!(best < 0.03, "{vertices_m:?}, {:?}: {best}", POINTS[index]);
            }
        }
    }
}

/// E along the sea is the impedance of its surface times H (Leontovich's condition, exact but for a part of about 1/ε).
#[test]
fn sea_has_its_surface_impedance() {
    let frequency_hz = 7.1e6;
    let epsilon = SEA.complex_permittivity(frequency_hz).unwrap();
    let surface_ohm = VACUUM_IMPEDANCE_OHM / epsilon.sqrt();
    let points_m = [[1.5, 0.3, 0.0], [3.0, -4.0, 0.0], [-5.0, 2.0, 0.0], [20.0, 25.0, 0.0]];
    for vertices_m in &shapes() {
        let fed = Fed::new(vertices_m, SEA, frequency_hz);
        for field in fed.fields(&points_m) {
            let [[ex, ey, _], [hx, hy, _]] = [field.e_v_per_m, field.h_a_per_m];
            // E = Z·ẑ×H
            let off = (ex + surface_ohm * hy).norm().hypot((ey - surface_ohm * hx).norm());
            let whole = surface_ohm.norm() * hx.norm().hypot(hy.norm());
            assert!(off < 0.02 * whole, "{vertices_m:?}: {off} of {whole}");
        }
    }
}

/// Toward the sky the near field becomes the far field, as 1/r.
#[test]
fn far_away_it_is_the_far_field() {
    let frequency_hz = 14e6;
    let (k, wavelength_m) = (wave_number_rad_per_m(frequency_hz), SPEED_OF_LIGHT_M_PER_S / frequency_hz);
    for (vertices_m, soil) in [
        (vec![[-5.0, 0.0, 3.0], [0.0, 0.0, 6.0], [4.0, 3.0, 4.0]], AVERAGE),
        (vec![[0.0, 0.0, 0.5], [0.0, 0.0, 5.5]], SEA),
    ] {
        let fed = Fed::new(&vertices_m, soil, frequency_hz);
        let far =
            FarFieldSource::new(fed.model.segments(), &fed.currents, Boundary::Soil(soil), frequency_hz);
        for (azimuth_deg, elevation_deg) in [(10.0, 25.0), (130.0, 40.0), (250.0, 65.0_f64)] {
            let [(sin_e, cos_e), (sin_a, cos_a)] =
                [elevation_deg, azimuth_deg].map(|deg: f64| deg.to_radians().sin_cos());
            let theta = [sin_e * cos_a, sin_e * sin_a, -cos_e];
            let phi = [-sin_a, cos_a, 0.0];
            let expected = far.field(Direction { azimuth_deg, elevation_deg });
            let distances_m = [6.0, 24.0].map(|wavelengths| wavelengths * wavelength_m);
            let errors = distances_m.map(|r| {
                let at_m = [cos_e * cos_a, cos_e * sin_a, sin_e].map(|component| r * component);
                let found = fed.fields(&[at_m])[0].e_v_per_m;
                let wave = Complex64::cis(-k * r) / r;
                let expected: [Complex64; 3] = std::array::from_fn(|axis| {
                    (expected.theta_v * theta[axis] + expected.phi_v * phi[axis]) * wave
                });
                norm([0, 1, 2].map(|axis| found[axis] - expected[axis])) / norm(expected)
            });
            assert!(errors[1] < 0.04 && errors[1] < 0.3 * errors[0], "{elevation_deg}°: {errors:?}");
        }
    }
}

/// Nothing is said below the surface.
#[test]
fn below_the_surface_there_is_none() {
    let fed = Fed::new(&shapes()[0], AVERAGE, 7.1e6);
    let [below, on] = [-1e-3, 0.0].map(|z| fed.fields(&[[0.5, 0.0, z]])[0]);
    assert_eq!(below, NearField::default());
    assert!(norm(on.e_v_per_m) > 0.0 && norm(on.h_a_per_m) > 0.0);
}
