//! How close things stand on the pages. The sizes of the type are the same in each.

use crate::tokens::TextStyle;

/// Distances that give way where a sheet would need one more page, mm unless said otherwise.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Density {
    /// Distance of base lines, as a share of the style's own.
    pub leading: f64,
    /// Between sections.
    pub section: f64,
    /// Least height of a row of the cut list: someone writes in it.
    pub cut_row: f64,
    /// Between two columns of numbers of the cut list.
    pub cut_gap: f64,
    /// Width of the box for a length as built.
    pub built: f64,
    /// Height of the line with a feed's name.
    pub feed_name: f64,
    /// Over and under a band.
    pub band_pad: f64,
    /// Height of a band's curve.
    pub curve: f64,
    /// Height of a box for a measured number.
    pub measured: f64,
    /// Height of a box for a name and a date.
    pub signed: f64,
    /// Side of the code on the first page.
    pub code: f64,
}

impl Density {
    /// Where there is room.
    pub const ROOMY: Self = Self {
        leading: 1.0,
        section: 3.0,
        cut_row: 6.0,
        cut_gap: 4.0,
        built: 19.0,
        feed_name: 6.0,
        band_pad: 0.4,
        curve: 14.0,
        measured: 7.5,
        signed: 12.0,
        code: 22.0,
    };
    /// As close as hands in gloves and eyes in rain allow.
    pub const DENSE: Self = Self {
        leading: 0.89,
        section: 2.0,
        cut_row: 4.7,
        cut_gap: 3.0,
        built: 17.0,
        feed_name: 5.2,
        band_pad: 0.1,
        curve: 12.8,
        measured: 6.4,
        signed: 11.0,
        code: 19.0,
    };

    /// Distance between base lines, mm.
    pub fn leading_mm(&self, style: TextStyle) -> f64 {
        self.leading * style.leading_mm()
    }
}
