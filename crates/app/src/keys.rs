//! Every command that has a key: one table for the keyboard, the list of commands and the menus.

use eframe::egui::{self, Key, KeyboardShortcut, Modifiers};

use crate::command::{Command, Desk, Show, View};
use crate::looks::Looks;

const PLAIN: Modifiers = Modifiers::NONE;
const CTRL: Modifiers = Modifiers::COMMAND;
const CTRL_SHIFT: Modifiers = Modifiers::COMMAND.plus(Modifiers::SHIFT);

/// When a key is heard.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Heard {
    /// Also while a number or a name is typed.
    Always,
    /// Only while nothing is typed: text fields need the key themselves.
    WhenNotTyping,
    /// Only while nothing at all has the keyboard.
    WhenNothingHasFocus,
}

/// A key and what it does.
pub struct Entry {
    keys: KeyboardShortcut,
    heard: Heard,
    words: &'static str,
    command: fn(&Looks) -> Command,
}

fn entry(
    (modifiers, key): (Modifiers, Key),
    heard: Heard,
    words: &'static str,
    command: fn(&Looks) -> Command,
) -> Entry {
    Entry { keys: KeyboardShortcut::new(modifiers, key), heard, words, command }
}

/// All of them, in the order of the list.
#[must_use]
pub fn table() -> [Entry; 17] {
    use Heard::{Always, WhenNotTyping, WhenNothingHasFocus};
    [
        entry((CTRL, Key::N), Always, "New plan", |_| Command::Desk(Desk::NewPlan)),
        entry((CTRL, Key::O), Always, "Open a plan", |_| Command::Desk(Desk::Open)),
        entry((CTRL, Key::S), Always, "Save the plan", |_| Command::Desk(Desk::Save)),
        entry((CTRL_SHIFT, Key::S), Always, "Save the plan under another name", |_| {
            Command::Desk(Desk::SaveAs)
        }),
        entry((CTRL, Key::P), Always, "Save the sheet", |_| Command::Desk(Desk::SaveSheet)),
        entry((CTRL, Key::Z), WhenNotTyping, "Undo the last step", |_| Command::Undo),
        entry((CTRL_SHIFT, Key::Z), WhenNotTyping, "Redo the step that was undone", |_| Command::Redo),
        entry((CTRL, Key::Y), WhenNotTyping, "Redo the step that was undone", |_| Command::Redo),
        entry((CTRL, Key::Q), Always, "Quit", |_| Command::Desk(Desk::Quit)),
        entry((CTRL, Key::Num1), Always, "Look at the yard", |_| Command::Show(Show::View(View::Yard))),
        entry((CTRL, Key::Num2), Always, "Look at one band", |_| Command::Show(Show::View(View::Band))),
        entry((CTRL, Key::Num3), Always, "Look at the sheet", |_| Command::Show(Show::View(View::Sheet))),
        entry((CTRL, Key::Num4), Always, "Look at the station", |_| Command::Show(Show::View(View::Station))),
        entry((PLAIN, Key::ArrowUp), WhenNothingHasFocus, "Choose the band before", |looks| {
            Command::Show(Show::Band(looks.band.saturating_sub(1)))
        }),
        entry((PLAIN, Key::ArrowDown), WhenNothingHasFocus, "Choose the next band", |looks| {
            Command::Show(Show::Band(looks.band + 1))
        }),
        entry((PLAIN, Key::M), WhenNotTyping, "Metres or feet", |looks| {
            Command::Show(Show::Units(looks.other_units()))
        }),
        entry((PLAIN, Key::F1), Always, "This list", |_| Command::Desk(Desk::Help)),
    ]
}

/// The commands of the keys that were pressed and that no view has taken.
pub fn pressed(ctx: &egui::Context, looks: &Looks) -> Vec<Command> {
    let typing = ctx.text_edit_focused();
    let focused = ctx.memory(|memory| memory.focused().is_some());
    let mut table = table();
    // Those with Shift first: the same key without it would answer to them, too.
    table.sort_by_key(|entry| !entry.keys.modifiers.shift);
    table
        .into_iter()
        .filter(|entry| match entry.heard {
            Heard::Always => true,
            Heard::WhenNotTyping => !typing,
            Heard::WhenNothingHasFocus => !focused,
        })
        .filter(|entry| ctx.input_mut(|input| input.consume_shortcut(&entry.keys)))
        .map(|entry| (entry.command)(looks))
        .collect()
}

/// The keys of a command, for menus: "Ctrl+S".
#[must_use]
pub fn of(ctx: &egui::Context, command: &Command, looks: &Looks) -> String {
    table()
        .iter()
        .find(|entry| (entry.command)(looks) == *command)
        .map(|entry| ctx.format_shortcut(&entry.keys))
        .unwrap_or_default()
}

/// The list of commands by key.
pub(crate) fn show(ui: &mut egui::Ui) {
    ui.heading("Commands by key");
    ui.add_space(4.0);
    egui::Grid::new("commands by key").num_columns(2).spacing([24.0, 4.0]).show(ui, |ui| {
        for entry in table() {
            ui.monospace(ui.ctx().format_shortcut(&entry.keys));
            ui.label(entry.words);
            ui.end_row();
        }
        for (keys, words) in [
            ("Tab", "Go to the next control; Shift+Tab goes back"),
            ("Space, Enter", "Press the control that has the keyboard"),
            ("Escape", "Close a dialog or leave a field"),
        ] {
            ui.monospace(keys);
            ui.label(words);
            ui.end_row();
        }
    });
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_key_stands_twice() {
        let table = table();
        for (index, entry) in table.iter().enumerate() {
            assert!(table[..index].iter().all(|other| other.keys != entry.keys), "{}", entry.words);
        }
    }
}
