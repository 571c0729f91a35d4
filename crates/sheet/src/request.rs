//! What a sheet is made for: paper, units, date.

use std::fmt;
use std::str::FromStr;

use station::units::Units;

use crate::error::SheetError;

/// Paper, upright.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, serde::Serialize, serde::Deserialize)]
#[allow(missing_docs)] // The words say it.
pub enum Paper {
    #[default]
    A4,
    Letter,
}

impl Paper {
    /// Width and height, mm (ISO 216; ANSI Letter is 8½ × 11 inches).
    #[must_use]
    pub fn size_mm(self) -> (f64, f64) {
        match self {
            Self::A4 => (210.0, 297.0),
            Self::Letter => (215.9, 279.4),
        }
    }
}

/// A calendar date. It is an input, never the clock, so that the same plan gives the same sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub struct Date {
    pub year: u16,
    pub month: u8,
    pub day: u8,
}

impl FromStr for Date {
    type Err = SheetError;

    fn from_str(text: &str) -> Result<Self, SheetError> {
        let refuse = || SheetError::Date(text.to_owned());
        let digits = |part: &str, count: usize| {
            let fits = part.len() == count && part.bytes().all(|b| b.is_ascii_digit());
            if fits { part.parse::<u16>().map_err(|_| refuse()) } else { Err(refuse()) }
        };
        let [year, month, day] = text.trim().split('-').collect::<Vec<_>>()[..] else {
            return Err(refuse());
        };
        let (year, month, day) = (digits(year, 4)?, digits(month, 2)?, digits(day, 2)?);
        if !(1..=12).contains(&month) || !(1..=days_of(year, month)).contains(&day) {
            return Err(refuse());
        }
        Ok(Self { year, month: month as u8, day: day as u8 })
    }
}

impl fmt::Display for Date {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{:04}-{:02}-{:02}", self.year, self.month, self.day)
    }
}

/// Days of a month in the Gregorian calendar.
fn days_of(year: u16, month: u16) -> u16 {
    let is_leap = (year.is_multiple_of(4) && !year.is_multiple_of(100)) || year.is_multiple_of(400);
    match month {
        2 if is_leap => 29,
        2 => 28,
        4 | 6 | 9 | 11 => 30,
        _ => 31,
    }
}

/// How the sheet is wanted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct SheetRequest {
    /// What it is printed on.
    pub paper: Paper,
    /// What lengths are shown in.
    pub units: Units,
    /// The day on the sheet.
    pub date: Date,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn dates_are_calendar_dates() {
        assert_eq!("2028-02-29".parse(), Ok(Date { year: 2028, month: 2, day: 29 }));
        for wrong in ["2026-02-29", "2026-13-01", "2026-1-1", "1.12.2026", "", "2026-12-01-2", "2026-12-00"] {
            assert_eq!(wrong.parse::<Date>(), Err(SheetError::Date(wrong.to_owned())), "{wrong}");
        }
        assert_eq!("2026-12-01".parse::<Date>().unwrap().to_string(), "2026-12-01");
    }
}
