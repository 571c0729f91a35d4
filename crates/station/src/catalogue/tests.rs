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
    assert!(count >= 15, "{count} feed lines");
    for LineEntry { id, data, .. } in lines() {
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
        match data.rating_peak_v {
            Some(peak_v) => {
                within(id, peak_v, 100.0, 12_000.0);
                assert!(data.source.contains("r.m.s."), "{id}: where does its voltage come from?");
            }
            None => assert!(data.source.contains("no voltage rating known"), "{id}"),
        }
    }
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
