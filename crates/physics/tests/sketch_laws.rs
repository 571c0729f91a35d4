//! Laws that every wire of the sketch must keep, whatever its figures.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;
use physics::constants::{SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM};
use physics::sinusoid::{
    BandTerms, CentreFedWire, Image, ImageDirection, MarkKind, Mirror, ParallelWires, Sketch, SketchError,
    SketchWire, mutual_impedance, self_impedance,
};
use proptest::prelude::*;

prop_compose! {
    /// Any wire in free space: arms from 1 to 80 m, 0.5 to 5 mm thick.
    fn free_wire()(
        arm_a in 0.0..1.9_f64,
        arm_b in 0.0..1.9_f64,
        diameter_m in 0.5e-3..5e-3_f64,
        velocity_factor in 0.94..1.0_f64,
        conductivity_s_per_m in prop_oneof![Just(58e6), Just(f64::INFINITY), 1e6..58e6_f64],
        resistance_factor in 1.0..1.5_f64,
    ) -> SketchWire {
        SketchWire {
            arm_a_m: 10_f64.powf(arm_a),
            arm_b_m: 10_f64.powf(arm_b),
            radius_m: 0.5 * diameter_m,
            velocity_factor,
            conductivity_s_per_m,
            resistance_factor,
            image: None,
        }
    }
}

fn mirror() -> impl Strategy<Value = Mirror> {
    let soil = (2.0..81.0_f64, 1e-4..0.03_f64).prop_map(|(relative_permittivity, conductivity_s_per_m)| {
        Mirror::Soil { relative_permittivity, conductivity_s_per_m }
    });
    prop_oneof![Just(Mirror::Perfect), soil]
}

prop_compose! {
    /// Any wire, in free space or over an earth from 0.02 λ at 1.8 MHz up.
    fn wire()(
        wire in free_wire(),
        clearance_m in 3.5..60.0_f64,
        mirror in mirror(),
        kind in 0..3_u8,
    ) -> SketchWire {
        let half_m = 0.5 * (wire.arm_a_m + wire.arm_b_m);
        let image = match kind {
            0 => None,
            1 => Some(Image { height_m: clearance_m, direction: ImageDirection::Horizontal, mirror }),
            _ => Some(Image { height_m: clearance_m + half_m, direction: ImageDirection::Vertical, mirror }),
        };
        SketchWire { image, ..wire }
    }
}

fn frequency_hz() -> impl Strategy<Value = f64> {
    // Evenly over the octaves from 1.8 to 54 MHz.
    (1.8e6_f64.ln()..54e6_f64.ln()).prop_map(f64::exp)
}

fn sketch(wire: SketchWire) -> Sketch {
    Sketch::new(wire).expect("the ranges above are those of the sketch")
}

fn reversed(wire: SketchWire) -> SketchWire {
    SketchWire { arm_a_m: wire.arm_b_m, arm_b_m: wire.arm_a_m, ..wire }
}

proptest! {
    #[test]
    fn resistance_is_positive_and_heat_a_share_of_it(wire in wire(), frequency_hz in frequency_hz()) {
        let answer = sketch(wire).at(frequency_hz)?;
        prop_assert!(answer.impedance_ohm.re > 0.0 && answer.impedance_ohm.is_finite());
        prop_assert!((0.0..=1.0).contains(&answer.wire_efficiency));
        prop_assert_eq!(wire.conductivity_s_per_m.is_infinite(), answer.wire_efficiency > 1.0 - 1e-12);
    }

    #[test]
    fn current_is_continuous_through_the_feedpoint_and_zero_at_the_ends(
        wire in wire(), frequency_hz in frequency_hz(),
    ) {
        let sketch = sketch(wire);
        let answer = sketch.at(frequency_hz)?;
        let length_m = sketch.length_m();
        let feed_m = wire.arm_a_m;
        let wave = sketch.standing_wave(&answer, &[0.0, feed_m, feed_m + 1e-10, length_m]);
        // ½·I²·R = 1 W
        let fed_a = (2.0 / answer.impedance_ohm.re).sqrt();
        prop_assert!((wave[1].current_a - fed_a).norm() < 1e-9 * fed_a);
        prop_assert!((wave[2].current_a - fed_a).norm() < 1e-6 * fed_a);
        for end in [wave[0], wave[3]] {
            prop_assert!(end.current_a.norm() < 1e-9 * fed_a);
            prop_assert!(end.potential_v.is_finite() && end.potential_v.norm() > 0.0);
        }
    }

    #[test]
    fn potential_jumps_by_the_feedpoint_voltage(wire in wire(), frequency_hz in frequency_hz()) {
        let sketch = sketch(wire);
        let answer = sketch.at(frequency_hz)?;
        let feed_m = wire.arm_a_m;
        let wave = sketch.standing_wave(&answer, &[feed_m, feed_m + 1e-10]);
        let voltage_v = wave[0].current_a * answer.impedance_ohm;
        let jump_v = wave[1].potential_v - wave[0].potential_v;
        prop_assert!((jump_v - voltage_v).norm() < 1e-6 * voltage_v.norm(), "{jump_v} for {voltage_v}");
    }

    #[test]
    fn charge_is_conserved_along_each_arm(
        wire in wire(), frequency_hz in frequency_hz(), place in 0.05..0.95_f64,
    ) {
        // dI/ds and V are proportional on an arm: −dI/ds = jωC·V with one capacitance per metre, complex through the
        // damping, for the whole arm.
        let sketch = sketch(wire);
        let answer = sketch.at(frequency_hz)?;
        let step_m = 1e-5 * wire.arm_a_m.min(SPEED_OF_LIGHT_M_PER_S / frequency_hz);
        let slope = |arc_m: f64| {
            let wave = sketch.standing_wave(&answer, &[arc_m - step_m, arc_m, arc_m + step_m]);
            (wave[2].current_a - wave[0].current_a) / wave[1].potential_v
        };
        let (here, near_end) = (slope(place * wire.arm_a_m), slope(2.0 * step_m));
        prop_assert!((here - near_end).norm() < 1e-3 * near_end.norm(), "{here} and {near_end}");
    }

    #[test]
    fn turned_around_the_wire_is_the_same(
        wire in wire(), frequency_hz in frequency_hz(), place in 0.0..1.0_f64,
    ) {
        let (there, back) = (sketch(wire), sketch(reversed(wire)));
        let (answer, answer_back) = (there.at(frequency_hz)?, back.at(frequency_hz)?);
        let size = answer.impedance_ohm.norm();
        prop_assert!((answer.impedance_ohm - answer_back.impedance_ohm).norm() < 1e-9 * size);
        let arc_m = place * there.length_m();
        let wave = there.standing_wave(&answer, &[arc_m])[0];
        let wave_back = back.standing_wave(&answer_back, &[there.length_m() - arc_m])[0];
        prop_assert!((wave.current_a - wave_back.current_a).norm() < 1e-9 * (1.0 + wave.current_a.norm()));
        prop_assert!((wave.potential_v + wave_back.potential_v).norm() < 1e-9 * wave.potential_v.norm());
    }

    #[test]
    fn phase_turns_over_at_every_node_of_an_arm(wire in free_wire(), frequency_hz in frequency_hz()) {
        let sketch = sketch(wire);
        let answer = sketch.at(frequency_hz)?;
        let loops: Vec<f64> = sketch
            .marks(&answer)
            .iter()
            .filter(|mark| mark.kind == MarkKind::CurrentLoop)
            .map(|mark| mark.arc_m)
            .collect();
        let wave = sketch.standing_wave(&answer, &loops);
        for pair in wave.windows(2) {
            let same_arm = (pair[0].arc_m < wire.arm_a_m) == (pair[1].arc_m < wire.arm_a_m);
            let at_feed = pair.iter().any(|point| (point.arc_m - wire.arm_a_m).abs() < 1e-9);
            if same_arm && !at_feed {
                prop_assert!((pair[0].current_a * pair[1].current_a.conj()).re < 0.0, "{pair:?}");
            }
        }
    }

    #[test]
    fn marks_rise_begin_and_end_with_nodes(wire in wire(), frequency_hz in frequency_hz()) {
        let sketch = sketch(wire);
        let marks = sketch.marks(&sketch.at(frequency_hz)?);
        prop_assert!(marks.windows(2).all(|pair| pair[0].arc_m < pair[1].arc_m));
        prop_assert!(marks.iter().any(|mark| mark.kind == MarkKind::CurrentLoop));
        for (mark, end_m) in [(marks[0], 0.0), (marks[marks.len() - 1], sketch.length_m())] {
            prop_assert_eq!(mark.kind, MarkKind::CurrentNode);
            prop_assert!((mark.arc_m - end_m).abs() < 1e-9);
        }
    }

    #[test]
    fn interpolation_over_a_band_is_exact_to_a_ten_thousandth(
        wire in wire(), low_hz in frequency_hz(), width in 1e-4..0.3_f64, place in 0.0..1.0_f64,
    ) {
        let sketch = sketch(wire);
        let high_hz = low_hz * (1.0 + width);
        let band = BandTerms::new(&sketch, low_hz, high_hz)?;
        for frequency_hz in [low_hz, low_hz + place * (high_hz - low_hz), high_hz] {
            let (exact, quick) = (sketch.at(frequency_hz)?, sketch.answer(&band.at(frequency_hz)));
            let error = (exact.impedance_ohm - quick.impedance_ohm).norm() / exact.impedance_ohm.norm();
            prop_assert!(error < 1e-4, "{error:e} of Z at {frequency_hz} Hz");
            prop_assert!((exact.wire_efficiency - quick.wire_efficiency).abs() < 1e-4);
        }
    }

    #[test]
    fn very_high_up_the_earth_is_forgotten(
        wire in free_wire(), frequency_hz in frequency_hz(), mirror in mirror(), upright: bool,
    ) {
        let direction = if upright { ImageDirection::Vertical } else { ImageDirection::Horizontal };
        let far_up = SketchWire { image: Some(Image { height_m: 9e5, direction, mirror }), ..wire };
        let (free, high) = (sketch(wire).at(frequency_hz)?, sketch(far_up).at(frequency_hz)?);
        let change = (free.impedance_ohm - high.impedance_ohm).norm() / free.impedance_ohm.norm();
        prop_assert!(change < 1e-3, "{change:e}");
    }

    #[test]
    fn mutual_impedance_is_the_same_both_ways(
        l1 in 0.05..2.0_f64, l2 in 0.05..2.0_f64, spacing_m in 1e-4..3.0_f64, offset_m in -5.0..5.0_f64,
    ) {
        let pair = ParallelWires { half_length_1_m: l1, half_length_2_m: l2, spacing_m, offset_m };
        let other = ParallelWires { half_length_1_m: l2, half_length_2_m: l1, ..pair };
        let (z12, z21) = (mutual_impedance(&pair, METRE_WAVE_HZ), mutual_impedance(&other, METRE_WAVE_HZ));
        prop_assert!((z12 - z21).norm() < 1e-9 * (1.0 + z12.norm()), "{z12} and {z21}");
    }

    #[test]
    fn mutual_impedance_is_the_work_of_the_exact_field(
        l1 in 0.05..1.5_f64, l2 in 0.05..1.5_f64, spacing_m in 0.05..2.0_f64, offset_m in -3.0..3.0_f64,
    ) {
        let pair = ParallelWires { half_length_1_m: l1, half_length_2_m: l2, spacing_m, offset_m };
        let (closed, summed) = (mutual_impedance(&pair, METRE_WAVE_HZ), by_quadrature(&pair));
        prop_assert!((closed - summed).norm() < 1e-6 * (1.0 + summed.norm()), "{closed} for {summed}");
    }

    #[test]
    fn resistance_is_the_power_through_a_far_sphere(half_length_m in 0.02..3.0_f64) {
        let wire = CentreFedWire { half_length_m, radius_m: 1e-7 };
        let closed_ohm = self_impedance(&wire, METRE_WAVE_HZ).re;
        let kl = TAU * half_length_m;
        // R = η0/2π·∫ [cos(kl·cos θ) − cos kl]²/sin θ dθ, with cos θ = u: the integrand has no pole.
        let pattern = |u: f64| ((kl * u).cos() - kl.cos()).powi(2) / (1.0 - u * u).max(1e-300);
        let far_ohm = VACUUM_IMPEDANCE_OHM / (2.0 * PI) * 2.0 * midpoint(4000, 0.0, 1.0, pattern);
        prop_assert!((closed_ohm / far_ohm - 1.0).abs() < 1e-4, "{closed_ohm} for {far_ohm}");
    }
}

/// λ = 1 m.
const METRE_WAVE_HZ: f64 = SPEED_OF_LIGHT_M_PER_S;

fn midpoint(steps: u32, from: f64, to: f64, f: impl Fn(f64) -> f64) -> f64 {
    let width = (to - from) / f64::from(steps);
    width * (0..steps).map(|step| f(from + (f64::from(step) + 0.5) * width)).sum::<f64>()
}

/// −∫E_z·I dz by Simpson's rule over each half of the second wire, from the field of the sinusoidal filament.
fn by_quadrature(pair: &ParallelWires) -> Complex64 {
    let ParallelWires { half_length_1_m: l1, half_length_2_m: l2, spacing_m, offset_m } = *pair;
    let spherical = |z: f64| {
        let distance_m = z.hypot(spacing_m);
        Complex64::cis(-TAU * distance_m) / distance_m
    };
    let work = |z: f64| {
        let field = spherical(z - l1) + spherical(z + l1) - 2.0 * (TAU * l1).cos() * spherical(z);
        field * (TAU * (l2 - (z - offset_m).abs())).sin()
    };
    let half = |from: f64| {
        let steps = 2000;
        let width = l2 / f64::from(steps);
        let term = |step: i32| {
            let weight = if step == 0 || step == steps { 1.0 } else { f64::from(2 + 2 * (step % 2)) };
            weight * work(from + f64::from(step) * width)
        };
        width / 3.0 * (0..=steps).map(term).sum::<Complex64>()
    };
    Complex64::i() * VACUUM_IMPEDANCE_OHM / (4.0 * PI) * (half(offset_m - l2) + half(offset_m))
}

/// A full wave of thin wire for 10 MHz, fed at a share of its length.
fn full_wave(share: f64) -> Sketch {
    let length_m = SPEED_OF_LIGHT_M_PER_S / 10e6;
    sketch(SketchWire {
        arm_a_m: share * length_m,
        arm_b_m: (1.0 - share) * length_m,
        radius_m: 1e-3,
        velocity_factor: 1.0,
        conductivity_s_per_m: f64::INFINITY,
        resistance_factor: 1.0,
        image: None,
    })
}

#[test]
fn both_halves_of_a_full_wave_agree_when_fed_in_the_centre_and_oppose_when_fed_at_a_quarter() {
    for (share, sign) in [(0.5, 1.0), (0.25, -1.0), (0.75, -1.0)] {
        let wire = full_wave(share);
        let answer = wire.at(10e6).unwrap();
        let length_m = wire.length_m();
        let wave = wire.standing_wave(&answer, &[0.25 * length_m, 0.75 * length_m]);
        let product = wave[0].current_a * wave[1].current_a.conj();
        let expected = sign * wave[0].current_a.norm() * wave[1].current_a.norm();
        assert!((product - expected).norm() < 0.15 * expected.abs(), "fed at {share}: {wave:?}");
    }
}

#[test]
fn a_feedpoint_on_a_node_has_a_finite_answer() {
    let wire = full_wave(0.5);
    let answer = wire.at(10e6).unwrap();
    assert!(answer.impedance_ohm.is_finite() && answer.impedance_ohm.re > 1000.0, "{answer:?}");
    // One arm on its node, the other not.
    let wire = sketch(SketchWire { arm_a_m: 7.0, ..*wire.wire() });
    let answer = wire.at(10e6).unwrap();
    let arcs_m: Vec<f64> = (0..=200).map(|step| wire.length_m() * f64::from(step) / 200.0).collect();
    for point in wire.standing_wave(&answer, &arcs_m) {
        assert!(point.current_a.norm() < 1.0 && point.potential_v.norm() < 1000.0, "{point:?}");
    }
}

#[test]
fn absurd_wires_are_refused_in_words() {
    let good = *full_wave(0.5).wire();
    let image = Image { height_m: 10.0, direction: ImageDirection::Horizontal, mirror: Mirror::Perfect };
    let soil = Mirror::Soil { relative_permittivity: f64::NAN, conductivity_s_per_m: 0.005 };
    for bad in [
        SketchWire { arm_a_m: f64::NAN, ..good },
        SketchWire { arm_b_m: -3.0, ..good },
        SketchWire { arm_b_m: f64::INFINITY, ..good },
        SketchWire { radius_m: 0.0, ..good },
        SketchWire { velocity_factor: 1.2, ..good },
        SketchWire { conductivity_s_per_m: 0.0, ..good },
        SketchWire { resistance_factor: f64::NAN, ..good },
        SketchWire { image: Some(Image { height_m: 0.0, ..image }), ..good },
        SketchWire { image: Some(Image { direction: ImageDirection::Vertical, ..image }), ..good },
        SketchWire { image: Some(Image { mirror: soil, ..image }), ..good },
    ] {
        let refused = Sketch::new(bad).unwrap_err();
        assert!(matches!(refused, SketchError::OutOfRange { .. }), "{refused}");
        assert!(refused.to_string().contains("accepted is"), "{refused}");
    }
    let thick = Sketch::new(SketchWire { radius_m: 0.4, ..good }).unwrap_err();
    assert!(matches!(thick, SketchError::TooThick { .. }), "{thick}");
}

#[test]
fn frequencies_out_of_range_are_refused_in_words() {
    let wire = full_wave(0.5);
    for frequency_hz in [0.0, -7e6, f64::NAN, f64::INFINITY, 0.09e6, 101e6] {
        assert!(matches!(wire.terms(frequency_hz), Err(SketchError::OutOfRange { .. })), "{frequency_hz}");
        assert!(BandTerms::new(&wire, frequency_hz, 7e6).is_err(), "{frequency_hz}");
        assert!(BandTerms::new(&wire, 7e6, frequency_hz).is_err(), "{frequency_hz}");
    }
    let end_fed = sketch(SketchWire { arm_a_m: 0.1, ..*wire.wire() });
    assert!(matches!(end_fed.terms(2e6), Err(SketchError::ArmTooShort { .. })));
    let tube = sketch(SketchWire { arm_a_m: 10.0, arm_b_m: 10.0, radius_m: 0.1, ..*wire.wire() });
    assert!(matches!(tube.terms(54e6), Err(SketchError::TooThickForFrequency { .. })));
    let on_the_sea = Image {
        height_m: 0.1,
        direction: ImageDirection::Horizontal,
        mirror: Mirror::Soil { relative_permittivity: 81.0, conductivity_s_per_m: 5.0 },
    };
    let wet = sketch(SketchWire { arm_a_m: 9.0, arm_b_m: 9.0, image: Some(on_the_sea), ..*wire.wire() });
    assert!(matches!(wet.terms(10e6), Err(SketchError::TooNearToEarth { .. })));
}
