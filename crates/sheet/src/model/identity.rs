//! Which plan a sheet was made from.

use station::file;
use station::plan::Plan;
use station::report::Report;

use crate::fonts::printable;
use crate::request::SheetRequest;

/// What tells this sheet from others.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Identity {
    /// The plan's name.
    pub name: String,
    /// What the station is for.
    pub purpose: String,
    /// Call sign; may be empty.
    pub call_sign: String,
    /// Its revision, as the user counts them.
    pub revision: String,
    /// The day on the sheet.
    pub date: String,
    /// Checksum of the plan.
    pub check: String,
    /// The transmitter in a few words.
    pub transmitter: String,
    /// Which model made the numbers.
    pub model: String,
    /// What the QR code says.
    pub code: String,
}

impl Identity {
    pub(super) fn new(plan: &Plan, report: &Report, request: &SheetRequest) -> Self {
        let transmitter = &plan.transmitter;
        let check = checksum(plan);
        let name = printable(&plan.name);
        Self {
            purpose: printable(&plan.purpose),
            call_sign: printable(&plan.call_sign),
            revision: if plan.edition.is_empty() { "–".to_owned() } else { printable(&plan.edition) },
            date: request.date.to_string(),
            transmitter: format!(
                "{}, {} Ω, SWR up to {}",
                station::units::watts(transmitter.power_w),
                station::units::short(transmitter.resistance_ohm),
                station::units::swr(transmitter.swr_limit),
            ),
            model: report.model.name().to_owned(),
            code: format!("{}\nrevision {}\n{}\nplan check {check}", plan.name, plan.edition, request.date),
            name,
            check,
        }
    }
}

/// CRC-32 (ISO 3309) of the plan's text, in two groups of four hexadecimal digits: sheets with the same check were
/// made from the same plan.
#[must_use]
pub fn checksum(plan: &Plan) -> String {
    // A plan that cannot be written as text has NaN in it and was refused long before; its sheet says "0000-0000".
    let sum = file::to_text(plan).map_or(0, |text| crc32fast::hash(text.as_bytes()));
    format!("{:04X}-{:04X}", sum >> 16, sum & 0xffff)
}
