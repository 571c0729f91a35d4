//! The sketch: what textbooks know of a straight wire that carries a sinusoidal standing wave.
//!
//! * [`mutual_impedance`], [`self_impedance`]: induced-EMF impedances of thin parallel wires, in closed form.
//! * [`Sketch`]: feedpoint impedance of a wire of any length fed anywhere, finite also where the feedpoint sits on a
//!   current node, with loss, insulation and an image in the earth; its standing wave and the places of loops and
//!   nodes.
//! * [`BandTerms`]: the slow part of the impedance, interpolated over a band.
//! * [`HarmonicWire`]: resonant lengths.
//!
//! Accuracy of the sketch against full solutions of wires of 500 diameters or more in free space: resonant length of
//! the half wave within 0.4 %, its resistance 10 % low; Z within 15 % near odd resonances, 40 % near even ones, 30 % fed
//! off the centre (the resistance alone up to 60 % high where an end is within a twentieth of the length). At 100
//! diameters the half wave's resistance is a sixth low. The sketch stands in while the full model computes.

mod band;
mod emf;
mod error;
mod image;
mod marks;
mod resonance;
mod schelkunoff;
mod sketch;
mod wave;

pub use band::BandTerms;
pub use emf::{CentreFedWire, ParallelWires, mutual_impedance, self_impedance};
pub use error::SketchError;
pub use image::{Image, ImageDirection, Mirror};
pub use marks::{Mark, MarkKind};
pub use resonance::HarmonicWire;
pub use schelkunoff::mean_characteristic_impedance_ohm;
pub use sketch::{FeedpointAnswer, Sketch, SketchWire, Terms};
pub use wave::WavePoint;
