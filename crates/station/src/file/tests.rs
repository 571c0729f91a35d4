use proptest::prelude::*;

use super::*;
use crate::plan::{Band, BandRange};
use crate::sample;

#[test]
fn a_plan_comes_back_the_same() {
    let plan = sample::plan();
    let text = to_text(&plan).unwrap();
    assert_eq!(from_text(&text).unwrap(), plan);
}

#[test]
fn saving_replaces_the_whole_file_and_keeps_a_link() {
    let folder = tempfile::tempdir().unwrap();
    let real = folder.path().join("real.ron");
    fs::write(&real, "old").unwrap();
    let link = folder.path().join("link.ron");
    #[cfg(unix)]
    std::os::unix::fs::symlink(&real, &link).unwrap();
    save(&sample::plan(), &link).unwrap();
    assert_eq!(load(&real).unwrap(), sample::plan());
    assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
}

/// Each broken text gives one sentence with what, where and what would be accepted.
#[test]
fn bad_files_say_what_where_and_what_instead() {
    let good = to_text(&sample::plan()).unwrap();
    let cut = good.find("transmitter").unwrap();
    let cases: Vec<(String, &[&str])> = vec![
        (String::new(), &["line 1", "accepted"]),
        (good[..cut].to_owned(), &["line ", "column ", "accepted"]),
        (good.replace("format: (1, 1)", "format: (2, 0)"), &["format 2.0", "up to format 1.1"]),
        (good.replace("format: (1, 1)", "format: (1, 3)"), &["format 1.3", "up to format 1.1"]),
        (good.replace("format: (1, 1)", "format: (0, 9)"), &["0.9 does not exist", "accepted"]),
        (
            good.replace("cut_length_m: 40.0", "cut_length_m: -40.0"),
            &["wires[0].cut_length_m", "-40 m", "0.05 to 1000 m"],
        ),
        (
            good.replace("cut_length_m: 40.0", "cut_length_m: NaN"),
            &["wires[0].cut_length_m: not a number is", "accepted"],
        ),
        (
            good.replace("cut_length_m: 40.0", "cut_length_m: inf"),
            &["wires[0].cut_length_m", "inf", "accepted"],
        ),
        (
            good.replace("cut_length_m: 40.0", "cut_length_m: \"long\""),
            &["line ", "plan.wires[0].cut_length_m", "accepted"],
        ),
        (
            good.replace("cut_length_m: 40.0", "cut_lenght_m: 40.0"),
            &["line ", "cut_lenght_m", "cut_length_m"],
        ),
        (good.replace("fraction: 0.5", "fraction: 1.4"), &["feedpoint.fraction", "1.4", "0.005 to 0.995"]),
        (good.replace("earth: Catalogue", "earth: Katalog"), &["line ", "Katalog", "accepted"]),
    ];
    for (text, parts) in cases {
        let sentence = from_text(&text).expect_err(&text).to_string();
        for part in parts {
            assert!(sentence.contains(part), "{part:?} is not in {sentence:?}");
        }
        assert!(!sentence.contains('\n') && sentence.len() < 400, "{sentence}");
    }
}

#[test]
fn a_million_bands_are_refused_in_words() {
    let mut plan = sample::plan();
    plan.bands = vec![plan.bands[0].clone(); 65];
    assert!(to_text(&plan).unwrap_err().to_string().contains("bands: 65 entries; accepted: 1 to 64"));
    let band = "(name: \"40 m\", range: Span(low_hz: 7000000.0, high_hz: 7200000.0)),";
    let text = to_text(&sample::plan()).unwrap().replacen(
        "bands: [",
        &format!("bands: [{}", band.repeat(1_000_000)),
        1,
    );
    assert!(from_text(&text).unwrap_err().to_string().contains("accepted: a plan file of up to 2 MB"));
}

proptest! {
    /// plan → RON → plan is the identity, whatever the numbers and names.
    #[test]
    fn round_trip(
        cut_length_m in 5.0..45.0f64,
        fraction in 0.01..0.99f64,
        power_w in 0.5..1500.0f64,
        name in "\\PC{0,40}",
        channels in proptest::collection::vec(1.8e6..54.0e6f64, 1..20),
    ) {
        let mut plan = sample::plan();
        plan.name = name;
        plan.wires[0].cut_length_m = cut_length_m;
        plan.feedpoint.fraction = fraction;
        plan.transmitter.power_w = power_w;
        plan.bands.push(Band { name: "net".to_owned(), range: BandRange::Channels { frequencies_hz: channels } });
        prop_assert_eq!(from_text(&to_text(&plan).unwrap()).unwrap(), plan);
    }
}
