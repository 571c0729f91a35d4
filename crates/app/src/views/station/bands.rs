//! The bands and channels that must work, with the catalogue to add from.

use eframe::egui::{self, ComboBox, RichText, Ui};
use station::catalogue::{self, Region, Service};
use station::plan::{Band, BandRange};
use station::units;

use super::StationState;
use super::typed::TextField;
use crate::command::{Command, Edit, Show};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::views::fields::button;

const NAME_WIDTH: f32 = 110.0;
const EDGE_WIDTH: f32 = 70.0;

/// What the catalogue offers now.
pub(super) struct Offer {
    service: Service,
    region: Region,
}

impl Default for Offer {
    fn default() -> Self {
        Self { service: Service::Amateur, region: Region::One }
    }
}

/// The list, and what can be added to it.
pub(super) fn show(ui: &mut Ui, snapshot: &Snapshot<'_>, state: &mut StationState, out: &mut Vec<Command>) {
    let planned = &snapshot.plan.bands;
    let mut bands = planned.clone();
    let mut change = None;
    for (index, band) in planned.iter().enumerate() {
        ui.push_id(("band", index), |ui| {
            ui.horizontal(|ui| row(ui, (index, band), planned.len(), state, &mut change));
        });
    }
    match change {
        Some(Change::Set(index, band)) => bands[index] = band,
        Some(Change::Remove(index)) => _ = bands.remove(index),
        Some(Change::Swap(index)) => bands.swap(index, index + 1),
        None => {}
    }
    ui.add_space(6.0);
    ui.horizontal(|ui| {
        if button(ui, true, "Add a range", "A range of your own between two frequencies") {
            let range = BandRange::Span { low_hz: 7e6, high_hz: 7.1e6 };
            bands.push(Band { name: free_name(&bands, "range"), range });
        }
        if button(ui, true, "Add channels", "A list of frequencies of your own") {
            let range = BandRange::Channels { frequencies_hz: vec![5e6] };
            bands.push(Band { name: free_name(&bands, "channels"), range });
        }
    });
    ui.separator();
    offer(ui, state, &mut bands);
    if bands != *planned {
        out.push(Command::Edit(Edit::Bands(bands)));
        out.push(Command::EndOfDrag);
        out.push(Command::Show(Show::Band(snapshot.band)));
    }
}

enum Change {
    Set(usize, Band),
    Remove(usize),
    /// With the one below.
    Swap(usize),
}

fn row(
    ui: &mut Ui,
    (index, band): (usize, &Band),
    count: usize,
    state: &mut StationState,
    change: &mut Option<Change>,
) {
    let number = index + 1;
    let mut text = |ui: &mut Ui, name: String, sentence: &str, text: &str, width: f32| {
        state.typed.show(ui, &TextField { name: &name, label: None, sentence, text, width, rows: 1 }).1
    };
    let sentence = "What lanes and sheet call this band.";
    if let Some(name) = text(ui, format!("name of band {number}"), sentence, &band.name, NAME_WIDTH) {
        *change = Some(Change::Set(index, Band { name, ..band.clone() }));
    }
    let range = match &band.range {
        BandRange::Span { low_hz, high_hz } => {
            let mut edge = |ui: &mut Ui, which: &str, hz: f64| {
                let name = format!("{which} edge of band {number}, kHz");
                text(ui, name, "An edge of the range, kHz.", &kilohertz(hz), EDGE_WIDTH)
                    .and_then(|typed| frequencies(&typed)?.first().copied())
            };
            let low = edge(ui, "lower", *low_hz);
            ui.label("to");
            let high = edge(ui, "upper", *high_hz);
            ui.label("kHz");
            (low.is_some() || high.is_some()).then(|| BandRange::Span {
                low_hz: low.unwrap_or(*low_hz),
                high_hz: high.unwrap_or(*high_hz),
            })
        }
        BandRange::Channels { frequencies_hz } => {
            let list: Vec<String> = frequencies_hz.iter().map(|&hz| kilohertz(hz)).collect();
            let sentence = "Carrier frequencies in kHz, with commas between them.";
            let name = format!("channels of band {number}, kHz");
            let typed = text(ui, name, sentence, &list.join(", "), 2.0 * EDGE_WIDTH + 30.0);
            ui.label("kHz");
            typed
                .and_then(|typed| frequencies(&typed))
                .map(|frequencies_hz| BandRange::Channels { frequencies_hz })
        }
    };
    if let Some(range) = range {
        *change = Some(Change::Set(index, Band { range, ..band.clone() }));
    }
    let sign = |ui: &mut Ui, enabled: bool, sign: &str, what: &str, sentence: &str| {
        let response = ui.add_enabled(enabled, egui::Button::new(sign).min_size([24.0, 0.0].into()));
        response.accessible_name(format!("{what} {}", band.name)).explain(sentence).clicked()
    };
    if sign(ui, index > 0, "↑", "move up", "One place up in the list and the lanes") {
        *change = Some(Change::Swap(index - 1));
    }
    if sign(ui, index + 1 < count, "↓", "move down", "One place down in the list and the lanes") {
        *change = Some(Change::Swap(index));
    }
    if sign(ui, count > 1, "×", "remove", "Takes this band off the list") {
        *change = Some(Change::Remove(index));
    }
}

/// What the catalogue has for a service and a Region.
fn offer(ui: &mut Ui, state: &mut StationState, bands: &mut Vec<Band>) {
    ui.label(RichText::new("Add from the catalogue"));
    ui.horizontal(|ui| {
        let services = [
            Service::Amateur,
            Service::Maritime,
            Service::AeronauticalRoute,
            Service::AeronauticalOffRoute,
            Service::Broadcasting,
            Service::StandardFrequency,
        ];
        let chosen = &mut state.offer.service;
        let picker =
            ComboBox::from_id_salt("service").selected_text(service_words(*chosen)).show_ui(ui, |ui| {
                for service in services {
                    ui.selectable_value(chosen, service, service_words(service));
                }
            });
        picker
            .response
            .accessible_name("service")
            .explain("The radio service, as the Radio Regulations call it");
        for (region, words, sentence) in [
            (Region::One, "Region 1", "Europe, Africa, the Middle East, northern Asia"),
            (Region::Two, "Region 2", "The Americas"),
            (Region::Three, "Region 3", "Southern and eastern Asia, Oceania"),
        ] {
            if ui.selectable_label(state.offer.region == region, words).explain(sentence).clicked() {
                state.offer.region = region;
            }
        }
    });
    let entries: Vec<_> = catalogue::bands_of(state.offer.service, state.offer.region).collect();
    ui.horizontal_wrapped(|ui| {
        for entry in &entries {
            let has = bands.contains(&entry.band);
            let (low_hz, high_hz) = entry.band.range.edges_hz();
            let sentence = format!(
                "{} to {} MHz; {}. National rules decide.",
                units::fixed(low_hz / 1e6, 3),
                units::fixed(high_hz / 1e6, 3),
                entry.hint
            );
            let words = format!("+ {}", entry.band.name);
            if ui.add_enabled(!has, egui::Button::new(words)).explain(sentence).clicked() {
                let name = free_name(bands, &entry.band.name);
                bands.push(Band { name, ..entry.band.clone() });
            }
        }
    });
    if entries.is_empty() {
        ui.weak("Nothing in the catalogue for this service in this Region.");
    }
}

fn service_words(service: Service) -> &'static str {
    match service {
        Service::Amateur => "amateur",
        Service::Maritime => "maritime mobile",
        Service::AeronauticalRoute => "aeronautical mobile (R)",
        Service::AeronauticalOffRoute => "aeronautical mobile (OR)",
        Service::Broadcasting => "broadcasting",
        Service::StandardFrequency => "standard frequency",
    }
}

/// The name, or the name with the first number that is free.
fn free_name(bands: &[Band], name: &str) -> String {
    let is_free = |name: &String| bands.iter().all(|band| band.name != *name);
    std::iter::once(name.to_owned())
        .chain((2_u32..).map(|number| format!("{name} ({number})")))
        .find(is_free)
        .unwrap_or_default()
}

/// "7100", "5351.5": kHz without needless zeros.
fn kilohertz(frequency_hz: f64) -> String {
    let text = format!("{:.3}", frequency_hz / 1e3);
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}

/// Frequencies in kHz as typed, in Hz; `None` where one is not a number.
fn frequencies(text: &str) -> Option<Vec<f64>> {
    let list: Option<Vec<f64>> = text
        .split(|c: char| c == ',' || c == ';' || c.is_whitespace())
        .filter(|part| !part.is_empty())
        .map(|part| part.parse::<f64>().ok().filter(|khz| khz.is_finite()).map(|khz| khz * 1e3))
        .collect();
    list.filter(|list| !list.is_empty())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn frequencies_are_read_as_people_type_them() {
        assert_eq!(frequencies("4665, 6870.5"), Some(vec![4.665e6, 6.8705e6]));
        assert_eq!(frequencies("4665 ; 6870"), Some(vec![4.665e6, 6.87e6]));
        assert_eq!(frequencies("40 m"), None);
        assert_eq!(frequencies(" , "), None);
        assert_eq!(kilohertz(5_351_500.0), "5351.5");
        assert_eq!(kilohertz(7_000_000.0), "7000");
    }

    #[test]
    fn names_do_not_stand_twice() {
        let band = |name: &str| Band {
            name: name.to_owned(),
            range: BandRange::Span { low_hz: 7e6, high_hz: 7.1e6 },
        };
        assert_eq!(free_name(&[], "40 m"), "40 m");
        assert_eq!(free_name(&[band("40 m"), band("40 m (2)")], "40 m"), "40 m (3)");
    }
}
