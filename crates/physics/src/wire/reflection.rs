//! What a boundary gives back of the wires' currents and charges, as kernels beside the free-space one.
//!
//! The matrix is made of mixed potentials: the vector potential of currents tested by currents, the scalar potential of
//! charges tested by charges. Anything that adds to the two potentials and is smooth over a segment enters here: the
//! kernels of a lossy half-space, for one (Michalski & Zheng, IEEE Trans. AP-38, 1990, formulation C, keeps one scalar
//! potential for all directions of current; from memory).

use num_complex::Complex64;

use super::coupling::GAUSS;
use super::fill::Blocks;
use super::moments::Axis;
use super::segment::Segment;
use super::shapes::Shapes;

/// A point of a wire's axis and the direction of its current.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Element {
    /// Position, m.
    pub position_m: [f64; 3],
    /// Unit vector along the wire.
    pub direction: [f64; 3],
}

/// Kernels between two elements, 1/m: what stands beside e^(−jkR)/R of free space.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Kernel {
    /// Vector potential of the source's current along the test's direction, the angle between them included.
    pub current: Complex64,
    /// Scalar potential of the source's charge.
    pub charge: Complex64,
}

/// A boundary at one frequency.
///
/// Kernels must be reciprocal: the same with test and source exchanged. They may vary little over a segment, of which
/// two points stand for the whole; an image nearer than a segment's length is too near.
pub trait Reflection {
    /// Fills in the kernels of one test with all sources; both slices have the same length.
    fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]);
}

/// Reflection on all Gauss points of a mesh.
pub(super) struct Reflected<'a> {
    reflection: &'a dyn Reflection,
    /// Two for each segment, the lower first.
    elements: Vec<Element>,
}

impl<'a> Reflected<'a> {
    pub fn new(reflection: &'a dyn Reflection, segments: &[Segment]) -> Self {
        let both = |segment: &Segment| {
            let axis = Axis::of(segment);
            [-GAUSS, GAUSS].map(|xi| Element { position_m: axis.end(xi), direction: axis.direction })
        };
        Self { reflection, elements: segments.iter().flat_map(both).collect() }
    }

    /// Adds the couplings of a row's segment with all up to it.
    pub fn add_row(&self, row: usize, shapes: &[Shapes], blocks: &mut Blocks) {
        let sources = &self.elements[..2 * (row + 1)];
        let mut kernels = vec![Kernel::default(); 2 * sources.len()];
        let (lower, upper) = kernels.split_at_mut(sources.len());
        self.reflection.kernels(&self.elements[2 * row], sources, lower);
        self.reflection.kernels(&self.elements[2 * row + 1], sources, upper);
        for (column, (minus, plus)) in lower.chunks_exact(2).zip(upper.chunks_exact(2)).enumerate() {
            let current = sums([minus[0].current, minus[1].current, plus[0].current, plus[1].current]);
            let charge = sums([minus[0].charge, minus[1].charge, plus[0].charge, plus[1].charge]);
            blocks.add(column, end_couplings(&shapes[row], &shapes[column], current, charge));
        }
    }
}

/// Sums over the pairs of Gauss points: plain, with the row's sign, with the column's, with both.
fn sums([mm, mp, pm, pp]: [Complex64; 4]) -> [Complex64; 4] {
    [mm + mp + pm + pp, pm + pp - mm - mp, mp + pp - mm - pm, mm + pp - mp - pm]
}

/// Beginning–beginning, beginning–end, end–beginning, end–end.
fn end_couplings(p: &Shapes, q: &Shapes, current: [Complex64; 4], charge: [Complex64; 4]) -> [Complex64; 4] {
    let [ee, oe, eo, oo] = current;
    let [charge_ee, charge_oe, charge_eo, charge_oo] = charge;
    // Of the mean of the end currents (even) and of half their difference (odd)
    let even_even = p.even * q.even * ee - p.even_slope * q.even_slope * charge_oo;
    let even_odd = p.even * q.odd * eo - p.even_slope * q.odd_slope * charge_oe;
    let odd_even = p.odd * q.even * oe - p.odd_slope * q.even_slope * charge_eo;
    let odd_odd = p.odd * q.odd * oo - p.odd_slope * q.odd_slope * charge_ee;
    [
        0.25 * (even_even - even_odd - odd_even + odd_odd),
        0.25 * (even_even + even_odd - odd_even - odd_odd),
        0.25 * (even_even - even_odd + odd_even - odd_odd),
        0.25 * (even_even + even_odd + odd_even + odd_odd),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::constants::wave_number_rad_per_m;
    use crate::wire::{Boundary, Material, PortPlace, Structure, WireModel, WireShape};

    /// The mirror, told as a reflection.
    struct Image {
        k: f64,
    }

    impl Reflection for Image {
        fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]) {
            for (source, kernel) in sources.iter().zip(kernels) {
                let ([x, y, z], [u, v, w]) = (test.position_m, source.position_m);
                let r = ((x - u).powi(2) + (y - v).powi(2) + (z + w).powi(2)).sqrt();
                let wave = Complex64::cis(-self.k * r) / r;
                let ([x, y, z], [u, v, w]) = (test.direction, source.direction);
                *kernel = Kernel { current: -(x * u + y * v - z * w) * wave, charge: -wave };
            }
        }
    }

    #[test]
    fn mirror_told_as_a_reflection_is_the_mirror() {
        let frequency_hz = 14e6;
        let structure = |boundary| Structure {
            wires: vec![WireShape {
                vertices_m: vec![[-8.0, 0.0, 5.0], [0.0, 0.0, 10.0], [2.0, 6.0, 4.0]],
                radius_m: 1e-3,
                material: Material::PERFECT,
            }],
            ports: vec![PortPlace { wire: 0, arc_m: 6.0, gap_m: 0.02 }],
            boundary,
        };
        let image = Image { k: wave_number_rad_per_m(frequency_hz) };
        let free = WireModel::new(structure(Boundary::FreeSpace), frequency_hz).unwrap();
        let mirror = WireModel::new(structure(Boundary::Mirror), frequency_hz).unwrap();
        let y = |solution: crate::wire::Solution| solution.port_admittance_s[(0, 0)];
        let told = y(free.solve_over(frequency_hz, &image).unwrap());
        let expected = y(mirror.solve(frequency_hz).unwrap());
        let alone = y(free.solve(frequency_hz).unwrap());
        assert!((told - expected).norm() < 1e-6 * expected.norm(), "{told} for {expected}");
        assert!((alone - expected).norm() > 0.01 * expected.norm(), "the mirror must matter");
    }
}
