//! The earth as a choice: by what one sees, and drier or wetter at one click.

use eframe::egui::{ComboBox, Response, Ui};
use station::catalogue;
use station::plan::{Earth, Soil};

use super::fields::{Quantity, quantity};
use crate::command::{Command, Edit};
use crate::explain::Explain;

/// Height of the pick list, px.
const PICK_LIST: f32 = 360.0;

/// A pick list of all earths; `salt` tells one list from another.
pub fn picker(ui: &mut Ui, salt: &str, chosen: &Earth, out: &mut Vec<Command>) -> Response {
    let ideal = [
        (Earth::NoEarth, "No earth", "Free space, for comparison"),
        (Earth::Mirror, "Mirror", "Perfect ground, for comparison"),
    ];
    let (name, sentence) = words(chosen);
    let picker = ComboBox::from_id_salt(salt).selected_text(name).height(PICK_LIST).show_ui(ui, |ui| {
        for (earth, name, hint) in ideal {
            if ui.selectable_label(*chosen == earth, name).explain(hint).clicked() && *chosen != earth {
                out.push(Command::Edit(Edit::Earth(earth)));
            }
        }
        let own = matches!(chosen, Earth::Own(_));
        let hint = "Relative permittivity and conductivity as measured; typed in the Station view";
        if ui.selectable_label(own, OWN).explain(hint).clicked() && !own {
            out.push(Command::Edit(Edit::Earth(Earth::Own(figures(chosen)))));
            out.push(Command::EndOfDrag);
        }
        ui.separator();
        for entry in catalogue::soils() {
            let earth = Earth::Catalogue(entry.id.clone());
            let sentence = format!("{}: {}", entry.hint, soil_sentence(entry.soil));
            if ui.selectable_label(*chosen == earth, &entry.name).explain(sentence).clicked()
                && *chosen != earth
            {
                out.push(Command::Edit(Edit::Earth(earth)));
            }
        }
    });
    picker.response.explain(sentence)
}

/// What the user's own soil is called.
const OWN: &str = "own figures";
/// Where own figures begin that follow no soil: those of the usual "average ground" (common practice).
const AVERAGE: Soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };

/// Figures of an earth, for the user's own to begin with.
fn figures(earth: &Earth) -> Soil {
    catalogue::earth(earth).ok().flatten().unwrap_or(AVERAGE)
}

/// Fields of the user's own figures, where they are chosen.
pub fn own_figures(ui: &mut Ui, chosen: &Earth, out: &mut Vec<Command>) {
    let Earth::Own(soil) = *chosen else { return };
    let permittivity = Quantity {
        label: "relative permittivity",
        sentence: "Of the soil at HF: 3 in a desert, 13 on farmland, 80 on water.",
        value: soil.relative_permittivity,
        unit: 1.0,
        suffix: "",
        range: 1.0..=100.0,
        speed: 0.1,
        decimals: 1,
    };
    if let Some(relative_permittivity) = quantity(ui, &permittivity, out) {
        out.push(Command::Edit(Edit::Earth(Earth::Own(Soil { relative_permittivity, ..soil }))));
    }
    let conductivity = Quantity {
        label: "conductivity",
        sentence: "Of the soil at HF: 0.1 in a desert, 5 on farmland, 5000 on the sea.",
        value: soil.conductivity_s_per_m,
        unit: 1e-3,
        suffix: " mS/m",
        range: 0.0..=10_000.0,
        speed: 0.1,
        decimals: 3,
    };
    if let Some(conductivity_s_per_m) = quantity(ui, &conductivity, out) {
        out.push(Command::Edit(Edit::Earth(Earth::Own(Soil { conductivity_s_per_m, ..soil }))));
    }
}

/// Name of an earth, and what it is.
fn words(earth: &Earth) -> (String, String) {
    match earth {
        Earth::NoEarth => ("No earth".to_owned(), "Free space, for comparison".to_owned()),
        Earth::Mirror => ("Mirror".to_owned(), "Perfect ground, for comparison".to_owned()),
        Earth::Own(soil) => (OWN.to_owned(), soil_sentence(*soil)),
        Earth::Catalogue(id) => match catalogue::soil_entry(id) {
            Ok(entry) => (entry.name.clone(), format!("{}: {}", entry.hint, soil_sentence(entry.soil))),
            Err(error) => (id.clone(), error.to_string()),
        },
    }
}

fn soil_sentence(soil: Soil) -> String {
    let conductivity = station::units::short(soil.conductivity_s_per_m * 1e3);
    format!(
        "relative permittivity {}, {conductivity} mS/m",
        station::units::short(soil.relative_permittivity)
    )
}

/// The next soil of the catalogue, which goes from the sea to ice: drier for +1, wetter for −1.
#[must_use]
pub fn neighbour(earth: &Earth, step: isize) -> Option<Earth> {
    let Earth::Catalogue(id) = earth else { return None };
    let soils = catalogue::soils();
    let at = soils.iter().position(|entry| entry.id == *id)?;
    let next = soils.get(at.checked_add_signed(step)?)?;
    Some(Earth::Catalogue(next.id.clone()))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn drier_and_wetter_go_through_all_soils_and_end() {
        let mut earth = Earth::Catalogue("sea".to_owned());
        assert_eq!(neighbour(&earth, -1), None);
        let mut steps = 0;
        while let Some(next) = neighbour(&earth, 1) {
            assert_eq!(neighbour(&next, -1), Some(earth));
            earth = next;
            steps += 1;
        }
        assert_eq!(steps + 1, catalogue::soils().len());
        assert_eq!(neighbour(&Earth::Mirror, 1), None);
    }
}
