//! The sketch: what textbooks know of a straight wire that carries a sinusoidal standing wave.
//!
//! * [`mutual_impedance`], [`self_impedance`]: induced-EMF impedances of thin parallel wires, in closed form.
//! * [`Sketch`]: feedpoint impedance of a wire of any length fed anywhere, finite also where the feedpoint sits on a
//!   current node, with loss, insulation and an image in the earth; its standing wave and the places of loops and
//!   nodes.
//! * [`BandTerms`]: the slow part of the impedance, interpolated over a band.
//! * [`HarmonicWire`]: resonant lengths.
//!
//! Accuracy of the sketch against full solutions of thin wires in free space: resonant length within 1 %, resistance
//! near odd resonances within 10 %, |Z| near even ones within 30 %. It stands in while the full model computes.

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
