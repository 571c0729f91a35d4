//! Numbers as people read them: the one place where SI turns into text, for screen, sheet and terminal.

use num_complex::Complex64;
use serde::{Deserialize, Serialize};

/// Metres in one foot (international foot, exact).
pub const METRES_PER_FOOT: f64 = 0.3048;

/// Metres in half an inch (exact).
const METRES_PER_HALF_INCH: f64 = METRES_PER_FOOT / 24.0;

/// The units that lengths are shown in.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[allow(missing_docs)] // The words say it.
pub enum Units {
    #[default]
    Metres,
    Feet,
}

impl Units {
    /// The unit's symbol.
    #[must_use]
    pub fn symbol(self) -> &'static str {
        match self {
            Self::Metres => "m",
            Self::Feet => "ft",
        }
    }

    /// A length in metres, in this unit.
    #[must_use]
    pub fn from_metres(self, length_m: f64) -> f64 {
        match self {
            Self::Metres => length_m,
            Self::Feet => length_m / METRES_PER_FOOT,
        }
    }

    /// A length in this unit, in metres.
    #[must_use]
    pub fn to_metres(self, length: f64) -> f64 {
        match self {
            Self::Metres => length,
            Self::Feet => length * METRES_PER_FOOT,
        }
    }

    /// A length in metres as text with its unit: "20.35 m", "66.8 ft".
    #[must_use]
    pub fn length(self, length_m: f64) -> String {
        let value = self.from_metres(length_m);
        match self {
            Self::Metres => format!("{} m", fixed(value, 2)),
            Self::Feet => format!("{} ft", fixed(value, 1)),
        }
    }

    /// A length in metres, rounded to what is read off a tape: a centimetre or half an inch.
    #[must_use]
    pub fn on_tape(self, length_m: f64) -> f64 {
        let step_m = match self {
            Self::Metres => 0.01,
            Self::Feet => METRES_PER_HALF_INCH,
        };
        (length_m / step_m).round() * step_m
    }

    /// A length in metres as a tape measure shows it: "20.35 m", "66 ft 9½ in".
    #[must_use]
    pub fn tape(self, length_m: f64) -> String {
        if self == Self::Metres {
            return self.length(length_m);
        }
        let half_inches = (length_m.abs() / METRES_PER_HALF_INCH).round();
        let feet = (half_inches / 24.0).floor();
        let rest = half_inches - 24.0 * feet;
        let inches = match ((rest / 2.0).floor(), rest % 2.0 > 0.5) {
            (whole, false) => format!("{whole:.0}"),
            (whole, true) if whole > 0.0 => format!("{whole:.0}½"),
            _ => "½".to_owned(),
        };
        let sign = if length_m < 0.0 && half_inches > 0.0 { "−" } else { "" };
        match (feet > 0.0, rest > 0.0) {
            (true, true) => format!("{sign}{feet:.0} ft {inches} in"),
            (true, false) => format!("{sign}{feet:.0} ft"),
            (false, _) => format!("{sign}{inches} in"),
        }
    }
}

/// A number with so many decimals, a true minus sign, and no "-0".
#[must_use]
pub fn fixed(value: f64, decimals: usize) -> String {
    let text = format!("{:.*}", decimals, value.abs());
    let is_zero = text.bytes().all(|b| b == b'0' || b == b'.');
    if value < 0.0 && !is_zero { format!("−{text}") } else { text }
}

/// A number with about three significant digits and no exponent: "0.084", "7.3", "412", "4 830".
#[must_use]
pub fn short(value: f64) -> String {
    let size = value.abs();
    let decimals = match size {
        s if s >= 100.0 => 0,
        s if s >= 10.0 => 1,
        s if s >= 1.0 => 2,
        _ => 3,
    };
    let text = fixed(value, decimals);
    if size >= 9_999.5 { group_thousands(&text) } else { text }
}

/// Thin groups of three digits in a whole number.
fn group_thousands(text: &str) -> String {
    let digits: Vec<char> = text.chars().collect();
    let mut out = String::new();
    for (index, c) in digits.iter().enumerate() {
        let left = digits.len() - index;
        if index > 0 && left.is_multiple_of(3) && digits[index - 1].is_ascii_digit() {
            out.push('\u{a0}');
        }
        out.push(*c);
    }
    out
}

/// A frequency in MHz with kHz resolution: "7.100 MHz".
#[must_use]
pub fn megahertz(frequency_hz: f64) -> String {
    format!("{} MHz", fixed(frequency_hz / 1e6, 3))
}

/// A complex impedance: "73.1 + j42.5 Ω".
#[must_use]
pub fn impedance(z_ohm: Complex64) -> String {
    let sign = if z_ohm.im < 0.0 { '−' } else { '+' };
    format!("{} {sign} j{} Ω", short(z_ohm.re), short(z_ohm.im.abs()))
}

/// A standing-wave ratio as it makes sense to read it: "1.26", "9.6", "84", "over 999".
#[must_use]
pub fn swr(ratio: f64) -> String {
    match ratio {
        r if !r.is_finite() || r > 999.0 => "over 999".to_owned(),
        r if r >= 99.5 => fixed(r, 0),
        r if r >= 9.95 => fixed(r, 1),
        r => fixed(r, 2),
    }
}

/// Watts: "87 W", "0.35 W", "1.2 kW".
#[must_use]
pub fn watts(power_w: f64) -> String {
    match power_w.abs() {
        p if p >= 9_995.0 => format!("{} kW", fixed(power_w / 1e3, 1)),
        p if p >= 999.5 => format!("{} kW", fixed(power_w / 1e3, 2)),
        p if p >= 9.95 => format!("{} W", fixed(power_w, 0)),
        p if p >= 0.995 => format!("{} W", fixed(power_w, 1)),
        _ => format!("{} W", fixed(power_w, 2)),
    }
}

/// Volts: "48 V", "2.31 kV".
#[must_use]
pub fn volts(voltage_v: f64) -> String {
    match voltage_v.abs() {
        v if v >= 999.5 => format!("{} kV", fixed(voltage_v / 1e3, 2)),
        v if v >= 9.95 => format!("{} V", fixed(voltage_v, 0)),
        _ => format!("{} V", fixed(voltage_v, 1)),
    }
}

/// Amperes: "1.41 A", "35 mA".
#[must_use]
pub fn amperes(current_a: f64) -> String {
    if current_a.abs() < 0.0995 {
        format!("{} mA", fixed(current_a * 1e3, 0))
    } else {
        format!("{} A", fixed(current_a, 2))
    }
}

/// An inductance: "12.3 µH", "0.420 µH".
#[must_use]
pub fn henries(inductance_h: f64) -> String {
    format!("{} µH", short(inductance_h * 1e6))
}

/// A capacitance: "412 pF", "1.24 nF".
#[must_use]
pub fn farads(capacitance_f: f64) -> String {
    let picofarads = capacitance_f * 1e12;
    if picofarads.abs() >= 999.5 {
        format!("{} nF", short(picofarads / 1e3))
    } else {
        format!("{} pF", short(picofarads))
    }
}

/// Decibels: "0.35 dB".
#[must_use]
pub fn decibels(value_db: f64) -> String {
    format!("{} dB", fixed(value_db, 2))
}

/// A frequency range without its unit, in MHz: "7.000–7.200"; one number where the edges are less than 1 Hz apart.
#[must_use]
pub fn megahertz_range(low_hz: f64, high_hz: f64) -> String {
    if (high_hz - low_hz).abs() < 1.0 {
        return fixed(low_hz / 1e6, 3);
    }
    format!("{}–{}", fixed(low_hz / 1e6, 3), fixed(high_hz / 1e6, 3))
}

/// A width of spectrum in kHz: "200 kHz", "12.5 kHz".
#[must_use]
pub fn kilohertz(width_hz: f64) -> String {
    let width_khz = width_hz / 1e3;
    let decimals = usize::from((width_khz - width_khz.round()).abs() >= 0.05);
    format!("{} kHz", fixed(width_khz, decimals))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_read_well() {
        assert_eq!(fixed(-0.001, 2), "0.00");
        assert_eq!(short(4_830.2), "4830");
        assert_eq!(short(-12_345.6), "−12\u{a0}346");
        assert_eq!(impedance(Complex64::new(73.08, -42.54)), "73.1 − j42.5 Ω");
        assert_eq!(swr(f64::INFINITY), "over 999");
        assert_eq!(swr(9.96), "10.0");
        assert_eq!(watts(1200.0), "1.20 kW");
        assert_eq!(amperes(0.0354), "35 mA");
        assert_eq!(megahertz_range(7.0e6, 7.2e6), "7.000–7.200");
        assert_eq!(megahertz_range(5.0e6, 5.0e6), "5.000");
        assert_eq!(kilohertz(200e3), "200 kHz");
        assert_eq!(kilohertz(12.5e3), "12.5 kHz");
        assert_eq!(henries(3.214e-6), "3.21 µH");
        assert_eq!(farads(182.4e-12), "182 pF");
        assert_eq!(farads(1.24e-9), "1.24 nF");
        assert_eq!(Units::Feet.length(20.0), "65.6 ft");
        assert_eq!(Units::Metres.length(20.347), "20.35 m");
        assert_eq!(henries(12.34e-6), "12.3 µH");
        assert_eq!(farads(412.4e-12), "412 pF");
        assert_eq!(farads(1.2399e-9), "1.24 nF");
    }

    #[test]
    fn lengths_read_as_on_a_tape() {
        assert_eq!(Units::Metres.tape(20.347), "20.35 m");
        assert_eq!(Units::Feet.tape(20.3581), "66 ft 9½ in");
        assert_eq!(Units::Feet.tape(3.048), "10 ft");
        assert_eq!(Units::Feet.tape(3.047), "10 ft");
        assert_eq!(Units::Feet.tape(0.0127), "½ in");
        assert_eq!(Units::Feet.tape(0.1524), "6 in");
        assert_eq!(Units::Feet.tape(0.0), "0 in");
        assert_eq!(Units::Feet.tape(-0.3048), "−1 ft");
        assert!((Units::Feet.on_tape(20.35) - 20.3454).abs() < 1e-9);
        assert!((Units::Metres.on_tape(20.347) - 20.35).abs() < 1e-9);
    }
}
