//! The house keeps its direction: physics knows none of ours, station uses physics, sheet uses station, app uses sheet
//! and station. Each crate's manifest is read; an edge that is not listed here fails.

use std::collections::BTreeSet;
use std::path::{Path, PathBuf};

const OURS: [&str; 6] = ["physics", "station", "sheet", "app", "raster", "checks"];

/// What each crate may use of ours.
const ALLOWED: [(&str, &[&str]); 5] = [
    ("physics", &[]),
    ("station", &["physics"]),
    ("sheet", &["station"]),
    // Draws egui's triangles for picture tests; knows nothing of ours and is used by tests only.
    ("raster", &[]),
    ("app", &["sheet", "station", "raster"]),
];

/// What physics may use at all: numbers, nothing that knows files, threads, clocks, screens or formats.
const PURE: [&str; 6] = ["complex-bessel", "nalgebra", "num-complex", "pulp", "spec_math", "thiserror"];

fn root() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).parent().expect("tests/ lies in the workspace").to_owned()
}

fn dependencies(manifest: &str, name: &str, tables: &[&str]) -> BTreeSet<String> {
    let table: toml::Table = manifest.parse().unwrap_or_else(|error| panic!("{name}: {error}"));
    tables
        .iter()
        .filter_map(|key| table.get(*key).and_then(toml::Value::as_table))
        .flat_map(|dependencies| dependencies.keys().cloned())
        .collect()
}

fn manifest(name: &str) -> String {
    let path = root().join("crates").join(name).join("Cargo.toml");
    std::fs::read_to_string(&path).unwrap_or_else(|error| panic!("{}: {error}", path.display()))
}

#[test]
fn each_crate_uses_only_what_lies_below_it() {
    for (name, allowed) in ALLOWED {
        let used =
            dependencies(&manifest(name), name, &["dependencies", "dev-dependencies", "build-dependencies"]);
        for ours in used.iter().filter(|d| OURS.contains(&d.as_str())) {
            assert!(allowed.contains(&ours.as_str()), "{name} must not use {ours}");
        }
    }
}

#[test]
fn physics_is_pure() {
    let used = dependencies(&manifest("physics"), "physics", &["dependencies", "build-dependencies"]);
    for name in &used {
        assert!(PURE.contains(&name.as_str()), "physics must not use {name}");
    }
    // Files, clock, threads and output are in the standard library, so the sources are read for them.
    let forbidden = ["std::fs", "std::thread", "std::time", "std::env", "std::net", "println!", "eprintln!"];
    for path in sources(&root().join("crates/physics/src")) {
        let text = std::fs::read_to_string(&path).expect("a source file is text");
        for word in forbidden {
            assert!(!text.contains(word), "{} uses {word}", path.display());
        }
    }
}

/// Every dependency of a member is `workspace = true`: versions stand once.
#[test]
fn versions_stand_once() {
    for name in OURS {
        let text = if name == "checks" {
            std::fs::read_to_string(root().join("tests/Cargo.toml")).expect("checks has a manifest")
        } else {
            manifest(name)
        };
        let table: toml::Table = text.parse().expect("a manifest is TOML");
        for key in ["dependencies", "dev-dependencies", "build-dependencies"] {
            let Some(dependencies) = table.get(key).and_then(toml::Value::as_table) else { continue };
            for (dependency, value) in dependencies {
                let shared = value.get("workspace").and_then(toml::Value::as_bool) == Some(true);
                assert!(shared, "{name}: {dependency} must take its version from the workspace");
            }
        }
    }
}

fn sources(folder: &Path) -> Vec<PathBuf> {
    let mut found = Vec::new();
    for entry in std::fs::read_dir(folder).expect("the folder is there") {
        let path = entry.expect("the folder can be read").path();
        if path.is_dir() {
            found.extend(sources(&path));
        } else if path.extension().is_some_and(|e| e == "rs") {
            found.push(path);
        }
    }
    assert!(!found.is_empty());
    found
}
