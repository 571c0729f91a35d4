//! The program `wirewright`.

use clap::Parser as _;

fn main() -> std::process::ExitCode {
    app::cli::run(app::cli::Cli::parse())
}
