//! The earth as a choice: by what one sees, and drier or wetter at one click.

use eframe::egui::{ComboBox, Response, Ui};
use station::catalogue;
use station::plan::{Earth, Soil};

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

/// Name of an earth, and what it is.
fn words(earth: &Earth) -> (String, String) {
    match earth {
        Earth::NoEarth => ("No earth".to_owned(), "Free space, for comparison".to_owned()),
        Earth::Mirror => ("Mirror".to_owned(), "Perfect ground, for comparison".to_owned()),
        Earth::Own(soil) => ("own figures".to_owned(), soil_sentence(*soil)),
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
