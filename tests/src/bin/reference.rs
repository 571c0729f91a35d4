//! Evaluates reference cases by the window's own path: each case becomes a plan, the evaluator answers, and the
//! figures are printed as one JSON object.
//!
//! `cargo run --release -p checks --bin reference -- CASES.json`

use std::process::ExitCode;

fn main() -> ExitCode {
    let Some(path) = std::env::args().nth(1) else {
        eprintln!("usage: reference CASES.json");
        return ExitCode::from(2);
    };
    let text = match std::fs::read_to_string(&path) {
        Ok(text) => text,
        Err(error) => {
            eprintln!("{path} cannot be read: {error}");
            return ExitCode::from(2);
        }
    };
    match checks::reference::answer_all(&text) {
        Ok(answers) => {
            println!("{answers}");
            ExitCode::SUCCESS
        }
        Err(error) => {
            eprintln!("{path}: {error}");
            ExitCode::FAILURE
        }
    }
}
