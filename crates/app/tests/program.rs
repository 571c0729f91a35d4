//! The program as a whole, from the command line, without a display.

#![allow(clippy::unwrap_used)] // A failed step is a failed test.

use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

use serde_json::Value;
use station::file;

fn demo(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../../demo-projects").join(name)
}

const DEMOS: [&str; 3] = ["saltmarsh-relief-post.ron", "ridge-hut.ron", "heron-spit-lookout.ron"];

/// Runs `wirewright` as on a machine without a display.
fn wirewright(arguments: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_wirewright"))
        .args(arguments)
        .env_remove("DISPLAY")
        .env_remove("WAYLAND_DISPLAY")
        .env_remove("WAYLAND_SOCKET")
        .output()
        .unwrap()
}

fn path_text(path: &Path) -> &str {
    path.to_str().unwrap()
}

fn out(output: &Output) -> String {
    String::from_utf8(output.stdout.clone()).unwrap()
}

/// What it said on the error stream: one line, no backtrace.
fn sentence(output: &Output) -> String {
    let text = String::from_utf8(output.stderr.clone()).unwrap();
    assert_eq!(text.trim_end().lines().count(), 1, "{text}");
    assert!(!text.contains("panicked") && !text.contains("backtrace"), "{text}");
    text
}

fn json_of(arguments: &[&str]) -> Value {
    let output = wirewright(arguments);
    assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
    serde_json::from_slice(&output.stdout).unwrap()
}

fn holds_null(value: &Value) -> bool {
    match value {
        Value::Null => true,
        Value::Array(values) => values.iter().any(holds_null),
        Value::Object(fields) => fields.values().any(holds_null),
        Value::Bool(_) | Value::Number(_) | Value::String(_) => false,
    }
}

#[test]
fn the_report_is_a_table_with_every_band_and_feed() {
    for name in DEMOS {
        let path = demo(name);
        let plan = file::load(&path).unwrap();
        let output = wirewright(&["report", path_text(&path)]);
        assert!(output.status.success());
        let text = out(&output);
        assert!(text.starts_with(&plan.name));
        for band in &plan.bands {
            assert!(text.lines().any(|line| line.starts_with(&band.name)), "{name}: {}\n{text}", band.name);
        }
        for feed in &plan.feeds {
            let rows = text.lines().filter(|line| line.contains(&format!("  {}  ", feed.name))).count();
            assert!(rows >= plan.bands.len(), "{name}: {} has {rows} rows\n{text}", feed.name);
        }
        assert!(!text.contains("NaN") && !text.contains("inf"), "{text}");
    }
}

#[test]
fn the_json_is_one_object_without_null() {
    for name in DEMOS {
        let path = demo(name);
        let plan = file::load(&path).unwrap();
        let json = json_of(&["report", path_text(&path), "--json"]);
        assert!(json.is_object() && !holds_null(&json));
        let bands = json["bands"].as_array().unwrap();
        assert_eq!(bands.len(), plan.bands.len());
        for (band, planned) in bands.iter().zip(&plan.bands) {
            assert_eq!(band["name"], planned.name.as_str());
            assert!(band["frequencies"][0]["r_ohm"].as_f64().unwrap() > 0.0, "{band}");
        }
    }
}

#[test]
fn at_asks_for_frequencies_in_megahertz() {
    let path = demo(DEMOS[0]);
    let json = json_of(&["report", path_text(&path), "--json", "--at", "7.1,14.15"]);
    let points: Vec<f64> = json["bands"]
        .as_array()
        .unwrap()
        .iter()
        .flat_map(|band| band["frequencies"].as_array().unwrap())
        .map(|point| point["frequency_hz"].as_f64().unwrap())
        .collect();
    assert_eq!(points.len(), 2);
    assert!((points[0] - 7.1e6).abs() < 1.0 && (points[1] - 14.15e6).abs() < 1.0, "{points:?}");
    let table = out(&wirewright(&["report", path_text(&path), "--at", "7.1", "14.15"]));
    assert!(table.contains("7.100") && table.contains("14.150"), "{table}");
}

#[test]
fn table_and_json_give_the_same_numbers() {
    let path = demo(DEMOS[0]);
    let json = json_of(&["report", path_text(&path), "--json", "--at", "10.12"]);
    let table = out(&wirewright(&["report", path_text(&path), "--at", "10.12"]));
    let point = &json["bands"][0]["frequencies"][0];
    let (r, x) = (point["r_ohm"].as_f64().unwrap(), point["x_ohm"].as_f64().unwrap());
    let z = station::units::impedance(num_complex::Complex64::new(r, x));
    assert!(table.contains(z.trim_end_matches(" Ω")), "{z} is not in\n{table}");
}

#[test]
fn frequencies_that_are_no_use_are_refused() {
    let path = demo(DEMOS[0]);
    for at in ["0", "-7", "NaN", "inf", "900"] {
        let output = wirewright(&["report", path_text(&path), &format!("--at={at}")]);
        assert_eq!(output.status.code(), Some(2), "{at}");
        let said = sentence(&output);
        assert!(said.contains("--at") && said.contains("accepted"), "{said}");
    }
}

/// Plans that no one can use, and what the sentence must name.
fn bad_plans() -> Vec<(&'static str, String, &'static str)> {
    let good = fs::read_to_string(demo(DEMOS[0])).unwrap();
    let with = |from: &str, to: &str| {
        let text = good.replacen(from, to, 1);
        assert_ne!(text, good, "{from}");
        text
    };
    let band = "(name: \"b\", range: Span(low_hz: 3500000.0, high_hz: 3800000.0)),";
    vec![
        ("empty", String::new(), "line 1"),
        ("broken", good.replacen("wires:", "wires", 1), "line"),
        ("truncated", good[..good.len() * 2 / 3].to_owned(), "line"),
        ("not text", "\u{0}\u{1}PNG".to_owned(), "line 1"),
        ("newer", with("format: (1, 0)", "format: (2, 0)"), "2.0"),
        ("a negative length", with("cut_length_m: ", "cut_length_m: -"), "wires[0].cut_length_m"),
        ("not a number", with("power_w: 100.0", "power_w: NaN"), "transmitter.power_w"),
        ("infinite", with("power_w: 100.0", "power_w: inf"), "transmitter.power_w"),
        ("a million bands", with("bands: [", &format!("bands: [{}", band.repeat(30_000))), "bands"),
        ("far too large", with("bands: [", &format!("bands: [{}", band.repeat(1_000_000))), "MB"),
        ("a feed beyond the wire", with("fraction: 0.5", "fraction: 1.5"), "feedpoint.fraction"),
        ("no such wire", with("feedpoint: (wire: 0", "feedpoint: (wire: 7"), "feedpoint.wire"),
    ]
}

#[test]
fn bad_plans_give_one_sentence_and_status_2() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("bad.ron");
    let pdf = folder.path().join("bad.pdf");
    for (name, text, words) in bad_plans() {
        fs::write(&path, text).unwrap();
        let report = wirewright(&["report", path_text(&path)]);
        assert_eq!(report.status.code(), Some(2), "{name}");
        assert!(report.stdout.is_empty(), "{name}");
        let said = sentence(&report);
        assert!(
            said.contains("bad.ron") && said.contains(words) && said.contains("accepted"),
            "{name}: {said}"
        );
        assert!(said.len() < 600, "{name}: {said}");

        let sheet = wirewright(&["sheet", path_text(&path), "--out", path_text(&pdf)]);
        assert_eq!((sheet.status.code(), sentence(&sheet)), (Some(2), said), "{name}");
        assert!(!pdf.exists(), "{name}");
    }
    let missing = wirewright(&["report", path_text(&folder.path().join("nowhere.ron"))]);
    assert_eq!(missing.status.code(), Some(2));
    assert!(sentence(&missing).contains("cannot be read"));
}

#[test]
fn the_sheet_is_a_pdf_and_the_same_each_time() {
    let folder = tempfile::tempdir().unwrap();
    for (name, paper, units) in [(DEMOS[0], "a4", "m"), (DEMOS[1], "letter", "ft")] {
        let pdfs = ["one.pdf", "two.pdf"].map(|pdf| {
            let pdf = folder.path().join(pdf);
            let path = demo(name);
            let arguments = [
                "sheet",
                path_text(&path),
                "--out",
                path_text(&pdf),
                "--date",
                "2026-12-01",
                "--paper",
                paper,
            ];
            let output = wirewright(&[&arguments[..], &["--units", units]].concat());
            assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
            fs::read(pdf).unwrap()
        });
        assert!(pdfs[0].starts_with(b"%PDF-") && pdfs[0].len() > 5_000);
        assert!(pdfs[0] == pdfs[1], "{name}: two runs, two files");
    }
}

#[test]
fn a_sheet_without_a_date_takes_todays() {
    let folder = tempfile::tempdir().unwrap();
    let pdf = folder.path().join("today.pdf");
    let output = wirewright(&["sheet", path_text(&demo(DEMOS[0])), "--out", path_text(&pdf)]);
    assert!(output.status.success() && pdf.exists());
    let wrong = wirewright(&["sheet", path_text(&demo(DEMOS[0])), "--out", "x.pdf", "--date", "2026-02-30"]);
    assert_eq!(wrong.status.code(), Some(2));
    assert!(String::from_utf8_lossy(&wrong.stderr).contains("2026-02-30"));
}

#[test]
fn a_sheet_that_cannot_be_written_says_where() {
    let output = wirewright(&[
        "sheet",
        path_text(&demo(DEMOS[0])),
        "--out",
        "/nowhere/at/all.pdf",
        "--date",
        "2026-12-01",
    ]);
    assert_eq!(output.status.code(), Some(1));
    assert!(sentence(&output).contains("/nowhere/at/all.pdf"));
}

#[cfg(target_os = "linux")]
#[test]
fn without_a_display_it_says_so_and_names_the_other_ways() {
    for arguments in [&[][..], &[path_text(&demo(DEMOS[0]))]] {
        let output = wirewright(arguments);
        assert_eq!(output.status.code(), Some(1));
        let said = sentence(&output);
        for words in ["display", "wirewright report", "wirewright sheet"] {
            assert!(said.contains(words), "{said}");
        }
    }
    let output = Command::new(env!("CARGO_BIN_EXE_wirewright"))
        .env("DISPLAY", ":7654")
        .env_remove("WAYLAND_DISPLAY")
        .output()
        .unwrap();
    assert_eq!(output.status.code(), Some(1));
    assert!(sentence(&output).contains(":7654"));
}
