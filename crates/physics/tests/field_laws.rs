//! Fields of imposed currents: published directivities, Maxwell's equations, reciprocity, images, energy.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;
use physics::constants::{
    SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, VACUUM_PERMEABILITY_H_PER_M, VACUUM_PERMITTIVITY_F_PER_M,
    wave_number_rad_per_m,
};
use physics::earth::Soil;
use physics::field::{
    Direction, FarFieldSource, NearField, NearFieldSource, radiated_power_w, strongest_direction,
};
use physics::sinusoid::{CentreFedWire, ParallelWires, mutual_impedance, self_impedance};
use physics::wire::{Boundary, EndCurrents, Segment};
use proptest::prelude::*;

type Vec3 = [f64; 3];

/// One metre of wavelength.
const FREQUENCY_HZ: f64 = SPEED_OF_LIGHT_M_PER_S;
const FREE: Boundary = Boundary::FreeSpace;

fn dot(a: Vec3, b: Vec3) -> f64 {
    (0..3).map(|axis| a[axis] * b[axis]).sum()
}

fn length(a: Vec3) -> f64 {
    dot(a, a).sqrt()
}

fn advance(a: Vec3, direction: Vec3, t: f64) -> Vec3 {
    std::array::from_fn(|axis| a[axis] + t * direction[axis])
}

fn unit(a: Vec3) -> Vec3 {
    a.map(|component| component / length(a))
}

/// Wires with imposed currents.
#[derive(Clone, Debug, Default)]
struct Currents {
    segments: Vec<Segment>,
    ends: Vec<EndCurrents>,
}

impl Currents {
    /// A centre-fed sinusoid I = peak·sin k(l − |s|), in pieces of a twentieth of a wave.
    fn standing_wave(centre_m: Vec3, direction: Vec3, length_m: f64, peak_a: Complex64) -> Self {
        let (k, half_m) = (wave_number_rad_per_m(FREQUENCY_HZ), 0.5 * length_m);
        let per_side = (half_m * 20.0).ceil() as i32;
        let place = |step: i32| half_m * f64::from(step) / f64::from(per_side);
        let current = |step: i32| peak_a * (k * (half_m - place(step).abs())).sin();
        let mut currents = Self::default();
        for step in -per_side..per_side {
            let [from_m, to_m] = [step, step + 1].map(|step| advance(centre_m, direction, place(step)));
            currents.segments.push(Segment { from_m, to_m, radius_m: 1e-5 });
            currents.ends.push(EndCurrents { from_a: current(step), to_a: current(step + 1) });
        }
        currents
    }

    fn and(mut self, other: Self) -> Self {
        self.segments.extend(other.segments);
        self.ends.extend(other.ends);
        self
    }

    fn moved(&self, map: impl Fn(Vec3) -> Vec3) -> Self {
        let moved = |segment: &Segment| Segment {
            from_m: map(segment.from_m),
            to_m: map(segment.to_m),
            radius_m: segment.radius_m,
        };
        Self { segments: self.segments.iter().map(moved).collect(), ends: self.ends.clone() }
    }

    fn far(&self, boundary: Boundary) -> FarFieldSource {
        FarFieldSource::new(&self.segments, &self.ends, boundary, FREQUENCY_HZ)
    }

    fn near(&self, boundary: Boundary) -> NearFieldSource {
        NearFieldSource::new(&self.segments, &self.ends, boundary, FREQUENCY_HZ).expect("no soil here")
    }

    /// Distance of a point from the nearest end or middle of a segment; segments are short.
    fn distance_m(&self, at_m: Vec3) -> f64 {
        let of = |segment: &Segment| {
            let parts = [0.0, 0.25, 0.5, 0.75, 1.0];
            let places =
                parts.map(|part| advance(segment.from_m, segment.direction(), part * segment.length_m()));
            places.map(|place| length(advance(place, at_m, -1.0))).into_iter().fold(f64::INFINITY, f64::min)
        };
        self.segments.iter().map(of).fold(f64::INFINITY, f64::min)
    }
}

/// Source: standing-wave closed forms, computed from the formulas of Balanis ch. 8 and Kraus ch. 10 (both from memory):
/// length in wavelengths, resistance at the current loop, directivity in dBi, angle of its maximum from the wire.
const PUBLISHED: [(f64, f64, f64, f64); 9] = [
    (0.5, 73.07901, 2.15088, 90.0),
    (0.625, 131.8503, 2.40245, 90.0),
    (0.75, 185.6801, 2.74637, 90.0),
    (1.0, 198.9500, 3.82197, 90.0),
    (1.25, 106.4632, 5.16202, 90.0),
    (1.5, 105.4213, 3.47591, 42.56),
    (2.0, 259.4545, 4.02873, 57.44),
    (2.5, 120.6826, 4.85520, 32.20),
    (3.0, 295.5457, 4.81383, 45.82),
];

#[test]
fn published_resistances_and_directivities() {
    // Any orientation: nothing may depend on the axes.
    let wire = unit([0.4, -0.3, 0.85]);
    for (waves, resistance_ohm, directivity_dbi, degrees) in PUBLISHED {
        let source =
            Currents::standing_wave([0.3, -0.2, 0.7], wire, waves, Complex64::new(0.6, 0.8)).far(FREE);
        // P = ½·R·|I|², here for one ampere
        let power_w = radiated_power_w(&source);
        assert!((2.0 * power_w / resistance_ohm - 1.0).abs() < 1e-6, "{waves}: {}", 2.0 * power_w);
        let (direction, intensity) = strongest_direction(&source);
        let found_dbi = source.field(direction).gain_dbi(power_w);
        assert!((found_dbi - directivity_dbi).abs() < 1e-4, "{waves}: {found_dbi}");
        assert!((10.0 * (4.0 * PI * intensity / power_w).log10() - found_dbi).abs() < 1e-12);
        let (up, round) = (direction.elevation_deg.to_radians(), direction.azimuth_deg.to_radians());
        let toward = [up.cos() * round.cos(), up.cos() * round.sin(), up.sin()];
        let from_wire_deg = dot(toward, wire).abs().acos().to_degrees();
        assert!((from_wire_deg - degrees).abs() < 0.05, "{waves}: {from_wire_deg}");
    }
}

/// Vertical quarter wave on a mirror: half the resistance and twice the directivity of the half wave.
#[test]
fn a_monopole_on_a_mirror_is_half_a_dipole() {
    let whole = Currents::standing_wave([0.0; 3], [0.0, 0.0, 1.0], 0.5, Complex64::ONE);
    let upper = whole.segments.len() / 2;
    let monopole =
        Currents { segments: whole.segments[upper..].to_vec(), ends: whole.ends[upper..].to_vec() };
    let source = monopole.far(Boundary::Mirror);
    let power_w = radiated_power_w(&source);
    assert!((2.0 * power_w / 36.539_505 - 1.0).abs() < 1e-6);
    let (direction, _) = strongest_direction(&source);
    let gain_dbi = source.field(direction).gain_dbi(power_w);
    assert!((gain_dbi - (2.15088 + 3.0103)).abs() < 1e-4, "{gain_dbi}");
    assert!(direction.elevation_deg < 0.1, "{direction:?}");
    let below = Direction { elevation_deg: -10.0, azimuth_deg: 0.0 };
    assert!(source.field(below).intensity_w_per_sr() <= 0.0);
}

/// Factor of the image: 2·sin(kh·sin e) for a level wire. The resistance over a mirror is that of the wire with its
/// image.
#[test]
fn a_level_wire_over_a_mirror() {
    for height_m in [0.05, 0.25, 0.6, 3.2] {
        let centre = |z: f64| [0.4, 0.1, z];
        let wire = Currents::standing_wave(centre(height_m), [1.0, 0.0, 0.0], 0.5, Complex64::ONE);
        let (alone, above) = (wire.far(FREE), wire.far(Boundary::Mirror));
        for elevation_deg in [3.0, 17.0, 42.0, 88.0] {
            let direction = Direction { elevation_deg, azimuth_deg: 63.0 };
            let factor = 2.0 * (TAU * height_m * elevation_deg.to_radians().sin()).sin();
            let expected = alone.field(direction).intensity_w_per_sr() * factor * factor;
            let found = above.field(direction).intensity_w_per_sr();
            assert!((found - expected).abs() < 1e-6 * alone.field(direction).intensity_w_per_sr());
        }
        let half = CentreFedWire { half_length_m: 0.25, radius_m: 1e-5 };
        let image = ParallelWires {
            half_length_1_m: 0.25,
            half_length_2_m: 0.25,
            spacing_m: 2.0 * height_m,
            offset_m: 0.0,
        };
        let resistance_ohm =
            self_impedance(&half, FREQUENCY_HZ).re - mutual_impedance(&image, FREQUENCY_HZ).re;
        assert!((2.0 * radiated_power_w(&above) / resistance_ohm - 1.0).abs() < 1e-6, "{height_m}");
    }
}

/// Two wires with currents out of phase: P = ½·Re Σ Iᵢ*·Zᵢⱼ·Iⱼ by induced EMF equals the power through the sphere.
#[test]
fn induced_emf_and_sphere_agree() {
    let [i1, i2] = [Complex64::new(1.0, 0.0), Complex64::new(-0.4, 1.1)];
    for (spacing_m, offset_m) in [(0.1, 0.0), (0.37, 0.2), (1.9, 1.4), (4.5, 0.3)] {
        let pair = ParallelWires { half_length_1_m: 0.25, half_length_2_m: 0.41, spacing_m, offset_m };
        let z12 = mutual_impedance(&pair, FREQUENCY_HZ);
        let own = |half_length_m: f64| {
            self_impedance(&CentreFedWire { half_length_m, radius_m: 1e-5 }, FREQUENCY_HZ).re
        };
        let power_w = 0.5
            * (i1.norm_sqr() * own(0.25) + i2.norm_sqr() * own(0.41) + 2.0 * z12.re * (i1.conj() * i2).re);
        let z = [0.0, 0.0, 1.0];
        let both = Currents::standing_wave([0.0; 3], z, 0.5, i1).and(Currents::standing_wave(
            [spacing_m, 0.0, offset_m],
            z,
            0.82,
            i2,
        ));
        let through_w = radiated_power_w(&both.far(FREE));
        assert!((through_w / power_w - 1.0).abs() < 1e-6, "{spacing_m}: {through_w} for {power_w}");
    }
}

/// On the surface of a half wave the work of E on the current is the induced-EMF impedance.
#[test]
fn work_on_the_own_current_is_the_induced_emf() {
    let (half_m, radius_m) = (0.25, 1e-3);
    let wire = Currents::standing_wave([0.0; 3], [0.0, 0.0, 1.0], 0.5, Complex64::ONE);
    let near = wire.near(FREE);
    let k = wave_number_rad_per_m(FREQUENCY_HZ);
    // Steps that crowd toward ends and middle, where E has peaks of the width of the radius: s = half·sin²(πt/2).
    let count = 20_000;
    let mut z = Complex64::ZERO;
    for step in 0..count {
        let t = (f64::from(step) + 0.5) / f64::from(count);
        let place_m = half_m * (0.5 * PI * t).sin().powi(2);
        let width_m = half_m * 0.5 * PI * (PI * t).sin() / f64::from(count);
        let e = near.field([radius_m, 0.0, place_m]).e_v_per_m[2];
        // −∫E·I ds over both halves
        z -= 2.0 * e * (k * (half_m - place_m)).sin() * width_m;
    }
    let expected = self_impedance(&CentreFedWire { half_length_m: half_m, radius_m }, FREQUENCY_HZ);
    assert!((z - expected).norm() < 1e-5 * expected.norm(), "{z} for {expected}");
}

prop_compose! {
    fn point(reach: f64)(x in -reach..reach, y in -reach..reach, z in -reach..reach) -> Vec3 { [x, y, z] }
}

prop_compose! {
    fn step()(step in point(0.2).prop_filter("too short for a thin wire", |step| length(*step) > 0.02)) -> Vec3 { step }
}

prop_compose! {
    fn current()(re in -1.0..1.0_f64, im in -1.0..1.0_f64) -> Complex64 { Complex64::new(re, im) }
}

prop_compose! {
    /// An open chain of three to six segments in any shape whose current is continuous and ends at zero.
    fn chain()(
        start in point(0.5), steps in prop::collection::vec(step(), 3..6),
        inner in prop::collection::vec(current(), 6),
    ) -> Currents {
        let mut chain = Currents::default();
        let mut from_m = start;
        let last = steps.len() - 1;
        for (index, step) in steps.into_iter().enumerate() {
            let to_m = advance(from_m, step, 1.0);
            chain.segments.push(Segment { from_m, to_m, radius_m: 1e-4 });
            chain.ends.push(EndCurrents {
                from_a: if index == 0 { Complex64::ZERO } else { inner[index - 1] },
                to_a: if index == last { Complex64::ZERO } else { inner[index] },
            });
            from_m = to_m;
        }
        chain
    }
}

fn boundary(mirror: bool) -> Boundary {
    if mirror { Boundary::Mirror } else { FREE }
}

/// Largest component of the field.
fn size(vector: [Complex64; 3]) -> f64 {
    vector.iter().map(|component| component.norm()).fold(0.0, f64::max)
}

/// Curl by central differences of fourth order.
fn curl(field: impl Fn(Vec3) -> [Complex64; 3], at_m: Vec3, step_m: f64) -> [Complex64; 3] {
    let slope = |component: usize, along: usize| {
        let value = |steps: f64| {
            let mut place = at_m;
            place[along] += steps * step_m;
            field(place)[component]
        };
        (8.0 * (value(1.0) - value(-1.0)) - (value(2.0) - value(-2.0))) / (12.0 * step_m)
    };
    [slope(2, 1) - slope(1, 2), slope(0, 2) - slope(2, 0), slope(1, 0) - slope(0, 1)]
}

/// A turn about an axis (Rodrigues).
fn turned(v: Vec3, axis: Vec3, angle_rad: f64) -> Vec3 {
    let (sine, cosine) = angle_rad.sin_cos();
    let cross =
        [axis[1] * v[2] - axis[2] * v[1], axis[2] * v[0] - axis[0] * v[2], axis[0] * v[1] - axis[1] * v[0]];
    std::array::from_fn(|i| cosine * v[i] + sine * cross[i] + (1.0 - cosine) * dot(axis, v) * axis[i])
}

proptest! {
    /// curl E = −jωµH and curl H = jωεE off the wires, with and without a mirror.
    #[test]
    fn maxwells_equations_hold(chain in chain(), at_m in point(1.5), mirror: bool) {
        let raised = chain.moved(|place| [place[0], place[1], place[2] + 2.0]);
        let at_m = [at_m[0], at_m[1], at_m[2] + 2.0];
        let distance_m = raised.distance_m(at_m);
        prop_assume!(distance_m > 0.03 && at_m[2] > 0.01);
        let source = raised.near(boundary(mirror));
        let step_m = 1e-2 * distance_m.min(0.1).min(at_m[2]);
        let omega = TAU * FREQUENCY_HZ;
        let j = Complex64::i();
        let NearField { e_v_per_m, h_a_per_m } = source.field(at_m);
        let curl_e = curl(|place| source.field(place).e_v_per_m, at_m, step_m);
        let curl_h = curl(|place| source.field(place).h_a_per_m, at_m, step_m);
        let apart = |curl: [Complex64; 3], factor: Complex64, field: [Complex64; 3]| {
            size(std::array::from_fn(|axis| curl[axis] - factor * field[axis]))
        };
        // Against the size of single derivatives: both fields change over the distance to the wires.
        let scale = 1.0 / distance_m + TAU;
        let e_apart = apart(curl_e, -j * omega * VACUUM_PERMEABILITY_H_PER_M, h_a_per_m);
        prop_assert!(e_apart < 1e-6 * scale * size(e_v_per_m), "{e_apart:e}");
        let h_apart = apart(curl_h, j * omega * VACUUM_PERMITTIVITY_F_PER_M, e_v_per_m);
        let h_scale = size(h_a_per_m) + size(e_v_per_m) / VACUUM_IMPEDANCE_OHM;
        prop_assert!(h_apart < 1e-6 * scale * h_scale, "{h_apart:e}");
    }

    /// Far away the near field is the far field, and H is at right angles to it.
    #[test]
    fn far_away_near_field_is_far_field(
        chain in chain(), elevation_deg in -90.0..90.0_f64, azimuth_deg in -180.0..180.0_f64, mirror: bool,
    ) {
        let raised = chain.moved(|place| [place[0], place[1], place[2] + 2.0]);
        let elevation_deg = if mirror { elevation_deg.abs().max(0.5) } else { elevation_deg };
        let far = raised.far(boundary(mirror)).field(Direction { elevation_deg, azimuth_deg });
        let (up, round) = (elevation_deg.to_radians(), azimuth_deg.to_radians());
        let outward = [up.cos() * round.cos(), up.cos() * round.sin(), up.sin()];
        let theta = [up.sin() * round.cos(), up.sin() * round.sin(), -up.cos()];
        let phi = [-round.sin(), round.cos(), 0.0];
        let r_m = 1e6;
        let near = raised.near(boundary(mirror)).field(outward.map(|component| r_m * component));
        let along = |vector: [Complex64; 3], axis: Vec3| -> Complex64 {
            (0..3).map(|i| vector[i] * axis[i]).sum()
        };
        let unwind = r_m * Complex64::cis(wave_number_rad_per_m(FREQUENCY_HZ) * r_m);
        let scale = raised.segments.iter().zip(&raised.ends);
        let scale: f64 = scale.map(|(s, e)| s.length_m() * (e.from_a.norm() + e.to_a.norm())).sum::<f64>()
            * VACUUM_IMPEDANCE_OHM;
        for (axis, other, sign, expected) in
            [(theta, phi, 1.0, far.theta_v), (phi, theta, -1.0, far.phi_v)]
        {
            let found = along(near.e_v_per_m, axis) * unwind;
            prop_assert!((found - expected).norm() < 3e-5 * scale, "{found} for {expected}");
            // H = r̂ × E/η
            let found = along(near.h_a_per_m, other) * sign * unwind * VACUUM_IMPEDANCE_OHM;
            prop_assert!((found - expected).norm() < 3e-5 * scale, "H {found} for {expected}");
        }
    }

    /// A mirror makes E normal and H tangential at its surface.
    #[test]
    fn a_mirror_allows_no_tangential_field(chain in chain(), x in -2.0..2.0_f64, y in -2.0..2.0_f64) {
        let raised = chain.moved(|place| [place[0], place[1], place[2] + 2.0]);
        let field = raised.near(Boundary::Mirror).field([x, y, 0.0]);
        let [ex, ey, _] = field.e_v_per_m;
        prop_assert!(ex.norm().max(ey.norm()) < 1e-10 * size(field.e_v_per_m));
        prop_assert!(field.h_a_per_m[2].norm() < 1e-10 * size(field.h_a_per_m));
    }

    /// Turning everything turns the fields and changes no power.
    #[test]
    fn turning_everything_turns_the_fields(
        chain in chain(), at_m in point(1.5), axis in point(1.0), angle_rad in 0.0..6.0_f64,
    ) {
        prop_assume!(length(axis) > 0.1 && chain.distance_m(at_m) > 0.01);
        let axis = unit(axis);
        let turn = |v: Vec3| turned(v, axis, angle_rad);
        let moved = chain.moved(turn);
        let (before, after) = (chain.near(FREE).field(at_m), moved.near(FREE).field(turn(at_m)));
        for (before, after) in
            [(before.e_v_per_m, after.e_v_per_m), (before.h_a_per_m, after.h_a_per_m)]
        {
            let [re, im] = [before.map(|v| v.re), before.map(|v| v.im)].map(turn);
            let apart: [Complex64; 3] = std::array::from_fn(|i| after[i] - Complex64::new(re[i], im[i]));
            prop_assert!(size(apart) < 1e-9 * size(before));
        }
        let [before_w, after_w] = [&chain, &moved].map(|currents| radiated_power_w(&currents.far(FREE)));
        prop_assert!((after_w / before_w - 1.0).abs() < 1e-5, "{after_w} for {before_w}");
    }

    /// ∫E₁·I₂ = ∫E₂·I₁ (Lorentz).
    #[test]
    fn two_wires_act_on_each_other_alike(a in chain(), b in chain(), mirror: bool) {
        let a = a.moved(|place| [place[0], place[1], place[2] + 2.0]);
        let b = b.moved(|place| [place[0] + 4.0, place[1], place[2] + 2.0]);
        let work = |source: &Currents, on: &Currents| -> (Complex64, f64) {
            let near = source.near(boundary(mirror));
            let mut sum = (Complex64::ZERO, 0.0);
            for (segment, ends) in on.segments.iter().zip(&on.ends) {
                // In quarters: the wires may come as near to each other as they are long, where five points on the whole
                // are good to 1e-6 only.
                for (share, weight) in (0..4).flat_map(quarter) {
                    let along_m = share * segment.length_m();
                    let place = advance(segment.from_m, segment.direction(), along_m);
                    let e = near.field(place).e_v_per_m;
                    let part: Complex64 = (0..3).map(|i| e[i] * segment.direction()[i]).sum();
                    let weight = weight * segment.length_m();
                    let current = ends.current_a(segment, FREQUENCY_HZ, along_m);
                    sum.0 += part * current * weight;
                    sum.1 += (part * current).norm() * weight;
                }
            }
            sum
        };
        let ((ab, scale), (ba, _)) = (work(&a, &b), work(&b, &a));
        prop_assert!((ab - ba).norm() <= 1e-7 * scale, "{ab} and {ba}, apart by {:e} of {scale}", (ab - ba).norm() / scale);
    }
}

/// The rule on one quarter of 0…1.
fn quarter(index: u8) -> impl Iterator<Item = (f64, f64)> {
    GAUSS.into_iter().map(move |(share, weight)| (0.25 * (f64::from(index) + share), 0.25 * weight))
}

/// Gauss-Legendre points and weights on 0…1, five points (Abramowitz & Stegun, table 25.4, from memory).
const GAUSS: [(f64, f64); 5] = [
    (0.046_910_077_030_668, 0.118_463_442_528_095),
    (0.230_765_344_947_158, 0.239_314_335_249_683),
    (0.5, 0.284_444_444_444_444),
    (0.769_234_655_052_842, 0.239_314_335_249_683),
    (0.953_089_922_969_332, 0.118_463_442_528_095),
];

/// Inside a wire, on its axis, at a joint: finite everywhere.
#[test]
fn no_place_is_infinite() {
    let wire = Currents::standing_wave([0.0, 0.0, 0.3], [1.0, 0.0, 0.0], 0.5, Complex64::ONE);
    for boundary in [FREE, Boundary::Mirror] {
        let near = wire.near(boundary);
        for x in [0.0, 0.25, -0.25, 0.05, 0.013, 0.250_004, 3.0] {
            let NearField { e_v_per_m, h_a_per_m } = near.field([x, 0.0, 0.3]);
            assert!(e_v_per_m.iter().chain(&h_a_per_m).all(|component| component.is_finite()), "{x}");
        }
    }
    let soil = Boundary::Soil(Soil { relative_permittivity: 13.0, conductivity_s_per_m: 5e-3 });
    assert!(NearFieldSource::new(&wire.segments, &wire.ends, soil, FREQUENCY_HZ).is_none());
}
