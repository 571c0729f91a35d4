//! The command line.

use std::path::PathBuf;
use std::process::ExitCode;

use clap::{Args, Parser, Subcommand, ValueEnum};
use sheet::Date;
use station::units::Units;

use crate::headless::{self, HeadlessError};
use crate::paper::PaperError;
use crate::start;
use sheet::Paper;

/// Plan one HF wire antenna for many bands.
#[derive(Debug, Parser)]
#[command(name = "wirewright", version, about, args_conflicts_with_subcommands = true)]
pub struct Cli {
    /// The plan to open in the window; without one, an invented station
    #[arg(value_name = "PLAN.ron")]
    plan: Option<PathBuf>,
    #[command(subcommand)]
    command: Option<Headless>,
}

/// What works without a display.
#[derive(Debug, Subcommand)]
enum Headless {
    /// Print the numbers of a plan, band by band and feed by feed
    Report(ReportArgs),
    /// Write the page for the crew as PDF, SVG or PNG
    Sheet(SheetArgs),
}

/// Arguments of `report`.
#[derive(Debug, Args)]
pub struct ReportArgs {
    /// The plan
    #[arg(value_name = "PLAN.ron")]
    pub plan: PathBuf,
    /// One JSON object in place of the table
    #[arg(long)]
    pub json: bool,
    /// These frequencies in place of the plan's bands, MHz
    #[arg(long, value_name = "MHZ", value_delimiter = ',', num_args = 1..)]
    pub at: Vec<f64>,
}

/// Arguments of `sheet`.
#[derive(Debug, Args)]
pub struct SheetArgs {
    /// The plan
    #[arg(value_name = "PLAN.ron")]
    pub plan: PathBuf,
    /// The file to write, by its ending: .pdf, .svg or .png; of those two, each page gets its own: FILE-1.svg, …
    #[arg(long, value_name = "FILE.pdf")]
    pub out: PathBuf,
    /// The day on the sheet; without it, today
    #[arg(long, value_name = "YYYY-MM-DD")]
    pub date: Option<Date>,
    /// Paper
    #[arg(long, value_enum, default_value = "a4")]
    paper: PaperArg,
    /// Units of lengths
    #[arg(long, value_enum, default_value = "m")]
    units: UnitsArg,
}

impl SheetArgs {
    /// The paper.
    #[must_use]
    pub fn paper(&self) -> Paper {
        match self.paper {
            PaperArg::A4 => Paper::A4,
            PaperArg::Letter => Paper::Letter,
        }
    }

    /// The units of lengths.
    #[must_use]
    pub fn units(&self) -> Units {
        match self.units {
            UnitsArg::M => Units::Metres,
            UnitsArg::Ft => Units::Feet,
        }
    }
}

#[derive(Clone, Copy, Debug, ValueEnum)]
enum PaperArg {
    A4,
    Letter,
}

#[derive(Clone, Copy, Debug, ValueEnum)]
enum UnitsArg {
    M,
    Ft,
}

/// Status for input that cannot be used; clap uses the same for arguments.
const BAD_INPUT: u8 = 2;
/// Status for everything else that went wrong.
const FAILED: u8 = 1;

/// Does what the command line asks for.
#[must_use]
pub fn run(cli: Cli) -> ExitCode {
    let outcome = match cli.command {
        None => return opened(cli.plan),
        Some(Headless::Report(args)) => headless::report::run(&args),
        Some(Headless::Sheet(args)) => headless::sheet::run(&args),
    };
    match outcome {
        Ok(()) => ExitCode::SUCCESS,
        Err(error) => {
            eprintln!("wirewright: {error}");
            ExitCode::from(if error.is_bad_input() { BAD_INPUT } else { FAILED })
        }
    }
}

fn opened(plan: Option<PathBuf>) -> ExitCode {
    match start::window(plan) {
        Ok(()) => ExitCode::SUCCESS,
        Err(error) => {
            eprintln!("wirewright: {error}");
            ExitCode::from(FAILED)
        }
    }
}

impl HeadlessError {
    fn is_bad_input(&self) -> bool {
        match self {
            Self::Write(_) => false,
            Self::Sheet(error) => matches!(error, PaperError::Kind(_)),
            Self::Plan { .. } | Self::Frequency { .. } | Self::Evaluate(_) => true,
        }
    }
}
