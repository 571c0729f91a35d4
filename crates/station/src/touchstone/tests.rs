//! What is written is read back; the examples of the specification; what is refused.

use proptest::prelude::*;

use super::*;

prop_compose! {
    fn one_port()(
        reference_ohm in 1.0..1000.0_f64,
        points in prop::collection::vec((1.0..1e6_f64, 0.0..1.0_f64, -180.0..180.0_f64), 0..40),
    ) -> OnePort {
        let mut frequency_hz = 1e6;
        let points = points
            .into_iter()
            .map(|(step_hz, size, angle)| {
                frequency_hz += step_hz;
                OnePortPoint { frequency_hz, gamma: Complex64::from_polar(size, f64::to_radians(angle)) }
            })
            .collect();
        OnePort { reference_ohm, points }
    }
}

proptest! {
    #[test]
    fn what_is_written_is_read_back_exactly(one_port in one_port(), comment in ".{0,40}") {
        let text = write_s1p(&one_port, &["feedpoint", &comment]).unwrap();
        prop_assert!(text.is_ascii());
        prop_assert_eq!(read_s1p(&text).unwrap(), one_port);
    }

    #[test]
    fn a_table_is_read_back(one_port in one_port()) {
        let back = read_csv(&write_csv(&one_port).unwrap(), one_port.reference_ohm).unwrap();
        prop_assert_eq!(back.points.len(), one_port.points.len());
        for (a, b) in back.points.iter().zip(&one_port.points) {
            prop_assert!(a.frequency_hz.to_bits() == b.frequency_hz.to_bits());
            prop_assert!((a.gamma - b.gamma).norm() < 1e-9);
        }
    }

    #[test]
    fn no_text_panics(text in "[#!\\[ a-zA-Z0-9.,+\\-\n]{0,200}") {
        let _ = read_s1p(&text);
        let _ = read_csv(&text, 50.0);
        let _ = read_csv(&format!("{HEADER}\n{text}"), 50.0);
    }
}

/// Examples of the public specification, as a public test suite uses them.
#[test]
fn examples_of_the_specification() {
    let only = |text: &str| {
        let read = read_s1p(text).unwrap();
        assert_eq!(read.points.len(), 1);
        (read.points[0], read.impedances().next().unwrap().1, read.reference_ohm)
    };
    let near = |got: Complex64, re: f64, im: f64, bar: f64| {
        assert!((got - Complex64::new(re, im)).norm() < bar, "{got} for {re} {im:+}j");
    };
    let (point, _, reference_ohm) =
        only("! example\n# MHz S MA R 50\n! freq mag angle\n2.000 0.894 -12.136\n");
    near(point.gamma, 0.874_020, -0.187_948, 1e-6);
    assert!((point.frequency_hz - 2e6).abs() < 1e-6 && (reference_ohm - 50.0).abs() < 1e-12);
    let (point, ..) = only("# MHz S DB R 50\r\n2.000 -0.97 -12.136 ! trailing\r\n");
    near(point.gamma, 0.874_347, -0.188_019, 1e-6);
    let (_, z_ohm, reference_ohm) = only("# mhz z ma r 75\n100 0.99 -4\n");
    near(z_ohm, 74.069_13, -5.179_42, 1e-5);
    assert!((reference_ohm - 75.0).abs() < 1e-12);
    // an admittance normalised to R: Y = y/R
    let (_, z_ohm, _) = only("# R 50 kHz RI Y\n3600 0.5 0.5\n");
    near(z_ohm, 50.0, -50.0, 1e-9);
    // nothing but the sign: GHz, S, magnitude and angle, 50 Ω; a second option line is ignored
    let (point, ..) = only("#\n0.0071 0.5 90\n# Hz Z RI R 1\n");
    near(point.gamma, 0.0, 0.5, 1e-12);
    assert!((point.frequency_hz - 7.1e6).abs() < 1e-3);
}

#[test]
fn what_is_not_of_the_format_is_refused_with_its_line() {
    let refused = |text: &str, words: &str| {
        let error = read_s1p(text).unwrap_err().to_string();
        assert!(error.starts_with(words), "{error}");
    };
    refused("1 2 3\n", "line 1: data stand before the option line");
    refused("[Version] 2.1\n# Hz\n", "line 1: this is a Touchstone file of version 2");
    refused("# Hz S RI R 50\n1 2\n", "line 2: a one-port's line holds three numbers, this one 2");
    refused("# Hz S RI\n1 0 0\n1 0 0\n", "line 3: 1 Hz does not lie above");
    refused("# Hz S RI\n1 0 zero\n", "line 2: \"zero\" is not a number");
    refused(
        "# Hz S RI\n1 0 NaN\n",
        "line 2: a frequency, a reflection or an impedance is not a finite number",
    );
    refused("# Hz H RI\n", "line 1: the option line does not allow \"H\" here");
    refused("# Hz R 0\n", "the reference resistance is 0 Ω");
    assert_eq!(read_csv("f,z\n1,2\n", 50.0), Err(OnePortError::NoHeader));
    assert!(read_csv(HEADER, -50.0).is_err());
    let open = OnePort {
        reference_ohm: 50.0,
        points: vec![OnePortPoint { frequency_hz: 1e6, gamma: Complex64::ONE }],
    };
    assert!(write_csv(&open).is_err());
    assert_eq!(read_s1p(&write_s1p(&open, &[]).unwrap()), Ok(open.clone()));
    let twice = OnePort { points: vec![open.points[0]; 2], ..open };
    assert!(write_s1p(&twice, &[]).is_err());
}
