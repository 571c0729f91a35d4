//! One-port data as text: Touchstone 1.1 (`.s1p`) and comma-separated values. No files here.
//!
//! The format follows the public Touchstone File Format Specification, revision 1.1 (from memory and from a summary of
//! it): one option line `# unit parameter format R n`, comments from `!` to the end of the line, impedances and
//! admittances normalised to R.

use std::fmt::Write as _;

use num_complex::Complex64;
use physics::line::{gamma_of_impedance, impedance_of_gamma};
use thiserror::Error;

/// A one-port over frequency.
#[derive(Clone, Debug, PartialEq)]
pub struct OnePort {
    /// The real reference of Γ, Ω.
    pub reference_ohm: f64,
    /// By rising frequency.
    pub points: Vec<OnePortPoint>,
}

/// A one-port at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct OnePortPoint {
    /// Hz.
    pub frequency_hz: f64,
    /// Reflection coefficient on the reference.
    pub gamma: Complex64,
}

impl OnePort {
    /// From impedances: pairs of frequency (Hz) and impedance (Ω).
    #[must_use]
    pub fn of_impedances(reference_ohm: f64, points: &[(f64, Complex64)]) -> Self {
        let point = |&(frequency_hz, z_ohm): &(f64, Complex64)| OnePortPoint {
            frequency_hz,
            gamma: gamma_of_impedance(z_ohm, reference_ohm),
        };
        Self { reference_ohm, points: points.iter().map(point).collect() }
    }

    /// Frequency (Hz) and impedance (Ω) of each point; the impedance of an open end is not finite.
    pub fn impedances(&self) -> impl Iterator<Item = (f64, Complex64)> + '_ {
        self.points
            .iter()
            .map(|point| (point.frequency_hz, impedance_of_gamma(point.gamma, self.reference_ohm)))
    }

    fn check(&self) -> Result<(), OnePortError> {
        if !(self.reference_ohm > 0.0 && self.reference_ohm.is_finite()) {
            return Err(OnePortError::Reference { value: self.reference_ohm });
        }
        let mut last_hz = f64::NEG_INFINITY;
        for (index, point) in self.points.iter().enumerate() {
            let OnePortPoint { frequency_hz, gamma } = *point;
            if !(frequency_hz.is_finite() && frequency_hz >= 0.0 && gamma.is_finite()) {
                return Err(OnePortError::NotFinite { line: index + 1 });
            }
            if frequency_hz <= last_hz {
                return Err(OnePortError::NotRising { line: index + 1, frequency_hz });
            }
            last_hz = frequency_hz;
        }
        Ok(())
    }
}

/// Why a text is no one-port, or a one-port no text.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum OnePortError {
    /// A reference that is no resistance.
    #[error("the reference resistance is {value} Ω; it must be greater than zero")]
    Reference {
        /// Its value, Ω.
        value: f64,
    },
    /// A figure that is no number; of data to be written the line is the number of the point.
    #[error("line {line}: a frequency, a reflection or an impedance is not a finite number")]
    NotFinite {
        /// Number of the line, from 1.
        line: usize,
    },
    /// A frequency that is not above the one before.
    #[error("line {line}: {frequency_hz} Hz does not lie above the frequency before it")]
    NotRising {
        /// Number of the line, from 1.
        line: usize,
        /// The frequency, Hz.
        frequency_hz: f64,
    },
    /// A data line that does not hold three numbers.
    #[error("line {line}: a one-port's line holds three numbers, this one {found}")]
    Columns {
        /// Number of the line, from 1.
        line: usize,
        /// How many words it holds.
        found: usize,
    },
    /// A word that is no number.
    #[error("line {line}: {word:?} is not a number")]
    NotANumber {
        /// Number of the line, from 1.
        line: usize,
        /// The word.
        word: String,
    },
    /// Something in the option line that is not understood.
    #[error("line {line}: the option line does not allow {word:?} here")]
    Option {
        /// Number of the line, from 1.
        line: usize,
        /// The word.
        word: String,
    },
    /// Data before the option line.
    #[error("line {line}: data stand before the option line that begins with #")]
    NoOptionLine {
        /// Number of the line, from 1.
        line: usize,
    },
    /// A file of version 2.
    #[error("line {line}: this is a Touchstone file of version 2; save it as version 1.1")]
    VersionTwo {
        /// Number of the line, from 1.
        line: usize,
    },
    /// A table without the columns that are read.
    #[error("the first line must name the columns frequency_hz, r_ohm and x_ohm")]
    NoHeader,
}

/// Writes Touchstone 1.1: hertz, S as real and imaginary part, every digit; comment lines first.
///
/// # Errors
///
/// Figures that are not finite, frequencies that do not rise, a reference that is not positive.
pub fn write_s1p(one_port: &OnePort, comments: &[&str]) -> Result<String, OnePortError> {
    one_port.check()?;
    let mut text = String::new();
    for comment in comments {
        // The format is ASCII, and a comment ends with its line.
        let plain: String = comment.chars().map(|c| if (' '..='~').contains(&c) { c } else { '?' }).collect();
        text.push_str("! ");
        text.push_str(&plain);
        text.push('\n');
    }
    // Writing to a string cannot fail.
    let _ = writeln!(text, "# Hz S RI R {}", one_port.reference_ohm);
    for OnePortPoint { frequency_hz, gamma } in &one_port.points {
        let _ = writeln!(text, "{frequency_hz} {:e} {:e}", gamma.re, gamma.im);
    }
    Ok(text)
}

/// How the numbers of a file are meant.
struct Options {
    hz_per_unit: f64,
    parameter: Parameter,
    format: Format,
    reference_ohm: f64,
}

#[derive(Clone, Copy)]
enum Parameter {
    Scattering,
    Impedance,
    Admittance,
}

#[derive(Clone, Copy)]
enum Format {
    Magnitude,
    Decibel,
    RealImaginary,
}

impl Options {
    /// From the words after #; what is missing takes its default.
    fn read(line: usize, words: &str) -> Result<Self, OnePortError> {
        let mut options = Self {
            hz_per_unit: 1e9,
            parameter: Parameter::Scattering,
            format: Format::Magnitude,
            reference_ohm: 50.0,
        };
        let mut words = words.split_whitespace();
        while let Some(word) = words.next() {
            match word.to_ascii_lowercase().as_str() {
                "hz" => options.hz_per_unit = 1.0,
                "khz" => options.hz_per_unit = 1e3,
                "mhz" => options.hz_per_unit = 1e6,
                "ghz" => options.hz_per_unit = 1e9,
                "s" => options.parameter = Parameter::Scattering,
                "z" => options.parameter = Parameter::Impedance,
                "y" => options.parameter = Parameter::Admittance,
                "ma" => options.format = Format::Magnitude,
                "db" => options.format = Format::Decibel,
                "ri" => options.format = Format::RealImaginary,
                "r" => {
                    let value = number(line, words.next().unwrap_or("nothing after R"))?;
                    if value <= 0.0 {
                        return Err(OnePortError::Reference { value });
                    }
                    options.reference_ohm = value;
                }
                _ => return Err(OnePortError::Option { line, word: word.to_owned() }),
            }
        }
        Ok(options)
    }

    fn gamma(&self, first: f64, second: f64) -> Complex64 {
        let value = match self.format {
            Format::Magnitude => Complex64::from_polar(first, second.to_radians()),
            Format::Decibel => Complex64::from_polar(10_f64.powf(first / 20.0), second.to_radians()),
            Format::RealImaginary => Complex64::new(first, second),
        };
        // Z and Y are normalised to R in version 1.
        match self.parameter {
            Parameter::Scattering => value,
            Parameter::Impedance => gamma_of_impedance(value, 1.0),
            Parameter::Admittance => -gamma_of_impedance(value, 1.0),
        }
    }
}

fn number(line: usize, word: &str) -> Result<f64, OnePortError> {
    let value: f64 =
        word.parse().map_err(|_| OnePortError::NotANumber { line, word: word.chars().take(40).collect() })?;
    if value.is_finite() { Ok(value) } else { Err(OnePortError::NotFinite { line }) }
}

/// Reads Touchstone 1.0 and 1.1 of one port: S, Z or Y; magnitude, decibel or real and imaginary.
///
/// # Errors
///
/// What is not of the format, with the number of the line.
pub fn read_s1p(text: &str) -> Result<OnePort, OnePortError> {
    let mut options: Option<Options> = None;
    let mut points: Vec<OnePortPoint> = Vec::new();
    for (index, whole) in text.lines().enumerate() {
        let line = index + 1;
        let content = whole.split('!').next().unwrap_or_default().trim();
        if content.is_empty() {
            continue;
        }
        if content.starts_with('[') {
            return Err(OnePortError::VersionTwo { line });
        }
        if let Some(words) = content.strip_prefix('#') {
            // Later option lines are ignored.
            if options.is_none() {
                options = Some(Options::read(line, words)?);
            }
            continue;
        }
        let Some(options) = &options else { return Err(OnePortError::NoOptionLine { line }) };
        let words: Vec<&str> = content.split_whitespace().collect();
        let [frequency, first, second] = words[..] else {
            return Err(OnePortError::Columns { line, found: words.len() });
        };
        let frequency_hz = number(line, frequency)? * options.hz_per_unit;
        let gamma = options.gamma(number(line, first)?, number(line, second)?);
        push(&mut points, line, OnePortPoint { frequency_hz, gamma })?;
    }
    let reference_ohm = options.map_or(50.0, |options| options.reference_ohm);
    Ok(OnePort { reference_ohm, points })
}

/// Adds a point that is finite and lies above the one before.
fn push(points: &mut Vec<OnePortPoint>, line: usize, point: OnePortPoint) -> Result<(), OnePortError> {
    let OnePortPoint { frequency_hz, gamma } = point;
    if !(frequency_hz.is_finite() && gamma.is_finite()) {
        return Err(OnePortError::NotFinite { line });
    }
    if points.last().is_some_and(|last| frequency_hz <= last.frequency_hz) {
        return Err(OnePortError::NotRising { line, frequency_hz });
    }
    points.push(point);
    Ok(())
}

/// The columns of the table.
const HEADER: &str = "frequency_hz,r_ohm,x_ohm,swr";

/// Writes a table: frequency, resistance, reactance, standing-wave ratio on the reference (left empty where it is
/// infinite).
///
/// # Errors
///
/// As [`write_s1p`], and an impedance that is not finite: a table cannot hold an open end.
pub fn write_csv(one_port: &OnePort) -> Result<String, OnePortError> {
    one_port.check()?;
    let mut text = format!("{HEADER}\n");
    for (index, (frequency_hz, z_ohm)) in one_port.impedances().enumerate() {
        if !z_ohm.is_finite() {
            return Err(OnePortError::NotFinite { line: index + 1 });
        }
        let swr = physics::line::swr_of_gamma(one_port.points[index].gamma.norm());
        let swr = if swr.is_finite() { swr.to_string() } else { String::new() };
        let _ = writeln!(text, "{frequency_hz},{},{},{swr}", z_ohm.re, z_ohm.im);
    }
    Ok(text)
}

/// Reads a table with the columns frequency_hz, r_ohm and x_ohm first; what follows on a line is ignored.
///
/// # Errors
///
/// What is not of that form, with the number of the line; a reference that is not positive.
pub fn read_csv(text: &str, reference_ohm: f64) -> Result<OnePort, OnePortError> {
    if !(reference_ohm > 0.0 && reference_ohm.is_finite()) {
        return Err(OnePortError::Reference { value: reference_ohm });
    }
    let mut lines = text.lines().enumerate();
    let header = lines.next().map(|(_, header)| header.trim().to_ascii_lowercase());
    if !header.is_some_and(|header| header.starts_with("frequency_hz,r_ohm,x_ohm")) {
        return Err(OnePortError::NoHeader);
    }
    let mut points = Vec::new();
    for (index, content) in lines.filter(|(_, content)| !content.trim().is_empty()) {
        let line = index + 1;
        let words: Vec<&str> = content.split(',').map(str::trim).collect();
        let [frequency, r, x, ..] = words[..] else {
            return Err(OnePortError::Columns { line, found: words.len() });
        };
        let z_ohm = Complex64::new(number(line, r)?, number(line, x)?);
        let gamma = gamma_of_impedance(z_ohm, reference_ohm);
        push(&mut points, line, OnePortPoint { frequency_hz: number(line, frequency)?, gamma })?;
    }
    Ok(OnePort { reference_ohm, points })
}

#[cfg(test)]
mod tests;
