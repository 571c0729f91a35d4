//! The sheet on its way out: files by their names, the printer, and what is said when there is none.

#![allow(clippy::unwrap_used)] // A failed step of a story is a failed story.

mod common;

use std::fs;
use std::path::Path;
use std::process::Command as Program;

use app::command::{Command, Show, View};
use app::desk::{Chosen, SpoolError};
use app::start;
use common::{FakeWays, Window};
use station::file;

fn on_the_sheet(mut window: Window) -> Window {
    window.command(Command::Show(Show::View(View::Sheet)));
    window
}

fn headless(plan: &Path, out: &Path) -> std::process::Output {
    let mut program = Program::new(env!("CARGO_BIN_EXE_wirewright"));
    program.arg("sheet").arg(plan).arg("--out").arg(out).output().unwrap()
}

#[test]
fn window_and_command_write_the_same_files_by_their_names() {
    let mut window = on_the_sheet(Window::open());
    let plan = window.file("plan.ron");
    file::save(&start::demo(), &plan).unwrap();
    for (kind, names, magic) in [
        ("pdf", &["pdf"][..], &b"%PDF-"[..]),
        ("svg", &["1.svg", "2.svg"], b"<svg"),
        ("PNG", &["1.PNG", "2.PNG"], b"\x89PNG\r\n"),
    ] {
        // Both take today's date: should midnight fall between them, the second try has it behind it.
        let same = (0..2).any(|_| {
            let by_hand = window.file(&format!("hand.{kind}"));
            window.will_choose(Chosen::Path(by_hand.clone()));
            window.click("Save sheet…");
            let said = window.wait_for_notice();
            assert!(said.starts_with("Sheet saved to") && window.has("Show it"), "{said}");
            window.click("Dismiss");
            let output = headless(&plan, &window.file(&format!("command.{kind}")));
            assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
            names.iter().all(|name| {
                let between = if names.len() > 1 { "-" } else { "." };
                let [hand, command] = ["hand", "command"]
                    .map(|stem| fs::read(window.file(&format!("{stem}{between}{name}"))).unwrap());
                let head = &hand[..200.min(hand.len())];
                assert!(head.windows(magic.len()).any(|part| part == magic), "{name}");
                hand == command
            })
        });
        assert!(same, "{kind}: two ways, two files");
    }
    for name in ["hand.svg", "hand-3.svg", "hand.PNG"] {
        assert!(!window.file(name).exists(), "{name}");
    }
}

#[test]
fn a_name_without_an_ending_is_that_of_a_pdf() {
    let mut window = on_the_sheet(Window::open());
    let bare = window.file("hut");
    window.will_choose(Chosen::Path(bare));
    window.click("Save sheet…");
    assert!(window.wait_for_notice().ends_with("hut.pdf"));
    assert!(fs::read(window.file("hut.pdf")).unwrap().starts_with(b"%PDF-"));
}

#[test]
fn other_endings_are_refused_with_what_is_accepted() {
    let mut window = on_the_sheet(Window::open());
    let path = window.file("sheet.docx");
    window.will_choose(Chosen::Path(path.clone()));
    window.click("Save sheet…");
    let said = window.wait_for_notice();
    for words in ["sheet.docx", "accepted", ".pdf", ".svg", ".png"] {
        assert!(said.contains(words), "{said}");
    }
    let plan = window.file("plan.ron");
    file::save(&start::demo(), &plan).unwrap();
    let output = headless(&plan, &path);
    assert_eq!(output.status.code(), Some(2));
    assert_eq!(String::from_utf8(output.stderr).unwrap(), format!("wirewright: {said}\n"));
    assert!(!path.exists());
}

#[test]
fn the_printer_gets_the_pdf_that_would_be_saved() {
    let ways = FakeWays::new(Ok("request id is Hall-7 (1 file(s))"));
    let mut window = on_the_sheet(Window::with_printer(ways.clone()));
    window.click("Print sheet");
    let said = window.wait_for_notice();
    assert_eq!(said, "Sheet sent to the printer: request id is Hall-7 (1 file(s))");
    window.click("Dismiss");
    let path = window.file("sheet.pdf");
    window.will_choose(Chosen::Path(path.clone()));
    window.click("Save sheet…");
    window.wait_for_notice();
    let seen = ways.seen.lock().unwrap();
    let [(way, name, pdf)] = &seen[..] else { panic!("{} things printed", seen.len()) };
    assert_eq!((*way, name.as_str()), ("spool", "saltmarsh-relief-post.pdf"));
    assert_eq!(pdf.len(), fs::read(&path).unwrap().len());
}

#[test]
fn without_a_printer_the_viewer_opens_and_words_say_why() {
    let refusal = SpoolError::Refused("lp: no default destination".to_owned());
    for (spool, why) in [
        (SpoolError::NoCommand, "no print command lp"),
        (refusal, "did not take the sheet (lp: no default destination)"),
    ] {
        let ways = FakeWays::new(Err(spool));
        let mut window = on_the_sheet(Window::with_printer(ways.clone()));
        window.click("Print sheet");
        let said = window.wait_for_notice();
        assert!(said.contains("PDF viewer") && said.contains(why), "{said}");
        let seen = ways.seen.lock().unwrap();
        assert!(seen.iter().map(|(way, ..)| *way).eq(["spool", "view"]));
        assert!(seen[0].2.starts_with(b"%PDF-") && seen[0].2 == seen[1].2);
    }
}

#[test]
fn where_nothing_opens_a_pdf_the_sentence_says_so() {
    let ways = FakeWays::new(Err(SpoolError::NoCommand));
    let ways = std::sync::Arc::new(FakeWays {
        has_viewer: false,
        spool: ways.spool.clone(),
        seen: std::sync::Mutex::default(),
    });
    let mut window = on_the_sheet(Window::with_printer(ways));
    window.click("Print sheet");
    let said = window.wait_for_notice();
    for words in ["not printed", "no print command lp", "no viewer"] {
        assert!(said.contains(words), "{said}");
    }
}
