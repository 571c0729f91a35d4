//! The drawing's scale: a round ratio that a ruler can follow, and its bar.

use station::units::{METRES_PER_FOOT, Units};

use super::elevation::Place;
use crate::scene::Spot;

/// Round steps within a power of ten.
const STEPS: [f64; 9] = [1.0, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 7.5];
/// Inches in a foot.
const INCHES_PER_FOOT: f64 = 12.0;
/// Millimetres in a metre.
const MM_PER_METRE: f64 = 1000.0;

/// Ratio of the site to the paper.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ratio {
    /// Site over paper: 250 for 1 : 250.
    pub site_per_paper: f64,
    /// The units it is round in.
    pub units: Units,
}

impl Ratio {
    /// The largest drawing whose ratio is round and at least `least` : 1.
    #[must_use]
    pub fn round(least: f64, units: Units) -> Self {
        // An inch on paper for so many feet of site, or a millimetre for so many.
        let unit = if units == Units::Feet { INCHES_PER_FOOT } else { 1.0 };
        let wanted = (least / unit).max(1.0);
        let decade = 10f64.powf(wanted.log10().floor());
        let step = STEPS.into_iter().map(|step| step * decade).find(|&step| step >= wanted * (1.0 - 1e-9));
        Self { site_per_paper: unit * step.unwrap_or(10.0 * decade), units }
    }

    /// A length of the site on paper, mm.
    #[must_use]
    pub fn paper_mm(self, site_m: f64) -> f64 {
        site_m * MM_PER_METRE / self.site_per_paper
    }

    /// In words: "1 : 250", "1 in : 20 ft".
    #[must_use]
    pub fn words(self) -> String {
        match self.units {
            Units::Metres => format!("1 : {}", station::units::fixed(self.site_per_paper, 0)),
            Units::Feet => format!("1 in : {} ft", trimmed(self.site_per_paper / INCHES_PER_FOOT)),
        }
    }

    /// The bar's length on the site, m: a round number of units that is about `wanted_mm` long on paper.
    #[must_use]
    pub fn bar_m(self, wanted_mm: f64) -> f64 {
        let unit_m = if self.units == Units::Feet { METRES_PER_FOOT } else { 1.0 };
        let wanted = wanted_mm / self.paper_mm(unit_m);
        let decade = 10f64.powf(wanted.log10().floor());
        let step = [5.0, 2.0, 1.0].into_iter().find(|step| step * decade <= wanted).unwrap_or(1.0);
        step * decade * unit_m
    }
}

/// A number without zeros at its end.
fn trimmed(value: f64) -> String {
    let decimals = usize::from((value - value.round()).abs() > 1e-6);
    station::units::fixed(value, decimals)
}

/// From the site to paper.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sight {
    /// The scale.
    pub ratio: Ratio,
    /// What of the site stands at `at_mm`.
    pub site: Place,
    /// Where that is on paper.
    pub at_mm: Spot,
}

impl Sight {
    /// Where a place of the site is on paper.
    #[must_use]
    pub fn spot(&self, place: Place) -> Spot {
        Spot::new(
            self.at_mm.x_mm + self.ratio.paper_mm(place.along_m - self.site.along_m),
            self.at_mm.y_mm - self.ratio.paper_mm(place.up_m - self.site.up_m),
        )
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ratios_are_round_and_large_enough() {
        assert_eq!(Ratio::round(231.0, Units::Metres).words(), "1 : 250");
        assert_eq!(Ratio::round(250.0, Units::Metres).words(), "1 : 250");
        assert_eq!(Ratio::round(251.0, Units::Metres).words(), "1 : 300");
        assert_eq!(Ratio::round(80.0, Units::Metres).words(), "1 : 100");
        assert_eq!(Ratio::round(231.0, Units::Feet).words(), "1 in : 20 ft");
        assert_eq!(Ratio::round(100.0, Units::Feet).words(), "1 in : 10 ft");
        assert_eq!(Ratio::round(0.2, Units::Metres).words(), "1 : 1");
    }

    #[test]
    fn bars_are_round_and_no_longer_than_wanted() {
        let ratio = Ratio::round(250.0, Units::Metres);
        assert!((ratio.bar_m(45.0) - 10.0).abs() < 1e-9);
        assert!((ratio.bar_m(20.0) - 5.0).abs() < 1e-9);
        let ratio = Ratio::round(240.0, Units::Feet);
        assert!((ratio.bar_m(45.0) / METRES_PER_FOOT - 20.0).abs() < 1e-9);
    }
}
