//! Every asset is read and every figure is looked at for sanity.

use std::collections::HashSet;

use super::*;
use crate::plan::LineConstruction;

/// Says which entry is meant where an assertion fails.
fn well_formed(kind: Kind, ids: impl Iterator<Item = (&'static str, [&'static str; 3])>) -> usize {
    let mut seen = HashSet::new();
    for (id, [name, hint, source]) in ids {
        assert!(seen.insert(id), "{kind} {id} stands twice");
        assert!(!id.is_empty() && id.len() <= 48, "{kind} {id}");
        let kebab = id.split('-').all(|word| {
            !word.is_empty() && word.bytes().all(|b| b.is_ascii_lowercase() || b.is_ascii_digit())
        });
        assert!(kebab, "{kind} {id} is not in kebab case");
        for text in [name, hint, source] {
            assert!(!text.trim().is_empty() && !text.contains('\n'), "{kind} {id}: {text:?}");
        }
        assert!(hint.chars().count() <= 90, "{kind} {id}: its hint is no one-liner");
    }
    seen.len()
}

fn within(what: &str, value: f64, low: f64, high: f64) {
    assert!((low..=high).contains(&value), "{what}: {value} is not within {low} and {high}");
}

#[test]
fn feed_lines_are_sane() {
    let count =
        well_formed(Kind::Line, lines().iter().map(|e| (&*e.id, [&*e.data.name, &*e.hint, &*e.data.source])));
    assert!(count >= 25, "{count} feed lines");
    for entry in lines() {
        let LineEntry { id, data, .. } = entry;
        match data.construction {
            LineConstruction::Published { z0_ohm, velocity_factor, loss } => {
                within(id, z0_ohm, 25.0, 700.0);
                within(id, velocity_factor, 0.6, 1.0);
                within(id, loss.k1_db_per_100m, 0.01, 10.0);
                within(id, loss.k2_db_per_100m, 0.0, 0.2);
            }
            LineConstruction::TwoWire {
                wire_diameter_m, spacing_m, velocity_factor, loss_tangent, ..
            } => {
                within(id, wire_diameter_m, 0.5e-3, 5e-3);
                within(id, spacing_m / wire_diameter_m, 2.0, 300.0);
                within(id, velocity_factor, 0.9, 1.0);
                within(id, loss_tangent, 0.0, 1e-3);
            }
            LineConstruction::Coaxial {
                inner_diameter_m, outer_diameter_m, relative_permittivity, ..
            } => {
                within(id, outer_diameter_m / inner_diameter_m, 1.5, 10.0);
                within(id, relative_permittivity, 1.0, 2.4);
            }
        }
        within(id, data.rating_peak_v.expect("every line of the catalogue has one"), 100.0, 12_000.0);
        let rating = data.rating_average.expect("every line of the catalogue has one");
        within(id, rating.watts, 50.0, 20_000.0);
        // what warms a metre at the rating: a few watts for thin cable, tens for thick or PTFE
        let loss = line_at(data, rating.frequency_hz).unwrap().matched_loss_db_per_m();
        within(id, rating.watts * loss / 4.343, 1.5, 60.0);
        assert_eq!(data.wet.is_some(), entry.sources.wet.is_some(), "{id}");
        let balanced = !id.starts_with("coax");
        assert_eq!(data.wet.is_some(), balanced, "{id}: rain is for lines without a screen");
        let LineSources { impedance, velocity, loss, volts, watts, wet } = &entry.sources;
        for source in [impedance, velocity, loss, volts, watts].into_iter().chain(wet) {
            assert!(KINDS_OF_SOURCE.iter().any(|kind| source.contains(kind)), "{id}: {source:?}");
        }
    }
}

/// One of these stands in every source of a figure.
const KINDS_OF_SOURCE: [&str; 6] =
    ["from memory", "derived from geometry", "common practice", "quoted second-hand", "read", "measured"];

#[test]
fn rain_slows_a_line_and_costs_and_average_power_falls_with_loss() {
    for LineEntry { id, data, .. } in lines() {
        for f in [1.9e6, 7.1e6, 28.5e6] {
            let (dry, wet) = (line_at(data, f).unwrap(), wet_line_at(data, f).unwrap());
            if data.wet.is_some() {
                let ratio = wet.matched_loss_db_per_m() / dry.matched_loss_db_per_m();
                within(id, ratio, 1.02, 6.0);
                assert!(wet.gamma_per_m.im > dry.gamma_per_m.im && wet.z0_ohm.re < dry.z0_ohm.re, "{id}");
            } else {
                assert_eq!(dry, wet);
            }
        }
        let watts = |f| rated_average_w(data, f).unwrap().unwrap();
        within(
            id,
            watts(30e6),
            0.999 * data.rating_average.unwrap().watts,
            1.001 * data.rating_average.unwrap().watts,
        );
        // the square root of the frequency for metal, the frequency itself for a dielectric
        within(id, watts(7.5e6) / watts(30e6), 1.9, 4.0);
    }
}

#[test]
fn open_wires_watts_are_what_warms_them_by_40_k() {
    for LineEntry { id, data, .. } in lines() {
        let LineConstruction::TwoWire { wire_diameter_m, .. } = data.construction else { continue };
        let loss = line_at(data, 30e6).unwrap().gamma_per_m.re * 2.0;
        let heat = 2.0 * 15.0 * 40.0 * std::f64::consts::PI * wire_diameter_m;
        within(id, data.rating_average.unwrap().watts * loss / heat, 0.94, 1.06);
    }
}

#[test]
fn insulators_are_sane() {
    use physics::insulator::Surface;
    let count = well_formed(
        Kind::Insulator,
        insulators().iter().map(|e| (&*e.id, [&*e.name, &*e.hint, &*e.sources.dry])),
    );
    assert!(count >= 12, "{count} insulators");
    for entry in insulators() {
        let InsulatorSources { dry, wet, working } = &entry.sources;
        for source in [dry, wet, working] {
            assert!(KINDS_OF_SOURCE.iter().any(|kind| source.contains(kind)), "{}: {source:?}", entry.id);
        }
        let volts = |surface, altitude_m| entry.insulator().working_peak_v(surface, altitude_m).unwrap();
        within(&entry.id, entry.dry_flashover_peak_v, 10e3, 600e3);
        within(&entry.id, volts(Surface::Dry, 0.0), 3e3, 60e3);
        assert!(volts(Surface::Wet, 2000.0) < volts(Surface::Wet, 0.0));
        assert!(volts(Surface::Wet, 0.0) < 0.6 * volts(Surface::Dry, 0.0), "{}", entry.id);
    }
    assert!(insulator_entry("egg-54-5").is_err());
}

#[test]
fn conductors_are_sane() {
    let count = well_formed(
        Kind::Conductor,
        conductors().iter().map(|e| (&*e.id, [&*e.data.name, &*e.hint, &*e.data.source])),
    );
    assert!(count >= 15, "{count} conductors");
    for ConductorEntry { id, data, .. } in conductors() {
        within(id, data.diameter_m, 0.5e-3, 5e-3);
        within(id, data.conductivity_s_per_m, 1e6, 58e6);
        within(id, data.stranding_factor, 1.0, 3.0);
        if let Some(insulation) = data.insulation {
            within(id, insulation.outer_diameter_m / data.diameter_m, 1.05, 4.0);
            within(id, insulation.relative_permittivity, 1.3, 5.0);
        }
    }
}

#[test]
fn soils_are_sane() {
    let count = well_formed(Kind::Soil, soils().iter().map(|e| (&*e.id, [&*e.name, &*e.hint, &*e.source])));
    assert!(count >= 12, "{count} soils");
    for SoilEntry { id, soil, .. } in soils() {
        within(id, soil.relative_permittivity, 2.5, 81.0);
        within(id, soil.conductivity_s_per_m, 1e-5, 5.0);
    }
}

#[test]
fn bands_ascend_and_do_not_overlap_within_a_service_and_region() {
    let count =
        well_formed(Kind::Band, bands().iter().map(|e| (&*e.id, [&*e.band.name, &*e.hint, &*e.source])));
    assert!(count >= 60, "{count} bands");
    let services = [
        Service::Amateur,
        Service::Maritime,
        Service::AeronauticalRoute,
        Service::AeronauticalOffRoute,
        Service::Broadcasting,
        Service::StandardFrequency,
    ];
    let mut reached = HashSet::new();
    for service in services {
        for region in [Region::One, Region::Two, Region::Three] {
            let mut last_hz = 0.0;
            for entry in bands_of(service, region) {
                let (low_hz, high_hz) = entry.band.range.edges_hz();
                within(&entry.id, low_hz, 1.8e6, 54e6);
                within(&entry.id, high_hz, 1.8e6, 54e6);
                assert!(low_hz < high_hz, "{}", entry.id);
                assert!(low_hz >= last_hz, "{} begins before the band below it ends", entry.id);
                last_hz = high_hz;
                reached.insert(&*entry.id);
            }
            assert!(last_hz > 0.0, "{service:?} has nothing in {region:?}");
        }
    }
    assert_eq!(reached.len(), count, "a band without a Region or a listed service");
}

#[test]
fn every_amateur_band_is_there_in_every_region() {
    for region in [Region::One, Region::Two, Region::Three] {
        let names: Vec<&str> =
            bands_of(Service::Amateur, region).map(|entry| entry.band.name.as_str()).collect();
        let all = ["160 m", "80 m", "60 m", "40 m", "30 m", "20 m", "17 m", "15 m", "12 m", "10 m", "6 m"];
        assert_eq!(names, all, "{region:?}");
    }
}

#[test]
fn an_unknown_id_names_the_closest() {
    let error = line_entry("coax-rg213").unwrap_err();
    let CatalogueError::Unknown { closest, .. } = &error;
    assert_eq!(closest.first().map(String::as_str), Some("coax-rg-213"));
    assert!(error.to_string().starts_with("the catalogue has no feed line \"coax-rg213\"; the closest are "));
    let error = soil(&"dry sand".repeat(100_000)).unwrap_err();
    assert!(error.to_string().len() < 200, "{error}");
    assert!(conductor_entry("").is_err());
    assert!(band_entry("amateur-40m").is_ok());
}

#[test]
fn choices_resolve() {
    let id = LineChoice::Catalogue("open-wire-600".to_owned());
    assert_eq!(line(&id), Ok(&line_entry("open-wire-600").unwrap().data));
    let own = LineChoice::Own(line_entry("coax-rg-58").unwrap().data.clone());
    assert_eq!(line(&own).unwrap().name, "RG-58 coax");
    assert_eq!(earth(&Earth::Mirror), Ok(None));
    assert_eq!(earth(&Earth::Catalogue("farmland".to_owned())), Ok(Some(soil("farmland").unwrap())));
    let id = ConductorChoice::Catalogue("copper-2mm".to_owned());
    assert_eq!(conductor(&id).unwrap().name, "Copper 2 mm");
}
