//! A text while it is typed: the plan gets it when the field is left, so that a half-typed name is no error.

use eframe::egui::{Id, Response, TextEdit, Ui};

use crate::explain::Explain as _;

/// The one text that is being typed.
#[derive(Default)]
pub(super) struct Typed(Option<(Id, String)>);

/// A text of the plan in its field.
pub(super) struct TextField<'a> {
    /// Its name: of the label beside it where there is one.
    pub name: &'a str,
    /// The label beside it.
    pub label: Option<Id>,
    /// What it is, in one sentence.
    pub sentence: &'a str,
    /// As the plan has it.
    pub text: &'a str,
    /// How wide; infinite for what there is.
    pub width: f32,
    /// More than one line.
    pub rows: usize,
}

impl Typed {
    /// Shows the field; the new text once it is left with a change.
    pub fn show(&mut self, ui: &mut Ui, field: &TextField<'_>) -> (Response, Option<String>) {
        let id = ui.make_persistent_id(("typed", field.name));
        let mut text = match &self.0 {
            Some((of, typed)) if *of == id => typed.clone(),
            _ => field.text.to_owned(),
        };
        let edit = if field.rows > 1 {
            TextEdit::multiline(&mut text).desired_rows(field.rows)
        } else {
            TextEdit::singleline(&mut text)
        };
        let response = ui.add(edit.id(id).desired_width(field.width));
        let response = match field.label {
            Some(label) => response.labelled_by(label),
            None => response.accessible_name(field.name),
        };
        if response.changed() {
            self.0 = Some((id, text.clone()));
        }
        let mut left_with = None;
        if response.lost_focus() && self.0.take_if(|(of, _)| *of == id).is_some() {
            let text = text.trim();
            left_with = (text != field.text).then(|| text.to_owned());
        }
        (response.explain(field.sentence), left_with)
    }
}
